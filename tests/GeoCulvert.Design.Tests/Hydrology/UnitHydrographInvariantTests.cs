using CsCheck;
using GeoCulvert.Design.Hydrology;

namespace GeoCulvert.Design.Tests.Hydrology;

public class UnitHydrographInvariantTests
{
    private static readonly RainfallTable Table = RainfallTable.Read("a.csv", Oracle.Rainfall("atlas14_fort_myers_fl_pds_depth_in.csv"));

    private static readonly Gen<IDesignStorm> Storms = Gen.OneOf(
        Gen.Enum<NrcsStormType>().Select(t => (IDesignStorm)new NrcsStorm(t)),
        Gen.Select(Gen.Int[4, 40], Gen.Double[0, 1]).Select((n, p) => (IDesignStorm)new NestedStorm(30 * n, 10, p)),
        Gen.Double[1, 30].Array[2, 20].Select(d => (IDesignStorm)GivenStorm.Read("s.csv", "time_min,depth_mm\n" + string.Join('\n', d.Select((x, k) => $"{20 * (k + 1)},{x:R}")))));

    private static HydrographResult Run(IDesignStorm storm, double km2, double cn, double tc, double k = 484, double ratio = 0.2, double? d = null, double years = 25) =>
        new NrcsUnitHydrographMethod(storm) { PeakFactor = k, InitialAbstractionRatio = ratio, GivenDurationMin = d }.Hydrograph(
            new("x", km2 * 1e6) { CurveNumber = cn }, years, new(Table, tc));

    [Fact]
    public void VolumeIsConserved() =>
        Gen.Select(Storms, Gen.Double[0.01, 50], Gen.Double[45, 100], Gen.Double[3, 900], Gen.Double[60, 900], Gen.Bool).Sample((storm, a, cn, tc, k, low) =>
        {
            var (peak, hydrograph) = Run(storm, a, cn, tc, k, low ? 0.05 : 0.2);
            var expected = peak.Steps.Single(s => s.Name == "runoff_depth_mm").Value / 1000 * a * 1e6;
            return Math.Abs(hydrograph!.VolumeM3 - expected) <= 1e-9 * expected + 1e-9 && hydrograph.FlowsM3PerS.All(q => q >= 0 && double.IsFinite(q))
                && hydrograph.FlowsM3PerS[0] == 0 && hydrograph.FlowsM3PerS[^1] == 0;
        }, iter: 60);

    [Fact]
    public void RisesWithAreaCurveNumberRarityAndPeakFactorAndFallsWithTime() =>
        Gen.Select(Gen.Enum<NrcsStormType>(), Gen.Double[0.1, 20], Gen.Double[60, 90], Gen.Double[15, 600], Gen.Double[150, 500]).Sample((type, a, cn, tc, k) =>
        {
            double Q(double a, double cn, double tc, double k, double years) => Run(new NrcsStorm(type), a, cn, tc, k, years: years).Peak.FlowM3PerS!.Value;
            var q = Q(a, cn, tc, k, 25);
            return Q(a * 1.1, cn, tc, k, 25) > q && Q(a, cn + 3, tc, k, 25) > q && Q(a, cn, tc, k, 50) > q && Q(a, cn, tc * 1.3, k, 25) < q && Q(a, cn, tc, k * 1.15, 25) > q;
        }, iter: 60);

    [Fact]
    public void TheHydrographIsLinearInTheExcess()
    {
        // Curve number 100 sheds all the rain, so twice the rain is twice the flow at every time.
        var one = Run(GivenStorm.Read("s.csv", "time_h,depth_mm\n1,5\n2,20\n4,3\n"), 2, 100, 45).Hydrograph!;
        var two = Run(GivenStorm.Read("s.csv", "time_h,depth_mm\n1,10\n2,40\n4,6\n"), 2, 100, 45).Hydrograph!;
        Assert.All(one.FlowsM3PerS.Zip(two.FlowsM3PerS), p => Assert.Equal(2 * p.First, p.Second, 1e-9));
    }

    // A long even rain on a basin that sheds it all runs off at the rate it falls: 10 mm/h off 3.6 km2 is 10 m3/s.
    [Fact]
    public void LongEvenRainReachesItsOwnRate() => Assert.Equal(10, Run(GivenStorm.Read("s.csv", "time_h,depth_mm\n12,120\n"), 3.6, 100, 60).Peak.FlowM3PerS!.Value, 1e-6);

