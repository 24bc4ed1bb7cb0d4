using GeoCulvert.Design.Crossings;
using GeoCulvert.Design.Terrain;
using NetTopologySuite.Geometries;

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

    [Fact]
    public void TwoCarriagewaysAreOneWayUnder()
    {
        // Centrelines 28 m apart, shoulders 20 m: one culvert. Toes: 60 - 13.4 and 88 + 12.9 - the channel rises 0.28 m up to the second.
        var valley = BuiltValley.Channel().Bank("A", 0, 60, 141, 60, Crest).Bank("B", 0, 88, 141, 88, Crest);
        var opened = valley.Solve(valley.Elevation());
        var opening = Assert.Single(opened.Openings);
        Assert.Equal(["B", "A"], opening.Roads.Select(r => r.Name));
        double up = (4.5675 + 2 - 0.28) / 0.51, down = (4.5675 + 2) / 0.49;
        Assert.InRange(opening.LengthM, up + down + 28 - 0.5, up + down + 28 + 1.5);
        var crossing = Assert.Single(valley.Crossings(opened, 9000).Crossings);
        Assert.StartsWith("A ", crossing.Id, StringComparison.Ordinal);
        Assert.Equal(["B", "A"], crossing.Over.Select(o => o.Road.Name));
        // Above the upper road: rows from y = 88 to 160.
        Assert.Equal(72 * 141, crossing.AccumulationCells);
    }

    [Fact]
    public void CarriagewaysFarApartAreTwo()
    {
        var valley = BuiltValley.Channel(0, 70.5, 45).Bank("A", 0, 45, 141, 45, Crest).Bank("B", 0, 95, 141, 95, Crest);
        var opened = valley.Solve(valley.Elevation(), new() { PondAreaM2 = 5000, TogetherM = 30 });
        Assert.Equal(["A", "B"], opened.Openings.Select(o => o.Road.Name));
        Assert.Equal([115 * 141, 65 * 141], valley.Crossings(opened, 5000).Crossings.Select(c => c.AccumulationCells));
    }

    [Fact]
    public void ALakeBehindTheBankLeavesAtItsLevel()
    {
        // Level water at 101 in the channel behind the bank, up to 100 m upstream: its only way out is through the bank.
        var valley = BuiltValley.Channel();
        var lake = new BuiltValley { Ground = (x, y) => y > 60 ? Math.Max(valley.Ground(x, y), 101) : valley.Ground(x, y) }.Bank("R", 0, 60, 141, 60, Crest);
        var opened = lake.Solve(lake.Elevation());
        var opening = Assert.Single(opened.Openings);
        Assert.True(opening.IsLake);
        Assert.Equal(101, opening.BedM[0]);
        Assert.Contains(EmbankmentOpenings.FindingsOf(opening, new()), f => f.Code == "opening-at-lake");
        // The opening runs oblique from the shore: a cell of the crown beside it may fall in below the centreline.
        Assert.InRange(Assert.Single(lake.Crossings(opened).Crossings).AccumulationCells, (100 * 141) - 2, 100 * 141);
    }

    [Fact]
    public void ALakeWithAWayOutBesideTheRoadStaysALake()
    {
        // A lake at 102 against the bank, drained by a channel to the west at y = 100; the ground south of the road lies lower.
        var ground = (double x, double y) =>
        {
            if (y < 60) return 100 - (0.02 * (60 - y));
            var channel = 102 - (0.01 * (40 - x)) + (0.05 * Math.Max(0, Math.Abs(y - 100.5) - 1));
            return x > 40 && x < 120 && y < 120 ? 102 : Math.Max(102, channel) + (x < 40 ? Math.Min(0, channel - 102) : 0.2 * Math.Max(Math.Max(0, x - 120), Math.Max(0, y - 120)));
        };
        var valley = new BuiltValley { Ground = ground }.Bank("R", 0, 60, 141, 60, _ => 104);
        var elevation = valley.Elevation();
        var opened = valley.Solve(elevation, new() { PondAreaM2 = 1000, StreamAreaM2 = 1000 });
        Assert.Empty(opened.Openings);
    }

    [Fact]
    public void APondInTheHillsIsFilledNotOpened()
    {
        // A hollow 2 m deep and 8 m wide, 45 m above the open road: not the road's dam.
        var valley = BuiltValley.Channel().Bank("R", 0, 60, 141, 60, _ => 90);
        var elevation = valley.Elevation((x, y) => -Math.Max(0, 2 - (Math.Sqrt(((x - 70.5) * (x - 70.5)) + ((y - 105) * (y - 105))) / 2)));
        var opened = valley.Solve(elevation, new() { PondAreaM2 = 100 });
        Assert.Empty(opened.Openings);
        Assert.True(opened.Terrain.Filled.DeepestM > 1);
    }

    [Fact]
    public void WithoutACulvertTheBankCanBeLeftShut()
    {
        var valley = BuiltValley.Channel().Bank("R", 0, 60, 141, 60, Crest);
        var opened = valley.Solve(valley.Elevation(), new() { Scope = OpeningScope.Known, StreamAreaM2 = 5000 });
        Assert.Empty(opened.Openings);
        var finding = Assert.Single(opened.Findings);
        Assert.Equal("dam-not-opened", finding.Code);
        Assert.DoesNotContain(valley.Crossings(opened, 5000).Crossings, c => Math.Abs(c.StationM!.Value - 70.5) < 20);
    }

    [Fact]
    public void TwoChannelsCloseTogetherGetAnOpeningEach()
    {
        // Channels at x = 55.5 and 86.5; the ridge between them at x = 71 is drowned by the one pond behind the bank.
        double Ground(double x, double y) => Math.Min(BuiltValley.ChannelGround(0, 55.5, 60)(x, y), BuiltValley.ChannelGround(0, 86.5, 60)(x, y));
        var valley = new BuiltValley { Ground = Ground }.Bank("R", 0, 60, 141, 60, Crest);
        var opened = valley.Solve(valley.Elevation(), new() { PondAreaM2 = 5000 });
        Assert.Equal(2, opened.Openings.Count);
        var crossings = valley.Crossings(opened, 5000).Crossings;
        Assert.Equal([55.5, 86.5], crossings.Select(c => c.StationM!.Value), (a, b) => Math.Abs(a - b) <= 1);
        Assert.Equal([100 * 71, 100 * 70], crossings.Select(c => (int)c.AccumulationCells));
    }

    [Fact]
    public void ARoadOnTheDivideIsNotOpened()
    {
        var valley = new BuiltValley { Ground = (_, y) => 100 - (0.05 * Math.Abs(y - 80)) }.Bank("R", 0, 80, 141, 80, _ => 101);
        var opened = valley.Solve(valley.Elevation(), new() { PondAreaM2 = 100, StreamAreaM2 = 100 });
        Assert.Empty(opened.Openings);
        Assert.Empty(valley.Crossings(opened, 100).Crossings);
    }

    [Fact]
    public void ARoadAlongTheStreamIsNotOpened()
    {
        // The channel runs south along x = 70.5, the road on a bank beside it at x = 55, 15 m off, with rising ground behind.
        var valley = new BuiltValley { Ground = (x, y) => 100 + (0.01 * y) + (0.05 * Math.Max(0, Math.Abs(x - 70.5) - 1)) }.Bank("R", 55, 0, 55, 160, along => 103 + (0.01 * along));
        var opened = valley.Solve(valley.Elevation(), new() { PondAreaM2 = 2000, StreamAreaM2 = 2000 });
        Assert.Empty(opened.Openings);
        Assert.Empty(valley.Crossings(opened, 8000).Crossings);
    }

    [Fact]
    public void AConfluenceAtTheBankHasOneOpening()
    {
        // Two channels at 35 degrees to both sides meet at (70.5, 78), just above the toe.
        double Ground(double x, double y)
        {
            var below = BuiltValley.ChannelGround(0, 70.5, 60)(x, y);
            return y < 78 ? below : Math.Min(BuiltValley.ChannelGround(35, 70.5, 78)(x, y), BuiltValley.ChannelGround(-35, 70.5, 78)(x, y)) + 0.18;
        }

        var valley = new BuiltValley { Ground = Ground }.Bank("R", 0, 60, 141, 60, Crest);
        var opened = valley.Solve(valley.Elevation());
        Assert.Single(opened.Openings);
        Assert.Equal(100 * 141, Assert.Single(valley.Crossings(opened).Crossings).AccumulationCells);
    }

    [Fact]
    public void ABankAtTheUpperEdgeOfTheTerrainHasNothingToHold()
    {
        // Only 8 m of terrain above the centreline: the toe lies beyond the edge, and what runs there leaves the terrain.
        var valley = BuiltValley.Channel(0, 70.5, 152).Bank("R", 0, 152, 141, 152, Crest);
        var opened = valley.Solve(valley.Elevation(), new() { PondAreaM2 = 100, StreamAreaM2 = 100 });
        Assert.Empty(opened.Openings);
    }

    [Fact]
    public void ABankAtTheLowerEdgeIsSaidToBeShut()
    {
        var valley = BuiltValley.Channel(0, 70.5, 8).Bank("R", 0, 8, 141, 8, Crest);
        var opened = valley.Solve(valley.Elevation(), new() { StreamAreaM2 = 5000 });
        Assert.Empty(opened.Openings);
        Assert.Contains(opened.Findings, f => f.Code == "dam-not-opened");
    }

    [Fact]
    public void ABraidedStreamIsOneCrossing()
    {
        // Two arms 5 m apart with a bar 0.2 m high between, parted from y = 100 down to 40.
        double Ground(double x, double y)
        {
            var bar = y is > 40 and < 100 && Math.Abs(x - 70.5) < 1.6 ? 0.2 : 0;
            return 100 + (0.01 * (y - 60)) + (0.05 * Math.Max(0, Math.Abs(x - 70.5) - 3)) + bar + (0.5 * Math.Max(0, y - 115));
        }

        var valley = new BuiltValley { Ground = Ground }.Bank("R", 0, 60, 141, 60, Crest);
        var opened = valley.Solve(valley.Elevation());
        Assert.Single(opened.Openings);
        Assert.Equal(100 * 141, Assert.Single(valley.Crossings(opened).Crossings).AccumulationCells);
    }

    [Fact]
    public void AStreamTurnedAlongTheRoadIsFoundWhereItComesToIt()
    {
        // A hillside that falls 2 % to the south and 1 % to the east: the bank turns the channel along its upper toe, and nothing ponds.
        double Ground(double x, double y) => 100 + (0.02 * (y - 60)) - (0.01 * (x - 40.5)) + (0.05 * Math.Min(Math.Max(0, Math.Abs(x - 40.5) - 1), 10));
        var valley = new BuiltValley { Ground = Ground }.Bank("R", 0, 60, 141, 60, a => 104 - (0.01 * a));
        var elevation = valley.Elevation();
        var opened = valley.Solve(elevation, new() { StreamAreaM2 = 1000, PondAreaM2 = 1e6 });
        var opening = Assert.Single(opened.Openings);
        Assert.Equal(OpeningReason.Diversion, opening.Reason);
        Assert.InRange(opening.StationM, 38.5, 46.5); // the channel is 2 m wide and leans to the east
        Assert.True(opening.AreaAfterM2 > 1000 && opening.AreaBeforeM2 < 200, $"{opening.AreaBeforeM2} before, {opening.AreaAfterM2} after");
    }

    [Fact]
    public void AKnownCulvertIsOpenedBetweenItsEnds()
    {
        var valley = BuiltValley.Channel().Bank("R", 0, 60, 141, 60, Crest);
        var opened = valley.Solve(valley.Elevation(), new() { Scope = OpeningScope.Known }, [new("C7", new(70.5, 46), new(70.5, 73.5))]);
        var opening = Assert.Single(opened.Openings);
        Assert.Equal("C7", opening.KnownId);
        Assert.InRange(opening.LengthM, 25, 32);
        Assert.Equal("embankment-opened", EmbankmentOpenings.FindingsOf(opening, new())[0].Code);
        Assert.Equal(100 * 141, Assert.Single(valley.Crossings(opened).Crossings).AccumulationCells);
        var off = valley.Solve(valley.Elevation(), new() { Scope = OpeningScope.Known }, [new("C8", new(20, 120), new(20, 140))]);
        Assert.Contains(off.Findings, f => f.Code == "known-culvert-not-used");
    }

    [Fact]
    public void AGivenCrossingIsOpened()
    {
        var valley = BuiltValley.Channel().Bank("R", 0, 60, 141, 60, Crest);
        var opened = valley.Solve(valley.Elevation(), new() { Scope = OpeningScope.Known }, points: [new("P1", new(68, 62))]);
        var opening = Assert.Single(opened.Openings);
        Assert.Equal((OpeningReason.GivenCrossing, "P1"), (opening.Reason, opening.KnownId));
        Assert.InRange(opening.StationM, 69.5, 71.5);
    }

    [Fact]
    public void EveryCellStillDrainsAndNothingRunsUphill()
    {
        foreach (var skew in new[] { 0.0, 20, 40 })
        {
            var valley = BuiltValley.Channel(skew).Bank("A", 0, 60, 141, 60, Crest).Bank("B", 20, 0, 120, 160, a => 104 - (0.01 * a));
            var opened = valley.Solve(valley.Elevation(), new() { PondAreaM2 = 500, StreamAreaM2 = 500 });
            var terrain = opened.Terrain;
            long outlets = 0;
            for (var cell = 0; cell < terrain.Direction.Cells.Length; cell++)
            {
                if (terrain.Direction.Cells[cell] == 0) { outlets += terrain.Accumulation.Cells[cell]; continue; }
                var next = FlowAccumulation.Downstream(terrain.Direction.Frame, cell, terrain.Direction.Cells[cell]);
                Assert.True(terrain.Filled.Surface.Cells[next] <= terrain.Filled.Surface.Cells[cell]);
            }

            Assert.Equal(terrain.Direction.Cells.Length, outlets);
        }
    }

    [Fact]
    public void LongDitchesAreRelieved()
    {
        // A plain hillside, 2 % to the south and 1 % to the east along the road: the ditch above the bank runs on for 141 m.
        var valley = new BuiltValley { Ground = (x, y) => 100 + (0.02 * (y - 60)) - (0.01 * x) }.Bank("R", 0, 60, 141, 60, a => 102 - (0.01 * a));
        var settings = new OpeningSettings { ReliefSpacingM = 50, PondAreaM2 = 1e5, StreamAreaM2 = 1e5 };
        var opened = valley.Solve(valley.Elevation(), settings);

        // 141 / 50 -> three pieces of 47 m: reliefs at 47 and 94, give or take two cells along the ditch and the skew of the way through.
        Assert.Equal([OpeningReason.DitchRelief, OpeningReason.DitchRelief], opened.Openings.Select(o => o.Reason));
        Assert.Equal([47.0, 94.0], opened.Openings.Select(o => o.StationM), (a, b) => Math.Abs(a - b) <= 10);
        var crossings = CrossingFinder.Find(valley.Roads, opened.Terrain.Direction, opened.Terrain.Accumulation, 100000, new() { Openings = opened.Openings }).Crossings;
        Assert.Equal([CrossingOrigin.DitchRelief, CrossingOrigin.DitchRelief], crossings.Select(c => c.Origin));
        Assert.Empty(valley.Solve(valley.Elevation(), settings with { ReliefSpacingM = null }).Openings);
    }

    [Fact]
    public void AKnownCulvertBringsItsEndsAndInverts()
    {
        var valley = BuiltValley.Channel().Bank("R", 0, 60, 141, 60, Crest);
        var elevation = valley.Elevation();
        KnownCulvert culvert = new("C7", new CoordinateZ(70.5, 44, 99.5), new CoordinateZ(72.5, 74, 99.9)); // drawn from the outlet up
        var opened = valley.Solve(elevation, new() { Scope = OpeningScope.Known }, [culvert]);
        var crossing = Assert.Single(CrossingFinder.Find(valley.Roads, opened.Terrain.Direction, opened.Terrain.Accumulation, 10000, new() { Openings = opened.Openings }).Crossings);
        var line = CulvertLineSurvey.Measure(crossing, opened.Terrain.Direction, opened.Terrain.Accumulation, elevation);
        Assert.Equal(Math.Sqrt(4 + 900), line.Length!.Value, 9);
        Assert.Equal((99.9, 99.5), (line.InletElevation!.Value, line.OutletElevation!.Value));
        Assert.Equal((72.5, 74.0, 70.5, 44.0), (line.Line!.StartPoint.X, line.Line.StartPoint.Y, line.Line.EndPoint.X, line.Line.EndPoint.Y));

        // A figure given for the crossing goes before.
        var other = CulvertLineSurvey.Measure(crossing, opened.Terrain.Direction, opened.Terrain.Accumulation, elevation, null, new(crossing.Id) { LengthM = 28, InletElevationM = 99.8 });
        Assert.Equal((28.0, 99.8, 99.5), (other.Length!.Value, other.InletElevation!.Value, other.OutletElevation!.Value));
    }

    [Fact]
    public void TheBarrelUnderTwoCarriagewaysReachesFromToeToToe()
    {
        // Roads of 8 m, 2 to 1, crests 4.6475 m above the bed at the lower road: the toes lie (8/2 + 2 h) off the outer centrelines, h road level less bed there.
        var valley = BuiltValley.Channel().Bank("A", 0, 60, 141, 60, _ => 104.6).Bank("B", 0, 88, 141, 88, _ => 104.6);
        var elevation = valley.Elevation();
        var opened = valley.Solve(elevation);
        var crossing = Assert.Single(CrossingFinder.Find(valley.Roads, opened.Terrain.Direction, opened.Terrain.Accumulation, 9000, new() { Openings = opened.Openings }).Crossings);
        var line = CulvertLineSurvey.Measure(crossing, opened.Terrain.Direction, opened.Terrain.Accumulation, elevation);

        // Upstream of B: r = 4 + 2 (104.6 - 100.28 - 0.01 r) -> r = 12.64 / 1.02; downstream of A: r = 4 + 2 (4.6 + 0.01 r) -> 13.2 / 0.98. The crown at the centreline is 0.01 to 0.08 m lower on the grid.
        Assert.InRange(line.Length!.Value, 28 + (12.64 / 1.02) + (13.2 / 0.98) - 0.5, 28 + (12.64 / 1.02) + (13.2 / 0.98) + 0.5);
        Assert.Equal(104.6, line.LowestRoadElevation!.Value, 1);
    }
}
