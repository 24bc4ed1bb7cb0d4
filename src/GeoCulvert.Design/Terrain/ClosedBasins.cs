using GeoCulvert.Design.Basis;
using NetTopologySuite.Geometries;

namespace GeoCulvert.Design.Terrain;

/// <summary>A point in a basin that is to hold its water.</summary>
/// <param name="Name">Name of the basin.</param>
/// <param name="At">The point, in the plane of the grid.</param>
public sealed record BasinPoint(string Name, Coordinate At);

/// <summary>Size from which every depression is kept; both must be reached.</summary>
/// <param name="MinAreaM2">Least area of the full pool, m2.</param>
/// <param name="MinDepthM">Least depth of the full pool, m.</param>
public sealed record BasinLimits(double MinAreaM2, double MinDepthM);

/// <summary>A basin that holds its water.</summary>
/// <param name="Name">Given, or "closed basin" and the number of the depression.</param>
/// <param name="Depression">Index in <see cref="DepressionMap.All"/>.</param>
/// <param name="Pool">The depression, as filling would make it.</param>
/// <param name="Given">Whether a point named it.</param>
public sealed record KeptBasin(string Name, int Depression, Depression Pool, bool Given);

/// <summary>What is kept, and the elevations to go on with.</summary>
/// <param name="Elevation">A copy whose deepest cell of each kept basin is minus infinity: an outlet inside. The very same grid where none is kept.</param>
/// <param name="Kept">Kept basins in the order of their depressions.</param>
/// <param name="Findings">One for each kept basin, and for points that name none.</param>
public sealed record BasinChoice(Grid<float> Elevation, IReadOnlyList<KeptBasin> Kept, IReadOnlyList<Finding> Findings);

/// <summary>Land that drains into a kept basin.</summary>
/// <param name="Basin">The basin.</param>
/// <param name="Cells">Cells that drain to its deepest cell.</param>
/// <param name="AreaM2">Their area, m2.</param>
public sealed record NonContributingArea(KeptBasin Basin, long Cells, double AreaM2);

/// <summary>Closed basins that are kept as sinks instead of being filled over.</summary>
public static class ClosedBasins
{
    /// <summary>Chooses basins by points and, when asked, by size.</summary>
    /// <param name="elevation">Elevations, m; not changed.</param>
    /// <param name="map">Depressions of these elevations.</param>
    /// <param name="points">Basins named by a point; a depression is kept whole, its deepest cell takes the water wherever the point lies in it.</param>
    /// <param name="limits">Size from which all are kept; null for none but the named.</param>
    public static BasinChoice Choose(Grid<float> elevation, DepressionMap map, IReadOnlyList<BasinPoint> points, BasinLimits? limits = null)
    {
        ArgumentNullException.ThrowIfNull(elevation);
        ArgumentNullException.ThrowIfNull(map);
        ArgumentNullException.ThrowIfNull(points);
        var findings = new List<Finding>();
        var named = new Dictionary<int, string>();
        foreach (var point in points)
        {
            if (DepressionAt(elevation, map, point, findings) is not { } k) continue;
            if (named.TryAdd(k, point.Name)) continue;
            findings.Add(ConditioningFindings.BasinPointRepeated.With($"\"{point.Name}\" lies in the depression of \"{named[k]}\""));
        }

        var kept = new List<KeptBasin>();
        for (var k = 0; k < map.All.Count; k++)
        {
            var pool = map.All[k];
            var given = named.TryGetValue(k, out var name);
            if (!given && !(limits is not null && pool.AreaM2 >= limits.MinAreaM2 && pool.MaxDepthM >= limits.MinDepthM)) continue;
            kept.Add(new KeptBasin(name ?? $"closed basin {k + 1}", k, pool, given));
        }

        findings.AddRange(kept.Select(b => ConditioningFindings.BasinKept.With(
            $"\"{b.Name}\", {b.Pool.AreaM2 / 1e4:0.00} ha, up to {b.Pool.MaxDepthM:0.00} m deep and {b.Pool.VolumeM3:0} m3 below its spill level of {b.Pool.SpillLevelM:0.00} m",
            b.Pool.VolumeM3)));
        if (kept.Count == 0) return new BasinChoice(elevation, kept, findings);
        var working = new Grid<float>(elevation.Frame, (float[])elevation.Cells.Clone());
        foreach (var b in kept) working.Cells[b.Pool.DeepestCell] = float.NegativeInfinity;
        return new BasinChoice(working, kept, findings);
    }

    /// <summary>The land of each kept basin: what drains to its sink.</summary>
    /// <param name="direction">Directions on the filled working copy, where the sinks have none.</param>
    /// <param name="kept">Kept basins.</param>
    public static IReadOnlyList<NonContributingArea> NonContributing(Grid<byte> direction, IReadOnlyList<KeptBasin> kept)
    {
        ArgumentNullException.ThrowIfNull(direction);
        ArgumentNullException.ThrowIfNull(kept);
        var labelled = WatershedLabels.Label(direction, [.. kept.Select(b => b.Pool.DeepestCell)]);
        return [.. kept.Select((b, k) => new NonContributingArea(b, labelled.TotalCells[k], labelled.TotalCells[k] * direction.Frame.CellAreaM2))];
    }

    private static int? DepressionAt(Grid<float> elevation, DepressionMap map, BasinPoint point, List<Finding> findings)
    {
        var frame = elevation.Frame;
        var (x, y) = (point.At.X, point.At.Y);
        if (!(x >= frame.West && x < frame.East && y > frame.South && y <= frame.North))
        {
            findings.Add(ConditioningFindings.BasinPointOutside.With($"\"{point.Name}\" at {x:0.##}, {y:0.##} lies outside the terrain model"));
            return null;
        }

        // Rounding may put a point on the very edge one cell too far.
        var (row, column) = (Math.Clamp(frame.RowAt(y), 0, frame.Rows - 1), Math.Clamp(frame.ColumnAt(x), 0, frame.Columns - 1));
        var label = map.Labels[row, column];
        if (label > 0) return label - 1;
        var ground = elevation[row, column];
        findings.Add(ConditioningFindings.BasinPointOutside.With(
            $"\"{point.Name}\" at {x:0.##}, {y:0.##} lies " + (float.IsNaN(ground) ? "where there is no data" : $"on ground at {ground:0.00} m that drains")));
        return null;
    }
}
