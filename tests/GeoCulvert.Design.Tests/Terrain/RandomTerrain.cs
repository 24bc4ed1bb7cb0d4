using CsCheck;
using GeoCulvert.Design.Terrain;

namespace GeoCulvert.Design.Tests.Terrain;

/// <summary>Small random terrain of every kind that has made trouble: noise, terraces, plateaus, holes, thin strips, bowls.</summary>
internal static class RandomTerrain
{
    private static readonly Gen<float> Noise = Gen.Float[0, 100];
    private static readonly Gen<float> Terraces = Gen.Int[0, 3].Select(i => (float)i);
    private static readonly Gen<float> Steps = Gen.Int[-1, 12].Select(i => i / 4f);

    public static readonly Gen<Grid<float>> Any =
        from columns in Gen.Int[1, 22] // wide enough for rows of vectors
        from rows in Gen.Int[1, 14]
        from width in Gen.OneOf(Gen.Const(1.0), Gen.Const(3.0), Gen.Const(26.5))
        from height in Gen.OneOf(Gen.Const(1.0), Gen.Const(2.0), Gen.Const(26.5))
        from heights in Gen.OneOf(Noise, Terraces, Steps, Gen.Const(5f)).Array[columns * rows]
        from shape in Gen.Int[0, 3]
        from holes in Gen.OneOf(Gen.Const(0), Gen.Const(0), Gen.Const(4), Gen.Const(20), Gen.Const(100))
        from hole in Gen.Int[0, 99].Array[columns * rows]
        select Build(new GridFrame(columns, rows, 500, 900, width, height), heights, shape, holes, hole);

    /// <summary>The grid as text, for a failed case.</summary>
    public static string Text(Grid<float> z) => string.Join('\n', z.Cells.Chunk(z.Frame.Columns).Select(r => string.Join(' ', r.Select(v => $"{v:R}"))))
        + $"\n{z.Frame}";

    private static Grid<float> Build(GridFrame frame, float[] heights, int shape, int holes, int[] hole)
    {
        var z = new Grid<float>(frame);
        for (var i = 0; i < heights.Length; i++)
        {
            double x = (i % frame.Columns) - (frame.Columns / 2.0), y = (i / frame.Columns) - (frame.Rows / 2.0);
            z.Cells[i] = hole[i] < holes ? float.NaN : shape switch
            {
                1 => heights[i] + (float)Math.Floor((x * x) + (y * y)), // bowl
                2 => heights[i] + (float)(3 * x), // tilted
                3 => Math.Min(heights[i], 2), // plateau with pits
                _ => heights[i],
            };
        }

        return z;
    }
}
