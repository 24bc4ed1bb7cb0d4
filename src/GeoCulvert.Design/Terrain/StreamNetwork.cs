namespace GeoCulvert.Design.Terrain;

/// <summary>A stream reach: from a head or a confluence down to the next confluence or the outlet, that cell included.</summary>
/// <param name="Cells">Cell indices, downstream.</param>
/// <param name="Downstream">Index of the reach next downstream, -1 when none.</param>
/// <param name="LowerAccumulationCells">Cells drained by the last cell before the confluence.</param>
/// <param name="Order">Strahler order (1957).</param>
public sealed record StreamReach(int[] Cells, int Downstream, int LowerAccumulationCells, int Order);

/// <summary>Streams: cells that drain at least a threshold.</summary>
public static class StreamNetwork
{
    /// <summary>Reaches in the order of their upper cell.</summary>
    public static IReadOnlyList<StreamReach> Extract(Grid<byte> direction, Grid<int> accumulation, long thresholdCells)
    {
        ArgumentNullException.ThrowIfNull(direction);
        ArgumentNullException.ThrowIfNull(accumulation);
        var frame = direction.Frame;
        var d = direction.Cells;
        var a = accumulation.Cells;
        var streamInflows = new Dictionary<int, int>();
        for (var i = 0; i < d.Length; i++)
        {
            if (a[i] < thresholdCells || a[i] == 0) continue;
            streamInflows.TryAdd(i, 0);
            if (d[i] == 0) continue;
            var next = FlowAccumulation.Downstream(frame, i, d[i]);
            streamInflows[next] = streamInflows.GetValueOrDefault(next) + 1;
        }

        var heads = streamInflows.Where(p => p.Value != 1).Select(p => p.Key).Order().ToArray();
        var reachOf = new Dictionary<int, int>();
        var cells = new List<int[]>();
        foreach (var head in heads)
        {
            var path = new List<int> { head };
            var cell = head;
            while (d[cell] != 0)
            {
                cell = FlowAccumulation.Downstream(frame, cell, d[cell]);
                path.Add(cell);
                if (streamInflows[cell] != 1) break;
            }

            reachOf[head] = cells.Count;
            cells.Add([.. path]);
        }

        var downstream = cells.Select(p => p.Length > 1 && reachOf.TryGetValue(p[^1], out var r) ? r : -1).ToArray();
        var order = new int[cells.Count];
        var best = new (int Order, int Times)[cells.Count];
        foreach (var k in WatershedLabels.UpstreamFirst(downstream))
        {
            order[k] = best[k].Order == 0 ? 1 : best[k].Times > 1 ? best[k].Order + 1 : best[k].Order;
            if (downstream[k] < 0) continue;
            ref var b = ref best[downstream[k]];
            b = order[k] > b.Order ? (order[k], 1) : order[k] == b.Order ? (b.Order, b.Times + 1) : b;
        }

        return [.. cells.Select((p, k) => new StreamReach(p, downstream[k], a[p.Length > 1 && downstream[k] >= 0 ? p[^2] : p[^1]], order[k]))];
    }
}
