using System.Text;
using GeoCulvert.Design.Basis;
using GeoCulvert.Design.Study;
using GeoCulvert.Report.Plots;
using NetTopologySuite.Geometries;

namespace GeoCulvert.Report.Page;

/// <summary>The outline of a watershed with its longest flow path, the crossing and a scale bar, for the sheet.</summary>
internal static class WatershedThumb
{
    private const int Size = 280;

    public static string Write(CrossingSheet sheet, UnitSystem units)
    {
        var extent = new Envelope(sheet.Location);
        if (sheet.Watershed is { IsEmpty: false } area) extent.ExpandToInclude(area.EnvelopeInternal);
        if (sheet.FlowPath is { IsEmpty: false } line) extent.ExpandToInclude(line.EnvelopeInternal);
        if (!(extent.Width > 0 || extent.Height > 0) || !double.IsFinite(extent.Width) || !double.IsFinite(extent.Height)) return "";
        var side = 1.12 * Math.Max(extent.Width, extent.Height);
        var (west, north) = (extent.Centre.X - (side / 2), extent.Centre.Y + (side / 2));
        var path = new MapPath(west, north, side, side, Size * 4, 2);
        var (x, y) = path.Place(sheet.Location.X, sheet.Location.Y);
        var symbol = DisplayUnits.Symbol(QuantityKind.Length, units);
        var bar = AxisTicks.RoundDown(Units.FromSi(side * 0.4, symbol));
        var barUnits = (int)Math.Round(Units.ToSi(bar, symbol) / path.UnitM);
        var svg = new StringBuilder();
        svg.Append("<svg class=\"plot thumb\" role=\"img\" viewBox=\"0 0 ").Append(4 * Size).Append(' ').Append(4 * (Size + 26)).Append("\"><title>")
            .Append(HtmlText.Escape($"Watershed of {HtmlText.Shorten(sheet.CrossingId, 80)} with its longest flow path")).Append("</title>");
        svg.Append("<path class=\"wt\" d=\"").Append(path.Data(sheet.Watershed)).Append("\"/><path class=\"fp\" d=\"").Append(path.Data(sheet.FlowPath)).Append("\"/>");
        svg.Append("<circle class=\"dot\" cx=\"").Append(x).Append("\" cy=\"").Append(y).Append("\" r=\"18\"/>");
        svg.Append("<path class=\"ax\" d=\"M20 ").Append((4 * Size) + 64).Append("v-24v12h").Append(barUnits).Append("v-12v24\"/><text x=\"").Append(barUnits + 44).Append("\" y=\"").Append((4 * Size) + 68).Append("\">")
            .Append(FigureText.Round(bar, QuantityKind.None)).Append(' ').Append(symbol).Append("</text>");
        svg.Append("<path class=\"ax\" d=\"M").Append((4 * Size) - 44).Append(" 120V20l-20 44m20-44l20 44\"/><text text-anchor=\"middle\" x=\"").Append((4 * Size) - 44).Append("\" y=\"172\">N</text></svg>");
        return svg.ToString();
    }
}
