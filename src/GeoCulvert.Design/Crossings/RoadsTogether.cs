using GeoCulvert.Design.Terrain;

namespace GeoCulvert.Design.Crossings;

/// <summary>
/// Roads that follow each other closely along a flow path (two carriageways, a ramp, the legs of a fork) have one culvert under all of them: the distance along the
/// flow path from shoulder to shoulder is at most a stated one. The culvert keeps the id of the first road of the project; its watershed ends above the uppermost road.
/// </summary>
internal static class RoadsTogether
{
    /// <summary>Crossings with those of roads close by joined, in the same order.</summary>
    public static List<Crossing> Merge(IReadOnlyList<Crossing> crossings, IReadOnlyList<RoadAlignment> roads, Grid<byte> direction, Grid<int> accumulation, double togetherM)
    {
        if (roads.Count == 0) return [.. crossings];
        var index = new RoadIndex(roads);
        var at = new Dictionary<(RoadAlignment, int), int>();
        for (var i = 0; i < crossings.Count; i++)
            foreach (var cell in crossings[i].MeetingCells) at.TryAdd((crossings[i].Road!, cell), i);
        var gone = new bool[crossings.Count];
        var merged = new List<Crossing>();
        for (var i = 0; i < crossings.Count; i++)
        {
            if (gone[i]) continue;
            var whole = Whole(crossings[i], index, direction, accumulation, togetherM);
            foreach (var over in whole.Over.Where(o => !ReferenceEquals(o.Road, crossings[i].Road)))
            {
                if (!at.TryGetValue((over.Road, over.Cell), out var k)) continue;
                if (k > i) gone[k] = true;
                // The uppermost road knows all arms of its stream.
                if (ReferenceEquals(over, whole.Over[0]))
                    whole = whole with { OutletCell = crossings[k].OutletCell, OtherArms = crossings[k].OtherArms, AccumulationCells = crossings[k].AccumulationCells };
            }

            merged.Add(whole);
        }

        return merged;
    }

    /// <summary>A crossing with the other roads over its culvert.</summary>
    public static Crossing Whole(Crossing crossing, RoadIndex index, Grid<byte> direction, Grid<int> accumulation, double togetherM)
    {
        if (crossing.Road is null || !crossing.MeetsRoad) return crossing;
        var (up, cell) = Upstream(crossing, index, direction, accumulation, togetherM);
        var down = Downstream(crossing, index, direction, togetherM);
        if (up.Count + down.Count == 0) return crossing;
        up.Reverse();
        var whole = crossing with { Over = [.. up, .. crossing.Over, .. down] };
        return cell == crossing.OutletCell ? whole : whole with { OutletCell = cell, OtherArms = [], AccumulationCells = accumulation.Cells[cell] };
    }

    private static List<RoadOver> Downstream(Crossing crossing, RoadIndex index, Grid<byte> direction, double togetherM)
    {
        var found = new List<RoadOver>();
        var frame = direction.Frame;
        double alongM = -crossing.Point.Distance(FlowSteps.Centre(frame, crossing.OutletCell)), shoulderM = crossing.Road!.WidthM / 2;
        for (var cell = crossing.OutletCell; ;)
        {
            foreach (var (road, meeting) in index.MeetingsOfStep(direction, cell))
            {
                var here = alongM + FlowSteps.Centre(frame, cell).Distance(meeting.Point);
                if (IsKnown(index.Roads[road], crossing, found) || here < 0 || here - (index.Roads[road].WidthM / 2) - shoulderM > togetherM) continue;
                found.Add(new(index.Roads[road], meeting.StationM, here, cell));
                shoulderM = here + (index.Roads[road].WidthM / 2);
            }

            var next = FlowSteps.Downstream(direction, cell);
            if (next < 0) return found;
            alongM += FlowSteps.Centre(frame, cell).Distance(FlowSteps.Centre(frame, next));
            if (alongM > shoulderM + togetherM + 50) return found;
            cell = next;
        }
    }

    private static (List<RoadOver> Roads, int OutletCell) Upstream(Crossing crossing, RoadIndex index, Grid<byte> direction, Grid<int> accumulation, double togetherM)
    {
        var found = new List<RoadOver>();
        var frame = direction.Frame;
        double alongM = crossing.Point.Distance(FlowSteps.Centre(frame, crossing.OutletCell)), shoulderM = crossing.Road!.WidthM / 2;
        var outlet = crossing.OutletCell;
        for (var cell = crossing.OutletCell; ;)
        {
            foreach (var (road, meeting) in index.MeetingsOfStep(direction, cell))
            {
                var here = alongM - FlowSteps.Centre(frame, cell).Distance(meeting.Point);
                if (IsKnown(index.Roads[road], crossing, found) || here <= 0 || here - (index.Roads[road].WidthM / 2) - shoulderM > togetherM) continue;
                found.Add(new(index.Roads[road], meeting.StationM, -here, cell));
                (shoulderM, outlet) = (here + (index.Roads[road].WidthM / 2), cell);
            }

            var next = FlowSteps.UpstreamMain(direction, accumulation, cell);
            if (next < 0) return (found, outlet);
            alongM += FlowSteps.Centre(frame, cell).Distance(FlowSteps.Centre(frame, next));
            if (alongM > shoulderM + togetherM + 50) return (found, outlet);
            cell = next;
        }
    }

    private static bool IsKnown(RoadAlignment road, Crossing crossing, List<RoadOver> found) => ReferenceEquals(road, crossing.Road) || found.Any(f => ReferenceEquals(f.Road, road));
}
