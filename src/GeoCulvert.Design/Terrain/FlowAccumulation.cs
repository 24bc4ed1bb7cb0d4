namespace GeoCulvert.Design.Terrain;

/// <summary>Exact count of the cells that drain through each cell, itself included.</summary>
public static class FlowAccumulation
{
    /// <summary>Counts by walking down from every source and stopping where an inflow is still missing.</summary>
    /// <param name="direction">Directions without circles.</param>
    /// <param name="elevation">Grid that tells nodata (NaN) from outlets; nodata gets 0.</param>
    public static Grid<int> Count(Grid<byte> direction, Grid<float> elevation)
    {
        ArgumentNullException.ThrowIfNull(direction);
        ArgumentNullException.ThrowIfNull(elevation);
        var frame = direction.Frame;
        var d = direction.Cells;
        var inflows = Inflows(direction);
        var count = new Grid<int>(frame);
        var a = count.Cells;
        for (var i = 0; i < d.Length; i++)
        {
            if (!float.IsNaN(elevation.Cells[i])) a[i] = 1;
        }

        for (var i = 0; i < d.Length; i++)
        {
            if (inflows[i] != 0 || a[i] == 0) continue;
            var cell = i;
            while (d[cell] != 0)
            {
                inflows[cell] = byte.MaxValue;
                var next = Downstream(frame, cell, d[cell]);
                a[next] += a[cell];
                if (--inflows[next] != 0) break;
                cell = next;
            }
        }

        return count;
    }

    /// <summary>Index of the cell next downstream.</summary>
    public static int Downstream(in GridFrame frame, int cell, byte code) =>
        cell + (D8.RowStep[code] * frame.Columns) + D8.ColumnStep[code];

    internal static byte[] Inflows(Grid<byte> direction)
    {
        var d = direction.Cells;
        var inflows = new byte[d.Length];
        for (var i = 0; i < d.Length; i++)
        {
            if (d[i] != 0) inflows[Downstream(direction.Frame, i, d[i])]++;
        }

        return inflows;
    }

    /// <summary>Cells in an order in which every cell comes after all cells that drain to it.</summary>
    internal static int[] DownstreamOrder(Grid<byte> direction)
    {
        var d = direction.Cells;
        var inflows = Inflows(direction);
        var order = new int[d.Length];
        var n = 0;
        for (var i = 0; i < d.Length; i++)
        {
            if (inflows[i] != 0) continue;
            var cell = i;
            while (true)
            {
                order[n++] = cell;
                inflows[cell] = byte.MaxValue;
                if (d[cell] == 0) break;
                cell = Downstream(direction.Frame, cell, d[cell]);
                if (--inflows[cell] != 0) break;
            }
        }

        return n == d.Length ? order : throw new InvalidOperationException("The flow directions hold a circle.");
    }
}
