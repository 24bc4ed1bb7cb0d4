using GeoCulvert.Design.Terrain;
using NetTopologySuite.Geometries;
using NetTopologySuite.Geometries.Utilities;

namespace GeoCulvert.Design.Watersheds;

/// <summary>Lengths on the ellipsoid of lines that are drawn in a plane.</summary>
public static class TrueLengths
{
    /// <summary>An outline with true perimeter and edge contact; the polygon stays in the plane.</summary>
    /// <param name="outline">An outline with lengths of the plane.</param>
    /// <param name="scale">Scale of the plane.</param>
    public static WatershedOutline Of(WatershedOutline outline, PlaneScale scale)
    {
        ArgumentNullException.ThrowIfNull(outline);
        ArgumentNullException.ThrowIfNull(scale);
        if (scale.IsNone || !(outline.PerimeterM > 0)) return outline;
        var perimeter = LinearComponentExtracter.GetLines(outline.Polygon).Sum(l => OfLine(((LineString)l).CoordinateSequence, scale));

        // Edge contact keeps its share: along one watershed the scale changes by parts of a thousand at most.
        return outline with { PerimeterM = perimeter, EdgeContactM = outline.EdgeContactShare * perimeter };
    }

    /// <summary>True length of a line, m; each piece by the scale at its middle.</summary>
    public static double OfLine(CoordinateSequence line, PlaneScale scale)
    {
        ArgumentNullException.ThrowIfNull(line);
        ArgumentNullException.ThrowIfNull(scale);
        double length = 0;
        for (var i = 1; i < line.Count; i++)
        {
            double x0 = line.GetX(i - 1), y0 = line.GetY(i - 1), x1 = line.GetX(i), y1 = line.GetY(i);
            length += scale.LengthM((x0 + x1) / 2, (y0 + y1) / 2, x1 - x0, y1 - y0);
        }

        return length;
    }
}
