using CsCheck;
using GeoCulvert.Design.Crossings;
using GeoCulvert.Design.Terrain;
using GeoCulvert.Design.Watersheds;
using NetTopologySuite.Geometries;

namespace GeoCulvert.Design.Tests.Watersheds;

/// <summary>Pools on terrain made by hand; volumes worked in the comments.</summary>
public sealed class PondedAreaTests
{
    private static Grid<float> Terrain(int rows, int columns, Func<int, int, double> height, double cellM = 1)
    {
        var grid = new Grid<float>(new GridFrame(columns, rows, 1000, 2000, cellM, cellM));
        for (var r = 0; r < rows; r++)
            for (var c = 0; c < columns; c++) grid[r, c] = (float)height(r, c);
        return grid;
    }

    private static RoadAlignment Road(params (double X, double Y)[] line) => new("R", [new LineString([.. line.Select(p => new Coordinate(p.X, p.Y))])]);

    /// <summary>
    /// A square pit in steps of h = 0.5 m, ring k (8 k cells, one for k = 0) at k h. At K h rings below K are wet: (2 K - 1)^2 cells; depths sum to
    /// h [K + sum 8 k (K - k)] = h [K + 4 K (K^2 - 1) / 3] since sum k (K - k) = K (K^2 - 1) / 6.
    /// </summary>
    [Theory]
    [InlineData(1)]
    [InlineData(2)]
    [InlineData(5)]
    [InlineData(9)]
    public void Pit_in_steps_has_the_volume_of_its_rings(int k)
    {
        const double h = 0.5, cell = 2;
        var flood = PondedArea.Flood(Terrain(25, 25, (r, c) => h * Math.Max(Math.Abs(r - 12), Math.Abs(c - 12)), cell), [(12 * 25) + 12], 5);
        var pool = flood.At(k * h);
        Assert.Equal(((2 * k) - 1) * ((2 * k) - 1) * cell * cell, pool.AreaM2, 9);
        Assert.Equal(h * (k + (4.0 * k * ((k * k) - 1) / 3)) * cell * cell, pool.VolumeM3, 9);
        Assert.Equal(k * h, pool.GreatestDepthM, 9);
        Assert.False(pool.TouchesEdge);
        var outline = flood.Outline(k * h);
        Assert.True(outline.IsValid);
        Assert.Equal(pool.AreaM2, outline.Area, 9);
        Assert.Equal(new Envelope(1000 + ((13 - k) * cell), 1000 + ((12 + k) * cell), 2000 - ((12 + k) * cell), 2000 - ((13 - k) * cell)), outline.EnvelopeInternal);
    }

    /// <summary>
    /// A wedge: a channel of 7 cells of 1 m between high banks, its bed rising upstream by s = 0.1 m a cell from the road. At H = 2.05 m columns
    /// k = 0..20 are wet: volume 7 sum (2.05 - 0.1 k) = 7 (21 x 2.05 - 0.1 x 210) = 154.35 m3. The whole wedge without cells holds 7 H^2 / (2 s) = 147.09.
    /// </summary>
    [Fact]
    public void Wedge_valley_has_the_volume_of_its_columns()
    {
        var terrain = Terrain(9, 60, (r, c) => r is 0 or 8 ? 50 : 0.1 * (59 - c));
        var pool = PondedArea.Flood(terrain, [(4 * 60) + 59], 3).At(2.05);
        Assert.Equal(147, pool.AreaM2, 6);
        Assert.Equal(154.35, pool.VolumeM3, 4);
        Assert.Equal(2.05, pool.GreatestDepthM, 6);
    }

