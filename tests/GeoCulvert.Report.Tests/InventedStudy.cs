using GeoCulvert.Design.Basis;
using GeoCulvert.Design.Study;
using GeoCulvert.Design.Terrain;
using NetTopologySuite.Geometries;

namespace GeoCulvert.Report.Tests;

/// <summary>
/// An invented place with invented names and figures, built in memory, for looking at the page and testing how it prints; no figure
/// here is a result of the program or of nature.
/// </summary>
internal static class InventedStudy
{
    private const double West = 512_000;
    private const double North = 4_803_000;
    private const double Cell = 10;
    private const int Columns = 620;
    private const int Rows = 470;

    private static readonly Lazy<Grid<float>> Land = new(Relief);

    private static readonly FindingCode Edge = new("edge-contact", Severity.Warning, "The watershed touches the edge.", "Get terrain beyond the edge, or give the area.");
    private static readonly FindingCode NoFit = new("no-size-fits", Severity.Error, "No size fits.", "Raise the road, allow more headwater or give another shape.");
    private static readonly FindingCode Assumed = new("tailwater-assumed", Severity.Note, "The tailwater is assumed.", "Survey the channel below the outlet.");
    private static readonly FindingCode Datum = new("datum-unstated", Severity.Warning, "A vertical datum is not stated.", "Say the vertical datum of the terrain and of the road profile.");

    private static readonly (string Id, double X, string Status, string Culvert, double SpanM, int Barrels, double AreaM2, double FlowM3PerS, FindingCode[] Findings)[] Invented =
    [
        ("K-01", 560, "sized", "1 x 0.60 m circle, concrete", 0.6, 1, 92_300, 0.4126, []),
        ("K-02", 1310, "sized", "1 x 1.20 m circle, concrete", 1.2, 1, 431_800, 2.2871, [Assumed]),
        ("K-03", 2240, "sized", "2 x 1.50 m circle, concrete", 1.5, 2, 1_512_400, 7.9342, [Edge, Assumed]),
        ("K-04", 3050, "no size fits", "", double.NaN, 0, 5_204_800, 31.2468, [NoFit, Edge]),
        ("K-05", 3880, "sized", "1 x 0.90 m circle, concrete", 0.9, 1, 238_100, 1.1094, []),
        ("K-06", 4660, "rated", "1 x 1.80 m x 1.20 m box, concrete", 1.8, 1, 804_500, 4.3217, [Assumed]),
        ("K-07", 5510, "sized", "1 x 0.75 m circle, concrete", 0.75, 1, 151_000, 0.7315, []),
    ];

    /// <summary>The study; a name replaces the study's and the first crossing's texts, to try hostile ones.</summary>
    public static StudyReport Make(UnitSystem units = UnitSystem.Si, string? name = null, int copies = 1)
    {
        var items = Enumerable.Range(0, copies).SelectMany(copy => Invented.Select((c, i) => Item(c, i, copy, copies, i == 0 && copy == 0 ? name : null))).ToList();
        return new StudyReport
        {
            StudyName = name ?? "Larkmoor bypass (invented)",
            Units = units,
            CrsName = "EPSG:26912 (invented place)",
            Version = "0.1.0",
            RunDate = "2026-01-31",
            Relief = Land.Value,
            Layers = [.. Layers(items, units, name)],
            Sheets = [.. items.Select(Sheet)],
            Findings = [.. items.SelectMany(i => i.Findings), Datum.With("The terrain states no vertical datum; the road profile is taken to share it.")],
            Inputs = [new(name ?? "larkmoor.tif", "terrain", 2_104_332, new string('a', 64), "EPSG:26912"), new("bypass.geojson", "road", 4_096, new string('b', 64), "EPSG:4326")],
            Settings = [("terrain.stream_area", name ?? "10 ha"), ("flow.design_return_period", "25")],
        };
    }

    private static double Ground(double x, double y)
    {
        var valley = 0.0;
        foreach (var c in Invented) valley += 22 * Math.Exp(-Math.Pow((x - c.X - (120 * Math.Sin(y / 600))) / 190, 2)) * Math.Clamp(y / 1500, 0.3, 1.2);
        return 1410 + (y * 0.085) + (14 * Math.Sin((x / 310) + (y / 700))) + (6 * Math.Sin((x / 90) - (y / 130))) + (3 * Math.Sin(x / 37) * Math.Cos(y / 41)) - valley;
    }

