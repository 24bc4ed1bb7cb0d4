using CsCheck;
using GeoCulvert.Design.Hydrology;

namespace GeoCulvert.Design.Tests.Hydrology;

public class NrcsGraphicalInvariantTests
{
    private static readonly Gen<NrcsStormType> Storms = Gen.Enum<NrcsStormType>();

    private static PeakFlow Flow(NrcsStormType storm, double km2, double cn, double mm, double hours, double ponds = 0, double ratio = 0.2) =>
        new NrcsGraphicalMethod(storm) { GivenDepthMm = mm, PondShare = ponds, InitialAbstractionRatio = ratio }.Compute(
            new("x", km2 * 1e6) { CurveNumber = cn }, 25, new(TimeOfConcentrationMin: hours * 60));

    private static double Q(NrcsStormType storm, double km2, double cn, double mm, double hours, double ponds = 0) => Flow(storm, km2, cn, mm, hours, ponds).FlowM3PerS!.Value;

    [Fact]
    public void RisesWithAreaRainAndCurveNumberAndFallsWithTimeAndPonds() =>
        Gen.Select(Storms, Gen.Double[0.05, 30], Gen.Double[60, 92], Gen.Double[75, 250], Gen.Double[0.1, 8], Gen.Double[1.02, 1.2], Gen.Double[0, 0.04]).Sample((s, a, cn, p, t, f, w) =>
            Q(s, a * f, cn, p, t) > Q(s, a, cn, p, t) && Q(s, a, cn, p * f, t) > Q(s, a, cn, p, t) && Q(s, a, cn * (1 + (f - 1) / 4), p, t) > Q(s, a, cn, p, t)
            && Q(s, a, cn, p, t * f) < Q(s, a, cn, p, t) && Q(s, a, cn, p, t, w + 0.01) < Q(s, a, cn, p, t, w));

    [Fact]
    public void BetweenTwoCurvesTheUnitPeakLiesBetweenThem() =>
        Gen.Select(Storms, Gen.Double[0, 0.7], Gen.Double[0.02, 15]).Sample((s, ratio, t) =>
        {
            var u = UnitPeakTable.Find(s, ratio, t);
            return u.PerSquareMileAndInchCoefficient >= Math.Min(u.LowerCurveCoefficient, u.UpperCurveCoefficient) - 1e-9
                && u.PerSquareMileAndInchCoefficient <= Math.Max(u.LowerCurveCoefficient, u.UpperCurveCoefficient) + 1e-9;
        });

    [Fact]
    public void NeverNegativeNorNaN() =>
        Gen.Select(Storms, Gen.Double[1e-4, 500], Gen.Double[1, 100], Gen.Double[0.1, 1500], Gen.Double[0.001, 100], Gen.Double[0, 1]).Sample((s, a, cn, p, t, w) =>
            Flow(s, a, cn, p, t, w).FlowM3PerS is { } q && q >= 0 && double.IsFinite(q));

    [Fact]
    public void RunoffRisesWithRainAndNeverExceedsIt() =>
        Gen.Select(Gen.Double[1, 100], Gen.Double[0.1, 900], Gen.Double[1.001, 2], Gen.Bool).Sample((cn, p, f, low) =>
        {
            var loss = new CurveNumberRunoff(cn, low ? 0.05 : 0.2);
            return loss.RunoffMm(p) >= 0 && loss.RunoffMm(p) <= p && loss.RunoffMm(p * f) >= loss.RunoffMm(p) && loss.RunoffMm(p * f) - loss.RunoffMm(p) <= p * (f - 1) + 1e-9;
        });

    [Theory]
    [InlineData(98, 200, 1.0, 0, 0.2, "graphical-abstraction-outside-range")]
    [InlineData(60, 60, 1.0, 0, 0.2, "graphical-abstraction-outside-range")]
    [InlineData(80, 100, 0.05, 0, 0.2, "graphical-time-outside-range")]
    [InlineData(80, 100, 12, 0, 0.2, "graphical-time-outside-range")]
    [InlineData(80, 100, 1, 0.06, 0.2, "pond-share-outside-range")]
    [InlineData(80, 100, 1, 0, 0.05, "graphical-abstraction-ratio")]
    [InlineData(80, 100, 1, 0, 0.05, "curve-number-converted")]
    [InlineData(35, 300, 1, 0, 0.2, "curve-number-low")]
    [InlineData(60, 30, 1, 0, 0.2, "no-runoff")]
    public void OutsideItsRangeItIsComputedAndFlagged(double cn, double mm, double hours, double ponds, double ratio, string code)
    {
        var flow = Flow(NrcsStormType.II, 2, cn, mm, hours, ponds, ratio);
        Assert.NotNull(flow.FlowM3PerS);
        Assert.Contains(flow.Findings, f => f.Code == code);
    }

    [Fact]
    public void InsideItsRangeNothingIsFlagged() => Assert.Empty(Flow(NrcsStormType.II, 2, 80, 100, 1, 0.03).Findings);

    [Fact]
    public void ClampedTimesGiveTheFlowAtTheEndOfTheRange()
    {
        Assert.Equal(Q(NrcsStormType.I, 1, 80, 100, 0.1), Q(NrcsStormType.I, 1, 80, 100, 0.03), 1e-12);
        Assert.Equal(Q(NrcsStormType.I, 1, 80, 100, 10), Q(NrcsStormType.I, 1, 80, 100, 30), 1e-12);
    }

    [Fact]
    public void MissingFiguresAreFindings()
    {
        var method = new NrcsGraphicalMethod(NrcsStormType.II) { GivenDepthMm = 100 };
        PeakFlow[] flows =
        [
            method.Compute(new("x", 1e6), 25, new(TimeOfConcentrationMin: 30)),
            method.Compute(new("x", 1e6) { CurveNumber = 0 }, 25, new(TimeOfConcentrationMin: 30)),
            method.Compute(new("x", 1e6) { CurveNumber = 80 }, 25, new()),
            method.Compute(new("x", 0) { CurveNumber = 80 }, 25, new(TimeOfConcentrationMin: 30)),
            (method with { GivenDepthMm = null }).Compute(new("x", 1e6) { CurveNumber = 80 }, 25, new(TimeOfConcentrationMin: 30)),
            (method with { InitialAbstractionRatio = 0.1 }).Compute(new("x", 1e6) { CurveNumber = 80 }, 25, new(TimeOfConcentrationMin: 30)),
        ];
        Assert.All(flows, f => Assert.Null(f.FlowM3PerS));
        Assert.All(flows, f => Assert.Contains(f.Findings, k => k.Kind == HydrologyFindings.InputMissing));
    }

    [Fact]
    public void TheRainfallTableServesWhereNoDepthIsGiven()
    {
        var table = RainfallTable.Read("a.csv", Oracle.Rainfall("atlas14_ann_arbor_mi_pds_depth_in.csv"));
        var flow = new NrcsGraphicalMethod(NrcsStormType.II).Compute(new("x", 1e6) { CurveNumber = 80 }, 100, new(table, 60));
        Assert.Equal(table.Intensity(1440, 100).DepthMm!.Value, flow.Steps.Single(s => s.Name == "rainfall_24_h_mm").Value, 1e-9);
    }
}
