using CsCheck;
using GeoCulvert.Design.Terrain;

namespace GeoCulvert.Design.Tests.Terrain;

/// <summary>Cuts from pits: grids worked by hand, what holds for every terrain, the naive twin, real terrain.</summary>
public class DepressionBreachingTests
{
    private static readonly Gen<BreachSettings> Settings =
        from method in Gen.OneOf(Gen.Const(DepressionMethod.Breach), Gen.Const(DepressionMethod.Mix))
        from length in Gen.OneOf(Gen.Const(double.PositiveInfinity), Gen.Double[0, 40], Gen.Const(6.0))
        from depth in Gen.OneOf(Gen.Const(double.PositiveInfinity), Gen.Double[0, 30], Gen.Const(2.0))
        from share in Gen.OneOf(Gen.Const(1.0), Gen.Const(0.4), Gen.Const(3.0))
        select new BreachSettings(method, length, depth) { MaxCutShare = share };

    /// <summary>Heights in sixteenths: sums of cuts are then exact, so the twin's costs are the same whatever the order.</summary>
    private static readonly Gen<Grid<float>> Sixteenths = RandomTerrain.Any.Select(g => new Grid<float>(
        g.Frame, [.. g.Cells.Select(z => MathF.Round(z * 16) / 16)]));

    /// <summary>
    /// The pit of 1 lies in a ring of 9 with a gap of 4 in the east; behind it 0. West of it a gap of 3, behind that 8, then 0. East: 4 - 1 = 3 m cut, then lower
    /// ground. West: 2 m, then 7 m. So east, 2 steps of 2 m, 3 m x 6 m2 = 18 m3. Filling would take 3 m on one cell and 1 m on the gap of 3: 4 x 6 = 24 m3.
    /// </summary>
    [Fact]
    public void CheapestGapIsCut()
    {
        var z = Rows(2, 3,
            "9 9 9 9 9 9 9",
            "9 9 9 9 9 9 9",
            "0 8 3 1 4 0 0",
            "9 9 9 9 9 9 9",
            "9 9 9 9 9 9 9");
        foreach (var method in new[] { DepressionMethod.Breach, DepressionMethod.Mix })
        {
            var result = DepressionBreaching.Breach(z, new BreachSettings(method, 100, 100), TestContext.Current.CancellationToken);
            var breach = Assert.Single(result.Breaches);
            Assert.Equal([17, 18, 19], breach.Cells);
            Assert.Equal((1, 0, 4, 3, 18), (breach.PitLevelM, breach.EndLevelM, breach.LengthM, breach.MaxDepthM, breach.VolumeM3));
            Assert.Equal(method == DepressionMethod.Mix ? 24 : null, breach.PoolM3);
            Assert.Equal((1, 0, 0, 0, 1L, 18, 3), (result.Pits, result.OpenedByOthers, result.Left, result.Drowned, result.CutCells, result.VolumeM3, result.DeepestM));
            var expected = z.Cells.ToArray();
            expected[18] = 1;
            Assert.Equal(expected, result.Surface.Cells);
            Assert.Equal(ConditioningFindings.DepressionsBreached, Assert.Single(result.Findings).Kind);
        }
    }

    /// <summary>The same pit with each limit just kept and just not: 3 m deep, 4 m long, 18 of 24 m3.</summary>
    [Theory]
    [InlineData(DepressionMethod.Breach, 4, 3, 1, 1)]
    [InlineData(DepressionMethod.Breach, 3.99, 3, 1, 0)]
    [InlineData(DepressionMethod.Breach, 4, 2.99, 1, 0)]
    [InlineData(DepressionMethod.Breach, 4, 3, 0, 1)]
    [InlineData(DepressionMethod.Mix, 4, 3, 0.75, 1)]
    [InlineData(DepressionMethod.Mix, 4, 3, 0.74, 0)]
    [InlineData(DepressionMethod.Fill, 4, 3, 1, 0)]
    public void LimitsAreKept(DepressionMethod method, double length, double depth, double share, int cuts)
    {
        var z = Rows(2, 3, "9 9 9 9 9 9 9", "9 9 9 9 9 9 9", "0 8 3 1 4 0 0", "9 9 9 9 9 9 9", "9 9 9 9 9 9 9");
        var result = DepressionBreaching.Breach(
            z, new BreachSettings(method, length, depth) { MaxCutShare = share }, TestContext.Current.CancellationToken);
        Assert.Equal(cuts, result.Breaches.Count);
        if (cuts > 0) return;
        Assert.Same(z, result.Surface);
        if (method == DepressionMethod.Fill) Assert.Empty(result.Findings);
        else Assert.Equal(("depressions-not-breached", 1.0), (result.Findings.Single().Code, result.Findings.Single().Value!.Value));
    }

