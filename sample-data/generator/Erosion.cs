namespace GeoCulvert.SampleData;

/// <summary>
/// Hills and valleys worn by rivers: dz/dt = U - K A^m S + D lap(z), the stream-power law solved implicitly from the outlets up (Braun and
/// Willett 2013), slopes smoothed by diffusion. Worked from a wide mesh to the wanted one, so that the cost stays a few steps a node.
/// </summary>
/// <remarks>m = 3/8, because A^(3/8) needs square roots only, which every machine rounds alike.</remarks>
public static class Erosion
{
    /// <summary>Rise of the ground in a step, m.</summary>
    private const double RisePerStepM = 1.0;

    /// <summary>U / K: slope where the drained area is 1 m2 and nothing else works, m^(3/4).</summary>
    private const double Steepness = 3.4;

    /// <summary>D / U: the larger, the rounder the hilltops, m.</summary>
    private const double RoundnessM = 100;

    /// <summary>Height of the first row: the country falls away on that side too, though less.</summary>
    private const double NorthM = 112;

    /// <summary>
    /// The eroded surface, m above its outlet row, <paramref name="rows"/> x <paramref name="cols"/> nodes of <paramref name="nodeM"/> metres.
    /// Rivers leave over the last row, and over the first at a greater height; the other two sides are divides.
    /// </summary>
    public static double[] Run(int rows, int cols, double nodeM, ulong seed) => Level(rows, cols, nodeM, seed, 0);

    private static double[] Level(int rows, int cols, double nodeM, ulong seed, int level)
    {
        double[] z;
        int steps;
        if (Math.Min(rows, cols) < 64 || level == 4)
        {
            z = new double[rows * cols];
            for (var i = 0; i < z.Length; i++)
            {
                var (y, x) = (i / cols * nodeM, i % cols * nodeM);
                z[i] = 8 * HashNoise.Fractal(seed, x / 900, y / 900, 5) + 0.006 * (rows * nodeM - y);
            }

            steps = 150;
        }
        else
        {
            var (wideRows, wideCols) = (rows / 2 + 1, cols / 2 + 1);
            var wide = Level(wideRows, wideCols, nodeM * 2, seed, level + 1);
            z = Twice(wide, wideCols, rows, cols);
            for (var i = 0; i < z.Length; i++) z[i] += 0.4 * (HashNoise.Uniform(seed + 77, i / cols, i % cols) - 0.5) * nodeM / 16;
            steps = level == 0 ? 24 : level == 1 ? 40 : 60;
        }

        for (var s = 0; s < steps; s++) Step(z, rows, cols, nodeM, seed);
        return z;
    }

    private static void Step(double[] z, int rows, int cols, double nodeM, ulong seed)
    {
        var water = Drainage.Of(z, rows, cols, (r, _) => r == rows - 1 || r == 0);
        var area = water.Areas(nodeM * nodeM);
        for (var k = 0; k < water.Order.Length; k++)
        {
            var i = water.Order[k];
            var j = water.Receiver[i];
            var (y, x) = (i / cols * nodeM, i % cols * nodeM);
            if (i == j)
            {
                z[i] = i < cols ? NorthM : 0;
                continue;
            }

            var rise = RisePerStepM * (1 + 0.6 * HashNoise.Gradient(seed + 1001, x / 2600, y / 2600));
            var hardness = 1 + 0.35 * HashNoise.Gradient(seed + 2002, x / 700, y / 700);
            var raised = water.Filled[i] + rise; // hollows are filled with mud as they form
            if (raised <= z[j])
            {
                z[i] = raised;
                continue;
            }

            var diagonal = j != i - 1 && j != i + 1 && j != i - cols && j != i + cols;
            var root = Math.Sqrt(Math.Sqrt(area[i]));
            var f = RisePerStepM / (Steepness * hardness) * root * Math.Sqrt(root) / (diagonal ? nodeM * 1.4142135623730951 : nodeM);
            z[i] = (raised + f * z[j]) / (1 + f);
        }

        Diffuse(z, rows, cols, RoundnessM * RisePerStepM / (nodeM * nodeM));
    }

    /// <summary>Explicit diffusion in as many parts as stability asks (each at most 0.2).</summary>
    private static void Diffuse(double[] z, int rows, int cols, double number)
    {
        var parts = Math.Max(1, (int)Math.Ceiling(number / 0.2));
        var part = number / parts;
        var old = new double[z.Length];
        for (var p = 0; p < parts; p++)
        {
            Array.Copy(z, old, z.Length);
            for (var r = 1; r < rows - 1; r++)
            {
                for (var c = 0; c < cols; c++)
                {
                    var i = r * cols + c;
                    var up = old[i - cols];
                    var left = old[c > 0 ? i - 1 : i];
                    var right = old[c < cols - 1 ? i + 1 : i];
                    z[i] += part * (up + old[i + cols] + left + right - 4 * old[i]);
                }
            }
        }
    }

    private static double[] Twice(double[] wide, int wideCols, int rows, int cols)
    {
        var fine = new double[rows * cols];
        for (var r = 0; r < rows; r++)
        {
            for (var c = 0; c < cols; c++)
            {
                var (a, b) = (r / 2 * wideCols + c / 2, (r + 1) / 2 * wideCols + c / 2);
                var dc = (c + 1) / 2 - c / 2;
                fine[r * cols + c] = 0.25 * (wide[a] + wide[a + dc] + wide[b] + wide[b + dc]);
            }
        }

        return fine;
    }
}
