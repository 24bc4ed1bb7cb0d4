using GeoCulvert.Design.Terrain;

namespace GeoCulvert.Design.Watersheds;

/// <summary>
/// Slope of the ground at a cell from its eight neighbours, weights 1 2 1 (Horn 1981, Hill shading and the reflectance map, Proc. IEEE 69(1)).
/// <code>
///   a b c    dz/dx = ((c + 2f + i) - (a + 2d + g)) / (8 dx)
///   d e f    dz/dy = ((a + 2b + c) - (g + 2h + i)) / (8 dy)
///   g h i    slope = sqrt((dz/dx)^2 + (dz/dy)^2), m/m
/// </code>
/// A missing neighbour across a side is 2e less the opposite one, or e when that is missing too; a missing one across a corner is the sum of its two
/// side neighbours less e (own rule): a plane keeps its slope up to the edge.
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
        double Side(int r, int c)
        {
            double z = Raw(r, c), opposite = Raw(-r, -c);
            return !double.IsNaN(z) ? z : double.IsNaN(opposite) ? e : (2 * e) - opposite;
        }

        double b = Side(-1, 0), d = Side(0, -1), f = Side(0, 1), h = Side(1, 0);
        double Corner(int r, int c)
        {
            var z = Raw(r, c);
            return !double.IsNaN(z) ? z : (r < 0 ? b : h) + (c < 0 ? d : f) - e;
        }

        double a = Corner(-1, -1), c = Corner(-1, 1), g = Corner(1, -1), i = Corner(1, 1);
        var dx = (c + (2 * f) + i - (a + (2 * d) + g)) / (8 * frame.CellWidthM);
        var dy = (a + (2 * b) + c - (g + (2 * h) + i)) / (8 * frame.CellHeightM);
        return Math.Sqrt((dx * dx) + (dy * dy));
    }
}
