using System.Runtime.CompilerServices;

namespace GeoCulvert.Design.Terrain;

/// <summary>
/// Directions over flats, one connected flat at a time: toward lower and away from higher ground (Barnes, Lehman and Mulla 2014). Two
/// neighbouring cells with nothing lower are level with each other, so a flat is known by its marks alone.
/// </summary>
/// <remarks>
/// Barnes's mask is twice the steps to the way out, plus (farthest - steps from higher ground). "Farthest" is one number for a whole flat and
/// only cells of one flat are compared, so it is left out. Masks stand in a scratch of the size of the grid, where only flat cells are
/// touched; lists are as long as the largest flat.
/// </remarks>
internal sealed class FlatDrainage
{
    private const byte Flat = SteepestDescent.Flat;
    private const byte Met = 64;
    private const byte FromHigh = 128;

    private readonly float[] _z;
    private readonly byte[] _code;
    private readonly int[] _mask;
    private readonly int[] _step = new int[16];
    private readonly int _fromCell;
    private readonly int _toCell;
    private readonly int _from;
    private readonly int _to;
    private readonly List<int> _later = [];
    private int[] _flat = new int[256];
    private int[] _queue = new int[256];
    private int[] _high = new int[256];

    /// <summary>Flats of a strip of rows.</summary>
    /// <param name="filled">A surface without depressions.</param>
    /// <param name="code">Its steepest descent, with marks; receives the directions, with other marks.</param>
    /// <param name="mask">A number for every cell, whatever it holds; only those of flat cells are changed.</param>
    /// <param name="fromRow">First row of the strip.</param>
    /// <param name="toRow">Row after its last.</param>
    public FlatDrainage(Grid<float> filled, byte[] code, int[] mask, int fromRow, int toRow)
    {
        (_z, _code, _mask) = (filled.Cells, code, mask);
        var frame = filled.Frame;
        FlowAccumulation.Steps(frame, _step);
        (_fromCell, _toCell) = (fromRow * frame.Columns, toRow * frame.Columns);
        // Cells whose eight neighbours are all in the strip.
        _from = fromRow == 0 ? 0 : _fromCell + frame.Columns;
        _to = toRow == frame.Rows ? _z.Length : _toCell - frame.Columns;
    }

    /// <summary>Drains every flat that does not meet another strip; returns a cell of each of the others.</summary>
    public List<int> Drain()
    {
        for (var at = _fromCell; ; at++)
        {
            var ahead = _code.AsSpan(at, _toCell - at).IndexOf(Flat);
            if (ahead < 0) return _later;
            at += ahead;
            DrainAt(at);
        }
    }

    /// <summary>Drains the flat of a cell, unless that is done.</summary>
    [MethodImpl(MethodImplOptions.AggressiveOptimization)]
    public void DrainAt(int first)
    {
        if ((_code[first] & Met) != 0) return;
        var code = _code;
        var mask = _mask;
        ReadOnlySpan<int> step = _step;
        var (count, exits, highs) = Gather(first);
        if (count <= 1 || exits == 0) return;

        // Steps to the way out, breadth first. The way out itself is known already.
        var queue = _queue;
        for (int head = 0, tail = exits; head < tail; head++)
        {
            var cell = queue[head];
            var next = mask[cell] + 1;
            for (var k = 1; k <= 8; k++)
            {
                var n = cell + step[k];
                if ((code[n] & Flat) == 0 || mask[n] != 0) continue;
                mask[n] = next;
                queue[tail++] = n;
            }
        }

        if (highs == 0)
        {
            // No ground is higher: only the way out counts, and comparing steps is as good as comparing twice the steps.
        }
        else
        {
            AwayFromHigh(highs);
        }

        foreach (var cell in _flat.AsSpan(0, count))
        {
            if ((code[cell] & 15) != 0) continue;

            // The next step of a shortest way out lowers the mask by one at least: a lower neighbour is always there, and no circle closes.
            var best = mask[cell];
            var to = 0;
            for (var k = 1; k <= 8; k++)
            {
                var n = cell + step[k];
                if ((code[n] & Flat) == 0 || mask[n] >= best) continue;
                (best, to) = (mask[n], k);
            }

            code[cell] |= (byte)to;
        }
    }

    /// <summary>Finds the cells of a flat; those beside a way out get their direction and wait in the queue.</summary>
    private (int Cells, int Exits, int Highs) Gather(int first)
    {
        var z = _z;
        var code = _code;
        ReadOnlySpan<int> step = _step;
        var level = z[first];
        var (count, exits, highs) = (1, 0, 0);
        var meetsStrip = false;
        _flat[0] = first;
        code[first] = Flat | Met;
        _mask[first] = 0;
        for (var head = 0; head < count; head++)
        {
            var cell = _flat[head];
            if (cell < _from || cell >= _to)
            {
                meetsStrip = true;
                continue;
            }

            if (count + 8 > _flat.Length) GrowLists();
            var exit = 0;
            var beside = false;
            for (var k = 1; k <= 8; k++)
            {
                var n = cell + step[k];
                var its = code[n];
                if ((its & Flat) != 0)
                {
                    if ((its & Met) != 0) continue;
                    code[n] = Flat | Met;
                    _mask[n] = 0;
                    _flat[count++] = n;
                }
                else if (z[n] == level)
                {
                    if (exit == 0) exit = k;
                }
                else if (z[n] > level)
                {
                    beside = true;
                }
            }

            if (exit != 0)
            {
                code[cell] |= (byte)exit;
                _mask[cell] = 1;
                _queue[exits++] = cell;
            }

            if (beside) _high[highs++] = cell;
        }

        if (!meetsStrip) return (count, exits, highs);
        foreach (var cell in _flat.AsSpan(0, count)) code[cell] = Flat | FromHigh; // not to be met again before the strips are joined
        _later.Add(first);
        return (0, 0, 0);
    }

    /// <summary>Turns steps to the way out into masks: twice the steps less the steps from higher ground.</summary>
    private void AwayFromHigh(int highs)
    {
        var code = _code;
        var mask = _mask;
        ReadOnlySpan<int> step = _step;
        var queue = _queue;
        _high.AsSpan(0, highs).CopyTo(queue);
        foreach (var cell in queue.AsSpan(0, highs))
        {
            code[cell] |= FromHigh;
            mask[cell] = (2 * mask[cell]) - 1;
        }

        int steps = 1, last = highs;
        for (int head = 0, tail = highs; head < tail; head++)
        {
            if (head == last) (steps, last) = (steps + 1, tail);
            var cell = queue[head];
            for (var k = 1; k <= 8; k++)
            {
                var n = cell + step[k];
                if ((code[n] & (Flat | FromHigh)) != Flat) continue;
                code[n] |= FromHigh;
                mask[n] = (2 * mask[n]) - (steps + 1);
                queue[tail++] = n;
            }
        }
    }

    private void GrowLists()
    {
        var size = 2 * _flat.Length;
        Array.Resize(ref _flat, size);
        Array.Resize(ref _queue, size);
        Array.Resize(ref _high, size);
    }
}
