using CsCheck;
using GeoCulvert.Design.Terrain;
using NetTopologySuite.Geometries;

namespace GeoCulvert.Design.Tests.Terrain;

/// <summary>Depressions as objects and closed basins that are kept.</summary>
public class DepressionsTests
{
    /// <summary>
    /// Two hollows in ground of 9: one of 5 and 3 with a pass of 7 in the north (cell 3 of row 0 is the rim at 7), one of 4 with a pass of 6 in the south. Cells of 2 m x 3 m.
    /// First: (7 - 5) + (7 - 3) = 6 m on two cells, 36 m3, 4 m deep at the 3. Second: 2 m, 12 m3.
    /// </summary>
    private static Grid<float> TwoHollows() => DepressionBreachingTests.Rows(2, 3,
        "9 9 9 7 9 9 9",
        "9 9 5 3 9 9 9",
        "9 9 9 9 9 4 9",
        "9 9 9 9 9 6 9");

    [Fact]
    public void TwoHollowsByHand()
    {
        var z = TwoHollows();
        var map = Depressions.Find(z, DepressionFilling.Fill(z, TestContext.Current.CancellationToken).Surface, TestContext.Current.CancellationToken);
        Assert.Equal([new Depression(2, 12, 7, 10, 4, 36, 3), new Depression(1, 6, 6, 19, 2, 12, 26)], map.All);
        Assert.Equal([9, 10, 19], Enumerable.Range(0, 28).Where(i => map.Labels.Cells[i] != 0));
        Assert.Equal([1, 1, 2], new[] { 9, 10, 19 }.Select(i => map.Labels.Cells[i]));
    }

    /// <summary>Components of raised cells by a plain search; all of one component have one level; figures by sums over it.</summary>
    [Fact]
    public void EqualTheConnectedRaisedCells() => RandomTerrain.Any.Sample(
        elevation =>
        {
            var filled = DepressionFilling.Fill(elevation);
            var map = Depressions.Find(elevation, filled.Surface);
            var (z, w, frame) = (elevation.Cells, filled.Surface.Cells, elevation.Frame);
            var raised = Enumerable.Range(0, z.Length).Where(i => w[i] > z[i]).ToHashSet();
            var k = 0;
            for (var i = 0; i < z.Length; i++)
            {
                if (!raised.Contains(i))
                {
                    Assert.Equal(0, map.Labels.Cells[i]);
                    continue;
                }

                if (map.Labels.Cells[i] <= k) continue;
                var pool = new HashSet<int> { i };
                for (var before = 0; before < pool.Count;)
                {
                    before = pool.Count;
                    pool.UnionWith(pool.SelectMany(c => NaiveTerrain.Neighbours(frame, c)).Select(n => n.Cell).Where(raised.Contains).ToList());
                }

                var d = map.All[k++];
                Assert.All(pool, c => Assert.Equal((k, (float)d.SpillLevelM), (map.Labels.Cells[c], w[c])));
                Assert.Equal((pool.Count, pool.OrderBy(c => z[c]).ThenBy(c => c).First()), (d.Cells, d.DeepestCell));
                Assert.Equal(pool.Max(c => (double)w[c] - z[c]), d.MaxDepthM);
                Assert.Equal(pool.Sum(c => (double)w[c] - z[c]) * frame.CellAreaM2, d.VolumeM3, 1e-6);
                Assert.Equal(pool.Count * frame.CellAreaM2, d.AreaM2);
                var edge = pool.SelectMany(c => NaiveTerrain.Neighbours(frame, c)).Select(n => n.Cell).Where(n => !pool.Contains(n)).ToHashSet();
                Assert.Equal(edge.Where(n => z[n] == w[i]).Min(), d.PassCell);
                Assert.DoesNotContain(edge, n => w[n] < w[i]);
            }

            Assert.Equal(k, map.All.Count);
            Assert.Equal(filled.RaisedCells, map.All.Sum(d => (long)d.Cells));
            Assert.Equal(filled.VolumeM3, map.All.Sum(d => d.VolumeM3), 1e-6);
        },
        iter: 3000, print: RandomTerrain.Text);

