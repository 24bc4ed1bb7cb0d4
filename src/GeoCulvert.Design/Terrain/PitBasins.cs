namespace GeoCulvert.Design.Terrain;

/// <summary>Which pit every cell runs down to. Level ground counts as one pit unless it has a way down.</summary>
internal static class PitBasins
{
    /// <summary>
    /// Labels every cell: 0 = runs down to the rim (or is nodata), 1 and up = pit. Returns the number of pits; with more than
    /// <paramref name="most"/> only the pits themselves are labelled.
    /// </summary>
    /// <param name="elevation">Elevations, m; NaN is nodata.</param>
    /// <param name="label">Zeros; receives the labels.</param>
    /// <param name="most">Pits up to which the labels are wanted.</param>
    /// <param name="cancel">Stops the work.</param>
    public static int Label(Grid<float> elevation, int[] label, long most, CancellationToken cancel)
    {
        var code = new byte[elevation.Cells.Length];
        var flat = SteepestDescent.Compute(elevation, code);
        if (flat.Count == 0) return 0;
        cancel.ThrowIfCancellationRequested();
        Span<int> step = stackalloc int[16];
        FlowAccumulation.Steps(elevation.Frame, step);
        LeadFlatsOut(elevation.Cells, code, flat, step);
        var pits = NumberPits(elevation.Cells, code, flat, step, label);
        cancel.ThrowIfCancellationRequested();
        if (pits > 0 && pits <= most) RunDown(elevation.Cells, code, step, label);
        return pits;
    }

    /// <summary>Gives level cells a direction toward a neighbour of the same height that drains, breadth first.</summary>
    private static void LeadFlatsOut(float[] z, byte[] code, List<int> flat, ReadOnlySpan<int> step)
    {
        var queue = new List<int>();
        foreach (var cell in flat)
        {
            for (byte k = 1; k <= 8; k++)
            {
                var n = cell + step[k];
                if (z[n] != z[cell] || code[n] == 0) continue;
                code[cell] = k;
                queue.Add(cell);
                break;
            }
        }

        for (var head = 0; head < queue.Count; head++)
        {
            var cell = queue[head];
            for (byte k = 1; k <= 8; k++)
            {
                var n = cell + step[k];
                if (z[n] != z[cell] || code[n] != 0) continue;
                code[n] = D8.Opposite(k);
                queue.Add(n);
            }
        }
    }

    private static int NumberPits(float[] z, byte[] code, List<int> flat, ReadOnlySpan<int> step, int[] label)
    {
        var pits = 0;
        var open = new Stack<int>();
        foreach (var first in flat)
        {
            // Minus infinity is an outlet inside, a kept sink: no pit.
            if (code[first] != 0 || label[first] != 0 || float.IsNegativeInfinity(z[first])) continue;
            label[first] = ++pits;
            open.Push(first);
            while (open.TryPop(out var cell))
            {
                for (var k = 1; k <= 8; k++)
                {
                    var n = cell + step[k];
                    if (z[n] != z[cell] || code[n] != 0 || label[n] != 0) continue;
                    label[n] = pits;
                    open.Push(n);
                }
            }
        }

        return pits;
    }

    /// <summary>Walks down from every cell to the first with a label, then again to write it: each cell is passed twice at most.</summary>
    private static void RunDown(float[] z, byte[] code, ReadOnlySpan<int> step, int[] label)
    {
        const int Outside = -1;
        for (var i = 0; i < label.Length; i++)
        {
            if (label[i] != 0) continue;
            var cell = i;
            while (label[cell] == 0 && (uint)(code[cell] - 1) < 8) cell += step[code[cell]];
            var found = label[cell] == 0 ? Outside : label[cell];
            for (cell = i; label[cell] == 0; cell += step[code[cell] & 15])
            {
                label[cell] = found;
                if ((uint)(code[cell] - 1) >= 8) break;
            }
        }

        for (var i = 0; i < label.Length; i++) label[i] = Math.Max(0, label[i]);
    }
}
