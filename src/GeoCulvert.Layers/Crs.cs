using System.Globalization;
using System.Runtime.InteropServices;
using GeoCulvert.Design.Basis;
using NetTopologySuite.Geometries;

namespace GeoCulvert.Layers;

/// <summary>A coordinate reference system. Axis order is always x (east, longitude) then y (north, latitude).</summary>
public sealed unsafe class Crs : SafeHandle
{
    private static readonly string[] OpenGisNames =
        ["http://opengis.net/def/crs", "https://opengis.net/def/crs", "http://www.opengis.net/def/crs", "https://www.opengis.net/def/crs"];

    private Crs(nint handle)
        : base(0, ownsHandle: true)
    {
        SetHandle(handle);
        Native.OSRSetAxisMappingStrategy(handle, 0);
        IsGeographic = Native.OSRIsGeographic(handle) != 0;
        IsProjected = Native.OSRIsProjected(handle) != 0;
        Name = Native.Text(Native.OSRGetName(handle));
        nint unit = 0;
        LinearUnitM = IsProjected ? Native.OSRGetLinearUnits(handle, &unit) : 1;
        LinearUnitName = IsProjected ? Native.Text(unit) : "degree";
        if (Native.OSRIsCompound(handle) != 0)
        {
            nint vertical = 0;
            VerticalUnitM = Native.OSRGetTargetLinearUnits(handle, "VERT_CS", &vertical);
            VerticalDatum = Native.Text(Native.OSRGetAttrValue(handle, "VERT_DATUM", 0));
        }

        Code = FindCode(handle);
    }

    /// <inheritdoc/>
    public override bool IsInvalid => handle == 0;

    /// <summary>Name, "NAD83 / UTM zone 12N".</summary>
    public string Name { get; }

    /// <summary>Authority code, "EPSG:26912", or "" when it has none.</summary>
    public string Code { get; }

    /// <summary>Whether coordinates are degrees.</summary>
    public bool IsGeographic { get; }

    /// <summary>Whether coordinates are lengths in a plane.</summary>
    public bool IsProjected { get; }

    /// <summary>Size of the horizontal unit, m.</summary>
    public double LinearUnitM { get; }

    /// <summary>Name of the horizontal unit.</summary>
    public string LinearUnitName { get; }

    /// <summary>Size of the vertical unit of a compound system, m; null when the system has no vertical part.</summary>
    public double? VerticalUnitM { get; }

    /// <summary>Name of the vertical datum of a compound system, "" when the system has no vertical part.</summary>
    public string VerticalDatum { get; } = "";

    /// <summary>Well-known text, version 2 of 2019.</summary>
    public string Wkt
    {
        get
        {
            nint text = 0;
            using var options = new NativeList("FORMAT=WKT2_2019");
            Gdal.Check(Native.OSRExportToWktEx(Pointer, &text, options.Pointer), "Writing a coordinate system as text");
            var wkt = Native.Text(text);
            Native.VSIFree(text);
            return wkt;
        }
    }

    /// <summary>"EPSG:26912 NAD83 / UTM zone 12N".</summary>
    public string Label => Code.Length > 0 ? $"{Code} {Name}" : Name;

    internal nint Pointer => IsClosed ? throw new ObjectDisposedException(nameof(Crs)) : handle;

    /// <summary>
    /// A copy without the vertical part. Maps are moved with this one: between systems with a vertical part GDAL's warp would change the
    /// values of the cells too, elevations a second time and even classes.
    /// </summary>
    public Crs Horizontal()
    {
        var copy = Native.OSRClone(Pointer);
        if (Native.OSRIsCompound(copy) != 0) _ = Native.OSRStripVertical(copy);
        if (Native.OSRGetAxesCount(copy) > 2) _ = Native.OSRDemoteTo2D(copy, 0);
        return new Crs(copy);
    }

