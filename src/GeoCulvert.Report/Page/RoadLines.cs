using System.Globalization;
using System.Text;
using GeoCulvert.Design.Basis;
using GeoCulvert.Design.Study;
using GeoCulvert.Report.Plots;
using NetTopologySuite.Geometries;

namespace GeoCulvert.Report.Page;

/// <summary>Roads with their names and station marks.</summary>
internal static class RoadLines
{
    public static void Append(StringBuilder svg, StudyReport report, MapPath path, IReadOnlyList<Coordinate> crossings)
    {
        var roads = LayerTable.Open(report, "roads");
        var stations = new StringBuilder();
        svg.Append("<g data-layer=\"roads\">");
        foreach (var row in roads.Rows.Where(r => r.Geometry is { IsEmpty: false }))
        {
            var data = path.Data(row.Geometry);
            if (data.Length == 0) continue;
            svg.Append("<path class=\"rc\" d=\"").Append(data).Append("\"/><path class=\"rd\" d=\"").Append(data).Append("\"/>");
            var name = roads.Text(row, "road") is { Length: > 0 } text ? text : roads.Text(row, "name");
            var start = roads.Number(row, "start_station", QuantityKind.Length) ?? 0;
            foreach (var line in Lines(row.Geometry!))
            {
                AppendName(svg, line, name, path, crossings);
                start = AppendStations(stations, line, start, report.Units, path);
            }
        }
        svg.Append("</g><g data-layer=\"stations\">").Append(stations).Append("</g>");
    }

    /// <summary>"12+340" in metres past the kilometre, "123+40" in feet past the hundred (common practice).</summary>
    public static string StationText(double station, UnitSystem units)
    {
        var whole = (long)Math.Round(Math.Abs(station));
        var (per, digits) = units == UnitSystem.Si ? (1000, "D3") : (100, "D2");
        return (station < -0.5 ? "\u2212" : "") + (whole / per).ToString(CultureInfo.InvariantCulture) + "+" + (whole % per).ToString(digits, CultureInfo.InvariantCulture);
    }

    private static IEnumerable<LineString> Lines(Geometry geometry) => geometry switch
    {
        LineString line => [line],
        GeometryCollection many => many.Geometries.SelectMany(Lines),
        _ => [],
    };

    /// <summary>The name stands in the middle of the longest stretch without a crossing.</summary>
    private static void AppendName(StringBuilder svg, LineString line, string name, MapPath path, IReadOnlyList<Coordinate> crossings)
    {
        if (name.Length == 0) return;
        var (at, angle) = Enumerable.Range(1, 19).Select(k => Along(line, line.Length * k / 20))
            .MaxBy(p => crossings.Count == 0 ? -p.At.Distance(line.Centroid.Coordinate) : crossings.Min(c => c.Distance(p.At)));
        var (x, y) = path.Place(at.X, at.Y);
        var turn = angle is > 90 or < -90 ? angle + 180 : angle;
        svg.Append("<g transform=\"translate(").Append(x).Append(' ').Append(y).Append(")\"><g class=\"k\"><text class=\"rn\" transform=\"rotate(")
            .Append(Math.Round(turn).ToString(CultureInfo.InvariantCulture)).Append(")\" text-anchor=\"middle\" y=\"-9\">")
            .Append(HtmlText.Escape(HtmlText.Shorten(name, 40))).Append("</text></g></g>");
    }

    /// <summary>Marks round stations along a line; returns the station of its end.</summary>
    private static double AppendStations(StringBuilder svg, LineString line, double start, UnitSystem units, MapPath path)
    {
        var metresPerUnit = Units.ToSi(1, DisplayUnits.Symbol(QuantityKind.Length, units));
        var length = line.Length / metresPerUnit;
        if (!(length > 0)) return start;
        var step = Math.Max(AxisTicks.RoundUp(length / 60), units == UnitSystem.Si ? 20 : 100);
        var first = (long)Math.Ceiling(start / step);
        for (var i = first; i * step <= start + length; i++)
        {
            var (at, angle) = Along(line, ((i * step) - start) * metresPerUnit);
            var (x, y) = path.Place(at.X, at.Y);
            var isNamed = i % 5 == 0;
            svg.Append("<g transform=\"translate(").Append(x).Append(' ').Append(y).Append(")\"><g class=\"k\"><path class=\"tk\" transform=\"rotate(")
                .Append(Math.Round(angle).ToString(CultureInfo.InvariantCulture)).Append(isNamed ? ")\" d=\"M0-6V6\"/>" : ")\" d=\"M0-3V3\"/>");
            if (isNamed) svg.Append("<text class=\"sn\" x=\"7\" y=\"13\">").Append(StationText(i * step, units)).Append("</text>");
            svg.Append("</g></g>");
        }
        return start + length;
    }

    /// <summary>The point at a distance along a line and the direction there, degrees clockwise from east as SVG turns.</summary>
    private static (Coordinate At, double AngleDeg) Along(LineString line, double distanceM)
    {
        var points = line.Coordinates;
        for (var i = 1; i < points.Length; i++)
        {
            var piece = points[i - 1].Distance(points[i]);
            if (distanceM <= piece || i == points.Length - 1)
            {
                var t = piece > 0 ? Math.Clamp(distanceM / piece, 0, 1) : 0;
                var (dx, dy) = (points[i].X - points[i - 1].X, points[i].Y - points[i - 1].Y);
                return (new Coordinate(points[i - 1].X + (t * dx), points[i - 1].Y + (t * dy)), double.RadiansToDegrees(Math.Atan2(-dy, dx)));
            }
            distanceM -= piece;
        }
        return (points[0], 0);
    }
}
