using System.Text.Json;

namespace GeoCulvert.Cli.Tests.Commands;

/// <summary>rate and size: the names scripts rely on, units, published answers, error texts.</summary>
public class SingleCulvertTests
{
    private static readonly string[] Box =
        ["--shape", "box", "--span", "5 ft", "--rise", "2 ft", "--inlet", "hds5-8-1", "--length", "100 ft", "--inlet-elevation", "100 ft", "--outlet-elevation", "100 ft"];

    [Fact]
    public void ThePrintedChartExampleComesOut()
    {
        // FHWA HDS-5 2nd ed., chart 8B: box 5 x 2 ft, 75 cfs, 30-75 deg flares: HW/D = 1.75, read off a chart (10 %).
        var result = Results(["rate", .. Box, "--flow", "75 cfs", "--json", "--units", "us"])[0];
        Assert.Equal(1.75, result.GetProperty("inlet_control_headwater_ft").GetDouble() / 2, 0.175);
        Assert.Equal(75, result.GetProperty("flow_cfs").GetDouble(), 1e-9);
    }

    [Fact]
    public void TheNamesAreThoseOfTheContract()
    {
        var result = Results(["rate", .. Box, "--flow", "2 m3/s", "--json"])[0];
        foreach (var name in new[]
        {
            "flow_m3_s", "inlet_control_headwater_m", "outlet_control_headwater_m", "control", "headwater_m", "headwater_elevation_m", "critical_depth_m", "normal_depth_m",
            "outlet_depth_m", "outlet_velocity_m_s", "profile", "barrel_flow_m3_s", "road_flow_m3_s", "shorthand_outlet_headwater_m", "findings",
        })
            Assert.True(result.TryGetProperty(name, out _), name);
        Assert.Equal(JsonValueKind.Null, result.GetProperty("normal_depth_m").ValueKind); // level barrel: no normal depth
        Assert.Equal(
            result.GetProperty("headwater_m").GetDouble(),
            Math.Max(result.GetProperty("inlet_control_headwater_m").GetDouble(), result.GetProperty("outlet_control_headwater_m").GetDouble()), 1e-12);
        Assert.Equal(result.GetProperty("headwater_elevation_m").GetDouble(), 30.48 + result.GetProperty("headwater_m").GetDouble(), 1e-9);
    }

    [Fact]
    public void BothUnitSystemsGiveTheSameCulvert()
    {
        var si = Results(["rate", .. Box, "--flow", "2 m3/s", "--json"])[0];
        var us = Results(["rate", .. Box, "--flow", "70.6293334429 cfs", "--json", "--units", "us"])[0]; // 2 / 0.3048^3
        Assert.Equal(si.GetProperty("headwater_m").GetDouble(), us.GetProperty("headwater_ft").GetDouble() * 0.3048, 1e-8);
        Assert.Equal(si.GetProperty("outlet_velocity_m_s").GetDouble(), us.GetProperty("outlet_velocity_ft_s").GetDouble() * 0.3048, 1e-8);
    }

    [Fact]
    public void AFlowRangeGivesARisingRating()
    {
        var results = Results(["rate", .. Box, "--flow-range", "0 cfs", "150 cfs", "16", "--json", "--road-elevation", "104 ft", "--road-length", "100 ft"]);
        Assert.Equal(16, results.Length);
        var heads = results.Select(r => r.GetProperty("headwater_m").GetDouble()).ToArray();
        Assert.All(heads.Zip(heads.Skip(1)), p => Assert.True(p.Second > p.First - 1e-9));
        Assert.True(results[^1].GetProperty("road_flow_m3_s").GetDouble() > 0);
        Assert.All(results, r => Assert.Equal(
            r.GetProperty("flow_m3_s").GetDouble(), r.GetProperty("barrel_flow_m3_s").GetDouble() + r.GetProperty("road_flow_m3_s").GetDouble(), 1e-9));
    }

    [Fact]
    public void SizingMeetsItsCriteriaWhenRatedAgain()
    {
        var size = Geoculvert.Run("size", "--shape", "circle", "--flow", "3 m3/s", "--length", "30 m", "--inlet-elevation", "50 m", "--outlet-elevation", "49.7 m", "--hw-over-d", "1.2", "--headwater-limit", "51.6 m", "--json");
        Assert.Equal(0, size.Code);
        using var json = JsonDocument.Parse(size.Output);
        var r = json.RootElement.GetProperty("results")[0];
        var again = Results(["rate", "--shape", "circle", "--diameter", $"{r.GetProperty("rise_m").GetDouble():R} m", "--barrels", $"{r.GetProperty("barrels").GetInt32()}", "--flow", "3 m3/s", "--length", "30 m", "--inlet-elevation", "50 m", "--outlet-elevation", "49.7 m", "--json"])[0];
        Assert.Equal(r.GetProperty("headwater_m").GetDouble(), again.GetProperty("headwater_m").GetDouble(), 1e-9);
        Assert.True(again.GetProperty("headwater_m").GetDouble() / r.GetProperty("rise_m").GetDouble() <= 1.2);
        Assert.True(again.GetProperty("headwater_elevation_m").GetDouble() <= 51.6);
    }

    [Fact]
    public void NothingFitsIsSaidWithTheClosest()
    {
        var (code, output, _) = Geoculvert.Run("size", "--shape", "circle", "--flow", "500 m3/s", "--length", "30 m", "--inlet-elevation", "50 m", "--outlet-elevation", "49.7 m");
        Assert.Equal(3, code);
        Assert.Contains("No size fits", output, StringComparison.Ordinal);
        Assert.Contains("BROKEN", output, StringComparison.Ordinal);
    }

    [Fact]
    public void ThePlotIsASvgWithAxes()
    {
        var file = Path.Combine(Geoculvert.NewFolder(), "r.svg");
        var (code, _, errors) = Geoculvert.Run(["rate", .. Box, "--flow", "75 cfs", "--plot", file]);
        Assert.True(code == 0, errors);
        var svg = System.Xml.Linq.XDocument.Load(file);
        Assert.Equal("svg", svg.Root!.Name.LocalName);
        Assert.Contains("Flow", svg.ToString(), StringComparison.Ordinal);
    }

    [Theory]
    [InlineData("--flow", "75", "bare number")]
    [InlineData("--flow", "75 acres", "75 acres")]
    [InlineData("--inlet", "hds5-8-9", "hds5-8-1")]
    [InlineData("--inlet", "hds5-1-1", "an inlet of a circle")]
    [InlineData("--roughness", "3", "0.005 to 0.1")]
    [InlineData("--barrels", "1.5", "whole number")]
    [InlineData("--road-elevation", "104 ft", "both --road-elevation and --road-length")]
    public void WrongOptionsSayWhatWasExpected(string option, string value, string says)
    {
        string[] flow = option == "--flow" ? [] : ["--flow", "75 cfs"];
        var box = option == "--inlet" ? Box.Where((_, i) => i is not (6 or 7)).ToArray() : Box;
        var (code, output, errors) = Geoculvert.Run(["rate", .. box, .. flow, option, value]);
        Assert.Equal(2, code);
        Assert.Equal("", output);
        Assert.Contains(says, errors, StringComparison.Ordinal);
    }

    private static JsonElement[] Results(string[] arguments)
    {
        var (code, output, errors) = Geoculvert.Run(arguments);
        Assert.True(code == 0, errors);
        return [.. JsonDocument.Parse(output).RootElement.GetProperty("results").EnumerateArray()];
    }
}
