using System.Runtime.CompilerServices;
using System.Runtime.InteropServices;
using System.Runtime.Intrinsics;

namespace GeoCulvert.Design.Terrain;

/// <summary>
/// The walk that counts: from every source down, stopping where an inflow is still missing. One byte a cell holds the direction (low four bits)
/// and the inflows still missing (high four bits); four walks run side by side, so that one computes while another waits for memory.
/// </summary>
internal static class AccumulationWalk
{
    /// <summary>In place of the missing inflows: a cell without inflow, where a walk begins.</summary>
    private const byte Source = 0xF0;

    /// <summary>What walks carry out of their strip: the cell they enter and the cells drained so far.</summary>
    public readonly record struct Crossing(int Cell, int Cells);

    /// <summary>Writes the number of inflows beside the direction of every cell of some rows; marks of other kinds are wiped.</summary>
    /// <param name="code">Directions; the high bits of the rows themselves may hold anything, those around are not read.</param>
    /// <param name="frame">Frame of the grid.</param>
    /// <param name="fromRow">First row.</param>
    /// <param name="toRow">Row after the last.</param>
    public static void TallyInflows(byte[] code, in GridFrame frame, int fromRow, int toRow)
    {
        int columns = frame.Columns, rows = frame.Rows;
        Span<byte> none = new byte[columns];
        for (var r = fromRow; r < toRow; r++)
        {
            var here = code.AsSpan(r * columns, columns);
            ReadOnlySpan<byte> above = r > 0 ? code.AsSpan((r - 1) * columns, columns) : none;
            ReadOnlySpan<byte> below = r + 1 < rows ? code.AsSpan((r + 1) * columns, columns) : none;
            TallyRow(above, here, below);
        }
    }

    /// <summary>Walks from the sources of some rows; every walk ends at the latest where it leaves them, which is noted.</summary>
    [MethodImpl(MethodImplOptions.AggressiveOptimization)]
    public static List<Crossing> Run(byte[] code, int[] counts, in GridFrame frame, int fromRow, int toRow)
    {
        var crossings = new List<Crossing>();
        Span<int> steps = stackalloc int[16];
        FlowAccumulation.Steps(frame, steps);
        ref var step = ref MemoryMarshal.GetReference(steps);
        ref var w = ref MemoryMarshal.GetArrayDataReference(code);
        ref var a = ref MemoryMarshal.GetArrayDataReference(counts);
        int from = fromRow * frame.Columns, to = toRow * frame.Columns;
        var length = (uint)(to - from);
        var sources = new int[8192];
        ref var source = ref MemoryMarshal.GetArrayDataReference(sources);
        int held = 0, at = from;
        Span<int> lane = [-1, -1, -1, -1];
        var started = false;
        while (true)
        {
            held = Gather(code, ref at, to, sources, held);
            if (held < 8) break;
            var i = 0;
            if (!started)
            {
                for (; i < 4; i++) lane[i] = sources[i];
                started = true;
            }

            int c0 = lane[0], c1 = lane[1], c2 = lane[2], c3 = lane[3];
            while (i <= held - 4)
            {
                c0 = Step(c0, ref i, ref w, ref a, ref step, ref source, from, length, crossings);
                c1 = Step(c1, ref i, ref w, ref a, ref step, ref source, from, length, crossings);
                c2 = Step(c2, ref i, ref w, ref a, ref step, ref source, from, length, crossings);
                c3 = Step(c3, ref i, ref w, ref a, ref step, ref source, from, length, crossings);
            }

            (lane[0], lane[1], lane[2], lane[3]) = (c0, c1, c2, c3);
            sources.AsSpan(i, held - i).CopyTo(sources);
            held -= i;
        }

        if (started)
        {
            foreach (var cell in lane) Walk(cell, code, counts, steps, from, length, crossings);
        }

        foreach (var cell in sources.AsSpan(0, held)) Walk(cell, code, counts, steps, from, length, crossings);
        return crossings;
    }

    /// <summary>Goes on where walks left their strips, now over the whole grid.</summary>
    public static void Join(byte[] code, int[] counts, in GridFrame frame, IEnumerable<Crossing> crossings)
    {
        Span<int> steps = stackalloc int[16];
        FlowAccumulation.Steps(frame, steps);
        foreach (var (cell, cells) in crossings)
        {
            counts[cell] += cells;
            code[cell] -= 16;
            if (code[cell] < 16) Walk(cell, code, counts, steps, 0, (uint)code.Length, null);
        }
    }

