namespace GeoCulvert.Design.Terrain;

/// <summary>Cells on the rim of the data.</summary>
public static class EdgeCells
{
    /// <summary>Whether a valid cell touches the grid's edge or nodata among its eight neighbours.</summary>
    public static bool IsEdge(Grid<float> elevation, int row, int column)
    {
        ArgumentNullException.ThrowIfNull(elevation);
        var frame = elevation.Frame;
        if (row == 0 || column == 0 || row == frame.Rows - 1 || column == frame.Columns - 1) return true;
        var z = elevation.Cells;
        var i = (row * frame.Columns) + column;
        return float.IsNaN(z[i - frame.Columns - 1]) || float.IsNaN(z[i - frame.Columns]) || float.IsNaN(z[i - frame.Columns + 1])
            || float.IsNaN(z[i - 1]) || float.IsNaN(z[i + 1])
            || float.IsNaN(z[i + frame.Columns - 1]) || float.IsNaN(z[i + frame.Columns]) || float.IsNaN(z[i + frame.Columns + 1]);
    }
}
