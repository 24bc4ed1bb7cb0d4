using GeoCulvert.Design.Terrain;
using NetTopologySuite.Geometries;

namespace GeoCulvert.Design.Crossings;

/// <summary>
/// Walks over a D8 direction grid (0 none; 1..8 clockwise from north). Cells are row-major indices; -1 stands for "no such cell".
/// </summary>
internal static class FlowSteps
{
    /// <summary>The cell that a cell drains to; -1 where it drains to none or out of the grid.</summary>
    public static int Downstream(Grid<byte> direction, int cell)
    {
        var d = direction.Cells[cell];
        return d == D8.None ? -1 : Neighbour(direction.Frame, cell, d);
    }

    /// <summary>The neighbour in a direction 1..8; -1 outside the grid.</summary>
    public static int Neighbour(GridFrame frame, int cell, int d)
    {
        int row = (cell / frame.Columns) + D8.RowStep[d], column = (cell % frame.Columns) + D8.ColumnStep[d];
        return frame.Contains(row, column) ? (row * frame.Columns) + column : -1;
    }

    /// <summary>The neighbour with the largest accumulation among those that drain to a cell; -1 at a divide. Ties go to the first clockwise from north.</summary>
    public static int UpstreamMain(Grid<byte> direction, Grid<int> accumulation, int cell)
    {
        var best = -1;
        for (var d = 1; d <= 8; d++)
        {
            var n = Neighbour(direction.Frame, cell, d);
            if (n < 0 || direction.Cells[n] != D8.Opposite((byte)d)) continue;
            if (best < 0 || accumulation.Cells[n] > accumulation.Cells[best]) best = n;
        }

        return best;
    }

    /// <summary>Centre of a cell.</summary>
    public static Coordinate Centre(GridFrame frame, int cell) =>
        new(frame.CentreX(cell % frame.Columns), frame.CentreY(cell / frame.Columns));

    /// <summary>Cells downstream of a cell, itself first, until <paramref name="reachM"/> along the path, its end, or a loop of a faulty grid.</summary>
    public static List<int> DownstreamPath(Grid<byte> direction, int cell, double reachM) =>
        Walk(direction.Frame, cell, reachM, c => Downstream(direction, c));

    /// <summary>Cells up the main stem from a cell, itself first, until <paramref name="reachM"/> along the path or the divide.</summary>
    public static List<int> UpstreamPath(Grid<byte> direction, Grid<int> accumulation, int cell, double reachM) =>
        Walk(direction.Frame, cell, reachM, c => UpstreamMain(direction, accumulation, c));

    private static List<int> Walk(GridFrame frame, int cell, double reachM, Func<int, int> next)
    {
        var path = new List<int> { cell };
        var lengthM = 0.0;
        for (var c = next(cell); c >= 0 && path.Count <= frame.Count; c = next(c))
        {
            lengthM += Centre(frame, path[^1]).Distance(Centre(frame, c));
            path.Add(c);
            if (lengthM >= reachM) break;
        }

        return path;
    }
}
