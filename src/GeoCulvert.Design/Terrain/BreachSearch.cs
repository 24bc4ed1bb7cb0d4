namespace GeoCulvert.Design.Terrain;

/// <summary>
/// From one pit the cheapest way to lower ground, and what filling the pit would take instead. Costs and lengths are whole numbers of 2^-20 m, so
/// sums do not depend on their order and equal ways are equal.
/// </summary>
internal sealed class BreachSearch(Grid<float> surface, double maxLengthM, double maxDepthM)
{
    /// <summary>Units of cost and length in a metre.</summary>
    public const double Fine = 1 << 20;

    private readonly OpenCells _open = new();
    private readonly LowestBlocks _blocks = new(surface);
    private readonly List<int> _pool = [];
    private readonly Stack<int> _under = [];
    private readonly long _longest = Units(maxLengthM);
    private readonly double _deepest = Math.Min(maxDepthM, 1e6);
    private readonly long[] _step = [.. Enumerable.Range(0, 9).Select(k => k == 0 ? 0 : Units(D8.StepLengthM(surface.Frame, (byte)k)))];

    /// <summary>
    /// Least-cost path (Lindsay and Dhun 2015): the cost of a cell is what must be cut from it to reach the level of the pit. Ends at a cell lower than the
    /// pit or on the rim. Each cell keeps its cheapest way within the length, so of two ways that part and meet again the cheaper one goes on, even
    /// where only the other would have been short enough in the end.
    /// </summary>
    /// <returns>Cells from the pit to the end; null when no way keeps the limits.</returns>
    public int[]? CheapestWay(Pit pit, CancellationToken cancel)
    {
        var (z, frame, level) = (surface.Cells, surface.Frame, pit.LevelM);
        if (!MayReach(pit)) return null;
        _open.Begin();
        foreach (var cell in pit.Flat ?? [pit.First]) _open.Reach(cell, 0, 0, -1);
        long turns = 0;
        while (_open.TryTake(out var cell, out var cost, out var length))
        {
            if ((++turns & 0xFFFF) == 0) cancel.ThrowIfCancellationRequested();
            int row = cell / frame.Columns, column = cell % frame.Columns;
            if (z[cell] < level || EdgeCells.IsEdge(surface, row, column)) return Way(cell);
            for (var k = 1; k <= 8; k++)
            {
                // Not on the rim: all eight exist and hold data.
                var n = cell + (D8.RowStep[k] * frame.Columns) + D8.ColumnStep[k];
                var cut = Math.Max(0, (double)z[n] - level);
                if (cut <= _deepest && length + _step[k] <= _longest) _open.Reach(n, cost + Units(cut), length + _step[k], cell);
            }
        }

        return null;
    }

    /// <summary>Lowers cells to a level.</summary>
    public void Cut(List<int> cells, float levelM)
    {
        foreach (var cell in cells)
        {
            surface.Cells[cell] = levelM;
            _blocks.Lower(cell, levelM);
        }
    }

    /// <summary>What filling would take, m3: the pool whose level is the least at which water comes to a cell lower than the pit or leaves over the rim.</summary>
    public double PoolM3(Pit pit, CancellationToken cancel)
    {
        var (z, frame) = (surface.Cells, surface.Frame);
        var (spill, under) = (pit.LevelM, 0);
        _pool.Clear();
        _under.Clear();
        _open.Begin();
        foreach (var cell in pit.Flat ?? [pit.First])
        {
            _open.TryMark(cell, 0, waits: false);
            _under.Push(cell);
        }

        // Cells up to the spill level in any order; only those above it wait for their turn by height.
        while (_under.TryPop(out var cell) || _open.TryTake(out cell, out _, out _))
        {
            if ((_pool.Count & 0xFFFF) == 0) cancel.ThrowIfCancellationRequested();
            if (z[cell] < pit.LevelM) break;

            // All that is connected below this one came before it.
            if (z[cell] > spill) (spill, under) = (z[cell], _pool.Count);
            if (EdgeCells.IsEdge(surface, cell / frame.Columns, cell % frame.Columns)) break;
            _pool.Add(cell);
            for (var k = 1; k <= 8; k++)
            {
                var n = cell + (D8.RowStep[k] * frame.Columns) + D8.ColumnStep[k];
                var above = z[n] > spill;
                if (_open.TryMark(n, Order(z[n]), waits: above) && !above) _under.Push(n);
            }
        }

        return _pool.Take(under).Sum(cell => (double)spill - z[cell]) * frame.CellAreaM2;
    }

    /// <summary>False when nothing lower and no way out lies within the longest cut, so that there is no need to look.</summary>
    private bool MayReach(Pit pit)
    {
        var frame = surface.Frame;
        var (top, left, bottom, right) = (int.MaxValue, int.MaxValue, 0, 0);
        foreach (var cell in pit.Flat ?? [pit.First])
        {
            int row = cell / frame.Columns, column = cell % frame.Columns;
            (top, left, bottom, right) = (Math.Min(top, row), Math.Min(left, column), Math.Max(bottom, row), Math.Max(right, column));
        }

        long rows = (long)Math.Min(frame.Rows, Math.Ceiling(_longest / Fine / frame.CellHeightM) + 1);
        long columns = (long)Math.Min(frame.Columns, Math.Ceiling(_longest / Fine / frame.CellWidthM) + 1);
        return _blocks.MayBeLower(pit.LevelM, (top, left, bottom, right), rows, columns);
    }

    private static long Units(double metres) => metres >= 1e12 ? long.MaxValue / 4 : (long)Math.Round(metres * Fine);

    /// <summary>A whole number that orders as the heights do.</summary>
    private static long Order(float height)
    {
        var bits = BitConverter.SingleToInt32Bits(height);
        return bits >= 0 ? bits : -(long)(bits & int.MaxValue);
    }

    private int[] Way(int end)
    {
        var way = new List<int>();
        for (var cell = end; cell >= 0; cell = _open.From(cell)) way.Add(cell);
        way.Reverse();
        return [.. way];
    }
}
