using GeoCulvert.Design.Terrain;
using GeoCulvert.Design.Watersheds;

namespace GeoCulvert.Design.Tests.Watersheds;

public class FlowPathTests
{
    [Fact]
    public void TheSlopeBetweenTenAndEightyFivePerCent()
    {
        // Eleven cells of 10 m in a row: 100 m. Elevations z = (share above the outlet)^2 * 100: at 85 % between 80 (64) and 90 (81): 72.5; at 10 %: 1.
        // Slope (72.5 - 1) / 75; end to end 1.
        var frame = new GridFrame(11, 1, 0, 10, 10, 10);
        var grid = new Grid<float>(frame, [.. Enumerable.Range(0, 11).Select(i => (float)((10 - i) * (10 - i)))]);
        var path = FlowPath.Of([.. Enumerable.Range(0, 11)], grid);
        Assert.Equal(100, path.LengthM, 9);
        Assert.Equal(71.5 / 75, path.Slope1085MPerM!.Value, 9);
        Assert.Equal(1, path.EndToEndSlopeMPerM!.Value, 9);
        // Equal area: trapezoids over 10 m of squares 0, 1, 4 ... 100 give 10 (285 + 50) = 3350 m2; twice that by 100^2 m2.
        Assert.Equal(0.67, path.EqualAreaSlopeMPerM!.Value, 9);
        Assert.Equal((5.0, 105.0, 100.0), (path.Line.StartPoint.X, path.Line.EndPoint.X, path.Line.StartPoint.Z));
    }

    [Fact]
    public void DiagonalStepsAreTrueLengths()
    {
        var grid = new Grid<float>(new GridFrame(2, 2, 0, 8, 3, 4), [10, 0, 0, 5]);
        Assert.Equal(5, FlowPath.Of([0, 3], grid).LengthM, 9);
        Assert.Equal(1, FlowPath.Of([0, 3], grid).EndToEndSlopeMPerM!.Value, 9);
    }

    [Fact]
    public void TheLineOfEqualAreaOnAStraightPathIsThePath()
    {
        var grid = new Grid<float>(new GridFrame(4, 1, 0, 5, 5, 5), [103, 102, 101, 100]);
        Assert.Equal(0.2, FlowPath.Of([0, 1, 2, 3], grid).EqualAreaSlopeMPerM!.Value, 9);
        // A dip below the outlet counts against: elevations 3, -1, 0 over 10 m steps: areas 10 and -5, 2 x 5 / 400.
        var dip = new Grid<float>(new GridFrame(3, 1, 0, 10, 10, 10), [3, -1, 0]);
        Assert.Equal(0.025, FlowPath.Of([0, 1, 2], dip).EqualAreaSlopeMPerM!.Value, 9);
    }

    [Fact]
    public void OneCellHasNoSlope()
    {
        var path = FlowPath.Of([0], new Grid<float>(new GridFrame(1, 1, 0, 1, 1, 1), [7]));
        Assert.Null(path.Slope1085MPerM);
        Assert.Null(path.EqualAreaSlopeMPerM);
        Assert.True(path.Line.IsValid || path.LengthM == 0);
    }
}