    /// <summary>Reads a coordinate system from "EPSG:26912", well-known text or a PROJ string.</summary>
    /// <exception cref="GdalException">The text is not a coordinate system.</exception>
    public static Crs Parse(string text)
    {
        ArgumentException.ThrowIfNullOrWhiteSpace(text);
        Gdal.Ensure();
        Gdal.Clear();
        // GDAL would fetch an address. The names of systems on opengis.net look like addresses but are looked up on this machine.
        var name = text.TrimStart();
        if (name.Contains("://", StringComparison.Ordinal) && !OpenGisNames.Any(n => name.StartsWith(n, StringComparison.OrdinalIgnoreCase)))
            throw new GdalException($"'{text}' is not a coordinate system", "an address is not fetched; give a code such as EPSG:26912, well-known text or a PROJ string");
        var srs = Native.OSRNewSpatialReference(0);
        if (Native.OSRSetFromUserInput(srs, text) == 0) return new Crs(srs);
        Native.OSRRelease(srs);
        throw new GdalException($"'{text}' is not a coordinate system", Gdal.Says());
    }

    /// <summary>The UTM zone (WGS 84) of a place; beyond 84 degrees north and 80 south, where UTM ends, the polar system of its sister UPS.</summary>
    public static Crs UtmFor(double longitudeDeg, double latitudeDeg)
    {
        if (latitudeDeg is > 84 or < -80) return Parse(latitudeDeg > 0 ? "EPSG:5041" : "EPSG:5042");
        var east = longitudeDeg + 180 - (360 * Math.Floor((longitudeDeg + 180) / 360));
        var zone = Math.Clamp((int)Math.Floor(east / 6) + 1, 1, 60);
        return Parse(string.Create(CultureInfo.InvariantCulture, $"EPSG:{(latitudeDeg >= 0 ? 32600 : 32700) + zone}"));
    }

    /// <summary>Whether both are the same system.</summary>
    public bool IsSameAs(Crs other)
    {
        ArgumentNullException.ThrowIfNull(other);
        return Native.OSRIsSame(Pointer, other.Pointer) != 0;
    }

    /// <summary>
    /// Places of this plane on its own ellipsoid, in space: x to longitude 0 on the equator, z to the north pole, m. Null when a place has none.
    /// </summary>
    /// <param name="xM">x of the places, m.</param>
    /// <param name="yM">y of the places, m.</param>
    internal (double X, double Y, double Z)[]? OnEllipsoid(double[] xM, double[] yM)
    {
        using var degrees = new Crs(Gdal.Check(Native.OSRCloneGeogCS(Pointer), $"The ellipsoid of {Label}"));
        using var transform = new CrsTransform(this, degrees);
        double[] longitude = [.. xM.Select(v => v / LinearUnitM)], latitude = [.. yM.Select(v => v / LinearUnitM)];
        try
        {
            transform.Apply(longitude, latitude);
        }
        catch (GdalException)
        {
            return null;
        }

        int wrong;
        double a = Native.OSRGetSemiMajor(Pointer, &wrong), inverse = Native.OSRGetInvFlattening(Pointer, &wrong), flattening = inverse == 0 ? 0 : 1 / inverse;
        var e2 = flattening * (2 - flattening);
        var unit = Native.OSRGetAngularUnits(degrees.Pointer, null);
        var inSpace = new (double X, double Y, double Z)[xM.Length];
        for (var i = 0; i < inSpace.Length; i++)
        {
            double l = longitude[i] * unit, p = latitude[i] * unit;
            if (!double.IsFinite(l) || !double.IsFinite(p)) return null;
            var n = a / Math.Sqrt(1 - (e2 * Math.Sin(p) * Math.Sin(p))); // radius of curvature in the prime vertical
            inSpace[i] = (n * Math.Cos(p) * Math.Cos(l), n * Math.Cos(p) * Math.Sin(l), n * (1 - e2) * Math.Sin(p));
        }

        return inSpace;
    }

    internal static Crs? FromBorrowed(nint srs) => srs == 0 ? null : new Crs(Native.OSRClone(srs));

    /// <inheritdoc/>
    protected override bool ReleaseHandle()
    {
        Native.OSRRelease(handle);
        return true;
    }

    private static string FindCode(nint srs)
    {
        var name = Native.OSRGetAuthorityName(srs, 0);
        if (name == 0)
        {
            // Try to find the code of a system that was written without one; on a copy, since this may change it.
            var copy = Native.OSRClone(srs);
            var code = Native.OSRAutoIdentifyEPSG(copy) == 0 ? Code(copy) : "";
            Native.OSRRelease(copy);
            Gdal.Clear();
            return code;
        }

        return Code(srs);

        static string Code(nint s)
        {
            nint authority = Native.OSRGetAuthorityName(s, 0), code = Native.OSRGetAuthorityCode(s, 0);
            return authority == 0 || code == 0 ? "" : $"{Native.Text(authority)}:{Native.Text(code)}";
        }
    }
}

