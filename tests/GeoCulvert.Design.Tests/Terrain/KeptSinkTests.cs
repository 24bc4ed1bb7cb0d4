using GeoCulvert.Design.Terrain;

namespace GeoCulvert.Design.Tests.Terrain;

/// <summary>A cell of minus infinity is an outlet inside the grid: a kept sink.</summary>
public class KeptSinkTests
{
    [Fact]
    public void ASinkTakesItsBowlAndNothingIsFilledThere()
    {
        // A bowl of 9 x 9 cells, deepest in the middle, rising by one a ring; the sink takes the rings 0 to 3, the outer ring drains over the rim or into it.
        var frame = new GridFrame(9, 9, 0, 9, 1, 1);
        var z = new Grid<float>(frame);
        for (var r = 0; r < 9; r++)
            for (var c = 0; c < 9; c++) z[r, c] = Math.Max(Math.Abs(r - 4), Math.Abs(c - 4));
        z[4, 4] = float.NegativeInfinity;
        var solved = Drainage.Solve(z, cancel: TestContext.Current.CancellationToken);
        Assert.Equal(0, solved.Filled.RaisedCells);
        Assert.Equal(0, solved.Direction[4, 4]);
        // Every cell of the bowl falls towards the middle, the rim cells too: they have lower ground inside.
        Assert.Equal(81, solved.Accumulation[4, 4]);
    }

    [Fact]
    public void OnRandomTerrainASinkKeepsItsLevelAndEveryCellDrains()
    {
        var random = new Random(5);
        for (var turn = 0; turn < 500; turn++)
        {
            int columns = random.Next(3, 14), rows = random.Next(3, 14);
            var z = new Grid<float>(new GridFrame(columns, rows, 0, rows, 1, 1));
            for (var i = 0; i < z.Cells.Length; i++) z.Cells[i] = turn % 2 == 0 ? random.Next(0, 6) : (float)(i * 0.3) + random.Next(0, 2);
            var sink = random.Next(z.Cells.Length);
            z.Cells[sink] = float.NegativeInfinity;
            // The least level at which water leaves for the rim or the sink, from the definition: repeat w = max(z, lowest neighbour) until it rests.
            // Few pits take the way over basins, many that of the plain flood: the levels of these grids give both.
            Assert.Equal(Plain(z, sink), DepressionFilling.Fill(z, TestContext.Current.CancellationToken).Surface.Cells);
            var solved = Drainage.Solve(z, cancel: TestContext.Current.CancellationToken);
            long outlets = 0;
            for (var i = 0; i < z.Cells.Length; i++) if (solved.Direction.Cells[i] == 0) outlets += solved.Accumulation.Cells[i];
            Assert.Equal(z.Cells.Length, outlets);
        }
    }

    private static float[] Plain(Grid<float> z, int sink)
    {
        int columns = z.Frame.Columns, rows = z.Frame.Rows;
        var w = z.Cells.Select((v, i) => i == sink || i / columns == 0 || i / columns == rows - 1 || i % columns == 0 || i % columns == columns - 1 ? v : float.PositiveInfinity).ToArray();
        for (var changed = true; changed;)
        {
            changed = false;
            for (var i = 0; i < w.Length; i++)
            {
                var least = float.PositiveInfinity;
                for (var r = Math.Max(i / columns - 1, 0); r <= Math.Min(i / columns + 1, rows - 1); r++)
                    for (var c = Math.Max(i % columns - 1, 0); c <= Math.Min(i % columns + 1, columns - 1); c++) least = Math.Min(least, w[(r * columns) + c]);
                var level = Math.Max(z.Cells[i], least);
                if (level < w[i]) (w[i], changed) = (level, true);
            }
        }

        return w;
    }
}
