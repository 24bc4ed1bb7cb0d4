using GeoCulvert.Design.Terrain;

namespace GeoCulvert.Design.Tests.Crossings;

/// <summary>Tiny grids drawn as text: one line a row from the north, directions as arrows on the number pad round the 5 (8 north, 9 north-east, ...).</summary>
internal static class HandGrid
{
    private const string Pad = "589632147";

    public static Grid<byte> Directions(double cellM, params string[] rows)
    {
        var frame = new GridFrame(rows[0].Length, rows.Length, 0, rows.Length * cellM, cellM, cellM);
        return new(frame, [.. string.Concat(rows).Select(c => (byte)Pad.IndexOf(c, StringComparison.Ordinal))]);
    }

    /// <summary>Cells drained, counted the slow way: every cell walks down.</summary>
    public static Grid<int> Accumulation(Grid<byte> direction)
    {
        var result = new Grid<int>(direction.Frame);
        for (var i = 0; i < result.Cells.Length; i++)
            for (var c = i; c >= 0; c = Next(direction, c)) result.Cells[c]++;
        return result;
    }

    public static int Next(Grid<byte> direction, int cell)
    {
        int columns = direction.Frame.Columns, row = cell / columns, column = cell % columns;
        switch (direction.Cells[cell])
        {
            case 0: return -1;
            case 1: row--; break;
            case 2: row--; column++; break;
            case 3: column++; break;
            case 4: row++; column++; break;
            case 5: row++; break;
            case 6: row++; column--; break;
            case 7: column--; break;
            default: row--; column--; break;
        }

        return direction.Frame.Contains(row, column) ? (row * columns) + column : -1;
    }
}
