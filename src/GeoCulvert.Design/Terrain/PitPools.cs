using System.Runtime.CompilerServices;

namespace GeoCulvert.Design.Terrain;

/// <summary>
/// Spill levels by pools that grow outward from the pits of a strip of rows. A pool takes in its lowest shore cell until that cell has lower
/// ground beside it: there it spills, and the way down from there leads to the rim, to a pool that is known to drain, or to another pit,
/// whose pool is grown next. Pools that spill into each other stand at one level; they become one and go on growing.
/// </summary>
/// <remarks>
/// Along such a chain levels never rise: the next pool is at or below the pass when it meets it. So a pool is settled as soon as its chain
/// is. What a cell is known as stands in one integer: pool * 4 + <see cref="Inside"/>, <see cref="Shore"/> or <see cref="Leads"/>. Pool 0
/// is outside. A pool that meets the rim of its strip is put by, with all that lead to it, until the strips are joined.
/// </remarks>
internal sealed partial class PitPools
{
    /// <summary>The cell is in the pool.</summary>
    public const int Inside = 1;

    /// <summary>The cell waits in the heap of the pool.</summary>
    public const int Shore = 2;

    /// <summary>The way down from the cell ends in the pool.</summary>
    public const int Leads = 3;

    /// <summary>A plateau at the rim of a strip, for later.</summary>
    private const int PutBy = 2;
    private const int Outside = 0;
    private const int Unknown = -1;

    private readonly float[] _z;
    private readonly byte[] _code;
    private readonly int[] _mark;
    private readonly int[] _step = new int[16];
    private readonly Stack<ShoreHeap> _spare = new();
    private readonly List<int> _chain = [];
    private readonly List<int> _way = [];
    private readonly List<int> _plateau = [];
    private readonly List<int> _later = [];
    private int[] _parent = [Outside];
    private float[] _level = [float.NegativeInfinity];
    private ShoreHeap?[] _shore = [null];
    private int _from;
    private int _to;
    private long _mostInside = long.MaxValue;

    /// <summary>Pools on a strip of rows.</summary>
    /// <param name="elevation">Elevations, m; NaN is nodata.</param>
    /// <param name="code">Steepest descent of the untouched surface, with its marks.</param>
    /// <param name="mark">A zero for every cell.</param>
    /// <param name="fromRow">First row of the strip.</param>
    /// <param name="toRow">Row after its last.</param>
    public PitPools(Grid<float> elevation, byte[] code, int[] mark, int fromRow, int toRow)
    {
        (_z, _code, _mark) = (elevation.Cells, code, mark);
        FlowAccumulation.Steps(elevation.Frame, _step);
        Columns = elevation.Frame.Columns;
        // Cells whose eight neighbours are all in the strip.
        _from = fromRow == 0 ? 0 : (fromRow + 1) * Columns;
        _to = toRow == elevation.Frame.Rows ? _z.Length : (toRow - 1) * Columns;
        FromCell = fromRow * Columns;
        ToCell = toRow * Columns;
    }

    private int Columns { get; }

    private int FromCell { get; set; }

    private int ToCell { get; set; }

    /// <summary>Pools so far, outside included.</summary>
    public int Count { get; private set; } = 1;

    /// <summary>Cells taken into pools.</summary>
    public long InsideCells { get; private set; }

    /// <summary>Grows the pools of all pits of the strip. False when more than a number of cells were taken in.</summary>
    public bool Grow(long mostInside, CancellationToken cancel)
    {
        _mostInside = mostInside;
        var turns = 0;
        for (var at = FromCell; ; at++)
        {
            var ahead = _code.AsSpan(at, ToCell - at).IndexOf(SteepestDescent.Flat);
            if (ahead < 0) return true;
            at += ahead;
            if ((_mark[at] & 3) == Inside || _mark[at] == PutBy) continue;
            if ((++turns & 0xFFFF) == 0) cancel.ThrowIfCancellationRequested();
            if (!Settle(at)) return false;
        }
    }

    /// <summary>The levels of the pools by number; that of pool 0 is minus infinity.</summary>
    public float[] Levels()
    {
        var level = new float[Count];
        for (var p = 0; p < Count; p++) level[p] = _level[Root(p)] + 0f; // -0 becomes 0
        return level;
    }

