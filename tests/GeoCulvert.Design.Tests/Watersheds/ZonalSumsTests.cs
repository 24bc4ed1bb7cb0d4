using CsCheck;
using GeoCulvert.Design.Terrain;
using GeoCulvert.Design.Watersheds;

namespace GeoCulvert.Design.Tests.Watersheds;

/// <summary>Sums composed along the tree against a plain scan of the grid for each outlet.</summary>
public class ZonalSumsTests
{
    private const int Outlets = 5;

    [Fact]
    public void TotalsAreThoseOfAPlainScan() => (
        from cells in Gen.Int[0, Outlets].Array[80]
        from values in Gen.Int[-9, 9].Array[80]
        from parent in Gen.Int[-1, Outlets - 1].Array[Outlets]
        select (cells, values, parent)).Sample((cells, values, raw) =>
    {
        // -9 stands for a missing value. Parents have lower indices here, unlike in the test of outlines.
        var parent = raw.Select((p, k) => p < k ? p : -1).ToArray();
        var frame = new GridFrame(10, 8, 0, 8, 1, 1);
        var labels = new Grid<int>(frame, cells);
        var tree = new OutletTree(parent);
        var sums = ZonalSums.Of(labels, tree, new Grid<float>(frame, [.. values.Select(v => v == -9 ? float.NaN : v)]));
        var classes = ZonalOverlay.Classes(labels, tree, new Grid<int>(frame, [.. values.Select(v => v == -9 ? ZonalOverlay.NoClass : v)]));
        for (var k = 0; k < Outlets; k++)
        {
            var own = Enumerable.Range(0, 80).Where(i => cells[i] > 0 && Drains(cells[i] - 1)).Select(i => values[i]).ToList();
            var there = own.Where(v => v != -9).ToList();
            Assert.Equal((own.Count, there.Count, there.Sum()), (sums.Total[k].Cells, sums.Total[k].ValueCells, sums.Total[k].Sum));
            if (there.Count > 0) Assert.Equal((there.Min(), there.Max()), (sums.Total[k].Least, sums.Total[k].Most));
            Assert.Equal(own.Count - there.Count, classes.Total[k].MissingCellCount);
            Assert.Equal(there.GroupBy(v => v).OrderBy(g => g.Key).Select(g => (g.Key, (double)g.Count())), classes.Total[k].CellsByClass.Select(p => (p.Key, p.Value)));
            Assert.Equal(cells.Count(c => c == k + 1), sums.Local[k].Cells);

            bool Drains(int outlet)
            {
                for (; outlet >= 0; outlet = parent[outlet])
                    if (outlet == k) return true;
                return false;
            }
        }
    });

    [Fact]
    public void ACircleOfOutletsIsRefused() => Assert.Throws<ArgumentException>(() => new OutletTree([1, 0]));
}
