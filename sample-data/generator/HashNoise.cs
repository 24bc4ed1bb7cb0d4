namespace GeoCulvert.SampleData;

/// <summary>
/// Seeded chance as a pure function of place: the same numbers on every machine and framework, in any order of asking. Only integer
/// mixing and the four operations are used, which IEEE 754 defines exactly.
/// </summary>
public static class HashNoise
{
    /// <summary>Mixes a seed and two lattice numbers into 64 well-spread bits (the SplitMix64 finaliser, Steele and others 2014).</summary>
    public static ulong Bits(ulong seed, long x, long y)
    {
        unchecked
        {
            var z = seed + (ulong)x * 0x9E3779B97F4A7C15UL + (ulong)y * 0xD1B54A32D192ED03UL;
            z = (z ^ (z >> 30)) * 0xBF58476D1CE4E5B9UL;
            z = (z ^ (z >> 27)) * 0x94D049BB133111EBUL;
            return z ^ (z >> 31);
        }
    }

    /// <summary>A number in 0 to below 1.</summary>
    public static double Uniform(ulong seed, long x, long y) => (Bits(seed, x, y) >> 11) * (1.0 / (1UL << 53));

    /// <summary>A bell-shaped number of mean 0 and standard deviation 1 (sum of twelve uniforms less six).</summary>
    public static double Bell(ulong seed, long x, long y)
    {
        var bits = Bits(seed, x, y);
        var more = Bits(seed ^ 0xA5A5A5A5A5A5A5A5UL, x, y);
        var third = Bits(seed ^ 0x3C3C3C3C3C3C3C3CUL, x, y);
        double sum = 0;
        for (var k = 0; k < 64; k += 16) sum += ((bits >> k) & 0xFFFF) + ((more >> k) & 0xFFFF) + ((third >> k) & 0xFFFF) + 1.5;
        return sum / 65536 - 6;
    }

    /// <summary>Smooth gradient noise, about -1 to 1, with one feature per unit of x and y.</summary>
    public static double Gradient(ulong seed, double x, double y)
    {
        var (fx, fy) = (Math.Floor(x), Math.Floor(y));
        var (i, j) = ((long)fx, (long)fy);
        var (u, v) = (x - fx, y - fy);
        var (su, sv) = (u * u * u * (u * (u * 6 - 15) + 10), v * v * v * (v * (v * 6 - 15) + 10));
        var top = Mix(Slope(seed, i, j, u, v), Slope(seed, i + 1, j, u - 1, v), su);
        var low = Mix(Slope(seed, i, j + 1, u, v - 1), Slope(seed, i + 1, j + 1, u - 1, v - 1), su);
        return 1.5 * Mix(top, low, sv);
    }

    /// <summary>Gradient noise summed over octaves, each half as wide as the one before and <paramref name="gain"/> as high.</summary>
    public static double Fractal(ulong seed, double x, double y, int octaves, double gain = 0.5)
    {
        double sum = 0, height = 1;
        for (var o = 0; o < octaves; o++)
        {
            sum += height * Gradient(seed + (ulong)o, x, y);
            (x, y, height) = (x * 2 + 17.3, y * 2 - 9.1, height * gain);
        }

        return sum;
    }

    private static double Mix(double a, double b, double t) => a + (b - a) * t;

    private static double Slope(ulong seed, long i, long j, double u, double v)
    {
        var bits = Bits(seed, i, j);
        var gx = (bits & 0xFFFF) / 32767.5 - 1;
        var gy = ((bits >> 16) & 0xFFFF) / 32767.5 - 1;
        return gx * u + gy * v;
    }
}
