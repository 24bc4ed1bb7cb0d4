namespace GeoCulvert.Design.Terrain;

/// <summary>
/// D8 flow directions on a filled surface: steepest descent by true distance; flats drain toward lower and away from higher ground
/// (Barnes, Lehman and Mulla 2014) without changing an elevation. Ties go to the first code clockwise from north.
/// </summary>
public static class FlowDirections
{
    /// <summary>Directions of every cell; 0 for nodata and for rim cells with nothing lower.</summary>
    public static Grid<byte> Resolve(Grid<float> filled)
    {
        ArgumentNullException.ThrowIfNull(filled);
        var frame = filled.Frame;
        var direction = new Grid<byte>(frame);
        var flat = SteepestDescent(filled, direction);
        if (flat.Count > 0) DrainFlats(filled, direction, flat);
        return direction;
    }

    private static List<int> SteepestDescent(Grid<float> filled, Grid<byte> direction)
    {
        var frame = filled.Frame;
        int columns = frame.Columns, rows = frame.Rows;
        var z = filled.Cells;
        var d = direction.Cells;
        var flat = new List<int>();
        Span<double> length = stackalloc double[9];
        for (byte k = 1; k <= 8; k++) length[k] = D8.StepLengthM(frame, k);
        var rowStep = D8.RowStep;
        var columnStep = D8.ColumnStep;
        for (var r = 0; r < rows; r++)
        {
            for (var c = 0; c < columns; c++)
            {
                var i = (r * columns) + c;
                var level = z[i];
                if (float.IsNaN(level)) continue;
                double best = 0;
                byte code = 0;
                for (byte k = 1; k <= 8; k++)
                {
                    int nr = r + rowStep[k], nc = c + columnStep[k];
                    if ((uint)nr >= (uint)rows || (uint)nc >= (uint)columns) continue;
                    var slope = ((double)level - z[(nr * columns) + nc]) / length[k];
                    if (slope > best)
                    {
                        best = slope;
                        code = k;
                    }
                }

                d[i] = code;
                if (code == 0 && !EdgeCells.IsEdge(filled, r, c)) flat.Add(i);
            }
        }

        return flat;
    }

    private static void DrainFlats(Grid<float> filled, Grid<byte> direction, List<int> flat)
    {
        var frame = filled.Frame;
        int columns = frame.Columns, rows = frame.Rows;
        var z = filled.Cells;
        var d = direction.Cells;
        var rowStep = D8.RowStep.ToArray();
        var columnStep = D8.ColumnStep.ToArray();

        // Only flat cells carry a number: small dictionaries of slots instead of full grids.
        var slot = new Dictionary<int, int>(flat.Count);
        for (var s = 0; s < flat.Count; s++) slot[flat[s]] = s;
        var toward = new int[flat.Count];
        var away = new int[flat.Count];

        // Toward lower ground: steps from the nearest cell of the same level that already drains or is an outlet.
        var queue = new Queue<int>();
        foreach (var cell in flat)
        {
            for (var k = 1; k <= 8; k++)
            {
                var n = cell + (rowStep[k] * columns) + columnStep[k];
                if (z[n] == z[cell] && !slot.ContainsKey(n))
                {
                    toward[slot[cell]] = 1;
                    queue.Enqueue(cell);
                    break;
                }
            }
        }

        Spread(toward);

        // Away from higher ground: steps from the nearest cell with a higher neighbour.
        foreach (var cell in flat)
        {
            for (var k = 1; k <= 8; k++)
            {
                if (z[cell + (rowStep[k] * columns) + columnStep[k]] > z[cell])
                {
                    away[slot[cell]] = 1;
                    queue.Enqueue(cell);
                    break;
                }
            }
        }

        Spread(away);
        var farthest = new Dictionary<float, int>();
        foreach (var cell in flat)
        {
            var a = away[slot[cell]];
            if (!farthest.TryGetValue(z[cell], out var f) || a > f) farthest[z[cell]] = a;
        }

        // Barnes's mask: twice the way out, plus the nearness to higher ground.
        long Mask(int cell)
        {
            var s = slot[cell];
            return (2L * toward[s]) + (away[s] > 0 ? farthest[z[cell]] - away[s] : 0);
        }

        foreach (var cell in flat)
        {
            // A step along the way out lowers the mask by at least one, so a lower neighbour is always there and no circle can close.
            var best = Mask(cell);
            byte code = 0;
            for (byte k = 1; k <= 8; k++)
            {
                var n = cell + (rowStep[k] * columns) + columnStep[k];
                if (z[n] != z[cell]) continue;
                var mask = slot.ContainsKey(n) ? Mask(n) : -1;
                if (mask < best)
                {
                    best = mask;
                    code = k;
                }
            }

            d[cell] = code;
        }

        void Spread(int[] steps)
        {
            while (queue.Count > 0)
            {
                var cell = queue.Dequeue();
                var next = steps[slot[cell]] + 1;
                for (var k = 1; k <= 8; k++)
                {
                    var n = cell + (rowStep[k] * columns) + columnStep[k];
                    if (z[n] == z[cell] && slot.TryGetValue(n, out var s) && steps[s] == 0)
                    {
                        steps[s] = next;
                        queue.Enqueue(n);
                    }
                }
            }
        }
    }
}
