using GeoCulvert.Design.Terrain;
using GeoCulvert.Report.Relief;

namespace GeoCulvert.Report.Tests.Relief;

/// <summary>Shading of planes against the closed form: the cosine of the angle between the normal and the light.</summary>
public sealed class HillshadeInvariantTests
{
    /// <summary>Slopes p towards east, q towards north; cosine = (-p E - q N + U) / sqrt(1 + p2 + q2), light azimuth 315, altitude 45: E = -1/2, N = 1/2, U = sqrt(1/2).</summary>
    [Theory]
    [InlineData(0, 0, 1)]
    [InlineData(0.3, 0, 1)]
    [InlineData(0, -0.4, 1)]
    [InlineData(0.25, 0.15, 3)]
    [InlineData(-0.7, 0.7, 1)]
    [InlineData(2, -2, 1)]
    public void PlanesHaveTheirClosedFormShade(double p, double q, double exaggeration)
    {
        var grid = Plane(p, q);
        var shade = Hillshade.Shade(grid, exaggeration);
        var (pe, qe) = (p * exaggeration, q * exaggeration);
        var expected = Math.Max(0, ((pe / 2) - (qe / 2) + Math.Sqrt(0.5)) / Math.Sqrt(1 + (pe * pe) + (qe * qe)));
        for (var r = 0; r < 9; r++)
        {
            for (var c = 0; c < 12; c++)
            {
                // At the four corners one diagonal neighbour has no opposite; everywhere else a plane is exact.
                if (r is 0 or 8 && c is 0 or 11) continue;
                Assert.Equal(expected, shade[(r * 12) + c], 1e-5);
            }
        }
    }

    [Fact]
    public void ASlopeFacingTheLightAtRightAnglesIsBrightest()
    {
        // Falls towards the north-west at 45 degrees: p = 1/sqrt2 (rises east), q = -1/sqrt2 (falls north); the normal points at the light.
        var shade = Hillshade.Shade(Plane(Math.Sqrt(0.5), -Math.Sqrt(0.5)));
        Assert.Equal(1, shade[(4 * 12) + 6], 1e-5);
    }

    [Fact]
    public void NodataStaysNodataAndDoesNotSpread()
    {
        var grid = Plane(0.3, 0.1);
        grid[4, 6] = float.NaN;
        var shade = Hillshade.Shade(grid);
        Assert.Equal(1, shade.Count(float.IsNaN));
        Assert.Equal(shade[(2 * 12) + 2], shade[(4 * 12) + 5], 1e-5);
    }

    [Fact]
    public void CoarseCellsAreMeansOfTheLandInThem()
    {
        var grid = new Grid<float>(new GridFrame(5, 3, 100, 200, 2, 2), [1, 3, 5, 7, 9, 1, 3, 5, 7, float.NaN, 8, 10, float.NaN, float.NaN, float.NaN]);
        var coarse = Hillshade.Coarsen(grid, 3);
        Assert.Equal(new GridFrame(3, 2, 100, 200, 4, 4), coarse.Frame);
        Assert.Equal([2, 6, 9, 9, float.NaN, float.NaN], coarse.Cells);
    }

    [Fact]
    public void ExaggerationBringsThePlainToOneInTwo()
    {
        Assert.Equal(5, Hillshade.ReadableExaggeration(Plane(0.1, 0)));
        Assert.Equal(10, Hillshade.ReadableExaggeration(Plane(0.001, 0)));
        Assert.Equal(1, Hillshade.ReadableExaggeration(Plane(3, 0)));
        Assert.Equal(1, Hillshade.ReadableExaggeration(Plane(0, 0)));
    }

    [Fact]
    public void ReliefPictureHasAPixelPerCoarseCellAndTransparentNodata()
    {
        var grid = Plane(0.2, 0.1);
        grid[0, 0] = float.NaN;
        using var stream = new MemoryStream();
        var (frame, factor) = HillshadePng.Write(grid, stream, longestSide: 12, verticalExaggeration: 1);
        var png = PngReader.Read(stream.ToArray());
        Assert.Equal((12, 9, 1.0), (png.Width, png.Height, factor));
        Assert.Equal(grid.Frame, frame);
        Assert.Equal<byte>([0], png.Alpha);
        Assert.Equal(0, png.Indices[0]);
        Assert.DoesNotContain((byte)0, png.Indices.Skip(1));
    }

    private static Grid<float> Plane(double p, double q)
    {
        var grid = new Grid<float>(new GridFrame(12, 9, 0, 90, 10, 10));
        for (var r = 0; r < 9; r++)
        {
            for (var c = 0; c < 12; c++) grid[r, c] = (float)((p * grid.Frame.CentreX(c)) + (q * grid.Frame.CentreY(r)));
        }
        return grid;
    }
}