    /// <summary>Road along the middle of a flat trough: only one half is wet.</summary>
    [Theory]
    [InlineData(0.0, 5.0)] // between two columns: 5 of 10 columns
    [InlineData(0.5, 5.0)] // through the centres of column 5, which then belongs to neither side
    [InlineData(-0.2, 5.0)]
    public void Road_is_a_wall(double shift, double wetColumns)
    {
        var terrain = Terrain(12, 12, (r, c) => r is 0 or 11 || c is 0 or 11 ? 9 : 1);
        var wall = new RoadWall(terrain.Frame, [Road((1006 + shift, 1980), (1006 + shift, 2010))]);
        var pool = PondedArea.Flood(terrain, [(5 * 12) + 2], 4, wall).At(4);
        Assert.Equal(wetColumns * 10, pool.AreaM2);
        Assert.Equal(3 * wetColumns * 10, pool.VolumeM3);
    }

    [Fact]
    public void Without_the_road_the_whole_trough_is_wet()
    {
        var terrain = Terrain(12, 12, (r, c) => r is 0 or 11 || c is 0 or 11 ? 9 : 1);
        Assert.Equal(100, PondedArea.Flood(terrain, [(5 * 12) + 2], 4).At(4).AreaM2);
    }

    /// <summary>A road of any course from edge to edge parts the ground: no flooded cell's centre lies on the far side of it.</summary>
    [Fact]
    public void No_course_of_a_road_leaks()
    {
        var vertex = Gen.Select(Gen.OneOf(Gen.Int[2, 18].Select(i => i * 0.5), Gen.Double[1, 9]), Gen.OneOf(Gen.Int[0, 20].Select(i => i * 0.5), Gen.Double[0, 10]));
        vertex.Array[1, 5].Sample(inner =>
        {
            // Rising x keeps the line simple; its ends lie beyond the grid.
            var xs = inner.Select(p => p.Item1).Distinct().Order().ToArray();
            var line = new List<(double X, double Y)> { (998, 1995) };
            for (var i = 0; i < xs.Length; i++) line.Add((1000 + xs[i], 1990 + inner[i].Item2));
            line.Add((1012, 1995));
            var terrain = Terrain(10, 10, (_, _) => 0);
            var wall = new RoadWall(terrain.Frame, [Road([.. line])]);
            for (var seed = 0; seed < 100; seed += 7)
            {
                var side = Side(seed);
                if (side == 0) continue;
                foreach (var cell in PondedArea.Flood(terrain, [seed], 1, wall).Cells)
                    if (Side(cell) * side < 0) return false;
            }

            return true;

            int Side(int cell)
            {
                double x = terrain.Frame.CentreX(cell % 10), y = terrain.Frame.CentreY(cell / 10);
                var k = line.FindLastIndex(p => p.X <= x);
                var on = line[k].Y + ((x - line[k].X) / (line[k + 1].X - line[k].X) * (line[k + 1].Y - line[k].Y));
                return Math.Abs(y - on) < 1e-6 ? 0 : Math.Sign(y - on);
            }
        });
    }

    /// <summary>Two troughs 1 m deep with a pass at 3 m between them; the far one drains to outlet 7.</summary>
    [Fact]
    public void Pool_spills_over_the_lowest_pass_only_above_it()
    {
        var terrain = Terrain(5, 11, (r, c) => r is 0 or 4 || c is 0 or 10 ? 9 : c == 5 ? (r == 2 ? 3 : 6) : c < 5 ? 2 : 0);
        var flood = PondedArea.Flood(terrain, [(2 * 11) + 2], 8, null, cell => cell % 11 > 5 ? 7 : null);
        Assert.Null(flood.At(3).Spill);
        var above = flood.At(3.5);
        Assert.Equal(new PoolSpill(3, above.Spill!.Cell, 7), above.Spill);
        Assert.Equal(6, above.Spill.Cell % 11);
        // 12 cells of 1.5 m and the pass of 0.5 m: nothing beyond.
        Assert.Equal(13, above.AreaM2);
        Assert.Equal(18.5, above.VolumeM3, 9);
        Assert.Equal(7, flood.LowestPass!.Toward);
    }

