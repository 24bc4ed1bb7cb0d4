using GeoCulvert.Design.Basis;
using GeoCulvert.Design.Hydrology;

namespace GeoCulvert.Design.Tests.Hydrology;

public class RegressionOracleTests
{
    private const string Columns = "record,set,region,return_period_yr,name,quantity,unit,low,high,equation,standard_error_pct,description,status,source,locator,note\n";

    private static readonly string Small = Columns
        + "variable,s,,,A,area,mi2,1,100,,,drainage area,,,,\nvariable,s,,,P,,in,10,60,,,rain,,,,\nequation,s,North,10,,,cfs,,,100 * A^0.5 * P,40,,,r,,\n"
        + "equation,s,North,100,,,cfs,,,200 * A^0.5 * P,,,,r,,\n";

    private static Catchment Basin(double miles2, double inches) => new("x", Units.ToSi(miles2, "mi2"))
    {
        Characteristics = new Dictionary<string, Characteristic> { ["P"] = new(inches, "in") },
    };

    private static RegressionMethod North => new(RegressionEquationCsv.Read("e.csv", Small)[0], "North");

    public static TheoryData<string, double> Pennsylvania() =>
        new(Oracle.Table("pa_coefficients.csv").Rows.Select(r => new TheoryDataRow<string, double>(r.Text("region"), r.Number("return_period_yr"))));

    // The equations of the embedded table against the coefficients as listed, by sums of logarithms instead of the equation text.
    [Theory]
    [MemberData(nameof(Pennsylvania))]
    public void PennsylvaniaEquationsHoldTheirCoefficients(string region, double years)
    {
        var row = Oracle.Table("pa_coefficients.csv").Rows.Single(r => r.Text("region") == region && r.Number("return_period_yr") == years);
        double da = 7.3, el = 1450, c = 12, u = 8, sto = 3.5;
        var log = row.Number("log10_constant") + row.Number("DA") * Math.Log10(da) + row.Number("El") * Math.Log10(el)
            + row.Number("C") * Math.Log10(1 + 0.1 * c) + row.Number("U") * Math.Log10(1 + 0.1 * u) + row.Number("Sto") * Math.Log10(1 + 0.1 * sto);
        var basin = new Catchment("x", Units.ToSi(da, "mi2"))
        {
            Characteristics = new Dictionary<string, Characteristic> { ["El"] = new(el, "ft"), ["C"] = new(c, "%"), ["U"] = new(u, "%"), ["Sto"] = new(sto, "%") },
        };
        var set = RegressionEquationCsv.Published.Single(s => s.Id == "sir2008-5102");
        var flow = new RegressionMethod(set, region).Compute(basin, years, new()).FlowM3PerS!.Value;
        Assert.Equal(Math.Pow(10, log), Units.FromSi(flow, "cfs"), 1e-9 * Math.Pow(10, log));
    }

    [Theory]
    [InlineData("39.5 * A^0.706 * (S + 1.0)^1.577", 39.5 * 5.081594 * 1.155029)] // A = 10, S = 0.0957: 10^0.706 = 5.08159, 1.0957^1.577 = 1.15503
    [InlineData("2 + 3 * 2^3^2", 1538)]
    [InlineData("-2^2", -4)]
    [InlineData("2^-1 * 8 / 2 - 1", 1)]
    [InlineData("10^(1 + 0.5*2) * (1 - 0.5)^(2 * 0.5)", 50)]
    [InlineData("log10(1e3) + ln(exp(2)) + 1.5e-1", 5.15)]
    [InlineData(" ( A ) ", 10)]
    public void EquationsFollowTheRulesOfArithmetic(string text, double expected)
    {
        var values = new Dictionary<string, double> { ["A"] = 10, ["S"] = 0.0957 };
        Assert.Equal(expected, EquationText.Parse(text, "e").Value(values), Math.Abs(expected) * 1e-5);
    }

    [Fact]
    public void NumbersArePutIntoTheEquation() => Assert.Equal("2 * 10^0.5 * (1 + (-0.5))^2e1 * ln(10)",
        EquationText.Parse("2 * A^0.5 * (1 + S)^2e1 * ln(A)", "e").WithNumbers(new Dictionary<string, double> { ["A"] = 10, ["S"] = -0.5 }));

    // By hand: 100 x 25^0.5 x 30 = 15 000 cfs. SE 40 %: sigma = (ln 1.16)^0.5 = 0.385253; 90 %: z = 1.644854; factor exp(0.633685) = 1.88454.
    [Fact]
    public void IntervalFollowsFromTheStandardError()
    {
        var flow = North.Compute(Basin(25, 30), 10, new());
        Assert.Equal(15000, Units.FromSi(flow.FlowM3PerS!.Value, "cfs"), 1e-6 * 15000);
        Assert.Equal(15000 * 1.88454, Units.FromSi(flow.UpperM3PerS!.Value, "cfs"), 1e-4 * 15000);
        Assert.Equal(15000 / 1.88454, Units.FromSi(flow.LowerM3PerS!.Value, "cfs"), 1e-4 * 15000);
        Assert.Empty(flow.Findings);
        Assert.Null(North.Compute(Basin(25, 30), 100, new()).LowerM3PerS);
    }

