using NetTopologySuite.Geometries;

namespace GeoCulvert.Layers.Tests;

public class CrsTests
{
    [Fact]
    public void CoordinatesMoveAsPyprojDoes()
    {
        using var utm = Crs.Parse("EPSG:26912");
        using var wgs84 = Crs.Parse("EPSG:4326");
        using var transform = new CrsTransform(utm, wgs84);
        double[] x = [431985], y = [4514642];
        transform.Apply(x, y);
        // python3-gdal: osr.CoordinateTransformation, traditional axis order
        Assert.Equal(-111.8060460777362, x[0], 1e-9);
        Assert.Equal(40.77994650746477, y[0], 1e-9);
        var line = (LineString)transform.Apply(new LineString([new CoordinateZ(431985, 4514642, 7), new CoordinateZ(432000, 4514700, 8)]));
        Assert.Equal(8, line.GetCoordinateN(1).Z);
    }

    [Theory]
    [InlineData(-111.8, 40.8, "EPSG:32612")]
    [InlineData(-180, 10, "EPSG:32601")]
    [InlineData(179.999, -10, "EPSG:32760")]
    [InlineData(6, 0, "EPSG:32632")]
    public void TheUtmZoneOfAPlace(double longitude, double latitude, string code) => Assert.Equal(code, Crs.UtmFor(longitude, latitude).Code);

    [Fact]
    public void AWrongTextIsSaidInGdalsWords() => Assert.Contains("EPSG:999999", Assert.Throws<GdalException>(() => Crs.Parse("EPSG:999999")).Message, StringComparison.Ordinal);

    [Fact]
    public void WhereGdalIsMissingOneSentenceSaysHowToInstallIt()
    {
        var message = new GdalMissingException("libgdal.so.32").Message;
        Assert.Contains("apt-get install", message, StringComparison.Ordinal);
        Assert.Contains("GEOCULVERT_GDAL", message, StringComparison.Ordinal);
    }

    [Fact]
    public void GdalSaysItsVersion() => Assert.Matches(@"^\d+\.\d+", Gdal.Version);
}
