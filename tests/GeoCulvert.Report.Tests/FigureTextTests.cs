using GeoCulvert.Design.Basis;

namespace GeoCulvert.Report.Tests;

/// <summary>Rounding as the trade prints it; expected texts are worked by hand.</summary>
public sealed class FigureTextTests
{
    [Theory]
    [InlineData(1234.5, QuantityKind.Flow, "1230")]
    [InlineData(123.45, QuantityKind.Flow, "123")]
    [InlineData(12.345, QuantityKind.Flow, "12.3")]
    [InlineData(9.996, QuantityKind.Flow, "10.0")]
    [InlineData(999.6, QuantityKind.Flow, "1000")]
    [InlineData(0.045678, QuantityKind.Flow, "0.0457")]
    [InlineData(0, QuantityKind.Flow, "0")]
    [InlineData(18.81, QuantityKind.Area, "18.8")]
    [InlineData(1432.5678, QuantityKind.Length, "1432.57")]
    [InlineData(-0.001, QuantityKind.Length, "0.00")]
    [InlineData(-2.346, QuantityKind.Length, "-2.35")]
    [InlineData(0.01234, QuantityKind.Slope, "0.0123")]
    [InlineData(18.66, QuantityKind.Time, "18.7")]
    [InlineData(25, QuantityKind.Years, "25")]
    [InlineData(0.012, QuantityKind.None, "0.012")]
    [InlineData(1.18345, QuantityKind.None, "1.183")]
    [InlineData(75, QuantityKind.None, "75")]
    [InlineData(double.NaN, QuantityKind.Flow, "\u2013")]
    public void RoundsAsTheTradeDoes(double value, QuantityKind kind, string expected) => Assert.Equal(expected, FigureText.Round(value, kind));

    [Fact]
    public void WritesUnitsOfTheSystem()
    {
        // 1 m3/s = 35.3147 cfs; 1 m = 3.28084 ft; 1 mi2 = 2 589 988.11 m2 (international foot, exact by definition).
        Assert.Equal("35.3 cfs", FigureText.WithUnit(1, QuantityKind.Flow, UnitSystem.Us));
        Assert.Equal("3.28 ft", FigureText.WithUnit(1, QuantityKind.Length, UnitSystem.Us));
        Assert.Equal("1.00 mi\u00b2", FigureText.WithUnit(2_589_988.11, QuantityKind.Area, UnitSystem.Us));
        Assert.Equal("4.80 m\u00b3/s", FigureText.WithUnit(4.8, QuantityKind.Flow, UnitSystem.Si));
    }
}