    [Fact]
    public void PeakFactorAndGammaExponentBelongTogether() => Gen.Double[30, 1200].Sample(k =>
    {
        var shape = DimensionlessUnitHydrograph.GammaFor(k);
        double sum = 0;
        const double step = 0.001;
        for (var x = step; x < shape.EndRatio; x += step) sum += step * shape.At(x);
        return Math.Abs(DimensionlessUnitHydrograph.SquareMileInchPerHourFactor / sum / k - 1) < 2e-3 && Math.Abs(shape.At(1) - 1) < 1e-12;
    }, iter: 30);

    [Theory]
    [InlineData(60, 484, null, 0.2, 80, "storm-shorter-than-concentration", 120)]
    [InlineData(1440, 90, null, 0.2, 80, "peak-factor-outside-range", 30)]
    [InlineData(1440, 650, null, 0.2, 80, "peak-factor-outside-range", 30)]
    [InlineData(1440, 484, 30.0, 0.2, 80, "excess-duration-long", 30)]
    [InlineData(1440, 484, null, 0.05, 80, "curve-number-converted", 30)]
    [InlineData(60, 484, null, 0.2, 20, "no-runoff", 30)]
    public void OutsideItsRangeItIsComputedAndFlagged(double stormMin, double k, double? d, double ratio, double cn, string code, double tc)
    {
        var (peak, hydrograph) = Run(new NestedStorm(stormMin, 5), 1, cn, tc, k, ratio, d);
        Assert.NotNull(peak.FlowM3PerS);
        Assert.Equal(peak.FlowM3PerS, hydrograph!.PeakM3PerS);
        Assert.Contains(peak.Findings, f => f.Code == code);
    }

    [Fact]
    public void ShortTimesOnACoarseStormAreFlagged()
    {
        bool Flagged(IDesignStorm storm, double tc) => Run(storm, 1, 80, tc).Peak.Findings.Any(f => f.Kind == NrcsFindings.StormCoarse);
        Assert.True(Flagged(new NrcsStorm(NrcsStormType.III), 14));
        Assert.False(Flagged(new NrcsStorm(NrcsStormType.III), 15));
        Assert.False(Flagged(new NestedStorm(), 14));
    }

    [Fact]
    public void MissingFiguresAreFindings()
    {
        var catchment = new Catchment("x", 1e6) { CurveNumber = 80 };
        PeakFlow Of(NrcsUnitHydrographMethod m, Catchment c, PeakFlowContext x) => m.Compute(c, 25, x);
        var type = new NrcsUnitHydrographMethod(new NrcsStorm(NrcsStormType.II));
        PeakFlow[] flows =
        [
            Of(type, catchment, new(Table)), Of(type, catchment, new(TimeOfConcentrationMin: 30)), Of(type, new("x", 1e6), new(Table, 30)),
            Of(type with { PeakFactor = 0 }, catchment, new(Table, 30)), Of(type with { PeakFactor = 1e6 }, catchment, new(Table, 30)),
            Of(type with { GivenDurationMin = 0 }, catchment, new(Table, 30)), Of(new(new NestedStorm()), catchment, new(TimeOfConcentrationMin: 30)),
        ];
        Assert.All(flows, f => Assert.Null(f.FlowM3PerS));
        Assert.All(flows, f => Assert.Contains(f.Findings, k => k.Kind == HydrologyFindings.InputMissing));
    }

    [Fact]
    public void VeryShortAndVeryLongTimesStayFinite()
    {
        foreach (var tc in new[] { 0.01, 1, 5000, 50000.0 })
        {
            var (peak, hydrograph) = Run(new NrcsStorm(NrcsStormType.II), 1, 85, tc);
            Assert.True(peak.FlowM3PerS > 0 && double.IsFinite(peak.FlowM3PerS.Value));
            Assert.Equal(peak.Steps.Single(s => s.Name == "runoff_depth_mm").Value * 1000, hydrograph!.VolumeM3, 1e-6 * hydrograph.VolumeM3);
        }
    }
}