    /// <summary>Land behind a lip that is the crossing's own joins the pool by a jump: 12 cells at 0 m behind a lip of 3 m.</summary>
    [Fact]
    public void Low_ground_behind_a_lip_is_wetted_with_the_lip()
    {
        var terrain = Terrain(5, 11, (r, c) => r is 0 or 4 || c is 0 or 10 ? 9 : c == 5 ? (r == 2 ? 3 : 6) : c < 5 ? 2 : 0);
        var flood = PondedArea.Flood(terrain, [(2 * 11) + 2], 8);
        Assert.Equal((12, 12.0), (flood.At(3).AreaM2, flood.At(3).VolumeM3));
        Assert.Equal(25, flood.At(3.5).AreaM2);
        Assert.Equal(18.5 + (12 * 3.5), flood.At(3.5).VolumeM3, 9);
        Assert.Equal(3.5, flood.At(3.5).GreatestDepthM);
        Assert.Null(flood.LowestPass);
    }

    [Theory]
    [InlineData(true)]
    [InlineData(false)]
    public void Edge_and_nodata_are_told_from_the_level_that_reaches_them(bool nodata)
    {
        // The trough's floor at 1 m, a sill of 2 m at column 8; beyond it nodata, or the end of the grid.
        var terrain = Terrain(5, nodata ? 12 : 9, (r, c) => r is 0 or 4 || c == 0 ? 9 : c > 8 ? double.NaN : c == 8 ? 2 : 1);
        var flood = PondedArea.Flood(terrain, [(2 * terrain.Frame.Columns) + 3], 5);
        Assert.False(flood.At(2).TouchesEdge);
        Assert.True(flood.At(2.01).TouchesEdge);
        Assert.Equal(2, flood.EdgeLevelM);
    }

    [Fact]
    public void Level_below_the_bed_is_an_empty_pool()
    {
        var terrain = Terrain(5, 5, (_, _) => 10);
        var flood = PondedArea.Flood(terrain, [12], 12);
        Assert.Equal((0.0, 0.0, 0), (flood.At(10).AreaM2, flood.At(10).VolumeM3, flood.At(9).Cells));
        Assert.True(flood.Outline(9).IsEmpty);
        Assert.Empty(PondedArea.Flood(terrain, [12], 9).Table(4));
        Assert.Throws<ArgumentOutOfRangeException>(() => flood.At(12.5));
    }

    /// <summary>Area and volume rise with the level, and every level's pool agrees with a plain walk from the seed over cells below the level.</summary>
    [Fact]
    public void Every_level_agrees_with_a_plain_walk()
    {
        Gen.Int[0, 12].Array[70].Select(Gen.Int[0, 69], Gen.Int[1, 14]).Sample((heights, seed, top) =>
        {
            var terrain = Terrain(7, 10, (r, c) => heights[(r * 10) + c] == 12 ? double.NaN : heights[(r * 10) + c]);
            var flood = PondedArea.Flood(terrain, [seed], top);
            double area = 0, volume = 0;
            for (var level = 0.0; level <= top; level += 0.5)
            {
                var pool = flood.At(level);
                var walk = Walk(terrain, seed, level);
                if (pool.Cells != walk.Count || Math.Abs(pool.VolumeM3 - walk.Sum(c => level - terrain.Cells[c])) > 1e-9) return false;
                if (Math.Abs(flood.Outline(level).Area - walk.Count) > 1e-9 || !flood.Outline(level).IsValid) return false;
                if (pool.AreaM2 < area || pool.VolumeM3 < volume) return false;
                (area, volume) = (pool.AreaM2, pool.VolumeM3);
            }

            return true;
        });
    }

    private static HashSet<int> Walk(Grid<float> terrain, int seed, double level)
    {
        var wet = new HashSet<int>();
        var todo = new Stack<int>([seed]);
        while (todo.TryPop(out var cell))
        {
            if (!(terrain.Cells[cell] < level) || !wet.Add(cell)) continue;
            for (var r = (cell / 10) - 1; r <= (cell / 10) + 1; r++)
                for (var c = (cell % 10) - 1; c <= (cell % 10) + 1; c++)
                    if (terrain.Frame.Contains(r, c)) todo.Push((r * 10) + c);
        }

        return wet;
    }
}
