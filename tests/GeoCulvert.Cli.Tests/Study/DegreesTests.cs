using GeoCulvert.Design.Basis;

namespace GeoCulvert.Cli.Tests.Study;

/// <summary>
/// The whole command on terrain models in degrees: SRTM in whole metres without a nodata tag, and 1/3 arc-second cells that are not square. Areas, perimeters and
/// flow paths against geodesics on the ellipsoid (Data/degrees/make_geodesic.py, from the outlines as longitude and latitude).
/// </summary>
public class DegreesTests
{
    // The plane itself is off by 7e-4 in area and 4e-4 in length in the first and last case, twice that in the second; longitude and latitude are
    // written with 7 decimals, which is worth 2e-5 of a perimeter in cells of 8 m.
    private const double Tolerance = 5e-5;

    [Theory]
    [InlineData("jacksboro", 32616, "")] // the UTM zone of its middle
    [InlineData("jacksboro", 32617, "working_crs = \"EPSG:32617\"")] // the next zone, 2.9 degrees beyond its middle
    [InlineData("gardiner", 32612, "")]
    public void WatershedsAreTrueToSize(string name, int epsg, string workingCrs)
    {
        var (results, _) = Run(name, $"dem = \"{name}.tif\"\nvertical_unit = \"m\"\nopenings = \"none\"\n{workingCrs}");
        var watersheds = Geoculvert.Rows(results, "watersheds").ToDictionary(w => w.Text("crossing_id")!);
        var paths = Geoculvert.Rows(results, "flow_paths").ToDictionary(w => w.Text("crossing_id")!);
        var expected = PublishedTable.Parse("geodesic.csv", File.ReadAllText(Path.Combine(Geoculvert.DataFolder, "degrees", "geodesic.csv"))).Rows.Where(r => r.Text("case") == $"{name}-{epsg}").ToList();
        Assert.Equal(3, expected.Count);
        Assert.Equal(3, watersheds.Count);
        foreach (var row in expected)
        {
            var id = row.Text("crossing_id");
            Near(row.Number("area_km2"), watersheds[id].Fields["area_km2"]);
            Near(row.Number("perimeter_m"), watersheds[id].Fields["perimeter_m"]);
            Near(row.Number("flow_path_length_m"), paths[id].Fields["length_m"]);
        }

        static void Near(double geodesic, object? figure) => Assert.Equal(geodesic, (double)figure!, geodesic * Tolerance);
    }

    [Fact]
    public void AFolderOfTilesIsRecordedTileByTile()
    {
        var (results, folder) = Run("jacksboro", "dem = \"tiles\"\nvertical_unit = \"m\"\nopenings = \"none\"\nnodata = 0");
        using var json = System.Text.Json.JsonDocument.Parse(File.ReadAllText(Path.Combine(Path.GetDirectoryName(results)!, "run.json")));
        var tiles = json.RootElement.GetProperty("inputs").EnumerateArray().Where(i => i.GetProperty("role").GetString() == "terrain").ToDictionary(i => i.GetProperty("path").GetString()!);
        Assert.Equal(["tiles/east.tif", "tiles/west.tif"], tiles.Keys.Order(StringComparer.Ordinal));
        foreach (var (path, fact) in tiles)
        {
            var bytes = File.ReadAllBytes(Path.Combine(folder, path));
            Assert.Equal(bytes.Length, fact.GetProperty("bytes").GetInt64());
            Assert.Equal(Convert.ToHexStringLower(System.Security.Cryptography.SHA256.HashData(bytes)), fact.GetProperty("sha256").GetString());
            Assert.Equal("0 (project)", fact.GetProperty("nodata").GetString()); // the files say none
        }

        // The two are the same file under two names: the second lies on the first and agrees with it.
        Assert.DoesNotContain("tiles-disagree", File.ReadAllText(Path.Combine(Path.GetDirectoryName(results)!, "run.json")), StringComparison.Ordinal);
    }

    [Fact]
    public void ATerrainWithoutDataIsRefusedByCheckAndRun()
    {
        foreach (var command in new[] { "check", "run" })
        {
            var folder = Prepare("jacksboro", "dem = \"empty.asc\"\ncrs = \"EPSG:26912\"\nvertical_unit = \"m\"");
            File.WriteAllText(Path.Combine(folder, "empty.asc"), "ncols 2\nnrows 2\nxllcorner 430000\nyllcorner 4514000\ncellsize 10\nNODATA_value -9999\n-9999 -9999\n-9999 -9999\n");
            var (code, _, errors) = Geoculvert.Run(command, Path.Combine(folder, "project.toml"));
            Assert.Equal(2, code);
            Assert.Contains("no cell with data", errors, StringComparison.Ordinal);
        }
    }

    private static (string Results, string Folder) Run(string name, string terrain)
    {
        var folder = Prepare(name, terrain);
        var run = Geoculvert.Run("run", Path.Combine(folder, "project.toml"), "--quiet");
        Assert.True(run.Code is 0 or 3, run.Errors);
        return (Path.Combine(folder, "results", "results.gpkg"), folder);
    }

    private static string Prepare(string name, string terrain)
    {
        string folder = Geoculvert.NewFolder(), data = Path.Combine(Geoculvert.DataFolder, "degrees");
        foreach (var file in new[] { $"{name}.tif", $"{name}_points.geojson", "flows.csv" }) File.Copy(Path.Combine(data, file), Path.Combine(folder, file));
        Directory.CreateDirectory(Path.Combine(folder, "tiles"));
        foreach (var side in new[] { "west", "east" }) File.Copy(Path.Combine(data, $"{name}.tif"), Path.Combine(folder, "tiles", $"{side}.tif"));
        File.WriteAllText(Path.Combine(folder, "project.toml"), $"""
            [terrain]
            {terrain}
            [crossings]
            points = "{name}_points.geojson"
            id = "name"
            [flow]
            methods = ["given"]
            given = "flows.csv"
            """);
        return folder;
    }
}
