using GeoCulvert.Design.Basis;
using GeoCulvert.Design.Terrain;

namespace GeoCulvert.Design.Tests.Terrain;

/// <summary>Cuts against scikit-image's minimum-cost paths, depressions against SciPy's labels, on real terrain; made by Oracles/make_conditioning_oracles.py.</summary>
public class ConditioningOracleTests
{
    private static readonly PublishedTable Cuts = PublishedTable.Parse("cheapest_cuts.csv", File.ReadAllText(RealTerrain.PathOf("cheapest_cuts.csv")));
    private static readonly PublishedTable Pools = PublishedTable.Parse("depressions.csv", File.ReadAllText(RealTerrain.PathOf("depressions.csv")));

    public static TheoryData<string> CutNames => [.. Cuts.Rows.Select(r => r.Text("name")).Distinct()];

    public static TheoryData<string> PoolNames => [.. Pools.Rows.Select(r => r.Text("name")).Distinct()];

    /// <summary>
    /// The lowest pit of a window is cut first, on untouched ground, and everything lower drains over the edge, so its cut stands as searched. Volume = sum of cuts x cell area.
    /// </summary>
    [Theory]
    [MemberData(nameof(CutNames))]
    public void LowestPitsTakeTheLeastCut(string name)
    {
        var all = RealTerrain.Elevation(name);
        var (found, refused) = (0, 0);
        foreach (var row in Cuts.Rows.Where(r => r.Text("name") == name))
        {
            var window = Window(all, (float)row.Number("sign"), (int)row.Number("row"), (int)row.Number("column"), (int)row.Number("side"));
            var pit = NaiveBreaching.Pits(window).OrderBy(p => window.Cells[p.First()]).ThenBy(p => p.Min()).First();
            Assert.Equal(row.Number("pit_level_m"), window.Cells[pit.First()]);
            double? Cut(double depth) => DepressionBreaching.Breach(window, new BreachSettings(DepressionMethod.Breach, double.PositiveInfinity, depth))
                .Breaches.SingleOrDefault(b => pit.Contains(b.Cells[0]))?.VolumeM3 / window.Frame.CellAreaM2;
            Assert.Equal(row.Number("cut_m"), Cut(double.PositiveInfinity)!.Value, 1e-6);
            if (row.NumberOrNull("limited_cut_m") is { } limited)
            {
                Assert.Equal(limited, Cut(row.Number("depth_limit_m"))!.Value, 1e-6);
                found++;
            }
            else
            {
                Assert.Null(Cut(row.Number("depth_limit_m")));
                refused++;
            }
        }

        Assert.True(found + refused > 5, "too few windows");
    }

    [Theory]
    [MemberData(nameof(PoolNames))]
    public void DepressionsAreTheConnectedRaisedCells(string name)
    {
        var z = RealTerrain.Elevation(name);
        var map = Depressions.Find(z, DepressionFilling.Fill(z, TestContext.Current.CancellationToken).Surface, TestContext.Current.CancellationToken);
        var rows = Pools.Rows.Where(r => r.Text("name") == name).ToList();
        var area = z.Frame.CellAreaM2;
        Assert.Equal(rows[0].Number("all"), map.All.Count);
        Assert.Equal(rows[0].Number("all_cells"), map.All.Sum(d => d.Cells));
        Assert.Equal(rows[0].Number("all_depths_m"), map.All.Sum(d => d.VolumeM3) / area, 1e-6);
        Assert.All(rows, r =>
        {
            // SciPy numbers labels by their first cell too.
            var d = map.All[(int)r.Number("number")];
            Assert.Equal((r.Number("cells"), r.Number("deepest_m"), r.Number("level_m")), (d.Cells, d.MaxDepthM, d.SpillLevelM));
            Assert.Equal(r.Number("depths_m"), d.VolumeM3 / area, 1e-6);
        });
    }

    /// <summary>Whole models, upside down (hills make deep pits), cut within limits and filled: no step on the way to the rim rises, no more is filled than without cuts, twice the same.</summary>
    [Theory]
    [MemberData(nameof(CutNames))]
    public void RealTerrainDrainsAfterCutsAndFilling(string name)
    {
        var z = RealTerrain.Elevation(name);
        foreach (ref var height in z.Cells.AsSpan()) height = -height;
        var plain = DepressionFilling.Fill(z, TestContext.Current.CancellationToken);
        foreach (var method in new[] { DepressionMethod.Breach, DepressionMethod.Mix })
        {
            var settings = new BreachSettings(method, 300, 5);
            var cut = DepressionBreaching.Breach(z, settings, TestContext.Current.CancellationToken);
            var terrain = Drainage.Solve(cut.Surface, cancel: TestContext.Current.CancellationToken);
            Assert.NotEmpty(cut.Breaches);
            Assert.True(terrain.Filled.VolumeM3 < plain.VolumeM3, "nothing gained");
            if (method == DepressionMethod.Mix) Assert.All(cut.Breaches, b => Assert.True(b.VolumeM3 <= b.PoolM3 + 1e-6, "dearer than filling"));
            var w = terrain.Filled.Surface.Cells;
            for (var i = 0; i < w.Length; i++)
            {
                var code = terrain.Direction.Cells[i];
                if (code != 0) Assert.True(w[FlowAccumulation.Downstream(z.Frame, i, code)] <= w[i], "runs uphill");
                else Assert.True(float.IsNaN(w[i]) || NaiveTerrain.IsRim(z, i), "ends inside");
            }

            var again = DepressionBreaching.Breach(z, settings, TestContext.Current.CancellationToken);
            Assert.Equal(cut.Surface.Cells, again.Surface.Cells);
            Assert.Equal(cut.Breaches.Select(b => b.Cells), again.Breaches.Select(b => b.Cells));
        }
    }

    private static Grid<float> Window(Grid<float> z, float sign, int row, int column, int side)
    {
        var frame = z.Frame;
        var window = new Grid<float>(new GridFrame(side, side, 0, 0, frame.CellWidthM, frame.CellHeightM));
        for (var r = 0; r < side; r++)
            for (var c = 0; c < side; c++) window[r, c] = sign * z[row + r, column + c];
        return window;
    }
}
