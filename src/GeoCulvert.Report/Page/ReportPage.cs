using System.Security.Cryptography;
using System.Text;
using GeoCulvert.Design.Basis;
using GeoCulvert.Design.Study;

namespace GeoCulvert.Report.Page;

/// <summary>Writes <c>report.html</c>: one file with map, list and a sheet per crossing; it opens offline and refers to nothing outside.</summary>
public static class ReportPage
{
    /// <summary>Runs before anything is laid out, so that sheets which are not shown are never laid out.</summary>
    private const string LiveScript = "document.documentElement.classList.add('live')";

    /// <summary>Writes the page as UTF-8; the same study gives the same bytes.</summary>
    /// <param name="report">The study; layers in output units, sheets in SI.</param>
    /// <param name="output">Receives the page; stays open.</param>
    public static void Write(StudyReport report, Stream output)
    {
        ArgumentNullException.ThrowIfNull(report);
        ArgumentNullException.ThrowIfNull(output);
        using var writer = new StreamWriter(output, new UTF8Encoding(false), 1 << 16, leaveOpen: true);
        var crossings = LayerTable.Open(report, "crossings");
        var entries = CrossingEntry.All(report, crossings);
        var (style, script) = (Resource("report.css"), Resource("report.js"));
        var html = new StringBuilder();
        AppendHead(html, report, style, script);
        AppendTop(html, report, entries);
        html.Append("<main><div class=\"work\"><section class=\"mapbox\" aria-label=\"Map\"><div class=\"bar\" role=\"group\" aria-label=\"Layers\">");
        foreach (var (key, label, isOn) in MapSvg.Layers)
            html.Append("<label><input type=\"checkbox\" data-switch=\"").Append(key).Append(isOn ? "\" checked>" : "\">").Append(label).Append("</label>");
        html.Append("</div><div class=\"frame\">");
        var exaggeration = MapSvg.Append(html, report, entries);
        html.Append("<div class=\"zoom\"><button type=\"button\" data-zoom=\"in\" aria-label=\"Zoom in\">+</button><button type=\"button\" data-zoom=\"out\" aria-label=\"Zoom out\">\u2212</button><button type=\"button\" data-zoom=\"all\" aria-label=\"Show all\">All</button></div></div>");
        html.Append("<p class=\"under\"><span id=\"where\">Point at the map for coordinates</span> <span>").Append(HtmlText.Isolated(report.CrsName)).Append("; relief from the terrain model")
            .Append(exaggeration > 1 ? ", heights times " + FigureText.Round(exaggeration, QuantityKind.None) : "").Append("</span></p></section>");
        html.Append("<section class=\"listbox\" aria-label=\"Crossings\"><div class=\"bar\"><label class=\"find\">Search <input type=\"search\" id=\"find\"></label><label><input type=\"checkbox\" id=\"look\">Needs a look first (")
            .Append(entries.Count(e => e.NeedsLook)).Append(")</label><span id=\"shown\" role=\"status\">").Append(entries.Count).Append(" crossings</span></div>");
        WorkList.Append(html, report, crossings, entries);
        html.Append("</section></div><section id=\"sheets\" aria-label=\"Sheets\"><div class=\"sheetbar\"><span id=\"chosen\">Choose a crossing in the list or on the map to see its sheet.</span><button type=\"button\" id=\"prev\">Previous</button><button type=\"button\" id=\"next\">Next</button><button type=\"button\" id=\"print1\">Print this sheet</button><button type=\"button\" id=\"printall\">Print all sheets</button></div>");
        var isPacked = entries.Count > SheetPack.LargestPlainStudy;
        if (isPacked) html.Append("<noscript><p>This large study keeps its sheets packed; they need scripting to open.</p></noscript>");
        writer.Write(html);
        foreach (var group in entries.Chunk(isPacked ? SheetPack.SheetsPerPack : 1))
        {
            html.Clear();
            foreach (var entry in group) SheetHtml.Append(html, report, entry);
            if (isPacked) SheetPack.Write(writer, group[0].Index, group.Length, html.ToString());
            else writer.Write(html.Append('\n'));
        }
        html.Clear();
        html.Append("</section>");
        AppendRun(html, report);
        writer.Write(html.Append("</main><script>").Append(script).Append("</script></body></html>\n"));
    }

