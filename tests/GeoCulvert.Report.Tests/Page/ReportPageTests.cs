using System.Net;
using System.Text;
using System.Text.RegularExpressions;
using System.Xml.Linq;
using GeoCulvert.Design.Basis;
using GeoCulvert.Design.Study;
using GeoCulvert.Report.Page;

namespace GeoCulvert.Report.Tests.Page;

public sealed class ReportPageTests
{
    private static readonly TimeSpan Patience = TimeSpan.FromSeconds(20);

    private static readonly Lazy<string> Calm = new(() => Skeleton(Page(InventedStudy.Make(name: "calm"))));

    public static TheoryData<string> HostileNames =>
    [
        "<script>alert(1)</script>",
        "\"><img src=x onerror=alert(1)>",
        "' onmouseover='alert(1)",
        "</title></style></script><!-- ]]> {{x}} ${y} &lt; \\22",
        "\u202Etxt.exe\u2066 \u05e9\u05dc\u05d5\u05dd\u200f\u200e\0\u001b",
        "javascript:alert(1)//%00#crossing=%",
        new string('W', 300),
        "\uD800 lone surrogate",
    ];

    [Theory]
    [MemberData(nameof(HostileNames))]
    public void HostileNamesStayText(string name)
    {
        var page = Page(InventedStudy.Make(name: name));
        Assert.Equal(Calm.Value, Skeleton(page));
        Assert.Equal(page.Length, page.Count(c => c is >= ' ' or '\n' or '\r') + page.Count(c => c == '\t'));
        Assert.DoesNotContain('\u202E', page);
        foreach (var svg in Svgs(page)) _ = XElement.Parse(svg);
    }

    [Theory]
    [InlineData(UnitSystem.Si)]
    [InlineData(UnitSystem.Us)]
    public void DrawingsAreWellFormedWithATitleEach(UnitSystem units)
    {
        var page = Page(InventedStudy.Make(units));
        var svgs = Svgs(page).Select(s => XElement.Parse(s)).ToList();

        // The map; flow path and outline for seven crossings; section and rating for the six that have a culvert.
        Assert.Equal(1 + (7 * 2) + (6 * 2), svgs.Count);
        Assert.All(svgs, s => Assert.False(string.IsNullOrWhiteSpace(s.Element("title")?.Value)));
        Assert.DoesNotMatch(new Regex("NaN|Infinity|\u221e", RegexOptions.None, Patience), Regex.Replace(string.Concat(svgs), "data:image/png;base64,[A-Za-z0-9+/=]*", "", RegexOptions.None, Patience));
    }

    [Fact]
    public void RefersToNothingOutside()
    {
        var page = Page(InventedStudy.Make());
        var addresses = Regex.Matches(page, @"https?://[^\s'""<]*", RegexOptions.None, Patience).Select(m => m.Value).Distinct(StringComparer.Ordinal);
        Assert.All(addresses, a => Assert.Equal("http://www.w3.org/2000/svg", a));
        Assert.All(Regex.Matches(page, @"\b(?:src|href|action|srcset|data)=""(?<v>[^""]{0,20})", RegexOptions.None, Patience), m => Assert.Matches("^(#crossing=|data:)", m.Groups["v"].Value));
        Assert.DoesNotContain("@import", page, StringComparison.OrdinalIgnoreCase);
        Assert.DoesNotMatch(new Regex(@"url\(", RegexOptions.None, Patience), page);
        Assert.Contains("default-src &#39;none&#39;", page.Replace("'", "&#39;", StringComparison.Ordinal), StringComparison.Ordinal);
    }

    [Fact]
    public void TheScriptsItAllowsAreTheScriptsItHolds()
    {
        var page = Page(InventedStudy.Make());
        var scripts = Regex.Matches(page, "<script>(?<s>.*?)</script>", RegexOptions.Singleline, Patience).Select(m => m.Groups["s"].Value).ToList();
        var hashes = scripts.Select(s => $"'sha256-{Convert.ToBase64String(System.Security.Cryptography.SHA256.HashData(Encoding.UTF8.GetBytes(s)))}'");
        Assert.Contains($"script-src {string.Join(' ', hashes)};", page, StringComparison.Ordinal);
        Assert.Equal(2, Regex.Count(page, "<script", RegexOptions.None, Patience));
        Assert.DoesNotMatch(new Regex(@"innerHTML|outerHTML|insertAdjacentHTML|document\.write|eval\(|fetch\(|XMLHttp|import\(", RegexOptions.None, Patience), string.Concat(scripts));
    }

    [Fact]
    public void ALargeStudyPacksTheSameSheets()
    {
        var report = InventedStudy.Make(copies: 18);
        Assert.Equal(126, report.Sheets.Count);
        var page = Page(report);
        Assert.DoesNotContain("<article", page, StringComparison.Ordinal);
        var packs = Regex.Matches(page, "<script type=\"application/zlib\" data-first=\"(?<f>\\d+)\" data-count=\"(?<n>\\d+)\">(?<b>[A-Za-z0-9+/=]+)</script>", RegexOptions.None, Patience);
        var sheets = string.Concat(packs.Select(m => Inflate(m.Groups["b"].Value)));
        Assert.Equal(126, packs.Sum(m => int.Parse(m.Groups["n"].Value, System.Globalization.CultureInfo.InvariantCulture)));
        var ids = Regex.Matches(sheets, "<article class=\"sheet\" data-c=\"(?<c>\\d+)\" id=\"crossing=(?<i>[^\"]*)\"", RegexOptions.None, Patience);
        Assert.Equal(report.Sheets.Select((s, i) => (i, s.CrossingId)), ids.Select(m => (int.Parse(m.Groups["c"].Value, System.Globalization.CultureInfo.InvariantCulture), m.Groups["i"].Value)));
        foreach (var svg in Svgs(sheets)) _ = XElement.Parse(svg);
    }

