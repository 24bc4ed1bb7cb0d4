using GeoCulvert.Design.Basis;
using GeoCulvert.Design.Crossings;
using GeoCulvert.Design.Terrain;
using GeoCulvert.Design.Watersheds;
using NetTopologySuite.Geometries;

namespace GeoCulvert.Design.Study;

/// <summary>An opening as results carry it.</summary>
/// <param name="Opening">The opening.</param>
/// <param name="CrossingId">The crossing whose water passes it; null when none does.</param>
public sealed record OpeningResult(EmbankmentOpening Opening, string? CrossingId);

/// <summary>The land that reaches the downstream end of an opening in the untouched terrain model.</summary>
/// <param name="CrossingId">The crossing; null when none belongs to the opening.</param>
/// <param name="Outline">Outline.</param>
/// <param name="AreaM2">Area in the untouched terrain, m2.</param>
/// <param name="OpenedAreaM2">Area with all openings, m2.</param>
public sealed record UntouchedWatershed(string? CrossingId, Geometry Outline, double AreaM2, double OpenedAreaM2);

/// <summary>Terrain with its embankments opened, then crossings on it.</summary>
public static class CrossingStage
{
    /// <summary>Share by which the area with and without openings must differ for both outlines to be kept (own rule).</summary>
    public const double AreaDiffersShare = 0.01;

    /// <summary>Opens the embankments that dam a terrain.</summary>
    /// <param name="inputs">Roads, known culverts and given crossings.</param>
    /// <param name="settings">Settings.</param>
    /// <param name="elevation">The terrain; the same again afterwards.</param>
    /// <param name="solve">Drains a terrain, with the paths that water is made to take.</param>
    /// <param name="cancel">Stops the work.</param>
    public static OpenedTerrain Open(
        StudyInputs inputs, StudySettings settings, Grid<float> elevation, Func<Grid<float>, IReadOnlyList<int[]>, DrainedTerrain> solve, CancellationToken cancel)
    {
        ArgumentNullException.ThrowIfNull(inputs);
        ArgumentNullException.ThrowIfNull(settings);
        ArgumentNullException.ThrowIfNull(elevation);
        var shown = inputs.Roads.Select(r => r.Alignment).Where(r => ShowsBanks(r, elevation.Frame)).ToArray();
        return EmbankmentOpenings.Solve(elevation, shown, inputs.KnownCulverts, inputs.Points ?? [], Openings(settings), solve, cancel);
    }

    /// <summary>Finds crossings along the roads, or moves given ones to their streams.</summary>
    public static CrossingList Find(StudyInputs inputs, StudySettings settings, OpenedTerrain opened, long streamCells)
    {
        ArgumentNullException.ThrowIfNull(inputs);
        ArgumentNullException.ThrowIfNull(settings);
        ArgumentNullException.ThrowIfNull(opened);
        var roads = inputs.Roads.Select(r => r.Alignment).ToArray();
        var frame = inputs.Elevation.Frame;
        var (direction, accumulation) = (opened.Terrain.Direction, opened.Terrain.Accumulation);
        var search = new CrossingSearch
        {
            Stationing = settings.Units,
            TogetherM = settings.RoadsTogetherM,
            Openings = opened.Openings,
            CrossDrainCells = Math.Max(1, (long)Math.Ceiling(settings.CrossDrainAreaM2 / frame.CellAreaM2)),
            LowPoints = road => LowPoints(road, inputs.Elevation),
        };
        CrossingList found;
        if (inputs.Points is null)
        {
            found = CrossingFinder.Find(roads, direction, accumulation, streamCells, search);
        }
        else
        {
            var snapM = settings.SnapM ?? Math.Max(60, 5 * Math.Max(frame.CellWidthM, frame.CellHeightM));
            var snapped = PointSnapping.Snap(inputs.Points, direction, accumulation, new SnapSettings { SnapM = snapM, StreamThresholdCells = streamCells });
            found = GivenCrossings.Place(snapped, roads, direction, accumulation, snapM, search);
        }

        var openings = Openings(settings);
        var crossings = found.Crossings.Select(c => c.Opening is null
            ? c
            : c with { Findings = [.. c.Findings, .. EmbankmentOpenings.FindingsOf(c.Opening, openings).Select(f => f.At(c.Id))] });
        return found with { Crossings = [.. crossings], Findings = [.. found.Findings, .. opened.Findings] };
    }

    /// <summary>Every opening with the crossing whose water passes it.</summary>
    public static IReadOnlyList<OpeningResult> Results(OpenedTerrain opened, IReadOnlyList<Crossing> crossings)
    {
        ArgumentNullException.ThrowIfNull(opened);
        return [.. opened.Openings.Select(o => new OpeningResult(o, crossings.FirstOrDefault(c => ReferenceEquals(c.Opening, o))?.Id))];
    }

    /// <summary>Outlines in the untouched terrain, where the openings change the area.</summary>
    public static IReadOnlyList<UntouchedWatershed> Untouched(OpenedTerrain opened, IReadOnlyList<OpeningResult> openings)
    {
        ArgumentNullException.ThrowIfNull(opened);
        ArgumentNullException.ThrowIfNull(openings);
        var changed = openings.Where(o => Math.Abs(o.Opening.AreaAfterM2 - o.Opening.AreaBeforeM2) > AreaDiffersShare * o.Opening.AreaAfterM2).ToArray();
        if (opened.Untouched is null || changed.Length == 0) return [];
        var cells = changed.Select(o => o.Opening.Cells[^1]).Distinct().ToArray();
        var labelling = WatershedLabels.Label(opened.Untouched, cells);
        var elevation = opened.Terrain.Elevation.Cells;
        var outlines = WatershedPolygons.Trace(labelling.Labels, new OutletTree(labelling.Parent), cell => !float.IsNaN(elevation[cell]));
        return [.. changed.Select(o => new UntouchedWatershed(
            o.CrossingId, outlines.Total[Array.IndexOf(cells, o.Opening.Cells[^1])].Polygon, o.Opening.AreaBeforeM2, o.Opening.AreaAfterM2))];
    }

    private static OpeningSettings Openings(StudySettings settings) => settings.Openings with
    {
        PondAreaM2 = settings.CrossDrainAreaM2,
        StreamAreaM2 = settings.StreamAreaM2,
        TogetherM = settings.RoadsTogetherM,
    };

    /// <summary>Whether the terrain's cells are small enough to show the road's bank: no wider than a bank 1 m high (own rule).</summary>
    private static bool ShowsBanks(RoadAlignment road, GridFrame frame) => Math.Max(frame.CellWidthM, frame.CellHeightM) <= road.WidthM + (2 * road.SideSlope);

    private static IReadOnlyList<double> LowPoints(RoadAlignment road, Grid<float> elevation)
    {
        if (road.Profile is null && !road.HasElevation && !ShowsBanks(road, elevation.Frame)) return [];
        var stepM = Math.Max(Math.Max(elevation.Frame.CellWidthM, elevation.Frame.CellHeightM), 2);
        return RoadLowPoints.Of(RoadProfile.Sample(road, road.StartStationM, road.EndStationM, stepM, elevation).Points);
    }
}
