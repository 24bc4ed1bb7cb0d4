using System.Runtime.CompilerServices;
using System.Runtime.InteropServices;
using System.Runtime.Intrinsics;

namespace GeoCulvert.Design.Terrain;

/// <summary>
/// Steepest descent by true distance on any surface. Rule, so that every implementation agrees to the bit: among the two or four
/// neighbours of the same kind of step (north-south, east-west, diagonal) the lowest counts, first clockwise; among these the one
/// with the largest fall / length in double precision; among equals the first code clockwise from north.
/// </summary>
internal static class SteepestDescent
{
    /// <summary>Set beside the code of cells that touch the edge of the grid or nodata.</summary>
    public const byte Rim = 16;

    /// <summary>An inner cell with nothing lower; alone until something gives it a direction.</summary>
    public const byte Flat = 32;

    /// <summary>
    /// Code of every cell of some rows: <see cref="Rim"/> beside it where the cell touches the edge of the grid or nodata or is a sink (minus
    /// infinity), <see cref="Flat"/> for other cells with nothing lower, 0 for nodata.
    /// </summary>
    public static void Compute(Grid<float> surface, byte[] code, int fromRow, int toRow)
    {
        var frame = surface.Frame;
        int columns = frame.Columns, rows = frame.Rows;
        ReadOnlySpan<float> z = surface.Cells;
        double height = frame.CellHeightM, width = frame.CellWidthM, diagonal = D8.StepLengthM(frame, 2);
        bool specialAbove = fromRow > 0 && HasSpecial(z.Slice((fromRow - 1) * columns, columns));
        bool specialHere = fromRow < toRow && HasSpecial(z.Slice(fromRow * columns, columns));
        for (var r = fromRow; r < toRow; r++)
        {
            var here = z.Slice(r * columns, columns);
            var codes = code.AsSpan(r * columns, columns);
            var specialBelow = r + 1 < rows && HasSpecial(z.Slice((r + 1) * columns, columns));
            if (r == 0 || r == rows - 1 || columns < 3)
            {
                for (var c = 0; c < columns; c++) codes[c] = AtRim(surface, r, c);
            }
            else
            {
                codes[0] = AtRim(surface, r, 0);
                codes[^1] = AtRim(surface, r, columns - 1);
                Row(z.Slice((r - 1) * columns, columns), here, z.Slice((r + 1) * columns, columns), codes, height, width, diagonal);
                if (specialAbove || specialHere || specialBelow) MarkSpecial(surface, r, codes);
            }

            (specialAbove, specialHere) = (specialHere, specialBelow);
        }
    }

    /// <summary>Code of one cell anywhere in the grid, without the rim mark.</summary>
    public static byte At(Grid<float> surface, int row, int column)
    {
        var frame = surface.Frame;
        var z = surface[row, column];
        Span<float> near = stackalloc float[9];
        for (var k = 1; k <= 8; k++)
        {
            int r = row + D8.RowStep[k], c = column + D8.ColumnStep[k];
            near[k] = frame.Contains(r, c) ? surface[r, c] : float.NaN;
        }

        return Choose(
            z, near[1], near[2], near[3], near[4], near[5], near[6], near[7], near[8],
            frame.CellHeightM, frame.CellWidthM, D8.StepLengthM(frame, 2));
    }

    private static byte AtRim(Grid<float> surface, int row, int column) =>
        float.IsNaN(surface[row, column]) ? (byte)0 : (byte)(At(surface, row, column) | Rim);

    private static void MarkSpecial(Grid<float> surface, int row, Span<byte> codes)
    {
        for (var c = 1; c < codes.Length - 1; c++)
        {
            var z = surface[row, c];
            if (float.IsNaN(z)) codes[c] = 0;
            else if (float.IsNegativeInfinity(z) || EdgeCells.IsEdge(surface, row, c)) codes[c] = (byte)((codes[c] & 15) | Rim);
        }
    }

    /// <summary>Whether a row holds nodata or a sink.</summary>
    private static bool HasSpecial(ReadOnlySpan<float> row)
    {
        var c = 0;
        if (Vector256.IsHardwareAccelerated)
        {
            var all = Vector256<float>.AllBitsSet;
            var sink = Vector256.Create(float.NegativeInfinity);
            for (; c + Vector256<float>.Count <= row.Length; c += Vector256<float>.Count)
                all &= Vector256.GreaterThan(At(row, c), sink);
            if (all.AsInt32() != Vector256<int>.AllBitsSet) return true;
        }

        for (; c < row.Length; c++)
        {
            if (!(row[c] > float.NegativeInfinity)) return true;
        }

        return false;
    }

