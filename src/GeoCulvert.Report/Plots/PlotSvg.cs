using System.Globalization;
using System.Text;

namespace GeoCulvert.Report.Plots;

/// <summary>
/// A small plot as SVG text: axes with ticks at round numbers, units in the axis titles, lines told apart by dash and weight as well as
/// colour, a legend. Inside the page the page's style colours it; standing alone it carries its own.
/// </summary>
/// <param name="title">What the plot shows, for readers who hear it and on hover.</param>
/// <param name="xTitle">Title of the horizontal axis with its unit.</param>
/// <param name="yTitle">Title of the vertical axis with its unit.</param>
/// <param name="width">Width, px.</param>
/// <param name="height">Height, px.</param>
public sealed class PlotSvg(string title, string xTitle, string yTitle, int width = 460, int height = 280)
{
    /// <summary>Style of a plot that stands alone: colours told apart by colour-blind readers, dark on white.</summary>
    public const string StandaloneStyle =
        "svg.plot{background:#fff;color:#222;font:12px system-ui,sans-serif}.plot text{fill:#222}.plot .ax{stroke:#555;fill:none}.plot .gr{stroke:#ddd;fill:none}"
        + ".plot .l{fill:none;stroke-width:1.8;stroke-linejoin:round}.plot .c1{stroke:#0072b2}.plot .c2{stroke:#b34700;stroke-dasharray:7 3}"
        + ".plot .c3{stroke:#111;stroke-width:2.6}.plot .c4{stroke:#666;stroke-dasharray:2 3}.plot .c5{stroke:#0072b2;stroke-dasharray:5 4}.plot .c6{stroke:#333}"
        + ".plot .water{fill:#9ecae8;stroke:none}.plot .earth{fill:#cdb79a;stroke:#6b5636}.plot .bank{fill:#b9b2a6;stroke:#555}.plot .void{fill:#fff;stroke:none}"
        + ".plot .area{fill:#0072b2;fill-opacity:.15;stroke:none}.plot .dot{fill:#fff;stroke:#111;stroke-width:2}.plot .halo{paint-order:stroke;stroke:#fff;stroke-width:3px}";

    private readonly List<Item> items = [];
    private readonly List<(string Style, string Label)> legend = [];

    private enum Shape
    {
        Line,
        Fill,
        Dot,
        Note,
    }

    /// <summary>Fixes the horizontal range; null lets the data decide.</summary>
    public (double Low, double High)? XRange { get; set; }

    /// <summary>Fixes the vertical range; null lets the data decide.</summary>
    public (double Low, double High)? YRange { get; set; }

    /// <summary>Adds a line; it breaks where a value is not finite.</summary>
    /// <param name="points">Points in axis units.</param>
    /// <param name="style">c1 to c6.</param>
    /// <param name="label">Legend text, or "" for none.</param>
    public PlotSvg Line(IEnumerable<(double X, double Y)> points, string style, string label = "")
    {
        items.Add(new Item(Shape.Line, style, [.. points], ""));
        if (label.Length > 0) legend.Add((style, label));
        return this;
    }

    /// <summary>Adds a filled outline.</summary>
    public PlotSvg Fill(IEnumerable<(double X, double Y)> points, string style)
    {
        items.Add(new Item(Shape.Fill, style, [.. points], ""));
        return this;
    }

    /// <summary>Adds a marked point with its text beside it and its figures on hover.</summary>
    public PlotSvg Dot(double x, double y, string text, string hover)
    {
        items.Add(new Item(Shape.Dot, "dot", [(x, y)], text, hover));
        return this;
    }

    /// <summary>Adds a text above a point, or below it.</summary>
    public PlotSvg Note(double x, double y, string text, bool isBelow = false)
    {
        items.Add(new Item(Shape.Note, isBelow ? "below" : "", [(x, y)], text));
        return this;
    }

