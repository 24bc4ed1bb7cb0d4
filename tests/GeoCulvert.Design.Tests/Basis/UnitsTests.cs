using GeoCulvert.Design.Basis;

namespace GeoCulvert.Design.Tests.Basis;

public class UnitsTests
{
    // NIST SP 811 (2008), appendix B.8: foot 3.048 E-01 m, acre (international) from 43 560 ft2 = 4.046 856 E+03 m2,
    // square mile 2.589 988 E+06 m2, cubic foot per second 2.831 685 E-02 m3/s, inch 2.54 E-02 m.
    [Theory]
    [InlineData("1 ft", "length", 0.3048, 1e-12)]
    [InlineData("24 in", "length", 0.6096, 1e-12)]
    [InlineData("1 ac", "area", 4046.856, 1e-6)]
    [InlineData("1 mi2", "area", 2.589988e6, 1e-6)]
    [InlineData("1 cfs", "flow", 2.831685e-2, 1e-6)]
    [InlineData("1.5 ft/s", "velocity", 0.4572, 1e-12)]
    [InlineData("1e1 ha", "area", 1e5, 1e-12)]
    [InlineData("2 %", "slope", 0.02, 1e-12)]
    [InlineData(" -3.5m ", "length", -3.5, 1e-12)]
    public void ReadsQuantities(string text, string dimension, double si, double relative) =>
        Assert.Equal(si, Units.Parse(text, dimension, "here"), Math.Abs(si) * relative);

    [Theory]
    [InlineData("5", "bare number")]
    [InlineData("5 furlongs", "furlongs")]
    [InlineData("5 ha", "an area")]
    [InlineData("m", "'m'")]
    [InlineData("", "''")]
    [InlineData("nan m", "'nan m'")]
    public void SaysWhatIsWrong(string text, string says)
    {
        var problem = Assert.Single(Assert.Throws<InputException>(() => Units.Parse(text, "length", "p.toml line 3, width")).Problems);
        Assert.Equal("p.toml line 3, width", problem.Place);
        Assert.Contains(says, problem.Found, StringComparison.Ordinal);
        Assert.Contains("0.6 m", problem.Expected, StringComparison.Ordinal);
    }
}
