using System.Globalization;
using NetTopologySuite.Geometries;

namespace GeoCulvert.Cli.Tests.Study;

/// <summary>
/// Rasters much coarser than the terrain, whose lines cut through its cells: shares and means of the gauged watershed against NetTopologySuite's
/// intersections of its outline with the raster's cells.
/// </summary>
public class CoverOnItsOwnGridTests
{
    // Four cells of 5 km, from the north-west; the lines between them at x = 433012.3 and y = 4516503.7.
    private const double West = 428012.3, Middle = 433012.3, South = 4511503.7, Level = 4516503.7, Side = 5000;

    [Fact]
    public void SharesAndMeansAreThoseOfTheAreas()
    {
        var folder = Geoculvert.NewFolder();
        foreach (var file in Directory.EnumerateFiles(Path.Combine(Geoculvert.DataFolder, "red_butte"))) File.Copy(file, Path.Combine(folder, Path.GetFileName(file)));
        File.WriteAllText(Path.Combine(folder, "points.geojson"), """{"type":"FeatureCollection","crs":{"type":"name","properties":{"name":"urn:ogc:def:crs:EPSG::26912"}},"features":[{"type":"Feature","properties":{"name":"10172200"},"geometry":{"type":"Point","coordinates":[431985,4514642]}}]}""");
        Raster(folder, "cover", "41 52\n90 11");
        Raster(folder, "soil", "2 2\n3 -9999");
        Raster(folder, "rain", "500.5 -9999\n720 640");
        File.WriteAllText(Path.Combine(folder, "project.toml"), """
            [terrain]
            dem = "red_butte_dem.tif"
            vertical_unit = "m"
            [crossings]
            points = "points.geojson"
            id = "name"
            snap = "60 m"
            [cover]
            land_cover = "cover.vrt"
            soil_group = "soil.vrt"
            means = ["rain.vrt"]
            [rainfall]
            table = "rain.csv"
            """);
        var (code, output, errors) = Geoculvert.Run("run", Path.Combine(folder, "project.toml"));
        var results = Path.Combine(folder, "results", "results.gpkg");
        Assert.True(File.Exists(results), $"{code} {output} {errors}");

        var row = Geoculvert.Rows(results, "watersheds").Single();
        var outline = row.Geometry;
        double Part(double x, double y) => outline.Intersection(outline.Factory.ToGeometry(new Envelope(x, x + Side, y, y + Side))).Area / outline.Area;
        double nw = Part(West, Level), ne = Part(Middle, Level), sw = Part(West, South), se = Part(Middle, South);
        Assert.Equal(1, nw + ne + sw + se, 1e-9); // the four cells hold the whole watershed
        Assert.All([nw, ne, sw, se], s => Assert.True(s > 0.001));

        double Field(string name) => double.Parse(row.Text(name)!, CultureInfo.InvariantCulture);
        Assert.Equal(se, Field("lake_share"), 1e-6);
        Assert.Equal(sw, Field("wetland_share"), 1e-6);
        Assert.Equal(nw + ne, Field("soil_b_share"), 1e-6);
        Assert.Equal(se, Field("soil_missing_share"), 1e-6);
        Assert.Equal(0, Field("cover_missing_share"), 1e-9);
        Assert.Equal(se, Field("impervious_share"), 1e-6); // land_cover.csv: open water 100 %, the others 0

        var areas = Geoculvert.Table(results, "cover_areas");
        Assert.Equal(4, areas.Count);
        // Areas are true ones; shares of the plane's areas hold for them too, since the scale changes by less than 1e-6 over the watershed.
        var whole = (double)Geoculvert.Rows(results, "watersheds").Single().Fields["area_km2"]!;
        Assert.Equal(outline.Area / 1e6, whole, whole * 1e-3);
        foreach (var (cover, soil, share) in new[] { ("41", "B", nw), ("52", "B", ne), ("90", "C", sw), ("11", null, se) })
        {
            var area = areas.Single(a => a.Text("land_cover") == cover);
            Assert.Equal(soil ?? "", area.Text("soil_group") ?? "");
            Assert.Equal(share, double.Parse(area.Text("area_share")!, CultureInfo.InvariantCulture), 1e-6);
            Assert.Equal(share * whole, double.Parse(area.Text("area_km2")!, CultureInfo.InvariantCulture), 1e-5);
        }

        var mean = Geoculvert.Table(results, "raster_means").Single();
        Assert.Equal("rain", mean.Text("raster"));
        Assert.Equal(((500.5 * nw) + (720 * sw) + (640 * se)) / (nw + sw + se), double.Parse(mean.Text("mean")!, CultureInfo.InvariantCulture), 1e-3);
        Assert.Equal(ne, double.Parse(mean.Text("missing_share")!, CultureInfo.InvariantCulture), 1e-6);
    }

    private static void Raster(string folder, string name, string cells)
    {
        File.WriteAllText(Path.Combine(folder, name + ".asc"), string.Create(CultureInfo.InvariantCulture, $"ncols 2\nnrows 2\nxllcorner {West}\nyllcorner {South}\ncellsize {Side}\nNODATA_value -9999\n{cells}\n"));
        File.WriteAllText(Path.Combine(folder, name + ".vrt"), string.Create(CultureInfo.InvariantCulture, $"""
            <VRTDataset rasterXSize="2" rasterYSize="2"><SRS>EPSG:26912</SRS><GeoTransform>{West}, {Side}, 0, {South + (2 * Side)}, 0, -{Side}</GeoTransform>
            <VRTRasterBand dataType="Float32" band="1"><NoDataValue>-9999</NoDataValue><SimpleSource><SourceFilename relativeToVRT="1">{name}.asc</SourceFilename><SourceBand>1</SourceBand></SimpleSource></VRTRasterBand></VRTDataset>
            """));
    }
}
