using CsCheck;
using GeoCulvert.Design.Basis;
using GeoCulvert.Design.Hydrology;

namespace GeoCulvert.Design.Tests.Hydrology;

public class TimeOfConcentrationInvariantTests
{
    private static readonly TimeOfConcentrationContext Context = new(TwoYear24HourDepthMm: 60);

    private static Catchment Even(double lengthM, double slope, double channelAtM = double.PositiveInfinity) => new("x", 20e4)
    {
        LongestFlowPathM = lengthM, FlowPathEndToEndSlopeMPerM = slope,
        FlowPath = [.. Enumerable.Range(0, 101).Select(i => new FlowPathPoint(lengthM * i / 100, slope * lengthM * (100 - i) / 100, "41"))],
        ChannelBeginsAtM = channelAtM, Channel = new(0.3, 0.05),
    };

    // TxDOT Hydraulic Design Manual eq. 4-15: K = 0.0078 with feet and 0.0195 with metres.
    // By hand in feet: 1000 ft at 0.05: 0.0078 x 1000^0.77 x 0.05^-0.385 = 0.0078 x 204.174 x 3.16881 = 5.0465 min.
    [Fact]
    public void KirpichInFeetAndMetres()
    {
        Assert.Equal(5.046, Kirpich.TimeMin(1000 * Units.Foot, 0.05), 0.001);
        Assert.Equal(0.0195 * Math.Pow(500, 0.77) * Math.Pow(0.04, -0.385), Kirpich.TimeMin(500, 0.04), 0.005 * Kirpich.TimeMin(500, 0.04));
    }

    // The metric forms by converting the printed constants by hand: 0.007 (1/0.3048)^0.8 25.4^0.5 = 0.09126 h with m and mm;
    // 1.49 (1/0.3048)^(2/3) 0.3048 = 1.0027 (the printed 1.49 stands for 1.486).
    [Fact]
    public void SheetAndChannelInMetricForm()
    {
        var sheet = 60 * 0.09126 * Math.Pow(0.15 * 30, 0.8) / (Math.Sqrt(70) * Math.Pow(0.03, 0.4));
        Assert.Equal(sheet, NrcsVelocityMethod.SheetTimeMin(30, 0.15, 70, 0.03), 0.0005 * sheet);
        var channel = 1.0027 * Math.Pow(0.4, 2.0 / 3) * Math.Sqrt(0.01) / 0.04;
        Assert.Equal(channel, NrcsVelocityMethod.ChannelVelocityMPerS(0.4, 0.04, 0.01), 0.0005 * channel);
    }

    [Fact]
    public void LongerAndFlatterPathsTakeLonger() => Gen.Select(Gen.Double[50, 3000], Gen.Double[1.01, 3], Gen.Double[0.002, 0.2]).Sample((length, factor, slope) =>
        new ITimeOfConcentration[] { new Kirpich(), new NrcsVelocityMethod() }.All(m =>
        {
            double T(double l, double s) => m.Compute(Even(l, s), Context).TimeMin!.Value;
            return T(length * factor, slope) > T(length, slope) && T(length, slope / factor) >= T(length, slope) && T(length, slope) > 0;
        }));

    [Fact]
    public void SegmentsCoverThePathOnce() => Gen.Select(Gen.Double[5, 3000], Gen.Double[0.0, 4000]).Sample((length, channelAt) =>
    {
        var tc = new NrcsVelocityMethod().Compute(Even(length, 0.02, channelAt), Context);
        var ends = tc.Segments.Zip(tc.Segments.Skip(1)).All(p => Math.Abs(p.First.ToM - p.Second.FromM) < 1e-6);
        return ends && tc.Segments[0].FromM == 0 && Math.Abs(tc.Segments[^1].ToM - length) < 1e-6 && tc.Segments.All(s => s.TimeMin > 0 && double.IsFinite(s.TimeMin));
    });

