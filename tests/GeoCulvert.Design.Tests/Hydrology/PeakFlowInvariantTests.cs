using CsCheck;
using GeoCulvert.Design.Basis;
using GeoCulvert.Design.Hydrology;

namespace GeoCulvert.Design.Tests.Hydrology;

public class PeakFlowInvariantTests
{
    private static readonly RainfallTable Table = RainfallTable.Read("a.csv", Oracle.Rainfall("atlas14_ann_arbor_mi_pds_depth_in.csv"));

    private static double Rational(double area, double c, double tc, double years) =>
        new RationalMethod().Compute(new("x", area) { RunoffCoefficient = new(c, "given") }, years, new(Table, tc)).FlowM3PerS!.Value;

    [Fact]
    public void RationalRisesWithAreaCoefficientAndRarityAndFallsWithTime() =>
        Gen.Select(Gen.Double[1e3, 2e6], Gen.Double[0.05, 0.8], Gen.Double[5, 600], Gen.Double[2, 400], Gen.Double[1.01, 1.2]).Sample((a, c, tc, t, more) =>
            Rational(a * more, c, tc, t) > Rational(a, c, tc, t) && Rational(a, c * more, tc, t) > Rational(a, c, tc, t)
            && Rational(a, c, tc * more, t) < Rational(a, c, tc, t) && Rational(a, c, tc, t * more) > Rational(a, c, tc, t));

    [Fact]
    public void NoFlowIsNaNOrNegative() => Gen.Select(Gen.Double[-1e5, 1e7], Gen.Double[-0.5, 1.5], Gen.Double[0.1, 1e6], Gen.Double[0.1, 1e4]).Sample((a, c, tc, t) =>
    {
        var flow = new RationalMethod { FrequencyFactors = RationalMethod.CommonFrequencyFactors }
            .Compute(new("x", a) { RunoffCoefficient = new(c, "given") }, t, new(Table, tc));
        return flow.FlowM3PerS is null ? flow.Findings.Any(f => f.Severity == Severity.Error) : flow.FlowM3PerS >= 0 && double.IsFinite(flow.FlowM3PerS.Value);
    });

    [Fact]
    public void LargeAreasAreComputedAndFlagged()
    {
        PeakFlow Of(double ha) => new RationalMethod().Compute(new("x", ha * 1e4) { RunoffCoefficient = new(0.3, "given") }, 25, new(GivenIntensityMmPerH: 36));
        Assert.DoesNotContain(Of(80).Findings, f => f.Kind == HydrologyFindings.RationalArea);
        var large = Of(100);
        Assert.Equal(0.3 * 36 * 100 / 360, large.FlowM3PerS!.Value, 1e-9); // Q = C i A / 360 by hand: 3 m3/s
        Assert.Contains(large.Findings, f => f.Kind == HydrologyFindings.RationalArea);
    }

    // By hand: Ann Arbor at 42 min and 25 yr has 66.000 mm/h (log-log between 81.788 and 52.578); 0.3 x 66.000 x 20 ha / 360 = 1.1000 m3/s.
    // The steps say every figure of it.
    [Fact]
    public void RationalTakesTheIntensityAtTheTimeOfConcentration()
    {
        var flow = new RationalMethod().Compute(new("x", 20e4) { RunoffCoefficient = new(0.3, "given") }, 25, new(Table, 42));
        Assert.Equal(1.1, flow.FlowM3PerS!.Value, 1e-5);
        Assert.Equal(["area_ha", "runoff_coefficient", "time_of_concentration_min", "intensity_mm_per_h", "flow_m3_s"], flow.Steps.Select(s => s.Name));
        Assert.Contains("81.79 (30 min, 25 yr: 1.61)", flow.Steps[3].Formula, StringComparison.Ordinal);
        Assert.Equal("0.300 x 66.00 mm/h x 20.00 ha / 360", flow.Steps[4].Formula);
        Assert.Empty(flow.Findings);
    }

    [Fact]
    public void FrequencyFactorIsOffByDefaultAndNeverPassesOne()
    {
        var catchment = new Catchment("x", 10e4) { RunoffCoefficient = new(0.9, "given") };
        var off = new RationalMethod().Compute(catchment, 100, new(GivenIntensityMmPerH: 36)).FlowM3PerS;
        var on = new RationalMethod { FrequencyFactors = RationalMethod.CommonFrequencyFactors }.Compute(catchment, 100, new(GivenIntensityMmPerH: 36));
        Assert.Equal(0.9, off!.Value, 1e-12);
        Assert.Equal(1.0, on.FlowM3PerS!.Value, 1e-12); // 0.9 x 1.25 held at 1
        Assert.Contains(on.Findings, f => f.Kind == HydrologyFindings.CoefficientCapped);
    }

    [Fact]
    public void CoefficientMayChangeAt25Years()
    {
        var catchment = new Catchment("x", 36e4) { RunoffCoefficient = new(0.2, "table", 0.3) };
        double Q(double t) => new RationalMethod().Compute(catchment, t, new(GivenIntensityMmPerH: 10)).FlowM3PerS!.Value;
        Assert.Equal(2.0, Q(24.9) / 0.1, 1e-9);
        Assert.Equal(3.0, Q(25) / 0.1, 1e-9);
    }

    [Fact]
    public void TheNamedMethodIsTheDesignValueAndNothingTakesItsPlace()
    {
        PeakFlow Of(string method, double? q) => new(method, 25, q, null, null, [], []);
        var flow = new DesignFlowRule("rational").Choose([Of("rational", 2), Of("regression", 5)]);
        Assert.Equal(2, flow.FlowM3PerS);
        Assert.Equal(2.5, flow.SpreadRatio);
        Assert.Contains(flow.Findings, f => f.Kind == HydrologyFindings.FlowSpread);
        var none = new DesignFlowRule("rational").Choose([Of("rational", null), Of("regression", 5)]);
        Assert.Null(none.FlowM3PerS);
        Assert.Contains(none.Findings, f => f.Kind == HydrologyFindings.NoDesignFlow);
    }

    [Fact]
    public void AnyListOfReturnPeriodsInAnyOrder()
    {
        var given = GivenFlows.Read("f.csv", "crossing_id,return_period_yr,flow_m3_s\n*,2,1\n*,100,5\n*,10,3\n*,25,2.5\n");
        var flows = new DesignFlowRule("given").Compute(new("x", 1), [given], [100, 2, 37.5, 25, 10], new());
        Assert.Equal([100, 2, 37.5, 25, 10], flows.Select(f => f.ReturnPeriodYr));
        Assert.Equal(25, Assert.Single(flows, f => f.Findings.Any(k => k.Kind == HydrologyFindings.FlowFalls)).ReturnPeriodYr);
    }
}