/// <summary>Moves coordinates from one system to another.</summary>
public sealed unsafe class CrsTransform : SafeHandle
{
    private const int KnownToM = 5;
    private readonly string _what;

    /// <summary>Creates the transform.</summary>
    /// <exception cref="GdalException">There is no way between the systems.</exception>
    public CrsTransform(Crs from, Crs to)
        : base(0, ownsHandle: true)
    {
        ArgumentNullException.ThrowIfNull(from);
        ArgumentNullException.ThrowIfNull(to);
        Gdal.Clear();
        _what = $"From {from.Label} to {to.Label}";
        SetHandle(Gdal.Check(Native.OCTNewCoordinateTransformation(from.Pointer, to.Pointer), _what));
    }

    /// <inheritdoc/>
    public override bool IsInvalid => handle == 0;

    /// <summary>What is not known about the way between two systems: PROJ has only a ballpark one, or none known to 5 m (own limit).</summary>
    /// <param name="path">File that is moved.</param>
    /// <param name="from">Its system.</param>
    /// <param name="to">Where it is moved to.</param>
    public static IEnumerable<Finding> Doubts(string path, Crs from, Crs to)
    {
        using Crs here = from.Horizontal(), there = to.Horizontal();
        if (here.IsSameAs(there)) yield break;
        var way = $"{path}: from {from.Label} to {to.Label} ";
        if (!Exists(here, there, o => Native.OCTCoordinateTransformationOptionsSetBallparkAllowed(o, 0))) yield return LayerFindings.DatumShift.With(way + "no way is known, the datums were taken as one");
        else if (!Exists(here, there, o => Native.OCTCoordinateTransformationOptionsSetDesiredAccuracy(o, KnownToM))) yield return LayerFindings.DatumShift.With(way + $"no way is known to {KnownToM} m");
    }

    /// <summary>Moves coordinates in place; heights stay.</summary>
    /// <exception cref="GdalException">A coordinate has no image.</exception>
    public void Apply(double[] x, double[] y)
    {
        ArgumentNullException.ThrowIfNull(x);
        ArgumentNullException.ThrowIfNull(y);
        if (x.Length != y.Length) throw new ArgumentException("x and y differ in length.", nameof(y));
        Gdal.Clear();
        fixed (double* px = x, py = y)
        {
            if (Native.OCTTransform(handle, x.Length, px, py, null) == 0) throw new GdalException(_what, Gdal.Says());
        }
    }

    /// <summary>A copy of a geometry with its coordinates moved; z stays.</summary>
    public Geometry Apply(Geometry geometry)
    {
        ArgumentNullException.ThrowIfNull(geometry);
        var copy = geometry.Copy();
        copy.Apply(new Moving(this));
        copy.GeometryChanged();
        return copy;
    }

    /// <inheritdoc/>
    protected override bool ReleaseHandle()
    {
        Native.OCTDestroyCoordinateTransformation(handle);
        return true;
    }

    private static bool Exists(Crs from, Crs to, Func<nint, int> set)
    {
        var options = Native.OCTNewCoordinateTransformationOptions();
        _ = set(options);
        var transform = Native.OCTNewCoordinateTransformationEx(from.Pointer, to.Pointer, options);
        Native.OCTDestroyCoordinateTransformationOptions(options);
        if (transform != 0) Native.OCTDestroyCoordinateTransformation(transform);
        Gdal.Clear();
        return transform != 0;
    }

    private sealed class Moving(CrsTransform transform) : IEntireCoordinateSequenceFilter
    {
        public bool Done => false;

        public bool GeometryChanged => true;

        public void Filter(CoordinateSequence s)
        {
            double[] x = new double[s.Count], y = new double[s.Count];
            for (var i = 0; i < s.Count; i++) (x[i], y[i]) = (s.GetX(i), s.GetY(i));
            transform.Apply(x, y);
            for (var i = 0; i < s.Count; i++)
            {
                s.SetX(i, x[i]);
                s.SetY(i, y[i]);
            }
        }
    }
}
