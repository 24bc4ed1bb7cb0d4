using GeoCulvert.Design.Basis;
using GeoCulvert.Design.Study;

namespace GeoCulvert.Design.Tests.Study;

public class OverridesTests
{
    [Fact]
    public void ReadsUnitsFromTheHeadings()
    {
        var overrides = Overrides.Read("o.csv", "crossing_id,length_ft,runoff_coefficient,design_flow_cfs,note\nA 1,100,,20,surveyed\nB,,0.4,,\n");
        Assert.Equal(30.48, overrides.Of("A 1", "length")!.Value, 1e-12);
        Assert.Equal(20 * 0.028316846592, overrides.Of("A 1", "design_flow")!.Value, 1e-12); // 0.3048 cubed, NIST SP 811
        Assert.Null(overrides.Of("A 1", "runoff_coefficient"));
        Assert.Equal(0.4, overrides.Of("B", "runoff_coefficient"));
        Assert.Null(overrides.Of("C", "length"));
    }

    [Fact]
    public void SaysEverythingThatIsWrong()
    {
        var e = Assert.Throws<InputException>(() => Overrides.Read("o.csv", "crossing_id,length,lenght_m,road_elevation_m\nA,1,2,high\nA,1,2,3\n,1,1,1\n"));
        Assert.Equal(5, e.Problems.Count);
        Assert.Contains(e.Problems, p => p.Found.Contains("lenght_m", StringComparison.Ordinal));
        Assert.Contains(e.Problems, p => p.Found.EndsWith("column length", StringComparison.Ordinal)); // no unit
        Assert.Contains(e.Problems, p => p.Place.Contains("line 2", StringComparison.Ordinal) && p.Found == "'high'");
        Assert.Contains(e.Problems, p => p.Place.Contains("line 3", StringComparison.Ordinal) && p.Found.Contains("second time", StringComparison.Ordinal));
        Assert.Contains(e.Problems, p => p.Place.Contains("line 4", StringComparison.Ordinal));
    }
}
