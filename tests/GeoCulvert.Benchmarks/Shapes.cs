using GeoCulvert.Design.Terrain;
using GeoCulvert.SampleData;

namespace GeoCulvert.Benchmarks;

/// <summary>Seeded terrain of any size: as a laser survey sees it, and the shapes that fast paths lose on.</summary>
internal static class Shapes
{
    public static readonly (string Name, Func<int, Grid<float>> Make)[] All =
    [
        ("lidar-like", LidarLike),
        ("white noise", n => Make(n, (_, _, chance) => chance.NextSingle() * 100)),
        ("giant bowl", n => Make(n, (x, y, _) => (float)((x * x) + (y * y)) * 100)),
        ("1 m terraces", n => Make(n, (x, y, _) => (float)Math.Floor(30 * (x + (0.3 * y) + (0.1 * Math.Sin(20 * y)))))),
        ("1 m delta", n => Make(n, (x, y, chance) => (float)Math.Floor((6 * x) + (2 * Math.Sin(9 * y)) + chance.NextDouble()))),
    ];

    private static Grid<float> LidarLike(int side)
    {
        var made = SampleTerrain.Make(new TerrainRecipe(side, side, 1, 7) { NoiseM = 0.03, PitShare = 0.004, EmbankmentEveryM = 700 });
        return new Grid<float>(new GridFrame(made.Cols, made.Rows, 0, 0, made.CellM, made.CellM), made.ElevationM);
    }

    private static Grid<float> Make(int side, Func<double, double, Random, float> height)
    {
        var chance = new Random(7);
        var z = new Grid<float>(new GridFrame(side, side, 0, 0, 1, 1));
        for (var i = 0; i < z.Cells.Length; i++)
            z.Cells[i] = height(((i % side) / (double)side) - 0.5, ((i / side) / (double)side) - 0.5, chance);
        return z;
    }
}
