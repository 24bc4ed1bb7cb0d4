using GeoCulvert.Design.Basis;

namespace GeoCulvert.Design.Terrain;

/// <summary>What is done with depressions before water is routed.</summary>
public enum DepressionMethod
{
    /// <summary>All are filled; nothing is cut.</summary>
    Fill,

    /// <summary>Cut wherever a way keeps the limits, else filled.</summary>
    Breach,

    /// <summary>Cut where that keeps the limits and moves less earth than filling would, else filled.</summary>
    Mix,
}

/// <summary>How far a cut may go.</summary>
/// <param name="Method">What to do.</param>
/// <param name="MaxLengthM">Longest cut, m, along the way from the pit to lower ground.</param>
/// <param name="MaxDepthM">Deepest cut, m.</param>
public sealed record BreachSettings(DepressionMethod Method, double MaxLengthM, double MaxDepthM)
{
    /// <summary>For the mix: most that a cut may move as a share of what filling would.</summary>
    public double MaxCutShare { get; init; } = 1;
}

/// <summary>One cut from a pit to lower ground.</summary>
/// <param name="Cells">Its cells, from the pit's level down to the end.</param>
/// <param name="PitLevelM">Level of the pit and of the bed of the cut, m.</param>
/// <param name="EndLevelM">Level at the end, m, after the cut.</param>
/// <param name="LengthM">Length along cell centres, m.</param>
/// <param name="MaxDepthM">Deepest cut, m.</param>
/// <param name="VolumeM3">Earth taken, m3.</param>
/// <param name="PoolM3">What filling the pit would have taken, m3; null where the method does not ask.</param>
public sealed record Breach(
    int[] Cells, double PitLevelM, double EndLevelM, double LengthM, double MaxDepthM, double VolumeM3, double? PoolM3);

/// <summary>A surface with cuts, still to be filled where pits are left.</summary>
/// <param name="Surface">The changed copy, m; the very same grid where nothing was cut.</param>
/// <param name="Breaches">The cuts, lowest pit first.</param>
/// <param name="Pits">Pits there were.</param>
/// <param name="OpenedByOthers">Pits that the cuts of lower ones opened.</param>
/// <param name="Left">Pits that no cut within the limits opens.</param>
/// <param name="Drowned">Cuts that were given back: they lay under the pool of a pit that is left.</param>
/// <param name="CutCells">Cells that were lowered.</param>
/// <param name="VolumeM3">Earth taken, m3.</param>
/// <param name="DeepestM">Deepest cut, m.</param>
/// <param name="Findings">What was changed, and what could not be.</param>
public sealed record BreachedSurface(
    Grid<float> Surface, IReadOnlyList<Breach> Breaches, int Pits, int OpenedByOthers, int Left, int Drowned, long CutCells, double VolumeM3,
    double DeepestM, IReadOnlyList<Finding> Findings);

