using GeoCulvert.Design.Terrain;
using GeoCulvert.Design.Watersheds;

namespace GeoCulvert.Design.Tests.Watersheds;

/// <summary>True areas and lengths in a plane that is not true to size, by hand.</summary>
public class TrueSizeTests
{
    private static readonly GridFrame Frame = new(6, 6, 0, 60, 10, 10);

    /// <summary>Everything twice as long along x and half again as long along y as the plane says: areas three times.</summary>
    private static readonly PlaneScale Stretched = new(0, 0, 60, 60, 2, [.. Enumerable.Repeat(new PlaneMetric(4, 0, 2.25), 4)]);

    private static IReadOnlyList<Watershed> Survey(PlaneScale scale)
    {
        var labels = new Grid<int>(Frame);
        var elevation = new Grid<float>(Frame);
        for (var row = 0; row < 6; row++)
            for (var column = 0; column < 6; column++)
            {
                elevation[row, column] = 10 - row;
                if (row is >= 1 and <= 4 && column is >= 1 and <= 4) labels[row, column] = row <= 2 ? 1 : 2;
            }

        return WatershedSurvey.Survey(labels, [1, -1], elevation, k => k == 1 ? [8, 14, 20, 26] : [8, 14], scale: scale);
    }

    [Fact]
    public void AreasPerimetersAndPathsAreTrue()
    {
        var below = Survey(Stretched)[1];
        Assert.Equal(16 * 100 * 3, below.Total.AreaM2, 1e-9); // sqrt(4 * 2.25) = 3
        Assert.Equal(8 * 100 * 3, below.Local.AreaM2, 1e-9);
        Assert.Equal((2 * 40 * 2) + (2 * 40 * 1.5), below.Total.Outline.PerimeterM, 1e-9);
        Assert.Equal(30 * 1.5, below.Total.LongestFlowPath!.LengthM, 1e-9); // three steps south
        Assert.Equal(0.1 / 1.5, below.Total.LongestFlowPath.Slope1085MPerM!.Value, 1e-9);
        Assert.Equal(1600, below.Total.Outline.Polygon.Area, 1e-9); // the map stays in the plane
    }

    [Fact]
    public void ASkewedPlaneIsMeasuredByItsFullMetric()
    {
        // Axes at 60 degrees: F = cos 60. A step (1, 1) is sqrt(1 + 1 + 2 * 0.5) long, (1, -1) is 1 long, the area is sin 60.
        var skewed = new PlaneScale(0, 0, 1, 1, 2, [.. Enumerable.Repeat(new PlaneMetric(1, 0.5, 1), 4)]);
        Assert.Equal(Math.Sqrt(3), skewed.LengthM(0.5, 0.5, 1, 1), 1e-12);
        Assert.Equal(1, skewed.LengthM(0.5, 0.5, 1, -1), 1e-12);
        Assert.Equal(Math.Sqrt(3) / 2, skewed.AreaRatioAt(0.5, 0.5), 1e-12);
        Assert.Equal((Math.Sqrt(1.5), Math.Sqrt(0.5)), skewed.At(0, 0).LengthRatios);
    }

    [Fact]
    public void BetweenNodesTheScaleIsBilinearAndBeyondThemThatOfTheEdge()
    {
        var scale = new PlaneScale(0, 0, 10, 20, 2, [new(1, 0, 1), new(4, 0, 1), new(9, 0, 1), new(16, 0, 1)]); // areas 1, 2 in the south, 3, 4 in the north
        Assert.Equal(2.5, scale.AreaRatioAt(5, 10), 1e-12);
        Assert.Equal(1.25, scale.AreaRatioAt(2.5, 0), 1e-12);
        Assert.Equal(4, scale.AreaRatioAt(99, 99), 1e-12);
        Assert.Equal(0.75, scale.LargestAreaErrorShare, 1e-12); // 1 / 4 - 1
    }

    [Fact]
    public void LocalAreasAddUpToTheTotalWhereTheScaleVaries()
    {
        var varying = new PlaneScale(0, 0, 60, 60, 2, [new(1, 0, 1), new(1.02, 0, 1), new(1, 0, 1.03), new(1.01, 0.001, 1.02)]);
        var both = Survey(varying);
        Assert.Equal(both[0].Total.AreaM2 + both[1].Local.AreaM2, both[1].Total.AreaM2, 1e-9);
        Assert.NotEqual(1600, both[1].Total.AreaM2);
    }
}
