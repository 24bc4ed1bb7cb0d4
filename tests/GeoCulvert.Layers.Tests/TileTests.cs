using GeoCulvert.Design.Basis;
using GeoCulvert.Design.Terrain;

namespace GeoCulvert.Layers.Tests;

/// <summary>Tiles by hand: two of 2 x 2 cells, with or without a gap of one column between them.</summary>
public class TileTests
{
    private const string Minus9999 = "NODATA_value -9999\n";
    private readonly string _folder = Files.NewFolder();

    [Theory]
    [InlineData("Float32")]
    [InlineData("Float64")]
    [InlineData("Int16")]
    public void AGapIsNodataAlsoWhenTheFirstTileHasNone(string type)
    {
        Files.Raster(_folder, "a", "1 2\n3 4", "EPSG:26912");
        Files.Raster(_folder, "b", "7 -9999\n9 10", "EPSG:26912", x: 430030, more: Minus9999);
        Retype("a", type);
        Retype("b", type);
        Assert.Equal([1, 2, float.NaN, 7, float.NaN, 3, 4, float.NaN, 9, 10], Elevations());
    }

    [Theory]
    [InlineData("Int16")]
    [InlineData("Float64")]
    [InlineData("UInt32")]
    public void TilesOfTwoTypesAreBothRead(string other)
    {
        Files.Raster(_folder, "a", "1.5 2\n3 4", "EPSG:26912");
        Files.Raster(_folder, "b", "7 8\n9 10", "EPSG:26912", x: 430020);
        Retype("b", other);
        Assert.Equal([1.5f, 2, 7, 8, 3, 4, 9, 10], Elevations());
    }

    [Fact]
    public void AGapBetweenClassesHasNoClass()
    {
        Files.Raster(_folder, "a", "0 2\n3 4", "EPSG:26912");
        Files.Raster(_folder, "b", "7 8\n9 10", "EPSG:26912", x: 430030);
        Retype("a", "Byte");
        Retype("b", "Byte");
        using var source = RasterSource.OpenMany([_folder]);
        var grid = OverlayReader.Classes(source, new GridFrame(5, 2, 430000, 4514020, 10, 10), Files.Utm12());
        Assert.Equal([0, 2, int.MinValue, 7, 8, 3, 4, int.MinValue, 9, 10], grid.Cells);
    }

    [Theory]
    [InlineData("<SRS>EPSG:26912", "<SRS>EPSG:26913", "coordinate system")]
    [InlineData("4514020, 0, -10", "4514000, 0, 10", "north")]
    [InlineData("<SimpleSource>", "<UnitType>ft</UnitType><SimpleSource>", "unit of the first tile")]
    [InlineData("<SimpleSource>", "<Scale>0.1</Scale><SimpleSource>", "scale")]
    public void ATileThatDoesNotFitIsNamedNotLeftOut(string here, string instead, string says)
    {
        Files.Raster(_folder, "a", "1 2\n3 4", "EPSG:26912");
        var path = Files.Raster(_folder, "b", "7 8\n9 10", "EPSG:26912", x: 430020);
        var text = File.ReadAllText(path);
        Assert.Contains(here, text, StringComparison.Ordinal);
        File.WriteAllText(path, text.Replace(here, instead, StringComparison.Ordinal));
        var message = Assert.Throws<InputException>(() => RasterSource.OpenMany([_folder])).Message;
        Assert.Contains("b.vrt", message, StringComparison.Ordinal);
        Assert.Contains(says, message, StringComparison.Ordinal);
    }

    private float[] Elevations()
    {
        using var source = RasterSource.OpenMany([_folder]);
        return ElevationReader.Read(source, new ElevationOptions(VerticalUnitM: 1)).Elevation.Cells;
    }

    private void Retype(string name, string type)
    {
        var path = Path.Combine(_folder, name + ".vrt");
        File.WriteAllText(path, File.ReadAllText(path).Replace("Float32", type, StringComparison.Ordinal));
    }
}
