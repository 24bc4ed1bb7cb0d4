namespace GeoCulvert.Design.Terrain;

/// <summary>Every cell's nearest outlet downstream, and how the outlets follow each other.</summary>
/// <param name="Labels">0 = none, k + 1 = outlet k.</param>
/// <param name="Parent">Outlet next downstream of each outlet, -1 when none.</param>
/// <param name="LocalCells">Cells that reach each outlet without passing another.</param>
/// <param name="TotalCells">All cells that reach each outlet.</param>
public sealed record WatershedLabelling(Grid<int> Labels, int[] Parent, long[] LocalCells, long[] TotalCells);

/// <summary>Labels all watersheds of a run in one backward sweep: each cell once, nested ones included.</summary>
public static class WatershedLabels
{
    /// <summary>Labels every cell with its nearest outlet downstream.</summary>
    /// <param name="direction">Flow directions.</param>
    /// <param name="outletCells">Cells of the outlets; a cell named twice belongs to the first, the second gets no cells and the first as parent.</param>
    public static WatershedLabelling Label(Grid<byte> direction, IReadOnlyList<int> outletCells)
    {
        ArgumentNullException.ThrowIfNull(direction);
        ArgumentNullException.ThrowIfNull(outletCells);
        var labels = new Grid<int>(direction.Frame);
        var label = labels.Cells;
        var outletAt = new Dictionary<int, int>();
        for (var k = 0; k < outletCells.Count; k++) outletAt.TryAdd(outletCells[k], k);
        foreach (var (cell, k) in outletAt) label[cell] = k + 1;
        var d = direction.Cells;
        var order = FlowAccumulation.DownstreamOrder(direction);
        var local = new long[outletCells.Count];
        for (var i = order.Length - 1; i >= 0; i--)
        {
            var cell = order[i];
            if (label[cell] == 0 && d[cell] != 0) label[cell] = label[FlowAccumulation.Downstream(direction.Frame, cell, d[cell])];
            if (label[cell] != 0) local[label[cell] - 1]++;
        }

        var parent = new int[outletCells.Count];
        for (var k = 0; k < parent.Length; k++)
        {
            var cell = outletCells[k];
            parent[k] = outletAt[cell] != k ? outletAt[cell]
                : d[cell] == 0 ? -1
                : label[FlowAccumulation.Downstream(direction.Frame, cell, d[cell])] - 1;
        }

        var total = (long[])local.Clone();
        foreach (var k in UpstreamFirst(parent))
        {
            if (parent[k] >= 0) total[parent[k]] += total[k];
        }

        return new WatershedLabelling(labels, parent, local, total);
    }

    /// <summary>Outlets in an order in which each comes after all that drain to it.</summary>
    public static int[] UpstreamFirst(IReadOnlyList<int> parent)
    {
        ArgumentNullException.ThrowIfNull(parent);
        var children = new int[parent.Count];
        foreach (var p in parent)
        {
            if (p >= 0) children[p]++;
        }

        var order = new int[parent.Count];
        var n = 0;
        for (var k = 0; k < parent.Count; k++)
        {
            var i = k;
            while (children[i] == 0)
            {
                children[i] = -1;
                order[n++] = i;
                if (parent[i] < 0) break;
                i = parent[i];
                children[i]--;
                if (children[i] != 0) break;
            }
        }

        return order;
    }
}
