using GeoCulvert.Design.Terrain;
using GeoCulvert.Layers;

namespace GeoCulvert.Cli.Tests.Study;

/// <summary>
/// Ids of crossings from run to run, and the list of changes, on terrain made from a formula: three straight channels, 200 m apart, run south over
/// a grid of 300 x 150 cells of 2 m; each drains the 100 columns round it, so that every area is rows above the road x 100 cells.
/// </summary>
public sealed class IdentityTests
{
    // Plane area by true area about (300, 150) in EPSG:26912, far from the zone's middle: PROJ, pyproj.Proj(26912).get_factors(-115.486056, 0.001353).areal_scale.
    private const double ArealScale = 1.005392421;

    [Fact]
    public void CrossingsKeepTheirIdsAndChangesAreListed()
    {
        var folder = Geoculvert.NewFolder();
        Terrain(Path.Combine(folder, "dem.tif"));
        File.WriteAllText(Path.Combine(folder, "flows.csv"), "crossing_id,return_period_yr,flow_m3_s\n*,2,0.2\n*,10,0.3\n*,25,0.5\n*,50,0.6\n*,100,0.8\n");
        File.WriteAllText(Path.Combine(folder, "project.toml"), """
            [terrain]
            dem = "dem.tif"
            vertical_unit = "m"
            stream_area = "1 ha"
            [[road]]
            file = "road.geojson"
            name = "R"
            [crossings]
            accept_edge_contact = 1.0
            [flow]
            methods = ["given"]
            given = "flows.csv"
            """);

        // First run: rows 0-74 lie above y = 150.5, so 75 rows x 100 columns x 4 m2 = 0.03 km2 of the plane each.
        Road(folder, 150.5, 600);
        var (first, none) = Run(folder);
        Assert.Equal(["R 0+101", "R 0+301", "R 0+501"], first.Select(c => c.Text("crossing_id")));
        Assert.All(first, c => Assert.Equal(0.03 / ArealScale, (double)c.Fields["watershed_area_km2"]!, 1e-6));
        Assert.Empty(none);

        // 5 m to the north and 40 m longer at the beginning: stations change, ids do not. y = 155.5 lies between the centres of rows 71 and 72: 72 rows, 0.0288 km2 of the plane.
        Road(folder, 155.5, 600, -40);
        var (moved, changes) = Run(folder);
        Assert.Equal(first.Select(c => c.Text("crossing_id")), moved.Select(c => c.Text("crossing_id")));
        Assert.Equal(141, (double)moved[0].Fields["station_m"]!, 0.01);
        Assert.Equal(["R 0+101", "R 0+301", "R 0+501"], changes.Select(c => c.Text("crossing_id")));
        Assert.All(changes, c =>
        {
            Assert.Equal("moved and changed", c.Text("change"));
            Assert.Equal(5, (double)c.Fields["moved_m"]!, 1e-6);
            Assert.Equal(0.03 / ArealScale, (double)c.Fields["area_before_km2"]!, 1e-6);
            Assert.Equal(0.0288 / ArealScale, (double)c.Fields["area_after_km2"]!, 1e-6);
            Assert.Equal(0.5, c.Fields["design_flow_after_m3_s"]);
        });

        // The same again: nothing to say.
        Assert.Empty(Run(folder).Changes);

        // Cut off before the third channel: removed, with its former flow. Then back again: added.
        Road(folder, 155.5, 450, -40);
        var gone = Assert.Single(Run(folder).Changes);
        Assert.Equal(("R 0+501", "removed"), (gone.Text("crossing_id"), gone.Text("change")));
        Assert.Equal(0.5, gone.Fields["design_flow_before_m3_s"]);
        Road(folder, 155.5, 600, -40);
        var added = Assert.Single(Run(folder).Changes);
        Assert.Equal("added", added.Text("change"));
        Assert.Equal("R 0+541", added.Text("crossing_id"));

        // A larger flow at one crossing: changed, with both flows.
        File.AppendAllText(Path.Combine(folder, "flows.csv"), "R 0+101,10,1.9\nR 0+101,25,2.0\nR 0+101,100,3.0\n");
        var larger = Assert.Single(Run(folder).Changes);
        Assert.Equal(("R 0+101", "changed"), (larger.Text("crossing_id"), larger.Text("change")));
        Assert.Equal((0.5, 2.0), ((double)larger.Fields["design_flow_before_m3_s"]!, (double)larger.Fields["design_flow_after_m3_s"]!));
    }

    private static (IReadOnlyList<VectorFeature> Crossings, IReadOnlyList<VectorFeature> Changes) Run(string folder)
    {
        var run = Geoculvert.Run("run", Path.Combine(folder, "project.toml"), "--quiet");
        Assert.True(run.Code is 0 or 3, run.Errors);
        var results = Path.Combine(folder, "results", "results.gpkg");
        return (Geoculvert.Rows(results, "crossings"), Geoculvert.Table(results, "changes"));
    }

    private static void Road(string folder, double y, double toX, double fromX = 0) => File.WriteAllText(Path.Combine(folder, "road.geojson"), FormattableString.Invariant(
        $$$"""{"type":"FeatureCollection","crs":{"type":"name","properties":{"name":"urn:ogc:def:crs:EPSG::26912"}},"features":[{"type":"Feature","properties":{},"geometry":{"type":"LineString","coordinates":[[{{{fromX}}},{{{y}}}],[{{{toX}}},{{{y}}}]]}}]}"""));

    private static void Terrain(string file)
    {
        var frame = new GridFrame(300, 150, 0, 300, 2, 2);
        var grid = new Grid<float>(frame);
        for (var r = 0; r < frame.Rows; r++)
            for (var c = 0; c < frame.Columns; c++)
            {
                // Channels at x = 101, 301, 501 (column centres); ridges halfway, the odd column to the east.
                var across = Math.Min(Math.Abs(frame.CentreX(c) - 101), Math.Min(Math.Abs(frame.CentreX(c) - 301), Math.Abs(frame.CentreX(c) - 501)));
                grid[r, c] = (float)(100 + (0.01 * frame.CentreY(r)) + (0.1 * across));
            }

        using var crs = Crs.Parse("EPSG:26912");
        RasterWriter.WriteCog(file, grid, new WorkingPlane(crs), "Elevation", double.NaN, "m");
    }
}
