using NetTopologySuite.Geometries;

namespace GeoCulvert.Layers.Tests;

/// <summary>Heights of roads under several coordinate systems. 100 US survey feet are 100 * 1200/3937 m (definition of the unit).</summary>
public class RoadHeightTests
{
    private const double HundredFeetM = 100 * 1200.0 / 3937;
    private const string Navd88 = "North American Vertical Datum 1988";

    [Theory]
    [InlineData("EPSG:26912+6360", 100, HundredFeetM, Navd88, "")] // feet, said
    [InlineData("EPSG:26912+5703", 100, 100, Navd88, "")] // metres, said
    [InlineData("EPSG:26912+5703", 100, 100, "", "road-heights-doubtful")] // the terrain does not say its datum
    [InlineData("EPSG:26912+5703", 100, 100, "Ordnance Datum Newlyn", "vertical-datum-differs")]
    [InlineData("EPSG:26912", 100, 100, Navd88, "road-heights-doubtful")] // metres are taken, and said
    [InlineData("EPSG:2277", 100, double.NaN, Navd88, "road-heights-doubtful")] // a plane of feet: not taken for metres
    [InlineData("EPSG:26912", 0, double.NaN, Navd88, "")] // all 0: no heights
    public void HeightsComeInMetresOrNotAtAll(string crs, double z, double expectedM, string terrainDatum, string code)
    {
        var folder = Files.NewFolder();
        File.WriteAllText(Path.Combine(folder, "r.csv"), FormattableString.Invariant($"id,wkt\n1,\"LINESTRING Z (430000 4514000 {z},430100 4514000 {z})\"\n"));
        var path = Path.Combine(folder, "r.vrt");
        File.WriteAllText(path, $"""
            <OGRVRTDataSource><OGRVRTLayer name="r"><SrcDataSource relativeToVRT="1">r.csv</SrcDataSource><GeometryType>wkbLineString25D</GeometryType>
            <LayerSRS>{crs}</LayerSRS><GeometryField encoding="WKT" field="wkt"/></OGRVRTLayer></OGRVRTDataSource>
            """);
        using var plane = Crs.Parse(crs == "EPSG:2277" ? crs : "EPSG:26912");
        var layer = VectorSource.Read(path, null, null, new WorkingPlane(plane));
        Assert.All(((LineString)layer.Features.Single().Geometry).Coordinates, c => Assert.Equal(expectedM, c.Z, 1e-9));
        var doubts = layer.Heights.Doubts("r.csv", terrainDatum).ToList();
        Assert.Equal(code, doubts.Count == 0 ? "" : Assert.Single(doubts).Code);
    }
}
