namespace GeoCulvert.SampleData;

/// <summary>The invented valley: its recipe, its lake, flat, hollow and roads. The only place with figures of its own.</summary>
public static class WexmarrowVale
{
    /// <summary>Area at which a bed is cut and a road notices a stream, m2.</summary>
    public const double BedAreaM2 = 15_000;

    /// <summary>Area from which the road is raised over a stream, m2.</summary>
    private const double CrossingAreaM2 = 30_000;

    /// <summary>The hills.</summary>
    public static TerrainRecipe Recipe { get; } = new(1500, 1600, 4, 9) { NoiseM = 0.025, NorthwardM = 392 };

    /// <summary>East of the west rim, m.</summary>
    public static double WestM => 497_000;

    /// <summary>North of the north rim, m.</summary>
    public static double NorthM => 4_206_000;

    /// <summary>The lake.</summary>
    public static Blob Lake { get; } = new(595, 687, 80, 120);

    /// <summary>The level meadow.</summary>
    public static Blob Meadow { get; } = new(538, 868, 150, 45);

    /// <summary>The hollow without an outlet.</summary>
    public static Blob Hollow { get; } = new(830, 992, 125, 105);

    /// <summary>The valley road, on a bank and in cuttings.</summary>
    public static RoadPlan ValleyRoad { get; } = new("Wexmarrow Road", "collector", 10, "paved",
    [
        (738, 320), (746, 370), (748, 405), (738, 440), (716, 500), (720, 560), (730, 620), (738, 665), (766, 720), (774, 765), (770, 800),
        (788, 850), (823, 895), (868, 940), (903, 962), (958, 990), (1028, 1005), (1083, 1015), (1158, 1005), (1218, 965), (1278, 925),
        (1328, 905), (1383, 915), (1418, 924),
    ]);

    /// <summary>The lane, on the ground as it is.</summary>
    public static RoadPlan LakeLane { get; } = new("Lake Lane", "local", 5, "gravel",
    [
        (766, 720), (738, 738), (698, 752), (660, 772), (646, 812), (628, 850), (610, 880), (563, 897), (518, 893), (483, 895),
    ]);

    /// <summary>The finished valley.</summary>
    /// <param name="Land">The ground with its roads.</param>
    /// <param name="Lake">Cells of the lake.</param>
    /// <param name="AreaM2">Area above each cell before the roads, m2.</param>
    /// <param name="Roads">The roads.</param>
    /// <param name="Opened">Streams where the bank was taken out of the terrain.</param>
    public sealed record Valley(MadeSurface Land, bool[] Lake, double[] AreaM2, IReadOnlyList<RoadLine> Roads, IReadOnlyList<BedCrossing> Opened);

    /// <summary>Makes the valley.</summary>
    public static Valley Make()
    {
        var seed = Recipe.Seed;
        var land = SampleTerrain.Make(Recipe with { NoiseM = 0, StepM = 1e-6 });
        var (lake, meadow) = (new bool[land.ElevationM.Length], new bool[land.ElevationM.Length]);
        var first = Drainage.Of(Array.ConvertAll(land.ElevationM, e => (double)e), land.Rows, land.Cols, (_, _) => true).Areas(1);
        var (level, pool) = (Meadow.OnStream(first, land.Cols, 25), Lake.OnStream(first, land.Cols, 25));
        var meadowM = Math.Round(At(land, level), 1);
        Landforms.Level(land, level, meadowM, 0, seed + 3, meadow);
        var lakeM = Math.Round(At(land, pool));
        Landforms.Level(land, pool, lakeM, 0.6, seed + 2, lake);
        Landforms.Hollow(land, Hollow, 15, seed + 4);
        var (area, _) = Landforms.Streams(land, lake, BedAreaM2);

        var road = RoadLine.Along(ValleyRoad, land.CellM);
        road.Grade(land, area, CrossingAreaM2);
        var spare = new bool[land.ElevationM.Length];
        var opened = road.Streams.Where((_, k) => k % 2 == 1).ToList();
        foreach (var at in opened) road.Spare(land, at, area, BedAreaM2, spare);
        road.Build(land, 2, spare);

        for (var i = 0; i < meadow.Length; i++) meadow[i] &= land.ElevationM[i] == (float)meadowM; // not where its stream runs
        SampleTerrain.Survey(land.ElevationM, Recipe);
        for (var i = 0; i < lake.Length; i++)
        {
            if (meadow[i]) land.ElevationM[i] = (float)meadowM;
            if (lake[i]) land.ElevationM[i] = (float)lakeM;
        }

        SampleTerrain.Round(land.ElevationM, Recipe.StepM);
        return new(land, lake, area, [road, RoadLine.Along(LakeLane, land.CellM)], opened);
    }

    private static double At(MadeSurface land, Blob blob) => land.ElevationM[(int)blob.Row * land.Cols + (int)blob.Col];
}