    /// <summary>The SVG text.</summary>
    /// <param name="isStandalone">With namespace and style, as a file of its own; otherwise for a page with the page's style.</param>
    public string Render(bool isStandalone)
    {
        var finite = items.SelectMany(i => i.Points).Where(p => double.IsFinite(p.X) && double.IsFinite(p.Y)).ToList();
        var xs = Ticks(XRange, finite.Select(p => p.X), 7);
        var ys = Ticks(YRange, finite.Select(p => p.Y), 6);
        var legendRows = LegendRows();
        var frame = new Frame(62, 10 + (18 * legendRows.Count), width - 14, height - 44, xs, ys, XRange, YRange);
        var svg = new StringBuilder();
        svg.Append("<svg class=\"plot\" role=\"img\"");
        if (isStandalone) svg.Append(" xmlns=\"http://www.w3.org/2000/svg\" width=\"").Append(width).Append("\" height=\"").Append(height).Append('"');
        svg.Append(" viewBox=\"0 0 ").Append(width).Append(' ').Append(height).Append("\"><title>").Append(HtmlText.Escape(title)).Append("</title>");
        if (isStandalone) svg.Append("<style>").Append(StandaloneStyle).Append("</style>");
        DrawGrid(svg, frame);
        foreach (var item in items) Draw(svg, frame, item);
        DrawAxes(svg, frame);
        for (var r = 0; r < legendRows.Count; r++) DrawLegend(svg, legendRows[r], 14 + (18 * r));
        return svg.Append("</svg>").ToString();
    }

    private static AxisTicks Ticks((double Low, double High)? range, IEnumerable<double> values, int steps)
    {
        if (range is { } given) return AxisTicks.Enclosing(given.Low, given.High, steps);
        var list = values.ToList();
        return list.Count == 0 ? AxisTicks.Enclosing(0, 1, steps) : AxisTicks.Enclosing(list.Min(), list.Max(), steps);
    }

    private static void Draw(StringBuilder svg, Frame f, Item item)
    {
        switch (item.Shape)
        {
            case Shape.Line or Shape.Fill:
                svg.Append("<path class=\"").Append(item.Shape == Shape.Line ? "l " : "").Append(item.Style).Append("\" d=\"");
                AppendPath(svg, f, item.Points);
                svg.Append(item.Shape == Shape.Fill ? "Z\"/>" : "\"/>");
                break;
            case Shape.Dot when double.IsFinite(item.Points[0].X) && double.IsFinite(item.Points[0].Y):
                var (cx, cy) = (f.X(item.Points[0].X), f.Y(item.Points[0].Y));
                var isRight = cx > f.Left + (0.6 * (f.Right - f.Left));
                svg.Append("<g><title>").Append(HtmlText.Escape(item.Hover)).Append("</title><circle class=\"dot\" cx=\"").Append(Px(cx)).Append("\" cy=\"").Append(Px(cy))
                    .Append("\" r=\"4\"/><text class=\"halo\" x=\"").Append(Px(cx + (isRight ? -8 : 8))).Append("\" y=\"").Append(Px(cy + 14))
                    .Append(isRight ? "\" text-anchor=\"end\">" : "\">").Append(HtmlText.Escape(item.Text)).Append("</text></g>");
                break;
            case Shape.Note when double.IsFinite(item.Points[0].X) && double.IsFinite(item.Points[0].Y):
                svg.Append("<text class=\"halo\" text-anchor=\"middle\" x=\"").Append(Px(f.X(item.Points[0].X))).Append("\" y=\"").Append(Px(f.Y(item.Points[0].Y) + (item.Style.Length > 0 ? 15 : -5)))
                    .Append("\">").Append(HtmlText.Escape(item.Text)).Append("</text>");
                break;
            default: break;
        }
    }

    /// <summary>Path data in steps of a tenth of a pixel, relative to the point before.</summary>
    private static void AppendPath(StringBuilder svg, Frame f, IReadOnlyList<(double X, double Y)> points)
    {
        var (isOpen, lastX, lastY) = (false, 0.0, 0.0);
        foreach (var (px, py) in points)
        {
            if (!double.IsFinite(px) || !double.IsFinite(py)) { isOpen = false; continue; }
            var (x, y) = (Math.Round(f.X(px), 1), Math.Round(f.Y(py), 1));
            var (dx, dy) = (Px(isOpen ? x - lastX : x), Px(isOpen ? y - lastY : y));
            if (!isOpen || dx is not "0" || dy is not "0") svg.Append(isOpen ? 'l' : 'M').Append(dx).Append(dy[0] == '-' ? "" : " ").Append(dy);
            (isOpen, lastX, lastY) = (true, x, y);
        }
    }

