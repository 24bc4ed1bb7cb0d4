using GeoCulvert.Design.Basis;
using GeoCulvert.Design.Terrain;

namespace GeoCulvert.Layers.Tests;

/// <summary>Rasters, held to what python3-gdal 3.6.2 reads from the same files (values noted once beside each check).</summary>
public class RasterTests
{
    [Fact]
    public void ReadsARealTerrainAsGdalDoes()
    {
        using var source = RasterSource.Open(Files.Data("red_butte_dem.tif"));
        Assert.Equal((260, 268), (source.Columns, source.Rows));
        Assert.Equal("EPSG:26912", source.Crs!.Code);
        var model = ElevationReader.Read(source, new ElevationOptions(VerticalUnitM: 1));
        // gdal.Open(...).ReadAsArray()[row, column]
        Assert.Equal(2059.79150390625, model.Elevation[100, 100]);
        Assert.Equal(2147.01025390625, model.Elevation[50, 200]);
        Assert.Equal(1939.253173828125, model.Elevation[200, 60]);
        Assert.Equal(37948, model.Elevation.Cells.Count(float.IsNaN));
        Assert.Equal(430567.207732211216353, model.Elevation.Frame.West, 1e-6);
        Assert.Equal(4519510.880425440147519, model.Elevation.Frame.North, 1e-6);
        Assert.Empty(model.Findings);
    }

    [Fact]
    public void ReadsAWindow()
    {
        using var source = RasterSource.Open(Files.Data("red_butte_dem.tif"));
        var window = new float[6];
        source.ReadWindow(100, 100, 3, 2, window);
        Assert.Equal(2059.79150390625, window[0]);
    }

    [Fact]
    public void DegreesAreProjectedToUtmWithAFinding()
    {
        using var source = RasterSource.Open(Files.Data("west_bijou_escarpment_1arcsec.asc"));
        Assert.True(source.Crs!.IsGeographic);
        var model = ElevationReader.Read(source, new ElevationOptions(VerticalUnitM: 1));
        Assert.Equal("EPSG:32613", model.Plane.Crs.Code); // longitude -104: zone 13
        Assert.Contains(model.Findings, f => f.Code == "terrain-projected");
        // gdal.Warp(..., dstSRS='EPSG:32613', resampleAlg='bilinear'): 121 x 82 cells of 25.514 m, values at two cells
        Assert.Equal((121, 82), (model.Elevation.Frame.Columns, model.Elevation.Frame.Rows));
        Assert.Equal(25.514324765194388, model.Elevation.Frame.CellWidthM, 1e-6);
        Assert.Equal(1749.4044189453125, model.Elevation[30, 40], 1e-3);
        Assert.Equal(1708.521484375, model.Elevation[10, 80], 1e-3);
    }

    [Fact]
    public void AStatedNodataValueCounts()
    {
        using var source = RasterSource.Open(Files.Data("west_bijou_gully_3m.asc"));
        using var crs = Crs.Parse("EPSG:26913");
        var model = ElevationReader.Read(source, new ElevationOptions(crs, NoData: 0, VerticalUnitM: 1));
        Assert.Equal(2739, model.Elevation.Cells.Count(float.IsNaN)); // (array == 0).sum() of the same file
        Assert.Equal(1725.4326f, model.Elevation.Cells.Where(z => !float.IsNaN(z)).Max());
    }

    [Fact]
    public void FeetAreNeverTakenForMetres()
    {
        var folder = Files.NewFolder();
        var path = Files.Raster(folder, "feet", "100 100 100\n100 90 100\n100 80 100", "EPSG:26912");
        using var source = RasterSource.Open(path);
        Assert.Contains("never guessed", Assert.Throws<InputException>(() => ElevationReader.Read(source, new ElevationOptions())).Message, StringComparison.Ordinal);
        Assert.Equal(27.432f, ElevationReader.Read(source, new ElevationOptions(VerticalUnitM: Units.Foot)).Elevation[1, 1], 1e-5f);

        using var compound = Crs.Parse("EPSG:26912+6360");
        Assert.Equal(0.304800609601219, compound.VerticalUnitM!.Value, 1e-12); // osr: GetTargetLinearUnits('VERT_CS')
    }

