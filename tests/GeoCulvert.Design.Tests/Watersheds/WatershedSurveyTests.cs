using GeoCulvert.Design.Crossings;
using GeoCulvert.Design.Terrain;
using GeoCulvert.Design.Watersheds;
using NetTopologySuite.Geometries;

namespace GeoCulvert.Design.Tests.Watersheds;

/// <summary>Two nested watersheds on a plane, by hand.</summary>
public class WatershedSurveyTests
{
    private static readonly GridFrame Frame = new(6, 6, 0, 60, 10, 10);

    private static IReadOnlyList<Watershed> Survey()
    {
        // A 4 x 4 block inside a rim: outlet 0 has its two northern rows, outlet 1 the two southern ones. Plane falling south at 10 %.
        var labels = new Grid<int>(Frame);
        var elevation = new Grid<float>(Frame);
        for (var row = 0; row < 6; row++)
            for (var column = 0; column < 6; column++)
            {
                elevation[row, column] = 10 - row;
                if (row is >= 1 and <= 4 && column is >= 1 and <= 4) labels[row, column] = row <= 2 ? 1 : 2;
            }

        return WatershedSurvey.Survey(labels, [1, -1], elevation, k => k == 1 ? [8, 14, 20, 26] : [8, 14]);
    }

    [Fact]
    public void FiguresOfLocalAndTotal()
    {
        var below = Survey()[1];
        Assert.Equal((800.0, 1600.0), (below.Local.AreaM2, below.Total.AreaM2));
        Assert.Equal((120.0, 160.0), (below.Local.Outline.PerimeterM, below.Total.Outline.PerimeterM));
        Assert.Equal((9.0, 6.0, 3.0, 7.5), (below.Total.LargestElevationM, below.Total.LeastElevationM, below.Total.ReliefM, below.Total.MeanElevationM));
        Assert.Equal(6.5, below.Local.MeanElevationM);
        Assert.Equal(0.1, below.Total.MeanBasinSlopeMPerM!.Value, 9);
        Assert.Equal((30.0, 30.0), (below.Total.Centroid!.X, below.Total.Centroid.Y));
        Assert.Equal(20, below.Local.Centroid!.Y, 9);
        Assert.Equal(900.0 / 1600, below.Total.ShapeFactor!.Value, 9);
        Assert.Equal(0, below.Total.EdgeContactShare);
        Assert.Equal(["watershed-tiny"], below.Findings.Select(f => f.Code));
        Assert.Equal(0.1, below.Total.LongestFlowPath!.Slope1085MPerM!.Value, 6);
    }

    [Fact]
    public void TheTotalOutlineHasNoInnerLineButKeepsItsEnds()
    {
        // Four corners, the closing point, and the two ends of the line between the parts (y = 30), which all three outlines share.
        var polygon = Survey()[1].Total.Outline.Polygon;
        Assert.Equal(7, polygon.NumPoints);
        Assert.Equal(2, polygon.Coordinates.Distinct().Count(c => c.Y == 30));
    }

    [Fact]
    public void ContactWithTheEdgeIsSaid()
    {
        var labels = new Grid<int>(Frame, [.. Enumerable.Repeat(1, 36)]);
        var all = WatershedSurvey.Survey(labels, [-1], new Grid<float>(Frame))[0];
        Assert.Equal(1, all.Total.EdgeContactShare);
        Assert.Contains(all.Findings, f => f.Code == "watershed-edge-contact" && f.Value == 1);
    }

    [Fact]
    public void NodataAtACornerIsSaidOnlyWhereNoSideTouches()
    {
        // A block of 2 x 2 in rows and columns 2-3; nodata in the cell north-west of it, then beside it too.
        var labels = new Grid<int>(Frame);
        foreach (var cell in new[] { 14, 15, 20, 21 }) labels.Cells[cell] = 1;
        var elevation = new Grid<float>(Frame);
        elevation[1, 1] = float.NaN;
        var corner = WatershedSurvey.Survey(labels, [-1], elevation)[0];
        Assert.Equal((1L, 0.0), (corner.Total.CornerContactCount, corner.Total.EdgeContactShare));
        Assert.Contains(corner.Findings, f => f.Code == "watershed-corner-contact" && f.Value == 1);
        Assert.DoesNotContain(corner.Findings, f => f.Code == "watershed-edge-contact");
        elevation[1, 2] = float.NaN;
        var side = WatershedSurvey.Survey(labels, [-1], elevation)[0];
        Assert.Equal(1.0 / 8, side.Total.EdgeContactShare);
        Assert.DoesNotContain(side.Findings, f => f.Code == "watershed-corner-contact");
        elevation[1, 1] = elevation[1, 2] = 0;
        Assert.Equal(["watershed-tiny"], WatershedSurvey.Survey(labels, [-1], elevation)[0].Findings.Select(f => f.Code));
    }

    [Fact]
    public void CrossingsOnOneCellHaveOneWatershed()
    {
        // A plane falling south at 10 %: the cell in row 3, column 2 drains rows 0-3 of its column; two crossings lie on it and one upstream.
        var elevation = new Grid<float>(Frame);
        for (var row = 0; row < 6; row++)
            for (var column = 0; column < 6; column++) elevation[row, column] = 100 - row;
        var terrain = Drainage.Solve(elevation, cancel: TestContext.Current.CancellationToken);
        Crossing At(string id, int cell) => new(id, CrossingOrigin.Found, new Coordinate(25, 25), cell, 0);
        var survey = WatershedSurvey.Survey(terrain, [At("A", 20), At("B", 20), At("C", 8)]).Watersheds;
        Assert.Equal([400.0, 400.0, 200.0], survey.Select(w => w.Total.AreaM2));
        Assert.Equal([200.0, 200.0, 200.0], survey.Select(w => w.Local.AreaM2));
        Assert.Equal(30, survey[0].Total.LongestFlowPath!.LengthM, 6);
        // Local paths stop at the crossing above: two cells of C's column for A, and for C from the rim down.
        Assert.Equal([10.0, 10.0, 10.0], survey.Select(w => w.Local.LongestFlowPath!.LengthM));
        Assert.All(survey[1].Findings, f => Assert.Equal("B", f.CrossingId));
        Assert.Contains(survey[2].Findings, f => f.Code == "watershed-edge-contact");
    }

    [Fact]
    public void TheShareOfFilledCells()
    {
        // A gully of ten cells between walls, falling south, with two cells dug out: they are raised to the cell below.
        float[] gully = [20, 19, 18, 5, 6, 15, 14, 13, 12, 11];
        var elevation = new Grid<float>(new GridFrame(3, 10, 0, 100, 10, 10), [.. gully.SelectMany(z => new[] { 50, z, 50 })]);
        var terrain = Drainage.Solve(elevation, cancel: TestContext.Current.CancellationToken);
        var crossing = new Crossing("A", CrossingOrigin.Found, new Coordinate(15, 15), 25, 0);
        var total = WatershedSurvey.Survey(terrain, [crossing]).Watersheds[0].Total;
        Assert.True(total.Cells >= 7);
        Assert.Equal(2, total.FilledShare!.Value * total.Cells, 9);
    }
}
