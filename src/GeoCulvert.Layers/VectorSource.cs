using GeoCulvert.Design.Basis;
using NetTopologySuite.Geometries;
using NetTopologySuite.IO;
using NetTopologySuite.Operation.Valid;

namespace GeoCulvert.Layers;

/// <summary>A feature as read: geometry in the plane that was asked for, fields by name.</summary>
/// <param name="Id">Feature id in its file.</param>
/// <param name="Geometry">Never null or empty; curves are lines, z is kept.</param>
/// <param name="Fields">Text, long, double or null by field name.</param>
public sealed record VectorFeature(long Id, Geometry Geometry, IReadOnlyDictionary<string, object?> Fields)
{
    /// <summary>A field as text, or null when it is missing or blank.</summary>
    public string? Text(string field) => Fields.GetValueOrDefault(field)?.ToString() is { } t && t.Trim().Length > 0 ? t.Trim() : null;
}

/// <summary>A layer as read.</summary>
/// <param name="LayerName">Its name.</param>
/// <param name="FieldNames">Its fields in order.</param>
/// <param name="Features">Features that can be used.</param>
/// <param name="Findings">Features that cannot, and why.</param>
/// <param name="Crs">The layer's own coordinate system.</param>
public sealed record VectorLayer(
    string LayerName, IReadOnlyList<string> FieldNames, IReadOnlyList<VectorFeature> Features, IReadOnlyList<Finding> Findings, string Crs)
{
    /// <summary>What is known of the heights of its coordinates.</summary>
    public LayerHeights Heights { get; init; } = LayerHeights.None;
}

/// <summary>Reads vector layers in any format GDAL knows.</summary>
public static unsafe class VectorSource
{
    /// <summary>Reads a layer into a plane.</summary>
    /// <param name="path">File or data source.</param>
    /// <param name="layer">Layer name; null for the first.</param>
    /// <param name="where">Filter on the fields, an SQL WHERE clause; null for all.</param>
    /// <param name="plane">Plane to bring the geometries into.</param>
    /// <exception cref="InputException">File, layer, filter or coordinate system cannot be used.</exception>
    public static VectorLayer Read(string path, string? layer, string? where, WorkingPlane plane)
    {
        ArgumentNullException.ThrowIfNull(path);
        ArgumentNullException.ThrowIfNull(plane);
        Gdal.Ensure();
        Gdal.Clear();
        if (!path.StartsWith("/vsi", StringComparison.Ordinal) && !File.Exists(path) && !Directory.Exists(path))
            throw new InputException(path, "no such file", "a vector file that GDAL reads");
        var opened = Native.GDALOpenEx(path, 0x04 /* vector */ | 0x40 /* say errors */, 0, 0, 0);
        if (opened == 0) throw new InputException(path, $"something GDAL does not open as vectors ({Gdal.Says()})", "a vector file that GDAL reads");
        using var dataset = new DatasetHandle(opened);
        var handle = Find(dataset, path, layer);
        if (where is not null && Native.OGR_L_SetAttributeFilter(handle, where) != 0)
            throw new InputException(path, $"the filter '{where}' ({Gdal.Says()})", "an SQL WHERE clause on the layer's fields");
        using var crs = Crs.FromBorrowed(Native.OGR_L_GetSpatialRef(handle))
            ?? throw new InputException(path, "no coordinate system", "a layer that says its own");
        return ReadAll(path, handle, crs, plane);
    }

    /// <summary>Reads a plain table, or the fields of a layer without its geometries.</summary>
    /// <param name="path">File or data source.</param>
    /// <param name="table">Its name; null for the first.</param>
    /// <exception cref="InputException">File or table cannot be used.</exception>
    public static IReadOnlyList<VectorFeature> ReadTable(string path, string? table)
    {
        ArgumentNullException.ThrowIfNull(path);
        Gdal.Ensure();
        Gdal.Clear();
        var opened = Native.GDALOpenEx(path, 0x04 | 0x40, 0, 0, 0);
        if (opened == 0) throw new InputException(path, $"something GDAL does not open as a table ({Gdal.Says()})", "a table that GDAL reads");
        using var dataset = new DatasetHandle(opened);
        var handle = Find(dataset, path, table);
        var fields = Fields(handle);
        var rows = new List<VectorFeature>();
        Native.OGR_L_ResetReading(handle);
        for (nint feature; (feature = Native.OGR_L_GetNextFeature(handle)) != 0;)
        {
            rows.Add(new VectorFeature(Native.OGR_F_GetFID(feature), GeometryCollection.Empty, Values(feature, fields)));
            Native.OGR_F_Destroy(feature);
        }

        var says = Gdal.Says();
        return says.Length == 0 ? rows : throw new InputException(path, $"rows that GDAL cannot read ({says})", "a whole, undamaged file");
    }

