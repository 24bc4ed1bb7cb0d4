using GeoCulvert.Design.Basis;
using GeoCulvert.Design.Terrain;
using NetTopologySuite.Geometries;

namespace GeoCulvert.Design.Crossings;

/// <summary>Settings of the search for crossings.</summary>
public sealed record CrossingSearch
{
    /// <summary>
    /// Meetings of one stream with one road are one crossing while the stream stays within this distance of the centreline, m;
    /// null for the larger of three cells and the road's width (own rule).
    /// </summary>
    public double? SameCrossingM { get; init; }

    /// <summary>Roads whose shoulders follow each other within this distance along the flow path have one culvert under all, m. Default 30 (own rule).</summary>
    public double TogetherM { get; init; } = 30;

    /// <summary>Skew above which a finding is raised, degrees. Default 45 (common practice).</summary>
    public double SkewLimitDeg { get; init; } = 45;

    /// <summary>Stations in ids: metres or feet.</summary>
    public UnitSystem Stationing { get; init; } = UnitSystem.Si;

    /// <summary>Openings of embankments.</summary>
    public IReadOnlyList<EmbankmentOpening> Openings { get; init; } = [];

    /// <summary>Cells drained from which an opening or a low point of the road is a crossing though its water is no stream yet; null for streams only.</summary>
    public long? CrossDrainCells { get; init; }

    /// <summary>Low points of each road, m of station (<see cref="RoadLowPoints"/>); null for none.</summary>
    public Func<RoadAlignment, IReadOnlyList<double>>? LowPoints { get; init; }

    /// <summary>Distance along the road from a low point within which water that meets the road belongs to it, m; null for the larger of 10 m and two cells (own rule).</summary>
    public double? LowPointReachM { get; init; }
}

/// <summary>Crossings in order of road and station, and the doubts that belong to no single one.</summary>
public sealed record CrossingList(IReadOnlyList<Crossing> Crossings, IReadOnlyList<Finding> Findings);

/// <summary>
/// Finds where roads meet streams: every step of a stream cell (from its centre to the centre of the next cell downstream) is
/// intersected with the centrelines. One crossing per stream and road even where they braid or run along each other, and one where several roads follow closely.
/// </summary>
public static class CrossingFinder
{
    /// <summary>Finds the crossings of all roads.</summary>
    /// <param name="roads">Roads in the frame of the grids; their order is the order of the crossings.</param>
    /// <param name="direction">D8 directions, 0 none, 1..8 clockwise from north.</param>
    /// <param name="accumulation">Cells drained, each cell included.</param>
    /// <param name="streamThresholdCells">A cell is a stream from this accumulation on.</param>
    /// <param name="search">Settings; null for the defaults.</param>
    public static CrossingList Find(
        IReadOnlyList<RoadAlignment> roads, Grid<byte> direction, Grid<int> accumulation, long streamThresholdCells, CrossingSearch? search = null)
    {
        ArgumentNullException.ThrowIfNull(roads);
        ArgumentNullException.ThrowIfNull(direction);
        ArgumentNullException.ThrowIfNull(accumulation);
        search ??= new();
        var crossings = new List<Crossing>();
        var findings = new List<Finding>();
        var ids = new HashSet<string>(StringComparer.Ordinal);
        var opened = new Dictionary<int, OpeningReason>();
        foreach (var opening in search.Openings)
            foreach (var cell in opening.Cells) opened.TryAdd(cell, opening.Reason);
        foreach (var road in roads)
        {
            if (road.GapCount > 0) findings.Add(CrossingFindings.RoadGap.With($"road {road.Name} has {road.GapCount} gap(s)", road.GapCount, 0));
            var meetings = Meetings(road, direction, accumulation, streamThresholdCells, opened, search);
            foreach (var group in MeetingGroups.Of([.. meetings.Keys], road, direction, accumulation, SameCrossingM(search, road, direction.Frame)))
                crossings.Add(Of(group, road, meetings[group[^1]], ids, direction, accumulation, search));
        }

        return new(SharedCells(RoadsTogether.Merge(crossings, roads, direction, accumulation, search.TogetherM)), findings);
    }

    /// <summary>The distance that decides whether a stream has left a road.</summary>
    public static double SameCrossingM(CrossingSearch search, RoadAlignment road, GridFrame frame)
    {
        ArgumentNullException.ThrowIfNull(search);
        ArgumentNullException.ThrowIfNull(road);
        return search.SameCrossingM ?? Math.Max(3 * Math.Max(frame.CellWidthM, frame.CellHeightM), road.WidthM);
    }

    /// <summary>Meetings that count, by station, with why they do.</summary>
    private static Dictionary<RoadMeeting, CrossingOrigin> Meetings(
        RoadAlignment road, Grid<byte> direction, Grid<int> accumulation, long streamCells, Dictionary<int, OpeningReason> opened, CrossingSearch search)
    {
        var least = Math.Min(streamCells, search.CrossDrainCells ?? long.MaxValue);
        var low = search.CrossDrainCells is null ? null : search.LowPoints?.Invoke(road);
        var reachM = search.LowPointReachM ?? Math.Max(10, 2 * Math.Max(direction.Frame.CellWidthM, direction.Frame.CellHeightM));
        var counted = new Dictionary<RoadMeeting, CrossingOrigin>();
        bool IsRelief(int cell) => opened.TryGetValue(cell, out var reason) && reason == OpeningReason.DitchRelief;
        foreach (var meeting in RoadMeetings.Find(road, direction, c => accumulation.Cells[c] >= least || IsRelief(c)))
        {
            if (IsRelief(meeting.Cell)) counted.Add(meeting, CrossingOrigin.DitchRelief);
            else if (accumulation.Cells[meeting.Cell] >= streamCells) counted.Add(meeting, CrossingOrigin.Found);
            else if (opened.ContainsKey(meeting.Cell)) counted.Add(meeting, CrossingOrigin.Opening);
            else if (low?.Any(s => Math.Abs(s - meeting.StationM) <= reachM) == true) counted.Add(meeting, CrossingOrigin.LowPoint);
        }

        return counted;
    }

