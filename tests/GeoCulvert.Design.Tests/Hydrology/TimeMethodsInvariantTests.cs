using CsCheck;
using GeoCulvert.Design.Hydrology;

namespace GeoCulvert.Design.Tests.Hydrology;

public class TimeMethodsInvariantTests
{
    private static readonly RainfallTable Table = RainfallTable.Read("a.csv", Oracle.Rainfall("atlas14_ann_arbor_mi_pds_depth_in.csv"));
    private static readonly TimeOfConcentrationContext Context = new(Table, ReturnPeriodYr: 10);

    private static readonly ITimeOfConcentration[] Methods =
        [new Kirpich(), new NrcsVelocityMethod(), new Kerby(0.4), new KerbyKirpich(0.4), new FaaTime(), new NrcsLag(), new BransbyWilliams(), new PapadakisKazan(), new KinematicWave()];

    private static Catchment Even(double lengthM, double slope, double areaM2 = 20e4, double c = 0.3, double cn = 75, double? channelAt = null) => new("x", areaM2)
    {
        LongestFlowPathM = lengthM, FlowPathEndToEndSlopeMPerM = slope, MeanBasinSlopeMPerM = slope, RunoffCoefficient = new(c, "given"), CurveNumber = cn,
        FlowPath = [.. Enumerable.Range(0, 51).Select(i => new FlowPathPoint(lengthM * i / 50, slope * lengthM * (50 - i) / 50, "71"))],
        ChannelBeginsAtM = channelAt ?? lengthM / 2, Channel = new(0.3, 0.05),
    };

    [Fact]
    public void LongerPathsTakeLongerAndSteeperOnesAreFaster() => Gen.Select(Gen.Double[100, 4000], Gen.Double[1.05, 2], Gen.Double[0.003, 0.2]).Sample((length, f, slope) =>
        Methods.All(m =>
        {
            double T(double l, double s) => m.Compute(Even(l, s), Context).TimeMin!.Value;
            return T(length * f, slope) > T(length, slope) && T(length, slope * f) < T(length, slope) && T(length, slope) > 0 && double.IsFinite(T(length, slope));
        }), iter: 40);

    [Fact]
    public void RunoffSpeedsItUpWhereTheEquationSaysSo() => Gen.Select(Gen.Double[0.1, 0.9], Gen.Double[45, 95]).Sample((c, cn) =>
        new FaaTime().Compute(Even(200, 0.02, c: c + 0.05), Context).TimeMin < new FaaTime().Compute(Even(200, 0.02, c: c), Context).TimeMin
        && new NrcsLag().Compute(Even(200, 0.02, cn: cn + 2), Context).TimeMin < new NrcsLag().Compute(Even(200, 0.02, cn: cn), Context).TimeMin);

    [Fact]
    public void RarerRainIsFasterWhereIntensityCounts()
    {
        foreach (var m in new ITimeOfConcentration[] { new PapadakisKazan(), new KinematicWave() })
            Assert.True(m.Compute(Even(300, 0.02), Context with { ReturnPeriodYr = 100 }).TimeMin < m.Compute(Even(300, 0.02), Context with { ReturnPeriodYr = 2 }).TimeMin);
    }

    [Fact]
    public void TheIterationAgreesWithItself() => Gen.Select(Gen.Double[50, 3000], Gen.Double[0.002, 0.1], Gen.Double[2, 300]).Sample((length, slope, years) =>
    {
        var result = new PapadakisKazan(0.1).Compute(Even(length, slope), Context with { ReturnPeriodYr = years });
        // A time shorter than the table allows is said so, and has no intensity of its own.
        if (result.Findings.Any(f => f.Kind == TimeFindings.IterationEnd)) return true;
        var i = Table.Intensity(result.TimeMin!.Value, years).IntensityMmPerH!.Value;
        return Math.Abs(PapadakisKazan.TimeMin(length, 0.1, slope, i) / result.TimeMin.Value - 1) < 1e-6;
    }, iter: 300);

