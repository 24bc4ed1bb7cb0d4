using GeoCulvert.Design.Terrain;

namespace GeoCulvert.Design.Watersheds;

/// <summary>
/// All cell edges between different labels, each once for each side that has a label. An edge is coded as corner * 4 + direction: it runs
/// from the corner (row * (columns + 1) + column, row 0 north) east 0, north 1, west 2 or south 3, with its inside on the left.
/// </summary>
internal sealed class LabelEdges
{
    private readonly List<long> _codes = [];
    private readonly List<int> _inside = [];
    private readonly List<int> _outside = [];

    private LabelEdges()
    {
    }

    public int Count => _codes.Count;

    public long Code(int i) => _codes[i];

    /// <summary>Outlet on the left of the edge.</summary>
    public int Inside(int i) => _inside[i];

    /// <summary>Outlet on the right; -1 none, -2 no terrain.</summary>
    public int Outside(int i) => _outside[i];

    public bool Contact(int i) => _outside[i] == -2;

    public static LabelEdges Collect(Grid<int> labels, int outletCount, Func<int, bool>? hasTerrain)
    {
        var edges = new LabelEdges();
        int rows = labels.Frame.Rows, columns = labels.Frame.Columns;
        long across = columns + 1;
        var cells = labels.Cells;
        for (var row = 0; row <= rows; row++)
            for (var column = 0; column <= columns; column++)
            {
                var cell = (row * columns) + column;
                bool rowIn = row < rows, columnIn = column < columns;
                var here = rowIn && columnIn ? cells[cell] : 0;
                if (here < 0 || here > outletCount) throw new ArgumentException($"Label {here} names none of {outletCount} outlets.", nameof(labels));
                var corner = (row * across) + column;
                if (columnIn)
                {
                    var above = row > 0 ? cells[cell - columns] : 0;
                    if (above != here)
                    {
                        // Lower side of the cell above: eastward from this corner. Upper side of this cell: westward from the next corner.
                        if (above > 0) edges.Add((corner * 4) + 0, above, here, rowIn ? cell : -1, hasTerrain);
                        if (here > 0) edges.Add(((corner + 1) * 4) + 2, here, above, row > 0 ? cell - columns : -1, hasTerrain);
                    }
                }

                if (rowIn)
                {
                    var before = column > 0 ? cells[cell - 1] : 0;
                    if (before != here)
                    {
                        // Right side of the cell before: northward from the corner below. Left side of this cell: southward from this corner.
                        if (before > 0) edges.Add(((corner + across) * 4) + 1, before, here, columnIn ? cell : -1, hasTerrain);
                        if (here > 0) edges.Add((corner * 4) + 3, here, before, column > 0 ? cell - 1 : -1, hasTerrain);
                    }
                }
            }

        return edges;
    }

    private void Add(long code, int inside, int outside, int outsideCell, Func<int, bool>? hasTerrain)
    {
        _codes.Add(code);
        _inside.Add(inside - 1);
        _outside.Add(outside > 0 ? outside - 1 : outsideCell < 0 || (hasTerrain is not null && !hasTerrain(outsideCell)) ? -2 : -1);
    }
}
