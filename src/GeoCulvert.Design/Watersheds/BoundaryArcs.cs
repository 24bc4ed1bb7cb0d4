using System.Runtime.InteropServices;
using GeoCulvert.Design.Terrain;

namespace GeoCulvert.Design.Watersheds;

/// <summary>A line between two labels along cell edges, from node to node; directions are east 0, north 1, west 2, south 3.</summary>
/// <param name="Left">Outlet on the left; -1 for none.</param>
/// <param name="Right">Outlet on the right; -1 for none.</param>
/// <param name="FirstPoint">Place of the first of its points: both ends and every turn.</param>
/// <param name="PointCount">Number of points.</param>
/// <param name="StartNode">Node it leaves; -1 when it is closed without a node.</param>
/// <param name="EndNode">Node it reaches.</param>
/// <param name="StartDirection">Direction of its first edge.</param>
/// <param name="EndDirection">Direction of its last edge.</param>
/// <param name="EastWest">Edges along a row.</param>
/// <param name="NorthSouth">Edges along a column.</param>
/// <param name="EastWestContact">Those along a row beyond which there is no terrain.</param>
/// <param name="NorthSouthContact">Those along a column beyond which there is no terrain.</param>
/// <param name="TwiceArea">Sum of x y' - x' y over its edges, y northward, in cells: it adds up to twice the area of a ring of arcs.</param>
internal readonly record struct BoundaryArc(
    int Left, int Right, int FirstPoint, int PointCount, int StartNode, int EndNode, int StartDirection, int EndDirection,
    int EastWest, int NorthSouth, int EastWestContact, int NorthSouthContact, long TwiceArea)
{
    public bool IsClosed => StartNode < 0;
}

/// <summary>
/// All lines between labels, each once. A node is a corner where three or more edges between labels meet: three labels, or two in a
/// checkerboard. Every outline, local or total, is made of whole arcs, so neighbours share their vertices.
/// </summary>
internal sealed class BoundaryArcs
{
    private readonly Grid<int> _labels;
    private readonly Func<int, bool>? _hasTerrain;
    private readonly int _rows;
    private readonly int _columns;
    private readonly ulong[] _walkedEast;
    private readonly ulong[] _walkedSouth;
    private readonly Dictionary<long, int> _nodes = [];
    private readonly List<BoundaryArc> _arcs = [];
    private readonly List<(int Column, int Row)> _points = [];

    private BoundaryArcs(Grid<int> labels, Func<int, bool>? hasTerrain)
    {
        (_labels, _hasTerrain, _rows, _columns) = (labels, hasTerrain, labels.Frame.Rows, labels.Frame.Columns);
        var words = (((_rows + 1L) * (_columns + 1L)) + 63) / 64;
        (_walkedEast, _walkedSouth) = (new ulong[words], new ulong[words]);
    }

    public ReadOnlySpan<BoundaryArc> Arcs => CollectionsMarshal.AsSpan(_arcs);

    public int NodeCount => _nodes.Count;

    /// <summary>Corners of an arc: column and row, row 0 north.</summary>
    public ReadOnlySpan<(int Column, int Row)> Points(in BoundaryArc arc) => CollectionsMarshal.AsSpan(_points).Slice(arc.FirstPoint, arc.PointCount);

    public static BoundaryArcs Collect(Grid<int> labels, int outletCount, Func<int, bool>? hasTerrain)
    {
        foreach (var label in labels.Cells)
            if ((uint)label > (uint)outletCount) throw new ArgumentException($"Label {label} names none of {outletCount} outlets.", nameof(labels));
        var arcs = new BoundaryArcs(labels, hasTerrain);
        arcs.Scan(closed: false);
        arcs.Scan(closed: true);
        return arcs;
    }

    /// <summary>Walks the arcs from every node; then what is left, which is closed and first met at its north-west corner.</summary>
    private void Scan(bool closed)
    {
        ReadOnlySpan<int> cells = _labels.Cells, beyond = new int[_columns];
        for (var row = 0; row <= _rows; row++)
        {
            var upper = row > 0 ? cells.Slice((row - 1) * _columns, _columns) : beyond;
            var lower = row < _rows ? cells.Slice(row * _columns, _columns) : beyond;
            int aboveLeft = 0, left = 0;
            for (var column = 0; column < _columns; column++)
            {
                int above = upper[column], here = lower[column];
                if (here != left || here != above || left != aboveLeft) Corner(row, column, aboveLeft, above, left, here, closed);
                (aboveLeft, left) = (above, here);
            }

            if (left != 0 || aboveLeft != 0) Corner(row, _columns, aboveLeft, 0, left, 0, closed);
        }
    }

