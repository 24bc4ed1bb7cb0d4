using System.Globalization;
using System.Text;
using GeoCulvert.Design.Basis;
using GeoCulvert.Design.Study;

namespace GeoCulvert.Design.Tests.Conventions;

/// <summary>
/// docs/formats/layers.md says what the program's own definitions say. With GEOCULVERT_WRITE_DOCS=1 in the
/// environment the test writes the page instead of comparing it.
/// </summary>
public class FormatPageTests
{
    [Fact]
    public void TheLayerPageIsTheProgramsOwn()
    {
        var page = new StringBuilder("""
            # Layers and tables of results.gpkg

            Written from the definitions in `src/GeoCulvert.Design/Study/ResultLayers.cs`; a test holds the two together. Field names end in the unit of the
            system chosen with `[study] units`. The same fields go to GeoJSON (`--geojson`), where coordinates are WGS 84 longitude and latitude.

            """);
        Add(page, ResultLayers.Crossings);
        Add(page, ResultLayers.Watersheds);
        Add(page, ResultLayers.LocalWatersheds);
        Add(page, ResultLayers.FlowPaths);
        Add(page, ResultLayers.Streams);
        Add(page, ResultLayers.Roads);
        Add(page, ResultLayers.Culverts);
        Add(page, LandLayers.CoverAreas);
        Add(page, LandLayers.RasterMeans);
        Add(page, ResultLayers.Flows);
        Add(page, ResultLayers.Options);
        Add(page, ResultLayers.Ratings);
        Add(page, ResultLayers.Findings);
        Add(page, ResultLayers.Run);
        Same(page.ToString(), "layers.md");
    }

    private static void Add<T>(StringBuilder page, LayerDefinition<T> layer)
    {
        page.Append(CultureInfo.InvariantCulture, $"\n## `{layer.Name}`\n{layer.Description} {(layer.Geometry == LayerGeometry.None ? "Plain table." : layer.Geometry + "s.")}\n\n");
        page.Append("| SI | US | type | what |\n|---|---|---|---|\n");
        foreach (var column in layer.Columns)
        {
            var (si, us) = (column.Field(UnitSystem.Si), column.Field(UnitSystem.Us));
            page.Append(CultureInfo.InvariantCulture, $"| `{si.Name}` | {(us.Name == si.Name ? "same" : $"`{us.Name}`")} | {si.Type.ToString().ToLowerInvariant()} | {column.Description} |\n");
        }
    }

    private static void Same(string expected, string name)
    {
        var path = Repository.Path("docs", "formats", name);
        expected = expected.ReplaceLineEndings("\n");
        if (Environment.GetEnvironmentVariable("GEOCULVERT_WRITE_DOCS") == "1") File.WriteAllText(path, expected);
        Assert.Equal(expected, File.ReadAllText(path));
    }
}
