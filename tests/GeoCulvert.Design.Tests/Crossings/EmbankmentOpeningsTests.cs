using GeoCulvert.Design.Crossings;
using GeoCulvert.Design.Terrain;

namespace GeoCulvert.Design.Tests.Crossings;

/// <summary>Openings in terrain built from formulas. Expected figures come from the plane geometry of the bank, worked in the comments, and from counting cells.</summary>
public class EmbankmentOpeningsTests
{
    // Crest 103 at the west end, falling 5 mm a metre to the east: the pond leaves the terrain at its eastern edge.
    private static double Crest(double along) => 105 - (0.005 * along);

    [Fact]
    public void ASquareBankIsOpenedWhereTheChannelMeetsIt()
    {
        var valley = BuiltValley.Channel().Bank("R", 0, 60, 141, 60, Crest);
        var elevation = valley.Elevation();
        var before = (float[])elevation.Cells.Clone();
        var opened = valley.Solve(elevation);
        Assert.Equal(before, elevation.Cells);

        // Crest over the channel 105 - 0.005 x 70.5 = 104.6475. Toe upstream: 100 + 0.01 o = 104.6475 - 0.08 - (o - 4) / 2 -> o = 12.877; downstream -0.01: 13.403.
        var opening = Assert.Single(opened.Openings);
        Assert.InRange(opening.LengthM, 12.877 + 13.403 - 0.5, 12.877 + 13.403 + 1.5);
        Assert.InRange(opening.DepthM, 4.6475 - 0.03, 4.6475 + 0.01);
        Assert.Equal(0, opening.SkewDeg, 6);
        Assert.InRange(opening.StationM, 69.5, 71.5); // the bottom is three cells wide
        Assert.Equal(OpeningReason.Ponding, opening.Reason);

        // The crown is a divide: every cell north of the road drains through, 100 rows of 141.
        var crossing = Assert.Single(valley.Crossings(opened).Crossings);
        Assert.Equal(100 * 141, crossing.AccumulationCells);
        Assert.InRange(crossing.StationM!.Value, 69.5, 71.5);

        // Shut, the water goes elsewhere.
        var shut = Drainage.Solve(elevation, cancel: TestContext.Current.CancellationToken);
        Assert.True(shut.Accumulation.Cells[opening.Cells[^1]] < 0.1 * 100 * 141);
        Assert.True(opening.AreaBeforeM2 < 0.1 * 100 * 141);
        Assert.True(opening.AreaAfterM2 >= 100 * 141);
    }

    [Theory]
    [InlineData(15)]
    [InlineData(30)]
    [InlineData(45)]
    public void ASkewedChannelGivesASkewedOpening(double skewDeg)
    {
        var valley = BuiltValley.Channel(skewDeg).Bank("R", 0, 60, 141, 60, Crest);
        var elevation = valley.Elevation();
        var opened = valley.Solve(elevation);
        Assert.True(opened.Openings.Count == 1, string.Join("|", opened.Findings.Select(f => f.Sentence)) + " raised " + opened.Terrain.Filled.DeepestM + " max " + opened.Terrain.Accumulation.Cells.Max());
        var opening = Assert.Single(opened.Openings);

        // Along the channel the toe lies where 0.01 a = 4.5675 - (a cos - 4) / 2 (a upstream), and with -0.01 downstream.
        var cos = Math.Cos(skewDeg * Math.PI / 180);
        double up = (4.5675 + 2) / (0.01 + (cos / 2)), down = (4.5675 + 2) / ((cos / 2) - 0.01);
        Assert.InRange(opening.LengthM, up + down - 2.5, up + down + 2.5);
        Assert.InRange(opening.SkewDeg, skewDeg - 5, skewDeg + 5);
        Assert.InRange(opening.DepthM, 4.6475 - 0.1, 4.6475 + 0.1);
        var crossing = Assert.Single(valley.Crossings(opened).Crossings);
        Assert.Equal(100 * 141, crossing.AccumulationCells);
    }
}