    private void Corner(int row, int column, int aboveLeft, int above, int left, int here, bool closed)
    {
        if (closed)
        {
            if (above != here && !Walked(row, column, 0)) Walk(row, column, 0, -1);
        }
        else if ((here != left ? 1 : 0) + (here != above ? 1 : 0) + (left != aboveLeft ? 1 : 0) + (above != aboveLeft ? 1 : 0) > 2)
        {
            for (var direction = 0; direction < 4; direction++)
                if (IsBoundary(row, column, direction) && !Walked(row, column, direction)) Walk(row, column, direction, NodeAt(row, column));
        }
    }

    private void Walk(int row, int column, int direction, int startNode)
    {
        var (leftCell, rightCell) = Sides(row, column, direction);
        int left = LabelOf(leftCell), right = LabelOf(rightCell);
        int startRow = row, startColumn = column, startDirection = direction, firstPoint = _points.Count, endNode;
        int eastWest = 0, northSouth = 0, eastWestContact = 0, northSouthContact = 0;
        long twice = 0;
        _points.Add((column, row));
        while (true)
        {
            var contact = (left == 0 && !HasTerrain(leftCell)) || (right == 0 && !HasTerrain(rightCell)) ? 1 : 0;
            if ((direction & 1) == 0) (eastWest, eastWestContact) = (eastWest + 1, eastWestContact + contact);
            else (northSouth, northSouthContact) = (northSouth + 1, northSouthContact + contact);
            MarkWalked(row, column, direction);
            int toRow = row + RowStep(direction), toColumn = column + ColumnStep(direction);
            twice += ((long)toColumn * row) - ((long)column * toRow); // y = -row
            (row, column) = (toRow, toColumn);

            int next = -1, ways = 0;
            for (var turn = -1; turn <= 1; turn++)
            {
                var d = (direction + turn) & 3;
                if (!IsBoundary(row, column, d)) continue;
                next = d;
                ways++;
            }

            endNode = ways > 1 ? NodeAt(row, column) : -1;
            if (ways > 1 || (startNode < 0 && row == startRow && column == startColumn)) break;
            if (next != direction) _points.Add((column, row));
            direction = next;
            (leftCell, rightCell) = Sides(row, column, direction);
        }

        _points.Add((column, row));
        _arcs.Add(new(
            left - 1, right - 1, firstPoint, _points.Count - firstPoint, startNode, endNode, startDirection, direction,
            eastWest, northSouth, eastWestContact, northSouthContact, twice));
    }

    private static int RowStep(int direction) => direction switch { 1 => -1, 3 => 1, _ => 0 };

    private static int ColumnStep(int direction) => direction switch { 0 => 1, 2 => -1, _ => 0 };

    private int NodeAt(int row, int column)
    {
        var corner = (row * (_columns + 1L)) + column;
        if (!_nodes.TryGetValue(corner, out var node)) _nodes[corner] = node = _nodes.Count;
        return node;
    }

    /// <summary>The cells left and right of an edge out of a corner; -1 beyond the grid.</summary>
    private (int Left, int Right) Sides(int row, int column, int direction) => direction switch
    {
        0 => (Cell(row - 1, column), Cell(row, column)),
        1 => (Cell(row - 1, column - 1), Cell(row - 1, column)),
        2 => (Cell(row, column - 1), Cell(row - 1, column - 1)),
        _ => (Cell(row, column), Cell(row, column - 1)),
    };

    private bool IsBoundary(int row, int column, int direction)
    {
        var (left, right) = Sides(row, column, direction);
        return LabelOf(left) != LabelOf(right);
    }

    private int Cell(int row, int column) => (uint)row < (uint)_rows && (uint)column < (uint)_columns ? (row * _columns) + column : -1;

    private int LabelOf(int cell) => cell < 0 ? 0 : _labels.Cells[cell];

    private bool HasTerrain(int cell) => cell >= 0 && (_hasTerrain is null || _hasTerrain(cell));

    private bool Walked(int row, int column, int direction)
    {
        var (bits, corner) = Mark(row, column, direction);
        return (bits[corner >> 6] >> (int)(corner & 63) & 1) != 0;
    }

    private void MarkWalked(int row, int column, int direction)
    {
        var (bits, corner) = Mark(row, column, direction);
        bits[corner >> 6] |= 1UL << (int)(corner & 63);
    }

    // An edge is known by its western or northern corner.
    private (ulong[] Bits, long Corner) Mark(int row, int column, int direction)
    {
        var across = _columns + 1L;
        var corner = (row * across) + column;
        return direction switch
        {
            0 => (_walkedEast, corner),
            1 => (_walkedSouth, corner - across),
            2 => (_walkedEast, corner - 1),
            _ => (_walkedSouth, corner),
        };
    }
}
