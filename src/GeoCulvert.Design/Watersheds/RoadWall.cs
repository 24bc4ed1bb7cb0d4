using GeoCulvert.Design.Crossings;
using GeoCulvert.Design.Terrain;
using NetTopologySuite.Geometries;

namespace GeoCulvert.Design.Watersheds;

/// <summary>
/// Centrelines of roads as walls between cells. A step to a side neighbour is cut where it crosses a centreline; a step to a corner neighbour
/// is cut unless one of the two ways round by side neighbours is open. Where a centreline runs through the centre of a cell, the steps on both
/// sides of that cell are cut. So no chain of open steps crosses a centreline, whatever its angle. Work and memory are those of the roads.
/// </summary>
public sealed class RoadWall
{
    // Centres nearer to a centreline than this share of a cell count as lying on it.
    private const double OnCentreShare = 1e-6;

    // Steps cut from a cell: 1 to the east, 2 to the south.
    private readonly Dictionary<int, byte> _cuts = [];
    private readonly GridFrame _frame;

    /// <summary>Makes the wall of some roads.</summary>
    /// <param name="frame">Grid.</param>
    /// <param name="roads">Roads.</param>
    public RoadWall(GridFrame frame, IEnumerable<RoadAlignment> roads)
    {
        ArgumentNullException.ThrowIfNull(roads);
        _frame = frame;
        foreach (var road in roads)
            foreach (var segment in road.Segments()) Cut(segment.From, segment.To);
    }

    /// <summary>Whether the step from a cell to one of its eight neighbours crosses a road.</summary>
    /// <param name="row">Row of the cell.</param>
    /// <param name="column">Column of the cell.</param>
    /// <param name="rowStep">-1, 0 or 1; 1 is south.</param>
    /// <param name="columnStep">-1, 0 or 1; 1 is east.</param>
    public bool IsCut(int row, int column, int rowStep, int columnStep)
    {
        if (_cuts.Count == 0) return false;
        if (rowStep == 0) return Has(row, columnStep > 0 ? column : column - 1, 1);
        if (columnStep == 0) return Has(rowStep > 0 ? row : row - 1, column, 2);
        return (IsCut(row, column, rowStep, 0) || IsCut(row + rowStep, column, 0, columnStep))
            && (IsCut(row, column, 0, columnStep) || IsCut(row, column + columnStep, rowStep, 0));
    }

    private bool Has(int row, int column, byte side) =>
        _frame.Contains(row, column) && _cuts.TryGetValue((row * _frame.Columns) + column, out var cut) && (cut & side) != 0;

    private void Add(int row, int column, byte side)
    {
        if (!_frame.Contains(row, column)) return;
        var cell = (row * _frame.Columns) + column;
        _cuts[cell] = (byte)(_cuts.GetValueOrDefault(cell) | side);
    }

    /// <summary>Cuts the steps that one straight piece crosses: along every line of centres that lies between its ends.</summary>
    private void Cut(Coordinate from, Coordinate to)
    {
        // In units of cells, centres at whole numbers, v counting rows southward.
        double u0 = ((from.X - _frame.West) / _frame.CellWidthM) - 0.5, v0 = ((_frame.North - from.Y) / _frame.CellHeightM) - 0.5;
        double u1 = ((to.X - _frame.West) / _frame.CellWidthM) - 0.5, v1 = ((_frame.North - to.Y) / _frame.CellHeightM) - 0.5;
        foreach (var row in Between(v0, v1, _frame.Rows))
            foreach (var column in Gaps(u0 + ((row - v0) / (v1 - v0) * (u1 - u0)))) Add(row, column, 1);
        foreach (var column in Between(u0, u1, _frame.Columns))
            foreach (var row in Gaps(v0 + ((column - u0) / (u1 - u0) * (v1 - v0)))) Add(row, column, 2);
    }

    /// <summary>Whole numbers from the lower end, included, to the higher, left out, so that pieces that meet share no line and miss none.</summary>
    private static IEnumerable<int> Between(double a, double b, int count)
    {
        var last = Math.Min(count, Math.Ceiling(Math.Max(a, b)));
        for (var k = (int)Math.Max(0, Math.Ceiling(Math.Min(a, b))); k < last; k++) yield return k;
    }

    /// <summary>The gap between two whole numbers in which a place lies, by the lower one; both gaps beside it for a place on a whole number.</summary>
    private static IEnumerable<int> Gaps(double place)
    {
        var near = Math.Round(place);
        if (Math.Abs(place - near) > OnCentreShare) return [(int)Math.Floor(place)];
        return [(int)near - 1, (int)near];
    }
}
