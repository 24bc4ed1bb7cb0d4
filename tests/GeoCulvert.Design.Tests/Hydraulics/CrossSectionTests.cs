using CsCheck;
using GeoCulvert.Design.Hydraulics;

namespace GeoCulvert.Design.Tests.Hydraulics;

/// <summary>Natural cross-sections, pools and bounds of the tailwater.</summary>
public class CrossSectionTests
{
    // Channel 4 m wide with walls (1 mm of run) 1 m deep, overbanks 10 m wide each, level, walls at both ends.
    private static ChannelCrossSection Compound() => new(
        [(-0.001, 13), (0, 11), (10, 11), (10.001, 10), (14.001, 10), (14.002, 11), (24.002, 11), (24.003, 13)], 10, 14.002, 0.03, 0.08);

    [Fact]
    public void AVerifiedTrapezoidComesOut()
    {
        // Trapezoid b = 6.1, z = 1.5, n = .013, S = .0008, Q = 126: 3.2864 m (example L2 of the oracle table, VERIFIED).
        var section = new ChannelCrossSection([(-15, 60), (0, 50), (6.1, 50), (21.1, 60)], -15, 21.1, 0.013, 0.013);
        var tailwater = new CrossSectionTailwater(section, 0.0008, 25);
        Assert.Equal(53.2864, tailwater.LevelAtSectionM(126), 0.0005);
        Assert.Equal(53.2864 + 0.02, tailwater.ElevationM(126), 0.0005);
    }

    [Fact]
    public void ACompoundSectionIsTheSumOfItsThreeParts()
    {
        // By hand at 2 m above the bed: channel A = 8 m2, P = 4 + 2 x 1 = 6 m, K = 8 (8/6)^(2/3) / 0.03 = 323.05;
        // an overbank A = 10, P = 10 + 1 = 11 m, K = 10 (10/11)^(2/3) / 0.08 = 117.31; together 557.67 m3/s.
        var at = Compound().At(12);
        Assert.Equal(28, at.AreaM2, 0.01);
        Assert.Equal(557.67, at.ConveyanceM3PerS, 0.2);
        Assert.Equal(24, at.TopWidthM, 0.01);
        Assert.Equal(12, Compound().LevelForConveyanceM(at.ConveyanceM3PerS), 1e-8);
    }

    [Fact]
    public void TheLevelRisesWithFlowInAnySection() => Gen.Select(Gen.Double[0, 3].Array[5, 15], Gen.Double[0.0005, 0.05]).Sample(
        (heights, slope) =>
        {
            if (heights.Max() - heights.Min() < 0.01) return true;
            var section = new ChannelCrossSection([.. heights.Select((h, i) => (2.0 * i, 400 + h))], 4, 2.0 * (heights.Length - 3), 0.03, 0.09);
            var tailwater = new CrossSectionTailwater(section, slope, 10);
            var last = double.NegativeInfinity;
            for (var q = 0.01; q < 200; q *= 1.25)
            {
                var level = tailwater.LevelAtSectionM(q);
                if (level < last - 1e-9 || level <= section.BedM) return false;
                // It carries the flow.
                if (Math.Abs((section.At(level).ConveyanceM3PerS * Math.Sqrt(slope)) - q) > 1e-6 * q) return false;
                last = level;
            }

            return true;
        },
        iter: 200);

    [Fact]
    public void APoolHoldsTheTailwaterUpOnlyWhereItIsHigher()
    {
        var channel = new NormalDepthTailwater(new TrapezoidSection(6.1, 1.5), 0.013, 0.0008, 50);
        var tailwater = new PoolTailwater(channel, new RatingTailwater([(0, 51), (126, 52)]), "B");
        Assert.Equal(51, tailwater.ElevationM(0), 1e-12);
        Assert.True(tailwater.IsPool(1) && tailwater.VelocityMPerS(1) is null);
        Assert.Equal(53.2864, tailwater.ElevationM(126), 0.0005);
        Assert.False(tailwater.IsPool(126));
        // Q / A: 126 / ((6.1 + 1.5 x 3.2864) 3.2864) = 3.476 m/s.
        Assert.Equal(3.476, tailwater.VelocityMPerS(126)!.Value, 0.002);
    }

    [Fact]
    public void BoundsThatMoveTheControlSaySo()
    {
        var barrels = new CulvertBarrels(new BoxSection(2, 1.5), 1, InletCatalogue.Find("hds5-8-1", "test"), 0.013, 0.4, 30, 100, 99.4);
        var expected = new FixedTailwater(100);
        // 10 m3/s: X = 1.811 x 10 / (3 x 1.5^0.5) = 4.93, inlet control 1.5 (0.0347 x 4.93^2 + 0.81 - 0.01) = 2.47 m on a steep barrel; drowned to 102.5 m the outlet stands above it.
        var site = new CulvertSite(barrels, expected, null);
        var moved = TailwaterBounds.Rate(site, new FixedTailwater(99.5), new FixedTailwater(102.5), 10);
        Assert.Equal(102.47, moved.Low.HeadwaterElevationM, 0.01);
        Assert.Equal(("inlet", "outlet"), (moved.Low.Control, moved.High.Control));
        Assert.True(moved.High.HeadwaterElevationM >= moved.Expected.HeadwaterElevationM && moved.Expected.HeadwaterElevationM >= moved.Low.HeadwaterElevationM);
        Assert.Contains(moved.Findings, f => f.Code == "tailwater-moves-control" && f.Value > f.Limit);
        Assert.Empty(TailwaterBounds.Rate(site, new FixedTailwater(99.4), new FixedTailwater(99.6), 10).Findings);
        Assert.Throws<ArgumentException>(() => TailwaterBounds.Rate(site, new FixedTailwater(101), new FixedTailwater(100), 10));
        Assert.Equal(101, new ScaledTailwater(expected, 99, 2).ElevationM(3), 1e-12);
    }
}
