using GeoCulvert.Design.Basis;
using GeoCulvert.Design.Crossings;
using GeoCulvert.Design.Terrain;
using NetTopologySuite.Geometries;

namespace GeoCulvert.Design.Watersheds;

/// <summary>Settings of the survey of watersheds.</summary>
public sealed record WatershedSettings
{
    /// <summary>Share of the perimeter without terrain beyond it above which the area is called a lower bound. Default 0: any contact.</summary>
    public double EdgeContactLimitShare { get; init; }

    /// <summary>Whether outlines are smoothed for drawing; every figure stays that of the cells. Default: no.</summary>
    public bool SmoothOutlines { get; init; }

    /// <summary>Fewer cells than this are called few. Default 50 (own rule).</summary>
    public int FewCells { get; init; } = 50;

    /// <summary>Share of cells in filled depressions above which storage is mentioned. Default 0.01 (own rule).</summary>
    public double StorageLimitShare { get; init; } = 0.01;
}

/// <summary>The watersheds of crossings with the labels behind them, for further sums with <see cref="ZonalSums"/> by <see cref="Watershed.Outlet"/>.</summary>
/// <param name="Labels">0 for none, k + 1 for outlet k.</param>
/// <param name="Tree">The outlets' tree.</param>
/// <param name="Watersheds">One for each crossing, in their order.</param>
public sealed record CrossingWatersheds(Grid<int> Labels, OutletTree Tree, IReadOnlyList<Watershed> Watersheds);

/// <summary>
/// Surveys all watersheds of a run together: each cell is read once for its local watershed, and totals are added up along the tree of outlets.
/// </summary>
public static class WatershedSurvey
{
    /// <summary>
    /// Surveys the watersheds of crossings, in their order; findings carry the crossing's id. Crossings on one cell have one watershed between them.
    /// </summary>
    /// <param name="terrain">The terrain, drained.</param>
    /// <param name="crossings">Crossings on it.</param>
    /// <param name="settings">Settings; null for the defaults.</param>
    /// <param name="scale">Scale of the plane, for true areas and lengths; null for those of the plane.</param>
    public static CrossingWatersheds Survey(DrainedTerrain terrain, IReadOnlyList<Crossing> crossings, WatershedSettings? settings = null, PlaneScale? scale = null)
    {
        ArgumentNullException.ThrowIfNull(terrain);
        ArgumentNullException.ThrowIfNull(crossings);
        var cells = crossings.Select(c => c.OutletCell).Concat(crossings.SelectMany(c => c.OtherArms)).Distinct().ToArray();
        var outletOf = cells.Select((cell, k) => (cell, k)).ToDictionary(p => p.cell, p => p.k);
        var first = Enumerable.Range(0, cells.Length).ToArray();
        var main = crossings.Select(c => c.OutletCell).ToHashSet();
        foreach (var c in crossings)
            foreach (var arm in c.OtherArms.Where(a => first[outletOf[a]] == outletOf[a] && !main.Contains(a))) first[outletOf[arm]] = outletOf[c.OutletCell];
        var labelling = WatershedLabels.Label(terrain.Direction, cells);
        var parent = JoinedOutlets.Join(labelling.Labels, labelling.Parent, first);
        var paths = LongestFlowPath.Trace(terrain.Direction, cells);
        var localPaths = LongestFlowPath.Trace(Cut(terrain.Direction, cells), cells);
        float[] filled = terrain.Filled.Surface.Cells, ground = terrain.Elevation.Cells;
        int[] Longest(IReadOnlyList<int[]> of, int k) => crossings.Count == cells.Length || first[k] != k
            ? of[k]
            : Enumerable.Range(0, cells.Length).Where(a => first[a] == k).Select(a => of[a]).MaxBy(p => FlowPath.Of(p, terrain.Elevation, scale).LengthM)!;
        var byOutlet = Survey(labelling.Labels, parent, terrain.Elevation, k => Longest(paths, k), k => Longest(localPaths, k), cell => filled[cell] > ground[cell], settings, scale);
        return new(
            labelling.Labels,
            new OutletTree(parent),
            [.. crossings.Select(c => At(byOutlet[outletOf[c.OutletCell]], c.Id))]);
    }

