using GeoCulvert.Design.Terrain;

namespace GeoCulvert.Design.Crossings;

/// <summary>
/// Which meetings of streams with one road are one crossing. Two rules (own): (1) a flow path that meets the road again without having been
/// farther from the centreline than the distance; (2) two flow paths that meet the road within that distance of each other and join within
/// that distance downstream (a braid).
/// </summary>
internal static class MeetingGroups
{
    /// <summary>Groups, each from the upstream end down (rising accumulation), in the order of their last meeting's station.</summary>
    public static List<List<RoadMeeting>> Of(
        IReadOnlyList<RoadMeeting> meetings, RoadAlignment road, Grid<byte> direction, Grid<int> accumulation, double sameM)
    {
        var frame = direction.Frame;
        var indexOf = new Dictionary<int, int>();
        for (var i = 0; i < meetings.Count; i++) indexOf[meetings[i].Cell] = i;
        var parent = Enumerable.Range(0, meetings.Count).ToArray();
        var passing = new Dictionary<int, List<int>>();
        for (var i = 0; i < meetings.Count; i++)
        {
            var walkedM = 0.0;
            var cell = meetings[i].Cell;
            for (var steps = 0; steps < frame.Count; steps++)
            {
                var next = FlowSteps.Downstream(direction, cell);
                if (next < 0) break;
                walkedM += FlowSteps.Centre(frame, cell).Distance(FlowSteps.Centre(frame, next));
                cell = next;
                if (walkedM <= sameM) (passing.TryGetValue(cell, out var list) ? list : passing[cell] = []).Add(i);
                if (indexOf.TryGetValue(cell, out var other)) { Union(parent, i, other); break; }
                if (Math.Abs(road.StationOf(FlowSteps.Centre(frame, cell)).OffsetM) > sameM) break;
            }
        }

        foreach (var list in passing.Values)
            for (var k = 1; k < list.Count; k++)
                if (Math.Abs(meetings[list[k]].StationM - meetings[list[0]].StationM) <= sameM) Union(parent, list[k], list[0]);
        return [.. Enumerable.Range(0, meetings.Count).GroupBy(i => Root(parent, i))
            .Select(g => g.Select(i => meetings[i]).OrderBy(m => accumulation.Cells[m.Cell]).ThenBy(m => m.StationM).ToList())
            .OrderBy(g => g[^1].StationM).ThenBy(g => g[^1].Cell)];
    }

    /// <summary>
    /// The first cell that the water of all meetings of a group passes below its last: where the arms of a braid join; the last meeting's own cell where its path already
    /// passes all others; -1 where they never join.
    /// </summary>
    public static int Join(IReadOnlyList<RoadMeeting> group, Grid<byte> direction)
    {
        var joined = group[^1].Cell;
        foreach (var other in group.SkipLast(1))
        {
            // Down the main path from where the arms known so far are together, until the other arm's water is met.
            var path = new HashSet<int>();
            for (var cell = other.Cell; cell >= 0 && path.Add(cell); cell = FlowSteps.Downstream(direction, cell))
            {
            }

            while (joined >= 0 && !path.Contains(joined)) joined = FlowSteps.Downstream(direction, joined);
            if (joined < 0) return -1;
        }

        return joined;
    }

    /// <summary>Whether the main path of a group leaves the road on the side it came from: an even number of real crossings.</summary>
    public static bool Returns(IReadOnlyList<RoadMeeting> group, RoadAlignment road, Grid<byte> direction)
    {
        if (group.Count < 2) return false;
        var first = FlowSteps.Centre(direction.Frame, group[0].Cell);
        var last = FlowSteps.Centre(direction.Frame, FlowSteps.Downstream(direction, group[^1].Cell));
        return Math.Sign(road.StationOf(first).OffsetM) * Math.Sign(road.StationOf(last).OffsetM) > 0;
    }

    private static int Root(int[] parent, int i)
    {
        while (parent[i] != i) i = parent[i] = parent[parent[i]];
        return i;
    }

    private static void Union(int[] parent, int a, int b)
    {
        int rootA = Root(parent, a), rootB = Root(parent, b);
        if (rootA != rootB) parent[Math.Max(rootA, rootB)] = Math.Min(rootA, rootB);
    }
}
