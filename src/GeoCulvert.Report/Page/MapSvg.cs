using System.Globalization;
using System.Text;
using GeoCulvert.Design.Basis;
using GeoCulvert.Design.Study;
using GeoCulvert.Report.Relief;
using NetTopologySuite.Geometries;

namespace GeoCulvert.Report.Page;

/// <summary>The map: layers as groups of one inline SVG over the shaded relief.</summary>
internal sealed class MapSvg
{
    private const int LongestSideUnits = 16000;
    private const int FillColours = 6;
    private static readonly string[] StreamAreaNames = ["drainage_area", "watershed_area", "area"];

    private readonly StudyReport report;
    private readonly IReadOnlyList<CrossingEntry> entries;
    private readonly Dictionary<string, int> indexOf;
    private readonly MapPath path;
    private readonly StringBuilder svg;

    private MapSvg(StudyReport report, IReadOnlyList<CrossingEntry> entries, StringBuilder svg)
    {
        (this.report, this.entries, this.svg) = (report, entries, svg);
        indexOf = entries.ToDictionary(e => e.Id, e => e.Index, StringComparer.Ordinal);
        path = new MapPath(report.Relief.Frame, LongestSideUnits, 4);
    }

    /// <summary>Layers that can be switched: key, label, drawn at first.</summary>
    public static IReadOnlyList<(string Key, string Label, bool IsOn)> Layers { get; } =
    [
        ("relief", "Relief", true), ("watersheds", "Watersheds", true), ("outlines", "Total outlines", false), ("streams", "Streams", true),
        ("flowpaths", "Flow paths", true), ("roads", "Roads", true), ("stations", "Stations", true), ("culverts", "Culverts", true), ("labels", "Labels", true),
    ];

    /// <summary>Appends the map; returns the vertical exaggeration of its relief.</summary>
    public static double Append(StringBuilder svg, StudyReport report, IReadOnlyList<CrossingEntry> entries) => new MapSvg(report, entries, svg).Draw();

    private double Draw()
    {
        var frame = report.Relief.Frame;
        var metresPerUnit = Units.FromSi(path.UnitM, DisplayUnits.Symbol(QuantityKind.Length, report.Units));
        var u = path.Width / 760.0;
        svg.Append("<svg id=\"map\" tabindex=\"0\" role=\"application\" aria-label=\"Map. Arrow keys move, plus and minus zoom, 0 shows all.\" viewBox=\"0 0 ")
            .Append(path.Width).Append(' ').Append(path.Height).Append("\" style=\"--u:").Append(Short(u)).Append("\" data-w=\"").Append(path.Width).Append("\" data-h=\"")
            .Append(path.Height).Append("\" data-west=\"").Append(FigureText.Full(frame.West)).Append("\" data-north=\"").Append(FigureText.Full(frame.North))
            .Append("\" data-unit=\"").Append(FigureText.Full(path.UnitM)).Append("\" data-length=\"").Append(FigureText.Full(metresPerUnit))
            .Append("\" data-symbol=\"").Append(DisplayUnits.Symbol(QuantityKind.Length, report.Units)).Append("\"><title>Map of the study area over shaded relief</title>");
        var exaggeration = DrawRelief();
        DrawWatersheds();
        DrawStreams();
        DrawFlowPaths();
        RoadLines.Append(svg, report, path, [.. entries.Select(e => e.Row?.Geometry?.Coordinate).OfType<Coordinate>()]);
        DrawBarrels();
        DrawMarkers();
        svg.Append("<g id=\"furniture\" aria-hidden=\"true\"></g></svg>");
        return exaggeration;
    }

    private double DrawRelief()
    {
        using var png = new MemoryStream();
        var (frame, exaggeration) = HillshadePng.Write(report.Relief, png);
        svg.Append("<g data-layer=\"relief\"><image width=\"").Append(Short((frame.East - frame.West) / path.UnitM)).Append("\" height=\"")
            .Append(Short((frame.North - frame.South) / path.UnitM)).Append("\" preserveAspectRatio=\"none\" href=\"data:image/png;base64,")
            .Append(Convert.ToBase64String(png.GetBuffer(), 0, (int)png.Length)).Append("\"/></g>");
        return exaggeration;
    }

    private void DrawWatersheds()
    {
        var local = LayerTable.Open(report, "local_watersheds");
        var total = LayerTable.Open(report, "watersheds");
        var fills = local.Rows.Count > 0 ? local : total;
        var rows = fills.Rows.Where(r => r.Geometry is { IsEmpty: false }).OrderByDescending(r => r.Geometry!.Area).ToList();
        var colours = Colours([.. rows.Select(r => r.Geometry!.EnvelopeInternal)]);
        svg.Append("<g data-layer=\"watersheds\">");
        for (var i = 0; i < rows.Count; i++) AppendPath("w w" + colours[i], fills.Text(rows[i], "crossing_id"), rows[i].Geometry!);
        svg.Append("</g><g data-layer=\"outlines\" class=\"hide\">");
        foreach (var row in total.Rows.Where(r => r.Geometry is { IsEmpty: false })) AppendPath("tw", total.Text(row, "crossing_id"), row.Geometry!);
        svg.Append("</g>");
    }

