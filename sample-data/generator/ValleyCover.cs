namespace GeoCulvert.SampleData;

/// <summary>Land cover and soil groups that suit the ground: woods on steep land, fields on the plain, wet soils by the water.</summary>
public static class ValleyCover
{
    /// <summary>
    /// Codes on a mesh that overlaps the terrain on every side and is not aligned with it: cover in the codes of the United States' National Land
    /// Cover Database, soil groups 1 to 4 = A to D, 6 = B/D, 7 = C/D.
    /// </summary>
    public static (byte[] Cover, byte[] Soil, int Rows, int Cols, double WestM, double NorthM) Make(WexmarrowVale.Valley valley, double cellM)
    {
        ArgumentNullException.ThrowIfNull(valley);
        var land = valley.Land;
        var rows = (int)(land.Rows * land.CellM / cellM) + 5;
        var cols = (int)(land.Cols * land.CellM / cellM) + 5;
        var (west, north) = (WexmarrowVale.WestM - 47, WexmarrowVale.NorthM + 33);
        var (cover, soil) = (new byte[rows * cols], new byte[rows * cols]);
        var near = NearRoad(valley, 60);
        for (var r = 0; r < rows; r++)
        {
            for (var c = 0; c < cols; c++)
            {
                var (x, y) = (west + (c + 0.5) * cellM - WexmarrowVale.WestM, WexmarrowVale.NorthM - north + (r + 0.5) * cellM);
                var (lr, lc) = (Math.Clamp((int)(y / land.CellM), 4, land.Rows - 5), Math.Clamp((int)(x / land.CellM), 4, land.Cols - 5));
                var i = lr * land.Cols + lc;
                var (dy, dx) = (land.ElevationM[i + 4 * land.Cols] - land.ElevationM[i - 4 * land.Cols], land.ElevationM[i + 4] - land.ElevationM[i - 4]);
                var slope = Math.Sqrt(dx * dx + dy * dy) / (8 * land.CellM);
                var site = new Site(x, y, slope, land.ElevationM[i], land.Plain[i], valley.Lake[i], near.TryGetValue(i, out var far) ? far : 1e9);
                (cover[r * cols + c], soil[r * cols + c]) = (Cover(site), Soil(site));
            }
        }

        return (cover, soil, rows, cols, west, north);
    }

    private static byte Cover(Site s)
    {
        var patch = HashNoise.Fractal(501, s.X / 420, s.Y / 420, 4);
        var field = HashNoise.Uniform(502, (long)Math.Floor((s.X + 0.3 * s.Y) / 190), (long)Math.Floor((s.Y - 0.3 * s.X) / 150));
        if (s.Lake) return 11;
        if (InHamlet(s) && s.RoadM < 60) return 22;
        if (s.RoadM < 14) return 21;
        if (s.Plain > 0.5) return patch > 0.35 ? (byte)90 : field < 0.4 ? (byte)82 : (byte)81;
        if (s.Slope + 0.05 * patch > 0.125) return patch > 0.1 ? (byte)42 : (byte)41;
        if (s.ElevationM > 415) return patch > 0 ? (byte)71 : (byte)52;
        return patch > 0.3 ? (byte)41 : patch < -0.35 ? (byte)52 : field < 0.22 ? (byte)82 : field < 0.75 ? (byte)81 : (byte)71;
    }

    private static byte Soil(Site s)
    {
        var patch = HashNoise.Fractal(601, s.X / 900, s.Y / 900, 3) + 0.25 * HashNoise.Gradient(602, s.X / 150, s.Y / 150);
        if (s.Lake) return 4;
        if (s.Plain > 0.5) return patch > 0 ? (byte)6 : (byte)7;
        if (s.Slope > 0.15) return 4;
        return patch > 0.75 ? (byte)1 : patch > 0 ? (byte)2 : patch > -0.6 ? (byte)3 : (byte)4;
    }

    private static bool InHamlet(Site s) => Math.Abs(s.Y - 778 * 4) < 330 && Math.Abs(s.X - 735 * 4) < 330;

    private static Dictionary<int, double> NearRoad(WexmarrowVale.Valley valley, double reachM)
    {
        var land = valley.Land;
        var near = new Dictionary<int, double>();
        var reach = (int)(reachM / land.CellM);
        foreach (var (row, col) in valley.Roads.SelectMany(road => road.Line))
        {
            for (var r = Math.Max(0, (int)row - reach); r <= Math.Min(land.Rows - 1, (int)row + reach); r++)
            {
                for (var c = Math.Max(0, (int)col - reach); c <= Math.Min(land.Cols - 1, (int)col + reach); c++)
                {
                    var far = Math.Sqrt((r - row) * (r - row) + (c - col) * (c - col)) * land.CellM;
                    if (far <= reachM && (!near.TryGetValue(r * land.Cols + c, out var old) || far < old)) near[r * land.Cols + c] = far;
                }
            }
        }

        return near;
    }

    private readonly record struct Site(double X, double Y, double Slope, double ElevationM, double Plain, bool Lake, double RoadM);
}
