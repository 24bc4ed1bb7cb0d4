using GeoCulvert.Cli.Project;
using GeoCulvert.Design.Basis;

namespace GeoCulvert.Cli.Tests.Project;

public class ProjectFileTests
{
    [Fact]
    public void ReadsValuesInSiAndFallsBackToDefaults()
    {
        var file = Parse("""
            [study]
            units = "us"
            [terrain]
            dem = ["a.tif", "b.tif"]
            stream_area = "25 ac"
            [[road]]
            file = "r.geojson"
            width = "30 ft"
            [[road]]
            file = "s.geojson"
            [flow]
            return_periods = [2, 25.5]
            """);
        Assert.Empty(file.Problems);
        Assert.Equal("us", file["study"].Text("units"));
        Assert.Equal(["a.tif", "b.tif"], file["terrain"].Texts("dem"));
        Assert.Equal(101171.41056, file["terrain"].Needed("stream_area"), 1e-4); // 25 x 43 560 x 0.3048^2
        Assert.Equal(2, file.Roads.Count);
        Assert.Equal(9.144, file.Roads[0].Needed("width"), 1e-12);
        Assert.Equal(8, file.Roads[1].Needed("width"), 1e-12);
        Assert.Equal([2, 25.5], file["flow"].Numbers("return_periods"));
        Assert.Equal(2, file["tailwater"].Needed("side_slope"), 1e-12);
        Assert.Null(file["rainfall"].Text("table"));
        Assert.False(file["crossings"].Has("snap"));
    }

    [Fact]
    public void SaysEverythingThatIsWrongAtOnce()
    {
        var file = Parse("""
            [terain]
            [terrain]
            stream_aera = "10 ha"
            stream_area = 10
            [[road]]
            width = "9 ha"
            class = "motorway"
            [flow]
            return_periods = [2, "ten"]
            runoff_coefficient = 1.4
            """);
        var problems = file.Problems.Select(p => p.ToString()).ToList();
        Assert.Equal(7, problems.Count);
        Assert.Contains(problems, p => p.Contains("line 1", StringComparison.Ordinal) && p.Contains("nearest is terrain", StringComparison.Ordinal));
        Assert.Contains(problems, p => p.Contains("line 3, [terrain] stream_aera", StringComparison.Ordinal) && p.Contains("nearest is stream_area", StringComparison.Ordinal));
        Assert.Contains(problems, p => p.Contains("line 4", StringComparison.Ordinal) && p.Contains("bare number", StringComparison.Ordinal));
        Assert.Contains(problems, p => p.Contains("line 6", StringComparison.Ordinal) && p.Contains("an area", StringComparison.Ordinal));
        Assert.Contains(problems, p => p.Contains("line 7", StringComparison.Ordinal) && p.Contains("\"arterial\"", StringComparison.Ordinal));
        Assert.Contains(problems, p => p.Contains("line 9", StringComparison.Ordinal));
        Assert.Contains(problems, p => p.Contains("line 10", StringComparison.Ordinal) && p.Contains("0.01 to 1", StringComparison.Ordinal));
    }

    [Theory]
    [InlineData("[study\nname = 1", "line 1")]
    [InlineData("name = \"x\"", "outside any table")]
    [InlineData("[road]\nfile = \"x\"", "[[road]]")]
    [InlineData("[[flow]]", "[flow]")]
    [InlineData("[study]\nname = \"\"", "a text in quotes")]
    [InlineData("[culvert]\nlargest_number_of_barrels = 2.5", "a whole number")]
    [InlineData("[terrain]\nvertical_unit = \"feet\"", "\"ft\"")]
    public void NamesThePlaceAndTheExpectation(string text, string says) =>
        Assert.Contains(Parse(text).Problems, p => p.ToString().Contains(says, StringComparison.Ordinal));

    [Fact]
    public void EveryDefaultReadsAsItsOwnKey() => Assert.All(
        ProjectKeys.All.Where(k => k.Default is not null),
        k => Assert.NotNull(ProjectFile.DefaultOf(k)));

    [Fact]
    public void TheTemplateIsAProjectFile()
    {
        var text = ProjectTemplate.Write(
            new Dictionary<string, string>(StringComparer.Ordinal) { ["terrain.dem"] = ProjectTemplate.Quote("a \"b\"\\c.tif") }, ["remark"]);
        var file = Parse(text);
        Assert.Empty(file.Problems);
        Assert.Equal(["a \"b\"\\c.tif"], file["terrain"].Texts("dem"));
        var uncommented = string.Join('\n', text.Split('\n').Select(l => ProjectKeys.All.Any(k => l.StartsWith($"# {k.Name} = ", StringComparison.Ordinal)) ? l[2..] : l));
        Assert.DoesNotContain(Parse(uncommented).Problems, p => p.Found.Contains("unknown", StringComparison.Ordinal));
    }

    /// <summary>With GEOCULVERT_WRITE_DOCS=1 in the environment the page is written instead of compared.</summary>
    [Fact]
    public void ThePublishedSchemaIsTheProgramsOwn()
    {
        var path = Path.Combine(Root(), "docs", "formats", "project.schema.json");
        if (Environment.GetEnvironmentVariable("GEOCULVERT_WRITE_DOCS") == "1") File.WriteAllText(path, ProjectSchema.Write());
        Assert.Equal(File.ReadAllText(path), ProjectSchema.Write());
    }

    internal static string Root()
    {
        var folder = new DirectoryInfo(AppContext.BaseDirectory);
        while (!File.Exists(Path.Combine(folder!.FullName, "GeoCulvert.sln"))) folder = folder.Parent;
        return folder.FullName;
    }

    private static ProjectFile Parse(string text) => ProjectFile.Parse("p.toml", Path.GetTempPath(), text);
}
