using GeoCulvert.Design.Terrain;

namespace GeoCulvert.Design.Crossings;

/// <summary>
/// Which meetings of streams with one road are one crossing. Two rules (own): (1) a flow path that meets the road again without having been
/// farther from the centreline than the distance; (2) two flow paths that meet the road within that distance of each other, whether they join below (a braid)
/// or run on side by side, as D8 lets them on the level bottom of a wide channel.
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
        for (var i = 0; i < meetings.Count; i++)
        {
            var cell = meetings[i].Cell;
            for (var steps = 0; steps < frame.Count; steps++)
            {
                var next = FlowSteps.Downstream(direction, cell);
                if (next < 0) break;
                cell = next;
                if (indexOf.TryGetValue(cell, out var other)) { Union(parent, i, other); break; }
                if (Math.Abs(road.StationOf(FlowSteps.Centre(frame, cell)).OffsetM) > sameM) break;
            }
        }

        for (var i = 1; i < meetings.Count; i++)
            if (meetings[i].StationM - meetings[i - 1].StationM <= sameM) Union(parent, i, i - 1);
        return [.. Enumerable.Range(0, meetings.Count).GroupBy(i => Root(parent, i))
            .Select(g => g.Select(i => meetings[i]).OrderBy(m => accumulation.Cells[m.Cell]).ThenBy(m => m.StationM).ToList())
            .OrderBy(g => g[^1].StationM).ThenBy(g => g[^1].Cell)];
    }

    /// <summary>The meetings' cells whose water passes neither the last meeting's cell nor another of these: the other arms of a stream.</summary>
    public static IReadOnlyList<int> OtherArms(IReadOnlyList<RoadMeeting> group, Grid<byte> direction)
    {
        var cells = group.Select(m => m.Cell).ToHashSet();
        var arms = new List<int>();
        foreach (var meeting in group.SkipLast(1))
        {
            var next = FlowSteps.Downstream(direction, meeting.Cell);
            for (var steps = 0; next >= 0 && !cells.Contains(next) && steps < direction.Frame.Count; steps++) next = FlowSteps.Downstream(direction, next);
            if (next < 0 || !cells.Contains(next)) arms.Add(meeting.Cell);
        }

        return arms;
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