    /// <summary>Surveys local and total watersheds of all outlets.</summary>
    /// <param name="labels">0 for none, k + 1 for outlet k.</param>
    /// <param name="parent">The next outlet downstream of each; negative for none.</param>
    /// <param name="elevation">The untouched terrain; NaN where there is none.</param>
    /// <param name="totalPath">Cells of the longest flow path of an outlet's total watershed, divide first; null or empty for none.</param>
    /// <param name="localPath">The same within the local watershed; null to leave it out.</param>
    /// <param name="isFilled">Whether conditioning raised a cell (row-major index); null when not known.</param>
    /// <param name="settings">Settings; null for the defaults.</param>
    /// <param name="scale">Scale of the plane, for true areas and lengths; null for those of the plane.</param>
    public static IReadOnlyList<Watershed> Survey(
        Grid<int> labels,
        IReadOnlyList<int> parent,
        Grid<float> elevation,
        Func<int, IReadOnlyList<int>?>? totalPath = null,
        Func<int, IReadOnlyList<int>?>? localPath = null,
        Func<int, bool>? isFilled = null,
        WatershedSettings? settings = null,
        PlaneScale? scale = null)
    {
        ArgumentNullException.ThrowIfNull(labels);
        ArgumentNullException.ThrowIfNull(elevation);
        settings ??= new();
        scale ??= PlaneScale.None;
        var tree = new OutletTree(parent);
        var frame = labels.Frame;
        var outlines = WatershedPolygons.Trace(labels, tree, cell => !float.IsNaN(elevation.Cells[cell]), settings.SmoothOutlines);
        var heights = ZonalSums.Of(labels, tree, elevation);
        var slopes = ZonalSums.Of(labels, tree, cell => GroundSlope.At(elevation, cell));
        var columns = ZonalSums.Of(labels, tree, cell => cell % frame.Columns);
        var rows = ZonalSums.Of(labels, tree, cell => cell / frame.Columns);
        var filled = isFilled is null ? null : ZonalSums.Of(labels, tree, cell => isFilled(cell) ? 1 : 0);
        var corners = ZonalSums.Of(labels, tree, cell => HasCornerWithoutTerrain(elevation, cell) ? 1 : 0);
        var totalPaths = Paths(tree, totalPath, elevation, scale);
        var areas = scale.IsNone ? null : ZonalSums.Of(labels, tree, cell => scale.AreaRatioAt(frame.CentreX(cell % frame.Columns), frame.CentreY(cell / frame.Columns)));
        var watersheds = new Watershed[tree.Count];
        for (var k = 0; k < tree.Count; k++)
        {
            var local = Characteristics(b => b.Local[k], outlines.Local[k], localPath?.Invoke(k) is { Count: > 0 } path ? FlowPath.Of(path, elevation, scale) : null);
            var total = Characteristics(b => b.Total[k], outlines.Total[k], totalPaths[k]);
            watersheds[k] = new(k, tree.Parent(k), local, total, Doubts(total, settings));
        }

        return watersheds;

        WatershedCharacteristics Characteristics(Func<ByOutlet<ZoneSum>, ZoneSum> of, WatershedOutline outline, FlowPath? path)
        {
            var height = of(heights);
            var some = height.ValueCells > 0;
            // Cells of equal size where the plane is taken as true; otherwise each by its own share.
            var cells = areas is null ? height.Cells : of(areas).Sum;
            return new(cells * frame.CellAreaM2, height.Cells, TrueLengths.Of(outline, scale))
            {
                Centroid = height.Cells > 0
                    ? new Coordinate(frame.West + ((of(columns).Sum / height.Cells + 0.5) * frame.CellWidthM), frame.North - ((of(rows).Sum / height.Cells + 0.5) * frame.CellHeightM))
                    : null,
                LongestFlowPath = path,
                MeanElevationM = height.MeanOrNull,
                LeastElevationM = some ? height.Least : null,
                LargestElevationM = some ? height.Most : null,
                MeanBasinSlopeMPerM = of(slopes).MeanOrNull / Math.Sqrt(height.Cells > 0 ? cells / height.Cells : 1),
                FilledShare = filled is null ? null : of(filled).MeanOrNull,
                CornerContactCount = (long)of(corners).Sum,
            };
        }
    }

