using GeoCulvert.Design.Basis;

namespace GeoCulvert.Layers.Tests;

/// <summary>Tiles that do not agree, by hand: 2 x 2 or 4 x 4 cells of 10 m beside or over each other.</summary>
public class TileDoubtTests
{
    private const string Minus9999 = "NODATA_value -9999\n";
    private readonly string _folder = Files.NewFolder();

    [Fact]
    public void TilesThatAgreeAreNotDoubted()
    {
        Files.Raster(_folder, "a", "1 2\n3 4", "EPSG:26912");
        Files.Raster(_folder, "b", "2 8\n4 10", "EPSG:26912", x: 430010);
        Assert.Empty(Read().Findings);
    }

    [Fact]
    public void ACoarserTileIsJoinedAndSaid()
    {
        Files.Raster(_folder, "a", "1 2\n3 4", "EPSG:26912");
        Files.Raster(_folder, "b", "9", "EPSG:26912", 20, x: 430020);
        var model = Read();
        Assert.Equal([1, 2, 9, 9, 3, 4, 9, 9], model.Elevation.Cells);
        var finding = Assert.Single(model.Findings);
        Assert.Equal("tiles-differ", finding.Code);
        Assert.Contains("1 of 2 tiles", finding.Text, StringComparison.Ordinal);
        Assert.Contains("cells of 20 x 20 where the finest are 10 x 10", finding.Text, StringComparison.Ordinal);
    }

    [Fact]
    public void ATileOffTheGridIsSaid()
    {
        Files.Raster(_folder, "a", "1 2\n3 4", "EPSG:26912");
        Files.Raster(_folder, "b", "7 8\n9 10", "EPSG:26912", x: 430023);
        var finding = Assert.Single(Read().Findings);
        Assert.Equal("tiles-differ", finding.Code);
        Assert.Equal(0.3, finding.Value!.Value, 1e-9);
    }

    [Fact]
    public void TilesThatDisagreeAreSaidAndTheLaterLiesOnTop()
    {
        Files.Raster(_folder, "a", "1 2\n3 4", "EPSG:26912");
        Files.Raster(_folder, "b", "2 8\n7.5 10", "EPSG:26912", x: 430010);
        var model = Read();
        Assert.Equal([1, 2, 8, 3, 7.5f, 10], model.Elevation.Cells);
        var finding = Assert.Single(model.Findings);
        Assert.Equal("tiles-disagree", finding.Code);
        Assert.Contains("1 of 2 shared cells, by up to 3.5", finding.Text, StringComparison.Ordinal);
    }

    [Fact]
    public void NodataOfATileCoversNoCellOfAnother()
    {
        Files.Raster(_folder, "a", "1 2\n3 4", "EPSG:26912");
        Files.Raster(_folder, "b", "-9999 8\n-9999 10", "EPSG:26912", x: 430010, more: Minus9999);
        var model = Read();
        Assert.Equal([1, 2, 8, 3, 4, 10], model.Elevation.Cells);
        Assert.Empty(model.Findings);
    }

    [Fact]
    public void StatedNodataOfATileCoversNoCellOfAnother()
    {
        Files.Raster(_folder, "a", "1 2\n3 4", "EPSG:26912");
        Files.Raster(_folder, "b", "0 8\n0 10", "EPSG:26912", x: 430010);
        var model = Read(0);
        Assert.Equal([1, 2, 8, 3, 4, 10], model.Elevation.Cells);
        Assert.Empty(model.Findings);
    }

    [Fact]
    public void EveryTileIsAmongTheFiles()
    {
        Files.Raster(_folder, "a", "1 2\n3 4", "EPSG:26912");
        Files.Raster(_folder, "b", "7 8\n9 10", "EPSG:26912", x: 430020);
        using var source = RasterSource.OpenMany([_folder]);
        var names = source.Files.Select(f => Path.GetRelativePath(_folder, f)).Order(StringComparer.Ordinal);
        Assert.Equal(["a.vrt", "b.vrt", "cells/a.asc", "cells/b.asc"], names);
        var fact = InputFacts.Of("a.vrt", source.Files.Single(f => f.EndsWith("a.vrt", StringComparison.Ordinal)), "terrain", "");
        Assert.Equal(Convert.ToHexStringLower(System.Security.Cryptography.SHA256.HashData(File.ReadAllBytes(Path.Combine(_folder, "a.vrt")))), fact.Sha256);
    }

    private ElevationModel Read(double? noData = null)
    {
        using var source = RasterSource.OpenMany([_folder], noData);
        return ElevationReader.Read(source, new ElevationOptions(NoData: noData, VerticalUnitM: 1));
    }
}
