namespace GeoCulvert.Design.Terrain;

/// <summary>How the cells of mapped streams follow each other.</summary>
internal static class StreamLinks
{
    /// <summary>
    /// For each stream cell the cells next downstream. A stream that ends beside another, inside the terrain model and on no other's cell, is led into the other's
    /// lowest neighbouring cell, of equal ones the first clockwise from north.
    /// </summary>
    public static Dictionary<int, List<int>> Downstream(Grid<float> elevation, IReadOnlyList<IReadOnlyList<int[]>> streams)
    {
        const int Several = -1;
        var downstream = new Dictionary<int, List<int>>();
        var owner = new Dictionary<int, int>();
        for (var k = 0; k < streams.Count; k++)
        {
            foreach (var run in streams[k])
            {
                for (var i = 0; i < run.Length; i++)
                {
                    owner[run[i]] = owner.GetValueOrDefault(run[i], k) == k ? k : Several;
                    if (i + 1 < run.Length) Add(run[i], run[i + 1]);
                }
            }
        }

        for (var k = 0; k < streams.Count; k++)
        {
            HashSet<int> own = [.. streams[k].SelectMany(r => r)];
            foreach (var run in streams[k])
            {
                if (owner[run[^1]] == k && Joins(run[^1], own) is { } cell) Add(run[^1], cell);
            }
        }

        return downstream;

        void Add(int from, int to)
        {
            if (!downstream.TryGetValue(from, out var list)) downstream[from] = list = [];
            if (!list.Contains(to)) list.Add(to);
        }

        int? Joins(int end, HashSet<int> own)
        {
            var frame = elevation.Frame;
            int row = end / frame.Columns, column = end % frame.Columns;
            if (EdgeCells.IsEdge(elevation, row, column)) return null;
            int? best = null;
            for (var d = 1; d <= 8; d++)
            {
                var n = end + (D8.RowStep[d] * frame.Columns) + D8.ColumnStep[d];
                if (!owner.ContainsKey(n) || own.Contains(n)) continue;
                if (best is null || elevation.Cells[n] < elevation.Cells[best.Value]) best = n;
            }

            return best;
        }
    }
}
