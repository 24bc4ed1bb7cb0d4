using GeoCulvert.Design.Basis;
using GeoCulvert.Design.Hydrology;

namespace GeoCulvert.Design.Tests.Hydrology;

public class CurveNumberTableTests
{
    // TR-55 example 2-2 with the rows of table 2-2 that were seen in print: half-acre lots on B (70) and C (80), good pasture on C (74).
    // By hand: (70 x 75 + 80 x 100 + 74 x 75)/250 = 75.2.
    [Fact]
    public void CompositeIsTheAreaMean()
    {
        var cn = CurveNumberTable.Published.Composite(
            [new("residential-1-2-acre", "B", 75), new("residential-1-2-acre", "C", 100), new("pasture", "c", 75, "good")]);
        Assert.Equal(75.2, cn.CurveNumber!.Value, 1e-9);
        Assert.Empty(cn.Findings);
        Assert.Equal([70, 80, 74], cn.Lines.Select(l => l.CurveNumber!.Value));
    }

    // Every row of the reference's table 2-2, condition by condition, read back through the lookup.
    [Fact]
    public void EveryRowIsFoundByCoverConditionAndGroup()
    {
        var table = PublishedTable.Embedded("Hydrology/Tables/curve_numbers.csv");
        Assert.Equal(71, table.Rows.Count);
        Assert.All(table.Rows, r => Assert.All("ABCD", g =>
        {
            var condition = r.Text("condition");
            var found = CurveNumberTable.Published.Composite([new(r.Text("cover_id"), g.ToString(), 1, condition.Length > 0 ? condition : null)]).CurveNumber;
            Assert.Equal(r.NumberOrNull("CN_" + g), found);
        }));
    }

    [Fact]
    public void CurveNumbersRiseFromAToD() =>
        Assert.All(PublishedTable.Embedded("Hydrology/Tables/curve_numbers.csv").Rows, r =>
        {
            var values = "ABCD".Select(g => r.NumberOrNull("CN_" + g)).Where(v => v is not null).ToList();
            Assert.Equal(values.Order(), values);
        });

    [Fact]
    public void DualGroupsFollowTheRule()
    {
        var parts = new CurveNumberArea[] { new("pasture", "B/D", 1, "good") };
        Assert.Equal(80, CurveNumberTable.Published.Composite(parts).CurveNumber);
        var drained = CurveNumberTable.From(PublishedTable.Embedded("Hydrology/Tables/curve_numbers.csv"), DualSoilGroup.Drained);
        Assert.Equal(61, drained.Composite(parts).CurveNumber);
    }

    [Fact]
    public void GapsAreFindingsWithTheirShare()
    {
        var cn = CurveNumberTable.Published.Composite(
            [new("41", "B", 60), new("41", null, 10), new(null, "B", 10), new("nonsense", "B", 5), new("pasture", "B", 15, "excellent")]);
        Assert.Equal(60, cn.CurveNumber!.Value, 1e-9);
        Assert.Equal(0.4, cn.WithoutValueShare, 1e-12);
        var finding = Assert.Single(cn.Findings, f => f.Kind == NrcsFindings.CurveNumberMissing);
        Assert.Equal(0.4, finding.Value!.Value, 1e-12);
        Assert.Contains("excellent", finding.Text, StringComparison.Ordinal);
        Assert.Null(CurveNumberTable.Published.Composite([]).CurveNumber);
        Assert.Null(CurveNumberTable.Published.Composite([new(null, "A", 5)]).CurveNumber);
    }

    [Fact]
    public void PavingAndWaterNeedNoSoilGroup() => Assert.Equal(98, CurveNumberTable.Published.Composite([new("paved-lots-roofs-drives", null, 5)]).CurveNumber);

    [Fact]
    public void RowsFromMemoryAreSaid()
    {
        var cn = CurveNumberTable.Published.Composite([new("brush", "B", 25, "fair"), new("pasture", "B", 75, "good")]);
        Assert.Equal(0.25, Assert.Single(cn.Findings, f => f.Kind == NrcsFindings.CurveNumberFromMemory).Value!.Value, 1e-12);
    }

    [Fact]
    public void ATableOfTheUserReplacesIt()
    {
        var own = CurveNumberTable.From(PublishedTable.Parse("own.csv", "cover_id,name,condition,CN_A,CN_B,CN_C,CN_D\nmoor,Moor,wet,80,85,90,95\nmoor,Moor,dry,50,60,70,80\n"), defaultCondition: "dry");
        Assert.Equal(60, own.Composite([new("moor", "B", 1)]).CurveNumber);
        Assert.Equal(85, own.Composite([new("MOOR", "B", 1, "Wet")]).CurveNumber);
    }

    [Fact]
    public void AllThatIsWrongWithATableIsSaidAtOnce()
    {
        var problems = Assert.Throws<InputException>(() => CurveNumberTable.From(PublishedTable.Parse(
            "own.csv", "cover_id,name,CN_A,CN_B,CN_C,CN_D\na,A,0,50,60,70\nb,B,30,40,50,101\nc,C,x,40,50,60\nd,D,30,40,50,60\nd,D,30,40,50,60\n"))).Problems;
        Assert.Equal(["own.csv line 2, column CN_A", "own.csv line 3, column CN_D", "own.csv line 4, column CN_A", "own.csv line 6"], problems.Select(p => p.Place));
    }
}