    /// <summary>
    /// Two pits in a row of three rows, so all but row 1 is rim. From the lower pit (1, cell 10) east takes 5 + 4 + 4 m, straight north over a rim cell of 9
    /// only 8 m, south the same; north is the smaller cell. It goes first. The higher pit (2, cell 8) then needs 1 m on the saddle of 3 to reach the lower ground.
    /// </summary>
    [Fact]
    public void LowestPitGoesFirstAndTheRimMayBeCut()
    {
        var z = Rows(1, 1, "9 9 9 9 9 9 9", "9 2 3 1 6 5 5", "9 9 9 9 9 9 9");
        var result = DepressionBreaching.Breach(z, new BreachSettings(DepressionMethod.Breach, 100, 100), TestContext.Current.CancellationToken);
        Assert.Equal([[10, 3], [8, 9, 10]], result.Breaches.Select(b => b.Cells));
        Assert.Equal([8, 1], result.Breaches.Select(b => b.VolumeM3));
        Assert.Equal([1, 1], result.Breaches.Select(b => b.EndLevelM));
    }

    /// <summary>
    /// The 1 is a pit; the cell at minus infinity two cells west of it is an outlet inside, no pit, and lower than anything: the cut through the 4 between them (3 m) is
    /// cheaper than any way over the 9s of the rim. The outlet itself is not touched.
    /// </summary>
    [Fact]
    public void AKeptSinkIsLowerGround()
    {
        var z = Rows(1, 1, "9 9 9 9 9", "9 7 4 1 9", "9 9 9 9 9");
        z.Cells[6] = float.NegativeInfinity;
        var result = DepressionBreaching.Breach(z, new BreachSettings(DepressionMethod.Mix, 100, 100), TestContext.Current.CancellationToken);
        var breach = Assert.Single(result.Breaches);
        Assert.Equal([8, 7, 6], breach.Cells);
        Assert.Equal((1, 3, 3.0), (result.Pits, breach.VolumeM3, breach.PoolM3!.Value));
        Assert.Equal([float.NegativeInfinity, 1, 1], result.Surface.Cells[6..9]);
    }

    /// <summary>
    /// The 2 and the 1 lie behind rims of 9 that a limit of 3 m closes. From the 2 a cut of 2 m through the 4 reaches the 1, but the pool that fills the hollow to 9 covers it: it
    /// is given back, and nothing is left of it.
    /// </summary>
    [Fact]
    public void CutsUnderAPoolAreGivenBack()
    {
        var z = Rows(1, 1, "9 9 9 9 9", "9 2 4 1 9", "9 9 9 9 9");
        var result = DepressionBreaching.Breach(z, new BreachSettings(DepressionMethod.Breach, 100, 3), TestContext.Current.CancellationToken);
        Assert.Empty(result.Breaches);
        Assert.Equal((2, 1, 1, 0L, 0), (result.Pits, result.Left, result.Drowned, result.CutCells, result.VolumeM3));
        Assert.Equal(z.Cells, result.Surface.Cells);
    }

    [Fact]
    public void EqualsTheNaiveOne() => Sixteenths.Select(Settings).Sample(
        (elevation, settings) =>
        {
            var before = elevation.Cells.ToArray();
            var expected = NaiveBreaching.Breach(elevation, settings);
            var result = DepressionBreaching.Breach(elevation, settings);
            Assert.Equal(expected.Ways, result.Breaches.Select(b => b.Cells));
            Assert.Equal(expected.Surface, result.Surface.Cells);
            Assert.Equal(expected.Left, result.Left);
            Assert.Equal(before, elevation.Cells);
        },
        iter: 4000, print: p => RandomTerrain.Text(p.Item1) + p.Item2);

    /// <summary>Larger grids, wide terraces with scattered pits and few holes: most pits have no lower ground within the length, so the shortcut that tells so decides.</summary>
    [Fact]
    public void EqualsTheNaiveOneWhereLowerGroundIsFar() => Gen.Select(Gen.Int[0, int.MaxValue], Gen.Double[1, 12], Gen.Int[2, 4]).Sample(
        (seed, length, kinds) =>
        {
            var chance = new Random(seed);
            var z = new Grid<float>(new GridFrame(100, 80, 0, 0, 1, 1.5));
            for (var i = 0; i < z.Cells.Length; i++)
            {
                var terrace = 10 * ((i % 100 / 40) + (i / 100 / 50));
                z.Cells[i] = chance.Next(3000) == 0 ? float.NaN : chance.Next(60) == 0 ? terrace - (chance.Next(kinds) / 2f) : terrace;
            }

            var settings = new BreachSettings(DepressionMethod.Breach, length, double.PositiveInfinity);
            var expected = NaiveBreaching.Breach(z, settings);
            var result = DepressionBreaching.Breach(z, settings);
            Assert.Equal(expected.Ways, result.Breaches.Select(b => b.Cells));
            Assert.Equal(expected.Surface, result.Surface.Cells);
            Assert.Equal(expected.Left, result.Left);
            Assert.True(result.Left > 0);
        },
        iter: 6);

