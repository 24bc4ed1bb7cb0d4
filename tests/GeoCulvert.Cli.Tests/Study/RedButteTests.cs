using System.Text.Json;
using GeoCulvert.Layers;

namespace GeoCulvert.Cli.Tests.Study;

/// <summary>The whole command on real terrain: USGS elevation, a real road, a gauge with a published drainage area.</summary>
public sealed class RedButteTests : IClassFixture<RedButteTests.Runs>
{
    private readonly Runs _runs;

    public RedButteTests(Runs runs) => _runs = runs;

    /// <summary>Both runs once for all tests.</summary>
    public sealed class Runs
    {
        public Runs()
        {
            Along = Prepare("", "accept_edge_contact = 1.0");
            Gauge = Prepare("""{"type":"FeatureCollection","crs":{"type":"name","properties":{"name":"urn:ogc:def:crs:EPSG::26912"}},"features":[{"type":"Feature","properties":{"name":"10172200"},"geometry":{"type":"Point","coordinates":[431985,4514642]}}]}""", "points = \"points.geojson\"\nid = \"name\"\nsnap = \"60 m\"");
            AlongResult = Geoculvert.Run("run", Path.Combine(Along, "project.toml"), "--geojson", "--terrain");
            GaugeResult = Geoculvert.Run("run", Path.Combine(Gauge, "project.toml"));
        }

        public string Along { get; }

        public string Gauge { get; }

        public (int Code, string Output, string Errors) AlongResult { get; }

        public (int Code, string Output, string Errors) GaugeResult { get; }

        private static string Prepare(string points, string crossings)
        {
            var folder = Geoculvert.NewFolder();
            foreach (var file in Directory.EnumerateFiles(Path.Combine(Geoculvert.DataFolder, "red_butte"))) File.Copy(file, Path.Combine(folder, Path.GetFileName(file)));
            if (points.Length > 0) File.WriteAllText(Path.Combine(folder, "points.geojson"), points);
            File.WriteAllText(Path.Combine(folder, "project.toml"), $"""
                [study]
                name = "Red Butte"
                [terrain]
                dem = "red_butte_dem.tif"
                vertical_unit = "m"
                [[road]]
                file = "red_butte_road.geojson"
                name = "Canyon Road"
                [crossings]
                {crossings}
                [rainfall]
                table = "rain.csv"
                [flow]
                runoff_coefficient = 0.3
                """);
            return folder;
        }
    }

    [Fact]
    public void TheGaugeHasItsPublishedArea()
    {
        // USGS Circular 1173-D: 18.8 km2 at gauge 10172200; 2 % because the clip ends near the divide and the cells are coarse.
        var crossing = Assert.Single(Geoculvert.Rows(Path.Combine(_runs.Gauge, "results", "results.gpkg"), "crossings"));
        Assert.Equal("10172200", crossing.Text("crossing_id"));
        Assert.Equal(18.8, (double)crossing.Fields["watershed_area_km2"]!, 18.8 * 0.02);
    }

    [Fact]
    public void AnEdgeContactWithholdsTheSize()
    {
        var crossing = Assert.Single(Geoculvert.Rows(Path.Combine(_runs.Gauge, "results", "results.gpkg"), "crossings"));
        Assert.Equal("not computed", crossing.Text("status"));
        Assert.Null(crossing.Fields["culvert"]);
        Assert.Equal(3, _runs.GaugeResult.Code);
        Assert.Contains(Geoculvert.Rows(Path.Combine(_runs.Gauge, "results", "results.gpkg"), "crossings"), c => (double)c.Fields["edge_contact_share"]! > 0);
    }

    [Fact]
    public void CrossingsAreFoundAlongTheRoad()
    {
        // The road of 2,781 m crosses six or so drainages of 0.3 to 16 km2 (read off a map of the same terrain; 10 ha streams).
        var crossings = Geoculvert.Rows(Path.Combine(_runs.Along, "results", "results.gpkg"), "crossings");
        Assert.InRange(crossings.Count, 5, 9);
        Assert.All(crossings, c => Assert.InRange((double)c.Fields["station_m"]!, 0, 2790));
        Assert.Contains(crossings, c => c.Text("status") == "sized");
        Assert.True(_runs.AlongResult.Code is 0 or 3, _runs.AlongResult.Errors);
        Assert.All(crossings.Where(c => c.Text("status") == "sized"), c =>
        {
            Assert.True((double)c.Fields["hw_over_d"]! <= 1.5 + 1e-6);
            Assert.True((double)c.Fields["headwater_elevation_m"]! <= (double)c.Fields["headwater_limit_elevation_m"]! + 1e-6);
        });
    }

