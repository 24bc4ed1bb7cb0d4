using CsCheck;
using GeoCulvert.Design.Terrain;

namespace GeoCulvert.Design.Tests.Terrain;

/// <summary>What holds for every terrain, and the naive twins, on thousands of small random grids.</summary>
public class TerrainInvariantTests
{
    [Fact]
    public void FilledSurfaceEqualsTheNaiveOne() => RandomTerrain.Any.Sample(
        elevation =>
        {
            var filled = DepressionFilling.Fill(elevation);
            Assert.Equal(NaiveTerrain.Fill(elevation), filled.Surface.Cells);
            var raised = elevation.Cells.Zip(filled.Surface.Cells).Where(p => p.First < p.Second).Select(p => (double)p.Second - p.First).ToList();
            Assert.Equal(raised.Count, filled.RaisedCells);
            Assert.Equal(raised.DefaultIfEmpty(0).Max(), filled.DeepestM);
            Assert.Equal(raised.Sum() * elevation.Frame.CellAreaM2, filled.VolumeM3, 1e-6);
        },
        iter: 4000);

    /// <summary>
    /// Noise alone has too many pits for the graph of basins and is flooded; the same noise in a wide frame of nodata goes by the graph. Two
    /// algorithms, the same bits.
    /// </summary>
    [Fact]
    public void FloodAndGraphOfBasinsGiveTheSameBits() => Gen.Int[1, 4].Select(Gen.Int[0, int.MaxValue]).Sample(
        (kind, seed) =>
        {
            const int Side = 120, Wide = 400;
            var chance = new Random(seed);
            var noise = new Grid<float>(new GridFrame(Side, Side, 0, 0, 1, 1));
            var framed = new Grid<float>(new GridFrame(Wide, Wide, 0, 0, 1, 1));
            Array.Fill(framed.Cells, float.NaN);
            for (var i = 0; i < noise.Cells.Length; i++)
            {
                float z = kind switch { 1 => chance.NextSingle(), 2 => chance.Next(1000), 3 => chance.Next(40) + (i % Side), _ => chance.Next(9) };
                noise.Cells[i] = z;
                framed[(i / Side) + 100, (i % Side) + 150] = z;
            }

            var (alone, inFrame) = (DepressionFilling.Fill(noise), DepressionFilling.Fill(framed));
            for (var i = 0; i < noise.Cells.Length; i++) Assert.Equal(alone.Surface.Cells[i], inFrame.Surface[(i / Side) + 100, (i % Side) + 150]);
            Assert.Equal((alone.RaisedCells, alone.DeepestM), (inFrame.RaisedCells, inFrame.DeepestM));
        },
        iter: 40);

    [Fact]
    public void DirectionsEqualTheNaiveOnes() => RandomTerrain.Any.Sample(
        elevation =>
        {
            var filled = DepressionFilling.Fill(elevation).Surface;
            Assert.Equal(NaiveTerrain.Directions(filled), FlowDirections.Resolve(filled).Cells);
        },
        iter: 4000, print: RandomTerrain.Text);

    [Fact]
    public void EveryCellDrainsDownhillToTheRim() => RandomTerrain.Any.Sample(
        elevation =>
        {
            var terrain = Drainage.Solve(elevation);
            Assert.Same(elevation, terrain.Elevation);
            var z = terrain.Filled.Surface.Cells;
            for (var i = 0; i < z.Length; i++)
            {
                if (float.IsNaN(z[i]))
                {
                    Assert.Equal((0, 0), (terrain.Direction.Cells[i], terrain.Accumulation.Cells[i]));
                    continue;
                }

                var way = NaiveTerrain.WayDown(terrain.Direction, i);
                Assert.True(NaiveTerrain.IsRim(elevation, way[^1]), "ends inside");
                Assert.DoesNotContain(NaiveTerrain.Neighbours(elevation.Frame, way[^1]), n => z[n.Cell] < z[way[^1]]);
                Assert.All(way.Zip(way.Skip(1)), s => Assert.True(z[s.Second] <= z[s.First], "runs uphill"));
            }
        },
        iter: 3000);

