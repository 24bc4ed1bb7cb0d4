using GeoCulvert.Design.Terrain;
using NetTopologySuite.Algorithm;
using NetTopologySuite.Geometries;

namespace GeoCulvert.Design.Crossings;

/// <summary>One place where the step from a cell to the next one downstream meets a road.</summary>
/// <param name="Cell">The upstream cell of the step.</param>
/// <param name="StationM">Station of the meeting, m.</param>
/// <param name="Point">The meeting.</param>
internal readonly record struct RoadMeeting(int Cell, double StationM, Coordinate Point);

/// <summary>Finds the meetings of D8 steps with a road; the work grows with the length of the road, not with the size of the terrain.</summary>
internal static class RoadMeetings
{
    private const double Parallel = 1e-12;

    /// <summary>Meetings of the steps of all cells that <paramref name="isStream"/> accepts, by station; one per step; within a stretch of the road where one is given.</summary>
    public static List<RoadMeeting> Find(
        RoadAlignment road, Grid<byte> direction, Func<int, bool> isStream, double fromStationM = double.NegativeInfinity, double toStationM = double.PositiveInfinity)
    {
        var frame = direction.Frame;
        var byCell = new Dictionary<int, RoadMeeting>();
        var pieceM = 8 * Math.Max(frame.CellWidthM, frame.CellHeightM);
        foreach (var s in road.Segments())
        {
            if (s.ToStationM < fromStationM || s.FromStationM > toStationM) continue;
            // A long oblique segment is searched in pieces, so that its box stays narrow.
            var pieces = Math.Max(1, (int)Math.Ceiling((s.ToStationM - s.FromStationM) / pieceM));
            for (var i = 0; i < pieces; i++)
            {
                if (s.StationAt((i + 1.0) / pieces) < fromStationM || s.StationAt((double)i / pieces) > toStationM) continue;
                Coordinate a = s.At((double)i / pieces), b = s.At((double)(i + 1) / pieces);
                int top = Math.Max(frame.RowAt(Math.Max(a.Y, b.Y)) - 1, 0), bottom = Math.Min(frame.RowAt(Math.Min(a.Y, b.Y)) + 1, frame.Rows - 1);
                int left = Math.Max(frame.ColumnAt(Math.Min(a.X, b.X)) - 1, 0), right = Math.Min(frame.ColumnAt(Math.Max(a.X, b.X)) + 1, frame.Columns - 1);
                for (var row = top; row <= bottom; row++)
                    for (var column = left; column <= right; column++)
                    {
                        var cell = (row * frame.Columns) + column;
                        if (direction.Cells[cell] == 0 || byCell.ContainsKey(cell) || !isStream(cell)) continue;
                        if (Meet(s, direction, cell) is { } meeting) byCell.Add(cell, meeting);
                    }
            }
        }

        return [.. byCell.Values.Where(m => m.StationM >= fromStationM && m.StationM <= toStationM).OrderBy(m => m.StationM).ThenBy(m => m.Cell)];
    }

    /// <summary>The meeting of a cell's step with a segment; null when they do not meet. Where they run together, the downstream end of the overlap.</summary>
    public static RoadMeeting? Meet(RoadSegment s, Grid<byte> direction, int cell)
    {
        var next = FlowSteps.Downstream(direction, cell);
        if (next < 0) return null;
        Coordinate a = FlowSteps.Centre(direction.Frame, cell), b = FlowSteps.Centre(direction.Frame, next);
        // Whether they meet is decided without rounding error; where, in plain arithmetic held within both.
        var meet = new RobustLineIntersector();
        meet.ComputeIntersection(a, b, s.From, s.To);
        if (!meet.HasIntersection) return null;
        double rx = b.X - a.X, ry = b.Y - a.Y, sx = s.To.X - s.From.X, sy = s.To.Y - s.From.Y;
        double qx = s.From.X - a.X, qy = s.From.Y - a.Y;
        var cross = (rx * sy) - (ry * sx);
        double rr = (rx * rx) + (ry * ry), ss = (sx * sx) + (sy * sy);
        if (meet.IntersectionNum == 1 && Math.Abs(cross) > Parallel * Math.Sqrt(rr * ss))
        {
            var u = Math.Clamp(((qx * ry) - (qy * rx)) / cross, 0, 1);
            return new(cell, s.StationAt(u), s.At(u));
        }

        // They run together: the end of the overlap that lies farthest along the step.
        double t0 = ((qx * rx) + (qy * ry)) / rr, t1 = t0 + (((sx * rx) + (sy * ry)) / rr);
        var at = t1 == t0 ? 0 : Math.Clamp((Math.Min(1, Math.Max(t0, t1)) - t0) / (t1 - t0), 0, 1);
        return new(cell, s.StationAt(at), s.At(at));
    }
}
