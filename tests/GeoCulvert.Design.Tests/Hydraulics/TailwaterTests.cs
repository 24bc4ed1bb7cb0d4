using GeoCulvert.Design.Basis;
using GeoCulvert.Design.Hydraulics;

namespace GeoCulvert.Design.Tests.Hydraulics;

/// <summary>Tailwater by each of its kinds, and the inlets found by name.</summary>
public class TailwaterTests
{
    [Fact]
    public void NormalDepthStandsOnTheBed() =>
        // Trapezoid b = 6.1, z = 1.5, n = .013, S = .0008, Q = 126: 3.2864 m (example L2 of the oracle table, VERIFIED).
        Assert.Equal(53.2864, new NormalDepthTailwater(new TrapezoidSection(6.1, 1.5), 0.013, 0.0008, 50).ElevationM(126), 0.0005);

    [Fact]
    public void ARatingIsStraightBetweenItsPointsAndHeldAtItsEnds()
    {
        var rating = new RatingTailwater([(1, 10), (3, 11), (5, 11.5)]);
        Assert.Equal(10, rating.ElevationM(0));
        Assert.Equal(10.5, rating.ElevationM(2), 1e-12);
        Assert.Equal(11.25, rating.ElevationM(4), 1e-12);
        Assert.Equal(11.5, rating.ElevationM(9));
        Assert.Throws<ArgumentException>(() => new RatingTailwater([(1, 10)]));
        Assert.Throws<ArgumentException>(() => new RatingTailwater([(1, 10), (1, 11)]));
        Assert.Throws<ArgumentException>(() => new RatingTailwater([(1, 10), (2, 9)]));
    }

    [Fact]
    public void AnUnknownInletNamesTheNearOnes()
    {
        var error = Assert.Throws<InputException>(() => InletCatalogue.Find("hds5-8-7", "--inlet"));
        Assert.Contains("hds5-8-1", error.Message, StringComparison.Ordinal);
        Assert.Contains("hds5-8-3", error.Message, StringComparison.Ordinal);
        Assert.DoesNotContain("hds5-1-1", error.Message, StringComparison.Ordinal);
    }

    [Fact]
    public void ARowForFourChartsServesEachOfThem()
    {
        foreach (var chart in new[] { 16, 17, 18, 19 }) Assert.Equal(0.0083, InletCatalogue.Find($"hds5-{chart}-2", "test").K);
        Assert.Equal(InletCatalogue.All.Count, InletCatalogue.All.Select(i => i.Id).Distinct().Count());
    }
}
