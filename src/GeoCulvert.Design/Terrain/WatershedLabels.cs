namespace GeoCulvert.Design.Terrain;

/// <summary>Every cell's nearest outlet downstream, and how the outlets follow each other.</summary>
/// <param name="Labels">0 = none, k + 1 = outlet k.</param>
/// <param name="Parent">Outlet next downstream of each outlet, -1 when none.</param>
/// <param name="LocalCells">Cells that reach each outlet without passing another.</param>
/// <param name="TotalCells">All cells that reach each outlet.</param>
public sealed record WatershedLabelling(Grid<int> Labels, int[] Parent, long[] LocalCells, long[] TotalCells);

/// <summary>
/// Labels all watersheds of a run in one pass, nested ones included: each cell takes the label of the next labelled cell downstream; totals are
/// sums of local watersheds along the tree of outlets. The time does not depend on the number of outlets.
/// </summary>
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
        var local = new long[outletCells.Count];
        foreach (var k in outletAt.Values) local[k] = 1;
        RunDown(direction, label, local);

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

    /// <summary>Walks down from every cell to the first with a label, then again to write it: each cell is passed twice at most.</summary>
    private static void RunDown(Grid<byte> direction, int[] label, long[] local)
    {
        const int NoOutlet = -1;
        Span<int> step = stackalloc int[16];
        FlowAccumulation.Steps(direction.Frame, step);
        var d = direction.Cells;
        for (var i = 0; i < label.Length; i++)
        {
            if (label[i] != 0) continue;
            var cell = i;
            var passed = 0;
            while (label[cell] == 0 && d[cell] != 0)
            {
                cell += step[d[cell] & 15];
                if (++passed > label.Length) throw new InvalidOperationException("The flow directions hold a circle.");
            }

            var found = label[cell] == 0 ? NoOutlet : label[cell];
            cell = i;
            for (var k = 0; k < passed; k++)
            {
                label[cell] = found;
                cell += step[d[cell] & 15];
            }

            if (label[cell] == 0) label[cell] = found;
            if (found > 0) local[found - 1] += passed;
        }

        for (var i = 0; i < label.Length; i++) label[i] = Math.Max(0, label[i]);
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
