using GeoCulvert.Design.Basis;
using GeoCulvert.Design.Hydrology;

namespace GeoCulvert.Design.Tests.Hydrology;

public class WorkedExamplesOracleTests
{
    private static readonly PeakFlowContext NoRain = new();

    public static TheoryData<string> Cases() => [.. Oracle.Table("worked_examples.csv").Rows.Select(r => r.Text("case"))];

    [Theory]
    [MemberData(nameof(Cases))]
    public void ReproducesThePublishedAnswer(string id)
    {
        var row = Oracle.Table("worked_examples.csv").Rows.Single(r => r.Text("case") == id);
        var parts = row.Text("inputs").Split(';', StringSplitOptions.TrimEntries);
        var got = row.Text("kind") switch
        {
            "composite" => RunoffCoefficientTable.Weigh([.. parts.Select(p => p.Split(' ')).Select(p => (double.Parse(p[2]), double.Parse(p[0])))]),
            "rational" => Rational(parts, customary: false),
            "rational-customary" => Units.FromSi(Rational(parts, customary: true), "cfs"),
            "regression" => Regression(parts),
            "sheet" => NrcsVelocityMethod.SheetTimeMin(Si(parts[1]), Si(parts[0]), 1000 * Si(parts[2]), Si(parts[3])) / 60,
            "shallow" => Si(parts[1]) / NrcsVelocityMethod.ShallowVelocityMPerS(Si(parts[0]), Si(parts[2])) / 3600,
            "channel" => NrcsVelocityMethod.ChannelVelocityMPerS(Si(parts[0]) / Si(parts[1]), Si(parts[3]), Si(parts[2])) / Units.Foot,
            "velocity-method" => Tr55Example31().TimeMin!.Value / 60,
            var kind => throw new InvalidOperationException(kind),
        };
        Assert.Equal(row.Number("expected"), got, row.Number("tolerance"));
    }

    // HEC-22 Ex 4.3 prints 89 m3/s for the proposed state in SI: a slip of two places. It must not be reproduced.
    [Fact]
    public void DoesNotReproduceTheMisprint()
    {
        var flow = Rational(["C 0.315", "i 2.3 in/h", "A 43.3 ac"], customary: false);
        Assert.InRange(flow, 0.88, 0.90);
        Assert.NotInRange(flow, 80, 100);
    }

    // 1 in/h on 1 acre is 43560/43200 = 1.00833 cfs: the customary constant of 1 reads that much lower than the exact one.
    [Fact]
    public void CustomaryAndExactConstantsDifferByTheKnownFactor()
    {
        string[] parts = ["C 0.5", "i 2.0 in/h", "A 100 ac"];
        Assert.Equal(43560.0 / 43200, Rational(parts, customary: false) / Rational(parts, customary: true), 1e-5);
    }

    [Fact]
    public void VelocityMethodListsItsSegmentsInOrder()
    {
        var tc = Tr55Example31();
        Assert.Equal(["sheet", "shallow", "channel"], tc.Segments.Select(s => s.Kind).Distinct());
        Assert.Equal(0, tc.Segments[0].FromM);
        for (var i = 1; i < tc.Segments.Count; i++) Assert.Equal(tc.Segments[i - 1].ToM, tc.Segments[i].FromM, 1e-9);
        Assert.Equal(8800 * Units.Foot, tc.Segments[^1].ToM, 1e-6);
        Assert.Equal(tc.TimeMin!.Value, tc.Segments.Sum(s => s.TimeMin), 1e-9);
        Assert.Empty(tc.Findings);
    }

    private static double Rational(string[] parts, bool customary)
    {
        var catchment = new Catchment("x", Si(parts[2])) { RunoffCoefficient = new(Si(parts[0]), "given") };
        var context = NoRain with { GivenIntensityMmPerH = Units.FromSi(Si(parts[1]), "mm/h") };
        return new RationalMethod { CustomaryConstant = customary }.Compute(catchment, 10, context).FlowM3PerS!.Value;
    }

    private static double Regression(string[] parts)
    {
        var set = RegressionEquationCsv.Published.Single(s => s.Id == parts[0]);
        var catchment = new Catchment("x", Si(parts[2])) { MeanBasinSlopeMPerM = Si(parts[3]) };
        return Units.FromSi(new RegressionMethod(set, set.Regions[0]).Compute(catchment, Si(parts[1]), NoRain).FlowM3PerS!.Value, "cfs");
    }

    private static TimeOfConcentration Tr55Example31()
    {
        double ft = Units.Foot, top = 100;
        var catchment = new Catchment("x", 1e6)
        {
            FlowPath =
            [
                new(0, top, "dense-grass"), new(100 * ft, top - 1 * ft, "unpaved-way"),
                new(1500 * ft, top - 15 * ft, "unpaved-way"), new(8800 * ft, top - 51.5 * ft),
            ],
            ChannelBeginsAtM = 1500 * ft,
            Channel = new(27 / 28.2 * ft, 0.05),
        };
        var surfaces = FlowSurfaces.From(
            PublishedTable.Parse("cover.csv", "cover_id,name,n_overland,shallow_flow,source,locator\ndense-grass,Dense grass,0.24,u,,\nunpaved-way,Unpaved,0.05,u,,\n"),
            PublishedTable.Parse("shallow.csv", "id,name,velocity_coefficient_ft_per_s,sheet_n,source,locator\nu,Unpaved,16.1345,,,\n"));
        return new NrcsVelocityMethod { SheetLengthLimitM = 100 * ft, DefaultSurface = "dense-grass", Surfaces = surfaces }
            .Compute(catchment, new(TwoYear24HourDepthMm: 3.6 * 25.4));
    }

    // "A 43.3 ac" -> SI; a figure without a unit as it is.
    private static double Si(string part)
    {
        var words = part.Split(' ');
        return words.Length == 2 ? double.Parse(words[1]) : Units.ToSi(double.Parse(words[1]), words[2]);
    }
}