    private static Crossing Of(
        List<RoadMeeting> group, RoadAlignment road, CrossingOrigin origin, HashSet<string> ids, Grid<byte> direction, Grid<int> accumulation, CrossingSearch search)
    {
        var raised = new List<Finding>();
        var last = group[^1];
        var extentM = group.Max(m => m.StationM) - group.Min(m => m.StationM);
        if (group.Count > 1)
            raised.Add(CrossingFindings.RunsAlong.With($"{group.Count} meetings within {extentM:0.#} m of road; kept the one at {StationText.Of(last.StationM, search.Stationing)}", group.Count, 1));
        if (MeetingGroups.Returns(group, road, direction)) raised.Add(CrossingFindings.ReturnsToSide.With($"{group.Count} meetings", group.Count));
        var id = Unique(ids, road.IdAt(last.StationM, search.Stationing));
        var crossing = At(road, last, id, origin, direction, accumulation, search, raised) with { MeetingCount = group.Count, MeetingCells = [.. group.Select(m => m.Cell)] };
        var arms = MeetingGroups.OtherArms(group, direction);
        if (arms.Count > 0)
        {
            // What runs down between the arms, no stream by itself, comes to the same culvert.
            var between = RoadMeetings.Find(road, direction, _ => true, group.Min(m => m.StationM), group.Max(m => m.StationM)).Where(m => group.All(g => g.Cell != m.Cell)).ToList();
            arms = MeetingGroups.OtherArms([.. between, .. group], direction);
        }

        return arms.Count == 0 ? crossing : crossing with { OtherArms = arms, AccumulationCells = crossing.AccumulationCells + arms.Sum(a => (long)accumulation.Cells[a]) };
    }

    internal static Crossing At(
        RoadAlignment road, RoadMeeting meeting, string id, CrossingOrigin origin, Grid<byte> direction, Grid<int> accumulation, CrossingSearch search, List<Finding> raised)
    {
        var opening = search.Openings.FirstOrDefault(o => o.Cells.Contains(meeting.Cell));
        double flow;
        if (opening is not null)
        {
            flow = Bearings.AzimuthDeg(opening.Line.StartPoint.Coordinate, opening.Line.EndPoint.Coordinate);
        }
        else
        {
            // Direction over a few cells on both sides: a single D8 step knows only multiples of 45 degrees.
            var reachM = Math.Max(2 * Math.Max(direction.Frame.CellWidthM, direction.Frame.CellHeightM), road.WidthM / 2);
            var up = FlowSteps.UpstreamPath(direction, accumulation, meeting.Cell, reachM);
            var down = FlowSteps.DownstreamPath(direction, FlowSteps.Downstream(direction, meeting.Cell), reachM);
            flow = Bearings.AzimuthDeg(FlowSteps.Centre(direction.Frame, up[^1]), FlowSteps.Centre(direction.Frame, down[^1]));
        }

        var skew = Bearings.SkewDeg(flow, road.AzimuthAt(meeting.StationM));
        if (skew > search.SkewLimitDeg) raised.Add(CrossingFindings.Skewed.With($"skew {skew:0} deg", skew, search.SkewLimitDeg));
        return new(id, origin, meeting.Point, meeting.Cell, accumulation.Cells[meeting.Cell])
        {
            Road = road,
            StationM = meeting.StationM,
            FlowAzimuthDeg = flow,
            SkewDeg = skew,
            MeetsRoad = true,
            Opening = opening,
            Over = [new(road, meeting.StationM, 0, meeting.Cell)],
            Findings = [.. raised.Select(f => f.At(id))],
        };
    }

    /// <summary>Adds a finding to every crossing whose outlet cell is also another one's.</summary>
    public static IReadOnlyList<Crossing> SharedCells(IReadOnlyList<Crossing> crossings)
    {
        ArgumentNullException.ThrowIfNull(crossings);
        var shared = crossings.Where(c => c.OutletCell >= 0).GroupBy(c => c.OutletCell).Where(g => g.Count() > 1).ToDictionary(g => g.Key, g => g.ToList());
        return [.. crossings.Select(c => shared.TryGetValue(c.OutletCell, out var group)
            ? c with { Findings = [.. c.Findings, CrossingFindings.SharedCell.With($"same cell as {string.Join(", ", group.Where(o => o.Id != c.Id).Select(o => o.Id))}").At(c.Id)] }
            : c)];
    }

    internal static string Unique(HashSet<string> ids, string id)
    {
        var unique = id;
        for (var n = 2; !ids.Add(unique); n++) unique = $"{id} ({n})";
        return unique;
    }
}
