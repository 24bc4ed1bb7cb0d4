using GeoCulvert.Design.Study;
using NetTopologySuite.Geometries;
using NetTopologySuite.IO;

namespace GeoCulvert.Layers;

/// <summary>Writes result layers as GeoPackage and GeoJSON.</summary>
public static unsafe class ResultsWriter
{
    private const int WkbNone = 100, WkbUnknownMulti = 6;

    /// <summary>Writes a GeoPackage 1.3 with every layer and table. The file is written under a temporary name beside it and then moved.</summary>
    /// <exception cref="GdalException">GDAL could not write; the former file is untouched.</exception>
    /// <exception cref="IOException">The disk or the folder refused; the former file is untouched.</exception>
    public static void WriteGeoPackage(string path, IReadOnlyList<ResultLayer> layers, WorkingPlane plane)
    {
        ArgumentNullException.ThrowIfNull(layers);
        ArgumentNullException.ThrowIfNull(plane);
        MovedIntoPlace.OnDisk(path, ".gpkg", temporary =>
        {
            using var dataset = Create("GPKG", temporary, "VERSION=1.3");
            Gdal.Check(Native.GDALDatasetStartTransaction(dataset.Pointer, 1), $"Writing {path}");
            foreach (var layer in layers)
            {
                WriteLayer(dataset, layer, plane.Crs, plane.OutOf, ["SPATIAL_INDEX=" + (layer.Geometry == LayerGeometry.None ? "NO" : "YES"), $"IDENTIFIER={layer.Title}", $"DESCRIPTION={layer.Description}"]);
            }

            Gdal.Check(Native.GDALDatasetCommitTransaction(dataset.Pointer), $"Writing {path}");
            DescribeFields(dataset, layers);
            MovedIntoPlace.Flush(dataset, path);
        });
    }

    /// <summary>Writes each layer with geometry as RFC 7946 GeoJSON (WGS 84), one file a layer, named after it.</summary>
    /// <returns>The files written.</returns>
    /// <exception cref="GdalException">GDAL could not write; the former files are untouched.</exception>
    /// <exception cref="IOException">The disk or the folder refused; the former file is untouched.</exception>
    public static IReadOnlyList<string> WriteGeoJson(string folder, IReadOnlyList<ResultLayer> layers, WorkingPlane plane)
    {
        ArgumentNullException.ThrowIfNull(layers);
        ArgumentNullException.ThrowIfNull(plane);
        using var wgs84 = Crs.Parse("EPSG:4326");
        using var transform = new CrsTransform(plane.Crs, wgs84);
        var files = new List<string>();
        foreach (var layer in layers.Where(l => l.Geometry != LayerGeometry.None))
        {
            var path = Path.Combine(folder, layer.Name + ".geojson");
            MovedIntoPlace.FromMemory(path, ".geojson", temporary =>
            {
                using var dataset = Create("GeoJSON", temporary);
                WriteLayer(dataset, layer, wgs84, g => transform.Apply(plane.OutOf(g)), ["RFC7946=YES", "WRITE_NAME=YES", $"DESCRIPTION={layer.Description}"]);
                MovedIntoPlace.Flush(dataset, path);
            });
            files.Add(path);
        }

        return files;
    }

    private static DatasetHandle Create(string driver, string path, params IReadOnlyList<string> options)
    {
        using var list = new NativeList(options);
        return new DatasetHandle(Gdal.Check(Native.GDALCreate(Native.GDALGetDriverByName(driver), path, 0, 0, 0, 0, list.Pointer), $"Creating {path}"));
    }

    private static void WriteLayer(DatasetHandle dataset, ResultLayer layer, Crs crs, Func<Geometry, Geometry> move, IReadOnlyList<string> options)
    {
        var multi = layer.Geometry == LayerGeometry.Polygon || layer.Rows.Any(r => r.Geometry is GeometryCollection);
        var type = layer.Geometry switch
        {
            LayerGeometry.None => WkbNone,
            LayerGeometry.Point => 1,
            LayerGeometry.Line => multi ? 5 : 2,
            _ => WkbUnknownMulti,
        };
        using var list = new NativeList(options);
        var handle = Gdal.Check(
            Native.GDALDatasetCreateLayer(dataset.Pointer, layer.Name, layer.Geometry == LayerGeometry.None ? 0 : crs.Pointer, type, list.Pointer), $"Creating layer {layer.Name}");
        foreach (var field in layer.Fields) AddField(handle, field);
        var definition = Native.OGR_L_GetLayerDefn(handle);
        foreach (var row in layer.Rows)
        {
            var feature = Native.OGR_F_Create(definition);
            try
            {
                if (row.Geometry is { } shape && layer.Geometry != LayerGeometry.None) SetGeometry(feature, Promote(move(shape), multi));
                for (var i = 0; i < row.Values.Count; i++) SetValue(feature, i, row.Values[i]);
                Gdal.Check(Native.OGR_L_CreateFeature(handle, feature), $"Writing layer {layer.Name}");
            }
            finally
            {
                Native.OGR_F_Destroy(feature);
            }
        }
    }

