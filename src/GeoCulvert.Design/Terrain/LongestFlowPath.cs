namespace GeoCulvert.Design.Terrain;

/// <summary>Longest flow paths by true distance, over total watersheds, from one pass.</summary>
public static class LongestFlowPath
{
    /// <summary>Cells of the longest path from the divide to each outlet, the outlet last.</summary>
    public static IReadOnlyList<int[]> Trace(Grid<byte> direction, IReadOnlyList<int> outletCells)
    {
        ArgumentNullException.ThrowIfNull(direction);
        ArgumentNullException.ThrowIfNull(outletCells);
        var frame = direction.Frame;
        var d = direction.Cells;
        var length = new float[d.Length];
        foreach (var cell in FlowAccumulation.DownstreamOrder(direction))
        {
            if (d[cell] == 0) continue;
            var next = FlowAccumulation.Downstream(frame, cell, d[cell]);
            var here = length[cell] + (float)D8.StepLengthM(frame, d[cell]);
            if (here > length[next]) length[next] = here;
        }

        return [.. outletCells.Select(outlet => TraceUp(direction, length, outlet))];
    }

    private static int[] TraceUp(Grid<byte> direction, float[] length, int outlet)
    {
        var frame = direction.Frame;
        var d = direction.Cells;
        var path = new List<int> { outlet };
        var cell = outlet;
        while (true)
        {
            int r = cell / frame.Columns, c = cell % frame.Columns;
            var best = -1;
            var bestLength = float.NegativeInfinity;
            for (byte k = 1; k <= 8; k++)
            {
                int nr = r + D8.RowStep[k], nc = c + D8.ColumnStep[k];
                if (!frame.Contains(nr, nc)) continue;
                var n = (nr * frame.Columns) + nc;
                if (d[n] != D8.Opposite(k)) continue;
                var through = length[n] + (float)D8.StepLengthM(frame, k);
                if (through > bestLength)
                {
                    bestLength = through;
                    best = n;
                }
            }

            if (best < 0) break;
            path.Add(best);
            cell = best;
        }

        path.Reverse();
        return [.. path];
    }
}