    /// <summary>A colour per outline: the one least used among those whose extents meet it.</summary>
    private static int[] Colours(List<Envelope> extents)
    {
        var colours = new int[extents.Count];
        Span<int> used = stackalloc int[FillColours];
        for (var i = 0; i < extents.Count; i++)
        {
            used.Clear();
            for (var j = 0; j < i; j++)
            {
                if (extents[i].Intersects(extents[j])) used[colours[j]] += FillColours;
            }
            used[i % FillColours]--;
            var best = 0;
            for (var c = 1; c < FillColours; c++) best = used[c] < used[best] ? c : best;
            colours[i] = best;
        }
        return colours;
    }

    private void DrawStreams()
    {
        var streams = LayerTable.Open(report, "streams");
        var areas = streams.Rows.Select(r => StreamAreaNames
            .Select(n => streams.Number(r, n, QuantityKind.Area)).FirstOrDefault(a => a is > 0) ?? 0).ToList();
        var largest = areas.Count == 0 ? 0 : areas.Max();
        var classes = Enumerable.Range(0, 5).Select(_ => new StringBuilder()).ToArray();
        for (var i = 0; i < areas.Count; i++)
        {
            var step = areas[i] > 0 ? (int)(2 * Math.Log10(largest / areas[i])) : 2;
            classes[4 - Math.Clamp(step, 0, 4)].Append(path.Data(streams.Rows[i].Geometry));
        }
        svg.Append("<g data-layer=\"streams\">");
        for (var c = 0; c < 5; c++)
        {
            if (classes[c].Length > 0) svg.Append("<path class=\"st s").Append(c).Append("\" d=\"").Append(classes[c]).Append("\"/>");
        }
        svg.Append("</g>");
    }

    private void DrawFlowPaths()
    {
        var lines = LayerTable.Open(report, "flow_paths");
        svg.Append("<g data-layer=\"flowpaths\">");
        foreach (var row in lines.Rows.Where(r => r.Geometry is { IsEmpty: false })) AppendPath("fp", lines.Text(row, "crossing_id"), row.Geometry!);
        svg.Append("</g>");
    }

    private void DrawBarrels()
    {
        var culverts = LayerTable.Open(report, "culverts");
        svg.Append("<g data-layer=\"culverts\">");
        foreach (var row in culverts.Rows.Where(r => r.Geometry is { IsEmpty: false }))
        {
            var data = path.Data(row.Geometry);
            if (data.Length > 0) svg.Append("<path class=\"bh\" d=\"").Append(data).Append("\"/><path class=\"ba\" d=\"").Append(data).Append("\"/>");
        }
        svg.Append("</g>");
    }

    private void DrawMarkers()
    {
        var flowUnit = FigureText.Unit(QuantityKind.Flow, report.Units);
        svg.Append("<g data-layer=\"culverts labels\" id=\"marks\">");
        foreach (var entry in entries)
        {
            if ((entry.Row?.Geometry as Point ?? entry.Row?.Geometry?.Centroid) is not { IsEmpty: false } point) continue;
            var (x, y) = path.Place(point.X, point.Y);
            var (style, shape) = entry.HasNoCulvert ? ("bad", "M-7-7H7V7H-7zM-7-7L7 7M7-7L-7 7") : entry.NeedsLook ? ("look", "M0-8L8 6H-8z") : ("ok", "M-5.5 0a5.5 5.5 0 1 0 11 0a5.5 5.5 0 1 0-11 0");
            var culvert = entry.Culvert.Length > 0 ? entry.Culvert : entry.Status;
            var flow = entry.DesignFlow is null ? "" : FigureText.Round(entry.DesignFlow, QuantityKind.Flow) + " " + flowUnit;
            svg.Append("<g class=\"m ").Append(style).Append("\" data-c=\"").Append(entry.Index).Append("\" transform=\"translate(").Append(x).Append(' ').Append(y)
                .Append(")\"><g class=\"k\"><title>").Append(HtmlText.Escape($"{HtmlText.Shorten(entry.Id, 80)}: {HtmlText.Shorten(culvert, 80)} {flow}")).Append("</title><path d=\"").Append(shape)
                .Append("\"/><text class=\"lb\"><tspan class=\"id\" x=\"11\" y=\"-2\">").Append(HtmlText.Escape(HtmlText.Shorten(entry.Id, 24))).Append("</tspan><tspan class=\"full\" x=\"11\" y=\"11\">")
                .Append(HtmlText.Escape(HtmlText.Shorten(culvert, 36))).Append(flow.Length > 0 ? ", " : "").Append(flow).Append("</tspan></text></g></g>");
        }
        svg.Append("</g>");
    }

    private void AppendPath(string style, string crossingId, Geometry geometry)
    {
        var data = path.Data(geometry);
        if (data.Length == 0) return;
        svg.Append("<path class=\"").Append(style).Append('"');
        if (indexOf.TryGetValue(crossingId, out var index)) svg.Append(" data-c=\"").Append(index).Append('"');
        svg.Append(" d=\"").Append(data).Append("\"/>");
    }

    private static string Short(double value) => value.ToString("0.###", CultureInfo.InvariantCulture);
}
