using GeoCulvert.Design.Terrain;
using GeoCulvert.Design.Watersheds;

namespace GeoCulvert.Design.Tests.Watersheds;

public class GroundSlopeTests
{
    // A 6 x 6 window (column 130, row 130) of the Red Butte terrain model, USGS National Elevation Dataset, public domain; cells 26.477018215008 m, millimetres kept.
    private static readonly float[] Window =
    [
        1891.113f, 1875.758f, 1861.960f, 1849.360f, 1837.620f, 1825.734f,
        1886.519f, 1873.272f, 1860.464f, 1847.240f, 1832.557f, 1821.481f,
        1879.946f, 1861.782f, 1847.432f, 1836.513f, 1824.315f, 1817.935f,
        1872.185f, 1856.172f, 1840.483f, 1826.792f, 1818.131f, 1816.589f,
        1861.188f, 1847.437f, 1831.415f, 1819.056f, 1814.821f, 1817.330f,
        1845.765f, 1836.605f, 1821.953f, 1813.591f, 1813.856f, 1820.344f,
    ];

    // Half a millimetre in each of eight neighbours moves the slope by 2e-5 at most.
    // gdaldem slope -p of GDAL 3.6.2 on that window, per cent, inner cells.
    private static readonly double[] Percent =
    [
        59.386913299560546875, 55.62583160400390625, 54.9149017333984375, 49.553112030029296875,
        66.3819427490234375, 61.97592926025390625, 57.785614013671875, 42.9669952392578125,
        66.4752197265625, 61.029956817626953125, 49.01076507568359375, 25.987163543701171875,
        67.279632568359375, 61.1756439208984375, 37.9774169921875, 9.0995807647705078125,
    ];

    [Fact]
    public void InnerCellsAgreeWithAGeneralPurposeLibrary()
    {
        var grid = new Grid<float>(new GridFrame(6, 6, 0, 6 * 26.477018215008, 26.477018215008, 26.477018215008), Window);
        for (var i = 0; i < 16; i++)
            Assert.Equal(Percent[i] / 100, GroundSlope.At(grid, ((1 + (i / 4)) * 6) + 1 + (i % 4)), 2e-5);
    }

    [Fact]
    public void APlaneKeepsItsSlopeUpToEdgesAndHoles()
    {
        // z = 3 x / 10 + 4 y / 10: slope 0.5 everywhere. Cells 4 by 3 m; one cell without terrain.
        var frame = new GridFrame(5, 5, 0, 15, 4, 3);
        var grid = new Grid<float>(frame);
        for (var row = 0; row < 5; row++)
            for (var column = 0; column < 5; column++) grid[row, column] = (float)((0.3 * frame.CentreX(column)) + (0.4 * frame.CentreY(row)));
        grid[2, 2] = float.NaN;
        for (var i = 0; i < 25; i++)
            if (i == 12) Assert.True(double.IsNaN(GroundSlope.At(grid, i)));
            else Assert.Equal(0.5, GroundSlope.At(grid, i), 5);
    }
}
