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
        Assert.Equal(2, Assert.Single(Find(braid, 2, Road("R", (0, 30), (60, 30))).Crossings).MeetingCount);
        // The same arms with the distance set below their spacing: two.
        Assert.Equal(2, CrossingFinder.Find([Road("R", (0, 30), (60, 30))], braid, HandGrid.Accumulation(braid), 2, new() { SameCrossingM = 15 }).Crossings.Count);
    }

    [Fact]
    public void TwoRoadsOverOneStepShareACell()
    {
        var direction = HandGrid.Directions(10, "66244", "66244", "66244", "66244", "66244");
        var found = Find(direction, 5, Road("A", (0, 21), (50, 21)), Road("B", (0, 19), (50, 19)));
        Assert.Equal(["A 0+025", "B 0+025"], found.Crossings.Select(c => c.Id));
        Assert.All(found.Crossings, c => Assert.Contains(c.Findings, f => f.Code == "two-crossings-on-one-cell"));
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