    [Fact]
    public void OutsideTheRangeIsComputedAndFlagged()
    {
        var flow = North.Compute(Basin(400, 5), 10, new());
        Assert.Equal(10000, Units.FromSi(flow.FlowM3PerS!.Value, "cfs"), 0.01);
        Assert.Equal(2, flow.Findings.Count(f => f.Kind == HydrologyFindings.RegressionRange));
    }

    [Fact]
    public void BetweenReturnPeriodsIsFlaggedAndOutsideThereIsNone()
    {
        var between = North.Compute(Basin(25, 30), 25, new());
        Assert.InRange(Units.FromSi(between.FlowM3PerS!.Value, "cfs"), 15000, 30000);
        Assert.Null(between.LowerM3PerS);
        Assert.Contains(between.Findings, f => f.Kind == HydrologyFindings.FlowInterpolated);
        Assert.Null(North.Compute(Basin(25, 30), 500, new()).FlowM3PerS);
        Assert.Null(North.Compute(Basin(25, 30), 2, new()).FlowM3PerS);
    }

    [Fact]
    public void UnitsOfNamedFiguresAreConvertedOrRefused()
    {
        PeakFlow With(Characteristic p) => North.Compute(Basin(25, 0) with { Characteristics = new Dictionary<string, Characteristic> { ["P"] = p } }, 10, new());
        Assert.Equal(15000, Units.FromSi(With(new(762, "mm")).FlowM3PerS!.Value, "cfs"), 0.01);
        foreach (var bad in new Characteristic[] { new(30, ""), new(30, "ha"), new(double.NaN, "in") })
            Assert.Equal(HydrologyFindings.InputMissing, Assert.Single(With(bad).Findings).Kind);
        Assert.Null(North.Compute(new("x", 1e6), 10, new()).FlowM3PerS);
        Assert.Null((North with { Region = "South" }).Compute(Basin(25, 30), 10, new()).FlowM3PerS);
    }

    [Theory]
    [InlineData("record,set\n", "e.csv line 1", "record, set", "equation")]
    [InlineData("COLS", "e.csv", "no rows", "equations")]
    [InlineData("COLSline,s,,,A,area,mi2,,,,,,,,,\n", "e.csv line 2, column record", "'line'", "variable or equation")]
    [InlineData("COLSvariable,s,,,A,size,mi2,,,,,,,,,\n", "e.csv line 2, column quantity", "'size'", "mean-basin-slope")]
    [InlineData("COLSvariable,s,,,A,area,mi2,,,,,,,,,\n", "e.csv, set s", "no equation", "at least one")]
    [InlineData("SMALLequation,s,North,25,,,cfs,,,3 * (A + 2,,,,,,\n", "e.csv line 6, column equation", "the end of", "closing bracket")]
    [InlineData("SMALLequation,s,North,25,,,cfs,,,3 * * A,,,,,,\n", "e.csv line 6, column equation", "'*' at character 5", "a number")]
    [InlineData("SMALLequation,s,North,25,,,cfs,,,3 A,,,,,,\n", "e.csv line 6, column equation", "'A' at character 3", "an operator")]
    [InlineData("SMALLequation,s,North,25,,,cfs,,,,,,,,,\n", "e.csv line 6, column equation", "the end", "a number")]
    [InlineData("SMALLequation,s,North,25,,,cfs,,,3 * B,,,,,,\n", "e.csv, set s, region North, 25 yr", "'B'", "A, P")]
    [InlineData("SMALLequation,s,North,25,,,mi2,,,3 * A,,,,,,\n", "e.csv, set s, region North, 25 yr", "'mi2'", "cfs or m3/s")]
    [InlineData("SMALLequation,s,North,10,,,cfs,,,3 * A,,,,,,\n", "e.csv, set s", "2 equations", "one")]
    [InlineData("SMALLequation,s,North,x,,,cfs,,,3 * A,,,,,,\n", "e.csv line 6, column return_period_yr", "'x'", "a number")]
    [InlineData("SMALLvariable,s,,,X,,furlong,,,,,,,,,\n", "e.csv, set s, variable X", "'furlong'", "mi2")]
    [InlineData("SMALLvariable,s,,,X,area,ft,,,,,,,,,\n", "e.csv, set s, variable X", "'ft'", "a unit of area")]
    [InlineData("SMALLvariable,s,,,X,,ft,9,3,,,,,,,\n", "e.csv, set s, variable X", "from 9 to 3", "smaller value first")]
    public void SaysWhatIsWrong(string text, string place, string found, string expected)
    {
        text = text.Replace("COLS", Columns, StringComparison.Ordinal).Replace("SMALL", Small, StringComparison.Ordinal);
        var problem = Assert.Single(Assert.Throws<InputException>(() => RegressionEquationCsv.Read("e.csv", text)).Problems);
        Assert.Equal(place, problem.Place);
        Assert.Contains(found, problem.Found, StringComparison.Ordinal);
        Assert.Contains(expected, problem.Expected, StringComparison.Ordinal);
    }

    [Fact]
    public void DeepNestingIsRefusedNotOverflowed() =>
        Assert.Throws<InputException>(() => EquationText.Parse(new string('(', 100_000) + "1", "e"));
}
