using System.Net;
using System.Net.Sockets;
using GeoCulvert.Design.Basis;
using GeoCulvert.Design.Study;
using NetTopologySuite.Geometries;

namespace GeoCulvert.Layers.Tests;

/// <summary>Inputs that lie, disks that are full, runs that were killed.</summary>
public class DamageTests
{
    private readonly string _folder = Files.NewFolder();

    [Fact]
    public void ARasterThatClaimsMoreCellsThanFitIsRefused()
    {
        var path = Files.Raster(_folder, "a", "1 2\n3 4", "EPSG:26912", 0.01); // 20 km wide, so that its plane can be judged
        File.WriteAllText(path, File.ReadAllText(path).Replace("rasterXSize=\"2\" rasterYSize=\"2\"", "rasterXSize=\"2000000\" rasterYSize=\"2000000\"", StringComparison.Ordinal));
        using var source = RasterSource.Open(path);
        Assert.Contains("2000000 rows", Assert.Throws<InputException>(() => ElevationReader.Read(source, new ElevationOptions(VerticalUnitM: 1))).Message, StringComparison.Ordinal);
    }

    [Fact]
    public void NeitherTheTaggedNorTheStatedNodataBleedsIntoItsNeighbours()
    {
        using var source = RasterSource.Open(Files.Raster(_folder, "b", "7 -9999 7\n7 7 7\n0 7 7", "EPSG:26912", more: "NODATA_value -9999\n"));
        var cells = ElevationReader.Read(source, new ElevationOptions(NoData: 0, VerticalUnitM: 1, CellSizeM: 5)).Elevation.Cells;
        Assert.All(cells, z => Assert.True(float.IsNaN(z) || z == 7, $"{z}"));
        Assert.Contains(7f, cells);
        Assert.Contains(float.NaN, cells);
    }

    [Fact]
    public void NodataWithARoundedTagAndInfiniteCellsAreNodata()
    {
        using (var rounded = RasterSource.Open(Files.Raster(_folder, "b", "7 -3.4028235e+38 7\n7 7 7", "EPSG:26912", more: "NODATA_value -3.40282e+38\n")))
            Assert.Equal([7, float.NaN, 7, 7, 7, 7], ElevationReader.Read(rounded, new ElevationOptions(VerticalUnitM: 1)).Elevation.Cells);
        var grid = Files.Plane(8, 8);
        (grid[1, 1], grid[2, 2]) = (float.PositiveInfinity, float.NegativeInfinity);
        var path = Path.Combine(_folder, "inf.tif");
        RasterWriter.WriteCog(path, grid, Files.Utm12(), "Elevation", unit: "m");
        using var source = RasterSource.Open(path);
        Assert.Equal(3, ElevationReader.Read(source, new ElevationOptions()).Elevation.Cells.Count(float.IsNaN)); // with the one of Files.Plane
    }

    [Fact]
    public void ASidecarFileIsRead()
    {
        var path = Path.Combine(_folder, "g.tif");
        RasterWriter.WriteCog(path, Files.Plane(8, 8), Files.Utm12(), "Elevation");
        using (var other = Crs.Parse("EPSG:26913")) File.WriteAllText(path + ".aux.xml", $"<PAMDataset><SRS>{System.Security.SecurityElement.Escape(other.Wkt)}</SRS></PAMDataset>");
        using var source = RasterSource.Open(path);
        Assert.Equal("EPSG:26913", source.Crs!.Code); // as gdalinfo says: the sidecar comes before the file
    }

    [Fact]
    public async Task ACoordinateSystemIsNeverFetched()
    {
        using var listener = new TcpListener(IPAddress.Loopback, 0);
        listener.Start();
        var address = $"http://127.0.0.1:{((IPEndPoint)listener.LocalEndpoint).Port}/x";
        var asking = Task.Run(() => Record.Exception(() => Crs.Parse(address)), TestContext.Current.CancellationToken);
        var refused = await Task.WhenAny(asking, Task.Delay(5000, TestContext.Current.CancellationToken));
        Assert.Same(asking, refused);
        Assert.False(listener.Pending());
        Assert.IsType<GdalException>(await asking);
        using var named = Crs.Parse("http://www.opengis.net/def/crs/EPSG/0/26912");
        Assert.Equal("EPSG:26912", named.Code);
    }

    [Fact]
    public void ShapesThatCannotBeUsedAreLeftOutByTheirNumber()
    {
        var path = Path.Combine(_folder, "w.csv");
        File.WriteAllText(Path.Combine(_folder, "w.prj"), Wkt());
        File.WriteAllLines(path,
        [
            "WKT,k", "\"POINT (nan 40)\",nan", "\"LINESTRING (1 1,1 1)\",point", "\"POLYGON ((0 0,9 9,9 0,0 9,0 0))\",bow tie", "\"CIRCULARSTRING (0 0,1 1,2 0)\",arc", "\"LINESTRING Z (0 0 5,3 4 6)\",line",
        ]);
        var layer = VectorSource.Read(path, null, null, Files.Utm12());
        Assert.Equal(["arc", "line"], layer.Features.Select(f => f.Text("k")));
        Assert.Equal(Math.PI, layer.Features[0].Geometry.Length, 0.001); // half a circle of radius 1, GDAL's steps of 4 degrees
        Assert.Equal(6, layer.Features[1].Geometry.Coordinates[1].Z);
        Assert.Equal(3, layer.Findings.Count);
        Assert.Contains(layer.Findings, f => f.ToString().Contains("feature 3: an invalid polygon", StringComparison.Ordinal));
    }