    private static (string Name, int Type)[] Fields(nint layer)
    {
        var definition = Native.OGR_L_GetLayerDefn(layer);
        return [.. Enumerable.Range(0, Native.OGR_FD_GetFieldCount(definition))
            .Select(i => Native.OGR_FD_GetFieldDefn(definition, i))
            .Select(f => (Native.Text(Native.OGR_Fld_GetNameRef(f)), Native.OGR_Fld_GetType(f)))];
    }

    private static nint Find(DatasetHandle dataset, string path, string? layer)
    {
        var count = Native.GDALDatasetGetLayerCount(dataset.Pointer);
        if (layer is null && count > 0) return Native.GDALDatasetGetLayer(dataset.Pointer, 0);
        var named = layer is null ? 0 : Native.GDALDatasetGetLayerByName(dataset.Pointer, layer);
        if (named != 0) return named;
        var names = Enumerable.Range(0, count).Select(i => Native.Text(Native.OGR_L_GetName(Native.GDALDatasetGetLayer(dataset.Pointer, i))));
        throw new InputException(path, layer is null ? "no layer" : $"no layer '{layer}'", $"one of its layers: {string.Join(", ", names)}");
    }

    private static VectorLayer ReadAll(string path, nint layer, Crs crs, WorkingPlane plane)
    {
        var fields = Fields(layer);
        var features = new List<VectorFeature>();
        var findings = new List<Finding>();
        Native.OGR_L_ResetReading(layer);
        for (nint feature; (feature = Native.OGR_L_GetNextFeature(layer)) != 0;)
        {
            try
            {
                var id = Native.OGR_F_GetFID(feature);
                var (geometry, wrong) = Shape(Native.OGR_F_GetGeometryRef(feature), crs, plane);
                if (geometry is null) findings.Add(LayerFindings.FeatureLeftOut.With($"{path}, feature {id}: {wrong}"));
                else features.Add(new VectorFeature(id, geometry, Values(feature, fields)));
            }
            finally
            {
                Native.OGR_F_Destroy(feature);
            }
        }

        var says = Gdal.Says();
        if (says.Length > 0) throw new InputException(path, $"features that GDAL cannot read ({says})", "a whole, undamaged vector file");
        findings.AddRange(CrsTransform.Doubts(path, crs, plane.Crs));
        var heights = LayerHeights.InMetres(features.Select(f => f.Geometry), crs);
        return new VectorLayer(Native.Text(Native.OGR_L_GetName(layer)), [.. fields.Select(f => f.Name)], features, findings, crs.Label) { Heights = heights };
    }

    private static (Geometry? Geometry, string Wrong) Shape(nint reference, Crs crs, WorkingPlane plane)
    {
        if (reference == 0) return (null, "no geometry");
        var linear = Native.OGR_G_GetLinearGeometry(reference, 0, 0);
        if (linear == 0) return (null, "a geometry that cannot be made of straight lines");
        try
        {
            var bytes = new byte[Native.OGR_G_WkbSize(linear)];
            fixed (byte* p = bytes) Gdal.Check(Native.OGR_G_ExportToIsoWkb(linear, 1, p), "Reading a geometry");
            var geometry = new WKBReader().Read(bytes);
            if (geometry.IsEmpty) return (null, "an empty geometry");
            if (geometry.Coordinates.Any(c => !double.IsFinite(c.X) || !double.IsFinite(c.Y))) return (null, "coordinates that are not finite");
            if (geometry is ILineal && geometry.Length == 0) return (null, "a line without length");
            if (geometry is IPolygonal && new IsValidOp(geometry).ValidationError is { } wrong) return (null, $"an invalid polygon ({wrong})");
            return (plane.Into(geometry, crs), "");
        }
        catch (Exception e) when (e is ParseException or ArgumentException or GdalException)
        {
            return (null, e.Message);
        }
        finally
        {
            Native.OGR_G_DestroyGeometry(linear);
        }
    }

    private static Dictionary<string, object?> Values(nint feature, (string Name, int Type)[] fields)
    {
        var values = new Dictionary<string, object?>(StringComparer.OrdinalIgnoreCase);
        for (var i = 0; i < fields.Length; i++)
        {
            values[fields[i].Name] = Native.OGR_F_IsFieldSetAndNotNull(feature, i) == 0 ? null : fields[i].Type switch
            {
                0 or 12 => Native.OGR_F_GetFieldAsInteger64(feature, i),
                2 => Native.OGR_F_GetFieldAsDouble(feature, i),
                _ => Native.Text(Native.OGR_F_GetFieldAsString(feature, i)),
            };
        }

        return values;
    }
}
