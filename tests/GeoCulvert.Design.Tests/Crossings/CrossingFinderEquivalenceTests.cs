using CsCheck;
using GeoCulvert.Design.Crossings;
using GeoCulvert.Design.Terrain;
using NetTopologySuite.Geometries;

namespace GeoCulvert.Design.Tests.Crossings;

/// <summary>The search in narrow boxes along the road finds the same cells as intersecting every step of the grid with the whole line.</summary>
public class CrossingFinderEquivalenceTests
{
    // Random directions that only go south, so that no path closes on itself.
    private static readonly Gen<(Grid<byte> Direction, RoadAlignment Road)> Scene =
        from codes in Gen.Int[0, 3].Select(i => (byte)(i == 0 ? 0 : 3 + i)).Array[9 * 12]
        from x in Gen.Double[-2, 14].Array[4]
        from y in Gen.Double[-2, 11].Array[4]
        select (new Grid<byte>(new GridFrame(12, 9, 0, 9, 1, 1), codes),
            new RoadAlignment("R", [new LineString([.. x.Zip(y, (a, b) => new Coordinate(a, b))])]) { WidthM = 1 });

    [Fact]
    public void CellsAreThoseOfTheNaiveTwin() => Scene.Sample((direction, road) =>
    {
        var accumulation = HandGrid.Accumulation(direction);
        var naive = new HashSet<int>();
        for (var i = 0; i < direction.Cells.Length; i++)
        {
            var next = HandGrid.Next(direction, i);
            if (next >= 0 && accumulation.Cells[i] >= 2 && new LineString([Centre(i), Centre(next)]).Intersects(road.Line)) naive.Add(i);
        }

        // With a distance of 0 only a path's own repeated steps on the road are joined, so count the meetings.
        var found = CrossingFinder.Find([road], direction, accumulation, 2, new() { SameCrossingM = 0 }).Crossings;
        Assert.Equal(naive.Count, found.Sum(c => c.MeetingCount));
        Assert.All(found, c => Assert.Contains(c.OutletCell, naive));
        Assert.Equal(found.Count, found.Select(c => c.Id).Distinct().Count());
        Assert.Equal(found.Select(c => c.StationM!.Value).Order(), found.Select(c => c.StationM!.Value));

        Coordinate Centre(int cell) => new(direction.Frame.CentreX(cell % 12), direction.Frame.CentreY(cell / 12));
    });

    [Fact]
    public void EveryStreamThatMeetsTheRoadKeepsACrossing() => Scene.Sample((direction, road) =>
    {
        // Whatever the distance, joining never loses a meeting: each lies in exactly one crossing.
        var accumulation = HandGrid.Accumulation(direction);
        int Meetings(double sameM) => CrossingFinder.Find([road], direction, accumulation, 1, new() { SameCrossingM = sameM }).Crossings.Sum(c => c.MeetingCount);
        Assert.Equal(Meetings(0), Meetings(3));
    });
}
