using GeoCulvert.Design.Basis;
using GeoCulvert.Design.Terrain;

namespace GeoCulvert.Design.Crossings;

/// <summary>
/// Makes crossings of snapped points: the place where the flow path through the snapped cell meets the nearest road, up or down the main
/// stem within reach and without a jump in area; without such a meeting the snapped cell itself.
/// </summary>
public static class GivenCrossings
{
    /// <summary>Share by which the area may change between the snapped cell and the meeting with the road (own rule).</summary>
    public const double AreaChangeShare = 0.1;

    /// <summary>Places given points on their roads, in the order given.</summary>
    /// <param name="points">Snapped points.</param>
    /// <param name="roads">All roads; may be empty.</param>
    /// <param name="direction">D8 directions.</param>
    /// <param name="accumulation">Cells drained.</param>
    /// <param name="roadReachM">Largest distance from the snapped cell to a road, and along the flow path to the meeting, m.</param>
    /// <param name="search">Settings; null for the defaults.</param>
    public static CrossingList Place(
        IReadOnlyList<SnappedPoint> points, IReadOnlyList<RoadAlignment> roads, Grid<byte> direction, Grid<int> accumulation, double roadReachM, CrossingSearch? search = null)
    {
        ArgumentNullException.ThrowIfNull(points);
        ArgumentNullException.ThrowIfNull(roads);
        ArgumentNullException.ThrowIfNull(direction);
        ArgumentNullException.ThrowIfNull(accumulation);
        search ??= new();
        var index = new RoadIndex(roads);
        var ids = new HashSet<string>(StringComparer.Ordinal);
        var crossings = new List<Crossing>();
        var findings = new List<Finding>();
        foreach (var point in points)
        {
            var id = CrossingFinder.Unique(ids, point.Given.Id);
            if (point.Cell < 0) findings.AddRange(point.Findings);
            else crossings.Add(RoadsTogether.Whole(Place(point, id, roads, direction, accumulation, roadReachM, search), index, direction, accumulation, search.TogetherM));
        }

        return new(CrossingFinder.SharedCells(crossings), findings);
    }

    private static Crossing Place(
        SnappedPoint point, string id, IReadOnlyList<RoadAlignment> roads, Grid<byte> direction, Grid<int> accumulation, double roadReachM, CrossingSearch search)
    {
        var frame = direction.Frame;
        var centre = FlowSteps.Centre(frame, point.Cell);
        var nearest = roads.Select(r => (Road: r, Place: r.StationOf(point.Given.Point))).OrderBy(r => Math.Abs(r.Place.OffsetM)).FirstOrDefault();
        var raised = point.Findings.ToList();
        if (nearest.Road is null || Math.Abs(nearest.Place.OffsetM) > roadReachM)
        {
            raised.Add(CrossingFindings.NoRoadInReach.With(
                nearest.Road is null ? "there is no road" : $"the nearest road, {nearest.Road.Name}, is {Math.Abs(nearest.Place.OffsetM):0.#} m away",
                nearest.Road is null ? null : Math.Abs(nearest.Place.OffsetM), roadReachM));
            var next = FlowSteps.Downstream(direction, point.Cell);
            return new(id, CrossingOrigin.Given, centre, point.Cell, point.AccumulationCells)
            {
                FlowAzimuthDeg = next < 0 ? null : Bearings.AzimuthDeg(centre, FlowSteps.Centre(frame, next)),
                GivenPoint = point.Given.Point,
                MovedM = point.MovedM,
                Findings = [.. raised.Select(f => f.At(id))],
            };
        }

        if (Meeting(point, nearest.Road, direction, accumulation, roadReachM) is { } meeting)
        {
            return CrossingFinder.At(nearest.Road, meeting, id, CrossingOrigin.Given, direction, accumulation, search, raised) with
            {
                GivenPoint = point.Given.Point,
                MovedM = point.Given.Point.Distance(FlowSteps.Centre(frame, meeting.Cell)),
            };
        }

        raised.Add(CrossingFindings.StreamMissesRoad.With($"road {nearest.Road.Name}, {Math.Abs(nearest.Place.OffsetM):0.#} m away", Math.Abs(nearest.Place.OffsetM)));
        var down = FlowSteps.Downstream(direction, point.Cell);
        double? flow = down < 0 ? null : Bearings.AzimuthDeg(centre, FlowSteps.Centre(frame, down));
        return new(id, CrossingOrigin.Given, nearest.Place.Point, point.Cell, point.AccumulationCells)
        {
            Road = nearest.Road,
            StationM = nearest.Place.StationM,
            FlowAzimuthDeg = flow,
            SkewDeg = flow is { } f ? Bearings.SkewDeg(f, nearest.Place.AzimuthDeg) : null,
            GivenPoint = point.Given.Point,
            MovedM = point.MovedM,
            Findings = [.. raised.Select(f => f.At(id))],
        };
    }

    /// <summary>The meeting nearest along the flow path through the snapped cell; downstream wins a tie.</summary>
    private static RoadMeeting? Meeting(SnappedPoint point, RoadAlignment road, Grid<byte> direction, Grid<int> accumulation, double reachM)
    {
        var frame = direction.Frame;
        // Only segments near the point can matter.
        var near = road.Segments().Where(s => s.At(s.Nearest(point.Given.Point)).Distance(point.Given.Point) <= 2 * reachM).ToList();
        RoadMeeting? best = null;
        var least = double.PositiveInfinity;
        Search(FlowSteps.DownstreamPath(direction, point.Cell, reachM));
        Search(FlowSteps.UpstreamPath(direction, accumulation, point.Cell, reachM));
        return best;

        void Search(List<int> path)
        {
            var alongM = 0.0;
            for (var i = 0; i < path.Count; i++)
            {
                if (i > 0) alongM += FlowSteps.Centre(frame, path[i - 1]).Distance(FlowSteps.Centre(frame, path[i]));
                if (alongM >= least || Math.Abs(accumulation.Cells[path[i]] - point.AccumulationCells) > AreaChangeShare * point.AccumulationCells) return;
                foreach (var s in near)
                    if (alongM < least && RoadMeetings.Meet(s, direction, path[i]) is { } meeting) (best, least) = (meeting, alongM);
            }
        }
    }
}
