using GeoCulvert.Design.Basis;
using GeoCulvert.Design.Crossings;
using NetTopologySuite.Geometries;

namespace GeoCulvert.Design.Tests.Crossings;

public class RoadAlignmentTests
{
    private static LineString Line(params (double X, double Y)[] points) => new([.. points.Select(p => new Coordinate(p.X, p.Y))]);

    [Fact]
    public void PartsAreChainedAndTurnedRound()
    {
        // First part east 0-100; the second is drawn backwards from (200, 50) to (100, 0): length sqrt(100^2 + 50^2) = 111.803.
        var road = new RoadAlignment("R", [Line((0, 0), (100, 0)), Line((200, 50), (100, 0))], 1000);
        Assert.Equal(0, road.GapCount);
        Assert.Equal(1000 + 100 + Math.Sqrt(12500), road.EndStationM, 9);
        var half = road.PointAt(1100 + (Math.Sqrt(12500) / 2));
        Assert.Equal(150, half.X, 9);
        Assert.Equal(25, half.Y, 9);
    }

    [Fact]
    public void AGapIsNotCounted()
    {
        var road = new RoadAlignment("R", [Line((0, 0), (100, 0)), Line((150, 0), (250, 0))]);
        Assert.Equal(1, road.GapCount);
        Assert.Equal(200, road.LengthM);
        Assert.Equal(160, road.PointAt(110).X, 9);
    }

    [Fact]
    public void OffsetsArePositiveToTheRight()
    {
        var road = new RoadAlignment("R", [Line((0, 0), (100, 0))]);
        var right = road.StationOf(new Coordinate(30, -4));
        Assert.Equal((30.0, 4.0, 90.0), (right.StationM, right.OffsetM, right.AzimuthDeg));
        Assert.Equal(-4, road.StationOf(new Coordinate(30, 4)).OffsetM);
        Assert.Equal("R 0+030", road.IdAt(30));
    }

    [Fact]
    public void ALineWithoutLengthIsAnInputProblem() =>
        Assert.Throws<InputException>(() => new RoadAlignment("R", [Line((1, 1), (1, 1))]));
}
