using System.Globalization;
using System.Text;
using GeoCulvert.Design.Basis;
using GeoCulvert.Design.Study;

namespace GeoCulvert.Report.Page;

/// <summary>The list of crossings as a worklist, worst first.</summary>
internal static class WorkList
{
    public static void Append(StringBuilder html, StudyReport report, LayerTable crossings, IReadOnlyList<CrossingEntry> entries)
    {
        string Unit(QuantityKind kind) => FigureText.Unit(kind, report.Units);
        html.Append("<div class=\"scroll\" tabindex=\"-1\"><table id=\"list\"><caption class=\"vh\">Crossings, worst first. Headings sort.</caption><thead><tr>");
        Heading("Crossing", "", "t");
        Heading("Station", "", "n");
        Heading("Area", Unit(QuantityKind.Area), "n");
        Heading("Design flow", Unit(QuantityKind.Flow), "n");
        Heading("Culvert", "", "t");
        Heading("Control", "", "t");
        Heading("Headwater / limit", Unit(QuantityKind.Length), "n");
        Heading("Velocity", Unit(QuantityKind.Velocity), "n");
        Heading("Findings", "", "n");
        html.Append("</tr></thead><tbody>");
        var hasRoads = entries.Select(e => RoadOf(crossings, e)).Distinct(StringComparer.Ordinal).Take(2).Count() > 1;
        foreach (var entry in CrossingEntry.WorstFirst(entries)) AppendRow(html, crossings, entry, hasRoads);
        html.Append("</tbody></table><p id=\"none\" hidden>No crossing fits the search.</p></div>");

        void Heading(string text, string unit, string kind)
        {
            html.Append("<th scope=\"col\" class=\"").Append(kind).Append("\"><button type=\"button\">").Append(text);
            if (unit.Length > 0) html.Append(" <small>").Append(unit).Append("</small>");
            html.Append("</button></th>");
        }
    }

    /// <summary>A cell with the rounded figure, the full value on hover and for sorting.</summary>
    public static void Cell(StringBuilder html, double? value, QuantityKind kind)
    {
        html.Append("<td class=\"n\"");
        if (value is { } v && double.IsFinite(v)) html.Append(" data-v=\"").Append(FigureText.Full(v)).Append("\" title=\"").Append(FigureText.Full(v)).Append('"');
        html.Append('>').Append(FigureText.Round(value, kind)).Append("</td>");
    }

    /// <summary>The address of a crossing within the page.</summary>
    public static string Address(string crossingId) => "#crossing=" + Uri.EscapeDataString(ValidUtf16(crossingId));

    private static void AppendRow(StringBuilder html, LayerTable crossings, CrossingEntry entry, bool hasRoads)
    {
        double? Number(string name, QuantityKind kind) => entry.Row is null ? null : crossings.Number(entry.Row, name, kind);
        var station = Number("station", QuantityKind.Length);
        html.Append("<tr data-c=\"").Append(entry.Index).Append(entry.NeedsLook ? "\" data-look=\"1\"" : "\"").Append("><td><a href=\"").Append(HtmlText.Escape(Address(entry.Id)))
            .Append("\" title=\"").Append(HtmlText.Escape(entry.Id)).Append("\"><i class=\"dot ").Append(entry.HasNoCulvert ? "bad" : entry.NeedsLook ? "look" : "ok").Append("\"></i>")
            .Append(HtmlText.Isolated(HtmlText.Shorten(entry.Id, 28))).Append("</a></td>");
        html.Append("<td class=\"st\" data-v=\"").Append(entry.Index).Append("\" title=\"").Append(station is { } s ? FigureText.Full(s) : "").Append("\"><span>")
            .Append(HtmlText.Escape(entry.Sheet?.Station ?? FigureText.Round(station, QuantityKind.Length))).Append("</span>");
        if (hasRoads) html.Append(" <small>").Append(HtmlText.Isolated(HtmlText.Shorten(RoadOf(crossings, entry), 24))).Append("</small>");
        html.Append("</td>");
        Cell(html, Number("watershed_area", QuantityKind.Area), QuantityKind.Area);
        Cell(html, entry.DesignFlow, QuantityKind.Flow);
        html.Append("<td class=\"cu\" title=\"").Append(HtmlText.Escape(entry.Culvert)).Append("\">")
            .Append(entry.Culvert.Length > 0 ? HtmlText.Isolated(HtmlText.Shorten(entry.Culvert, 60)) : "<em>" + HtmlText.Escape(entry.Status) + "</em>").Append("</td><td>")
            .Append(HtmlText.Escape(entry.Row is null ? "" : crossings.Text(entry.Row, "control"))).Append("</td>");
        AppendHeadwater(html, entry);
        Cell(html, Number("outlet_velocity", QuantityKind.Velocity), QuantityKind.Velocity);
        AppendFindings(html, entry);
        html.Append("</tr>");
    }

    private static string RoadOf(LayerTable crossings, CrossingEntry entry) => entry.Sheet?.Road ?? (entry.Row is null ? "" : crossings.Text(entry.Row, "road"));

    private static void AppendHeadwater(StringBuilder html, CrossingEntry entry)
    {
        var (level, limit) = entry.Headwater;
        html.Append("<td class=\"n\"");
        if (level is { } h && limit is { } l) html.Append(" data-v=\"").Append(FigureText.Full(h - l)).Append('"');
        if (level is not null || limit is not null)
            html.Append(" title=\"").Append(level is { } a ? FigureText.Full(a) : FigureText.Missing).Append(" / ").Append(limit is { } b ? FigureText.Full(b) : FigureText.Missing).Append('"');
        html.Append('>').Append(level > limit ? "<strong class=\"over\">" : "").Append(FigureText.Round(level, QuantityKind.Length)).Append(level > limit ? "</strong>" : "")
            .Append(" <small>/ ").Append(FigureText.Round(limit, QuantityKind.Length)).Append("</small></td>");
    }

    private static void AppendFindings(StringBuilder html, CrossingEntry entry)
    {
        var (errors, warnings, notes) = (entry.Count(Severity.Error), entry.Count(Severity.Warning), entry.Count(Severity.Note));
        var urgency = (errors * 1e6) + (warnings * 1e3) + notes;
        html.Append("<td class=\"fi\" data-v=\"").Append(urgency.ToString("F0", CultureInfo.InvariantCulture)).Append("\" title=\"")
            .Append(HtmlText.Escape(entry.Findings.Count > 0 ? entry.Findings[0].Sentence : "No findings")).Append("\">");
        Badge("error", errors);
        Badge("warning", warnings);
        Badge("note", notes);
        html.Append("</td>");

        void Badge(string severity, int count)
        {
            if (count > 0) html.Append("<span class=\"b ").Append(severity).Append("\">").Append(count).Append(' ').Append(severity).Append(count > 1 ? "s" : "").Append("</span> ");
        }
    }

    private static string ValidUtf16(string text) => string.Concat(text.EnumerateRunes().Select(r => r.ToString()));
}