    [Theory]
    [InlineData(12, 4, 1)] // just reached by the first
    [InlineData(12.1, 4, 0)]
    [InlineData(12, 4.1, 0)]
    [InlineData(6, 2, 2)]
    [InlineData(0, 3, 1)]
    public void LimitsMustBothBeReached(double area, double depth, int kept)
    {
        var z = TwoHollows();
        var choice = ClosedBasins.Choose(z, Map(z), [], new BasinLimits(area, depth));
        Assert.Equal(kept, choice.Kept.Count);
        Assert.All(choice.Kept, b => Assert.Equal((false, $"closed basin {b.Depression + 1}"), (b.Given, b.Name)));
        Assert.Equal(kept, choice.Findings.Count(f => f.Code == "closed-basin-kept"));
    }

    /// <summary>Points in the second hollow (row 2, column 5: x 110-112, y 191-194 from the corner 100, 200), twice, on the slope, outside and without a place.</summary>
    [Fact]
    public void PointsNameBasins()
    {
        var z = TwoHollows();
        var before = z.Cells.ToArray();
        BasinPoint[] points =
        [
            new("Mere", new Coordinate(111, 192.5)), new("Mere again", new Coordinate(110, 194)), new("Slope", new Coordinate(101, 199)),
            new("Away", new Coordinate(99, 199)), new("Nowhere", new Coordinate(double.NaN, 1)),
        ];
        var choice = ClosedBasins.Choose(z, Map(z), points);
        var basin = Assert.Single(choice.Kept);
        Assert.Equal(("Mere", 1, true), (basin.Name, basin.Depression, basin.Given));
        Assert.Equal(
            ["closed-basin-point-repeated", "closed-basin-point-outside", "closed-basin-point-outside", "closed-basin-point-outside", "closed-basin-kept"],
            choice.Findings.Select(f => f.Code));
        var expected = before.ToArray();
        expected[19] = float.NegativeInfinity;
        Assert.Equal(expected, choice.Elevation.Cells);
        Assert.Equal(before, z.Cells);
        Assert.Same(z, ClosedBasins.Choose(z, Map(z), []).Elevation);
    }

    /// <summary>
    /// With the sinks as outlets, filled and routed by the plain twins: the land of each kept basin is what runs to its sink, and none of the cells of a kept pool that run
    /// down to the sink is filled any more than its own hollows need.
    /// </summary>
    [Fact]
    public void LandOfKeptBasinsIsWhatRunsToTheirSinks() => RandomTerrain.Any.Select(Gen.Double[0, 3]).Sample(
        (elevation, depth) =>
        {
            var choice = ClosedBasins.Choose(elevation, Map(elevation), [], new BasinLimits(0, depth));
            var sinks = choice.Kept.Select(b => b.Pool.DeepestCell).ToList();
            var direction = Routed(choice.Elevation);
            var land = ClosedBasins.NonContributing(direction, choice.Kept);
            var ends = Enumerable.Range(0, elevation.Cells.Length).Where(i => !float.IsNaN(elevation.Cells[i])).Select(i => NaiveTerrain.WayDown(direction, i)[^1]).ToList();
            Assert.Equal(sinks.Select(s => (long)ends.Count(e => e == s)), land.Select(l => l.Cells));
            Assert.All(land, l => Assert.Equal(l.Cells * elevation.Frame.CellAreaM2, l.AreaM2));
            Assert.All(ends, e => Assert.True(sinks.Contains(e) || NaiveTerrain.IsRim(elevation, e), "ends elsewhere"));
        },
        iter: 1000, print: p => RandomTerrain.Text(p.Item1));

    private static DepressionMap Map(Grid<float> z) => Depressions.Find(z, DepressionFilling.Fill(z).Surface);

    /// <summary>Full passes: from every outlet inward, each cell points to the neighbour from which the flood first came.</summary>
    private static Grid<byte> Routed(Grid<float> z)
    {
        var direction = new Grid<byte>(z.Frame);
        var level = new Dictionary<int, float>();
        for (var i = 0; i < z.Cells.Length; i++)
        {
            if (!float.IsNaN(z.Cells[i]) && (float.IsNegativeInfinity(z.Cells[i]) || NaiveTerrain.IsRim(z, i))) level[i] = z.Cells[i];
        }

        var open = new List<int>(level.Keys);
        while (open.Count > 0)
        {
            var cell = open.MinBy(c => level[c]);
            open.Remove(cell);
            foreach (var (code, n) in NaiveTerrain.Neighbours(z.Frame, cell))
            {
                if (float.IsNaN(z.Cells[n]) || !level.TryAdd(n, Math.Max(z.Cells[n], level[cell]))) continue;
                direction.Cells[n] = D8.Opposite(code);
                open.Add(n);
            }
        }

        return direction;
    }
}
