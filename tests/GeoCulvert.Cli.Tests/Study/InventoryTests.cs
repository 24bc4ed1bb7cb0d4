using GeoCulvert.Design.Terrain;
using GeoCulvert.Layers;

namespace GeoCulvert.Cli.Tests.Study;

/// <summary>An inventory of 200 rows with every kind of dirt, over terrain from a formula: twenty straight channels under one road.</summary>
public sealed class InventoryTests
{
    // Size, barrels, shape, material, unit of length; and whether it can be rated.
    private static readonly (string Size, string Barrels, string Shape, string Material, bool Rated)[] Kinds =
    [
        ("48 in", "1", "RCP", "concrete", true), ("48", "", "", "", true), ("2x36", "", "pipe", "CMP", true), ("3'-6\\\"", "1", "round", "HDPE", true), ("1200 mm", "1.0", "Circular", "steel", true),
        ("8 x 6 ft", "1", "RCB", "", true), ("8' x 6'", "two", "BOX", "conc", true), ("6x4", "twin", "box culvert", "concrete", true), ("", "", "", "", false), ("N/A", "?", "pipe", "unknown", false),
        ("large", "1", "pipe", "CMP", false), ("-36", "1", "pipe", "CMP", false), ("0", "1", "RCP", "", false), ("36 in", "0", "RCP", "RCP", true), ("36 in", "1.5", "RCP", "RCP", true),
        ("60 x 40 in", "1", "pipe arch", "CMP", false), ("36 in", "1", "triangle", "wood", true), ("36in.", "1", "Elliptical", "RCP", false), ("=1+1", "1", "<b>", "RCP", false), ("36 in", "1", "pipe", "RCP", true),
    ];

    [Fact]
    public void EveryRowComesOutRatedOrWithAReason()
    {
        var folder = Geoculvert.NewFolder();
        Terrain(Path.Combine(folder, "dem.tif"));
        File.WriteAllText(Path.Combine(folder, "road.geojson"), """{"type":"FeatureCollection","crs":{"type":"name","properties":{"name":"urn:ogc:def:crs:EPSG::26912"}},"features":[{"type":"Feature","properties":{},"geometry":{"type":"LineString","coordinates":[[0,151,110],[2000,151,110]]}}]}""");
        File.WriteAllText(Path.Combine(folder, "flows.csv"), "crossing_id,return_period_yr,flow_m3_s\n*,2,0.5\n*,10,1.5\n*,25,3\n*,50,6\n*,100,12\n");
        var rows = Enumerable.Range(0, 200).Select(i =>
        {
            var k = Kinds[i % Kinds.Length];
            var id = i % 17 == 3 ? "" : i % 29 == 5 ? "C1" : $"C{i}";
            var length = i % 7 == 0 ? "null" : i % 7 == 1 ? "\"30 m\"" : i % 7 == 2 ? "\"n/a\"" : "100";
            return FormattableString.Invariant($$$"""{"type":"Feature","properties":{"ID":"{{{id}}}","DIA":"{{{k.Size}}}","NUM":"{{{k.Barrels}}}","SHP":"{{{k.Shape}}}","MAT":"{{{k.Material}}}","LEN":{{{length}}}},"geometry":{"type":"Point","coordinates":[{{{101 + (100 * (i % 19))}}},{{{150 + (i % 5)}}}]}}""");
        });
        File.WriteAllText(Path.Combine(folder, "inventory.geojson"), """{"type":"FeatureCollection","crs":{"type":"name","properties":{"name":"urn:ogc:def:crs:EPSG::26912"}},"features":[""" + string.Join(",", rows) + "]}");
        File.WriteAllText(Path.Combine(folder, "project.toml"), """
            [terrain]
            dem = "dem.tif"
            vertical_unit = "m"
            stream_area = "0.5 ha"
            openings = "none"
            [[road]]
            file = "road.geojson"
            name = "R"
            [crossings]
            accept_edge_contact = 1.0
            snap = "10 m"
            [inventory]
            file = "inventory.geojson"
            id = "ID"
            size = "DIA"
            barrels = "NUM"
            shape = "SHP"
            material = "MAT"
            length = "LEN"
            size_unit = "in"
            length_unit = "ft"
            [flow]
            methods = ["given"]
            given = "flows.csv"
            """);
        var run = Geoculvert.Run("run", Path.Combine(folder, "project.toml"), "--quiet");
        Assert.True(run.Code == 3, run.Errors + run.Output);
        var results = Path.Combine(folder, "results", "results.gpkg");
        var crossings = Geoculvert.Rows(results, "crossings");
        Assert.Equal(200, crossings.Count);
        Assert.Equal(200, crossings.Select(c => c.Text("crossing_id")).Distinct().Count());
        var capacities = Geoculvert.Table(results, "capacities").ToLookup(c => c.Text("crossing_id"));
        var findings = Geoculvert.Table(results, "findings").ToLookup(f => f.Text("crossing_id"));
        for (var i = 0; i < 200; i++)
        {
            var (c, kind) = (crossings[i], Kinds[i % Kinds.Length]);
            var id = c.Text("crossing_id")!;
            if (kind.Rated)
            {
                Assert.True(c.Text("status") == "rated", $"{id}: {kind} is {c.Text("status")}");
                Assert.True(capacities[id].Count() >= 3);
                // Every row fails at one of the floods asked for or at none; then the smallest capacity lies above the largest flood.
                var fails = c.Fields["first_failure_return_period_yr"];
                if (fails is null) Assert.All(capacities[id], k => Assert.True(k.Fields["capacity_m3_s"] is null or >= 12.0));
                else Assert.NotNull(c.Text("first_failure"));
            }
            else
            {
                Assert.True(c.Text("status") == "not computed", $"{id}: {kind} is {c.Text("status")}");
                Assert.Contains(findings[id], f => f.Text("severity") == "error");
            }
        }
    }

    private static void Terrain(string file)
    {
        var frame = new GridFrame(1000, 150, 0, 300, 2, 2);
        var grid = new Grid<float>(frame);
        for (var r = 0; r < frame.Rows; r++)
            for (var c = 0; c < frame.Columns; c++)
            {
                var across = Math.Abs((((frame.CentreX(c) - 1) % 100) + 100) % 100);
                grid[r, c] = (float)(100 + (0.01 * frame.CentreY(r)) + (0.1 * Math.Min(across, 100 - across)));
            }

        using var crs = Crs.Parse("EPSG:26912");
        RasterWriter.WriteCog(file, grid, new WorkingPlane(crs), "Elevation", double.NaN, "m");
    }
}
