using CsCheck;
using GeoCulvert.Design.Terrain;

namespace GeoCulvert.Design.Tests.Terrain;

/// <summary>Streams against their definition cell by cell, and one network by hand.</summary>
public class StreamNetworkTests
{
    /// <summary>
    /// Two heads join at cell 6, a third head joins at cell 11, out over the southern rim. Strahler: 1 + 1 = 2, 2 + 1 stays 2.
    /// </summary>
    [Fact]
    public void NetworkByHand()
    {
        var direction = new Grid<byte>(
            new GridFrame(5, 4, 0, 40, 10, 10),
            [
                4, 0, 6, 0, 0,
                0, 5, 0, 0, 0,
                0, 5, 7, 7, 7,
                0, 0, 0, 0, 0,
            ]);
        var accumulation = new Grid<int>(
            direction.Frame,
            [
                1, 0, 1, 0, 0,
                0, 3, 0, 0, 0,
                0, 7, 3, 2, 1,
                0, 8, 0, 0, 0,
            ]);
        var reaches = StreamNetwork.Extract(direction, accumulation, 1);
        Assert.Equal([[0, 6], [2, 6], [6, 11], [11, 16], [14, 13, 12, 11]], reaches.Select(r => r.Cells));
        Assert.Equal([2, 2, 3, -1, 3], reaches.Select(r => r.Downstream));
        Assert.Equal([1, 1, 3, 8, 3], reaches.Select(r => r.LowerAccumulationCells));
        Assert.Equal([1, 1, 2, 2, 1], reaches.Select(r => r.Order));

        // From 3 cells up the two upper heads are gone and nothing joins them any more.
        var large = StreamNetwork.Extract(direction, accumulation, 3);
        Assert.Equal([[6, 11], [11, 16], [12, 11]], large.Select(r => r.Cells));
        Assert.Equal([1, 2, 1], large.Select(r => r.Order));
        Assert.Empty(StreamNetwork.Extract(direction, accumulation, 9));
    }

    [Fact]
    public void ReachesCoverEveryStreamCellOnceAndOrdersFollowStrahler() => RandomTerrain.Any.Select(Gen.Int[-1, 12]).Sample(
        (elevation, threshold) =>
        {
            var terrain = Drainage.Solve(elevation);
            int[] counts = terrain.Accumulation.Cells;
            var least = Math.Max(1, threshold);
            var reaches = StreamNetwork.Extract(terrain.Direction, terrain.Accumulation, threshold);
            List<int> Inflows(int cell) => [.. NaiveTerrain.Neighbours(elevation.Frame, cell)
                .Where(n => terrain.Direction.Cells[n.Cell] == D8.Opposite(n.Code) && counts[n.Cell] >= least).Select(n => n.Cell)];
            int Order(int cell)
            {
                var above = Inflows(cell).Select(Order).OrderDescending().ToList();
                return above.Count == 0 ? 1 : above.Count > 1 && above[0] == above[1] ? above[0] + 1 : above[0];
            }

            var stream = Enumerable.Range(0, counts.Length).Where(i => counts[i] >= least && terrain.Direction.Cells[i] != 0);
            Assert.Equal(stream, reaches.SelectMany(r => r.Cells[..^1]).Order());
            foreach (var reach in reaches)
            {
                var last = reach.Cells[^1];
                Assert.Equal(NaiveTerrain.WayDown(terrain.Direction, reach.Cells[0])[..reach.Cells.Length], reach.Cells);
                Assert.NotEqual(1, Inflows(reach.Cells[0]).Count);
                Assert.All(reach.Cells[1..^1], c => Assert.Single(Inflows(c)));
                Assert.True(Inflows(last).Count > 1 || terrain.Direction.Cells[last] == 0);
                Assert.Equal(terrain.Direction.Cells[last] == 0 ? -1 : last, reach.Downstream < 0 ? -1 : reaches[reach.Downstream].Cells[0]);
                Assert.Equal(counts[Inflows(last).Count > 1 ? reach.Cells[^2] : last], reach.LowerAccumulationCells);
                Assert.Equal(Order(reach.Cells[^2]), reach.Order);
            }
        },
        iter: 3000);
}
