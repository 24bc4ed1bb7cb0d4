using GeoCulvert.Design.Basis;
using GeoCulvert.Design.Hydrology;

namespace GeoCulvert.Design.Tests.Hydrology;

public class RainfallOracleTests
{
    private const string AnnArbor = "atlas14_ann_arbor_mi_pds_depth_in.csv", FortMyers = "atlas14_fort_myers_fl_pds_depth_in.csv",
        WestLafayette = "atlas14_west_lafayette_in_pds_intensity_in_per_h.csv";

    private static RainfallTable Read(string file) => RainfallTable.Read(file, Oracle.Rainfall(file));

    // Entries read off the files by eye (NOAA Atlas 14), as printed.
    [Theory]
    [InlineData(AnnArbor, 5, 1, 0.322, 0.322 * 25.4 * 12)]
    [InlineData(AnnArbor, 60, 25, 2.07, 2.07 * 25.4)]
    [InlineData(AnnArbor, 1440, 100, 5.09, 5.09 * 25.4 / 24)]
    [InlineData(AnnArbor, 86400, 1000, 18.8, 18.8 * 25.4 / 1440)]
    [InlineData(FortMyers, 5, 1, 0.553, 0.553 * 25.4 * 12)]
    [InlineData(FortMyers, 30, 50, 3.02, 3.02 * 25.4 * 2)]
    [InlineData(FortMyers, 86400, 1000, 41.5, 41.5 * 25.4 / 1440)]
    [InlineData(WestLafayette, 5, 1, 4.76, 4.76 * 25.4)]
    [InlineData(WestLafayette, 1440, 2, 0.118, 0.118 * 25.4)]
    [InlineData(WestLafayette, 86400, 1000, 0.016, 0.016 * 25.4)]
    public void EntriesComeBackAsPrinted(string file, double durationMin, double years, double printed, double mmPerH)
    {
        var value = Read(file).Intensity(durationMin, years);
        Assert.Equal(printed, value.Corners[0].Value);
        Assert.Equal(mmPerH, value.IntensityMmPerH!.Value, 1e-9 * mmPerH);
        Assert.DoesNotContain(value.Findings, f => f.Severity > Severity.Note);
    }

    [Theory]
    [InlineData(AnnArbor, RainfallMeasure.DepthIn)]
    [InlineData(FortMyers, RainfallMeasure.DepthIn)]
    [InlineData(WestLafayette, RainfallMeasure.IntensityInPerH)]
    public void FilesAreRecognised(string file, RainfallMeasure measure)
    {
        var table = Read(file);
        Assert.Equal(measure, table.Measure);
        Assert.Equal(RainfallSeries.PartialDuration, table.Series);
        Assert.Equal(19, table.DurationsMin.Count);
        Assert.Equal([1, 2, 5, 10, 25, 50, 100, 200, 500, 1000], table.ReturnPeriodsYr);
        Assert.Contains(table.Heading, h => h.Contains("NOAA Atlas 14", StringComparison.Ordinal));
    }

    public static TheoryData<int> Interpolated() => [.. Enumerable.Range(0, Oracle.Table("expected.csv").Rows.Count)];

    [Theory]
    [MemberData(nameof(Interpolated))]
    public void InterpolatesAsTheIndependentScript(int index)
    {
        var row = Oracle.Table("expected.csv").Rows[index];
        var value = Read(row.Text("file")).Intensity(row.Number("duration_min"), row.Number("return_period_yr"));
        var expected = row.Number("expected_mm_per_h");
        Assert.Equal(expected, value.IntensityMmPerH!.Value, expected * row.Number("relative_tolerance"));
    }

    // By hand: Ann Arbor, 42 min at 25 yr lies between 30 min (1.61 in = 81.788 mm/h) and 60 min (2.07 in = 52.578 mm/h):
    // u = ln(42/30)/ln 2 = 0.485427; i = 81.788 (52.578/81.788)^0.485427 = 81.788 x 0.642857^0.485427 = 66.000 mm/h.
    [Fact]
    public void InterpolatesAsByHand() => Assert.Equal(66.000, Read(AnnArbor).Intensity(42, 25).IntensityMmPerH!.Value, 0.001);

    // Langbein: an average recurrence interval of 2 years has an annual chance of 1 - exp(-0.5) = 39.3 %; of 1 year 63.2 %, z = -0.337.
    [Fact]
    public void PartialDurationIsNotedOnce()
    {
        var table = Read(AnnArbor);
        Assert.Contains("39.3 %", table.SeriesFinding(2)!.Text, StringComparison.Ordinal);
        Assert.Null(table.SeriesFinding(10));
        Assert.Equal(-0.3375, table.Deviate(1), 5e-4);
    }

    [Fact]
    public void DepthAndIntensityFormsOfOneTableAgree()
    {
        const string depth = "duration_min\\depth_mm,2,10,100\n5,8,12,20\n15,15,22,35\n60,24,36,60\n";
        const string intensity = "duration_h\\intensity_in_per_h,2,10,100\n";
        var rows = new[] { (5, "8,12,20"), (15, "15,22,35"), (60, "24,36,60") }.Select(r =>
            $"{r.Item1 / 60.0:R}," + string.Join(',', r.Item2.Split(',').Select(v => (double.Parse(v) * 60 / r.Item1 / 25.4).ToString("R"))));
        RainfallTable a = RainfallTable.Read("a", depth), b = RainfallTable.Read("b", intensity + string.Join('\n', rows));
        foreach (var d in new[] { 5, 7.5, 15, 33, 60 })
            foreach (var t in new[] { 2, 3, 10, 50, 100.0 })
                Assert.Equal(a.Intensity(d, t).IntensityMmPerH!.Value, b.Intensity(d, t).IntensityMmPerH!.Value, 1e-9 * 100);
    }
}
