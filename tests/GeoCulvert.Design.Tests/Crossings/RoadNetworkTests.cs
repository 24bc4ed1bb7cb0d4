using GeoCulvert.Design.Crossings;
using GeoCulvert.Design.Terrain;
using GeoCulvert.Design.Watersheds;
using NetTopologySuite.Geometries;

namespace GeoCulvert.Design.Tests.Crossings;

/// <summary>Networks of roads over one straight channel (x = 70.5, running south over 160 m): who shares a culvert follows from the distances alone.</summary>
public class RoadNetworkTests
{
    private static readonly DrainedTerrain Channel = Drainage.Solve(BuiltValley.Channel().Elevation());

    private static RoadAlignment Road(string name, params (double X, double Y)[] points) =>
        new(name, [new LineString([.. points.Select(p => new Coordinate(p.X, p.Y))])]) { WidthM = 8 };

    private static IReadOnlyList<Crossing> Find(params RoadAlignment[] roads) => CrossingFinder.Find(roads, Channel.Direction, Channel.Accumulation, 2000).Crossings;

    [Fact]
    public void ASharedStretchIsOneCrossing()
    {
        var crossing = Assert.Single(Find(Road("A", (0, 60), (141, 60)), Road("B", (30, 90), (40, 60), (141, 60))));
        Assert.Equal("A", crossing.Road!.Name);
        Assert.Equal(["A", "B"], crossing.Over.Select(o => o.Road.Name));
    }

    [Fact]
    public void TheLegsOfAForkShareACulvertWhileTheyAreClose()
    {
        // Legs over the channel at y = 60 and 60 + d: shoulder to shoulder d - 8, limit 30.
        Assert.Equal(["A", "B"], Assert.Single(Find(Road("A", (0, 60), (141, 60)), Road("B", (0, 60), (20, 60), (60, 40), (141, 40)))).Over.Select(o => o.Road.Name));
        Assert.Equal(["A", "B"], Find(Road("A", (0, 60), (141, 60)), Road("B", (0, 60), (20, 60), (60, 20), (141, 20))).Select(c => c.Road!.Name));
    }

    [Fact]
    public void ThreeRoadsInARowAreOneEvenWhereTheOuterOnesAreFarApart()
    {
        var crossing = Assert.Single(Find(Road("A", (0, 60), (141, 60)), Road("B", (0, 90), (141, 90)), Road("C", (0, 30), (141, 30))));
        Assert.Equal(["B", "A", "C"], crossing.Over.Select(o => o.Road.Name));
        Assert.Equal([-30.0, 0, 30], crossing.Over.Select(o => Math.Round(o.AlongM)));
        // Above y = 90 lie 70 rows.
        Assert.Equal(70 * 141, crossing.AccumulationCells);
        // The channel's bottom is three cells wide, so the water comes in three threads; the watershed holds all of them.
        Assert.Equal(2, crossing.OtherArms.Count);
        var watershed = Assert.Single(WatershedSurvey.Survey(Channel, [crossing]).Watersheds).Total;
        Assert.Equal(70 * 141, watershed.Cells);
        Assert.True(watershed.Outline.Polygon.IsValid);
        Assert.Equal(70 * 141, watershed.Outline.Polygon.Area, 1e-6);
    }

    [Fact]
    public void ALoopCrossesTwice()
    {
        var crossings = Find(Road("L", (0, 110), (120, 110), (120, 60), (0, 60)));
        Assert.Equal(2, crossings.Count);
        Assert.Equal([50 * 141, 100 * 141], crossings.Select(c => (int)c.AccumulationCells));
    }

    [Fact]
    public void ARoadDrawnInPiecesIsTheSameRoad()
    {
        var whole = Find(Road("A", (0, 60), (141, 60)));
        var pieces = new RoadAlignment("A", [
            new LineString([new(0, 60), new(50, 60)]), new LineString([new(141, 60), new(90, 60)]), new LineString([new(50, 60), new(90, 60)])]) { WidthM = 8 };
        Assert.Equal(whole.Select(c => (c.Id, c.OutletCell)), Find(pieces).Select(c => (c.Id, c.OutletCell)));
    }

    [Fact]
    public void CrossingRoadsAtTheStreamAreOneCrossing()
    {
        // A junction in the channel itself: both centrelines meet the flow within a few metres.
        var crossing = Assert.Single(Find(Road("A", (0, 60), (141, 60)), Road("B", (40, 30), (101, 91))));
        Assert.Equal("A", crossing.Road!.Name);
        Assert.Contains("B", crossing.Over.Select(o => o.Road.Name));
    }
}