    [Fact]
    public void TimesShorterThanTheRainfallUseItsEndAndSaySo()
    {
        var result = new PapadakisKazan(0.01).Compute(Even(10, 0.2), Context);
        Assert.Contains(result.Findings, f => f.Kind == TimeFindings.IterationEnd);
        var end = Table.Intensity(2.5, 10).IntensityMmPerH!.Value;
        Assert.Equal(PapadakisKazan.TimeMin(10, 0.01, 0.2, end), result.TimeMin!.Value, 0.15 * result.TimeMin.Value);
    }

    [Fact]
    public void MissingFiguresAreFindings()
    {
        Assert.All(Methods, m => Assert.Null(m.Compute(new("x", 1e5), Context).TimeMin));
        Assert.All(Methods, m => Assert.Contains(m.Compute(new("x", 1e5), Context).Findings, f => f.Kind == HydrologyFindings.InputMissing));
        TimeOfConcentration[] results =
        [
            new Kerby(null).Compute(Even(100, 0.02), Context), new KerbyKirpich(null).Compute(Even(100, 0.02), Context),
            new FaaTime().Compute(Even(100, 0.02) with { RunoffCoefficient = null }, Context), new NrcsLag().Compute(Even(100, 0.02) with { CurveNumber = null }, Context),
            new NrcsLag().Compute(Even(100, 0.02) with { MeanBasinSlopeMPerM = null }, Context), new PapadakisKazan().Compute(Even(100, 0.02), new(Table)),
            new PapadakisKazan().Compute(Even(100, 0.02), new(ReturnPeriodYr: 10)), new KinematicWave().Compute(Even(100, 0.02), new(Table)),
            new PapadakisKazan().Compute(Even(100, 0.02) with { FlowPath = [new(0, 2, null), new(100, 0, null)] }, Context), new BransbyWilliams().Compute(Even(100, 0.02, 0), Context),
            new Kerby(0.4).Compute(Even(100, 0), Context),
        ];
        Assert.All(results, r => Assert.Null(r.TimeMin));
        Assert.All(results, r => Assert.Contains(r.Findings, f => f.Kind == HydrologyFindings.InputMissing));
    }

    public static TheoryData<string> Ranges() => [.. RangeCases.Keys];

    private static readonly Dictionary<string, (ITimeOfConcentration Method, Catchment Outside, Catchment? Inside)> RangeCases = new()
    {
        ["kerby length"] = (new Kerby(0.4), Even(400, 0.02), Even(300, 0.02)),
        ["kerby retardance"] = (new Kerby(0.9), Even(300, 0.02), null),
        ["kerby-kirpich area"] = (new KerbyKirpich(0.4), Even(3000, 0.01, 0.6e6), Even(3000, 0.01, 1e6)),
        ["kerby-kirpich slope"] = (new KerbyKirpich(0.4), Even(3000, 0.03, 1e6), null),
        ["kerby-kirpich path"] = (new KerbyKirpich(0.4), Even(1500, 0.01, 1e6), null),
        ["faa length"] = (new FaaTime(), Even(400, 0.02), Even(300, 0.02)),
        ["lag curve number"] = (new NrcsLag(), Even(400, 0.02, cn: 45), Even(400, 0.02, cn: 50)),
        ["lag area"] = (new NrcsLag(), Even(400, 0.02, 9e6), null),
        ["lag slope"] = (new NrcsLag(), Even(400, 0.004), null),
        ["bransby area"] = (new BransbyWilliams(), Even(4000, 0.02, 140e6), Even(4000, 0.02, 120e6)),
        ["papadakis area"] = (new PapadakisKazan(), Even(1000, 0.02, 3e6), Even(1000, 0.02, 2e6)),
    };

    [Theory]
    [MemberData(nameof(Ranges))]
    public void OutsideItsRangeItIsComputedAndFlagged(string name)
    {
        var (method, outside, inside) = RangeCases[name];
        var result = method.Compute(outside, Context);
        Assert.NotNull(result.TimeMin);
        Assert.Single(result.Findings, f => f.Kind == TimeFindings.OutsideRange);
        if (inside is not null) Assert.DoesNotContain(method.Compute(inside, Context).Findings, f => f.Kind == TimeFindings.OutsideRange);
    }

