using CsCheck;
using GeoCulvert.Design.Basis;
using GeoCulvert.Design.Hydrology;

namespace GeoCulvert.Design.Tests.Hydrology;

public class RainfallEquationTests
{
    private const string Text = "return_period_yr,a_mm_per_h,b_min,c,shortest_min,longest_min,series\n2,1200,8,0.80,5,1440,annual maximum\n10,1900,9,0.80,5,1440,annual maximum\n100,3000,10,0.80,5,1440,annual maximum\n";

    // By hand: 1900/(60 + 9)^0.8 = 1900/29.5856 = 64.221 mm/h; 3000/(15 + 10)^0.8 = 3000/13.1326 = 228.44.
    [Theory]
    [InlineData(60, 10, 64.221)]
    [InlineData(15, 100, 228.44)]
    public void ByHand(double minutes, double years, double expected) =>
        Assert.Equal(expected, RainfallEquation.Read("e.csv", Text).Intensity(minutes, years).IntensityMmPerH!.Value, 0.005);

    [Fact]
    public void InchesAndMillimetresAgree()
    {
        var us = RainfallEquation.Read("e.csv", "return_period_yr,a_in_per_h,b_min,c\n10,74.80314960629921,9,0.8\n");
        Assert.Equal(1900 / Math.Pow(69, 0.8), us.Intensity(60, 10).IntensityMmPerH!.Value, 1e-9);
        Assert.Contains(us.Intensity(60, 10).Findings, f => f.Kind == RainfallFindings.EquationRangeUnknown);
    }

    // Annual maxima: z(25) = 1.7507, z(10) = 1.2816, z(100) = 2.3263 (standard tables); weight 0.4490.
    [Fact]
    public void BetweenReturnPeriodsLinearInTheDeviate()
    {
        var equation = RainfallEquation.Read("e.csv", Text);
        double a = equation.Intensity(30, 10).IntensityMmPerH!.Value, b = equation.Intensity(30, 100).IntensityMmPerH!.Value;
        Assert.Equal(a * Math.Pow(b / a, (1.7507 - 1.2816) / (2.3263 - 1.2816)), equation.Intensity(30, 25).IntensityMmPerH!.Value, 0.01);
    }

    [Fact]
    public void OutsideItFlagsOrGivesNothing()
    {
        var equation = RainfallEquation.Read("e.csv", Text);
        Assert.Empty(equation.Intensity(5, 2).Findings);
        Assert.Contains(equation.Intensity(3, 10).Findings, f => f.Kind == HydrologyFindings.RainfallExtrapolated);
        Assert.NotNull(equation.Intensity(3, 10).IntensityMmPerH);
        foreach (var (d, t) in new[] { (2.0, 10.0), (3000, 10), (60, 1.5), (60, 200) })
        {
            Assert.Null(equation.Intensity(d, t).IntensityMmPerH);
            Assert.Contains(equation.Intensity(d, t).Findings, f => f.Kind == HydrologyFindings.RainfallBeyondTable);
        }
    }

    [Fact]
    public void FallsWithDurationRisesWithReturnPeriod() => Gen.Select(Gen.Double[5, 1200], Gen.Double[2, 90], Gen.Double[1.01, 1.1]).Sample((d, t, f) =>
    {
        var equation = RainfallEquation.Read("e.csv", Text);
        double I(double d, double t) => equation.Intensity(d, t).IntensityMmPerH!.Value;
        return I(d * f, t) < I(d, t) && I(d, t * f) > I(d, t);
    });

    public static TheoryData<string> Fits() => [.. Oracle.Table("nrcs/rainfall_equation_expected.csv").Rows.Select(r => r.Text("case"))];

    [Theory]
    [MemberData(nameof(Fits))]
    public void FittedAsByScipy(string id)
    {
        var r = Oracle.Table("nrcs/rainfall_equation_expected.csv").Rows.Single(x => x.Text("case") == id);
        var fit = RainfallEquation.Fit(RainfallTable.Read("t.csv", Oracle.Rainfall(r.Text("file"))))!;
        var row = fit.Rows.Single(x => x.ReturnPeriodYr == r.Number("return_period_yr"));
        Assert.Equal(r.Number("expected"), fit.Intensity(r.Number("duration_min"), row.ReturnPeriodYr).IntensityMmPerH!.Value, r.Number("tolerance"));
        Assert.Equal(r.Number("b_min"), row.OffsetMin, 0.002);
        Assert.Equal(r.Number("c"), row.ExponentNumber, 1e-4);
        Assert.Equal(r.Number("worst_misfit"), Math.Abs(row.WorstMisfitShare!.Value), 1e-5);
    }

