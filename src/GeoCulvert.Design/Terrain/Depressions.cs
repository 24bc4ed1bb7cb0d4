namespace GeoCulvert.Design.Terrain;

/// <summary>Connected cells that filling raises to one level.</summary>
/// <param name="Cells">Cells raised.</param>
/// <param name="AreaM2">Their area, m2.</param>
/// <param name="SpillLevelM">Level at which water leaves, m; all cells have it once filled.</param>
/// <param name="DeepestCell">The lowest cell, of equal ones the smallest.</param>
/// <param name="MaxDepthM">Depth there, m.</param>
/// <param name="VolumeM3">Volume under the spill level, m3.</param>
/// <param name="PassCell">The smallest cell beside it, at the spill level and not raised, over which water leaves; -1 where there is none (the surface is not a filling).</param>
public sealed record Depression(
    int Cells, double AreaM2, double SpillLevelM, int DeepestCell, double MaxDepthM, double VolumeM3, int PassCell);

/// <summary>The depressions of a terrain model and which cell is in which.</summary>
/// <param name="Labels">0 = in none, k + 1 = in depression k.</param>
/// <param name="All">Depressions in the order of their first cell.</param>
public sealed record DepressionMap(Grid<int> Labels, IReadOnlyList<Depression> All);

/// <summary>
/// Tells depressions apart. Of a filled surface, two raised neighbours have the same level: each takes the least level of its neighbours, so
/// neither can lie above the other. Connected raised cells are therefore one pool with one spill level, and its edge holds the pass.
/// </summary>
public static class Depressions
{
    /// <summary>Finds them; each cell is visited a fixed number of times.</summary>
    /// <param name="elevation">Elevations, m; NaN is nodata.</param>
    /// <param name="filled">The same, filled.</param>
    /// <param name="cancel">Stops the work.</param>
    public static DepressionMap Find(Grid<float> elevation, Grid<float> filled, CancellationToken cancel = default)
    {
        ArgumentNullException.ThrowIfNull(elevation);
        ArgumentNullException.ThrowIfNull(filled);
        if (elevation.Frame != filled.Frame) throw new ArgumentException("The two surfaces have different frames.", nameof(filled));
        var labels = new Grid<int>(elevation.Frame);
        var all = new List<Depression>();
        var open = new Stack<int>();
        for (var i = 0; i < elevation.Cells.Length; i++)
        {
            if ((i & 0xFFFFF) == 0) cancel.ThrowIfCancellationRequested();
            if (labels.Cells[i] == 0 && filled.Cells[i] > elevation.Cells[i]) all.Add(Spread(elevation, filled, labels, i, all.Count + 1, open));
        }

        return new DepressionMap(labels, all);
    }

    private static Depression Spread(Grid<float> elevation, Grid<float> filled, Grid<int> labels, int first, int label, Stack<int> open)
    {
        var frame = elevation.Frame;
        var (z, w) = (elevation.Cells, filled.Cells);
        var level = w[first];
        int cells = 0, deepest = first, pass = int.MaxValue;
        double depths = 0;
        labels.Cells[first] = label;
        open.Push(first);
        while (open.TryPop(out var cell))
        {
            cells++;
            depths += (double)level - z[cell];
            if (z[cell] < z[deepest] || (z[cell] == z[deepest] && cell < deepest)) deepest = cell;
            int row = cell / frame.Columns, column = cell % frame.Columns;
            for (var k = 1; k <= 8; k++)
            {
                int r = row + D8.RowStep[k], c = column + D8.ColumnStep[k];
                if (!frame.Contains(r, c)) continue;
                var n = (r * frame.Columns) + c;
                if (w[n] != level) continue;
                if (!(w[n] > z[n])) pass = Math.Min(pass, n);
                else if (labels.Cells[n] == 0)
                {
                    labels.Cells[n] = label;
                    open.Push(n);
                }
            }
        }

        return new Depression(
            cells, cells * frame.CellAreaM2, level, deepest, (double)level - z[deepest], depths * frame.CellAreaM2, pass == int.MaxValue ? -1 : pass);
    }
}