    [Fact]
    public void AccumulationCountsTheCellsWhoseWayPasses() => RandomTerrain.Any.Sample(
        elevation =>
        {
            var terrain = Drainage.Solve(elevation);
            var passes = new int[elevation.Cells.Length];
            long valid = 0;
            for (var i = 0; i < passes.Length; i++)
            {
                if (float.IsNaN(elevation.Cells[i])) continue;
                valid++;
                foreach (var cell in NaiveTerrain.WayDown(terrain.Direction, i)) passes[cell]++;
            }

            Assert.Equal(passes, terrain.Accumulation.Cells);
            Assert.Equal(valid, passes.Where((_, i) => terrain.Direction.Cells[i] == 0).Sum(a => (long)a));
        },
        iter: 3000);

    [Fact]
    public void LabelsAreTheFirstOutletOnTheWayDown() => RandomTerrain.Any.Select(Gen.Int[0, 1 << 20].Array[0, 9]).Sample(
        (elevation, draws) =>
        {
            var direction = Drainage.Solve(elevation).Direction;
            int[] outlets = [.. draws.Select(d => d % elevation.Cells.Length)];
            var labelled = WatershedLabels.Label(direction, outlets);
            var local = new long[outlets.Length];
            var total = new long[outlets.Length];
            int First(int cell) => Array.IndexOf(outlets, cell);
            for (var i = 0; i < elevation.Cells.Length; i++)
            {
                var met = NaiveTerrain.WayDown(direction, i).Select(First).Where(k => k >= 0).ToList();
                Assert.Equal(met.FirstOrDefault(-1) + 1, labelled.Labels.Cells[i]);
                if (met.Count > 0) local[met[0]]++;
                met.ForEach(k => total[k]++);
            }

            for (var k = 0; k < outlets.Length; k++)
            {
                if (First(outlets[k]) != k)
                {
                    Assert.Equal((0, First(outlets[k])), (labelled.LocalCells[k], labelled.Parent[k]));
                    continue;
                }

                var below = NaiveTerrain.WayDown(direction, outlets[k]).Skip(1).Select(First).FirstOrDefault(j => j >= 0, -1);
                Assert.Equal((below, local[k], total[k]), (labelled.Parent[k], labelled.LocalCells[k], labelled.TotalCells[k]));
            }
        },
        iter: 3000);

    [Fact]
    public void LongestPathsAreTheLongestOfAllWaysDown() => RandomTerrain.Any.Select(Gen.Int[0, 1 << 20].Array[1, 6]).Sample(
        (elevation, draws) =>
        {
            var direction = Drainage.Solve(elevation).Direction;
            int[] outlets = [.. draws.Select(d => d % elevation.Cells.Length)];
            var paths = LongestFlowPath.Trace(direction, outlets);
            var ways = Enumerable.Range(0, elevation.Cells.Length).Select(i => NaiveTerrain.WayDown(direction, i)).ToList();
            for (var k = 0; k < outlets.Length; k++)
            {
                var through = ways.Where(w => w.Contains(outlets[k])).Select(w => w[..(w.IndexOf(outlets[k]) + 1)]).ToList();
                var longest = through.Max(w => LengthM(direction, w));
                Assert.Equal(longest, LengthM(direction, paths[k]), 1e-9);

                // Of equally long ones that with the smallest first cell; ways this short differ by more than rounding or not at all.
                Assert.Equal(through.Where(w => LengthM(direction, w) > longest - 1e-9).Min(w => w[0]), paths[k][0]);
                Assert.Equal(NaiveTerrain.WayDown(direction, paths[k][0])[..paths[k].Length], paths[k]);
                Assert.Equal(outlets[k], paths[k][^1]);
            }
        },
        iter: 2000);

    private static double LengthM(Grid<byte> direction, IReadOnlyList<int> way) =>
        way.Take(way.Count - 1).Sum(cell => D8.StepLengthM(direction.Frame, direction.Cells[cell]));
}
