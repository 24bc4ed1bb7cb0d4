using System.Text;
using GeoCulvert.Design.Terrain;
using NetTopologySuite.Geometries;
using NetTopologySuite.Simplify;

namespace GeoCulvert.Report.Page;

/// <summary>
/// Turns geometries of the working system into short SVG path data: whole map units with the origin at the north-west corner, the longer
/// side of the map divided into so many units, lines simplified below one unit.
/// </summary>
internal sealed class MapPath
{
    private readonly double west;
    private readonly double north;
    private readonly double unitM;
    private readonly double toleranceM;

    public MapPath(double west, double north, double widthM, double heightM, int longestSideUnits, double toleranceUnits)
    {
        (this.west, this.north) = (west, north);
        unitM = Math.Max(widthM, heightM) / longestSideUnits;
        toleranceM = toleranceUnits * unitM;
        (Width, Height) = ((int)Math.Ceiling(widthM / unitM), (int)Math.Ceiling(heightM / unitM));
    }

    public MapPath(GridFrame frame, int longestSideUnits, double toleranceUnits)
        : this(frame.West, frame.North, frame.East - frame.West, frame.North - frame.South, longestSideUnits, toleranceUnits)
    {
    }

    public int Width { get; }

    public int Height { get; }

    public double UnitM => unitM;

    public (int X, int Y) Place(double x, double y) => ((int)Math.Round((x - west) / unitM), (int)Math.Round((north - y) / unitM));

    /// <summary>Path data of lines and polygons; points and empty geometries give "".</summary>
    public string Data(Geometry? geometry)
    {
        var data = new StringBuilder();
        if (geometry is null or Point || geometry.IsEmpty) return "";
        Append(data, DouglasPeuckerSimplifier.Simplify(geometry, toleranceM) is { IsEmpty: false } simple ? simple : geometry);
        return data.ToString();
    }

    private void Append(StringBuilder data, Geometry geometry)
    {
        switch (geometry)
        {
            case Polygon polygon:
                AppendLine(data, polygon.ExteriorRing.Coordinates, isClosed: true);
                foreach (var hole in polygon.InteriorRings) AppendLine(data, hole.Coordinates, isClosed: true);
                break;
            case LineString line:
                AppendLine(data, line.Coordinates, isClosed: false);
                break;
            default:
                for (var i = 0; i < geometry.NumGeometries && geometry is GeometryCollection; i++) Append(data, geometry.GetGeometryN(i));
                break;
        }
    }

    private void AppendLine(StringBuilder data, Coordinate[] points, bool isClosed)
    {
        var (lastX, lastY) = (int.MinValue, int.MinValue);
        for (var i = 0; i < points.Length - (isClosed ? 1 : 0); i++)
        {
            if (!double.IsFinite(points[i].X) || !double.IsFinite(points[i].Y)) continue;
            var (x, y) = Place(points[i].X, points[i].Y);
            if (lastX == int.MinValue) data.Append('M').Append(x).Append(' ').Append(y).Append('l');
            else if (x != lastX || y != lastY) AppendStep(data, x - lastX, y - lastY);
            (lastX, lastY) = (x, y);
        }
        if (data.Length > 0 && data[^1] == 'l') data.Append("0 0");
        if (isClosed && lastX != int.MinValue) data.Append('z');
    }

    private static void AppendStep(StringBuilder data, int dx, int dy)
    {
        if (dx >= 0 && data[^1] != 'l') data.Append(' ');
        data.Append(dx);
        if (dy >= 0) data.Append(' ');
        data.Append(dy);
    }
}