    /// <summary>Leaves the bare directions. False when a cell was never left: the directions hold a circle.</summary>
    public static bool Strip(Span<byte> code)
    {
        var i = 0;
        var whole = true;
        if (Vector256.IsHardwareAccelerated)
        {
            Vector256<byte> low = Vector256.Create((byte)15), high = Vector256.Create((byte)0xF0), bad = Vector256<byte>.Zero;
            for (; i + Vector256<byte>.Count <= code.Length; i += Vector256<byte>.Count)
            {
                var v = Vector256.Create((ReadOnlySpan<byte>)code.Slice(i, Vector256<byte>.Count));
                Vector256<byte> bare = v & low, missing = v & high;
                bad |= ~(Vector256.Equals(bare, Vector256<byte>.Zero) | Vector256.Equals(missing, Vector256<byte>.Zero) | Vector256.Equals(missing, high));
                bare.CopyTo(code[i..]);
            }

            whole = bad == Vector256<byte>.Zero;
        }

        for (; i < code.Length; i++)
        {
            whole &= (code[i] & 15) == 0 || (code[i] & Source) is 0 or Source;
            code[i] &= 15;
        }

        return whole;
    }

    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    private static int Step(
        int cell, ref int i, ref byte w, ref int a, ref int step, ref int source, int from, uint length, List<Crossing> crossings)
    {
        var next = cell + Unsafe.Add(ref step, Unsafe.Add(ref w, cell) & 15);
        var waiting = Unsafe.Add(ref source, i);
        if ((uint)(next - from) >= length)
        {
            crossings.Add(new(next, Unsafe.Add(ref a, cell)));
            i++;
            return waiting;
        }

        Unsafe.Add(ref a, next) += Unsafe.Add(ref a, cell);
        var missing = Unsafe.Add(ref w, next) - 16;
        Unsafe.Add(ref w, next) = (byte)missing;

        // Without a branch, which would be guessed wrong at the end of every walk: all ones when nothing is missing any more.
        var goOn = (missing - 16) >> 31;
        i += 1 + goOn;
        return waiting ^ ((waiting ^ next) & goOn);
    }

    private static void Walk(int cell, byte[] code, int[] counts, ReadOnlySpan<int> steps, int from, uint length, List<Crossing>? crossings)
    {
        while (true)
        {
            var next = cell + steps[code[cell] & 15];
            if ((uint)(next - from) >= length)
            {
                crossings!.Add(new(next, counts[cell]));
                return;
            }

            counts[next] += counts[cell];
            code[next] -= 16;
            if (code[next] >= 16) return;
            cell = next;
        }
    }

    /// <summary>Appends sources until the buffer is nearly full or the rows end.</summary>
    private static int Gather(byte[] code, ref int at, int to, int[] sources, int held)
    {
        while (at < to && held + 32 <= sources.Length)
        {
            if (Vector256.IsHardwareAccelerated && at + Vector256<byte>.Count <= to)
            {
                var v = Vector256.Create(code.AsSpan(at, Vector256<byte>.Count));
                var bits = Vector256.Equals(v & Vector256.Create(Source), Vector256.Create(Source)).ExtractMostSignificantBits();
                for (; bits != 0; bits &= bits - 1) sources[held++] = at + System.Numerics.BitOperations.TrailingZeroCount(bits);
                at += Vector256<byte>.Count;
                continue;
            }

            if ((code[at] & Source) == Source) sources[held++] = at;
            at++;
        }

        return held;
    }

    private static void TallyRow(ReadOnlySpan<byte> above, Span<byte> here, ReadOnlySpan<byte> below)
    {
        var last = here.Length - 1;
        var c = 0;
        if (here.Length > 1)
        {
            here[0] = One(above, here, below, 0);
            c = 1;
            if (Vector256.IsHardwareAccelerated)
            {
                for (; c + Vector256<byte>.Count <= last; c += Vector256<byte>.Count) Many(above, here, below, c).CopyTo(here[c..]);
            }
        }

        for (; c <= last; c++) here[c] = One(above, here, below, c);
    }

    private static Vector256<byte> Many(ReadOnlySpan<byte> above, ReadOnlySpan<byte> here, ReadOnlySpan<byte> below, int c)
    {
        var own = Low(here, c);
        // A neighbour drains in when its code is the opposite of the code that leads to it; an equal lane is -1.
        var minus = Is(Low(above, c), 5) + Is(Low(above, c + 1), 6) + Is(Low(here, c + 1), 7) + Is(Low(below, c + 1), 8)
            + Is(Low(below, c), 1) + Is(Low(below, c - 1), 2) + Is(Low(here, c - 1), 3) + Is(Low(above, c - 1), 4);
        var inflows = Vector256<byte>.Zero - minus;
        var outlet = Is(own, 0);
        inflows -= outlet; // an outlet waits for one inflow more than it has, for ever
        inflows = Vector256.ConditionalSelect(Vector256.Equals(inflows, Vector256<byte>.Zero), Vector256.Create((byte)15), inflows);
        return own | (inflows << 4);
    }

    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    private static Vector256<byte> Is(Vector256<byte> code, byte value) => Vector256.Equals(code, Vector256.Create(value));

    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    private static Vector256<byte> Low(ReadOnlySpan<byte> row, int c) => Vector256.Create(row.Slice(c, Vector256<byte>.Count)) & Vector256.Create((byte)15);

    private static byte One(ReadOnlySpan<byte> above, ReadOnlySpan<byte> here, ReadOnlySpan<byte> below, int c)
    {
        var inflows = 0;
        if ((above[c] & 15) == 5) inflows++;
        if ((below[c] & 15) == 1) inflows++;
        if (c > 0)
        {
            if ((above[c - 1] & 15) == 4) inflows++;
            if ((here[c - 1] & 15) == 3) inflows++;
            if ((below[c - 1] & 15) == 2) inflows++;
        }

        if (c + 1 < here.Length)
        {
            if ((above[c + 1] & 15) == 6) inflows++;
            if ((here[c + 1] & 15) == 7) inflows++;
            if ((below[c + 1] & 15) == 8) inflows++;
        }

        var own = here[c] & 15;
        if (own == 0) inflows++;
        return (byte)(own | ((inflows == 0 ? 15 : inflows) << 4));
    }
}
