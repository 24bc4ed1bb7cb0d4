using GeoCulvert.Design.Basis;
using GeoCulvert.Design.Hydrology;

namespace GeoCulvert.Design.Tests.Hydrology;

public class GivenFlowsOracleTests
{
    private static double? Flow(GivenFlows given, string id, double t) => given.Compute(new(id, 1), t, new()).FlowM3PerS;

    [Fact]
    public void OwnRowsGoBeforeThoseForAll()
    {
        var given = GivenFlows.Read("f.csv", "crossing_id,return_period_yr,flow_cfs\n*,10,100\n*,100,200\nC-1,10,50\n");
        Assert.Equal(50 * 0.0283168, Flow(given, "C-1", 10)!.Value, 1e-5); // 1 cfs = 0.028316847 m3/s, NIST SP 811
        Assert.Equal(100 * 0.0283168, Flow(given, "C-2", 10)!.Value, 1e-5);
        Assert.Null(Flow(given, "C-1", 100));
    }

    // Standard normal table: z(0.90) = 1.28155, z(0.96) = 1.75069, z(0.98) = 2.05375. Between 10 yr (1 m3/s) and 50 yr (3 m3/s):
    // weight (1.75069 - 1.28155)/(2.05375 - 1.28155) = 0.60753; ln Q = 0.60753 ln 3 = 0.66744; Q = 1.9492 m3/s.
    [Fact]
    public void InterpolatesInNormalDeviateAndFlags()
    {
        var given = GivenFlows.Read("f.csv", "crossing_id,return_period_yr,flow_m3_s\n*,10,1\n*,50,3\n");
        var flow = given.Compute(new("x", 1), 25, new());
        Assert.Equal(1.9492, flow.FlowM3PerS!.Value, 0.0002);
        Assert.Equal(HydrologyFindings.FlowInterpolated, Assert.Single(flow.Findings).Kind);
    }

    [Theory]
    [InlineData(9.9)]
    [InlineData(51)]
    [InlineData(1)]
    public void NeverExtrapolates(double years)
    {
        var flow = GivenFlows.Read("f.csv", "crossing_id,return_period_yr,flow_m3_s\n*,10,1\n*,50,3\n").Compute(new("x", 1), years, new());
        Assert.Null(flow.FlowM3PerS);
        Assert.Equal(HydrologyFindings.FlowBeyondSource, Assert.Single(flow.Findings).Kind);
    }

    [Theory]
    [InlineData("", "f.csv", "empty", "heading")]
    [InlineData("crossing_id,flow_m3_s\nA,1\n", "f.csv line 1", "crossing_id, flow_m3_s", "return_period_yr")]
    [InlineData("crossing_id,return_period_yr,flow\nA,2,1\n", "f.csv line 1", "flow", "flow_m3_s or flow_cfs")]
    [InlineData("crossing_id,return_period_yr,flow_m3_s,flow_cfs\nA,2,1,1\n", "f.csv line 1", "both", "one column")]
    [InlineData("crossing_id,return_period_yr,flow_m3_s\nA,two,1\n", "f.csv line 2, column return_period_yr", "'two'", "a number")]
    [InlineData("crossing_id,return_period_yr,flow_m3_s\nA,2,1\nA,0.5,1\n", "f.csv line 3, column return_period_yr", "0.5", "1 year or more")]
    [InlineData("crossing_id,return_period_yr,flow_m3_s\nA,2,-1\n", "f.csv line 2, column flow_m3_s", "-1", "above zero")]
    [InlineData("crossing_id,return_period_yr,flow_m3_s\nA,2,\n", "f.csv line 2, column flow_m3_s", "nothing", "a number")]
    [InlineData("crossing_id,return_period_yr,flow_m3_s\nA,2,NaN\n", "f.csv line 2, column flow_m3_s", "'NaN'", "a number")]
    [InlineData("crossing_id,return_period_yr,flow_m3_s\n,2,1\n", "f.csv line 2, column crossing_id", "nothing", "* for all")]
    [InlineData("crossing_id,return_period_yr,flow_m3_s\nA,2,1\nA,2,3\n", "f.csv line 3", "after line 2", "once")]
    [InlineData("crossing_id,return_period_yr,flow_m3_s\n", "f.csv", "no flows", "*,25,4.8")]
    public void SaysWhatIsWrong(string text, string place, string found, string expected)
    {
        var problem = Assert.Single(Assert.Throws<InputException>(() => GivenFlows.Read("f.csv", text)).Problems);
        Assert.Equal(place, problem.Place);
        Assert.Contains(found, problem.Found, StringComparison.Ordinal);
        Assert.Contains(expected, problem.Expected, StringComparison.Ordinal);
    }

    [Fact]
    public void CollectsAllProblems() => Assert.Equal(2, Assert.Throws<InputException>(() =>
        GivenFlows.Read("f.csv", "crossing_id,return_period_yr,flow_m3_s\nA,2,x\nA,10,1\nA,y,1\n")).Problems.Count);
}
