using System.Text;
using GeoCulvert.Design.Basis;
using GeoCulvert.Design.Study;
using GeoCulvert.Report.Plots;

namespace GeoCulvert.Report.Page;

/// <summary>The sheet of one crossing, as a reviewer follows it.</summary>
internal sealed class SheetHtml
{
    private readonly StringBuilder html;
    private readonly StudyReport report;
    private readonly CrossingSheet sheet;
    private readonly CrossingEntry entry;

    private SheetHtml(StringBuilder html, StudyReport report, CrossingSheet sheet, CrossingEntry entry) =>
        (this.html, this.report, this.sheet, this.entry) = (html, report, sheet, entry);

    private UnitSystem Units => report.Units;

    public static void Append(StringBuilder html, StudyReport report, CrossingEntry entry)
    {
        if (entry.Sheet is { } sheet) new SheetHtml(html, report, sheet, entry).Write();
    }

    private static string E(string? text) => HtmlText.Escape(text);

    private string Unit(QuantityKind kind) => FigureText.Unit(kind, Units);

    private void Write()
    {
        html.Append("<article class=\"sheet\" data-c=\"").Append(entry.Index).Append("\" id=\"").Append(E("crossing=" + sheet.CrossingId)).Append("\" aria-labelledby=\"h").Append(entry.Index)
            .Append("\"><table class=\"paper\" role=\"presentation\"><thead><tr><td>").Append(HtmlText.Isolated(HtmlText.Shorten(report.StudyName, 90))).Append(" \u00b7 crossing ")
            .Append(HtmlText.Isolated(HtmlText.Shorten(sheet.CrossingId, 60))).Append(" \u00b7 ").Append(E(RunLine(report))).Append("</td></tr></thead><tbody><tr><td>");
        html.Append("<header><h2 id=\"h").Append(entry.Index).Append("\" tabindex=\"-1\">").Append(HtmlText.Isolated(sheet.CrossingId)).Append(" <span class=\"where\">").Append(HtmlText.Isolated(sheet.Road))
            .Append(" at ").Append(E(sheet.Station)).Append("</span></h2><p class=\"answer ").Append(entry.HasNoCulvert ? "bad" : entry.NeedsLook ? "look" : "ok").Append("\"><strong>")
            .Append(HtmlText.Isolated(sheet.Culvert.Length > 0 ? sheet.Culvert : sheet.Status)).Append("</strong> <span>").Append(E(sheet.Status)).Append("</span></p></header>");
        Findings();
        Criteria();
        if (sheet.Barrel is { } barrel)
            Figure("wide", "Culvert in section along the barrel", BarrelSection.Write(barrel, sheet.Floods, Units, $"Section along the barrel of {Short}"), $"{barrel.Description}. Heights are exaggerated against lengths.");
        Floods();
        html.Append("<div class=\"pair\">");
        if (sheet.Rating.Count > 1)
            Figure("", "Headwater rating", RatingPlot.Write(sheet.Rating, Units, sheet.Barrel?.RoadElevationM, sheet.Floods, $"Headwater rating of {Short}", isStandalone: false), "");
        if (sheet.FlowPathProfile.Count > 1)
            Figure("", "Longest flow path", FlowPathPlot.Write(sheet.FlowPathProfile, Units, $"Profile of the longest flow path of {Short}"), "");
        html.Append("</div>");
        Flows();
        Facts();
        Options();
        Calculations();
        html.Append("</td></tr></tbody><tfoot><tr><td>").Append(E(ReportCaution.Text)).Append("</td></tr></tfoot></table></article>");

        // HTML lets a browser supply these end tags; without them the page is a tenth smaller.
        html.Replace("</td>", "").Replace("</tr>", "").Replace("</th>", "");
    }

    /// <summary>"version 1.2, run of 2026-01-31".</summary>
    public static string RunLine(StudyReport report) => "version " + report.Version + (report.RunDate.Length > 0 ? ", run of " + report.RunDate : "");

    private string Short => HtmlText.Shorten(sheet.CrossingId, 60);

    private void Figure(string style, string heading, string svg, string caption)
    {
        if (svg.Length == 0) return;
        html.Append("<figure class=\"").Append(style).Append("\"><h3>").Append(heading).Append("</h3>").Append(svg);
        if (caption.Length > 0) html.Append("<figcaption>").Append(E(caption)).Append("</figcaption>");
        html.Append("</figure>");
    }

    private void Findings()
    {
        if (entry.Findings.Count == 0) return;
        html.Append("<section><h3>Findings</h3><ul class=\"findings\">");
        foreach (var finding in entry.Findings) FindingItem(html, finding);
        html.Append("</ul></section>");
    }