    private static Grid<float> Relief()
    {
        var grid = new Grid<float>(new GridFrame(Columns, Rows, West, North, Cell, Cell));
        for (var r = 0; r < Rows; r++)
        {
            for (var c = 0; c < Columns; c++)
                grid[r, c] = c < 40 && r < 60 - c ? float.NaN : (float)Ground((c + 0.5) * Cell, (Rows - r - 0.5) * Cell);
        }
        return grid;
    }

    private static double RoadY(double x) => 900 + (160 * Math.Sin(x / 900));

    private static Coordinate Place(double x, double y) => new(West + x, North - (Rows * Cell) + y);

    private static Coordinate StreamAt(double x, double y) => Place(x + (120 * Math.Sin(y / 600)) - (120 * Math.Sin(RoadY(x) / 600)), y);

    private static InventedCrossing Item(
        (string Id, double X, string Status, string Culvert, double SpanM, int Barrels, double AreaM2, double FlowM3PerS, FindingCode[] Findings) c, int i, int copy, int copies, string? name)
    {
        var x = c.X + (copies > 1 ? (copy * 620.0 / copies) - 310 : 0);
        var (y, top) = (RoadY(x), RoadY(x) + (2.4 * Math.Sqrt(c.AreaM2)));
        var outline = new List<Coordinate>();
        for (var k = 0; k <= 240; k++)
        {
            var t = k / 240.0 * 2 * Math.PI;
            var (up, across) = ((1 - Math.Cos(t)) / 2, Math.Sin(t));
            var at = StreamAt(x, y + ((top - y) * up));
            outline.Add(new Coordinate(at.X + (across * (0.36 * Math.Sqrt(c.AreaM2)) * (1 + (0.12 * Math.Sin((9 * t) + i)))), at.Y));
        }
        outline[^1] = outline[0];
        var line = Enumerable.Range(0, 80).Select(k => StreamAt(x, top - 30 - ((top - 30 - y) * k / 79))).ToArray();
        var id = name ?? (copy == 0 ? c.Id : $"{c.Id}-{copy}");
        return new InventedCrossing(
            id, name ?? "Larkmoor bypass", x, Place(x, y), c.Status, c.Culvert, c.SpanM, c.Barrels, c.AreaM2, c.FlowM3PerS,
            GeometryFactory.Default.CreatePolygon([.. outline]), GeometryFactory.Default.CreateLineString(line),
            [.. c.Findings.Select(f => f.With(f == Edge ? "0.12 of the outline touches the edge of the terrain; the area is too small by an unknown share." : f == NoFit ? "Of 84 options none keeps the headwater below the limit at 31.2 m3/s." : name ?? "Normal depth in a channel cut from the terrain: 0.41 m.").At(id))]);
    }

