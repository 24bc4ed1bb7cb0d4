using GeoCulvert.Design.Basis;
using GeoCulvert.Design.Terrain;

namespace GeoCulvert.Layers.Tests;

/// <summary>
/// Heights and classes under coordinate systems with a vertical part. 100 US survey feet are 100 * 1200/3937 = 30.48006 m (definition of
/// the unit); whatever way the map is moved, the conversion happens once.
/// </summary>
public class VerticalTests
{
    private const string Hundred = "100 100 100\n100 100 100\n100 100 100";
    private const float HundredFeetM = 100 * 1200f / 3937;

    [Theory]
    [InlineData("EPSG:26912+6360", null, null)] // as it lies
    [InlineData("EPSG:26912+6360", "EPSG:32612", null)] // another horizontal system
    [InlineData("EPSG:26912+6360", null, 5.0)] // other cells
    [InlineData("EPSG:26912+6360", "EPSG:26912+5703", null)] // a working system with metres for heights
    public void FeetBecomeMetresOnceHoweverTheMapIsMoved(string crs, string? working, double? cellM)
    {
        using var source = RasterSource.Open(Files.Raster(Files.NewFolder(), "a", Hundred, crs));
        using var to = working is null ? null : Crs.Parse(working);
        var model = ElevationReader.Read(source, new ElevationOptions(WorkingCrs: to, CellSizeM: cellM));
        Assert.Equal(HundredFeetM, Middle(model.Elevation), 1e-4f);
        Assert.Null(model.Plane.Crs.VerticalUnitM);
    }

    [Fact]
    public void FeetUnderDegreesBecomeMetresOnce()
    {
        using var source = RasterSource.Open(Files.Raster(Files.NewFolder(), "a", Hundred, "EPSG:4269+6360", 0.001, -111, 40));
        Assert.Equal(HundredFeetM, Middle(ElevationReader.Read(source, new ElevationOptions()).Elevation), 1e-4f);
    }

    [Theory]
    [InlineData("EPSG:26912", "EPSG:26912+6360")]
    [InlineData("EPSG:26912+6360", "EPSG:26912+5703")]
    [InlineData("EPSG:26912+5703", "EPSG:26912")]
    public void ClassesAreNeverConverted(string crs, string plane)
    {
        using var source = RasterSource.Open(Files.Raster(Files.NewFolder(), "c", "41 41\n41 41", crs, 20));
        var grid = OverlayReader.Classes(source, new GridFrame(4, 4, 430000, 4514040, 10, 10), new WorkingPlane(Crs.Parse(plane)));
        Assert.All(grid.Cells, c => Assert.Equal(41, c));
    }

    [Fact]
    public void AFileThatContradictsItselfIsAskedAbout()
    {
        var path = Files.Raster(Files.NewFolder(), "a", Hundred, "EPSG:26912+6360");
        File.WriteAllText(path, File.ReadAllText(path).Replace("<SimpleSource>", "<UnitType>m</UnitType><SimpleSource>", StringComparison.Ordinal));
        using var source = RasterSource.Open(path);
        Assert.Contains("which is right", Assert.Throws<InputException>(() => ElevationReader.Read(source, new ElevationOptions())).Message, StringComparison.Ordinal);
        Assert.Equal(100f, Middle(ElevationReader.Read(source, new ElevationOptions(VerticalUnitM: 1)).Elevation));
    }

    [Fact]
    public void TheHorizontalPartKeepsItsCode()
    {
        using Crs compound = Crs.Parse("EPSG:26912+6360"), flat = compound.Horizontal(), space = Crs.Parse("EPSG:4979"), map = space.Horizontal();
        Assert.Equal("EPSG:26912", flat.Code);
        Assert.Null(flat.VerticalUnitM);
        Assert.True(map.IsGeographic);
    }

    [Fact]
    public void ElevationsThatNoLandHasAreSaid()
    {
        using var source = RasterSource.Open(Files.Raster(Files.NewFolder(), "a", "7 -8000 7\n7 7 -8000", "EPSG:26912"));
        var finding = Assert.Single(ElevationReader.Read(source, new ElevationOptions(VerticalUnitM: 1)).Findings);
        Assert.Equal("elevations-doubtful", finding.Code);
        Assert.Contains("2 of 6 cells, for example -8000", finding.ToString(), StringComparison.Ordinal);
        Assert.Empty(ElevationReader.Read(source, new ElevationOptions(NoData: -8000, VerticalUnitM: 1)).Findings);
    }

    [Fact]
    public void ScaleAndOffsetCountWhetherOrNotTheMapIsMoved()
    {
        var path = Files.Raster(Files.NewFolder(), "a", Hundred, "EPSG:26912");
        File.WriteAllText(path, File.ReadAllText(path).Replace("<SimpleSource>", "<Offset>7</Offset><Scale>0.5</Scale><SimpleSource>", StringComparison.Ordinal));
        using var source = RasterSource.Open(path);
        Assert.Equal(57f, Middle(ElevationReader.Read(source, new ElevationOptions(VerticalUnitM: 1)).Elevation));
        Assert.Equal(57f, Middle(ElevationReader.Read(source, new ElevationOptions(VerticalUnitM: 1, CellSizeM: 5)).Elevation));
    }

    private static float Middle(Grid<float> grid) => grid[grid.Frame.Rows / 2, grid.Frame.Columns / 2];
}
