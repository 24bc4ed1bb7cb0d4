using GeoCulvert.Design.Hydrology;

namespace GeoCulvert.Design.Tests.Hydrology;

public class ClimateFactorTests
{
    private static readonly RainfallTable Table = RainfallTable.Read("a.csv", Oracle.Rainfall("atlas14_ann_arbor_mi_pds_depth_in.csv"));
    private static readonly Catchment Field = new("x", 36e4) { RunoffCoefficient = new(0.5, "given"), CurveNumber = 75 };
    private static readonly PeakFlowContext Context = new(Table, 30);

    private static ClimateFactors On(ClimateTarget target, double factor = 1.2) => new(target, [new(25, factor), new(100, 1.3)]);

    private static double Step(PeakFlow flow, string name) => flow.Steps.Single(s => s.Name == name).Value;

    [Theory]
    [InlineData(10, 1)]
    [InlineData(25, 1.2)]
    [InlineData(99, 1.2)]
    [InlineData(100, 1.3)]
    [InlineData(500, 1.3)]
    public void HoldsFromItsReturnPeriodOn(double years, double factor) => Assert.Equal(factor, On(ClimateTarget.Flow).For(years));

    [Fact]
    public void PlainFlowStandsBesideTheAdjusted()
    {
        var plain = new RationalMethod().Compute(Field, 25, Context).FlowM3PerS!.Value;
        foreach (var target in new[] { ClimateTarget.Flow, ClimateTarget.Intensity })
        {
            // The rational flow is linear in intensity, so both targets give the same.
            var flow = On(target).On(new RationalMethod()).Compute(Field, 25, Context);
            Assert.Equal(1.2 * plain, flow.FlowM3PerS!.Value, 1e-12);
            Assert.Equal((1.2, plain), (Step(flow, "climate_factor"), Step(flow, "flow_without_climate_factor_m3_s")));
            Assert.Equal("rational", flow.Method);
        }
        var one = On(ClimateTarget.Flow).On(new RationalMethod()).Compute(Field, 10, Context);
        Assert.Equal(1, Step(one, "climate_factor"));
        Assert.Equal(one.FlowM3PerS!.Value, Step(one, "flow_without_climate_factor_m3_s"));
    }

    [Fact]
    public void OnIntensityTheRunoffRisesMoreThanTheRain()
    {
        var method = new NrcsGraphicalMethod(NrcsStormType.II);
        var flow = On(ClimateTarget.Intensity).On(method).Compute(Field, 25, Context);
        Assert.Equal(1.2 * Table.Intensity(1440, 25).DepthMm!.Value, Step(flow, "rainfall_24_h_mm"), 1e-9);
        Assert.True(flow.FlowM3PerS > 1.2 * method.Compute(Field, 25, Context).FlowM3PerS);
    }

    [Fact]
    public void AGivenIntensityIsMultipliedToo()
    {
        var flow = On(ClimateTarget.Intensity).On(new RationalMethod()).Compute(Field, 25, new(GivenIntensityMmPerH: 20));
        Assert.Equal(1.2, flow.FlowM3PerS!.Value, 1e-12);
    }

    [Fact]
    public void AFactorThatDoesNotReachTheMethodIsSaid()
    {
        var given = GivenFlows.Read("f.csv", "crossing_id,return_period_yr,flow_m3_s\n*,25,2\n");
        var flow = On(ClimateTarget.Intensity).On(given).Compute(Field, 25, Context);
        Assert.Equal(2, flow.FlowM3PerS);
        Assert.Contains(flow.Findings, f => f.Kind == RainfallFindings.ClimateIdle);
        Assert.Equal(2.4, On(ClimateTarget.Flow).On(given).Compute(Field, 25, Context).FlowM3PerS!.Value, 1e-12);
    }

    [Fact]
    public void TroubleOfTheMethodStays()
    {
        Assert.Null(On(ClimateTarget.Flow).On(new RationalMethod()).Compute(new("x", 1e4), 25, Context).FlowM3PerS);
        Assert.Null(On(ClimateTarget.Flow, 0).On(new RationalMethod()).Compute(Field, 25, Context).FlowM3PerS);
    }
}
