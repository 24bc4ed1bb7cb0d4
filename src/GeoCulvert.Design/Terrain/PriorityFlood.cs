namespace GeoCulvert.Design.Terrain;

/// <summary>
/// The plain priority flood (Barnes, Lehman and Mulla 2014, the variant with a plain queue for the inside of depressions): from the rim
/// inward, always from the lowest open cell. The worst case is n log n whatever the terrain.
/// </summary>
internal static class PriorityFlood
{
    /// <summary>The filled surface; the input is not changed.</summary>
    public static Grid<float> Fill(Grid<float> elevation, CancellationToken cancel)
    {
        var frame = elevation.Frame;
        var filled = new Grid<float>(frame, (float[])elevation.Cells.Clone());
        var z = filled.Cells;
        int columns = frame.Columns, rows = frame.Rows;
        var closed = new bool[z.Length];
        var open = new CellHeap(Math.Max(16, 4 * (columns + rows)));
        for (var r = 0; r < rows; r++)
        {
            for (var c = 0; c < columns; c++)
            {
                var i = (r * columns) + c;
                if (float.IsNaN(z[i])) closed[i] = true;
                else if (EdgeCells.IsEdge(elevation, r, c) || float.IsNegativeInfinity(z[i]))
                {
                    closed[i] = true;
                    open.Push(z[i], i);
                }
            }
        }

        var pit = new Queue<int>();
        long turns = 0;
        var rowStep = D8.RowStep;
        var columnStep = D8.ColumnStep;
        while (pit.Count > 0 || open.Count > 0)
        {
            if ((++turns & 0xFFFFF) == 0) cancel.ThrowIfCancellationRequested();
            var cell = pit.Count > 0 ? pit.Dequeue() : open.Pop();
            int r = cell / columns, c = cell % columns;
            var level = z[cell];
            for (var d = 1; d <= 8; d++)
            {
                int nr = r + rowStep[d], nc = c + columnStep[d];
                if ((uint)nr >= (uint)rows || (uint)nc >= (uint)columns) continue;
                var n = (nr * columns) + nc;
                if (closed[n]) continue;
                closed[n] = true;
                if (z[n] > level)
                {
                    open.Push(z[n], n);
                    continue;
                }

                // Equal heights keep their own bits: 0 and -0 are equal.
                if (z[n] < level) z[n] = level;
                pit.Enqueue(n);
            }
        }

        return filled;
    }
}

/// <summary>A binary heap of cells by elevation; equal elevations leave in the order of the cell number.</summary>
internal sealed class CellHeap(int capacity)
{
    private (float Z, int Cell)[] _items = new (float, int)[capacity];

    public int Count { get; private set; }

    public void Push(float z, int cell)
    {
        if (Count == _items.Length) Array.Resize(ref _items, Count * 2);
        var i = Count++;
        while (i > 0)
        {
            var parent = (i - 1) >> 1;
            if (!Before(z, cell, _items[parent])) break;
            _items[i] = _items[parent];
            i = parent;
        }

        _items[i] = (z, cell);
    }

    public int Pop()
    {
        var top = _items[0].Cell;
        var (z, cell) = _items[--Count];
        var i = 0;
        while (true)
        {
            var child = (2 * i) + 1;
            if (child >= Count) break;
            if (child + 1 < Count && Before(_items[child + 1].Z, _items[child + 1].Cell, _items[child])) child++;
            if (!Before(_items[child].Z, _items[child].Cell, (z, cell))) break;
            _items[i] = _items[child];
            i = child;
        }

        if (Count > 0) _items[i] = (z, cell);
        return top;
    }

    private static bool Before(float z, int cell, (float Z, int Cell) other) => z < other.Z || (z == other.Z && cell < other.Cell);
}
