using System.Globalization;
using GeoCulvert.Design.Basis;

namespace GeoCulvert.Layers;

/// <summary>How far tiles that are joined agree: cell size, place of the cells, values where they overlap.</summary>
internal static class TileDoubts
{
    private const double SameShare = 1e-6, OnGridShare = 0.01, SameValue = 0.005;

    /// <summary>Doubts about tiles, in the order in which they are laid over each other.</summary>
    public static IReadOnlyList<Finding> Of(IReadOnlyList<RasterSource> tiles, double? statedNoData)
    {
        var finest = tiles.MinBy(t => t.GeoTransform[1] * -t.GeoTransform[5])!;
        var coarse = tiles.Where(t => !SameCells(t, finest)).ToArray();
        var shifted = tiles.Except(coarse).Select(t => (Tile: t, Share: ShiftShare(t, finest))).Where(p => p.Share > OnGridShare).ToArray();
        var findings = new List<Finding>();
        if (coarse.Length > 0)
            findings.Add(LayerFindings.TilesDiffer.With($"{coarse.Length} of {tiles.Count} tiles, for example {coarse[0].Path} with cells of {Cell(coarse[0])} where the finest are {Cell(finest)}"));
        if (shifted.Length > 0)
        {
            var (tile, share) = shifted.MaxBy(p => p.Share);
            findings.Add(LayerFindings.TilesDiffer.With(string.Create(CultureInfo.InvariantCulture, $"{shifted.Length} of {tiles.Count} tiles lie off the grid of {finest.Path}, {tile.Path} by {share:0.##} of a cell"), share, OnGridShare));
        }

        if (Disagreement(tiles, statedNoData) is { } disagreement) findings.Add(disagreement);
        return findings;
    }

    private static Finding? Disagreement(IReadOnlyList<RasterSource> tiles, double? statedNoData)
    {
        // Sorted by their western edges, a tile can only overlap those that begin before it ends.
        var order = Enumerable.Range(0, tiles.Count).OrderBy(i => tiles[i].GeoTransform[0]).ToArray();
        long different = 0, shared = 0;
        double most = 0;
        var worst = "";
        for (var a = 0; a < order.Length; a++)
        {
            for (var b = a + 1; b < order.Length && tiles[order[b]].GeoTransform[0] < East(tiles[order[a]]); b++)
            {
                var (under, over) = (tiles[Math.Min(order[a], order[b])], tiles[Math.Max(order[a], order[b])]);
                if (!SameCells(under, over) || ShiftShare(under, over) > OnGridShare) continue;
                var (both, unlike, apart) = Compare(under, over, statedNoData);
                (shared, different) = (shared + both, different + unlike);
                if (apart > most) (most, worst) = (apart, $"{under.Path} and {over.Path}");
            }
        }

        return different == 0 ? null : LayerFindings.TilesDisagree.With(string.Create(
            CultureInfo.InvariantCulture, $"{different} of {shared} shared cells, by up to {most:0.###} in the file's unit between {worst}"), most, SameValue);
    }

    private static (long Shared, long Different, double Most) Compare(RasterSource a, RasterSource b, double? statedNoData)
    {
        double cellX = a.GeoTransform[1], cellY = -a.GeoTransform[5];
        int dx = (int)Math.Round((b.GeoTransform[0] - a.GeoTransform[0]) / cellX), dy = (int)Math.Round((a.GeoTransform[3] - b.GeoTransform[3]) / cellY);
        int left = Math.Max(0, dx), right = Math.Min(a.Columns, dx + b.Columns), top = Math.Max(0, dy), bottom = Math.Min(a.Rows, dy + b.Rows);
        if (right <= left || bottom <= top) return default;
        float[] here = new float[right - left], there = new float[right - left];
        long shared = 0, different = 0;
        double most = 0;
        for (var row = top; row < bottom; row++)
        {
            a.ReadWindow(left, row, here.Length, 1, here, statedNoData);
            b.ReadWindow(left - dx, row - dy, there.Length, 1, there, statedNoData);
            for (var i = 0; i < here.Length; i++)
            {
                var apart = Math.Abs((double)here[i] - there[i]);
                if (double.IsNaN(apart)) continue;
                shared++;
                if (apart <= SameValue) continue;
                different++;
                most = Math.Max(most, apart);
            }
        }

        return (shared, different, most);
    }

    private static bool SameCells(RasterSource a, RasterSource b) =>
        Math.Abs((a.GeoTransform[1] / b.GeoTransform[1]) - 1) <= SameShare && Math.Abs((a.GeoTransform[5] / b.GeoTransform[5]) - 1) <= SameShare;

    private static double ShiftShare(RasterSource a, RasterSource b)
    {
        double x = (a.GeoTransform[0] - b.GeoTransform[0]) / b.GeoTransform[1], y = (a.GeoTransform[3] - b.GeoTransform[3]) / b.GeoTransform[5];
        return Math.Max(Math.Abs(x - Math.Round(x)), Math.Abs(y - Math.Round(y)));
    }

    private static double East(RasterSource tile) => tile.GeoTransform[0] + (tile.GeoTransform[1] * tile.Columns);

    private static string Cell(RasterSource tile) => string.Create(CultureInfo.InvariantCulture, $"{tile.GeoTransform[1]:0.########} x {-tile.GeoTransform[5]:0.########}");
}
