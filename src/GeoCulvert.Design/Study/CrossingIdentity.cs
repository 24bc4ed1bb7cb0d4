using GeoCulvert.Design.Crossings;
using NetTopologySuite.Geometries;

namespace GeoCulvert.Design.Study;

/// <summary>A crossing of the run before.</summary>
/// <param name="Id">Its id.</param>
/// <param name="Road">Its road; empty for none.</param>
/// <param name="IsGiven">Whether it was given as a point.</param>
/// <param name="Place">Where it lay, m, in the same plane.</param>
/// <param name="AreaM2">Drainage area, m2.</param>
/// <param name="DesignFlowM3PerS">Design flow, m3/s.</param>
/// <param name="Culvert">The culvert in one line; null where there was none.</param>
public sealed record FormerCrossing(string Id, string Road, bool IsGiven, Coordinate Place, double AreaM2, double? DesignFlowM3PerS, string? Culvert);

/// <summary>A crossing that differs from the run before.</summary>
/// <param name="CrossingId">Its id.</param>
/// <param name="Change">added, removed, moved or changed; moved and changed are joined by "and".</param>
/// <param name="MovedM">Distance between the places, m; null unless in both runs.</param>
/// <param name="Before">As it was; null when added.</param>
/// <param name="After">As it is; null when removed.</param>
public sealed record CrossingChange(string CrossingId, string Change, double? MovedM, FormerCrossing? Before, FormerCrossing? After);

/// <summary>
/// Keeps the ids of crossings from run to run. A found crossing takes the id of the one nearest to it in the run before on the same road, within
/// <see cref="SamePlaceM"/>, nearest pairs first; a new one gets an id of its own, never one of the run before.
/// </summary>
public static class CrossingIdentity
{
    /// <summary>Distance within which a crossing is the one of the run before, m (own rule).</summary>
    public const double SamePlaceM = 50;

    /// <summary>Move from which a crossing counts as moved, m (own rule).</summary>
    public const double MovedLimitM = 0.5;

    /// <summary>Share by which an area or a flow must differ to count as changed (own rule).</summary>
    public const double ChangedShare = 0.005;

    /// <summary>The same crossings with the ids of the run before.</summary>
    public static CrossingList Keep(CrossingList found, IReadOnlyList<FormerCrossing> former)
    {
        ArgumentNullException.ThrowIfNull(found);
        ArgumentNullException.ThrowIfNull(former);
        var mine = found.Crossings;
        var pairs = new List<(double DistanceM, int New, int Old)>();
        for (var i = 0; i < mine.Count; i++)
        {
            if (mine[i].Origin == CrossingOrigin.Given) continue;
            for (var k = 0; k < former.Count; k++)
            {
                if (former[k].IsGiven || former[k].Road != (mine[i].Road?.Name ?? "")) continue;
                var distance = former[k].Place.Distance(mine[i].Point);
                if (distance <= SamePlaceM) pairs.Add((distance, i, k));
            }
        }

        var oldOf = new Dictionary<int, int>();
        var taken = new HashSet<int>();
        foreach (var (_, i, k) in pairs.OrderBy(p => p.DistanceM).ThenBy(p => p.New).ThenBy(p => p.Old))
            if (!oldOf.ContainsKey(i) && taken.Add(k)) oldOf.Add(i, k);

        var used = new HashSet<string>(former.Select(f => f.Id), StringComparer.Ordinal);
        used.UnionWith(mine.Where(c => c.Origin == CrossingOrigin.Given).Select(c => c.Id));
        return found with { Crossings = [.. mine.Select((c, i) => c.Origin == CrossingOrigin.Given ? c : Named(c, oldOf.TryGetValue(i, out var k) ? former[k].Id : CrossingFinder.Unique(used, c.Id)))] };
    }

    /// <summary>Crossings added, removed, moved or changed; those alike are left out. Empty without a run before.</summary>
    public static IReadOnlyList<CrossingChange> Changes(IReadOnlyList<FormerCrossing> former, IReadOnlyList<CrossingResult> now)
    {
        ArgumentNullException.ThrowIfNull(former);
        ArgumentNullException.ThrowIfNull(now);
        if (former.Count == 0) return [];
        var before = former.ToDictionary(f => f.Id, StringComparer.Ordinal);
        var changes = new List<CrossingChange>();
        foreach (var after in now.Select(Of))
        {
            if (!before.Remove(after.Id, out var old))
            {
                changes.Add(new(after.Id, "added", null, null, after));
                continue;
            }

            var moved = old.Place.Distance(after.Place);
            var words = new List<string>();
            if (moved >= MovedLimitM) words.Add("moved");
            if (Differs(old.AreaM2, after.AreaM2) || Differs(old.DesignFlowM3PerS, after.DesignFlowM3PerS) || old.Culvert != after.Culvert) words.Add("changed");
            if (words.Count > 0) changes.Add(new(after.Id, string.Join(" and ", words), moved, old, after));
        }

        changes.AddRange(former.Where(f => before.ContainsKey(f.Id)).Select(f => new CrossingChange(f.Id, "removed", null, f, null)));
        return changes;
    }

    /// <summary>A result as the next run will know it.</summary>
    public static FormerCrossing Of(CrossingResult c)
    {
        ArgumentNullException.ThrowIfNull(c);
        return new(c.CrossingId, c.Road, c.IsGiven, c.Location.Coordinate, c.Watershed.AreaM2, c.Flow?.Design.FlowM3PerS, c.Culvert?.Description);
    }

    private static bool Differs(double? a, double? b) => a is null != b is null || (a is { } x && b is { } y && Math.Abs(x - y) > ChangedShare * Math.Max(Math.Abs(x), Math.Abs(y)));

    private static Crossing Named(Crossing c, string id) => c.Id == id ? c : c with { Id = id, Findings = [.. c.Findings.Select(f => f.At(id))] };
}
