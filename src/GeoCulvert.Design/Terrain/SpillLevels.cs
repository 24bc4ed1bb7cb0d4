namespace GeoCulvert.Design.Terrain;

/// <summary>
/// The spill level of every pit: the least, over all ways to the rim, of the highest pass on the way. The graph has a node for each pit and node
/// 0 for outside; an edge is the lowest pass between two basins. Grown from outside by the least level (Prim's order).
/// </summary>
internal static class SpillLevels
{
    /// <summary>Levels by label; that of label 0 is minus infinity.</summary>
    public static float[] Solve(Grid<float> elevation, int[] label, int basins, CancellationToken cancel)
    {
        var passes = new PassTable(Math.Max(64, 4 * basins));
        CollectPasses(elevation, label, passes, cancel);
        var (first, to, pass) = passes.ByNode(basins + 1);
        var level = new float[basins + 1];
        Array.Fill(level, float.PositiveInfinity);
        level[0] = float.NegativeInfinity;
        var done = new bool[basins + 1];
        var open = new CellHeap(Math.Max(16, basins / 4));
        open.Push(float.NegativeInfinity, 0);
        while (open.Count > 0)
        {
            var node = open.Pop();
            if (done[node]) continue;
            done[node] = true;
            for (var e = first[node]; e < first[node + 1]; e++)
            {
                var over = Math.Max(level[node], pass[e]);
                if (over >= level[to[e]]) continue;
                level[to[e]] = over;
                open.Push(over, to[e]);
            }
        }

        return level;
    }

    private static void CollectPasses(Grid<float> elevation, int[] label, PassTable passes, CancellationToken cancel)
    {
        int columns = elevation.Frame.Columns, rows = elevation.Frame.Rows;
        ReadOnlySpan<float> z = elevation.Cells;
        for (var r = 0; r < rows - 1; r++)
        {
            if ((r & 255) == 0) cancel.ThrowIfCancellationRequested();
            ReadOnlySpan<int> a = label.AsSpan(r * columns, columns), b = label.AsSpan((r + 1) * columns, columns)[..a.Length];
            ReadOnlySpan<float> za = z.Slice(r * columns, columns)[..a.Length], zb = z.Slice((r + 1) * columns, columns)[..a.Length];
            // Every pair of neighbours lies in two rows that touch: down, along the upper row, and both diagonals. The last row is rim,
            // all label 0.
            for (var c = 0; c < a.Length; c++)
            {
                if (a[c] != b[c]) passes.Add(a[c], b[c], Math.Max(za[c], zb[c]));
                if (c + 1 == a.Length) continue;
                if (a[c] != a[c + 1]) passes.Add(a[c], a[c + 1], Math.Max(za[c], za[c + 1]));
                if (a[c] != b[c + 1]) passes.Add(a[c], b[c + 1], Math.Max(za[c], zb[c + 1]));
                if (a[c + 1] != b[c]) passes.Add(a[c + 1], b[c], Math.Max(za[c + 1], zb[c]));
            }
        }
    }
}

/// <summary>The lowest pass between each pair of basins: a hash table with open addresses.</summary>
internal sealed class PassTable
{
    private ulong[] _pair;
    private float[] _pass;
    private int _count;
    private ulong _lastPair = ulong.MaxValue;
    private float _lastPass;

    public PassTable(int capacity)
    {
        var size = (int)System.Numerics.BitOperations.RoundUpToPowerOf2((uint)capacity);
        (_pair, _pass) = (new ulong[size], new float[size]);
    }

    /// <summary>Keeps the lower of this pass and the one known. 0 stands for an empty place: a pair always holds a label above 0.</summary>
    public void Add(int a, int b, float pass)
    {
        var pair = a < b ? ((ulong)(uint)a << 32) | (uint)b : ((ulong)(uint)b << 32) | (uint)a;
        // Neighbouring cells along a divide ask for the same pair again and again.
        if (pair == _lastPair && pass >= _lastPass) return;
        var at = Find(_pair, pair);
        if (_pair[at] == 0)
        {
            (_pair[at], _pass[at]) = (pair, pass);
            if (++_count > _pair.Length / 2) Grow();
        }
        else if (pass < _pass[at])
        {
            _pass[at] = pass;
        }
        else
        {
            pass = _pass[at];
        }

        (_lastPair, _lastPass) = (pair, pass);
    }

    /// <summary>Both directions of every pair, by node: edges of node n are First[n] to First[n + 1].</summary>
    public (int[] First, int[] To, float[] Pass) ByNode(int nodes)
    {
        var first = new int[nodes + 1];
        foreach (var pair in _pair)
        {
            if (pair == 0) continue;
            first[(int)(pair >> 32) + 1]++;
            first[(int)(uint)pair + 1]++;
        }

        for (var n = 0; n < nodes; n++) first[n + 1] += first[n];
        var next = first.AsSpan(0, nodes).ToArray();
        var to = new int[2 * _count];
        var pass = new float[2 * _count];
        for (var i = 0; i < _pair.Length; i++)
        {
            if (_pair[i] == 0) continue;
            int a = (int)(_pair[i] >> 32), b = (int)(uint)_pair[i];
            (to[next[a]], pass[next[a]++]) = (b, _pass[i]);
            (to[next[b]], pass[next[b]++]) = (a, _pass[i]);
        }

        return (first, to, pass);
    }

    private static int Find(ulong[] pairs, ulong pair)
    {
        var mask = pairs.Length - 1;
        var at = (int)((pair * 0x9E3779B97F4A7C15) >> 33) & mask;
        while (pairs[at] != 0 && pairs[at] != pair) at = (at + 1) & mask;
        return at;
    }

    private void Grow()
    {
        var (pairs, passes) = (new ulong[2 * _pair.Length], new float[2 * _pair.Length]);
        for (var i = 0; i < _pair.Length; i++)
        {
            if (_pair[i] == 0) continue;
            var at = Find(pairs, _pair[i]);
            (pairs[at], passes[at]) = (_pair[i], _pass[i]);
        }

        (_pair, _pass) = (pairs, passes);
    }
}
