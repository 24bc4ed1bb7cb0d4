using System.Globalization;
using GeoCulvert.Design.Basis;
using GeoCulvert.Design.Terrain;

namespace GeoCulvert.Layers.Tests;

/// <summary>How true to size planes are, against PROJ's factors (Data/make_plane_scales.py), and which plane is worked in.</summary>
public class PlaneScaleTests
{
    public static TheoryData<int, double, double, double, double, double> Places()
    {
        var data = new TheoryData<int, double, double, double, double, double>();
        foreach (var line in File.ReadAllLines(Files.Data("plane_scales.csv")).Skip(1))
        {
            var v = line.Split(',').Select(t => double.Parse(t, CultureInfo.InvariantCulture)).ToArray();
            data.Add((int)v[0], v[1], v[2], v[5], v[6], v[7]);
        }

        return data;
    }

    [Theory]
    [MemberData(nameof(Places))]
    public void TheScaleOfAPlaneIsThatOfProj(int epsg, double x, double y, double areal, double most, double least)
    {
        using var crs = Crs.Parse($"EPSG:{epsg}");
        double xM = x * crs.LinearUnitM, yM = y * crs.LinearUnitM;
        var scale = ScaleOfPlane.Over(new GridFrame(300, 300, xM - 21_000, yM + 13_000, 100, 100), crs)!; // not centred: the place lies between nodes
        Assert.Equal(areal, 1 / scale.AreaRatioAt(xM, yM), 4e-6 * areal);
        var (longest, shortest) = scale.At(xM, yM).LengthRatios;
        Assert.Equal(most, 1 / shortest, 4e-6 * most);
        Assert.Equal(least, 1 / longest, 4e-6 * least);
    }

    [Fact]
    public void APlaceWithoutLongitudeHasNoScale()
    {
        using var utm = Crs.Parse("EPSG:32612");
        Assert.Null(ScaleOfPlane.Over(new GridFrame(2, 2, 4e8, 4e8, 1e8, 1e8), utm));
    }

    [Fact]
    public void WebMercatorIsLeftForUtmAndSaid()
    {
        // The third row of plane_scales.csv: areas twice as large at 45 degrees.
        using var source = RasterSource.Open(Files.Raster(Files.NewFolder(), "a", Plane(9), "EPSG:3857", 100, -12323067, 5626245));
        var model = ElevationReader.Read(source, new ElevationOptions(VerticalUnitM: 1));
        Assert.Equal("EPSG:32612", model.Plane.Crs.Code);
        var finding = Assert.Single(model.Findings, f => f.Code == "plane-left");
        Assert.InRange(finding.Value!.Value, 1.00, 1.01);
        Assert.InRange(model.Elevation.Frame.CellWidthM, 65, 76); // 100 m / 1.41, by the warp's own rule
    }

    [Fact]
    public void ANamedPlaneThatIsFarFromTrueIsRefused()
    {
        using var source = RasterSource.Open(Files.Raster(Files.NewFolder(), "a", Plane(9), "EPSG:4326", 0.001, -110.7, 45));
        using var mercator = Crs.Parse("EPSG:3857");
        var problem = Assert.Throws<InputException>(() => ElevationReader.Read(source, new ElevationOptions(WorkingCrs: mercator, VerticalUnitM: 1))).Problems.Single();
        Assert.Equal("[terrain] working_crs", problem.Place);
        Assert.Contains("lengths by up to 41.", problem.Found, StringComparison.Ordinal);
    }

    [Theory]
    [InlineData(523632, 0.0007861, false)] // plane_scales.csv: 1 - 0.999213888551
    [InlineData(1041073, 0.006428929949, true)] // beyond the zone's edge
    public void APlaneSomewhatOffIsWorkedInAndSaid(double x, double error, bool isSaid)
    {
        using var source = RasterSource.Open(Files.Raster(Files.NewFolder(), "a", Plane(9), "EPSG:32612", 10, x, x > 1e6 ? 4000636 : 4986327));
        var model = ElevationReader.Read(source, new ElevationOptions(VerticalUnitM: 1));
        Assert.Equal("EPSG:32612", model.Plane.Crs.Code);
        Assert.False(model.Scale.IsNone);
        Assert.Equal(error, model.Scale.LargestAreaErrorShare, 1e-5);
        Assert.Equal(isSaid, model.Findings.Any(f => f.Code == "plane-off"));
    }

    [Fact]
    public void APlaneThatIsTrueIsTakenAsItIs()
    {
        // EPSG:2056 at its middle: 1.000007 in plane_scales.csv.
        using var source = RasterSource.Open(Files.Raster(Files.NewFolder(), "a", Plane(9), "EPSG:2056", 10, 2665674, 1183419));
        Assert.True(ElevationReader.Read(source, new ElevationOptions(VerticalUnitM: 1)).Scale.IsNone);
    }

    [Theory]
    [InlineData(0, 85, "EPSG:5041")] // UTM ends at 84 degrees north and 80 south
    [InlineData(0, -81, "EPSG:5042")]
    [InlineData(181, 10, "EPSG:32601")] // 179 degrees west
    public void PlacesBeyondUtm(double longitude, double latitude, string code)
    {
        using var crs = Crs.UtmFor(longitude, latitude);
        Assert.Equal(code, crs.Code);
    }

    private static string Plane(int n) => string.Join('\n', Enumerable.Range(0, n).Select(r => string.Join(' ', Enumerable.Range(0, n).Select(c => 100 + r + c))));
}
