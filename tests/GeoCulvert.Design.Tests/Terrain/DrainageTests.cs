using GeoCulvert.Design.Terrain;

namespace GeoCulvert.Design.Tests.Terrain;

/// <summary>The terrain leg as a whole: findings, edges, the eight codes, cancelling.</summary>
public class DrainageTests
{
    [Fact]
    public void CodesRunClockwiseFromNorth()
    {
        var frame = new GridFrame(3, 3, 0, 0, 3, 4);
        for (byte k = 1; k <= 8; k++)
        {
            // y grows to the north, rows to the south; atan2(east, north) is the azimuth.
            var azimuth = Math.Atan2(D8.ColumnStep[k], -D8.RowStep[k]) * 180 / Math.PI;
            Assert.Equal((azimuth + 360) % 360, D8.AzimuthDeg(k) % 360, 9);
            Assert.Equal((-D8.RowStep[k], -D8.ColumnStep[k]), (D8.RowStep[D8.Opposite(k)], D8.ColumnStep[D8.Opposite(k)]));
        }

        // 3-4-5 triangle
        Assert.Equal([4.0, 5, 3, 5, 4, 5, 3, 5], Enumerable.Range(1, 8).Select(k => D8.StepLengthM(frame, (byte)k)));
    }

    /// <summary>A pit 3 m deep whose lowest pass stands at 7: 7 - 4 = 3 m over one cell of 6 m2.</summary>
    [Fact]
    public void OnePitByHand()
    {
        var terrain = Solve([9, 9, 9, 9, 4, 7, 9, 9, 9], 3);
        Assert.Equal([9, 9, 9, 9, 7, 7, 9, 9, 9], terrain.Filled.Surface.Cells);
        Assert.Equal((1, 18.0, 3.0), (terrain.Filled.RaisedCells, terrain.Filled.VolumeM3, terrain.Filled.DeepestM));
        Assert.Equal(3, terrain.Direction.Cells[4]);
        var finding = Assert.Single(terrain.Findings);
        Assert.Equal("depressions-large", finding.Code); // 1 of 9 cells is more than 5 %
        Assert.Equal(1.0 / 9, finding.Value!.Value, 12);
    }

    [Fact]
    public void TerrainWithoutDepressionsHasNoFinding() => Assert.Empty(Solve([1, 2, 3, 4, 5, 6, 7, 8, 9], 3).Findings);

    [Fact]
    public void TerrainWithoutValuesIsSaid()
    {
        var terrain = Solve([float.NaN, float.NaN, float.NaN, float.NaN], 2);
        Assert.Equal("terrain-without-values", Assert.Single(terrain.Findings).Code);
        Assert.All(terrain.Accumulation.Cells, a => Assert.Equal(0, a));
    }

    [Fact]
    public void EdgeIsTheGridsOrNextToNodata()
    {
        var z = new Grid<float>(new GridFrame(6, 5, 0, 0, 1, 1));
        z[2, 2] = float.NaN;
        for (var r = 0; r < 5; r++)
        {
            for (var c = 0; c < 6; c++)
            {
                if (r == 2 && c == 2) continue;
                var expected = r is 0 or 4 || c is 0 or 5 || (Math.Abs(r - 2) <= 1 && Math.Abs(c - 2) <= 1);
                Assert.Equal(expected, EdgeCells.IsEdge(z, r, c));
            }
        }
    }

    [Fact]
    public void WorkCanBeStopped()
    {
        using var stop = new CancellationTokenSource();
        stop.Cancel();
        var z = new Grid<float>(new GridFrame(5, 5, 0, 0, 1, 1));
        Assert.Throws<OperationCanceledException>(() => Drainage.Solve(z, cancel: stop.Token));
    }

    [Fact]
    public void DirectionsInACircleAreAProgrammersError() => Assert.Throws<InvalidOperationException>(
        () => WatershedLabels.Label(new Grid<byte>(new GridFrame(2, 1, 0, 0, 1, 1), [3, 7]), []));

    private static DrainedTerrain Solve(float[] z, int columns) =>
        Drainage.Solve(new Grid<float>(new GridFrame(columns, z.Length / columns, 0, 0, 2, 3), z), cancel: TestContext.Current.CancellationToken);
}
