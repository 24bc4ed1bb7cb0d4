using CsCheck;
using GeoCulvert.Design.Hydrology;

namespace GeoCulvert.Design.Tests.Hydrology;

public class ModifiedRationalTests
{
    private static readonly RainfallTable Table = RainfallTable.Read("a.csv", Oracle.Rainfall("atlas14_ann_arbor_mi_pds_depth_in.csv"));
    private static readonly Catchment Field = new("x", 36e4) { RunoffCoefficient = new(0.5, "given") };

    private static HydrographResult Run(double tc, double? d, double? intensity = null) =>
        new ModifiedRational { StormDurationMin = d }.Hydrograph(Field, 25, new(Table, tc, intensity));

    // By hand, C 0.5, 36 ha, 20 mm/h: Q = 0.5 x 20 x 36/360 = 1 m3/s. Tc 30 min.
    [Fact]
    public void TriangleTrapezoidAndShortStorm()
    {
        var triangle = Run(30, null, 20).Hydrograph!;
        Same([0, 30, 60], [0, 1, 0], triangle);
        var trapezoid = Run(30, 90, 20).Hydrograph!;
        Same([0, 30, 90, 120], [0, 1, 1, 0], trapezoid);
        var brief = Run(30, 15, 20);
        Same([0, 15, 30, 45], [0, 0.5, 0.5, 0], brief.Hydrograph!);
        Assert.Contains(brief.Peak.Findings, f => f.Kind == NrcsFindings.StormShort);
    }

    private static void Same(double[] times, double[] flows, RunoffHydrograph hydrograph)
    {
        Assert.Equal(times, hydrograph.TimesMin);
        Assert.Equal(flows, hydrograph.FlowsM3PerS.Select(q => Math.Round(q, 12)));
    }

    [Fact]
    public void VolumeIsTheRunoffOfTheStorm() => Gen.Select(Gen.Double[5, 300], Gen.Double[5, 1400]).Sample((tc, d) =>
    {
        var (peak, hydrograph) = Run(tc, d);
        var expected = 0.5 * Table.Intensity(d, 25).DepthMm!.Value / 1000 * 36e4;
        return Math.Abs(hydrograph!.VolumeM3 / expected - 1) < 1e-9 && hydrograph.PeakM3PerS == peak.FlowM3PerS && hydrograph.TimesMin[^1] == d + tc;
    });

    [Fact]
    public void AtTheTimeOfConcentrationItIsTheRationalMethod() =>
        Assert.Equal(new RationalMethod().Compute(Field, 25, new(Table, 40)).FlowM3PerS!.Value, Run(40, null).Peak.FlowM3PerS!.Value, 1e-12);

    [Fact]
    public void FrequencyFactorAndLimitsAreThoseOfTheRationalMethod()
    {
        var method = new ModifiedRational { Rational = new() { FrequencyFactors = RationalMethod.CommonFrequencyFactors, AreaLimitM2 = 1e4 } };
        var (peak, _) = method.Hydrograph(Field with { RunoffCoefficient = new(0.9, "given") }, 100, new(Table, 30));
        Assert.Contains(peak.Findings, f => f.Kind == HydrologyFindings.CoefficientCapped);
        Assert.Contains(peak.Findings, f => f.Kind == HydrologyFindings.RationalArea);
        Assert.Equal(Table.Intensity(30, 100).IntensityMmPerH!.Value * 36 / 360, peak.FlowM3PerS!.Value, 1e-9);
        Assert.Equal(30, Assert.Single(peak.Steps, s => s.Name == "time_of_concentration_min").Value);
    }

    [Fact]
    public void MissingFiguresAreFindings()
    {
        HydrographResult[] results = [Run(0, null), Run(30, 0), Run(30, -5), new ModifiedRational().Hydrograph(Field, 25, new(Table)), new ModifiedRational().Hydrograph(new("x", 1e4), 25, new(Table, 30)), Run(30, 1e6)];
        Assert.All(results, r => Assert.True(r.Peak.FlowM3PerS is null && r.Hydrograph is null && r.Peak.Findings.Count > 0));
    }
}
