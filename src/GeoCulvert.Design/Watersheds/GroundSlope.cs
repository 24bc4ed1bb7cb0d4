using GeoCulvert.Design.Terrain;

namespace GeoCulvert.Design.Watersheds;

/// <summary>
/// Slope of the ground at a cell from its eight neighbours, weights 1 2 1 (Horn 1981, Hill shading and the reflectance map, Proc. IEEE 69(1)).
/// <code>
///   a b c    dz/dx = ((c + 2f + i) - (a + 2d + g)) / (8 dx)
///   d e f    dz/dy = ((a + 2b + c) - (g + 2h + i)) / (8 dy)
///   g h i    slope = sqrt((dz/dx)^2 + (dz/dy)^2), m/m
/// </code>
/// A neighbour without terrain is replaced by the plane through the opposite neighbour and the cell, 2e - opposite, or by e when that
/// one is missing too (own rule): a plane keeps its slope up to the edge.
/// </summary>
public static class GroundSlope
{
    /// <summary>Slope at a cell, m/m; NaN without terrain.</summary>
    public static double At(Grid<float> elevation, int cell)
    {
        ArgumentNullException.ThrowIfNull(elevation);
        var frame = elevation.Frame;
        int row = cell / frame.Columns, column = cell % frame.Columns;
        double e = elevation.Cells[cell];
        if (double.IsNaN(e)) return double.NaN;
        double Raw(int r, int c) => frame.Contains(row + r, column + c) ? elevation[row + r, column + c] : double.NaN;
        double Z(int r, int c)
        {
            var z = Raw(r, c);
            if (!double.IsNaN(z)) return z;
            var opposite = Raw(-r, -c);
            return double.IsNaN(opposite) ? e : (2 * e) - opposite;
        }

        double a = Z(-1, -1), b = Z(-1, 0), c = Z(-1, 1), d = Z(0, -1), f = Z(0, 1), g = Z(1, -1), h = Z(1, 0), i = Z(1, 1);
        var dx = (c + (2 * f) + i - (a + (2 * d) + g)) / (8 * frame.CellWidthM);
        var dy = (a + (2 * b) + c - (g + (2 * h) + i)) / (8 * frame.CellHeightM);
        return Math.Sqrt((dx * dx) + (dy * dy));
    }
}
