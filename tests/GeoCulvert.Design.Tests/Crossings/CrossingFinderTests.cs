using GeoCulvert.Design.Crossings;
using GeoCulvert.Design.Terrain;
using NetTopologySuite.Geometries;

namespace GeoCulvert.Design.Tests.Crossings;

/// <summary>Crossings on grids drawn by hand; stations and cells read off the drawing.</summary>
public class CrossingFinderTests
{
    private static RoadAlignment Road(string name, params (double X, double Y)[] points) =>
        new(name, [new LineString([.. points.Select(p => new Coordinate(p.X, p.Y))])]) { WidthM = 8 };

    private static CrossingList Find(Grid<byte> direction, int threshold, params RoadAlignment[] roads) =>
        CrossingFinder.Find(roads, direction, HandGrid.Accumulation(direction), threshold);

    [Fact]
    public void AStreamAcrossARoadIsOneCrossing()
    {
        // Columns drain to the middle one, which runs south; cells 10 m, road east-west between rows 2 and 3 (y = 20).
        var direction = HandGrid.Directions(10, "66244", "66244", "66244", "66244", "66244");
        var found = Find(direction, 5, Road("RD9", (0, 20), (50, 20)));
        var crossing = Assert.Single(found.Crossings);
        Assert.Equal("RD9 0+025", crossing.Id);
        Assert.Equal((2 * 5) + 2, crossing.OutletCell);
        Assert.Equal(15, crossing.AccumulationCells);
        Assert.Equal(180, crossing.FlowAzimuthDeg!.Value, 9);
        Assert.Equal(0, crossing.SkewDeg!.Value, 9);
        Assert.Empty(crossing.Findings);
    }

    [Fact]
    public void AVertexOnTheStreamIsNotTwoCrossings()
    {
        var direction = HandGrid.Directions(10, "66244", "66244", "66244", "66244", "66244");
        Assert.Single(Find(direction, 5, Road("R", (0, 20), (25, 20), (50, 20))).Crossings);
        Assert.Single(Find(direction, 5, Road("R", (0, 25), (25, 25), (50, 25))).Crossings);
    }

    [Fact]
    public void AStreamWeavingAcrossARoadIsOneCrossing()
    {
        // South, east, north, east ... across y = 20 five times, never more than a cell from it; it ends south of the road.
        var list = Find(HandGrid.Directions(10, "22222", "26262", "68682", "66665"), 1, Road("R", (0, 20), (50, 20))).Crossings;
        var crossing = Assert.Single(list);
        Assert.Equal(5, crossing.MeetingCount);
        Assert.Equal(45, crossing.StationM);
        Assert.Equal(9, crossing.OutletCell);
        Assert.Equal(["stream-runs-along-road"], crossing.Findings.Select(f => f.Code));
    }

    [Fact]
    public void AStreamThatComesBackIsSaidSo()
    {
        // Four meetings, then off to the north; the column to the east drains away from it.
        var list = Find(HandGrid.Directions(10, "22288", "26282", "68682", "55552"), 2, Road("R", (0, 20), (50, 20))).Crossings;
        var crossing = Assert.Single(list);
        Assert.Equal(["stream-runs-along-road", "stream-returns-to-side"], crossing.Findings.Select(f => f.Code));
    }

    [Fact]
    public void StreamsFarApartAreTwoCrossings()
    {
        var apart = HandGrid.Directions(10, "2444466662", "2555555552", "2555555552", "2555555552");
        Assert.Equal([5.0, 95.0], Find(apart, 2, Road("R", (0, 20), (100, 20))).Crossings.Select(c => c.StationM!.Value));
    }

    [Fact]
    public void ABraidIsOneCrossing()
    {
        // Two arms two columns apart that join two rows below the road.
        var braid = HandGrid.Directions(10, "525255", "525255", "525255", "562455", "552555");
        var crossing = Assert.Single(Find(braid, 2, Road("R", (0, 30), (60, 30))).Crossings);
        Assert.Equal(2, crossing.MeetingCount);
        // Two cells of each arm above the road.
        Assert.Equal(4, crossing.AccumulationCells);
        Assert.Single(crossing.OtherArms);
        // The same arms with the distance set below their spacing: two.
        Assert.Equal(2, CrossingFinder.Find([Road("R", (0, 30), (60, 30))], braid, HandGrid.Accumulation(braid), 2, new() { SameCrossingM = 15 }).Crossings.Count);
    }

