using CsCheck;
using GeoCulvert.Design.Basis;
using GeoCulvert.Design.Hydrology;

namespace GeoCulvert.Design.Tests.Hydrology;

public class DesignStormTests
{
    private static readonly RainfallTable Table = RainfallTable.Read("a.csv", Oracle.Rainfall("atlas14_ann_arbor_mi_pds_depth_in.csv"));

    private static MassCurve Nested(double duration, double block, double position, double years = 25) =>
        new NestedStorm(duration, block, position).Build(years, new(Table)).Rain!;

    // The point of the nested storm: every duration about its peak holds the table's own depth (Ann Arbor, 25 yr, in the file: 1.19 in over
    // 15 min, 1.61 in over 30 min, 2.07 in over 60 min, 2.53 in over 2 h).
    [Theory]
    [InlineData(15, 1.19)]
    [InlineData(30, 1.61)]
    [InlineData(60, 2.07)]
    [InlineData(120, 2.53)]
    public void EveryDurationHoldsItsDepth(double minutes, double inches) => Assert.Equal(inches * 25.4, Nested(1440, 5, 0.5).LargestDepthMm(minutes), 1e-6);

    [Fact]
    public void NestedWhereverThePeakLies() => Gen.Select(Gen.Double[0, 1], Gen.Int[1, 12]).Sample((position, k) =>
        Math.Abs(Nested(360, 15, position).LargestDepthMm(15 * k) - Table.Intensity(15 * k, 25).DepthMm!.Value) < 1e-6, iter: 50);

    // By hand: depths 10, 16, 20, 22 mm in 1, 2, 3, 4 blocks are 10, 6, 4, 2; 10 at the third place, 6 after it, 4 before it,
    // and 2 before that, where there is room.
    [Fact]
    public void BlocksAlternate()
    {
        var table = RainfallTable.Read("t.csv", "duration_min\\depth_mm,10,25\n10,10,11\n20,16,17\n30,20,21\n40,22,23\n");
        var sum = new NestedStorm(40, 10).Build(10, new(table)).Rain!.CumulativeMm;
        Assert.Equal([2, 4, 10, 6], Enumerable.Range(1, 4).Select(k => Math.Round(sum[k] - sum[k - 1], 9)));
        var early = new NestedStorm(40, 10, 0).Build(10, new(table)).Rain!.CumulativeMm;
        Assert.Equal([10, 6, 4, 2], Enumerable.Range(1, 4).Select(k => Math.Round(early[k] - early[k - 1], 9)));
        var late = new NestedStorm(40, 10, 1).Build(10, new(table)).Rain!.CumulativeMm;
        Assert.Equal([2, 4, 6, 10], Enumerable.Range(1, 4).Select(k => Math.Round(late[k] - late[k - 1], 9)));
    }

    [Theory]
    [InlineData(1440, 7, 0.5)]
    [InlineData(1440, 0, 0.5)]
    [InlineData(1440, 0.01, 0.5)]
    [InlineData(1440, 5, 1.5)]
    [InlineData(1440, 1, 0.5)] // blocks shorter than half the table's shortest duration
    public void NestedStormsThatCannotBeMade(double duration, double block, double position)
    {
        var storm = new NestedStorm(duration, block, position).Build(25, new(Table));
        Assert.Null(storm.Rain);
        Assert.Contains(storm.Findings, f => f.Kind == HydrologyFindings.InputMissing);
    }

    [Theory]
    [InlineData(NrcsStormType.I)]
    [InlineData(NrcsStormType.IA)]
    [InlineData(NrcsStormType.II)]
    [InlineData(NrcsStormType.III)]
    public void TypesRunFromZeroToOneOverADay(NrcsStormType type)
    {
        var unit = NrcsStorm.Unit(type);
        Assert.Equal((0, 0, 1440, 1), (unit.TimesMin[0], unit.CumulativeMm[0], unit.DurationMin, unit.DepthMm));
        Assert.Equal(unit.TimesMin.Order(), unit.TimesMin);
        Assert.Equal(unit.CumulativeMm.Order(), unit.CumulativeMm);
        Assert.Equal(unit.TimesMin.Count, unit.TimesMin.Distinct().Count());
        var storm = new NrcsStorm(type).Build(25, new(Table));
        Assert.Equal(Table.Intensity(1440, 25).DepthMm!.Value, storm.Rain!.DepthMm, 1e-9);
        Assert.Contains(storm.Findings, f => f.Kind == NrcsFindings.StormFromMemory);
    }