    private static void DrawGrid(StringBuilder svg, Frame f)
    {
        svg.Append("<path class=\"gr\" d=\"");
        for (var i = 0; i < f.Xs.Count; i++)
        {
            if (f.ShowsX(i)) svg.Append('M').Append(Px(f.X(f.Xs.At(i)))).Append(' ').Append(Px(f.Top)).Append('V').Append(Px(f.Bottom));
        }
        for (var i = 0; i < f.Ys.Count; i++)
        {
            if (f.ShowsY(i)) svg.Append('M').Append(Px(f.Left)).Append(' ').Append(Px(f.Y(f.Ys.At(i)))).Append('H').Append(Px(f.Right));
        }
        svg.Append("\"/>");
    }

    private static string Px(double value) => Math.Round(value, 1).ToString("0.#", CultureInfo.InvariantCulture);

    private static double TextWidth(string text) => 6.3 * text.Length;

    private void DrawAxes(StringBuilder svg, Frame f)
    {
        svg.Append("<path class=\"ax\" d=\"M").Append(Px(f.Left)).Append(' ').Append(Px(f.Top)).Append('V').Append(Px(f.Bottom)).Append('H').Append(Px(f.Right)).Append("\"/>");
        svg.Append("<g text-anchor=\"middle\">");
        for (var i = 0; i < f.Xs.Count; i++)
        {
            if (f.ShowsX(i)) svg.Append("<text x=\"").Append(Px(f.X(f.Xs.At(i)))).Append("\" y=\"").Append(Px(f.Bottom + 15)).Append("\">").Append(f.Xs.Label(i)).Append("</text>");
        }
        svg.Append("<text x=\"").Append(Px((f.Left + f.Right) / 2)).Append("\" y=\"").Append(height - 8).Append("\">").Append(HtmlText.Escape(xTitle)).Append("</text>");
        var middle = Px((f.Top + f.Bottom) / 2);
        svg.Append("<text transform=\"translate(13 ").Append(middle).Append(") rotate(-90)\">").Append(HtmlText.Escape(yTitle)).Append("</text></g><g text-anchor=\"end\">");
        for (var i = 0; i < f.Ys.Count; i++)
        {
            if (f.ShowsY(i)) svg.Append("<text x=\"").Append(Px(f.Left - 6)).Append("\" y=\"").Append(Px(f.Y(f.Ys.At(i)) + 4)).Append("\">").Append(f.Ys.Label(i)).Append("</text>");
        }
        svg.Append("</g>");
    }

    private List<List<(string Style, string Label)>> LegendRows()
    {
        var rows = new List<List<(string Style, string Label)>>();
        var used = double.PositiveInfinity;
        foreach (var entry in legend)
        {
            var need = 34 + TextWidth(entry.Label) + 12;
            if (used + need > width - 20) { rows.Add([]); used = 0; }
            rows[^1].Add(entry);
            used += need;
        }
        return rows;
    }

    private void DrawLegend(StringBuilder svg, List<(string Style, string Label)> row, int y)
    {
        var x = 62.0;
        if (row.Sum(e => 46 + TextWidth(e.Label)) > width - 76) x = 8;
        foreach (var (style, label) in row)
        {
            svg.Append("<path class=\"l ").Append(style).Append("\" d=\"M").Append(Px(x)).Append(' ').Append(y - 4).Append("h28\"/><text x=\"").Append(Px(x + 34)).Append("\" y=\"").Append(y)
                .Append("\">").Append(HtmlText.Escape(label)).Append("</text>");
            x += 46 + TextWidth(label);
        }
    }

    private sealed record Item(Shape Shape, string Style, IReadOnlyList<(double X, double Y)> Points, string Text, string Hover = "");

    private sealed record Frame(
        double Left, double Top, double Right, double Bottom, AxisTicks Xs, AxisTicks Ys, (double Low, double High)? XGiven, (double Low, double High)? YGiven)
    {
        private double XLow => XGiven?.Low ?? Xs.First;

        private double XHigh => XGiven?.High ?? Xs.Last;

        private double YLow => YGiven?.Low ?? Ys.First;

        private double YHigh => YGiven?.High ?? Ys.Last;

        public double X(double x) => Left + ((x - XLow) / (XHigh - XLow) * (Right - Left));

        public double Y(double y) => Bottom - ((y - YLow) / (YHigh - YLow) * (Bottom - Top));

        public bool ShowsX(int i) => Xs.At(i) >= XLow - (1e-9 * Xs.Step) && Xs.At(i) <= XHigh + (1e-9 * Xs.Step);

        public bool ShowsY(int i) => Ys.At(i) >= YLow - (1e-9 * Ys.Step) && Ys.At(i) <= YHigh + (1e-9 * Ys.Step);
    }
}