    private static IEnumerable<ResultLayer> Layers(List<InventedCrossing> items, UnitSystem units, string? name)
    {
        LayerColumn<InventedCrossing> Id() => new("crossing_id", QuantityKind.None, FieldType.Text, "Crossing", "Id of the crossing.", i => i.Id);
        LayerColumn<InventedCrossing> Column(string field, QuantityKind kind, Func<InventedCrossing, object?> value) =>
            new(field, kind, kind == QuantityKind.None ? FieldType.Text : FieldType.Real, field, field + ".", value);
        yield return new LayerDefinition<InventedCrossing>("crossings", "Crossings", "A crossing.", LayerGeometry.Point, i => new Point(i.At),
        [
            Id(), Column("road", QuantityKind.None, i => i.Road), Column("station", QuantityKind.Length, i => i.X), Column("status", QuantityKind.None, i => i.Status),
            Column("watershed_area", QuantityKind.Area, i => i.AreaM2), Column("design_return_period", QuantityKind.Years, _ => 25.0), Column("design_flow", QuantityKind.Flow, i => i.FlowM3PerS),
            Column("check_flow", QuantityKind.Flow, i => 1.42 * i.FlowM3PerS), Column("culvert", QuantityKind.None, i => i.Culvert),
            Column("shape", QuantityKind.None, i => i.Barrels == 0 ? null : i.Culvert.Contains("box", StringComparison.Ordinal) ? "box" : "circle"),
            Column("span", QuantityKind.Length, i => i.SpanM), Column("rise", QuantityKind.Length, i => i.RiseM), Column("barrels", QuantityKind.None, i => i.Barrels == 0 ? null : (long)i.Barrels),
            Column("length", QuantityKind.Length, i => i.LengthM), Column("inlet_elevation", QuantityKind.Length, i => i.InletM), Column("outlet_elevation", QuantityKind.Length, i => i.OutletM),
            Column("control", QuantityKind.None, i => i.Barrels == 0 ? "" : i.X < 3000 ? "inlet" : "outlet"), Column("headwater_elevation", QuantityKind.Length, i => i.HeadwaterM),
            Column("headwater_limit_elevation", QuantityKind.Length, i => i.LimitM), Column("hw_over_d", QuantityKind.None, i => (i.HeadwaterM - i.InletM) / i.RiseM),
            Column("outlet_velocity", QuantityKind.Velocity, i => i.Barrels == 0 ? double.NaN : 2.0 + (i.X / 4321)),
        ]).Build(items, units);
        yield return new LayerDefinition<InventedCrossing>("local_watersheds", "Local watersheds", "Land between crossings.", LayerGeometry.Polygon, i => i.Watershed, [Id()]).Build(items, units);
        yield return new LayerDefinition<InventedCrossing>("watersheds", "Watersheds", "Land above a crossing.", LayerGeometry.Polygon, i => i.Watershed, [Id()]).Build(items, units);
        yield return new LayerDefinition<InventedCrossing>("flow_paths", "Flow paths", "Longest flow path.", LayerGeometry.Line, i => i.FlowPath, [Id()]).Build(items, units);
        yield return new LayerDefinition<InventedCrossing>("culverts", "Culverts", "Barrels.", LayerGeometry.Line, i => i.Barrels == 0 ? null : new LineString([new(i.At.X, i.At.Y + 12), new(i.At.X, i.At.Y - 12)]), [Id()]).Build(items, units);
        yield return new LayerDefinition<InventedCrossing>("streams", "Streams", "A stream.", LayerGeometry.Line, i => Stream(i), [Column("drainage_area", QuantityKind.Area, i => i.AreaM2)]).Build(items, units);
        var road = new LineString([.. Enumerable.Range(0, 300).Select(k => Place(150 + (k * 19.5), RoadY(150 + (k * 19.5))))]);
        yield return new LayerDefinition<LineString>("roads", "Roads", "A road.", LayerGeometry.Line, r => r, [new("road", QuantityKind.None, FieldType.Text, "Road", "Name.", _ => name ?? "Larkmoor bypass")]).Build([road], units);
    }

    private static LineString Stream(InventedCrossing i) =>
        new([.. i.FlowPath.Coordinates.Skip(16), .. Enumerable.Range(1, 20).Select(k => StreamAt(i.X, RoadY(i.X) * (1 - (k / 20.0))))]);

    private static CrossingSheet Sheet(InventedCrossing i) => InventedSheet.Make(i, [.. i.FlowPath.Coordinates.Select((c, k) => (k * i.FlowPath.Length / 79, Ground(c.X - West, c.Y - North + (Rows * Cell))))]);
}

/// <summary>An invented crossing.</summary>
internal sealed record InventedCrossing(
    string Id, string Road, double X, Coordinate At, string Status, string Culvert, double SpanM, int Barrels, double AreaM2, double FlowM3PerS,
    Polygon Watershed, LineString FlowPath, IReadOnlyList<Finding> Findings)
{
    public double RiseM => Culvert.Contains("box", StringComparison.Ordinal) ? 1.2 : SpanM;

    public double LengthM => Barrels == 0 ? double.NaN : 24.5;

    public double InletM => Barrels == 0 ? double.NaN : 1432.117 + (X / 777);

    public double OutletM => InletM - 0.437;

    public double HeadwaterM => InletM + (1.18 * RiseM);

    public double LimitM => Barrels == 0 ? 1440.5 : InletM + (1.5 * RiseM);
}
