using GeoCulvert.Design.Crossings;
using GeoCulvert.Design.Terrain;
using NetTopologySuite.Geometries;

namespace GeoCulvert.Design.Tests.Crossings;

/// <summary>A channel falling south at 2 % on cells of 2 m, a road across it: everything follows from plane geometry by hand.</summary>
public class CulvertLineSurveyTests
{
    private const int Rows = 120;

    private static (Crossing Crossing, Grid<byte> Direction, Grid<int> Accumulation, Grid<float> Elevation) Scene(RoadAlignment road, double slope = 0.02, Action<Grid<float>>? change = null)
    {
        var direction = HandGrid.Directions(2, [.. Enumerable.Repeat("66666244444", Rows)]);
        var elevation = new Grid<float>(direction.Frame);
        for (var row = 0; row < Rows; row++)
            for (var column = 0; column < 11; column++)
                elevation[row, column] = (float)(100 + (slope * direction.Frame.CentreY(row)) + (0.5 * Math.Abs(column - 5)));
        change?.Invoke(elevation);
        var accumulation = HandGrid.Accumulation(direction);
        var crossing = Assert.Single(CrossingFinder.Find([road], direction, accumulation, 50).Crossings);
        return (crossing, direction, accumulation, elevation);
    }

    private static RoadAlignment Road(double zWest, double zEast) =>
        new("R", [new LineString([new CoordinateZ(0, 120, zWest), new CoordinateZ(22, 120, zEast)])]) { WidthM = 10, SideSlope = 2 };

    [Fact]
    public void TheBarrelEndsWhereTheEmbankmentMeetsTheBed()
    {
        // Bed at the crossing (y = 120): 102.4. Road 105.4. Upstream: r = 5 + 2 (105.4 - 102.4 - 0.02 r), so r = 11 / 1.04 = 10.5769;
        // downstream: r = 5 + 2 (3 + 0.02 r), so r = 11 / 0.96 = 11.4583.
        var s = Scene(Road(105.4, 105.4));
        var line = CulvertLineSurvey.Measure(s.Crossing, s.Direction, s.Accumulation, s.Elevation);
        Assert.Equal((11 / 1.04) + (11 / 0.96), line.Length!.Value, 2);
        Assert.Equal(102.4 + (0.02 * 11 / 1.04), line.InletElevation!.Value, 3);
        Assert.Equal(102.4 - (0.02 * 11 / 0.96), line.OutletElevation!.Value, 3);
        Assert.Equal(0.02, line.SlopeMPerM!.Value, 4);
        Assert.Equal(105.4, line.RoadElevation!.Value, 9);
        Assert.Equal(105.4 - 102.4 - (0.02 * 11 / 1.04) - 1.2, line.CoverM(1.2)!.Value, 3);
        Assert.Equal(11, line.Line!.StartPoint.X, 6);
        Assert.Equal(120 + (11 / 1.04), line.Line.StartPoint.Y, 2);
        Assert.Equal(120 - (11 / 0.96), line.Line.EndPoint.Y, 2);
        Assert.Equal(line.Length.Value, line.Line.Length, 9);
        Assert.Empty(line.Findings);
    }

    [Fact]
    public void ASkewedRoadMakesALongerBarrel()
    {
        // Level bed at 100, road 103 and 30 degrees off square: (5 + 2 * 3) / cos 30 on each side.
        var tan = Math.Tan(Math.PI / 6);
        var road = new RoadAlignment("R", [new LineString([new CoordinateZ(0, 120 - (11 * tan), 103), new CoordinateZ(22, 120 + (11 * tan), 103)])]) { WidthM = 10, SideSlope = 2 };
        var s = Scene(road, 0);
        var line = CulvertLineSurvey.Measure(s.Crossing, s.Direction, s.Accumulation, s.Elevation);
        Assert.Equal(30, line.SkewDeg!.Value, 6);
        Assert.Equal(2 * 11 / Math.Cos(Math.PI / 6), line.Length!.Value, 2);
        Assert.Equal(line.Line!.StartPoint.X, line.Line.EndPoint.X, 6);
        Assert.True(line.Line.StartPoint.Y > line.Line.EndPoint.Y);
        Assert.Equal(["adverse-bed"], line.Findings.Select(f => f.Code));
    }

