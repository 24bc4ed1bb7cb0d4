using CsCheck;
using GeoCulvert.Design.Basis;
using GeoCulvert.Design.Hydrology;

namespace GeoCulvert.Design.Tests.Hydrology;

public class RunoffCoefficientOracleTests
{
    private static CompositeRunoffCoefficient Of(params CoverArea[] parts) => RunoffCoefficientTable.Published.Composite(parts);

    // Rows of the published table of C by land use, soil group and slope (below 25 years, from 25 years on).
    [Theory]
    [InlineData("41", "B", 0.04, 0.11, 0.14)] // forest, B, 2-6 %
    [InlineData("41", "D", 0.30, 0.20, 0.25)] // forest, D, 6+ %
    [InlineData("41", "A", 0.02, 0.08, 0.11)] // 2 % belongs to the steeper class
    [InlineData("82", "C", 0.01, 0.14, 0.20)] // cultivated, C, 0-2 %
    [InlineData("81", "D", 0.08, 0.50, 0.62)] // pasture, D, 6+ %
    [InlineData("24", "A", 0.00, 0.71, 0.88)] // commercial, A, 0-2 %
    public void BySlope(string cover, string group, double slope, double below25, double from25)
    {
        var c = Of(new CoverArea(cover, group, 100, slope)).Coefficient!;
        Assert.Equal(below25, c.For(10), 1e-12);
        Assert.Equal(from25, c.For(100), 1e-12);
    }

    // Rows of the land-cover crosswalk, which has no slope.
    [Theory]
    [InlineData("41", "B", 0.11)]
    [InlineData("52", "C", 0.26)]
    [InlineData("23", "D", 0.53)]
    [InlineData("11", null, 1.0)]
    [InlineData("41", "B/D", 0.16)]
    [InlineData("41", "b/d", 0.16)]
    public void WithoutSlope(string cover, string? group, double expected) => Assert.Equal(expected, Of(new CoverArea(cover, group, 100)).Coefficient!.Value, 1e-12);

    [Fact]
    public void DualGroupsFollowTheRule()
    {
        var landCover = PublishedTable.Embedded("Hydrology/Tables/land_cover.csv");
        var drained = RunoffCoefficientTable.From(landCover, null, DualSoilGroup.Drained).Composite([new("41", "B/D", 1)]);
        Assert.Equal(0.11, drained.Coefficient!.Value, 1e-12);
        var assumed = RunoffCoefficientTable.From(landCover, null, defaultSoilGroup: "C").Composite([new("41", null, 1)]);
        Assert.Equal(0.13, assumed.Coefficient!.Value, 1e-12);
    }

    [Fact]
    public void TheShareWithoutAValueIsReported()
    {
        var c = Of(new("41", "B", 60), new("41", null, 10), new("12", "B", 10), new("99", "B", 10), new(null, "B", 10));
        Assert.Equal(0.4, c.WithoutValueShare, 1e-12);
        Assert.Equal(0.11, c.Coefficient!.Value, 1e-12);
        var finding = Assert.Single(c.Findings);
        Assert.Equal(HydrologyFindings.CoefficientMissing, finding.Kind);
        Assert.Equal(0.4, finding.Value!.Value, 1e-12);
        Assert.Null(Of(new CoverArea("41", "Z", 5)).Coefficient);
        Assert.Null(Of().Coefficient);
    }

    [Fact]
    public void WeighedMeanLiesBetweenItsParts() => Gen.Select(Gen.Double[0, 1], Gen.Double[0.001, 1e6]).Array[1, 20].Sample(parts =>
    {
        var c = RunoffCoefficientTable.Weigh(parts);
        return c >= parts.Min(p => p.Item1) - 1e-12 && c <= parts.Max(p => p.Item1) + 1e-12;
    });

    [Theory]
    [InlineData("cover_id,name,C_A,C_B,C_C,C_D\n1,x,0.1,0.2,1.3,0.4\n", "t.csv line 2, column C_C", "1.3")]
    [InlineData("cover_id,name,C_A,C_B,C_C,C_D\n1,x,0.1,0.2,0.3,0.4\n1,y,0.1,0.2,0.3,0.4\n", "t.csv line 3", "a second time")]
    [InlineData("cover_id,name,C_A,C_B,C_D\n1,x,0.1,0.2,0.4\n", "t.csv line 1", "cover_id, name")]
    public void SaysWhatIsWrong(string text, string place, string found)
    {
        var problem = Assert.Single(Assert.Throws<InputException>(() => RunoffCoefficientTable.From(PublishedTable.Parse("t.csv", text), null)).Problems);
        Assert.Equal(place, problem.Place);
        Assert.Contains(found, problem.Found, StringComparison.Ordinal);
    }
}