    [Fact]
    public void AProjectedSystemInFeetIsWorkedInMetres()
    {
        var folder = Files.NewFolder();
        using var texas = Crs.Parse("EPSG:2277"); // US survey feet: osr says 0.30480060960121924
        var path = Files.Raster(folder, "t", "5 5 5\n5 4 5\n5 3 5", "EPSG:2277", 10, 3100000, 10000000);
        using var source = RasterSource.Open(path);
        var model = ElevationReader.Read(source, new ElevationOptions(VerticalUnitM: 1));
        Assert.Equal(3.0480060960121924, model.Elevation.Frame.CellWidthM, 1e-9);
        Assert.Equal(3100000 * 0.30480060960121924, model.Elevation.Frame.West, 1e-4);
        var point = new NetTopologySuite.Geometries.Point(3100010, 10000020);
        var inside = model.Plane.Into(point, texas);
        Assert.Equal(3100010 * 0.30480060960121924, inside.Coordinate.X, 1e-4);
        Assert.Equal(point.X, model.Plane.OutOf(inside).Coordinate.X, 1e-6);
    }

    [Fact]
    public void ARasterWithItsSouthOnTopIsTurned()
    {
        var folder = Files.NewFolder();
        Files.Raster(folder, "up", "1 2\n3 4\n5 6", "EPSG:26912");
        var vrt = Path.Combine(folder, "down.vrt");
        File.WriteAllText(vrt, $"""
            <VRTDataset rasterXSize="2" rasterYSize="3"><SRS>EPSG:26912</SRS><GeoTransform>430000, 10, 0, 4514000, 0, 10</GeoTransform>
            <VRTRasterBand dataType="Float32" band="1"><SimpleSource><SourceFilename relativeToVRT="1">cells/up.asc</SourceFilename><SourceBand>1</SourceBand></SimpleSource></VRTRasterBand></VRTDataset>
            """);
        using var source = RasterSource.Open(vrt);
        Assert.False(source.IsNorthUp);
        var model = ElevationReader.Read(source, new ElevationOptions(VerticalUnitM: 1));
        Assert.Equal([5, 6, 3, 4, 1, 2], model.Elevation.Cells);
        Assert.Equal(4514030, model.Elevation.Frame.North, 1e-9);
    }

    [Fact]
    public void TilesWithAGapAreOneTerrain()
    {
        var folder = Files.NewFolder();
        Files.Raster(folder, "a", "1 2\n3 4", "EPSG:26912", more: "NODATA_value -9999\n");
        Files.Raster(folder, "b", "7 8\n9 10", "EPSG:26912", x: 430030, more: "NODATA_value -9999\n");
        using var source = RasterSource.OpenMany([folder]);
        var model = ElevationReader.Read(source, new ElevationOptions(VerticalUnitM: 1));
        Assert.Equal([1, 2, float.NaN, 7, 8, 3, 4, float.NaN, 9, 10], model.Elevation.Cells);
    }

    [Fact]
    public void ARasterInThePlaneKeepsItsOwnCells()
    {
        var folder = Files.NewFolder();
        var path = Files.Raster(folder, "c", "11 21\n41 81", "EPSG:26912", 20);
        using var source = RasterSource.Open(path);
        // The terrain's first column of 10 m lies in the raster's first column; nothing of the second is needed.
        var grid = OverlayReader.Classes(source, new GridFrame(1, 4, 430000, 4514040, 10, 10), Files.Utm12());
        Assert.Equal(new GridFrame(1, 2, 430000, 4514040, 20, 20), grid.Frame);
        Assert.Equal([11, 41], grid.Cells);
        Assert.Equal([11f, 21, 41, 81], OverlayReader.Values(source, new GridFrame(6, 4, 430000, 4514040, 10, 10), Files.Utm12()).Cells);
        // Nothing in common: one cell without a class.
        Assert.Equal([int.MinValue], OverlayReader.Classes(source, new GridFrame(2, 2, 440000, 4514040, 10, 10), Files.Utm12()).Cells);
    }