    [Fact]
    public void ATableMadeByAnEquationGivesItBack() => Gen.Select(Gen.Double[400, 4000], Gen.Double[0, 30], Gen.Double[0.5, 0.95]).Sample((a, b, c) =>
    {
        double[] durations = [5, 10, 15, 30, 60, 120, 360, 720, 1440];
        var text = "duration_min\\intensity_mm_per_h,10\n" + string.Join('\n', durations.Select(d => $"{d},{a / Math.Pow(d + b, c):R}"));
        var fit = RainfallEquation.Fit(RainfallTable.Read("t.csv", text))!;
        return Math.Abs(fit.Rows[0].OffsetMin - b) < 1e-3 * (1 + b) && Math.Abs(fit.Rows[0].WorstMisfitShare!.Value) < 1e-4 && fit.MisfitFinding() is null;
    }, iter: 40);

    [Fact]
    public void TheWorstMisfitIsSaid()
    {
        var fit = RainfallEquation.Fit(RainfallTable.Read("t.csv", Oracle.Rainfall("atlas14_fort_myers_fl_pds_depth_in.csv")))!;
        var worst = fit.Rows.Max(r => Math.Abs(r.WorstMisfitShare!.Value));
        Assert.Equal(worst, Math.Abs(fit.MisfitFinding(worst / 2)!.Value!.Value));
        Assert.Null(fit.MisfitFinding(worst * 1.01));
        Assert.Null(RainfallEquation.Fit(RainfallTable.Read("t.csv", "duration_min\\depth_mm,2,10\n5,8,9\n10,12,14\n15,14,17\n")));
    }

    [Theory]
    [InlineData("return_period_yr,b_min,c\n2,8,0.8\n", "e.csv line 1", "return_period_yr, b_min, c", "a_mm_per_h or a_in_per_h")]
    [InlineData("return_period_yr,a_mm_per_h,a_in_per_h,b_min,c\n2,1,1,8,0.8\n", "e.csv line 1", "a_in_per_h", "one column")]
    [InlineData("a_mm_per_h,b_min\n1,8\n", "e.csv line 1", "a_mm_per_h, b_min", "return_period_yr, c")]
    [InlineData("return_period_yr,a_mm_per_h,b_min,c\n", "e.csv", "no rows", "return period")]
    [InlineData("return_period_yr,a_mm_per_h,b_min,c\n2,0,8,0.8\n", "e.csv line 2, column a_mm_per_h", "0", "above zero")]
    [InlineData("return_period_yr,a_mm_per_h,b_min,c\n2,1200,-8,0.8\n", "e.csv line 2, column b_min", "-8", "zero or more")]
    [InlineData("return_period_yr,a_mm_per_h,b_min,c\n2,1200,8,0\n", "e.csv line 2, column c", "0", "above 0")]
    [InlineData("return_period_yr,a_mm_per_h,b_min,c\n2,x,8,0.8\n", "e.csv line 2, column a_mm_per_h", "'x'", "a number")]
    [InlineData("return_period_yr,a_mm_per_h,b_min,c\n10,1200,8,0.8\n2,1300,8,0.8\n", "e.csv line 3, column return_period_yr", "2", "rising")]
    [InlineData("return_period_yr,a_mm_per_h,b_min,c\n2,1200,8,0.8\n10,1300,8,0.9\n", "e.csv line 3", "after", "do not fall")]
    [InlineData("return_period_yr,a_mm_per_h,b_min,c,shortest_min,longest_min\n2,1200,8,0.8,60,5\n", "e.csv line 2, column longest_min", "5", "more than shortest_min")]
    [InlineData("return_period_yr,a_mm_per_h,b_min,c,shortest_min\n2,1200,8,0.8,5\n10,1900,8,0.8,10\n", "e.csv line 3, column shortest_min", "10", "same durations")]
    [InlineData("return_period_yr,a_mm_per_h,b_min,c,series\n2,1200,8,0.8,monthly\n", "e.csv line 2, column series", "'monthly'", "annual maximum")]
    public void MalformedFilesSayWhereWhatAndWhatElse(string text, string place, string found, string expected)
    {
        var problem = Assert.Single(Assert.Throws<InputException>(() => RainfallEquation.Read("e.csv", text)).Problems);
        Assert.Equal(place, problem.Place);
        Assert.Contains(found, problem.Found, StringComparison.Ordinal);
        Assert.Contains(expected, problem.Expected, StringComparison.Ordinal);
    }
}