    [Theory]
    [InlineData("time_min,depth_mm\n10,5\n30,10\n")]
    [InlineData("time_min,depth_mm\n0,0\n10,5\n30,10\n")]
    [InlineData("time_h,cumulative_mm\n0,0\n0.16666666666666666,5\n0.5,15\n")]
    [InlineData("time_min,cumulative_in\n10,0.19685039370078738\n30,0.5905511811023622\n")]
    [InlineData("\uFEFFtime_min , note ,depth_in\r\n10,first,0.19685039370078738\r\n30,,0.3937007874015748\r\n")]
    public void GivenStormsAreRead(string text)
    {
        var rain = GivenStorm.Read("s.csv", text).Build(10, new()).Rain!;
        Assert.Equal((15.0, 30.0), (Math.Round(rain.DepthMm, 9), rain.DurationMin));
        Assert.Equal(10, rain.AtMm(20), 1e-9);
    }

    [Fact]
    public void SharesTakeTheirDepthFromTheTableOrOutright()
    {
        var storm = GivenStorm.Read("s.csv", "time_min,cumulative_share\n0,0\n30,0.7\n60,1\n");
        Assert.True(storm.NeedsDepth);
        Assert.Equal(2.07 * 25.4, storm.Build(25, new(Table)).Rain!.DepthMm, 1e-9);
        Assert.Equal(35, storm.WithDepthMm(50).Build(25, new()).Rain!.AtMm(30), 1e-9);
        Assert.Null(storm.Build(25, new()).Rain);
    }

    [Theory]
    [InlineData("", "s.csv", "an empty file", "heading")]
    [InlineData("minutes,depth_mm\n5,1\n", "s.csv line 1", "minutes", "time_min or time_h")]
    [InlineData("time_min,rain\n5,1\n", "s.csv line 1", "rain", "cumulative_mm")]
    [InlineData("time_min,depth_mm,depth_in\n5,1,1\n", "s.csv line 1", "depth_in", "one of the columns")]
    [InlineData("time_min,depth_mm\n", "s.csv", "no rows", "5,1.2")]
    [InlineData("time_min,depth_mm\n5,x\n", "s.csv line 2, column depth_mm", "'x'", "a number")]
    [InlineData("time_min,depth_mm\n5,\n", "s.csv line 2, column depth_mm", "nothing", "a number")]
    [InlineData("time_min,depth_mm\n5,-1\n", "s.csv line 2, column depth_mm", "-1", "zero or more")]
    [InlineData("time_min,depth_mm\n5,1\n5,2\n", "s.csv line 3, column time_min", "5 after 5", "rising")]
    [InlineData("time_min,depth_mm\n-5,1\n", "s.csv line 2, column time_min", "-5", "above zero")]
    [InlineData("time_min,depth_mm\n0,3\n5,1\n", "s.csv line 2, column depth_mm", "3 at time 0", "where the storm begins")]
    [InlineData("time_min,cumulative_mm\n5,2\n10,1\n", "s.csv line 3, column cumulative_mm", "1 after 2", "does not fall")]
    [InlineData("time_min,cumulative_share\n5,0.5\n10,0.9\n", "s.csv line 3, column cumulative_share", "0.9", "ends at 1")]
    [InlineData("time_min,depth_mm\n5,0\n10,0\n", "s.csv", "no rain at all", "above zero")]
    [InlineData("time_min,depth_mm\n5,NaN\n", "s.csv line 2, column depth_mm", "'NaN'", "a number")]
    public void MalformedStormsSayWhereWhatAndWhatElse(string text, string place, string found, string expected)
    {
        var problem = Assert.Single(Assert.Throws<InputException>(() => GivenStorm.Read("s.csv", text)).Problems);
        Assert.Equal(place, problem.Place);
        Assert.Contains(found, problem.Found, StringComparison.Ordinal);
        Assert.Contains(expected, problem.Expected, StringComparison.Ordinal);
    }

    [Fact]
    public void AllProblemsOfAStormAtOnce() =>
        Assert.Equal(3, Assert.Throws<InputException>(() => GivenStorm.Read("s.csv", "time_min,depth_mm\n5,x\n10,-1\n15,3\n12,2\n")).Problems.Count);
}
