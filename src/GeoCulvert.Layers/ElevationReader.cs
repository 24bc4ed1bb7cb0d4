using System.Globalization;
using GeoCulvert.Design.Basis;
using GeoCulvert.Design.Terrain;
using NetTopologySuite.Geometries;

namespace GeoCulvert.Layers;

/// <summary>What the project says about a terrain model.</summary>
/// <param name="Crs">Coordinate system, when the file has none.</param>
/// <param name="WorkingCrs">Projected system to work in; null = the file's own, or the UTM zone of its middle.</param>
/// <param name="NoData">A further nodata value.</param>
/// <param name="VerticalUnitM">Unit of the elevations in m, when the file does not say.</param>
/// <param name="CellSizeM">Cell size after projection; null = the file's own spacing.</param>
public sealed record ElevationOptions(Crs? Crs = null, Crs? WorkingCrs = null, double? NoData = null, double? VerticalUnitM = null, double? CellSizeM = null);

/// <summary>The plane a run works in: metres, in the directions of a projected system.</summary>
/// <param name="Crs">The projected system.</param>
public sealed record WorkingPlane(Crs Crs)
{
    /// <summary>A geometry of another system in this plane, m.</summary>
    public Geometry Into(Geometry geometry, Crs from)
    {
        ArgumentNullException.ThrowIfNull(from);
        var here = geometry;
        if (!from.IsSameAs(Crs))
        {
            using var transform = new CrsTransform(from, Crs);
            here = transform.Apply(geometry);
        }

        return Scaled(here, Crs.LinearUnitM);
    }

    /// <summary>A geometry of this plane in the units of its system.</summary>
    public Geometry OutOf(Geometry geometry) => Scaled(geometry, 1 / Crs.LinearUnitM);

    private static Geometry Scaled(Geometry geometry, double factor) =>
        factor == 1 ? geometry : NetTopologySuite.Geometries.Utilities.AffineTransformation.ScaleInstance(factor, factor).Transform(geometry);
}

/// <summary>A terrain model ready to work on.</summary>
/// <param name="Elevation">Elevations in m on a north-up grid in m; NaN is nodata.</param>
/// <param name="Plane">Where the grid lies.</param>
/// <param name="Findings">What was done to it.</param>
public sealed record ElevationModel(Grid<float> Elevation, WorkingPlane Plane, IReadOnlyList<Finding> Findings)
{
    /// <summary>How true to size the plane is over the grid; none where it is within 0.02 %.</summary>
    public PlaneScale Scale { get; init; } = PlaneScale.None;

    /// <summary>Name of the vertical datum as the file says it, or "".</summary>
    public string VerticalDatum { get; init; } = "";
}

/// <summary>Reads terrain models and class rasters onto one grid.</summary>
public static class ElevationReader
{
    private static readonly (string Word, double InM)[] UnitWords =
    [
        ("m", 1), ("metre", 1), ("metres", 1), ("meter", 1), ("meters", 1),
        ("ft", Units.Foot), ("foot", Units.Foot), ("feet", Units.Foot), ("international feet", Units.Foot), ("intl foot", Units.Foot),
        ("us-ft", Units.SurveyFoot), ("ftus", Units.SurveyFoot), ("us survey foot", Units.SurveyFoot), ("us survey feet", Units.SurveyFoot),
        ("foot_us", Units.SurveyFoot), ("u.s. survey feet", Units.SurveyFoot),
    ];

    /// <summary>Reads a terrain model.</summary>
    /// <param name="source">An open raster.</param>
    /// <param name="options">What the project says.</param>
    /// <exception cref="InputException">Everything that is missing or wrong: place, coordinate system, vertical unit.</exception>
    public static ElevationModel Read(RasterSource source, ElevationOptions options)
    {
        ArgumentNullException.ThrowIfNull(source);
        ArgumentNullException.ThrowIfNull(options);
        var findings = new List<Finding>(source.Findings);
        var (crs, verticalM) = Check(source, options, findings);
        using var from = crs.Horizontal();
        var working = PlaneChoice.Of(source, options.WorkingCrs, from, findings);
        var grid = from.IsProjected && from.IsSameAs(working) && source.GeoTransform is [_, > 0, 0, _, 0, not 0] && options.CellSizeM is null
            ? ReadAsItLies(source, options, working, (float)verticalM, findings)
            : ReadWarped(source, options, from, working, (float)verticalM, findings);
        StoredElevations.InMetres(grid.Cells, (float)verticalM);
        var scale = PlaneChoice.Judge(grid.Frame, working, source.Path, options.WorkingCrs is not null, findings);
        return new ElevationModel(grid, new WorkingPlane(working), findings) { Scale = scale, VerticalDatum = crs.VerticalDatum };
    }

