namespace GeoCulvert.Design.Terrain;

/// <summary>A surface without depressions and what was raised to get it.</summary>
/// <param name="Surface">Filled elevations, m; NaN where there is no data.</param>
/// <param name="RaisedCells">Cells that were raised.</param>
/// <param name="VolumeM3">Volume that was filled, m3.</param>
/// <param name="DeepestM">Largest raise, m.</param>
public sealed record FilledSurface(Grid<float> Surface, long RaisedCells, double VolumeM3, double DeepestM);

/// <summary>
/// Fills depressions: each cell gets the least level at which water leaves it for the rim, where cells on the edge of the grid or next to
/// nodata are outlets at their own elevation. Elevations are float32 and never rounded: a filled cell has exactly its spill level.
/// </summary>
/// <remarks>
/// Every cell runs down to the rim or to a pit. All cells of one pit's basin spill over the same pass, so the level is
/// max(elevation, spill level of the pit), and only the graph of basins needs a priority queue. Where pits are so many that the graph would
/// outgrow the terrain (noise), the plain priority flood of <see cref="PriorityFlood"/> takes over; both give the same bits.
/// </remarks>
public static class DepressionFilling
{
    /// <summary>Cells in pools for each 100 cells above which the plain flood is used.</summary>
    private const int MostInsidePct = 30;

    /// <summary>Fills a grid; the input is not changed.</summary>
    public static FilledSurface Fill(Grid<float> elevation, CancellationToken cancel = default)
    {
        ArgumentNullException.ThrowIfNull(elevation);
        return Fill(elevation, new int[elevation.Cells.Length], cancel);
    }

    /// <param name="elevation">Elevations, m; NaN is nodata.</param>
    /// <param name="scratch">A zero for every cell; zeros again afterwards.</param>
    /// <param name="cancel">Stops the work.</param>
    internal static FilledSurface Fill(Grid<float> elevation, int[] scratch, CancellationToken cancel)
    {
        var code = new byte[elevation.Cells.Length];
        SteepestDescent.Compute(elevation, code, 0, elevation.Frame.Rows);
        var pools = new PitPools(elevation, code, scratch, 0, elevation.Frame.Rows);
        if (!pools.Grow(elevation.Cells.LongLength / 100 * MostInsidePct + 64, cancel))
        {
            Array.Clear(scratch);
            return Measure(elevation, PriorityFlood.Fill(elevation, cancel));
        }

        var surface = new Grid<float>(elevation.Frame, GC.AllocateUninitializedArray<float>(elevation.Cells.Length));
        var level = pools.Levels();
        for (var i = 0; i < scratch.Length; i++) scratch[i] = (scratch[i] & 3) == PitPools.Inside ? scratch[i] >> 2 : 0;
        Raise(elevation.Cells, scratch, level, surface.Cells);
        Array.Clear(scratch);
        return Measure(elevation, surface);
    }

    private static void Raise(ReadOnlySpan<float> z, ReadOnlySpan<int> label, ReadOnlySpan<float> level, Span<float> filled)
    {
        for (var i = 0; i < z.Length; i++)
        {
            var spill = level[label[i]];
            filled[i] = z[i] < spill ? spill : z[i];
        }
    }

    private static FilledSurface Measure(Grid<float> elevation, Grid<float> surface)
    {
        ReadOnlySpan<float> z = elevation.Cells, filled = surface.Cells;
        long raised = 0;
        double depths = 0, deepest = 0;
        for (var i = 0; i < z.Length; i++)
        {
            if (!(filled[i] > z[i])) continue;
            var depth = (double)filled[i] - z[i];
            raised++;
            depths += depth;
            if (depth > deepest) deepest = depth;
        }

        return new FilledSurface(surface, raised, depths * elevation.Frame.CellAreaM2, deepest);
    }
}