    [Fact]
    public void RoughSheetIsSlowerAndFlatsAreReported()
    {
        var catchment = Even(500, 0) with { FlowPath = [new(0, 10, "21"), new(100, 10, null), new(500, 2, null)] };
        var tc = new NrcsVelocityMethod().Compute(catchment, Context);
        var floor = Assert.Single(tc.Findings, f => f.Kind == HydrologyFindings.SlopeFloor);
        Assert.Equal(0.2, floor.Value!.Value, 1e-9);
        var assumed = Assert.Single(tc.Findings, f => f.Kind == HydrologyFindings.SurfaceAssumed);
        Assert.Equal(400, assumed.Value!.Value, 1e-9);
        Assert.Contains(tc.Findings, f => f.Kind == HydrologyFindings.NoChannel);
        Assert.True(NrcsVelocityMethod.SheetTimeMin(30, 0.4, 60, 0.02) > NrcsVelocityMethod.SheetTimeMin(30, 0.15, 60, 0.02));
    }

    [Fact]
    public void ChannelBeginsWhereTheDrainedAreaSays()
    {
        var catchment = new Catchment("x", 1e6) { FlowPath = [new(0, 30, "71", 100), new(200, 20, "71", 5e4), new(400, 10, "71", 2e5), new(900, 0, "71", 1e6)] };
        var tc = new NrcsVelocityMethod { ChannelAreaM2 = 1e5 }.Compute(catchment, Context);
        Assert.Equal(400, tc.Segments.First(s => s.Kind == "channel").FromM);
        Assert.Contains(tc.Findings, f => f.Kind == HydrologyFindings.ChannelAssumed);
    }

    [Fact]
    public void MissingFiguresAreFindings()
    {
        ITimeOfConcentration[] methods = [new Kirpich(), new NrcsVelocityMethod()];
        foreach (var method in methods)
        {
            var tc = method.Compute(new Catchment("x", 1e5), Context);
            Assert.Null(tc.TimeMin);
            Assert.Equal(HydrologyFindings.InputMissing, Assert.Single(tc.Findings).Kind);
        }
        Assert.Null(new NrcsVelocityMethod().Compute(Even(500, 0.02), new()).TimeMin);
        Assert.Null(new Kirpich().Compute(Even(500, 0), Context).TimeMin);
    }

    [Theory]
    [InlineData(TimeOfConcentrationChoice.Median, 12)]
    [InlineData(TimeOfConcentrationChoice.Smallest, 5)]
    [InlineData(TimeOfConcentrationChoice.Largest, 60)]
    [InlineData(TimeOfConcentrationChoice.Named, 60)]
    public void RuleChooses(TimeOfConcentrationChoice choice, double expected)
    {
        TimeOfConcentration Of(string name, double? t) => new(name, t, [], [], []);
        var chosen = new TimeOfConcentrationRule(choice, "c").Choose([Of("a", 12), Of("b", 3), Of("c", 60), Of("d", null)]);
        Assert.Equal(expected, chosen.TimeMin);
        Assert.Equal(20, chosen.SpreadRatio);
        Assert.Contains(chosen.Findings, f => f.Kind == HydrologyFindings.TimeSpread);
        Assert.Equal(choice == TimeOfConcentrationChoice.Smallest, chosen.Findings.Any(f => f.Kind == HydrologyFindings.TimeFloor));
    }

    [Fact]
    public void ANamedMethodWithoutResultIsNotReplaced()
    {
        var chosen = new TimeOfConcentrationRule(TimeOfConcentrationChoice.Named, "kirpich").Choose(
            [TimeOfConcentration.Missing("kirpich", "no slope"), new("nrcs-velocity", 20, [], [], [])]);
        Assert.Null(chosen.TimeMin);
        Assert.Contains(chosen.Findings, f => f.Severity == Severity.Error);
        // The other way round the result stands, so nothing about it is an error.
        var other = new TimeOfConcentrationRule(TimeOfConcentrationChoice.Named, "nrcs-velocity").Choose(chosen.All);
        Assert.Equal(20, other.TimeMin);
        Assert.Equal(HydrologyFindings.OtherMethodMissing, Assert.Single(other.Findings).Kind);
    }
}