    /// <summary>A finding with its severity, text, code and action.</summary>
    public static void FindingItem(StringBuilder html, Finding finding)
    {
        var severity = finding.Severity.ToString().ToLowerInvariant();
        html.Append("<li><span class=\"b ").Append(severity).Append("\">").Append(severity).Append("</span> <span>").Append(HtmlText.Isolated(finding.Sentence)).Append(" <em>").Append(E(finding.Action))
            .Append("</em> <code>").Append(E(finding.Code)).Append("</code></span></li>");
    }

    private void Criteria()
    {
        if (sheet.Criteria.Count == 0) return;
        Open("Criteria", "Criterion", "At", "#Found", "#Limit", "Result", "Source of the limit");
        foreach (var c in sheet.Criteria)
        {
            html.Append(c.IsMet ? "<tr><td>" : "<tr class=\"broken\"><td>").Append(E(c.Name)).Append("</td><td>").Append(E(c.Flood)).Append("</td>");
            Value(c.Value, c.Kind);
            Value(c.Limit, c.Kind);
            html.Append(c.IsMet ? "<td class=\"met\">met</td>" : "<td class=\"not\">broken</td>").Append("<td class=\"src\">").Append(E(c.Source)).Append("</td></tr>");
        }
        Close();
    }

    private void Floods()
    {
        if (sheet.Floods.Count == 0) return;
        Open("Floods through the culvert", "Flood", $"#Flow ({Unit(QuantityKind.Flow)})", $"#Headwater ({Unit(QuantityKind.Length)})", $"#Tailwater ({Unit(QuantityKind.Length)})",
            $"#Outlet velocity ({Unit(QuantityKind.Velocity)})", $"#Over the road ({Unit(QuantityKind.Flow)})", "Control", "Water surface");
        foreach (var f in sheet.Floods)
        {
            html.Append("<tr><td>").Append(E(f.Name)).Append("</td>");
            Si(f.FlowM3PerS, QuantityKind.Flow);
            Si(f.HeadwaterElevationM, QuantityKind.Length);
            Si(f.TailwaterElevationM, QuantityKind.Length);
            Si(f.OutletVelocityMPerS, QuantityKind.Velocity);
            Si(f.RoadFlowM3PerS, QuantityKind.Flow);
            html.Append("<td>").Append(E(f.Control)).Append("</td><td>").Append(E(f.ProfileName)).Append("</td></tr>");
        }
        Close();
    }

    private void Flows()
    {
        if (sheet.Flows.Count == 0) return;
        var years = sheet.Flows.Select(f => f.ReturnPeriodYr).Distinct().Order().ToList();
        Open($"Flows by method ({Unit(QuantityKind.Flow)})", ["Method", .. years.Select(y => "#" + FigureText.Round(y, QuantityKind.Years) + " yr")]);
        foreach (var method in sheet.Flows.Select(f => f.Method).Distinct(StringComparer.Ordinal))
        {
            var own = sheet.Flows.Where(f => string.Equals(f.Method, method, StringComparison.Ordinal)).ToList();
            html.Append("<tr><th scope=\"row\">").Append(E(method)).Append(own.Any(f => f.IsChosen) ? " <span class=\"b chosen\">chosen</span>" : "").Append("</th>");
            foreach (var year in years)
            {
                var flow = own.FirstOrDefault(f => f.ReturnPeriodYr == year);
                html.Append("<td class=\"n").Append(flow?.IsChosen == true ? " pick" : "").Append("\" title=\"").Append(flow?.FlowM3PerS is { } q ? Full(q, QuantityKind.Flow) : "").Append("\">")
                    .Append(FigureText.FromSi(flow?.FlowM3PerS, QuantityKind.Flow, Units));
                if (flow is { LowerM3PerS: { } low, UpperM3PerS: { } up })
                    html.Append(" <small>").Append(FigureText.FromSi(low, QuantityKind.Flow, Units)).Append('\u2013').Append(FigureText.FromSi(up, QuantityKind.Flow, Units)).Append("</small>");
                html.Append("</td>");
            }
            html.Append("</tr>");
        }
        Close();
    }

    private void Facts()
    {
        html.Append("<div class=\"facts\">");
        if (sheet.Watershed is not null) Figure("", "Watershed", WatershedThumb.Write(sheet, Units), "");
        foreach (var group in sheet.Groups)
        {
            Open(group.Heading, "Item", "#Value", "From");
            foreach (var fact in group.Facts)
            {
                html.Append("<tr><td>").Append(E(fact.Label)).Append("</td>");
                if (fact.Value is { } v) Value(v, fact.Kind);
                else html.Append("<td class=\"n tx\">").Append(E(fact.Text ?? FigureText.Missing)).Append("</td>");
                html.Append("<td class=\"src\">").Append(E(fact.Origin)).Append("</td></tr>");
            }
            Close();
        }
        html.Append("</div>");
    }

