using GeoCulvert.Design.Terrain;

namespace GeoCulvert.Design.Tests.Terrain;

/// <summary>Breaching from its definition: the whole grid is looked through again and again for every pit, no heap, nothing local. Heights in steps of 2^-20 m or coarser.</summary>
internal static class NaiveBreaching
{
    public static (float[] Surface, List<int[]> Ways, int Left) Breach(Grid<float> elevation, BreachSettings settings)
    {
        var frame = elevation.Frame;
        var z = (float[])elevation.Cells.Clone();
        var ways = new List<(int[] Way, List<int> Cut)>();
        var cutCells = new HashSet<int>();
        var left = 0;
        foreach (var pit in Pits(elevation).OrderBy(p => z[p.First()]).ThenBy(p => p.Min()).ToList())
        {
            var level = elevation.Cells[pit.First()];
            if (pit.Any(c => z[c] != level || NaiveTerrain.Neighbours(frame, c).Any(n => z[n.Cell] < level))) continue;
            var way = Cheapest(new Grid<float>(frame, z), pit, level, settings);
            double Cut(int c) => Math.Max(0, (double)z[c] - level);
            if (way is null || (settings.Method == DepressionMethod.Mix && way.Sum(Cut) > settings.MaxCutShare * PoolDepths(elevation, z, pit, level)))
            {
                left++;
                continue;
            }

            if (way.All(c => z[c] <= level)) continue;
            ways.Add((way, way.Where(c => z[c] > level).ToList()));
            foreach (var c in ways[^1].Cut)
            {
                z[c] = level;
                Assert.True(cutCells.Add(c), "a cell is cut twice");
            }
        }

        if (left > 0)
        {
            var filled = NaiveTerrain.Fill(new Grid<float>(frame, z));
            foreach (var c in cutCells) z[c] = Math.Min(elevation.Cells[c], filled[c]);
        }

        return (z, [.. ways.Where(w => w.Cut.Any(c => z[c] < elevation.Cells[c])).Select(w => w.Way)], left);
    }

    /// <summary>Connected cells of one level, none on the rim, without a lower neighbour.</summary>
    public static List<HashSet<int>> Pits(Grid<float> elevation)
    {
        var (frame, z) = (elevation.Frame, elevation.Cells);
        var pits = new List<HashSet<int>>();
        var seen = new HashSet<int>();
        for (var i = 0; i < z.Length; i++)
        {
            if (float.IsNaN(z[i]) || float.IsNegativeInfinity(z[i]) || !seen.Add(i)) continue;
            HashSet<int> flat = [i];
            var open = new Stack<int>(flat);
            while (open.TryPop(out var c))
            {
                foreach (var n in NaiveTerrain.Neighbours(frame, c).Where(n => z[n.Cell] == z[i] && flat.Add(n.Cell))) open.Push(n.Cell);
            }

            seen.UnionWith(flat);
            if (!flat.Any(c => NaiveTerrain.IsRim(elevation, c) || NaiveTerrain.Neighbours(frame, c).Any(n => z[n.Cell] < z[c]))) pits.Add(flat);
        }

        return pits;
    }

    private static int[]? Cheapest(Grid<float> surface, HashSet<int> pit, float level, BreachSettings settings)
    {
        long Units(double m) => (long)Math.Round(Math.Min(m, 1e9) * 1048576);
        var (frame, z) = (surface.Frame, surface.Cells);
        bool Ends(int c) => z[c] < level || NaiveTerrain.IsRim(surface, c);
        var label = pit.ToDictionary(c => c, _ => (Cost: 0L, Length: 0L, From: -1));
        var settled = new HashSet<int>();
        while (true)
        {
            // Dijkstra's rule by looking through all labels: a settled cell's way is final, and only final ways go on.
            var c = label.Where(l => !settled.Contains(l.Key)).OrderBy(l => (l.Value.Cost, l.Value.Length, l.Key)).Select(l => l.Key).FirstOrDefault(-1);
            if (c < 0) return null;
            if (Ends(c)) return Way(label, c);
            settled.Add(c);
            foreach (var (code, n) in NaiveTerrain.Neighbours(frame, c))
            {
                var cut = Math.Max(0, (double)z[n] - level);
                var offer = (Cost: label[c].Cost + Units(cut), Length: label[c].Length + Units(D8.StepLengthM(frame, code)), From: c);
                if (cut > settings.MaxDepthM || offer.Length > Units(settings.MaxLengthM)) continue;
                if (!label.TryGetValue(n, out var old) || offer.CompareTo(old) < 0) label[n] = offer;
            }
        }
    }

    private static int[] Way(Dictionary<int, (long Cost, long Length, int From)> label, int end)
    {
        var way = new List<int>();
        for (var c = end; c >= 0; c = label[c].From) way.Insert(0, c);
        return [.. way];
    }

    /// <summary>
    /// Sum of depths of the pool, per cell: the least level over which water comes to a lower cell or leaves over the rim, and all that lies connected below it.
    /// </summary>
    private static double PoolDepths(Grid<float> elevation, float[] z, HashSet<int> pit, float level)
    {
        foreach (var spill in z.Where(h => h >= level).Distinct().Order())
        {
            var pool = pit.ToHashSet();
            var open = new Stack<int>(pool);
            var leaves = false;
            while (open.TryPop(out var c))
            {
                if (z[c] < level || NaiveTerrain.IsRim(elevation, c))
                {
                    leaves = true;
                    break;
                }

                foreach (var n in NaiveTerrain.Neighbours(elevation.Frame, c).Where(n => z[n.Cell] <= spill && pool.Add(n.Cell))) open.Push(n.Cell);
            }

            // The pool: all connected cells strictly below the spill level.
            if (!leaves) continue;
            var under = pit.ToHashSet();
            open = new Stack<int>(under);
            while (open.TryPop(out var c))
            {
                foreach (var n in NaiveTerrain.Neighbours(elevation.Frame, c).Where(n => z[n.Cell] < spill && under.Add(n.Cell))) open.Push(n.Cell);
            }

            return under.Sum(c => (double)spill - z[c]);
        }

        throw new InvalidOperationException("no way out at any level");
    }
}