    private bool Settle(int pit)
    {
        var first = PoolAt(pit);
        if (first <= 0) return true;
        return SettleFrom(first);
    }

    private bool SettleFrom(int first)
    {
        _chain.Clear();
        _chain.Add(first);
        while (true)
        {
            var pool = _chain[^1];
            var exit = Flood(pool);
            if (InsideCells > _mostInside) return false;
            var next = exit < 0 ? Unknown : Lead(exit);
            if (next == Unknown) return true;
            if (_shore[next] is null)
            {
                foreach (var settled in _chain) Release(settled);
                return true;
            }

            var at = _chain.LastIndexOf(next);
            if (at < 0)
            {
                _chain.Add(next);
                continue;
            }

            for (var k = _chain.Count - 1; k > at; k--) _chain[at] = Join(_chain[at], _chain[k]);
            _chain.RemoveRange(at + 1, _chain.Count - at - 1);
        }
    }

    /// <summary>Takes cells in until the lowest of the shore has lower ground beside it; returns that ground, or -1 at the rim of the strip.</summary>
    [MethodImpl(MethodImplOptions.AggressiveOptimization)]
    private int Flood(int pool)
    {
        var shore = _shore[pool]!;
        var z = _z;
        var mark = _mark;
        var code = _code;
        ReadOnlySpan<int> step = _step;
        int inside = (pool << 2) | Inside, waiting = (pool << 2) | Shore;
        while (true)
        {
            if (shore.Count == 0) throw new InvalidOperationException("A pool has no way out.");
            var cell = shore.Lowest;
            var known = mark[cell];
            if ((known & 3) == Inside)
            {
                if (Root(known >> 2) == pool)
                {
                    shore.Drop();
                    continue;
                }

                if (z[cell] > _level[pool]) _level[pool] = z[cell];
                return cell;
            }

            if (cell < _from || cell >= _to) return -1;
            var height = z[cell];
            var own = code[cell];
            if ((own & SteepestDescent.Rim) != 0)
            {
                if (height > _level[pool]) _level[pool] = height;
                return cell;
            }

            // The steepest way is most often the way out.
            var exit = cell + step[own & 15];
            if (z[exit] < height && !IsIn(mark[exit], pool, inside))
            {
                if (height > _level[pool]) _level[pool] = height;
                return exit;
            }

            for (var k = 1; k <= 8; k++)
            {
                var n = cell + step[k];
                if (z[n] > height) continue;
                var m = mark[n];
                if (IsIn(m, pool, inside)) continue;
                if (z[n] == height && (m & 3) != Inside) continue;
                if (height > _level[pool]) _level[pool] = height;
                return n;
            }

            shore.Drop();
            mark[cell] = inside;
            InsideCells++;
            for (var k = 1; k <= 8; k++)
            {
                var n = cell + step[k];
                if (z[n] < height) continue;
                var m = mark[n];
                if (m == inside || m == waiting || IsIn(m, pool, inside)) continue;
                if ((m & 3) != Inside) mark[n] = waiting;
                shore.Push(z[n], n);
            }

            if (height > _level[pool]) _level[pool] = height;
            if (InsideCells > _mostInside) return -1;
        }
    }

    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    private bool IsIn(int mark, int pool, int inside) => mark == inside || ((mark & 3) == Inside && Root(mark >> 2) == pool);

    /// <summary>The pool in which the way down from a cell ends; one that starts there when nothing is known of it yet.</summary>
    private int Lead(int cell)
    {
        _way.Clear();
        int found;
        while (true)
        {
            if (cell < FromCell || cell >= ToCell)
            {
                found = Unknown;
                break;
            }

            var known = _mark[cell];
            if ((known & 3) is Inside or Leads)
            {
                found = Root(known >> 2);
                break;
            }

            var code = _code[cell];
            if ((code & SteepestDescent.Rim) != 0)
            {
                found = Outside;
                break;
            }

            if (code == SteepestDescent.Flat)
            {
                if (known == PutBy)
                {
                    found = Unknown;
                    break;
                }

                found = PoolAt(cell);
                if (found != Outside) break;
                continue; // a plateau with a way out: it has directions now
            }

            _way.Add(cell);
            cell += _step[code & 15];
        }

        if (found != Unknown)
        {
            foreach (var passed in _way) _mark[passed] = (found << 2) | Leads;
        }

        return found;
    }
}
