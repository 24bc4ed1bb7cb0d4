namespace GeoCulvert.Design.Terrain;

/// <summary>
/// The lowest elevation of each block of cells, to tell quickly that no lower ground is near. A block on the edge of the grid or with nodata counts as
/// lowest of all, for water leaves there.
/// </summary>
internal sealed class LowestBlocks
{
    private const int Side = 16;
    private readonly int _columns;
    private readonly int _blocksAcross;
    private readonly int _blocksDown;
    private readonly float[] _lowest;

    public LowestBlocks(Grid<float> surface)
    {
        var frame = surface.Frame;
        _columns = frame.Columns;
        _blocksAcross = (frame.Columns + Side - 1) / Side;
        _blocksDown = (frame.Rows + Side - 1) / Side;
        _lowest = new float[_blocksAcross * _blocksDown];
        Array.Fill(_lowest, float.PositiveInfinity);
        for (var r = 0; r < frame.Rows; r++)
        {
            var row = surface.Cells.AsSpan(r * frame.Columns, frame.Columns);
            for (var b = 0; b < _blocksAcross; b++)
            {
                ref var lowest = ref _lowest[(r / Side * _blocksAcross) + b];
                if (r == 0 || r == frame.Rows - 1 || b == 0 || b == _blocksAcross - 1) lowest = float.NegativeInfinity;
                foreach (var z in row.Slice(b * Side, Math.Min(Side, frame.Columns - (b * Side))))
                {
                    if (!(z >= lowest)) lowest = float.IsNaN(z) ? float.NegativeInfinity : z;
                }
            }
        }
    }

    /// <summary>A cell was lowered.</summary>
    public void Lower(int cell, float level)
    {
        ref var lowest = ref _lowest[(cell / _columns / Side * _blocksAcross) + (cell % _columns / Side)];
        if (level < lowest) lowest = level;
    }

    /// <summary>Whether ground below a level, or a way out, may lie within some rows and columns of a rectangle of cells; false is certain.</summary>
    public bool MayBeLower(float level, (int Top, int Left, int Bottom, int Right) cells, long rows, long columns)
    {
        // Beside nodata a cell is a way out too: one row and column more. Rings of blocks outward, since lower ground is mostly near.
        int top = Block(cells.Top - rows - 1, _blocksDown), bottom = Block(cells.Bottom + rows + 1, _blocksDown);
        int left = Block(cells.Left - columns - 1, _blocksAcross), right = Block(cells.Right + columns + 1, _blocksAcross);
        int fromTop = cells.Top / Side, toBottom = cells.Bottom / Side, fromLeft = cells.Left / Side, toRight = cells.Right / Side;
        if (Lower(fromTop, toBottom, fromLeft, toRight)) return true;
        while (fromTop > top || toBottom < bottom || fromLeft > left || toRight < right)
        {
            if (fromTop > top && Lower(--fromTop, fromTop, fromLeft, toRight)) return true;
            if (toBottom < bottom && Lower(++toBottom, toBottom, fromLeft, toRight)) return true;
            if (fromLeft > left && Lower(fromTop, toBottom, --fromLeft, fromLeft)) return true;
            if (toRight < right && Lower(fromTop, toBottom, ++toRight, toRight)) return true;
        }

        return false;

        bool Lower(int r0, int r1, int c0, int c1)
        {
            for (var r = r0; r <= r1; r++)
            {
                foreach (var lowest in _lowest.AsSpan((r * _blocksAcross) + c0, c1 - c0 + 1))
                {
                    if (lowest < level) return true;
                }
            }

            return false;
        }
    }

    private static int Block(long cell, int blocks) => (int)Math.Clamp(cell / Side, 0, blocks - 1);
}
