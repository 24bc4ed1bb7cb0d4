using GeoCulvert.Design.Basis;

namespace GeoCulvert.Design.Terrain;

/// <summary>
/// Where a north-up grid lies in its projected coordinate system (metres). Row 0 is the northernmost row, column 0 the westernmost
/// column; <see cref="West"/> and <see cref="North"/> are the outer corner of cell (0, 0).
/// </summary>
/// <param name="Columns">Number of columns.</param>
/// <param name="Rows">Number of rows.</param>
/// <param name="West">x of the western edge, m.</param>
/// <param name="North">y of the northern edge, m.</param>
/// <param name="CellWidthM">Cell size along x, m, positive.</param>
/// <param name="CellHeightM">Cell size along y, m, positive.</param>
public readonly record struct GridFrame(int Columns, int Rows, double West, double North, double CellWidthM, double CellHeightM)
{
    /// <summary>Number of cells, 64-bit.</summary>
    public long Count => (long)Columns * Rows;

    /// <summary>Area of one cell, m2.</summary>
    public double CellAreaM2 => CellWidthM * CellHeightM;

    /// <summary>x of the eastern edge, m.</summary>
    public double East => West + (Columns * CellWidthM);

    /// <summary>y of the southern edge, m.</summary>
    public double South => North - (Rows * CellHeightM);

    /// <summary>x of the centre of a column, m.</summary>
    public double CentreX(int column) => West + ((column + 0.5) * CellWidthM);

    /// <summary>y of the centre of a row, m.</summary>
    public double CentreY(int row) => North - ((row + 0.5) * CellHeightM);

    /// <summary>Column of an x; may lie outside 0..Columns-1.</summary>
    public int ColumnAt(double x) => (int)Math.Floor((x - West) / CellWidthM);

    /// <summary>Row of a y; may lie outside 0..Rows-1.</summary>
    public int RowAt(double y) => (int)Math.Floor((North - y) / CellHeightM);

    /// <summary>Whether a cell lies in the grid.</summary>
    public bool Contains(int row, int column) => (uint)row < (uint)Rows && (uint)column < (uint)Columns;
}

/// <summary>A grid of values in row-major order from the north-west corner.</summary>
/// <typeparam name="T">Value type of the cells.</typeparam>
public sealed class Grid<T>
    where T : unmanaged
{
    /// <summary>Makes a grid over cells that the caller hands over.</summary>
    /// <param name="frame">Size and place.</param>
    /// <param name="cells">Row-major values, frame.Count of them; kept, not copied.</param>
    /// <exception cref="ArgumentException">The number of cells does not fit the frame.</exception>
    public Grid(GridFrame frame, T[] cells)
    {
        ArgumentNullException.ThrowIfNull(cells);
        if (frame.Count != cells.LongLength)
            throw new ArgumentException($"{cells.LongLength} cells for a frame of {frame.Rows} x {frame.Columns}.", nameof(cells));
        (Frame, Cells) = (frame, cells);
    }

    /// <summary>Makes a grid of zeros.</summary>
    public Grid(GridFrame frame)
        : this(frame, new T[frame.Count])
    {
    }

    /// <summary>Size and place.</summary>
    public GridFrame Frame { get; }

    /// <summary>Row-major values.</summary>
    public T[] Cells { get; }

    /// <summary>The value of a cell.</summary>
    public ref T this[int row, int column] => ref Cells[((long)row * Frame.Columns) + column];
}
