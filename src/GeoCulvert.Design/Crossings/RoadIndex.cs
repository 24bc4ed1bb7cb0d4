using GeoCulvert.Design.Terrain;
using NetTopologySuite.Algorithm;
using NetTopologySuite.Geometries;
using NetTopologySuite.Index.Strtree;

namespace GeoCulvert.Design.Crossings;

/// <summary>Where a line meets a centreline.</summary>
/// <param name="Road">Index of the road.</param>
/// <param name="StationM">Station, m.</param>
/// <param name="AlongM">Distance from the beginning of the line, m.</param>
/// <param name="AzimuthDeg">Direction of the road there.</param>
internal readonly record struct CentrelineMeeting(int Road, double StationM, double AlongM, double AzimuthDeg);

/// <summary>The segments of all roads, to be found by place.</summary>
internal sealed class RoadIndex
{
    private readonly STRtree<(int Road, RoadSegment Segment)> _segments = new();

    public RoadIndex(IReadOnlyList<RoadAlignment> roads)
    {
        Roads = roads;
        for (var k = 0; k < roads.Count; k++)
            foreach (var s in roads[k].Segments()) _segments.Insert(new Envelope(s.From, s.To), (k, s));
        _segments.Build();
    }

    public IReadOnlyList<RoadAlignment> Roads { get; }

    /// <summary>Segments within a distance in x and y.</summary>
    public IList<(int Road, RoadSegment Segment)> Near(Coordinate p, double reachM) => _segments.Query(new Envelope(p.X - reachM, p.X + reachM, p.Y - reachM, p.Y + reachM));

    /// <summary>Meetings of a line with the centrelines, from its beginning.</summary>
    public List<CentrelineMeeting> Meetings(Coordinate a, Coordinate b) => Meetings(a, b, _segments.Query(new Envelope(a, b)));

    /// <summary>Meetings of the step from a cell downstream with the centrelines, with the road of each.</summary>
    public IEnumerable<(int Road, RoadMeeting Meeting)> MeetingsOfStep(Grid<byte> direction, int cell)
    {
        var next = FlowSteps.Downstream(direction, cell);
        if (next < 0) yield break;
        var box = new Envelope(FlowSteps.Centre(direction.Frame, cell), FlowSteps.Centre(direction.Frame, next));
        foreach (var (road, segment) in _segments.Query(box).OrderBy(s => s.Road).ThenBy(s => s.Segment.FromStationM))
            if (RoadMeetings.Meet(segment, direction, cell) is { } meeting) yield return (road, meeting);
    }

    /// <summary>Meetings of a line with some segments, from its beginning.</summary>
    public static List<CentrelineMeeting> Meetings(Coordinate a, Coordinate b, IList<(int Road, RoadSegment Segment)> segments)
    {
        var found = new List<CentrelineMeeting>();
        var length = a.Distance(b);
        foreach (var (road, s) in segments)
        {
            // The half-open rule: a vertex on the line belongs to one of its two segments.
            var from = Orientation.Index(a, b, s.From) == OrientationIndex.Left;
            var to = Orientation.Index(a, b, s.To) == OrientationIndex.Left;
            if (from == to || Orientation.Index(s.From, s.To, a) == Orientation.Index(s.From, s.To, b)) continue;
            double sx = s.To.X - s.From.X, sy = s.To.Y - s.From.Y, rx = b.X - a.X, ry = b.Y - a.Y;
            var cross = (rx * sy) - (ry * sx);
            if (cross == 0) continue;
            double t = (((s.From.X - a.X) * sy) - ((s.From.Y - a.Y) * sx)) / cross, u = (((s.From.X - a.X) * ry) - ((s.From.Y - a.Y) * rx)) / cross;
            if (t is < 0 or > 1) continue;
            found.Add(new(road, s.StationAt(Math.Clamp(u, 0, 1)), t * length, s.AzimuthDeg));
        }

        found.Sort((x, y) => x.AlongM != y.AlongM ? x.AlongM.CompareTo(y.AlongM) : x.Road.CompareTo(y.Road));
        return found;
    }
}
