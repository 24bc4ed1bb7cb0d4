using GeoCulvert.Design.Basis;
using GeoCulvert.Design.Study;
using NetTopologySuite.Geometries;

namespace GeoCulvert.Layers.Tests;

public class VectorTests
{
    private const string Crs26912 = "\"crs\":{\"type\":\"name\",\"properties\":{\"name\":\"urn:ogc:def:crs:EPSG::26912\"}}";

    [Fact]
    public void ReadsARealRoad()
    {
        var layer = VectorSource.Read(Files.Data("red_butte_road.geojson"), null, null, Files.Utm12());
        var road = Assert.Single(layer.Features);
        Assert.Equal("Red Butte Canyon Road", road.Text("NAME"));
        Assert.Equal(2781, road.Geometry.Length, 1.0); // length given with the data
        Assert.Equal(431021.693235819926485, road.Geometry.Coordinates[0].X, 1e-6);
    }

    [Fact]
    public void FeaturesThatCannotBeUsedAreSaidAndTheRestIsRead()
    {
        var path = Write("""
            {"type":"Feature","properties":{"id":1},"geometry":null},
            {"type":"Feature","properties":{"id":2},"geometry":{"type":"LineString","coordinates":[]}},
            {"type":"Feature","properties":{"id":3,"n":2.5,"t":null},"geometry":{"type":"Point","coordinates":[1,2,3]}}
            """);
        var layer = VectorSource.Read(path, null, null, Files.Utm12());
        var feature = Assert.Single(layer.Features);
        Assert.Equal(3L, feature.Fields["id"]);
        Assert.Equal(2.5, feature.Fields["n"]);
        Assert.Null(feature.Fields["t"]);
        Assert.Equal(3, feature.Geometry.Coordinate.Z);
        Assert.Equal(2, layer.Findings.Count);
        Assert.All(layer.Findings, f => Assert.Equal("feature-left-out", f.Code));
    }

    [Fact]
    public void LayerAndFilterWorkAndTheirErrorsName()
    {
        var path = Write("""
            {"type":"Feature","properties":{"k":"a"},"geometry":{"type":"Point","coordinates":[1,2]}},
            {"type":"Feature","properties":{"k":"b"},"geometry":{"type":"Point","coordinates":[3,4]}}
            """);
        Assert.Single(VectorSource.Read(path, null, "k = 'b'", Files.Utm12()).Features);
        Assert.Contains("one of its layers", Assert.Throws<InputException>(() => VectorSource.Read(path, "nope", null, Files.Utm12())).Message, StringComparison.Ordinal);
        Assert.Contains("filter", Assert.Throws<InputException>(() => VectorSource.Read(path, null, "nope = = 3", Files.Utm12())).Message, StringComparison.Ordinal);
        Assert.Contains("no such file", Assert.Throws<InputException>(() => VectorSource.Read(path + "x", null, null, Files.Utm12())).Message, StringComparison.Ordinal);
    }

    [Fact]
    public void GeoJsonWithoutACrsIsWgs84()
    {
        var path = Path.Combine(Files.NewFolder(), "w.geojson");
        File.WriteAllText(path, """{"type":"FeatureCollection","features":[{"type":"Feature","properties":{},"geometry":{"type":"Point","coordinates":[-111.8060460777362,40.77994650746477]}}]}""");
        var point = VectorSource.Read(path, null, null, Files.Utm12()).Features[0].Geometry.Coordinate;
        Assert.Equal(431985, point.X, 1e-3);
        Assert.Equal(4514642, point.Y, 1e-3);
    }

    [Fact]
    public void AGeoPackageIsValidDescribedAndTheSameTwice()
    {
        var folder = Files.NewFolder();
        var path = Path.Combine(folder, "r.gpkg");
        ResultsWriter.WriteGeoPackage(path, Layers(), Files.Utm12());
        var first = File.ReadAllBytes(path);
        ResultsWriter.WriteGeoPackage(path, Layers(), Files.Utm12());
        Assert.Equal(first, File.ReadAllBytes(path));
        Assert.Equal(["r.gpkg"], Directory.GetFiles(folder).Select(Path.GetFileName));
        var points = VectorSource.Read(path, "points", null, Files.Utm12()).Features;
        Assert.Equal(Hostile, points[0].Text("name"));
        Assert.Null(points[0].Fields["real_m"]); // NaN is no value
        Assert.Equal(7L, points[1].Fields["whole"]);

        const string validator = "/usr/lib/python3/dist-packages/osgeo_utils/samples/validate_gpkg.py";
        Assert.SkipUnless(File.Exists(validator) && File.Exists("/usr/bin/ogrinfo"), "GDAL's validator and ogrinfo are not installed");
        var (code, says) = Files.Start("/usr/bin/python3", validator, path);
        Assert.True(code == 0, says);
        var (_, info) = Files.Start("/usr/bin/ogrinfo", "-al", "-so", path);
        Assert.DoesNotContain("Warning", info, StringComparison.Ordinal);
        Assert.DoesNotContain("ERROR", info, StringComparison.Ordinal);
        Assert.Contains("Layer name: table", info, StringComparison.Ordinal);
        var (_, described) = Files.Start("/usr/bin/python3", "-c", $"import sqlite3; c = sqlite3.connect('{path}'); print(c.execute('pragma user_version').fetchone(), c.execute(\"select title, description from gpkg_data_columns where column_name = 'real_m'\").fetchall(), c.execute(\"select data_type from gpkg_contents where table_name='table'\").fetchall())");
        Assert.Contains("(10300,)", described, StringComparison.Ordinal); // version 1.3
        Assert.Contains("('A real, m', 'A real number')", described, StringComparison.Ordinal);
        Assert.Contains("('attributes',)", described, StringComparison.Ordinal);
    }