    private static void AppendHead(StringBuilder html, StudyReport report, string style, string script)
    {
        // The page may run its own script and nothing else, and may load nothing: a name that slipped through could still do no harm.
        html.Append("<!DOCTYPE html>\n<html lang=\"en\"><head><meta charset=\"utf-8\"><meta http-equiv=\"Content-Security-Policy\" content=\"default-src 'none'; img-src data:; style-src 'unsafe-inline'; script-src ")
            .Append(Hash(LiveScript)).Append(' ').Append(Hash(script)).Append("; base-uri 'none'; form-action 'none'\"><meta name=\"viewport\" content=\"width=device-width, initial-scale=1\"><meta name=\"color-scheme\" content=\"light dark\"><link rel=\"icon\" href=\"data:,\"><title>")
            .Append(HtmlText.Escape(report.StudyName)).Append(": culverts</title><script>").Append(LiveScript).Append("</script><style>").Append(style).Append("@page{@bottom-left{content:")
            .Append(HtmlText.CssString(HtmlText.Shorten(report.StudyName, 60) + "  " + SheetHtml.RunLine(report))).Append("}}</style></head><body>");
    }

    private static string Hash(string script) => $"'sha256-{Convert.ToBase64String(SHA256.HashData(Encoding.UTF8.GetBytes(script)))}'";

    private static void AppendTop(StringBuilder html, StudyReport report, IReadOnlyList<CrossingEntry> entries)
    {
        html.Append("<header class=\"top\"><div><h1>").Append(HtmlText.Isolated(report.StudyName)).Append("</h1><p class=\"run\">").Append(HtmlText.Escape(SheetHtml.RunLine(report))).Append(" \u00b7 ")
            .Append(report.Units == UnitSystem.Si ? "SI units" : "US units").Append(" \u00b7 ").Append(HtmlText.Isolated(report.CrsName)).Append("</p></div><ul class=\"counts\">");
        Count(entries.Count, entries.Count == 1 ? "crossing" : "crossings", "");
        foreach (var group in entries.GroupBy(e => e.Status, StringComparer.Ordinal).OrderBy(g => g.Key, StringComparer.Ordinal))
            Count(group.Count(), group.Key, group.First().HasNoCulvert ? "bad" : "");
        var look = entries.Count(e => e.NeedsLook);
        Count(look, look == 1 ? "needs a look first" : "need a look first", "look");
        foreach (var severity in new[] { Severity.Error, Severity.Warning, Severity.Note })
        {
            var count = report.Findings.Count(f => f.Severity == severity);
            Count(count, severity.ToString().ToLowerInvariant() + (count == 1 ? "" : "s"), "");
        }
        html.Append("</ul></header><p class=\"caution\" role=\"note\"><strong>Caution.</strong> ").Append(HtmlText.Escape(ReportCaution.Text)).Append("</p>");
        var whole = report.Findings.Where(f => f.CrossingId is null).OrderByDescending(f => f.Severity).ToList();
        if (whole.Count == 0) return;
        html.Append("<details class=\"whole\"").Append(whole[0].Severity >= Severity.Warning ? " open" : "").Append("><summary>Findings on the whole run (").Append(whole.Count).Append(")</summary><ul class=\"findings\">");
        foreach (var finding in whole) SheetHtml.FindingItem(html, finding);
        html.Append("</ul></details>");

        void Count(int count, string label, string style) =>
            html.Append("<li class=\"").Append(style).Append("\"><b>").Append(count).Append("</b> ").Append(HtmlText.Escape(label)).Append("</li>");
    }

    private static void AppendRun(StringBuilder html, StudyReport report)
    {
        html.Append("<details class=\"runfacts\"><summary>Inputs and settings of this run</summary><div class=\"tables\"><table class=\"grid\"><caption>Inputs</caption><thead><tr><th scope=\"col\">File</th><th scope=\"col\">Used for</th><th scope=\"col\" class=\"n\">Bytes</th><th scope=\"col\">Coordinate system</th><th scope=\"col\">SHA-256</th></tr></thead><tbody>");
        foreach (var i in report.Inputs)
            html.Append("<tr><td>").Append(HtmlText.Isolated(i.Path)).Append("</td><td>").Append(HtmlText.Escape(i.Role)).Append("</td><td class=\"n\">").Append(i.Bytes).Append("</td><td>").Append(HtmlText.Escape(i.Crs))
                .Append("</td><td><code title=\"").Append(HtmlText.Escape(i.Sha256)).Append("\">").Append(HtmlText.Escape(HtmlText.Shorten(i.Sha256, 17))).Append("</code></td></tr>");
        html.Append("</tbody></table><table class=\"grid\"><caption>Settings</caption><thead><tr><th scope=\"col\">Key</th><th scope=\"col\">Value</th></tr></thead><tbody>");
        foreach (var (key, value) in report.Settings)
            html.Append("<tr><td><code>").Append(HtmlText.Escape(key)).Append("</code></td><td>").Append(HtmlText.Isolated(value)).Append("</td></tr>");
        html.Append("</tbody></table></div></details>");
    }

    private static string Resource(string name)
    {
        using var stream = typeof(ReportPage).Assembly.GetManifestResourceStream(name) ?? throw new InvalidOperationException($"Resource {name} is missing.");
        using var reader = new StreamReader(stream, Encoding.UTF8);
        return reader.ReadToEnd().ReplaceLineEndings("\n");
    }
}
