using GeoCulvert.Design.Terrain;

namespace GeoCulvert.Report.Relief;

/// <summary>
/// Shaded relief of a terrain lit from the north-west.
/// <para>
/// p, q  slope towards east and north, m/m: Horn, "Hill shading and the reflectance map", Proc. IEEE 69(1), 1981, weighted differences of
/// the 3 x 3 cells around a cell. Light from azimuth 315 degrees, altitude 45 degrees (common practice).
/// shade = max(0, n . l), n = (-p, -q, 1) / sqrt(1 + p^2 + q^2), l = (sin az cos alt, cos az cos alt, sin alt).
/// </para>
/// </summary>
public static class Hillshade
{
    /// <summary>Shade of every cell, 0 (dark) to 1 (faces the light); NaN where the terrain has no value.</summary>
    /// <param name="terrain">Elevations in m on a metric north-up frame; NaN is nodata.</param>
    /// <param name="verticalExaggeration">Factor on the elevations.</param>
    /// <param name="azimuthDeg">Direction the light comes from, degrees clockwise from north.</param>
    /// <param name="altitudeDeg">Height of the light above the horizon, degrees.</param>
    public static float[] Shade(Grid<float> terrain, double verticalExaggeration = 1, double azimuthDeg = 315, double altitudeDeg = 45)
    {
        ArgumentNullException.ThrowIfNull(terrain);
        var (azimuth, altitude) = (double.DegreesToRadians(azimuthDeg), double.DegreesToRadians(altitudeDeg));
        var (east, north, up) = (Math.Sin(azimuth) * Math.Cos(altitude), Math.Cos(azimuth) * Math.Cos(altitude), Math.Sin(altitude));
        var shade = new float[terrain.Cells.Length];
        ForEachGradient(terrain, verticalExaggeration, (i, p, q) =>
            shade[i] = (float)Math.Max(0, ((-p * east) - (q * north) + up) / Math.Sqrt(1 + (p * p) + (q * q))), i => shade[i] = float.NaN);
        return shade;
    }

    /// <summary>
    /// The vertical exaggeration, between 1 and 10, that brings the slope exceeded by a tenth of the land to one in two, so that a plain
    /// shows its relief as well as a mountain does; rounded to one half.
    /// </summary>
    public static double ReadableExaggeration(Grid<float> terrain)
    {
        ArgumentNullException.ThrowIfNull(terrain);
        var slopes = new List<float>(terrain.Cells.Length);
        ForEachGradient(terrain, 1, (_, p, q) => slopes.Add((float)Math.Sqrt((p * p) + (q * q))), _ => { });
        if (slopes.Count == 0) return 1;
        slopes.Sort();
        var steep = slopes[(int)(0.9 * (slopes.Count - 1))];
        return steep <= 0 ? 1 : Math.Clamp(Math.Round(2 * 0.5 / steep) / 2, 1, 10);
    }

    /// <summary>Means of square blocks of cells so that the longer side has at most so many; NaN only where a whole block is.</summary>
    public static Grid<float> Coarsen(Grid<float> terrain, int longestSide)
    {
        ArgumentNullException.ThrowIfNull(terrain);
        ArgumentOutOfRangeException.ThrowIfLessThan(longestSide, 1);
        var f = terrain.Frame;
        var k = (Math.Max(f.Columns, f.Rows) + longestSide - 1) / longestSide;
        if (k <= 1) return terrain;
        var coarse = new Grid<float>(new GridFrame((f.Columns + k - 1) / k, (f.Rows + k - 1) / k, f.West, f.North, f.CellWidthM * k, f.CellHeightM * k));
        for (var r = 0; r < coarse.Frame.Rows; r++)
        {
            for (var c = 0; c < coarse.Frame.Columns; c++)
            {
                var (sum, count) = (0.0, 0);
                for (var y = r * k; y < Math.Min((r + 1) * k, f.Rows); y++)
                {
                    for (var x = c * k; x < Math.Min((c + 1) * k, f.Columns); x++)
                    {
                        var z = terrain[y, x];
                        if (float.IsFinite(z)) (sum, count) = (sum + z, count + 1);
                    }
                }
                coarse[r, c] = count == 0 ? float.NaN : (float)(sum / count);
            }
        }
        return coarse;
    }

    /// <summary>Calls back with the slopes of every cell; a missing neighbour is the opposite one mirrored through the cell, else the cell.</summary>
    private static void ForEachGradient(Grid<float> terrain, double factor, Action<int, double, double> land, Action<int> none)
    {
        var f = terrain.Frame;
        var cells = terrain.Cells;
        var (perX, perY) = (factor / (8 * f.CellWidthM), factor / (8 * f.CellHeightM));
        for (var r = 0; r < f.Rows; r++)
        {
            for (var c = 0; c < f.Columns; c++)
            {
                var i = (r * f.Columns) + c;
                double z = cells[i];
                if (!double.IsFinite(z)) { none(i); continue; }
                var (nw, n, ne) = (At(-1, -1), At(-1, 0), At(-1, 1));
                var (w, e) = (At(0, -1), At(0, 1));
                var (sw, s, se) = (At(1, -1), At(1, 0), At(1, 1));
                land(i, (ne + (2 * e) + se - nw - (2 * w) - sw) * perX, (nw + (2 * n) + ne - sw - (2 * s) - se) * perY);

                double At(int dr, int dc)
                {
                    if (f.Contains(r + dr, c + dc) && cells[i + (dr * f.Columns) + dc] is var v && float.IsFinite(v)) return v;
                    return f.Contains(r - dr, c - dc) && cells[i - (dr * f.Columns) - dc] is var o && float.IsFinite(o) ? (2 * z) - o : z;
                }
            }
        }
    }
}
