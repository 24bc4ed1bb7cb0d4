using GeoCulvert.Design.Crossings;
using GeoCulvert.Design.Terrain;
using GeoCulvert.Design.Watersheds;
using GeoCulvert.Layers;
using NetTopologySuite.Geometries;

namespace GeoCulvert.Cli.Tests.Study;

/// <summary>What must hold of watersheds, on every terrain model of the test data as it is read from its file.</summary>
public class WatershedsOfRealTerrainTests
{
    public static TheoryData<string> Files => [.. Directory.GetFiles(Geoculvert.DataFolder, "*_dem.tif", SearchOption.AllDirectories).Select(f => Path.GetRelativePath(Geoculvert.DataFolder, f)).Order(StringComparer.Ordinal)];

    [Fact]
    public void EveryTerrainIsThere() => Assert.Equal(59, Files.Count);

    [Theory]
    [MemberData(nameof(Files))]
    public void PolygonsAreValidAndAddUp(string file)
    {
        using var source = RasterSource.Open(Path.Combine(Geoculvert.DataFolder, file));
        var elevation = ElevationReader.Read(source, new ElevationOptions(VerticalUnitM: 1)).Elevation;
        var terrain = Drainage.Solve(elevation, cancel: TestContext.Current.CancellationToken);
        var streams = Enumerable.Range(0, elevation.Cells.Length).Where(i => terrain.Accumulation.Cells[i] >= 40).ToList();
        var crossings = streams.Where((_, i) => i % Math.Max(1, streams.Count / 60) == 0).Select(i => new Crossing($"{i}", CrossingOrigin.Given, new Coordinate(0, 0), i, 0)).ToList();
        Assert.NotEmpty(crossings);
        foreach (var smooth in new[] { false, true })
        {
            var survey = WatershedSurvey.Survey(terrain, crossings, new() { SmoothOutlines = smooth });
            foreach (var watershed in survey.Watersheds)
            {
                Assert.Equal(terrain.Accumulation.Cells[crossings[watershed.Outlet].OutletCell], watershed.Total.Cells);
                Assert.True(watershed.Total.Outline.Polygon.IsValid);
                Assert.True(watershed.Local.Outline.Polygon.IsValid);
                var parts = survey.Watersheds.Where(w => survey.Tree.Drains(watershed.Outlet, w.Outlet)).ToList();
                Assert.Equal(watershed.Total.AreaM2, parts.Sum(w => w.Local.AreaM2), 1e-9 * watershed.Total.AreaM2);
                Assert.Equal(watershed.Total.Outline.Polygon.Area, parts.Sum(w => w.Local.Outline.Polygon.Area), 1e-8 * watershed.Total.AreaM2);
                if (!smooth) Assert.Equal(watershed.Total.Cells * elevation.Frame.CellAreaM2, watershed.Total.Outline.Polygon.Area, 1e-6);
                else if (watershed.Total.Cells > 500) Assert.Equal(1, watershed.Total.Outline.Polygon.Area / watershed.Total.AreaM2, 0.01);
            }
        }
    }
}