    private static void AddField(nint layer, ResultField field)
    {
        var definition = Native.OGR_Fld_Create(field.Name, field.Type switch
        {
            FieldType.Text => 4,
            FieldType.Integer => 12,
            FieldType.Boolean => 0,
            _ => 2,
        });
        if (field.Type == FieldType.Boolean) Native.OGR_Fld_SetSubType(definition, 1);
        Gdal.Check(Native.OGR_L_CreateField(layer, definition, 0), $"Creating field {field.Name}");
        Native.OGR_Fld_Destroy(definition);
    }

    private static void SetValue(nint feature, int field, object? value)
    {
        switch (value)
        {
            case string s:
                // SQLite ends a text at a NUL; no other character is a danger to it.
                Native.OGR_F_SetFieldString(feature, field, s.Replace("\0", "", StringComparison.Ordinal));
                break;
            case double d when double.IsFinite(d):
                Native.OGR_F_SetFieldDouble(feature, field, d);
                break;
            case long n:
                Native.OGR_F_SetFieldInteger64(feature, field, n);
                break;
            case bool b:
                Native.OGR_F_SetFieldInteger(feature, field, b ? 1 : 0);
                break;
            default:
                Native.OGR_F_SetFieldNull(feature, field);
                break;
        }
    }

    private static Geometry Promote(Geometry geometry, bool multi) => (geometry, multi) switch
    {
        (Polygon p, true) => geometry.Factory.CreateMultiPolygon([p]),
        (LineString l, true) => geometry.Factory.CreateMultiLineString([l]),
        _ => geometry,
    };

    private static void SetGeometry(nint feature, Geometry geometry)
    {
        // Two dimensions: heights of flow paths and roads stay in the fields and profiles.
        var wkb = new WKBWriter(ByteOrder.LittleEndian, handleSRID: false, emitZ: false).Write(geometry);
        nint shape;
        fixed (byte* p = wkb) Gdal.Check(Native.OGR_G_CreateFromWkb(p, 0, &shape, wkb.Length), "Writing a geometry");
        Gdal.Check(Native.OGR_F_SetGeometryDirectly(feature, shape), "Writing a geometry");
    }

    /// <summary>Titles and descriptions of the fields, by the GeoPackage schema extension.</summary>
    private static void DescribeFields(DatasetHandle dataset, IReadOnlyList<ResultLayer> layers)
    {
        // GDAL makes this table only when a layer needs it, as spatial ones do.
        Sql(dataset, """
            CREATE TABLE IF NOT EXISTS gpkg_extensions (table_name TEXT, column_name TEXT, extension_name TEXT NOT NULL, definition TEXT NOT NULL,
            scope TEXT NOT NULL, CONSTRAINT ge_tce UNIQUE (table_name, column_name, extension_name))
            """);
        Sql(dataset, """
            CREATE TABLE gpkg_data_columns (table_name TEXT NOT NULL, column_name TEXT NOT NULL, name TEXT, title TEXT, description TEXT,
            mime_type TEXT, constraint_name TEXT, CONSTRAINT pk_gdc PRIMARY KEY (table_name, column_name), CONSTRAINT gdc_tn UNIQUE (table_name, name))
            """);
        Sql(dataset, """
            CREATE TABLE gpkg_data_column_constraints (constraint_name TEXT NOT NULL, constraint_type TEXT NOT NULL, value TEXT, min NUMERIC,
            min_is_inclusive BOOLEAN, max NUMERIC, max_is_inclusive BOOLEAN, description TEXT, CONSTRAINT gdcc_ntv UNIQUE (constraint_name, constraint_type, value))
            """);
        foreach (var table in new[] { "gpkg_data_columns", "gpkg_data_column_constraints" })
        {
            Sql(dataset, $"INSERT INTO gpkg_extensions (table_name, column_name, extension_name, definition, scope) VALUES ('{table}', NULL, 'gpkg_schema', 'http://www.geopackage.org/spec/#extension_schema', 'read-write')");
        }

        foreach (var layer in layers)
        {
            foreach (var field in layer.Fields)
            {
                var title = field.Unit.Length > 0 ? $"{field.Title}, {field.Unit}" : field.Title;
                Sql(dataset, $"INSERT INTO gpkg_data_columns (table_name, column_name, name, title, description) VALUES ({Quote(layer.Name)}, {Quote(field.Name)}, {Quote(field.Name)}, {Quote(title)}, {Quote(field.Description)})");
            }
        }
    }

    private static string Quote(string text) => "'" + text.Replace("'", "''", StringComparison.Ordinal) + "'";

    private static void Sql(DatasetHandle dataset, string sql)
    {
        Gdal.Clear();
        var result = Native.GDALDatasetExecuteSQL(dataset.Pointer, sql, 0, 0);
        if (result != 0) Native.GDALDatasetReleaseResultSet(dataset.Pointer, result);
        var says = Gdal.Says();
        if (says.Length > 0) throw new GdalException("Describing the fields of a GeoPackage", says);
    }
}
