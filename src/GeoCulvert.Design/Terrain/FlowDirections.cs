namespace GeoCulvert.Design.Terrain;

/// <summary>
/// D8 flow directions on a filled surface: steepest descent by true distance; flats drain toward lower and away from higher ground
/// (Barnes, Lehman and Mulla 2014) without changing an elevation. Ties go to the first code clockwise from north.
/// </summary>
public static class FlowDirections
{
    /// <summary>Directions of every cell; 0 for nodata and for rim cells with nothing lower. On a surface that is not filled, pits keep 0 too.</summary>
    public static Grid<byte> Resolve(Grid<float> filled)
    {
        ArgumentNullException.ThrowIfNull(filled);
        return Resolve(filled, new int[filled.Cells.Length]);
    }

    /// <param name="filled">A surface without depressions.</param>
    /// <param name="scratch">A zero for every cell; zeros again afterwards. Pages of it are touched only where there are flats.</param>
    internal static Grid<byte> Resolve(Grid<float> filled, int[] scratch)
    {
        var direction = new Grid<byte>(filled.Frame);
        var flat = SteepestDescent.Compute(filled, direction.Cells);
        foreach (ref var code in direction.Cells.AsSpan()) code &= 15;
        if (flat.Count > 0) DrainFlats(filled, direction.Cells, [.. flat], scratch);
        return direction;
    }

    /// <summary>
    /// Barnes's mask is twice the steps to the way out, plus (farthest - steps from higher ground). "Farthest" is one number for a whole
    /// flat and only cells of one flat are compared, so it is left out.
    /// </summary>
    private static void DrainFlats(Grid<float> filled, byte[] direction, int[] flat, int[] slot)
    {
        var z = filled.Cells;
        Span<int> step = stackalloc int[16];
        FlowAccumulation.Steps(filled.Frame, step);
        for (var s = 0; s < flat.Length; s++) slot[flat[s]] = s + 1;
        var toward = new int[flat.Length + 1];
        var away = new int[flat.Length + 1];
        var queue = new int[flat.Length];
        var (exits, heights) = (0, 0);

        // Flat cells are never on the rim, so all eight neighbours exist and hold data.
        foreach (var cell in flat)
        {
            for (var k = 1; k <= 8; k++)
            {
                var n = cell + step[k];
                if (z[n] != z[cell] || slot[n] != 0) continue;
                toward[slot[cell]] = 1;
                queue[exits++] = cell;
                break;
            }
        }

        Spread(z, slot, step, toward, queue, exits);
        foreach (var cell in flat)
        {
            for (var k = 1; k <= 8; k++)
            {
                if (!(z[cell + step[k]] > z[cell])) continue;
                away[slot[cell]] = 1;
                queue[heights++] = cell;
                break;
            }
        }

        Spread(z, slot, step, away, queue, heights);
        foreach (var cell in flat)
        {
            var own = slot[cell];
            if (toward[own] == 0) continue;

            // The next step of a shortest way out lowers the mask by one at least: a lower neighbour is always there, and no circle closes.
            var best = (2L * toward[own]) - away[own];
            for (byte k = 1; k <= 8; k++)
            {
                var n = cell + step[k];
                if (z[n] != z[cell]) continue;
                var mask = slot[n] == 0 ? long.MinValue : (2L * toward[slot[n]]) - away[slot[n]];
                if (mask >= best) continue;
                best = mask;
                direction[cell] = k;
            }
        }

        foreach (var cell in flat) slot[cell] = 0;
    }

    /// <summary>Counts steps over cells of the same level, breadth first.</summary>
    private static void Spread(float[] z, int[] slot, ReadOnlySpan<int> step, int[] steps, int[] queue, int count)
    {
        for (var head = 0; head < count; head++)
        {
            var cell = queue[head];
            var next = steps[slot[cell]] + 1;
            for (var k = 1; k <= 8; k++)
            {
                var n = cell + step[k];
                if (z[n] != z[cell]) continue;
                var s = slot[n];
                if (s == 0 || steps[s] != 0) continue;
                steps[s] = next;
                queue[count++] = n;
            }
        }
    }
}
