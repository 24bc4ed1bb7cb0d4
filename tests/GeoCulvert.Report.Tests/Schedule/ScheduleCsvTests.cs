using System.Text;
using GeoCulvert.Design.Basis;
using GeoCulvert.Design.Study;
using GeoCulvert.Report.Schedule;

namespace GeoCulvert.Report.Tests.Schedule;

public sealed class ScheduleCsvTests
{
    [Theory]
    [InlineData("K-01", "K-01")]
    [InlineData("=1+1", "'=1+1")]
    [InlineData("+1", "'+1")]
    [InlineData("-1", "'-1")]
    [InlineData("@SUM(A1)", "'@SUM(A1)")]
    [InlineData("\t=1", "\"'\t=1\"")]
    [InlineData("\r=1", "\"'\r=1\"")]
    [InlineData("  =1", "'  =1")]
    [InlineData("\uff1d1", "'\uff1d1")]
    [InlineData("a,b", "\"a,b\"")]
    [InlineData("say \"x\"", "\"say \"\"x\"\"\"")]
    [InlineData("two\nlines", "\"two\nlines\"")]
    [InlineData("", "")]
    public void TextsCannotBecomeFormulas(string text, string expected) => Assert.Equal(expected, ScheduleCsv.Field(text));

    [Theory]
    [InlineData(UnitSystem.Si, "span_m", "design_flow_m3_s", "watershed_area_km2", "design_return_period_yr")]
    [InlineData(UnitSystem.Us, "span_ft", "design_flow_cfs", "watershed_area_mi2", "design_return_period_yr")]
    public void HeadingsCarryUnits(UnitSystem units, params string[] headings)
    {
        var table = Read(InventedStudy.Make(units), out _);
        Assert.All(headings, h => Assert.Contains(h, table[0].Fields));
    }

    [Fact]
    public void ARowACrossingWithRoundedFiguresAndTheCaution()
    {
        var report = InventedStudy.Make();
        var table = Read(report, out var text);
        Assert.Equal(report.Sheets.Count + 1, table.Count);
        Assert.All(table, r => Assert.Equal(table[0].Fields.Count, r.Fields.Count));
        Assert.Equal(table.Count, text.Split("\r\n").Length - 1);
        string At(int row, string heading) => table[row].Fields[table[0].Fields.ToList().IndexOf(heading)];

        // The invented figures of K-03: 7.9342 m3/s, 1.512400 km2, inlet 1432.117 + 2240/777, fall 0.437 m in 24.5 m, HW/D 1.18.
        Assert.Equal(["K-03", "2+240", "7.93", "1.51", "1435.00", "0.0178", "1.18", "2", "2"], new[] { "crossing_id", "station", "design_flow_m3_s", "watershed_area_km2", "inlet_elevation_m", "slope", "hw_over_d", "barrels", "findings" }.Select(h => At(3, h)));
        Assert.Equal(("no size fits", "", ""), (At(4, "status"), At(4, "span_m"), At(4, "slope")));
        Assert.All(Enumerable.Range(1, 7), r => Assert.Equal(ReportCaution.Short, At(r, "remarks")));
    }

    [Fact]
    public void HostileNamesStayInTheirField()
    {
        var hostile = "=HYPERLINK(\"x\"),\r\n;\u202e<b>" + new string('x', 300);
        var table = Read(InventedStudy.Make(name: hostile), out _);
        Assert.Equal(8, table.Count);
        Assert.Equal("'" + hostile, table[1].Fields[0]);
    }

    private static IReadOnlyList<CsvRecord> Read(StudyReport report, out string text)
    {
        using var stream = new MemoryStream();
        ScheduleCsv.Write(report, stream);
        text = Encoding.UTF8.GetString(stream.ToArray());
        return CsvText.Read(text);
    }
}