    [Fact]
    public void KerbyKirpichEndsTheOverlandPartAtTheChannel()
    {
        double Overland(double length, double? channel) => new KerbyKirpich(0.4).Compute(Even(length, 0.01, channelAt: channel), Context).Steps.Single(s => s.Name == "overland_length_m").Value;
        Assert.Equal(200, Overland(2000, 200), 1e-9);
        Assert.Equal(Kerby.LongestOverlandM, Overland(2000, 1500), 1e-9);
        Assert.Equal(100, Overland(100, 1500), 1e-9);
        var none = new KerbyKirpich(0.4).Compute(Even(2000, 0.01, channelAt: 0), Context);
        Assert.Equal(Kirpich.TimeMin(2000, 0.01), none.TimeMin!.Value, 1e-9);
    }

    [Fact]
    public void KinematicSheetTakesThePlaceOfTheOtherAndTheRestStays()
    {
        var catchment = Even(800, 0.02);
        var velocity = new NrcsVelocityMethod().Compute(catchment, new(TwoYear24HourDepthMm: 60));
        var wave = new KinematicWave().Compute(catchment, Context);
        Assert.Equal(velocity.Segments.Where(s => s.Kind != "sheet"), wave.Segments.Where(s => s.Kind != "sheet"));
        Assert.Equal(wave.TimeMin!.Value, wave.Segments.Sum(s => s.TimeMin), 1e-9);
        Assert.Equal(0.15, wave.Steps.Single(s => s.Name == "sheet_roughness").Value, 1e-9);
        // The intensity is that over the whole time, not over the sheet flow alone.
        var i = Table.Intensity(wave.TimeMin.Value, 10).IntensityMmPerH!.Value;
        Assert.Equal(KinematicWave.SheetTimeMin(30, 0.15, 0.02, i), wave.Segments.Single(s => s.Kind == "sheet").TimeMin, 1e-6);
    }

    // A rational flow goes with the intensity, so by hand: i(48 min)/i(60 min) and i(72 min)/i(60 min) of the table.
    [Fact]
    public void TwentyPercentOfTimeInTermsOfFlow()
    {
        var catchment = new Catchment("x", 36e4) { RunoffCoefficient = new(0.3, "given") };
        var s = TimeSensitivity.Of(new RationalMethod(), catchment, 25, new(Table, 60))!;
        double I(double t) => Table.Intensity(t, 25).IntensityMmPerH!.Value;
        Assert.Equal(I(48) / I(60), s.ShorterTimeRatio!.Value, 1e-12);
        Assert.Equal(I(72) / I(60), s.LongerTimeRatio!.Value, 1e-12);
        Assert.Empty(s.Findings);
        Assert.NotEmpty(TimeSensitivity.Of(new RationalMethod(), catchment, 25, new(Table, 60), notedShare: 0.01)!.Findings);
        Assert.Null(TimeSensitivity.Of(new RationalMethod(), catchment, 25, new(Table)));
        var design = new DesignFlowRule("rational").Compute(catchment, [new RationalMethod()], [10, 25], new(Table, 60));
        Assert.Equal([10.0, 25.0], design.Select(d => d.TimeSensitivity!.ReturnPeriodYr));
        Assert.Equal(s.ShorterTimeFlowM3PerS, design[1].TimeSensitivity!.ShorterTimeFlowM3PerS);
        Assert.Equal(design[1].FlowM3PerS, design[1].TimeSensitivity!.FlowM3PerS);
    }

    [Fact]
    public void NineMethodsUnderOneRule()
    {
        var chosen = new TimeOfConcentrationRule(TimeOfConcentrationChoice.Median).Compute(Even(900, 0.02), Methods, Context);
        Assert.Equal(9, chosen.All.Count);
        Assert.Equal(chosen.All.Select(t => t.TimeMin!.Value).Order().ElementAt(4), chosen.TimeMin!.Value);
        Assert.True(chosen.SpreadRatio > 1);
    }
}