    [Fact]
    public void PolygonsEqualCellsTimesCellAreaAndAreasAreTrue()
    {
        // Areal scale of EPSG:26912 at the gauge by PROJ (GeoCulvert.Layers.Tests/Data/plane_scales.csv); it changes by 1.2e-5 over the 3.5 km to the edges.
        const double arealScale = 0.999312292106;
        const double cell = 26.477018215008027 * 26.477018215008943; // geotransform of the file, as gdalinfo prints it
        var path = Path.Combine(_runs.Along, "results", "results.gpkg");
        foreach (var layer in new[] { "watersheds", "local_watersheds" })
        {
            Assert.All(Geoculvert.Rows(path, layer), w =>
            {
                var area = (double)w.Fields["area_km2"]! * 1e6;
                Assert.Equal(Math.Round(w.Geometry.Area / cell), w.Geometry.Area / cell, 1e-5);
                Assert.Equal(w.Geometry.Area / arealScale, area, area * 3e-5);
                Assert.True(w.Geometry.IsValid);
            });
        }

        var local = Geoculvert.Rows(path, "local_watersheds").ToDictionary(w => w.Text("crossing_id")!);
        foreach (var total in Geoculvert.Rows(path, "watersheds"))
        {
            var parts = local.Values.Where(l => IsAbove(l, total.Text("crossing_id")!)).Sum(l => (double)l.Fields["area_km2"]!);
            Assert.Equal((double)total.Fields["area_km2"]!, parts, 1e-9);
        }

        bool IsAbove(VectorFeature l, string id) => l.Text("crossing_id") == id || (l.Text("downstream_crossing_id") is { } next && IsAbove(local[next], id));
    }

    [Fact]
    public void TheGeoPackageIsValid()
    {
        var path = Path.Combine(_runs.Along, "results", "results.gpkg");
        const string validator = "/usr/lib/python3/dist-packages/osgeo_utils/samples/validate_gpkg.py";
        Assert.SkipUnless(File.Exists(validator) && File.Exists("/usr/bin/ogrinfo"), "GDAL's validator and ogrinfo are not installed");
        var valid = Geoculvert.Start("/usr/bin/python3", validator, path);
        Assert.True(valid.Code == 0, valid.Output + valid.Errors);
        var info = Geoculvert.Start("/usr/bin/ogrinfo", "-al", "-so", path);
        Assert.Equal(0, info.Code);
        Assert.DoesNotContain("Warning", info.Output + info.Errors, StringComparison.Ordinal);
        Assert.DoesNotContain("ERROR", info.Output + info.Errors, StringComparison.Ordinal);
        foreach (var layer in new[] { "crossings", "watersheds", "local_watersheds", "flow_paths", "streams", "roads", "culverts", "flows", "options", "ratings", "findings", "run" })
            Assert.Contains($"Layer name: {layer}", info.Output, StringComparison.Ordinal);
    }

    [Fact]
    public void TheRecordHoldsWhatScriptsRelyOn()
    {
        using var json = JsonDocument.Parse(File.ReadAllText(Path.Combine(_runs.Along, "results", "run.json")));
        var root = json.RootElement;
        foreach (var name in new[] { "version", "command", "inputs", "settings", "stages", "peak_memory_bytes", "crossings", "findings" })
            Assert.True(root.TryGetProperty(name, out _), name);
        var dem = root.GetProperty("inputs").EnumerateArray().Single(i => i.GetProperty("role").GetString() == "terrain");
        Assert.Equal(139428, dem.GetProperty("bytes").GetInt64()); // ls -l
        Assert.Equal(64, dem.GetProperty("sha256").GetString()!.Length);
        Assert.Contains("26912", dem.GetProperty("crs").GetString(), StringComparison.Ordinal);
        var count = root.GetProperty("crossings").EnumerateObject().Sum(p => p.Value.GetInt32());
        Assert.Equal(Geoculvert.Rows(Path.Combine(_runs.Along, "results", "results.gpkg"), "crossings").Count, count);
    }

    [Fact]
    public void ScheduleReportTerrainAndGeoJsonAreThere()
    {
        var results = Path.Combine(_runs.Along, "results");
        var crossings = Geoculvert.Rows(Path.Combine(results, "results.gpkg"), "crossings");
        Assert.True(File.ReadLines(Path.Combine(results, "schedule.csv")).Count() > crossings.Count);
        var page = File.ReadAllText(Path.Combine(results, "report.html"));
        Assert.All(crossings, c => Assert.Contains(c.Text("crossing_id")!.Replace("+", "&#43;", StringComparison.Ordinal)[..8], page, StringComparison.Ordinal));
        using var geoJson = JsonDocument.Parse(File.ReadAllText(Path.Combine(results, "geojson", "crossings.geojson")));
        Assert.All(geoJson.RootElement.GetProperty("features").EnumerateArray(), f =>
        {
            var at = f.GetProperty("geometry").GetProperty("coordinates");
            Assert.InRange(at[0].GetDouble(), -111.83, -111.74); // corner coordinates as gdalinfo prints them
            Assert.InRange(at[1].GetDouble(), 40.76, 40.83);
        });
        using var accumulation = RasterSource.Open(Path.Combine(results, "terrain", "accumulation.tif"));
        Assert.Equal((260, 268), (accumulation.Columns, accumulation.Rows));
        Assert.Empty(Directory.EnumerateFileSystemEntries(results, ".new"));
    }

    [Fact]
    public void TheSameInputGivesTheSameBytes()
    {
        string[] files = ["results.gpkg", "schedule.csv", "report.html", "geojson/crossings.geojson", "terrain/filled.tif"];
        var before = files.Select(f => File.ReadAllBytes(Path.Combine(_runs.Along, "results", f))).ToArray();
        var again = Geoculvert.Run("run", Path.Combine(_runs.Along, "project.toml"), "--geojson", "--terrain", "--quiet");
        Assert.Equal(_runs.AlongResult.Code, again.Code);
        Assert.Equal("", again.Errors);
        Assert.All(files.Zip(before), p => Assert.Equal(p.Second, File.ReadAllBytes(Path.Combine(_runs.Along, "results", p.First))));
    }
}