/// <summary>
/// Opens depressions by least-cost cuts (Lindsay and Dhun 2015): from each pit, the lowest first, the way to lower ground that takes the least
/// earth, cut down to the level of the pit. A cut lowers no cell twice and no later one disturbs it.
/// </summary>
public static class DepressionBreaching
{
    /// <summary>Cuts a copy; the input is not changed.</summary>
    /// <param name="elevation">Elevations, m; NaN is nodata, minus infinity an outlet inside.</param>
    /// <param name="settings">Method and limits.</param>
    /// <param name="cancel">Stops the work.</param>
    public static BreachedSurface Breach(Grid<float> elevation, BreachSettings settings, CancellationToken cancel = default)
    {
        ArgumentNullException.ThrowIfNull(elevation);
        ArgumentNullException.ThrowIfNull(settings);
        if (!(settings.MaxLengthM >= 0) || !(settings.MaxDepthM >= 0) || !(settings.MaxCutShare >= 0))
            throw new ArgumentException("Limits of cuts are numbers from 0 up.", nameof(settings));
        if (settings.Method == DepressionMethod.Fill) return new BreachedSurface(elevation, [], 0, 0, 0, 0, 0, 0, 0, []);

        var pits = PitCells.Find(elevation, cancel);
        var surface = new Grid<float>(elevation.Frame, (float[])elevation.Cells.Clone());
        var search = new BreachSearch(surface, settings.MaxLengthM, settings.MaxDepthM);
        var made = new List<(Pit Pit, int[] Way, List<int> Cut, double? PoolM3)>();
        int opened = 0, left = 0;
        foreach (var pit in pits)
        {
            cancel.ThrowIfCancellationRequested();
            var way = PitCells.StillHolds(surface, pit) ? search.CheapestWay(pit, cancel) : [];
            var cut = way?.Where(cell => surface.Cells[cell] > pit.LevelM).ToList();
            double? pool = way is { Length: > 0 } && cut is { Count: > 0 } && settings.Method == DepressionMethod.Mix ? search.PoolM3(pit, cancel) : null;
            if (way is null || cut is null || (pool is { } p && VolumeM3(surface, cut, pit.LevelM) > p * settings.MaxCutShare))
            {
                left++;
                continue;
            }

            if (cut.Count == 0)
            {
                opened++;
                continue;
            }

            search.Cut(cut, pit.LevelM);
            made.Add((pit, way, cut, pool));
        }

        if (made.Count == 0) return new BreachedSurface(elevation, [], pits.Count, opened, left, 0, 0, 0, 0, Findings([], left));
        if (left > 0) GiveBack(elevation, surface, made.SelectMany(m => m.Cut), cancel);
        var breaches = made.Select(m => Measure(elevation, surface, m.Pit, m.Way, m.Cut, m.PoolM3)).Where(b => b.VolumeM3 > 0).ToList();
        var cutCells = made.Sum(m => m.Cut.LongCount(cell => surface.Cells[cell] < elevation.Cells[cell]));
        return new BreachedSurface(
            surface, breaches, pits.Count, opened, left, made.Count - breaches.Count, cutCells, breaches.Sum(b => b.VolumeM3),
            breaches.Count == 0 ? 0 : breaches.Max(b => b.MaxDepthM), Findings(breaches, left));
    }

    private static double VolumeM3(Grid<float> surface, List<int> cut, float levelM) =>
        cut.Sum(cell => (double)surface.Cells[cell] - levelM) * surface.Frame.CellAreaM2;

    /// <summary>
    /// Earth that the final pools cover anyway is put back: with w the filled level, a cell at min(what it was, w) lies between the cut surface and its
    /// filling, so filling gives the same.
    /// </summary>
    private static void GiveBack(Grid<float> elevation, Grid<float> surface, IEnumerable<int> cut, CancellationToken cancel)
    {
        var filled = DepressionFilling.Fill(surface, cancel).Surface.Cells;
        foreach (var cell in cut) surface.Cells[cell] = Math.Min(elevation.Cells[cell], filled[cell]);
    }

    private static Breach Measure(Grid<float> elevation, Grid<float> surface, Pit pit, int[] way, List<int> cut, double? pool)
    {
        double deepest = 0, depths = 0;
        foreach (var cell in cut)
        {
            var depth = (double)elevation.Cells[cell] - surface.Cells[cell];
            depths += depth;
            deepest = Math.Max(deepest, depth);
        }

        return new Breach(way, pit.LevelM, surface.Cells[way[^1]], CellWay.LengthM(surface.Frame, way), deepest, depths * surface.Frame.CellAreaM2, pool);
    }

    private static List<Finding> Findings(List<Breach> breaches, int left)
    {
        var findings = new List<Finding>();
        if (breaches.Count > 0)
        {
            findings.Add(ConditioningFindings.DepressionsBreached.With(
                $"{breaches.Count} cuts, {breaches.Sum(b => b.VolumeM3):0} m3 in all, up to {breaches.Max(b => b.MaxDepthM):0.00} m deep and {breaches.Max(b => b.LengthM):0} m long"));
        }

        if (left > 0) findings.Add(ConditioningFindings.BreachingLeft.With($"{left} pits", left));
        return findings;
    }
}
