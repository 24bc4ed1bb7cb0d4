namespace GeoCulvert.Design.Terrain;

/// <summary>A stream reach: from a head or a confluence down to the next confluence or the outlet, that cell included; two cells at least.</summary>
/// <param name="Cells">Cell indices, downstream.</param>
/// <param name="Downstream">Index of the reach next downstream, -1 when none.</param>
/// <param name="LowerAccumulationCells">Cells drained by the reach at its lower end: by its last cell before a confluence, else by its last cell.</param>
/// <param name="Order">Strahler order (1957).</param>
public sealed record StreamReach(int[] Cells, int Downstream, int LowerAccumulationCells, int Order);

/// <summary>Streams: cells that drain at least a threshold.</summary>
public static class StreamNetwork
{
    /// <summary>Reaches in the order of their upper cell.</summary>
    /// <param name="direction">Flow directions.</param>
    /// <param name="accumulation">Cells drained by each cell.</param>
    /// <param name="thresholdCells">Cells at which a stream begins; below 1 counts as 1.</param>
    public static IReadOnlyList<StreamReach> Extract(Grid<byte> direction, Grid<int> accumulation, long thresholdCells)
    {
        ArgumentNullException.ThrowIfNull(direction);
        ArgumentNullException.ThrowIfNull(accumulation);
        var frame = direction.Frame;
        var d = direction.Cells;
        var a = accumulation.Cells;
        var threshold = Math.Max(1, thresholdCells);
        var reachOf = new Dictionary<int, int>();
        var cells = new List<int[]>();
        var path = new List<int>();
        for (var head = 0; head < a.Length; head++)
        {
            if (a[head] < threshold || d[head] == 0 || StreamInflows(direction, a, threshold, head) == 1) continue;
            path.Clear();
            path.Add(head);
            var cell = head;
            do
            {
                cell = FlowAccumulation.Downstream(frame, cell, d[cell]);
                path.Add(cell);
            }
            while (d[cell] != 0 && StreamInflows(direction, a, threshold, cell) == 1);
            reachOf[head] = cells.Count;
            cells.Add([.. path]);
        }

        int[] downstream = [.. cells.Select(p => reachOf.GetValueOrDefault(p[^1], -1))];
        var order = StrahlerOrders(downstream);
        return [.. cells.Select((p, k) => new StreamReach(
            p, downstream[k], a[StreamInflows(direction, a, threshold, p[^1]) == 1 ? p[^1] : p[^2]], order[k]))];
    }

    private static int[] StrahlerOrders(int[] downstream)
    {
        var order = new int[downstream.Length];
        var best = new (int Order, int Times)[downstream.Length];
        foreach (var k in WatershedLabels.UpstreamFirst(downstream))
        {
            order[k] = best[k].Order == 0 ? 1 : best[k].Times > 1 ? best[k].Order + 1 : best[k].Order;
            if (downstream[k] < 0) continue;
            ref var b = ref best[downstream[k]];
            b = order[k] > b.Order ? (order[k], 1) : order[k] == b.Order ? (b.Order, b.Times + 1) : b;
        }

        return order;
    }

    private static int StreamInflows(Grid<byte> direction, int[] accumulation, long threshold, int cell)
    {
        var frame = direction.Frame;
        int row = cell / frame.Columns, column = cell % frame.Columns, inflows = 0;
        for (byte k = 1; k <= 8; k++)
        {
            int r = row + D8.RowStep[k], c = column + D8.ColumnStep[k];
            if (!frame.Contains(r, c)) continue;
            var n = (r * frame.Columns) + c;
            if (direction.Cells[n] == D8.Opposite(k) && accumulation[n] >= threshold) inflows++;
        }

        return inflows;
    }
}
