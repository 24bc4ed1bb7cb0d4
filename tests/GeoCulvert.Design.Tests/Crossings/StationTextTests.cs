using GeoCulvert.Design.Basis;
using GeoCulvert.Design.Crossings;

namespace GeoCulvert.Design.Tests.Crossings;

public class StationTextTests
{
    // Rounding and notation by hand; 3 763.7 m = 12 348.1 ft at 0.3048 m.
    [Theory]
    [InlineData(12340.2, UnitSystem.Si, "12+340")]
    [InlineData(0, UnitSystem.Si, "0+000")]
    [InlineData(999.6, UnitSystem.Si, "1+000")]
    [InlineData(-5, UnitSystem.Si, "-0+005")]
    [InlineData(3763.7, UnitSystem.Us, "123+48")]
    [InlineData(1, UnitSystem.Us, "0+03")]
    public void IsWrittenAsAlongARoad(double stationM, UnitSystem system, string text) => Assert.Equal(text, StationText.Of(stationM, system));
}