    [Fact]
    public void SameStudySameBytes() => Assert.Equal(Bytes(InventedStudy.Make()), Bytes(InventedStudy.Make()));

    [Theory]
    [InlineData(UnitSystem.Si)]
    [InlineData(UnitSystem.Us)]
    public void EveryFigureOfTheListIsTheLayersRounded(UnitSystem units)
    {
        var report = InventedStudy.Make(units);
        var table = LayerTable.Open(report, "crossings");
        var rows = ListRows(Page(report));
        Assert.Equal(table.Rows.Count, rows.Count);
        foreach (var row in table.Rows)
        {
            var cells = rows.Single(r => r[0].Text == table.Text(row, "crossing_id"));
            Check(2, "watershed_area", QuantityKind.Area);
            Check(3, "design_flow", QuantityKind.Flow);
            Check(7, "outlet_velocity", QuantityKind.Velocity);
            Assert.Equal(table.Text(row, "control"), cells[5].Text);
            var (level, limit) = (table.Number(row, "headwater_elevation", QuantityKind.Length), table.Number(row, "headwater_limit_elevation", QuantityKind.Length));
            Assert.Equal($"{FigureText.Round(level, QuantityKind.Length)} / {FigureText.Round(limit, QuantityKind.Length)}", cells[6].Text);

            void Check(int cell, string name, QuantityKind kind)
            {
                var value = table.Number(row, name, kind);
                Assert.Equal(FigureText.Round(value, kind), cells[cell].Text);
                if (value is { } v) Assert.Equal(v, double.Parse(cells[cell].Title, System.Globalization.CultureInfo.InvariantCulture));
            }
        }
    }

    [Fact]
    public void WorstStandFirst()
    {
        // K-04 has no size; K-03 breaks its freeboard and touches the edge; K-05 to K-07 break theirs; K-01 and K-02 stand.
        var order = ListRows(Page(InventedStudy.Make())).Select(r => r[0].Text).ToList();
        Assert.Equal(["K-04", "K-03"], order.Take(2));
        Assert.Equal(["K-05", "K-06", "K-07"], order.Skip(2).Take(3).Order(StringComparer.Ordinal));
        Assert.Equal(["K-01", "K-02"], order.Skip(5).Order(StringComparer.Ordinal));
    }

    [Fact]
    public void EverySheetCarriesStudyCrossingRunAndCaution()
    {
        var report = InventedStudy.Make();
        var sheets = Regex.Matches(Page(report), "<article.*?</article>", RegexOptions.Singleline, Patience).Select(m => m.Value).ToList();
        Assert.Equal(report.Sheets.Count, sheets.Count);
        for (var i = 0; i < sheets.Count; i++)
        {
            var text = Plain(sheets[i]);
            Assert.All(new[] { report.StudyName, report.Sheets[i].CrossingId, report.Version, report.RunDate, ReportCaution.Text }, t => Assert.Contains(t, text, StringComparison.Ordinal));
        }
    }

    [Fact]
    public void AStudyWithoutLayersOrSheetsStillMakesAPage()
    {
        var page = Page(InventedStudy.Make() with { Layers = [], Sheets = [], Findings = [] });
        Assert.Contains("0</b> crossings", page, StringComparison.Ordinal);
        foreach (var svg in Svgs(page)) _ = XElement.Parse(svg);
    }

    private static string Inflate(string base64)
    {
        using var zlib = new System.IO.Compression.ZLibStream(new MemoryStream(Convert.FromBase64String(base64)), System.IO.Compression.CompressionMode.Decompress);
        using var reader = new StreamReader(zlib, Encoding.UTF8);
        return reader.ReadToEnd();
    }

    private static string Page(StudyReport report) => new UTF8Encoding(false, true).GetString(Bytes(report));

    private static byte[] Bytes(StudyReport report)
    {
        using var stream = new MemoryStream();
        ReportPage.Write(report, stream);
        return stream.ToArray();
    }

    private static IEnumerable<string> Svgs(string page) => Regex.Matches(page, "<svg.*?</svg>", RegexOptions.Singleline, Patience).Select(m => m.Value);

    /// <summary>Tags and attribute names in order, without texts and values: what a name must never change.</summary>
    private static string Skeleton(string page)
    {
        var body = Regex.Replace(page, "<style>.*?</style>|<script>.*?</script>", "", RegexOptions.Singleline, Patience);
        return string.Join('\n', Regex.Matches(body, @"<[^>]*>", RegexOptions.Singleline, Patience).Select(m => Regex.Replace(m.Value, "=\"[^\"]*\"", "=", RegexOptions.None, Patience)));
    }

    private static List<List<(string Text, string Title)>> ListRows(string page)
    {
        var list = Regex.Match(page, "<table id=\"list\".*?</table>", RegexOptions.Singleline, Patience).Value;
        return [.. Regex.Matches(list, "<tr data-c.*?</tr>", RegexOptions.Singleline, Patience).Select(r => Regex.Matches(r.Value, "<td(?<a>[^>]*)>(?<t>.*?)</td>", RegexOptions.Singleline, Patience)
            .Select(c => (Plain(c.Groups["t"].Value), Regex.Match(c.Groups["a"].Value, "title=\"(?<v>[^\"]*)\"", RegexOptions.None, Patience).Groups["v"].Value)).ToList())];
    }

    private static string Plain(string html) => WebUtility.HtmlDecode(Regex.Replace(html, "<[^>]*>", "", RegexOptions.None, Patience)).Trim();
}
