using GeoCulvert.Design.Basis;
using GeoCulvert.Design.Crossings;
using GeoCulvert.Design.Terrain;
using GeoCulvert.Design.Tests.Conventions;
using GeoCulvert.Design.Tests.Terrain;
using GeoCulvert.Design.Watersheds;
using NetTopologySuite.Geometries;

namespace GeoCulvert.Design.Tests.Watersheds;

/// <summary>
/// Every figure of local and total watersheds on real terrain against GDAL (polygons), SciPy (labels, distances) and numpy (the rest):
/// Oracles/make_watersheds.py.
/// </summary>
public class WatershedOracleTests
{
    private static readonly PublishedTable Expected = Table("Watersheds", "watersheds.csv");
    private static readonly PublishedTable Outlets = Table("Terrain", "outlets.csv");

    public static TheoryData<string> Names => RealTerrain.Names;

    [Theory]
    [MemberData(nameof(Names))]
    public void FiguresAgreeWithGeneralPurposeLibraries(string name)
    {
        var elevation = RealTerrain.Elevation(name);
        var direction = RealTerrain.Direction(name);
        var surface = new FilledSurface(elevation, 0, 0, 0);
        var terrain = new DrainedTerrain(elevation, surface, direction, new Grid<int>(elevation.Frame), []);
        var crossings = Outlets.Rows.Where(r => r.Text("terrain") == name)
            .Select((r, k) => new Crossing($"{k}", CrossingOrigin.Given, new Coordinate(0, 0), (int)r.Number("outlet_cell"), 0)).ToList();
        var watersheds = WatershedSurvey.Survey(terrain, crossings).Watersheds;
        var rows = Expected.Rows.Where(r => r.Text("terrain") == name).ToList();
        Assert.NotEmpty(rows);
        foreach (var row in rows)
        {
            var watershed = watersheds[(int)row.Number("outlet")];
            var land = row.Text("extent") == "local" ? watershed.Local : watershed.Total;
            Assert.Equal((long)row.Number("cells"), land.Cells);
            Near("area_m2", land.AreaM2);
            Near("area_m2", land.Outline.Polygon.Area);
            Near("perimeter_m", land.Outline.PerimeterM);
            Near("perimeter_m", land.Outline.Polygon.Length);
            Near("parts", land.Outline.Polygon.NumGeometries);
            Near("contact_m", land.Outline.EdgeContactM);
            Near("centroid_x", land.Centroid!.X);
            Near("centroid_y", land.Centroid.Y);
            Near("mean_elevation_m", land.MeanElevationM!.Value);
            Near("relief_m", land.ReliefM!.Value);
            Near("mean_slope", land.MeanBasinSlopeMPerM!.Value);
            Near("path_m", land.LongestFlowPath!.LengthM);
            // Where two ways are equally long the libraries' choice of one is not ours; those rows have no slopes.
            if (row.NumberOrNull("slope_10_85") is null) continue;
            Near("slope_10_85", land.LongestFlowPath.Slope1085MPerM!.Value);
            Near("slope_end", land.LongestFlowPath.EndToEndSlopeMPerM!.Value);
            Near("slope_equal_area", land.LongestFlowPath.EqualAreaSlopeMPerM!.Value);

            void Near(string column, double actual) =>
                Assert.True(Math.Abs(actual - row.Number(column)) <= 1e-8 + (1e-7 * Math.Abs(row.Number(column))), $"line {row.Line}, {column}: {actual:R}, expected {row.Text(column)}");
        }
    }

    private static PublishedTable Table(string room, string file) =>
        PublishedTable.Parse(file, File.ReadAllText(Repository.Path("tests", "GeoCulvert.Design.Tests", room, "Oracles", file)));
}
