using System.Runtime.CompilerServices;

namespace GeoCulvert.Design.Terrain;

/// <summary>How pools begin, on single cells and on plateaus, and how they are joined.</summary>
internal sealed partial class PitPools
{
    /// <summary>
    /// Starts a pool at a cell with nothing lower. On a plateau all cells of the level are in it, unless the plateau has a way out: then its
    /// cells get directions toward it and the answer is <see cref="Outside"/>.
    /// </summary>
    private int PoolAt(int cell)
    {
        var height = _z[cell];
        _plateau.Clear();
        _plateau.Add(cell);
        var level = false;
        if (cell >= _from && cell < _to)
        {
            for (var k = 1; k <= 8; k++) level |= _z[cell + _step[k]] == height;
        }
        else
        {
            _mark[cell] = PutBy;
            _later.Add(cell);
            return Unknown;
        }

        if (level && GatherPlateau(height) is var known && known != Inside) return known;
        var pool = NewPool(height);
        var shore = _shore[pool]!;
        int inside = (pool << 2) | Inside, waiting = (pool << 2) | Shore;
        foreach (var c in _plateau) _mark[c] = inside;
        InsideCells += _plateau.Count;
        foreach (var c in _plateau)
        {
            for (var k = 1; k <= 8; k++)
            {
                var n = c + _step[k];
                var m = _mark[n];
                if (m == inside || m == waiting) continue;
                if ((m & 3) != Inside) _mark[n] = waiting;
                shore.Push(_z[n], n);
            }
        }

        return pool;
    }

    /// <summary>Gathers the plateau; <see cref="Inside"/> when it has no way out, else it gets directions and the answer is <see cref="Outside"/>.</summary>
    private int GatherPlateau(float height)
    {
        // While it is gathered, the plateau is known by a mark of its own.
        const int Gathered = (Outside << 2) | Leads;
        _mark[_plateau[0]] = Gathered;
        var (open, exits) = (0, 0);
        var edge = false;
        _way2.Clear();
        for (; open < _plateau.Count; open++)
        {
            var c = _plateau[open];
            if (c < _from || c >= _to)
            {
                edge = true;
                continue;
            }

            var exit = 0;
            for (var k = 1; k <= 8; k++)
            {
                var n = c + _step[k];
                if (_z[n] != height) continue;
                var m = _mark[n];
                if (_code[n] != SteepestDescent.Flat || (m & 3) == Inside)
                {
                    if (exit == 0) exit = k;
                    continue;
                }

                if (m == Gathered) continue;
                _mark[n] = Gathered;
                _plateau.Add(n);
            }

            if (exit == 0) continue;
            exits++;
            _way2.Add((c, exit));
        }

        if (edge)
        {
            foreach (var c in _plateau) _mark[c] = PutBy;
            _later.Add(_plateau[0]);
            return Unknown;
        }

        foreach (var c in _plateau) _mark[c] = 0;
        if (exits == 0) return Inside;

        // Breadth first from the ways out; the directions serve only to find the way down and are made anew on the filled surface.
        foreach (var (c, k) in _way2) _code[c] = (byte)(SteepestDescent.Flat | k);
        for (var head = 0; head < _way2.Count; head++)
        {
            var c = _way2[head].Cell;
            for (var k = 1; k <= 8; k++)
            {
                var n = c + _step[k];
                if (_code[n] != SteepestDescent.Flat || _z[n] != height || (_mark[n] & 3) == Inside) continue;
                _code[n] = (byte)(SteepestDescent.Flat | D8.Opposite((byte)k));
                _way2.Add((n, 0));
            }
        }

        return Outside;
    }

    private readonly List<(int Cell, int Code)> _way2 = [];

    private int NewPool(float level)
    {
        if (Count == _parent.Length)
        {
            var size = Math.Max(1024, 2 * Count);
            Array.Resize(ref _parent, size);
            Array.Resize(ref _level, size);
            Array.Resize(ref _shore, size);
        }

        _parent[Count] = Count;
        _level[Count] = level;
        _shore[Count] = _spare.TryPop(out var shore) ? shore : new ShoreHeap();
        return Count++;
    }

    private void Release(int pool)
    {
        var shore = _shore[pool]!;
        shore.Clear();
        _spare.Push(shore);
        _shore[pool] = null;
    }

    /// <summary>Makes one pool of two that stand at one level; that with the longer shore stays.</summary>
    private int Join(int a, int b)
    {
        if (_shore[a]!.Count < _shore[b]!.Count) (a, b) = (b, a);
        _parent[b] = a;
        if (_level[b] > _level[a]) _level[a] = _level[b];
        _shore[a]!.Absorb(_shore[b]!);
        Release(b);
        return a;
    }

    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    private int Root(int pool)
    {
        var parent = _parent;
        var up = parent[pool];
        return up == pool ? pool : Root(pool, up);
    }

    private int Root(int pool, int up)
    {
        var parent = _parent;
        while (up != pool)
        {
            var above = parent[up];
            parent[pool] = above;
            (pool, up) = (above, parent[above]);
        }

        return pool;
    }
}
