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

    internal static Grid<int> Count(Grid<byte> direction, Grid<float> elevation, int[] counts)
    {
        var code = (byte[])direction.Cells.Clone();
        AccumulationWalk.TallyInflows(code, direction.Frame, 0, direction.Frame.Rows);
        var z = elevation.Cells;
        for (var i = 0; i < counts.Length; i++) counts[i] = float.IsNaN(z[i]) ? 0 : 1;
        AccumulationWalk.Run(code, counts, direction.Frame, 0, direction.Frame.Rows);
        if (!AccumulationWalk.Strip(code)) throw new InvalidOperationException("The flow directions hold a circle.");
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
