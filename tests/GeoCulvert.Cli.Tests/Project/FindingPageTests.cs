using System.Globalization;
using System.Reflection;
using System.Text;
using GeoCulvert.Design.Basis;
using GeoCulvert.Layers;

namespace GeoCulvert.Cli.Tests.Project;

/// <summary>docs/formats/findings.md lists every code of every assembly. With GEOCULVERT_WRITE_DOCS=1 in the environment it is written instead of compared.</summary>
public class FindingPageTests
{
    [Fact]
    public void TheFindingPageIsTheProgramsOwn()
    {
        var codes = new[] { typeof(Finding).Assembly, typeof(LayerFindings).Assembly, typeof(GeoCulvert.Report.ReportCaution).Assembly }
            .SelectMany(a => a.GetExportedTypes())
            .SelectMany(t => t.GetFields(BindingFlags.Public | BindingFlags.Static))
            .Where(f => f.FieldType == typeof(FindingCode))
            .Select(f => (FindingCode)f.GetValue(null)!)
            .OrderBy(c => c.Code, StringComparer.Ordinal)
            .ToList();
        Assert.Equal(codes.Count, codes.Select(c => c.Code).Distinct(StringComparer.Ordinal).Count());
        var page = new StringBuilder("""
            # Findings

            Every doubt is a finding with a stable code. `error`: the result is missing or must not be used; `warning`: look at this before you rely on the
            result; `note`: worth knowing. Written from the program's own catalogue; a test holds the two together.

            | code | severity | what was seen | what to do |
            |---|---|---|---|

            """.ReplaceLineEndings("\n"));
        foreach (var c in codes)
            page.Append(CultureInfo.InvariantCulture, $"| `{c.Code}` | {c.Severity.ToString().ToLowerInvariant()} | {c.Meaning} | {c.Action} |\n");
        var path = Path.Combine(ProjectFileTests.Root(), "docs", "formats", "findings.md");
        if (Environment.GetEnvironmentVariable("GEOCULVERT_WRITE_DOCS") == "1") File.WriteAllText(path, page.ToString());
        Assert.Equal(page.ToString(), File.ReadAllText(path));
    }
}