    [Fact]
    public void OnePitDoesNotMoveTheBed()
    {
        // A hole 5 m deep in the channel 14 m upstream of the crossing, inside the smoothing window.
        var s = Scene(Road(105.4, 105.4), change: z => z[(int)((240 - 134) / 2), 5] -= 5);
        var line = CulvertLineSurvey.Measure(s.Crossing, s.Direction, s.Accumulation, s.Elevation);
        Assert.Equal(102.4 + (0.02 * 11 / 1.04), line.InletElevation!.Value, 1);
    }

    [Fact]
    public void ARisingBedIsSaidAndNotMended()
    {
        var s = Scene(Road(105, 105), -0.01);
        var line = CulvertLineSurvey.Measure(s.Crossing, s.Direction, s.Accumulation, s.Elevation);
        Assert.True(line.SlopeMPerM < 0);
        Assert.Contains(line.Findings, f => f.Code == "adverse-bed");
    }

    [Fact]
    public void GivenFiguresGoBeforeMeasuredOnes()
    {
        var s = Scene(Road(105.4, 105.4));
        var given = new CrossingOverrides(s.Crossing.Id) { InletElevationM = 102, OutletElevationM = 101.5, LengthM = 25, RoadElevationM = 106 };
        var line = CulvertLineSurvey.Measure(s.Crossing, s.Direction, s.Accumulation, s.Elevation, overrides: given);
        Assert.Equal((102, 101.5, 25, 106, 106), (line.InletElevation!.Value, line.OutletElevation!.Value, line.Length!.Value, line.RoadElevation!.Value, line.LowestRoadElevation!.Value));
        Assert.All(new[] { line.InletElevation, line.OutletElevation, line.Length, line.RoadElevation }, f => Assert.Equal(FigureOrigin.Given, f.Origin));
        Assert.Equal(0.02, line.SlopeMPerM!.Value, 9);
        Assert.Equal(25, line.Line!.Length, 9);
    }

    [Fact]
    public void TheRoadLevelComesFromTheTerrainWhenNothingElseIsThere()
    {
        // An embankment 10 m wide at 107 under the line.
        var road = new RoadAlignment("R", [new LineString([new(0, 120), new(22, 120)])]) { WidthM = 10 };
        var s = Scene(road, change: z =>
        {
            for (var row = 58; row <= 61; row++)
                for (var column = 0; column < 11; column++) z[row, column] = 107;
        });
        var line = CulvertLineSurvey.Measure(s.Crossing, s.Direction, s.Accumulation, s.Elevation);
        Assert.Equal(107, line.RoadElevation!.Value, 3);
        Assert.Contains(line.Findings, f => f.Code == "road-level-from-dem");
    }

    [Fact]
    public void ATableGoesBeforeTheLineAndIsNotExtrapolated()
    {
        var road = new RoadAlignment("R", [new LineString([new CoordinateZ(0, 120, 1), new CoordinateZ(22, 120, 1)])]) { Profile = [new(5, 104), new(15, 106)] };
        var s = Scene(road);
        var profile = RoadProfile.Sample(road, -10, 50, 1, s.Elevation);
        Assert.Equal(RoadLevelOrigin.Table, profile.Origin);
        Assert.Equal((5.0, 15.0), (profile.Points[0].StationM, profile.Points[^1].StationM));
        // The crossing lies at station 11: 104 + 0.6 * 2.
        Assert.Equal(105.2, CulvertLineSurvey.Measure(s.Crossing, s.Direction, s.Accumulation, s.Elevation).RoadElevation!.Value, 9);
    }

    [Fact]
    public void CellsWiderThanTheRoadAreSaid()
    {
        // The same scene, a road 1.5 m wide on cells of 2 m.
        var road = new RoadAlignment("R", [new LineString([new CoordinateZ(0, 120, 104), new CoordinateZ(22, 120, 104)])]) { WidthM = 1.5 };
        var s = Scene(road);
        var line = CulvertLineSurvey.Measure(s.Crossing, s.Direction, s.Accumulation, s.Elevation);
        Assert.Contains(line.Findings, f => f.Code == "terrain-coarse-at-road" && f.Value == 2 && f.Limit == 1.5);
        var survey = new CrossingOverrides(s.Crossing.Id) { InletElevationM = 102, OutletElevationM = 101.5, LengthM = 25 };
        Assert.Empty(CulvertLineSurvey.Measure(s.Crossing, s.Direction, s.Accumulation, s.Elevation, overrides: survey).Findings);
    }
}
