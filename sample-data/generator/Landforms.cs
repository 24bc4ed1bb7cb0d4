namespace GeoCulvert.SampleData;

/// <summary>A round-ish outline: an ellipse with a wavy rim.</summary>
/// <param name="Row">Row of the centre.</param>
/// <param name="Col">Column of the centre.</param>
/// <param name="HalfHeightM">Half its extent north-south, m.</param>
/// <param name="HalfWidthM">Half its extent east-west, m.</param>
public sealed record Blob(double Row, double Col, double HalfHeightM, double HalfWidthM)
{
    /// <summary>The same outline about the cell within reach (cells) that most land drains to.</summary>
    public Blob OnStream(double[] area, int cols, int reach)
    {
        ArgumentNullException.ThrowIfNull(area);
        var best = (int)Row * cols + (int)Col;
        for (var r = (int)Row - reach; r <= (int)Row + reach; r++)
        {
            for (var c = (int)Col - reach; c <= (int)Col + reach; c++)
            {
                if (area[r * cols + c] > area[best]) best = r * cols + c;
            }
        }

        return this with { Row = best / cols, Col = best % cols };
    }

    /// <summary>About the distance from the rim, m: negative inside.</summary>
    public double DistanceM(int row, int col, double cellM, ulong seed)
    {
        var (y, x) = ((row - Row) * cellM, (col - Col) * cellM);
        var (v, u) = (y / HalfHeightM, x / HalfWidthM);
        var wavy = 1 + 0.3 * HashNoise.Fractal(seed, x / 160, y / 160, 3);
        return (Math.Sqrt(u * u + v * v) - wavy) * Math.Sqrt(HalfHeightM * HalfWidthM);
    }
}

/// <summary>Single features set into made terrain.</summary>
public static class Landforms
{
    /// <summary>
    /// Makes an exactly level surface inside the outline, banks of 1 in 5 up to the hill behind and a low rim of <paramref name="rimM"/>
    /// with a bank down in front. Marks the level cells.
    /// </summary>
    public static void Level(MadeSurface land, Blob blob, double levelM, double rimM, ulong seed, bool[] mark)
    {
        ArgumentNullException.ThrowIfNull(land);
        ArgumentNullException.ThrowIfNull(blob);
        ArgumentNullException.ThrowIfNull(mark);
        for (var r = 0; r < land.Rows; r++)
        {
            for (var c = 0; c < land.Cols; c++)
            {
                var far = blob.DistanceM(r, c, land.CellM, seed);
                if (far > 150) continue;
                var i = r * land.Cols + c;
                if (far <= 0)
                {
                    (land.ElevationM[i], mark[i]) = ((float)levelM, true);
                    continue;
                }

                var rim = levelM + rimM * Math.Min(1, far / 6) - 0.2 * Math.Max(0, far - 14);
                var bank = levelM + 0.15 + 0.2 * far;
                land.ElevationM[i] = (float)Math.Max(rim, Math.Min(bank, land.ElevationM[i]));
            }
        }
    }

    /// <summary>Lowers a bowl without an outlet into the ground, deepest by <paramref name="depthM"/> in the middle.</summary>
    public static void Hollow(MadeSurface land, Blob blob, double depthM, ulong seed)
    {
        ArgumentNullException.ThrowIfNull(land);
        ArgumentNullException.ThrowIfNull(blob);
        var size = Math.Sqrt(blob.HalfHeightM * blob.HalfWidthM);
        for (var r = 0; r < land.Rows; r++)
        {
            for (var c = 0; c < land.Cols; c++)
            {
                var far = blob.DistanceM(r, c, land.CellM, seed);
                if (far >= 0) continue;
                var t = Math.Min(1, -far / size);
                land.ElevationM[r * land.Cols + c] -= (float)(depthM * t * t * (3 - 2 * t));
            }
        }
    }

    /// <summary>Cuts stream beds into the ground along the paths of water. Returns the area above each cell, m2, and where its water goes.</summary>
    /// <param name="land">The ground, which is changed.</param>
    /// <param name="still">Cells of lakes, which are left alone.</param>
    /// <param name="leastAreaM2">Area at which a bed begins, m2.</param>
    public static (double[] AreaM2, int[] Receiver) Streams(MadeSurface land, bool[] still, double leastAreaM2)
    {
        ArgumentNullException.ThrowIfNull(land);
        ArgumentNullException.ThrowIfNull(still);
        var z = Array.ConvertAll(land.ElevationM, e => (double)e);
        var water = Drainage.Of(z, land.Rows, land.Cols, (_, _) => true);
        var area = water.Areas(land.CellM * land.CellM);
        var cap = new double[z.Length];
        Array.Fill(cap, double.PositiveInfinity);
        for (var k = z.Length - 1; k >= 0; k--)
        {
            var i = water.Order[k];
            if (area[i] < leastAreaM2) continue;
            var to = water.Receiver[i];
            if (still[i])
            {
                cap[to] = Math.Min(cap[to], z[i] - 0.03);
                continue;
            }

            if (water.Filled[i] > z[i] + 0.6) continue; // inside a closed hollow: it stays closed
            var root = Math.Sqrt(Math.Sqrt(area[i] / 1e6));
            var bed = Math.Max(Math.Min(water.Filled[i] - Math.Min(1.5, 0.2 + 0.65 * root), cap[i]), z[i] - 4);
            Lower(land, i, bed);
            var (r, c) = (i / land.Cols, i % land.Cols);
            foreach (var (rr, cc) in (ReadOnlySpan<(int, int)>)[(r - 1, c), (r + 1, c), (r, c - 1), (r, c + 1)])
            {
                if ((uint)rr >= (uint)land.Rows || (uint)cc >= (uint)land.Cols || still[rr * land.Cols + cc]) continue;
                Lower(land, rr * land.Cols + cc, Math.Max(bed + (area[i] > 1e6 ? 0.15 : 0.5), z[rr * land.Cols + cc] - 1.2));
            }

            cap[to] = Math.Min(cap[to], bed - 0.004);
        }

        return (area, water.Receiver);
    }

    private static void Lower(MadeSurface land, int i, double level) => land.ElevationM[i] = (float)Math.Min(land.ElevationM[i], level);
}
