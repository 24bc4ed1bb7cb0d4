namespace GeoCulvert.Design.Terrain;

/// <summary>Chains of neighbouring cells.</summary>
internal static class CellWay
{
    /// <summary>Length of the step between two neighbouring cells, m.</summary>
    public static double StepM(in GridFrame frame, int from, int to)
    {
        var (rows, columns) = Apart(frame, from, to);
        return Math.Sqrt((columns * frame.CellWidthM * columns * frame.CellWidthM) + (rows * frame.CellHeightM * rows * frame.CellHeightM));
    }

    /// <summary>Length along cell centres, m.</summary>
    public static double LengthM(in GridFrame frame, IReadOnlyList<int> cells)
    {
        double length = 0;
        for (var i = 1; i < cells.Count; i++) length += StepM(frame, cells[i - 1], cells[i]);
        return length;
    }

    /// <summary>Whether two cells are neighbours, by an edge or a corner.</summary>
    public static bool Touch(in GridFrame frame, int a, int b)
    {
        var (rows, columns) = Apart(frame, a, b);
        return a != b && Math.Abs(rows) <= 1 && Math.Abs(columns) <= 1;
    }

    private static (int Rows, int Columns) Apart(in GridFrame frame, int a, int b) =>
        ((b / frame.Columns) - (a / frame.Columns), (b % frame.Columns) - (a % frame.Columns));
}