    private void Options()
    {
        if (sheet.Options.Count == 0) return;
        Open("Options rated", "Culvert", $"#Barrel area ({Unit(QuantityKind.SmallArea)})", $"#Headwater ({Unit(QuantityKind.Length)})", "#HW/D", $"#Outlet velocity ({Unit(QuantityKind.Velocity)})", "Result");
        foreach (var o in sheet.Options)
        {
            html.Append(string.Equals(o.Status, "chosen", StringComparison.Ordinal) ? "<tr class=\"pick\"><td>" : "<tr><td>").Append(E(o.Culvert)).Append("</td>");
            Si(o.BarrelAreaM2, QuantityKind.SmallArea);
            Si(o.HeadwaterElevationM, QuantityKind.Length);
            html.Append("<td class=\"n\" title=\"").Append(FigureText.Full(o.HeadwaterOverRise)).Append("\">").Append(double.IsFinite(o.HeadwaterOverRise) ? FigureText.Decimals(o.HeadwaterOverRise, 2) : FigureText.Missing).Append("</td>");
            Si(o.OutletVelocityMPerS, QuantityKind.Velocity);
            html.Append("<td>").Append(E(o.Status)).Append("</td></tr>");
        }
        Close();
    }

    private void Calculations()
    {
        if (sheet.Calculations.Count == 0) return;
        html.Append("<section class=\"calc\"><h3>Calculations</h3>");
        foreach (var calculation in sheet.Calculations)
        {
            html.Append("<table class=\"grid\"><caption>").Append(E(calculation.Heading)).Append("</caption><thead class=\"vh\"><tr><th>Quantity</th><th>Value</th><th>Formula with numbers</th><th>Source</th></tr></thead><tbody>");
            foreach (var step in calculation.Steps)
            {
                html.Append("<tr><td title=\"").Append(E(step.Name)).Append("\">").Append(E(StepLabel(step))).Append("</td><td class=\"n\" title=\"").Append(FigureText.Full(step.Value)).Append("\">")
                    .Append(StepValue(step.Value)).Append(' ').Append(E(FigureText.Pretty(step.Unit))).Append("</td><td class=\"fo\">").Append(E(step.Formula)).Append("</td><td class=\"src\">")
                    .Append(E(step.Source)).Append("</td></tr>");
            }
            html.Append("</tbody></table>");
        }
        html.Append("</section>");
    }

    /// <summary>Six significant figures without trailing zeros, enough to check by hand.</summary>
    private static string StepValue(double value)
    {
        if (!double.IsFinite(value)) return FigureText.Missing;
        var text = FigureText.Significant(value, 6);
        return text.Contains('.', StringComparison.Ordinal) && !text.Contains('E', StringComparison.Ordinal) ? text.TrimEnd('0').TrimEnd('.') : text;
    }

    private static string StepLabel(Step step)
    {
        var name = step.Name;
        foreach (var suffix in new[] { Design.Basis.Units.Find(step.Unit)?.Suffix, step.Unit.Replace("/", "_per_", StringComparison.Ordinal), step.Unit.Replace('/', '_') })
        {
            if (suffix is { Length: > 0 } && name.EndsWith("_" + suffix, StringComparison.Ordinal)) name = name[..^(suffix.Length + 1)];
        }
        return name.Replace('_', ' ');
    }

    private string Full(double si, QuantityKind kind) => FigureText.Full(DisplayUnits.FromSi(si, kind, Units));

    private void Si(double value, QuantityKind kind) =>
        html.Append("<td class=\"n\" title=\"").Append(Full(value, kind)).Append("\">").Append(FigureText.FromSi(value, kind, Units)).Append("</td>");

    private void Value(double value, QuantityKind kind) =>
        html.Append("<td class=\"n\" title=\"").Append(Full(value, kind)).Append("\">").Append(FigureText.WithUnit(value, kind, Units)).Append("</td>");

    /// <summary>Opens a titled table; a heading that begins with # is of a column of figures.</summary>
    private void Open(string heading, params string[] columns)
    {
        html.Append("<section><h3>").Append(E(heading)).Append("</h3><table class=\"grid\"><thead><tr>");
        foreach (var column in columns)
            html.Append(column.StartsWith('#') ? "<th scope=\"col\" class=\"n\">" : "<th scope=\"col\">").Append(E(column.TrimStart('#'))).Append("</th>");
        html.Append("</tr></thead><tbody>");
    }

    private void Close() => html.Append("</tbody></table></section>");
}
