using GeoCulvert.Design.Basis;

namespace GeoCulvert.Layers.Tests;

/// <summary>Deflated GeoTIFFs of all layouts that GDAL writes (Data/make_deflated.py), whose cells follow from a formula.</summary>
public class DeflatedTileTests
{
    [Theory]
    [InlineData("tiled_1", true)]
    [InlineData("tiled_2", true)]
    [InlineData("tiled_3", true)]
    [InlineData("strips_1", true)]
    [InlineData("strips_2", true)]
    [InlineData("strips_3", true)]
    [InlineData("big_3", true)]
    [InlineData("sparse_3", true)]
    [InlineData("motorola_1", false)] // left to GDAL
    [InlineData("half_1", false)]
    public void EveryCellIsAsItWasWritten(string name, bool itself)
    {
        using var source = RasterSource.Open(Files.Data(Path.Combine("deflated", name + ".tif")));
        Assert.Equal(itself, source.ReadsBlocksItself);
        var grid = ElevationReader.Read(source, new ElevationOptions(VerticalUnitM: 1)).Elevation;
        Assert.Equal((75, 53), (grid.Frame.Columns, grid.Frame.Rows));
        for (var row = 0; row < 53; row++)
        {
            for (var column = 0; column < 75; column++)
            {
                var isMissing = (column + row) % 11 == 0 || (name.StartsWith("sparse", StringComparison.Ordinal) && row is >= 16 and < 32 && column is >= 32 and < 64);
                var z = (float)(100 + (column * 0.37) + (row * 1.83));
                if (isMissing) Assert.True(float.IsNaN(grid[row, column]) || name == "half_1", $"{row} {column}"); // half floats have no -9999
                else Assert.Equal(z, grid[row, column], name == "half_1" ? 0.13f : 0f);
            }
        }
    }

    [Fact]
    public void WindowsThatCutBlocksAreTheSame()
    {
        using var source = RasterSource.Open(Files.Data(Path.Combine("deflated", "tiled_3.tif")));
        float[] whole = new float[75 * 53], part = new float[75 * 20];
        source.ReadWindow(0, 0, 75, 53, whole);
        source.ReadWindow(0, 9, 75, 20, part);
        Assert.Equal(whole[(9 * 75)..(29 * 75)], part);
    }

    [Fact]
    public void ADamagedBlockIsSaidInGdalsWords()
    {
        var path = Path.Combine(Files.NewFolder(), "damaged.tif");
        var bytes = File.ReadAllBytes(Files.Data(Path.Combine("deflated", "tiled_1.tif")));
        for (var i = bytes.Length - 40; i < bytes.Length - 10; i++) bytes[i] ^= 0x5a; // inside the last block
        File.WriteAllBytes(path, bytes);
        using var source = RasterSource.Open(path);
        var message = Assert.Throws<InputException>(() => ElevationReader.Read(source, new ElevationOptions(VerticalUnitM: 1))).Message;
        Assert.Contains("damaged.tif, row", message, StringComparison.Ordinal);
        Assert.Contains("GDAL cannot read", message, StringComparison.Ordinal);
    }
}