    private static void Row(
        ReadOnlySpan<float> above, ReadOnlySpan<float> here, ReadOnlySpan<float> below, Span<byte> codes, double height, double width, double diagonal)
    {
        above = above[..here.Length];
        below = below[..here.Length];
        codes = codes[..here.Length];
        var c = 1;
        if (Vector256.IsHardwareAccelerated)
        {
            for (; c + Vector256<float>.Count < here.Length; c += Vector256<float>.Count)
            {
                var chosen = Choose(
                    At(here, c), At(above, c), At(above, c + 1), At(here, c + 1), At(below, c + 1), At(below, c), At(below, c - 1), At(here, c - 1), At(above, c - 1),
                    Vector256.Create(height), Vector256.Create(width), Vector256.Create(diagonal));
                chosen = Vector256.ConditionalSelect(Vector256.Equals(chosen, Vector256<int>.Zero), Vector256.Create((int)Flat), chosen);
                var narrow = Vector128.Narrow(chosen.GetLower(), chosen.GetUpper());
                MemoryMarshal.Write(codes[c..], Vector128.Narrow(narrow, narrow).AsUInt64().ToScalar());
            }
        }

        for (; c < here.Length - 1; c++)
        {
            var chosen = Choose(
                here[c], above[c], above[c + 1], here[c + 1], below[c + 1], below[c], below[c - 1], here[c - 1], above[c - 1], height, width, diagonal);
            codes[c] = chosen == 0 ? Flat : chosen;
        }
    }

    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    private static Vector256<float> At(ReadOnlySpan<float> row, int column) => Vector256.Create(row.Slice(column, Vector256<float>.Count));

    /// <summary>The rule for eight cells at once; the plain form below is its twin.</summary>
    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    private static Vector256<int> Choose(
        Vector256<float> z, Vector256<float> n, Vector256<float> ne, Vector256<float> e, Vector256<float> se, Vector256<float> s, Vector256<float> sw,
        Vector256<float> w, Vector256<float> nw, Vector256<double> height, Vector256<double> width, Vector256<double> diagonal)
    {
        var low = z;
        var code = Vector256<int>.Zero;
        Lower(ne, 2, ref low, ref code);
        Lower(se, 4, ref low, ref code);
        Lower(sw, 6, ref low, ref code);
        Lower(nw, 8, ref low, ref code);
        var (zLeft, zRight) = Vector256.Widen(z);
        var (left, right) = Vector256.Widen(low);
        var bestLeft = (zLeft - left) / diagonal;
        var bestRight = (zRight - right) / diagonal;

        low = z;
        var at = Vector256<int>.Zero;
        Lower(n, 1, ref low, ref at);
        Lower(s, 5, ref low, ref at);
        (left, right) = Vector256.Widen(low);
        var (slopeLeft, slopeRight) = ((zLeft - left) / height, (zRight - right) / height);
        code = Vector256.ConditionalSelect(Steeper(slopeLeft, slopeRight, bestLeft, bestRight, at, code), at, code);
        (bestLeft, bestRight) = (Larger(slopeLeft, bestLeft), Larger(slopeRight, bestRight));

        low = z;
        at = Vector256<int>.Zero;
        Lower(e, 3, ref low, ref at);
        Lower(w, 7, ref low, ref at);
        (left, right) = Vector256.Widen(low);
        (slopeLeft, slopeRight) = ((zLeft - left) / width, (zRight - right) / width);
        return Vector256.ConditionalSelect(Steeper(slopeLeft, slopeRight, bestLeft, bestRight, at, code), at, code);
    }

    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    private static void Lower(Vector256<float> neighbour, int its, ref Vector256<float> low, ref Vector256<int> code)
    {
        var lower = Vector256.LessThan(neighbour, low);
        low = Vector256.ConditionalSelect(lower, neighbour, low);
        code = Vector256.ConditionalSelect(lower.AsInt32(), Vector256.Create(its), code);
    }

    // A nodata cell has NaN slopes: never larger, never equal.
    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    private static Vector256<double> Larger(Vector256<double> slope, Vector256<double> best) =>
        Vector256.ConditionalSelect(Vector256.GreaterThan(slope, best), slope, best);

    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    private static Vector256<int> Steeper(
        Vector256<double> left, Vector256<double> right, Vector256<double> bestLeft, Vector256<double> bestRight, Vector256<int> at, Vector256<int> code)
    {
        var steeper = Vector256.Narrow(Vector256.GreaterThan(left, bestLeft).AsInt64(), Vector256.GreaterThan(right, bestRight).AsInt64());
        var even = Vector256.Narrow(Vector256.Equals(left, bestLeft).AsInt64(), Vector256.Equals(right, bestRight).AsInt64());
        return steeper | (even & Vector256.LessThan(at, code));
    }

    // The plain form. Comparisons with NaN are false, so nodata is never chosen and a nodata cell chooses nothing.
    private static byte Choose(
        float z, float n, float ne, float e, float se, float s, float sw, float w, float nw, double height, double width, double diagonal)
    {
        var best = 0.0;
        byte code = 0;
        float low = z;
        byte at = 0;
        if (ne < low) (low, at) = (ne, 2);
        if (se < low) (low, at) = (se, 4);
        if (sw < low) (low, at) = (sw, 6);
        if (nw < low) (low, at) = (nw, 8);
        if (at != 0) (best, code) = (((double)z - low) / diagonal, at);

        (low, at) = (z, 0);
        if (n < low) (low, at) = (n, 1);
        if (s < low) (low, at) = (s, 5);
        if (at != 0)
        {
            var slope = ((double)z - low) / height;
            if (slope > best || (slope == best && at < code)) (best, code) = (slope, at);
        }

        (low, at) = (z, 0);
        if (e < low) (low, at) = (e, 3);
        if (w < low) (low, at) = (w, 7);
        if (at != 0)
        {
            var slope = ((double)z - low) / width;
            if (slope > best || (slope == best && at < code)) code = at;
        }

        return code;
    }
}