    /// <summary>Paths of the total watersheds, outlets downstream first: a path that begins where the next one downstream begins is its upper part.</summary>
    private static FlowPath?[] Paths(OutletTree tree, Func<int, IReadOnlyList<int>?>? cells, Grid<float> elevation, PlaneScale scale)
    {
        var paths = new FlowPath?[tree.Count];
        foreach (var k in tree.UpstreamFirst.Reverse())
        {
            if (cells?.Invoke(k) is not { Count: > 0 } own) continue;
            var below = tree.Parent(k) < 0 ? null : paths[tree.Parent(k)];
            var isPart = below is not null && below.Profile.Count >= own.Count && below.Profile[0].Cell == own[0] && below.Profile[own.Count - 1].Cell == own[^1];
            paths[k] = isPart ? below!.Upper(own.Count) : FlowPath.Of(own, elevation, scale);
        }

        return paths;
    }

    private static bool HasCornerWithoutTerrain(Grid<float> elevation, int cell)
    {
        var frame = elevation.Frame;
        int row = cell / frame.Columns, column = cell % frame.Columns;
        return Lacks(row - 1, column - 1) || Lacks(row - 1, column + 1) || Lacks(row + 1, column - 1) || Lacks(row + 1, column + 1);

        bool Lacks(int r, int c) => frame.Contains(r, c) && float.IsNaN(elevation[r, c]);
    }

    /// <summary>Directions that end at every outlet: what is upstream of an outlet is then its local watershed.</summary>
    private static Grid<byte> Cut(Grid<byte> direction, int[] outletCells)
    {
        var cut = new Grid<byte>(direction.Frame, (byte[])direction.Cells.Clone());
        foreach (var cell in outletCells) cut.Cells[cell] = 0;
        return cut;
    }

    private static Watershed At(Watershed watershed, string id) => watershed with { Findings = [.. watershed.Findings.Select(f => f.At(id))] };

    private static List<Finding> Doubts(WatershedCharacteristics total, WatershedSettings settings)
    {
        var doubts = new List<Finding>();
        if (total.Outline.EdgeContactM > 0 && total.EdgeContactShare > settings.EdgeContactLimitShare)
            doubts.Add(WatershedFindings.EdgeContact.With(
                $"{total.EdgeContactShare * 100:0.#} % of the boundary ({total.Outline.EdgeContactM:0} m) has no terrain beyond it", total.EdgeContactShare, settings.EdgeContactLimitShare));
        else if (total.Outline.EdgeContactM == 0 && total.CornerContactCount > 0)
            doubts.Add(WatershedFindings.CornerContact.With($"{total.CornerContactCount} cells", total.CornerContactCount, 0));
        if (total.Cells < settings.FewCells) doubts.Add(WatershedFindings.Tiny.With($"{total.Cells} cells", total.Cells, settings.FewCells));
        if (total.FilledShare > settings.StorageLimitShare)
            doubts.Add(WatershedFindings.Storage.With($"{total.FilledShare.Value * 100:0.#} % of the cells lie in filled depressions", total.FilledShare, settings.StorageLimitShare));
        if (total.LongestFlowPath is { Slope1085MPerM: <= 0 and var slope })
            doubts.Add(WatershedFindings.FlowPathAdverse.With($"slope {slope:0.00000} m/m", slope, 0));
        return doubts;
    }
}
