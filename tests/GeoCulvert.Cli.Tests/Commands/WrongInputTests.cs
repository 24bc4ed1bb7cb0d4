using System.Globalization;

namespace GeoCulvert.Cli.Tests.Commands;

/// <summary>Wrong input: exit code 2, everything said in one go, nothing written.</summary>
public class WrongInputTests
{
    private static string RedButte => Path.Combine(Geoculvert.DataFolder, "red_butte");

    [Theory]
    [InlineData("check")]
    [InlineData("run")]
    public void EverythingIsSaidInOneGo(string command)
    {
        var folder = Geoculvert.NewFolder();
        File.WriteAllText(Path.Combine(folder, "rain.csv"), "duration_min,2,10\n5,fast,60\n");
        File.WriteAllText(Path.Combine(folder, "project.toml"), """
            [study]
            unit = "us"
            [terrain]
            dem = "missing.tif"
            stream_area = 10
            [[road]]
            file = "nowhere.geojson"
            width = "9"
            [rainfall]
            table = "rain.csv"
            [culvert]
            inlets = ["hds5-99-1", "hds5-8-1"]
            """);
        var (code, output, errors) = Geoculvert.Run(command, Path.Combine(folder, "project.toml"));
        Assert.Equal(2, code);
        Assert.Equal("", output);
        foreach (var said in new[]
        {
            "line 2, [study] unit", "nearest is units", "missing.tif", "no such file", "line 5, [terrain] stream_area", "bare number", "nowhere.geojson",
            "line 8, [road] width", "rain.csv", "hds5-99-1", "runoff_coefficient",
        })
            Assert.Contains(said, errors, StringComparison.Ordinal);
        Assert.False(Directory.Exists(Path.Combine(folder, "results")));
    }

    [Fact]
    public void TheVerticalUnitIsNeverGuessed()
    {
        var (code, _, errors) = Check("dem = \"DEM\"", "file = \"ROAD\"");
        Assert.Equal(2, code);
        Assert.Contains("vertical_unit", errors, StringComparison.Ordinal);
        Assert.Contains("never guessed", errors, StringComparison.Ordinal);
    }

    [Fact]
    public void ATerrainWithoutCrsIsRefused()
    {
        var folder = Geoculvert.NewFolder();
        var asc = Path.Combine(folder, "plain.asc");
        File.WriteAllText(asc, "ncols 3\nnrows 3\nxllcorner 0\nyllcorner 0\ncellsize 10\nNODATA_value -9999\n5 5 5\n5 4 5\n5 3 5\n");
        var (code, _, errors) = Check($"dem = \"{asc}\"\nvertical_unit = \"m\"", "file = \"ROAD\"");
        Assert.Equal(2, code);
        Assert.Contains("no coordinate system", errors, StringComparison.Ordinal);
    }

    [Fact]
    public void ARoadOutsideTheTerrainIsRefusedWithBothExtents()
    {
        var folder = Geoculvert.NewFolder();
        var road = Path.Combine(folder, "far.geojson");
        File.WriteAllText(road, """{"type":"FeatureCollection","features":[{"type":"Feature","properties":{},"geometry":{"type":"LineString","coordinates":[[-100,40],[-100.01,40.01]]}}]}""");
        var (code, _, errors) = Check("dem = \"DEM\"\nvertical_unit = \"m\"", $"file = \"{road}\"");
        Assert.Equal(2, code);
        Assert.Contains("outside the terrain model", errors, StringComparison.Ordinal);
        Assert.Contains("430567", errors, StringComparison.Ordinal); // western edge as gdalinfo prints it
    }

    [Fact]
    public void AGoodProjectPassesTheCheckAndNothingIsWritten()
    {
        var (code, output, errors) = Check("dem = \"DEM\"\nvertical_unit = \"m\"", "file = \"ROAD\"");
        Assert.Equal(0, code);
        Assert.Equal("", errors);
        Assert.Contains("260 x 268 cells", output, StringComparison.Ordinal);
    }

    [Fact]
    public void AMissingProjectFileAndAWrongCommandSayWhatToDo()
    {
        var missing = Geoculvert.Run("run", "nothing.toml");
        Assert.Equal(2, missing.Code);
        Assert.Contains("geoculvert new", missing.Errors, StringComparison.Ordinal);
        var wrong = Geoculvert.Run("rnu", "x");
        Assert.Equal(2, wrong.Code);
        Assert.Contains("--help", wrong.Errors, StringComparison.Ordinal);
    }

    private static (int Code, string Output, string Errors) Check(string terrain, string road)
    {
        var folder = Geoculvert.NewFolder();
        var project = Path.Combine(folder, "project.toml");
        File.WriteAllText(project, string.Create(CultureInfo.InvariantCulture, $"""
            [terrain]
            {terrain}
            [[road]]
            {road}
            [rainfall]
            table = "{Path.Combine(RedButte, "rain.csv")}"
            [flow]
            runoff_coefficient = 0.3
            """).Replace("\"DEM\"", $"\"{Path.Combine(RedButte, "red_butte_dem.tif")}\"", StringComparison.Ordinal)
            .Replace("\"ROAD\"", $"\"{Path.Combine(RedButte, "red_butte_road.geojson")}\"", StringComparison.Ordinal));
        return Geoculvert.Run("check", project);
    }
}
