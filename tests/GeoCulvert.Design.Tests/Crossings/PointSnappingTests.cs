using GeoCulvert.Design.Crossings;
using GeoCulvert.Design.Terrain;
using NetTopologySuite.Geometries;

namespace GeoCulvert.Design.Tests.Crossings;

/// <summary>A tributary (column 2, south) meets a river (row 4, east) on cells of 10 m; areas are written into the grid by hand.</summary>
public class PointSnappingTests
{
    private static readonly Grid<byte> Direction = HandGrid.Directions(10, "5525555", "5525555", "5525555", "5525555", "6666665", "5555555", "5555555");

    private static readonly Grid<int> Accumulation = new(Direction.Frame,
    [
        1, 1, 300, 1, 1, 1, 1,
        1, 1, 310, 1, 1, 1, 1,
        1, 1, 320, 1, 1, 1, 1,
        1, 1, 330, 1, 1, 1, 1,
        9000, 9001, 9332, 9333, 9334, 9335, 9336,
        1, 1, 1, 1, 1, 1, 1,
        1, 1, 1, 1, 1, 1, 1,
    ]);

    private static SnappedPoint Snap(double x, double y, SnapSettings settings, double? statedM2 = null) =>
        PointSnapping.Snap([new("P", new Coordinate(x, y), statedM2)], Direction, Accumulation, settings)[0];

    [Fact]
    public void APointOnATributaryStaysThereAndTheRiverIsSaid()
    {
        // On the tributary at row 1 (y = 55), the river 30 m away within reach: the largest accumulation would be wrong.
        var snapped = Snap(25, 55, new() { SnapM = 30 });
        Assert.Equal((1 * 7) + 2, snapped.Cell);
        Assert.Equal(0, snapped.MovedM);
        Assert.Equal(["snap-area-jump"], snapped.Findings.Select(f => f.Code));
    }

    [Fact]
    public void APointBesideARiverGoesToIt()
    {
        // One and a half cells south of the river, nothing else near.
        var snapped = Snap(55, 10, new() { SnapM = 20 });
        Assert.Equal((4 * 7) + 5, snapped.Cell);
        Assert.Equal(15, snapped.MovedM, 9);
        Assert.Equal(["crossing-moved"], snapped.Findings.Select(f => f.Code));
    }

    [Fact]
    public void AStatedAreaDecidesAtAConfluence()
    {
        // At the mouth, 5 m from both. 320 cells of 100 m2 = 32 000 m2 stated: the tributary.
        Assert.Equal((3 * 7) + 2, Snap(25, 30, new() { SnapM = 30 }, 33000).Cell);
        Assert.Equal((4 * 7) + 2, Snap(25, 30, new() { SnapM = 30 }, 930000).Cell);
        Assert.Contains(Snap(55, 10, new() { SnapM = 20 }, 33000).Findings, f => f.Code == "stated-area-differs");
    }

    [Fact]
    public void WithoutAStreamTheLargestInReachIsTakenAndSaid()
    {
        var snapped = Snap(55, 55, new() { SnapM = 5 });
        Assert.Equal(["no-stream-in-reach"], snapped.Findings.Select(f => f.Code));
        Assert.Equal((1 * 7) + 5, snapped.Cell);
    }

    [Fact]
    public void OffTheTerrainIsAnError()
    {
        var snapped = Snap(500, 500, new() { SnapM = 30 });
        Assert.Equal(-1, snapped.Cell);
        Assert.Equal(["crossing-off-terrain"], snapped.Findings.Select(f => f.Code));
    }

    [Fact]
    public void AGivenPointTakesItsStationWhereTheStreamMeetsTheRoad()
    {
        // Road along y = 50 between rows 1 and 2; the point lies on the road 3 m east of the stream.
        var road = new RoadAlignment("R", [new LineString([new(0, 50), new(70, 50)])]);
        var points = PointSnapping.Snap([new("P7", new Coordinate(28, 50))], Direction, Accumulation, new() { SnapM = 12 });
        var crossing = Assert.Single(GivenCrossings.Place(points, [road], Direction, Accumulation, 20).Crossings);
        Assert.Equal(("P7", 25.0, (1 * 7) + 2, 310L), (crossing.Id, crossing.StationM!.Value, crossing.OutletCell, crossing.AccumulationCells));
        Assert.True(crossing.MeetsRoad);
        var alone = Assert.Single(GivenCrossings.Place(points, [], Direction, Accumulation, 20).Crossings);
        Assert.Contains(alone.Findings, f => f.Code == "no-road-in-reach");
    }
}
