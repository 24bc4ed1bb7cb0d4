namespace GeoCulvert.Design.Terrain;

/// <summary>Exact count of the cells that drain through each cell, itself included. A grid in memory has fewer than 2^31 cells, so 32 bits hold it.</summary>
public static class FlowAccumulation
{
    /// <summary>Counts by walking down from every source and stopping where an inflow is still missing.</summary>
    /// <param name="direction">Directions without circles.</param>
    /// <param name="elevation">Grid that tells nodata (NaN) from outlets; nodata gets 0.</param>
    public static Grid<int> Count(Grid<byte> direction, Grid<float> elevation)
    {
        ArgumentNullException.ThrowIfNull(direction);
        ArgumentNullException.ThrowIfNull(elevation);
        return Count(direction, elevation, new int[direction.Cells.Length]);
    }

    /// <param name="direction">Directions without circles.</param>
    /// <param name="elevation">Grid that tells nodata (NaN) from outlets; nodata gets 0.</param>
    /// <param name="counts">Receives the counts and becomes the grid.</param>
    internal static Grid<int> Count(Grid<byte> direction, Grid<float> elevation, int[] counts)
    {
        Span<int> step = stackalloc int[16];
        Steps(direction.Frame, step);
        var d = direction.Cells;
        var z = elevation.Cells;
        var inflows = new byte[d.Length];
        for (var i = 0; i < d.Length; i++)
        {
            counts[i] = float.IsNaN(z[i]) ? 0 : 1;
            if (d[i] != 0) inflows[i + step[d[i] & 15]]++;
        }

        for (var i = 0; i < d.Length; i++)
        {
            // 0 becomes 255 when the walk leaves a cell, so no cell is left twice.
            var cell = i;
            while (inflows[cell] == 0 && d[cell] != 0)
            {
                inflows[cell] = byte.MaxValue;
                var next = cell + step[d[cell] & 15];
                counts[next] += counts[cell];
                inflows[next]--;
                cell = next;
            }
        }

        return new Grid<int>(direction.Frame, counts);
    }

    /// <summary>Index of the cell next downstream.</summary>
    public static int Downstream(in GridFrame frame, int cell, byte code) =>
        cell + (D8.RowStep[code] * frame.Columns) + D8.ColumnStep[code];

    /// <summary>Difference of cell index for each code; 0 beyond 8.</summary>
    internal static void Steps(in GridFrame frame, Span<int> step)
    {
        step.Clear();
        for (byte k = 1; k <= 8; k++) step[k] = Downstream(frame, 0, k);
    }
}