    /// <summary>Checks what the file and the project say, without reading a cell.</summary>
    /// <exception cref="InputException">Everything that is missing or wrong.</exception>
    public static (Crs Crs, double VerticalM) Check(RasterSource source, ElevationOptions options, List<Finding> findings)
    {
        ArgumentNullException.ThrowIfNull(source);
        ArgumentNullException.ThrowIfNull(options);
        ArgumentNullException.ThrowIfNull(findings);
        var problems = new List<InputProblem>();
        if (!source.HasGeoTransform)
            problems.Add(new InputProblem(source.Path, "no position (the file has no geotransform)", "a georeferenced terrain model"));
        var crs = source.Crs ?? options.Crs;
        if (crs is null)
            problems.Add(new InputProblem(source.Path, "no coordinate system", "a file that says its own, or [terrain] crs in the project file, for example \"EPSG:26912\""));
        else if (!crs.IsGeographic && !crs.IsProjected)
            problems.Add(new InputProblem(source.Path, $"the coordinate system {crs.Label}", "a geographic or a projected one"));
        problems.AddRange(RasterDoubts.Of(source, crs, findings));
        if (source.Crs is not null && options.Crs is not null && !source.Crs.IsSameAs(options.Crs))
            findings.Add(LayerFindings.CrsStatedDiffers.With($"{source.Path} says {source.Crs.Label}, the project {options.Crs.Label}; the file's was used"));
        if (options.WorkingCrs is { IsProjected: false })
            problems.Add(new InputProblem("[terrain] working_crs", options.WorkingCrs.Label, "a projected coordinate system"));

        var (unit, unknownWord) = FileUnit(source);
        if (options.VerticalUnitM is null && source.Crs?.VerticalUnitM is { } ofCrs && UnitOf(source.UnitName) is { } ofBand && Math.Abs(ofBand - ofCrs) > 0.001)
            problems.Add(new InputProblem(source.Path, $"elevations in '{source.UnitName}' under a coordinate system whose heights have a unit of {ofCrs:0.####} m", "[terrain] vertical_unit in the project file, to say which is right: \"m\", \"ft\" or \"us-ft\""));
        if (unknownWord is not null && options.VerticalUnitM is null)
            problems.Add(new InputProblem(source.Path, $"elevations in '{unknownWord}'", "[terrain] vertical_unit in the project file: \"m\", \"ft\" or \"us-ft\""));
        else if (unit is null && options.VerticalUnitM is null)
            problems.Add(new InputProblem(source.Path, "no vertical unit", "a file that says its own, or [terrain] vertical_unit in the project file: \"m\", \"ft\" or \"us-ft\"; it is never guessed"));
        if (unit is { } u && options.VerticalUnitM is { } stated && Math.Abs(u - stated) > 1e-9)
            findings.Add(LayerFindings.VerticalUnitDiffers.With($"{source.Path} says a unit of {u:0.#######} m, the project one of {stated:0.#######} m; the project's was used", stated, u));
        if (problems.Count > 0) throw new InputException(problems);
        return (crs!, options.VerticalUnitM ?? unit!.Value);
    }

    private static (double? InM, string? UnknownWord) FileUnit(RasterSource source)
    {
        if (source.Crs?.VerticalUnitM is { } compound) return (compound, null);
        var known = UnitOf(source.UnitName);
        return (known, known is null && source.UnitName.Trim().Length > 0 ? source.UnitName : null);
    }

    private static double? UnitOf(string name)
    {
        var word = name.Trim().ToLowerInvariant();
        return UnitWords.Where(u => u.Word == word).Select(u => (double?)u.InM).FirstOrDefault();
    }

    /// <summary>Looks at a raster before it is projected: blended with its neighbours, a value that stands for nodata is no longer known.</summary>
    private static void LookAt(RasterSource source, ElevationOptions options, float verticalM, List<Finding> findings)
    {
        var stored = new StoredElevations(source, verticalM);
        var step = Math.Min(source.Rows, WholeBlocks(source, 1 << 22));
        var rows = new float[checked(step * source.Columns)];
        for (var row = 0; row < source.Rows; row += step)
        {
            var height = Math.Min(step, source.Rows - row);
            var some = rows.AsSpan(0, height * source.Columns);
            source.ReadWindow(0, row, source.Columns, height, some, options.NoData);
            stored.Add(some);
        }

        stored.Conclude(findings);
    }

