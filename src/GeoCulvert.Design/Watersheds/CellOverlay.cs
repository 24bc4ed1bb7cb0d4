using GeoCulvert.Design.Terrain;

namespace GeoCulvert.Design.Watersheds;

/// <summary>
/// A stretch along one side of the labels' grid that lies in one row (or column) of every grid.
/// </summary>
/// <param name="Label">Row or column of the labels.</param>
/// <param name="First">Row or column of the first other grid; -1 beyond it.</param>
/// <param name="Second">Row or column of the second other grid; -1 beyond it or without one.</param>
/// <param name="Length">Length in cells of the labels.</param>
internal readonly record struct Stretch(int Label, int First, int Second, double Length);

/// <summary>
/// How the cells of other grids of the same plane lie over those of the labels. All are north-up, so what cells have in common are
/// rectangles: a stretch of columns times a stretch of rows, and the areas are exact. Lines of the other grids within a millionth of a cell
/// of a line of the labels are taken as the same line.
/// </summary>
internal sealed class CellOverlay
{
    private const double SameLine = 1e-6;

    public CellOverlay(in GridFrame labels, in GridFrame first, GridFrame? second)
    {
        Columns = Stretches(
            labels.Columns,
            new Lines((first.West - labels.West) / labels.CellWidthM, first.CellWidthM / labels.CellWidthM, first.Columns),
            second is { } c ? new Lines((c.West - labels.West) / labels.CellWidthM, c.CellWidthM / labels.CellWidthM, c.Columns) : default);
        Rows = Stretches(
            labels.Rows,
            new Lines((labels.North - first.North) / labels.CellHeightM, first.CellHeightM / labels.CellHeightM, first.Rows),
            second is { } r ? new Lines((labels.North - r.North) / labels.CellHeightM, r.CellHeightM / labels.CellHeightM, r.Rows) : default);
    }

    public IReadOnlyList<Stretch> Columns { get; }

    public IReadOnlyList<Stretch> Rows { get; }

    private static Stretch[] Stretches(int count, Lines first, Lines second)
    {
        var stretches = new List<Stretch>(count);
        int a = first.Before(0), b = second.Before(0);
        var at = 0.0;
        for (var label = 0; label < count;)
        {
            while (first.Next(a) <= at) a++;
            while (second.Next(b) <= at) b++;
            var to = Math.Min(label + 1, Math.Min(first.Next(a), second.Next(b)));
            stretches.Add(new(label, first.Cell(a), second.Cell(b), to - at));
            at = to;
            if (at == label + 1) label++;
        }

        return [.. stretches];
    }

    /// <summary>The lines of a grid along one side, in cells of the labels.</summary>
    private readonly record struct Lines(double Start, double Step, int Count)
    {
        /// <summary>A cell at or before a place: -1 before the grid, Count beyond it.</summary>
        public int Before(double at) => Count == 0 ? 0 : (int)Math.Clamp(Math.Floor((at - Start) / Step) - 1, -1, Count);

        /// <summary>The line at which a cell ends.</summary>
        public double Next(int cell)
        {
            if (cell >= Count) return double.PositiveInfinity;
            var line = Start + ((cell + 1) * Step);
            var whole = Math.Round(line);
            return Math.Abs(line - whole) < SameLine ? whole : line;
        }

        public int Cell(int cell) => cell >= Count ? -1 : cell;
    }
}
