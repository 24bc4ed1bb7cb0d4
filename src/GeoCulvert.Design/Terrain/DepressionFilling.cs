namespace GeoCulvert.Design.Terrain;

/// <summary>A surface without depressions and what was raised to get it.</summary>
/// <param name="Surface">Filled elevations, m; NaN where there is no data.</param>
/// <param name="RaisedCells">Cells that were raised.</param>
/// <param name="VolumeM3">Volume that was filled, m3.</param>
/// <param name="DeepestM">Largest raise, m.</param>
public sealed record FilledSurface(Grid<float> Surface, long RaisedCells, double VolumeM3, double DeepestM);

/// <summary>
/// Fills depressions by priority flood (Barnes, Lehman and Mulla 2014, the variant with a plain queue for the inside of
/// depressions). Cells on the edge of the grid or next to nodata are outlets at their own elevation.
/// </summary>
public static class DepressionFilling
{
    /// <summary>Fills a grid; the input is not changed. Elevations are float32 and are never rounded: a filled cell has exactly its spill level.</summary>
    public static FilledSurface Fill(Grid<float> elevation, CancellationToken cancel = default)
    {
        ArgumentNullException.ThrowIfNull(elevation);
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
                else if (EdgeCells.IsEdge(elevation, r, c))
                {
                    closed[i] = true;
                    open.Push(z[i], i);
                }
            }
        }

        var pit = new Queue<int>();
        long raised = 0;
        double volume = 0, deepest = 0;
        var rowStep = D8.RowStep;
        var columnStep = D8.ColumnStep;
        while (pit.Count > 0 || open.Count > 0)
        {
            var cell = pit.Count > 0 ? pit.Dequeue() : open.Pop();
            if ((cell & 0xFFFF) == 0) cancel.ThrowIfCancellationRequested();
            int r = cell / columns, c = cell % columns;
            var level = z[cell];
            for (var d = 1; d <= 8; d++)
            {
                int nr = r + rowStep[d], nc = c + columnStep[d];
                if ((uint)nr >= (uint)rows || (uint)nc >= (uint)columns) continue;
                var n = (nr * columns) + nc;
                if (closed[n]) continue;
                closed[n] = true;
                if (z[n] <= level)
                {
                    if (z[n] < level)
                    {
                        raised++;
                        double depth = (double)level - z[n];
                        volume += depth;
                        deepest = Math.Max(deepest, depth);
                        z[n] = level;
                    }

                    pit.Enqueue(n);
                }
                else
                {
                    open.Push(z[n], n);
                }
            }
        }

        return new FilledSurface(filled, raised, volume * frame.CellAreaM2, deepest);
    }
}

/// <summary>Cells on the rim of the data.</summary>
public static class EdgeCells
{
    /// <summary>Whether a valid cell touches the grid's edge or nodata among its eight neighbours.</summary>
    public static bool IsEdge(Grid<float> elevation, int row, int column)
    {
        ArgumentNullException.ThrowIfNull(elevation);
        var frame = elevation.Frame;
        if (row == 0 || column == 0 || row == frame.Rows - 1 || column == frame.Columns - 1) return true;
        var z = elevation.Cells;
        var i = (row * frame.Columns) + column;
        return float.IsNaN(z[i - frame.Columns - 1]) || float.IsNaN(z[i - frame.Columns]) || float.IsNaN(z[i - frame.Columns + 1])
            || float.IsNaN(z[i - 1]) || float.IsNaN(z[i + 1])
            || float.IsNaN(z[i + frame.Columns - 1]) || float.IsNaN(z[i + frame.Columns]) || float.IsNaN(z[i + frame.Columns + 1]);
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