    [Fact]
    public void ARasterOfAnotherProjectionIsSampledInPartsOfACell()
    {
        // Four cells of a quarter degree, about 112 to 111.5 west and 40.4 to 40.9 north.
        var folder = Files.NewFolder();
        var path = Files.Raster(folder, "g", "11 21\n41 81", "EPSG:4269", 0.25, x: -112.0, y: 40.4);
        using var source = RasterSource.Open(path);
        // Cells of 40 km against about 24 km: 2 x 40 / 24, so 4 parts a side.
        var frame = new GridFrame(1, 1, 420000, 4520000, 40000, 40000);
        var grid = OverlayReader.Classes(source, frame, Files.Utm12());
        Assert.Equal(4, grid.Frame.Columns);
        Assert.Equal((10000.0, 420000.0, 4520000.0), (grid.Frame.CellWidthM, grid.Frame.West, grid.Frame.North));
        Assert.All(grid.Cells, c => Assert.Contains(c, (int[])[11, 21, 41, 81, int.MinValue]));
        Assert.Contains(11, grid.Cells);
        Assert.Contains(float.NaN, OverlayReader.Values(source, frame with { West = 300000 }, Files.Utm12()).Cells);
    }

    [Fact]
    public void DamagedAndFalseRastersSayWhichFileAndWhatGdalSays()
    {
        var folder = Files.NewFolder();
        var cut = Path.Combine(folder, "cut.tif");
        File.WriteAllBytes(cut, File.ReadAllBytes(Files.Data("red_butte_dem.tif"))[..60000]);
        var text = Path.Combine(folder, "text.tif");
        File.WriteAllText(text, "not a raster");
        Assert.Contains("no such file", Assert.Throws<InputException>(() => RasterSource.Open(Path.Combine(folder, "none.tif"))).Message, StringComparison.Ordinal);
        Assert.Contains("text.tif", Assert.Throws<InputException>(() => RasterSource.Open(text)).Message, StringComparison.Ordinal);
        var damage = Assert.Throws<InputException>(() =>
        {
            using var source = RasterSource.Open(cut);
            ElevationReader.Read(source, new ElevationOptions(VerticalUnitM: 1));
        });
        Assert.Contains("cut.tif", damage.Message, StringComparison.Ordinal);
    }

    [Fact]
    public void AWrittenGridIsAValidCogWithTheSameCells()
    {
        var folder = Files.NewFolder();
        var path = Path.Combine(folder, "g.tif");
        var grid = Files.Plane(700, 600);
        RasterWriter.WriteCog(path, grid, Files.Utm12(), "Elevation", double.NaN, "m");
        using (var source = RasterSource.Open(path))
        {
            var back = ElevationReader.Read(source, new ElevationOptions());
            Assert.Equal(grid.Cells, back.Elevation.Cells);
            Assert.Equal(grid.Frame, back.Elevation.Frame);
        }

        var first = File.ReadAllBytes(path);
        RasterWriter.WriteCog(path, grid, Files.Utm12(), "Elevation", double.NaN, "m");
        Assert.Equal(first, File.ReadAllBytes(path));
        Assert.Equal(["g.tif"], Directory.GetFiles(folder).Select(Path.GetFileName));
        const string validator = "/usr/lib/python3/dist-packages/osgeo_utils/samples/validate_cloud_optimized_geotiff.py";
        Assert.SkipUnless(File.Exists(validator), "GDAL's validator is not installed");
        var (code, says) = Files.Start("/usr/bin/python3", validator, path);
        Assert.True(code == 0, says);
    }
}