    [Fact]
    public void RoadsCloseTogetherHaveOneCulvert()
    {
        // Shoulder to shoulder the roads at y = 46 and y = 16 lie 30 - 8 = 22 m apart.
        var direction = HandGrid.Directions(10, "66244", "66244", "66244", "66244", "66244", "66244");
        RoadAlignment a = Road("A", (0, 16), (50, 16)), b = Road("B", (0, 46), (50, 46));
        var crossing = Assert.Single(Find(direction, 5, a, b).Crossings);
        Assert.Equal("A 0+025", crossing.Id);
        Assert.Equal(["B", "A"], crossing.Over.Select(o => o.Road.Name));
        Assert.Equal([-30.0, 0], crossing.Over.Select(o => o.AlongM));
        // The step from the centre of the first row (y = 55) to that of the second (45) passes y = 46.
        Assert.Equal((0 * 5) + 2, crossing.OutletCell);
        Assert.Equal(5, crossing.AccumulationCells);

        var apart = CrossingFinder.Find([a, b], direction, HandGrid.Accumulation(direction), 5, new() { TogetherM = 20 });
        Assert.Equal(["A 0+025", "B 0+025"], apart.Crossings.Select(c => c.Id));
    }

    [Fact]
    public void TwoRoadsOverOneStepAreOneCrossing()
    {
        var direction = HandGrid.Directions(10, "66244", "66244", "66244", "66244", "66244");
        var crossing = Assert.Single(Find(direction, 5, Road("A", (0, 21), (50, 21)), Road("B", (0, 19), (50, 19))).Crossings);
        Assert.Equal(["A", "B"], crossing.Over.Select(o => o.Road.Name));
        Assert.Equal(2, crossing.Over[1].AlongM, 9);
    }

    [Fact]
    public void AnObliqueFlowHasItsSkew()
    {
        // All steps south-east (azimuth 135), road due east (azimuth 90): 45 degrees between them, so 45 from the perpendicular.
        var direction = HandGrid.Directions(10, "33333333", "33333333", "33333333", "33333333", "33333333", "33333333", "33333333", "33333333");
        var all = Find(direction, 4, Road("R", (0, 42), (80, 42))).Crossings;
        Assert.All(all, c => Assert.Equal(45, c.SkewDeg!.Value, 6));
        Assert.NotEmpty(all);
    }

    [Fact]
    public void ARoadOffTheTerrainHasNoCrossing()
    {
        var direction = HandGrid.Directions(10, "66244", "66244");
        Assert.Empty(Find(direction, 1, Road("R", (1000, 1000), (2000, 1000))).Crossings);
    }
}

/// <summary>Low points of road profiles, read off by eye.</summary>
public class RoadLowPointsTests
{
    private static ProfilePoint[] Profile(params double[] levels) => [.. levels.Select((z, i) => new ProfilePoint(10 * i, z))];

    [Fact]
    public void ASagIsALowPoint() => Assert.Equal([20.0], RoadLowPoints.Of(Profile(5, 4, 3, 4, 5)));

    [Fact]
    public void ALevelSagGivesItsMiddle() => Assert.Equal([25.0], RoadLowPoints.Of(Profile(5, 4, 3, 3, 4, 5)));

    [Fact]
    public void EndsAndSmallDipsAreNone() => Assert.Empty(RoadLowPoints.Of(Profile(1, 2, 1.8, 2, 5, 4.9, 4.8)));

    [Fact]
    public void TheLowerOfTwoDipsCloseByCounts() => Assert.Equal([30.0], RoadLowPoints.Of(Profile(5, 3, 3.1, 2.9, 4)));

    [Fact]
    public void TwoSagsWithARiseBetweenAreTwo() => Assert.Equal([10.0, 30.0], RoadLowPoints.Of(Profile(5, 3, 4, 2, 4)));

    [Fact]
    public void ADipAfterTheFirstRiseCounts() => Assert.Equal([10.0, 40.0], RoadLowPoints.Of(Profile(2, 1, 1.5, 1.4, 1.1, 1.4, 1.6)));
}