    [Fact]
    public void NothingIsRaisedAndEveryCutKeepsItsLimits() => RandomTerrain.Any.Select(Settings).Sample(
        (elevation, settings) =>
        {
            var result = DepressionBreaching.Breach(elevation, settings);
            var z = result.Surface.Cells;
            var cut = Enumerable.Range(0, z.Length).Where(i => !float.IsNaN(z[i]) && z[i] != elevation.Cells[i]).ToList();
            Assert.All(cut, i => Assert.InRange(elevation.Cells[i] - z[i], 0, settings.MaxDepthM));
            Assert.Equal(cut.Count, result.CutCells);
            Assert.Equal(cut.Sum(i => (double)elevation.Cells[i] - z[i]) * elevation.Frame.CellAreaM2, result.VolumeM3, 1e-6);
            Assert.All(cut, i => Assert.Contains(result.Breaches, b => b.Cells.Contains(i)));
            Assert.All(result.Breaches, b =>
            {
                // The length counts from the edge of the pit's flat in whole units of 2^-20 m a step.
                Assert.True(b.LengthM <= settings.MaxLengthM + (b.Cells.Length * 1e-6), "too long");
                Assert.All(b.Cells.Zip(b.Cells.Skip(1)), s => Assert.Contains(NaiveTerrain.Neighbours(elevation.Frame, s.First), n => n.Cell == s.Second));
            });
            Assert.Equal(result.Pits, NaiveBreaching.Pits(elevation).Count);
            Assert.True(result.Breaches.Count + result.Drowned + result.OpenedByOthers + result.Left == result.Pits, "pits are lost");
        },
        iter: 3000, print: p => RandomTerrain.Text(p.Item1) + p.Item2);

    /// <summary>Without limits no pit is left, so filling finds nothing to do and every cell has a way down that never rises.</summary>
    [Fact]
    public void WithoutLimitsNothingIsLeftToFill() => RandomTerrain.Any.Sample(
        elevation =>
        {
            var result = DepressionBreaching.Breach(elevation, new BreachSettings(DepressionMethod.Breach, double.PositiveInfinity, double.PositiveInfinity));
            Assert.Equal(0, result.Left);
            Assert.Equal(0, DepressionFilling.Fill(result.Surface).RaisedCells);
        },
        iter: 3000, print: RandomTerrain.Text);

    /// <summary>After cutting and filling no step rises on the way to the rim, and filling never takes more than without the cuts.</summary>
    [Fact]
    public void CutAndFilledTerrainDrains() => RandomTerrain.Any.Select(Settings).Sample(
        (elevation, settings) =>
        {
            var result = DepressionBreaching.Breach(elevation, settings);
            var terrain = Drainage.Solve(result.Surface);
            var z = terrain.Filled.Surface.Cells;
            for (var i = 0; i < z.Length; i++)
            {
                if (float.IsNaN(z[i])) continue;
                var way = NaiveTerrain.WayDown(terrain.Direction, i);
                Assert.True(NaiveTerrain.IsRim(elevation, way[^1]), "ends inside");
                Assert.All(way.Zip(way.Skip(1)), s => Assert.True(z[s.Second] <= z[s.First], "runs uphill"));
            }

            Assert.True(terrain.Filled.VolumeM3 <= DepressionFilling.Fill(elevation).VolumeM3 + 1e-6, "more to fill than before");
        },
        iter: 2000, print: p => RandomTerrain.Text(p.Item1) + p.Item2);

    [Theory]
    [InlineData(-1, 1, 1)]
    [InlineData(1, -1, 1)]
    [InlineData(1, 1, -1)]
    [InlineData(double.NaN, 1, 1)]
    [InlineData(1, double.NaN, 1)]
    [InlineData(1, 1, double.NaN)]
    public void LimitsThatAreNoneAreRefused(double length, double depth, double share) => Assert.Throws<ArgumentException>(() => DepressionBreaching.Breach(
        Rows(1, 1, "1"), new BreachSettings(DepressionMethod.Breach, length, depth) { MaxCutShare = share }, TestContext.Current.CancellationToken));

    internal static Grid<float> Rows(double width, double height, params string[] rows)
    {
        float[][] z = [.. rows.Select(r => r.Split(' ', StringSplitOptions.RemoveEmptyEntries)
            .Select(t => t == "x" ? float.NaN : float.Parse(t, System.Globalization.CultureInfo.InvariantCulture)).ToArray())];
        return new Grid<float>(new GridFrame(z[0].Length, z.Length, 100, 200, width, height), [.. z.SelectMany(r => r)]);
    }
}