    private static Grid<float> ReadAsItLies(RasterSource source, ElevationOptions options, Crs crs, float verticalM, List<Finding> findings)
    {
        var g = source.GeoTransform;
        var unit = crs.LinearUnitM;
        var north = g[5] < 0 ? g[3] : g[3] + (g[5] * source.Rows);
        var frame = new GridFrame(source.Columns, source.Rows, g[0] * unit, north * unit, g[1] * unit, Math.Abs(g[5]) * unit);
        var grid = Read(source, options, frame);
        var stored = new StoredElevations(source, verticalM);
        stored.Add(grid.Cells);
        stored.Conclude(findings);
        if (g[5] > 0) FlipRows(grid);
        return grid;
    }

    private static Grid<float> ReadWarped(RasterSource source, ElevationOptions options, Crs crs, Crs working, float verticalM, List<Finding> findings)
    {
        LookAt(source, options, verticalM, findings);
        findings.AddRange(CrsTransform.Doubts(source.Path, crs, working));
        return Warped(source, options, crs, working, findings);
    }

    private static Grid<float> Warped(RasterSource source, ElevationOptions options, Crs crs, Crs working, List<Finding> findings)
    {
        if (options.NoData is { } stated && source.NoData is { } tagged && !stated.Equals(tagged))
        {
            // The warp knows one nodata value; with two the cells are cleaned first, so that neither bleeds into its neighbours.
            using var cleaned = source.Cleaned(stated);
            return Warped(cleaned, options with { NoData = null }, crs, working, findings);
        }

        var arguments = new List<string> { "-s_srs", crs.Wkt, "-t_srs", working.Wkt, "-r", "bilinear", "-ot", "Float32", "-dstnodata", "nan" };
        if (options.NoData is { } n) arguments.AddRange(["-srcnodata", Say(n)]);
        if (options.CellSizeM is { } cell) arguments.AddRange(["-tr", Say(cell / working.LinearUnitM), Say(cell / working.LinearUnitM)]);
        using var warped = source.Warped(arguments);
        var g = warped.GeoTransform;
        var unit = working.LinearUnitM;
        var frame = new GridFrame(warped.Columns, warped.Rows, g[0] * unit, g[3] * unit, g[1] * unit, -g[5] * unit);
        findings.Add(LayerFindings.Projected.With(
            string.Create(CultureInfo.InvariantCulture, $"{source.Path} projected from {crs.Label} to {working.Label}, cells of {frame.CellWidthM:0.###} m, bilinear")));
        return Read(warped, options with { NoData = null }, frame);
    }

    private static Grid<float> Read(RasterSource source, ElevationOptions options, GridFrame frame)
    {
        var grid = NewGrid<float>(frame, source.Path);
        // In bands of rows: GDAL's own buffers stay small and a damaged file is named by its place.
        var step = WholeBlocks(source, 1 << 24);
        for (var row = 0; row < frame.Rows; row += step)
        {
            var height = Math.Min(step, frame.Rows - row);
            source.ReadWindow(0, row, frame.Columns, height, grid.Cells.AsSpan(checked(row * frame.Columns), height * frame.Columns), options.NoData);
        }

        return grid;
    }

    /// <summary>Rows of about so many cells, to the end of a block.</summary>
    private static int WholeBlocks(RasterSource source, int cells) => Math.Max(1, cells / source.Columns / source.BlockRows) * source.BlockRows;

    private static Grid<T> NewGrid<T>(GridFrame frame, string path)
        where T : unmanaged
    {
        try
        {
            if (frame.Count <= Array.MaxLength) return new Grid<T>(frame);
        }
        catch (OutOfMemoryException)
        {
            // Said below.
        }

        throw new InputException(
            path,
            string.Create(CultureInfo.InvariantCulture, $"{frame.Rows} rows of {frame.Columns} cells, more than this machine can hold at once"),
            string.Create(CultureInfo.InvariantCulture, $"a raster cut to the basins of the road, or larger cells by [terrain] cell_size; {Array.MaxLength} cells at most"));
    }

    private static void FlipRows(Grid<float> grid)
    {
        var columns = grid.Frame.Columns;
        var line = new float[columns];
        for (int top = 0, bottom = grid.Frame.Rows - 1; top < bottom; top++, bottom--)
        {
            Span<float> a = grid.Cells.AsSpan(top * columns, columns), b = grid.Cells.AsSpan(bottom * columns, columns);
            a.CopyTo(line);
            b.CopyTo(a);
            line.CopyTo(b);
        }
    }

    private static string Say(double value) => value.ToString("R", CultureInfo.InvariantCulture);
}