    [Fact]
    public void AFailureLeavesTheFormerFileAndNoPart()
    {
        var folder = Files.NewFolder();
        var path = Path.Combine(folder, "r.gpkg");
        File.WriteAllText(path, "former");
        var bad = Layers()[0] with { Rows = [new ResultRow(new Polygon(new LinearRing([new(0, 0), new(1, 0), new(1, 1), new(0, 0)])), ["x", 1.0, 1L, true])], Fields = [.. Layers()[0].Fields, Layers()[0].Fields[0]] };
        Assert.ThrowsAny<Exception>(() => ResultsWriter.WriteGeoPackage(path, [bad], Files.Utm12()));
        Assert.Equal("former", File.ReadAllText(path));
        Assert.Equal(["r.gpkg"], Directory.GetFiles(folder).Select(Path.GetFileName));
        Assert.ThrowsAny<Exception>(() => ResultsWriter.WriteGeoPackage(Path.Combine(folder, "no", "such", "r.gpkg"), Layers(), Files.Utm12()));
    }

    [Fact]
    public void GeoJsonFollowsRfc7946()
    {
        var folder = Files.NewFolder();
        var files = ResultsWriter.WriteGeoJson(folder, Layers(), Files.Utm12());
        Assert.Equal(["points.geojson", "polygons.geojson"], files.Select(Path.GetFileName));
        using var json = System.Text.Json.JsonDocument.Parse(File.ReadAllText(files[1]));
        Assert.False(json.RootElement.TryGetProperty("crs", out _));
        var ring = json.RootElement.GetProperty("features")[0].GetProperty("geometry").GetProperty("coordinates") is var all && all[0][0][0].ValueKind == System.Text.Json.JsonValueKind.Array ? all[0][0] : all[0];
        var ringPoints = ring.EnumerateArray().Select(c => (X: c[0].GetDouble(), Y: c[1].GetDouble())).ToArray();
        Assert.All(ringPoints, c => Assert.InRange(c.X, -112, -111));
        var twiceArea = ringPoints.Zip(ringPoints.Skip(1)).Sum(p => (p.First.X * p.Second.Y) - (p.Second.X * p.First.Y));
        Assert.True(twiceArea > 0, "the outer ring runs counter-clockwise");
    }

    private const string Hostile = "'); DROP TABLE points; -- \"<script>\" \u202Eabc é 名";

    private static List<ResultLayer> Layers()
    {
        ResultField[] fields =
        [
            new("name", FieldType.Text, "Name", "A name", ""), new("real_m", FieldType.Real, "A real", "A real number", "m"),
            new("whole", FieldType.Integer, "Whole", "A whole number", ""), new("yes", FieldType.Boolean, "Yes", "A yes or no", ""),
        ];
        var square = new Polygon(new LinearRing([new(430000, 4514000), new(430000, 4514100), new(430100, 4514100), new(430100, 4514000), new(430000, 4514000)]));
        return
        [
            new ResultLayer("points", "Points", "Some points", LayerGeometry.Point, fields, [new ResultRow(new Point(430000, 4514000), [Hostile, double.NaN, null, true]), new ResultRow(new Point(430001, 4514000), [new string('x', 300), 1.5, 7L, false])]),
            new ResultLayer("polygons", "Polygons", "A polygon", LayerGeometry.Polygon, fields, [new ResultRow(square, ["a", 1.0, 1L, null])]),
            new ResultLayer("table", "Table", "No geometry", LayerGeometry.None, fields, [new ResultRow(null, ["t", 2.0, 2L, true])]),
        ];
    }

    private static string Write(string features)
    {
        var path = Path.Combine(Files.NewFolder(), "v.geojson");
        File.WriteAllText(path, $"{{\"type\":\"FeatureCollection\",{Crs26912},\"features\":[{features}]}}");
        return path;
    }
}