    [Fact]
    public void CoordinatesWithoutAnImageAreLeftOut()
    {
        var path = Path.Combine(_folder, "w.geojson");
        File.WriteAllText(path, """
            {"type":"FeatureCollection","features":[
            {"type":"Feature","properties":{},"geometry":{"type":"Point","coordinates":[-111.8,95]}},
            {"type":"Feature","properties":{},"geometry":{"type":"Point","coordinates":[1e300,40]}},
            {"type":"Feature","properties":{},"geometry":{"type":"Point","coordinates":[-111.8,40]}}]}
            """);
        var layer = VectorSource.Read(path, null, null, Files.Utm12());
        Assert.Single(layer.Features);
        Assert.Equal(2, layer.Findings.Count);
    }

    [Fact]
    public void WhatAKilledRunLeftDoesNotReachTheNextFile()
    {
        string path = Path.Combine(_folder, "r.gpkg"), clean = Path.Combine(_folder, "s.gpkg");
        ResultsWriter.WriteGeoPackage(clean, [Points(3)], Files.Utm12());
        foreach (var rest in new[] { "", "-journal", "-wal", "-shm" }) File.Copy(Files.Data("red_butte_dem.tif"), path + ".part.gpkg" + rest);
        ResultsWriter.WriteGeoPackage(path, [Points(3)], Files.Utm12());
        Assert.Equal(File.ReadAllBytes(clean), File.ReadAllBytes(path));
        Assert.Equal(["r.gpkg", "s.gpkg"], Directory.GetFiles(_folder).Select(Path.GetFileName).Order());
    }

    [Fact]
    public void TablesAloneAndEmptyLayersAreAValidGeoPackage()
    {
        var path = Path.Combine(_folder, "r.gpkg");
        ResultField[] fields = [new("a", FieldType.Text, "A", "A", "")];
        ResultsWriter.WriteGeoPackage(path, [new ResultLayer("t", "T", "D", LayerGeometry.None, fields, [new ResultRow(null, ["x"])])], Files.Utm12());
        Valid(path);
        ResultsWriter.WriteGeoPackage(path, [Points(0), new ResultLayer("l", "L", "D", LayerGeometry.Line, fields, [new ResultRow(null, ["x"])]), new ResultLayer("p", "P", "D", LayerGeometry.Polygon, fields, [])], Files.Utm12());
        Valid(path);
    }

    /// <summary>A disk of 4 to 200 kB: at each size every writer either gives the whole file or an error, and nothing is left beside it.</summary>
    [Fact]
    public void AFullDiskIsSaidAtEverySize()
    {
        Assert.SkipUnless(Environment.GetEnvironmentVariable("GEOCULVERT_TEST_FULL_DISK") == "1", "set GEOCULVERT_TEST_FULL_DISK=1 as root: a small disk is mounted for it");
        var disk = Directory.CreateDirectory(Path.Combine(_folder, "disk")).FullName;
        var (code, says) = Files.Start("/bin/mount", "-t", "tmpfs", "-o", "size=4k", "tmpfs", disk);
        Assert.True(code == 0, says);
        try
        {
            int whole = 0, refused = 0;
            foreach (var (name, write) in new (string, Action<string>)[]
            {
                ("r.gpkg", f => ResultsWriter.WriteGeoPackage(Path.Combine(f, "r.gpkg"), [Points(300)], Files.Utm12())),
                ("points.geojson", f => ResultsWriter.WriteGeoJson(f, [Points(300)], Files.Utm12())),
                ("g.tif", f => RasterWriter.WriteCog(Path.Combine(f, "g.tif"), Files.Plane(600, 600), Files.Utm12(), "E")),
            })
            {
                write(_folder);
                var good = File.ReadAllBytes(Path.Combine(_folder, name));
                for (var size = 8; size <= 360; size += 8)
                {
                    Files.Start("/bin/mount", "-o", $"remount,size={size}k", disk);
                    File.WriteAllText(Path.Combine(disk, name), "former");
                    var error = Record.Exception(() => write(disk));
                    Assert.True(error is null or GdalException or IOException, $"{name} at {size} kB: {error}");
                    if (error is null) Assert.True(good.AsSpan().SequenceEqual(File.ReadAllBytes(Path.Combine(disk, name))), $"{name} is cut short at {size} kB");
                    else Assert.Equal("former", File.ReadAllText(Path.Combine(disk, name)));
                    Assert.Equal([name], Directory.GetFiles(disk).Select(Path.GetFileName));
                    File.Delete(Path.Combine(disk, name));
                    _ = error is null ? whole++ : refused++;
                }
            }

            Assert.True(whole > 10 && refused > 10, $"{whole} whole, {refused} refused");
        }
        finally
        {
            Files.Start("/bin/umount", disk);
        }
    }

    private static ResultLayer Points(int count) => new(
        "points", "Points", "D", LayerGeometry.Point, [new("a", FieldType.Text, "A", "A", "")],
        [.. Enumerable.Range(0, count).Select(i => new ResultRow(new Point(430000 + i, 4514000), [new string('x', 100)]))]);

    private static string Wkt()
    {
        using var crs = Crs.Parse("EPSG:26912");
        return crs.Wkt;
    }

    private static void Valid(string path)
    {
        const string validator = "/usr/lib/python3/dist-packages/osgeo_utils/samples/validate_gpkg.py";
        Assert.SkipUnless(File.Exists(validator) && File.Exists("/usr/bin/ogrinfo"), "GDAL's validator and ogrinfo are not installed");
        var (code, says) = Files.Start("/usr/bin/python3", validator, path);
        Assert.True(code == 0, says);
        Assert.DoesNotContain("Warning", Files.Start("/usr/bin/ogrinfo", "-al", "-so", path).Text, StringComparison.Ordinal);
    }
}
