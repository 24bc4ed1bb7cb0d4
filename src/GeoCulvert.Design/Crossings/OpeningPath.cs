using GeoCulvert.Design.Terrain;
using NetTopologySuite.Geometries;

namespace GeoCulvert.Design.Crossings;

/// <summary>
/// The way through an embankment from a cell where water is stopped: of the straight lines to lower ground beyond the road the shortest, L0; of those not longer than
/// L0 + max(3 cells, L0/4) the steepest, because the bed of the channel beyond falls steeper from there than its banks do; of equally steep ones the shortest.
/// </summary>
internal sealed class OpeningPath
{
    private const double SlackShare = 0.25;
    private const double SlackCells = 3;
    private const double EquallySteep = 0.98;
    private readonly IReadOnlyList<RoadAlignment> _roads;
    private readonly RoadIndex _index;
    private readonly OpeningSettings _settings;

    public OpeningPath(RoadIndex index, OpeningSettings settings) => (_index, _roads, _settings) = (index, index.Roads, settings);

    /// <summary>A way found.</summary>
    /// <param name="Cells">Cells, upstream end first.</param>
    /// <param name="BedM">Bed at each cell, m.</param>
    /// <param name="DepthM">Largest depth below the terrain, m.</param>
    /// <param name="VolumeM3">Volume taken out, m3.</param>
    /// <param name="RoadDepthM">Depth below the terrain at the centrelines, the least of all roads over it, m: a bank stands there, a cutting does not.</param>
    /// <param name="Meetings">Roads over it, from the upstream end.</param>
    public sealed record Way(int[] Cells, float[] BedM, double DepthM, double VolumeM3, double RoadDepthM, IReadOnlyList<CentrelineMeeting> Meetings);

    /// <summary>Whether a cell lies between two roads that count as one way under: another centreline is close behind it, seen from where its water would go.</summary>
    public bool IsBetween(GridFrame frame, int cell, BandCell place)
    {
        var here = FlowSteps.Centre(frame, cell);
        var road = _roads[place.Road];
        var foot = road.PointAt(place.StationM);
        var away = here.Distance(foot);
        if (away == 0) return false;
        var reach = _settings.TogetherM + 50;
        var beyond = new Coordinate(here.X + ((here.X - foot.X) / away * reach), here.Y + ((here.Y - foot.Y) / away * reach));
        return _index.Meetings(here, beyond).Any(m => m.AlongM - (_roads[m.Road].WidthM / 2) <= _settings.TogetherM);
    }

    /// <summary>The best way from a cell; null with the reason when there is none.</summary>
    public Way? Find(Grid<float> elevation, RoadBand band, int from, out string reason)
    {
        reason = $"no lower ground beyond the road within {_settings.LongestM:0.#} m";
        var frame = elevation.Frame;
        var here = FlowSteps.Centre(frame, from);
        var lower = Lower(elevation, band, from, here);
        // Ground between two roads that count as one way under serves only when there is none beyond both.
        return Best(elevation, lower.Where(c => !c.Between), here, ref reason) ?? Best(elevation, lower.Where(c => c.Between), here, ref reason);
    }

    /// <summary>The straight way between two cells, whatever is between; null over nodata or without a road over it.</summary>
    public Way? Between(Grid<float> elevation, int from, int to)
    {
        var meetings = _index.Meetings(FlowSteps.Centre(elevation.Frame, from), FlowSteps.Centre(elevation.Frame, to));
        return meetings.Count == 0 ? null : Carve(elevation, from, to, meetings);
    }

    private List<Target> Lower(Grid<float> elevation, RoadBand band, int from, Coordinate here)
    {
        var frame = elevation.Frame;
        var level = elevation.Cells[from];
        var reach = _settings.LongestM;
        int top = Math.Max(frame.RowAt(here.Y + reach), 0), bottom = Math.Min(frame.RowAt(here.Y - reach), frame.Rows - 1);
        int left = Math.Max(frame.ColumnAt(here.X - reach), 0), right = Math.Min(frame.ColumnAt(here.X + reach), frame.Columns - 1);
        var near = _index.Near(here, reach + _settings.TogetherM + 50);
        var found = new List<Target>();
        for (var row = top; row <= bottom; row++)
            for (var column = left; column <= right; column++)
            {
                var cell = (row * frame.Columns) + column;
                if (!(elevation.Cells[cell] < level)) continue;
                var there = new Coordinate(frame.CentreX(column), frame.CentreY(row));
                var length = here.Distance(there);
                if (length > reach) continue;
                if (band.TryGet(cell, out var place) && Math.Abs(place.OffsetM) <= _roads[place.Road].WidthM / 2) continue;
                var meetings = RoadIndex.Meetings(here, there, near);
                if (meetings.Count == 0 || meetings.GroupBy(m => m.Road).Any(g => g.Count() % 2 == 0)) continue;
                var far = _settings.TogetherM + 50;
                var beyond = new Coordinate(there.X + ((there.X - here.X) / length * far), there.Y + ((there.Y - here.Y) / length * far));
                var between = RoadIndex.Meetings(there, beyond, near).Any(m => m.AlongM - (_roads[m.Road].WidthM / 2) <= _settings.TogetherM);
                found.Add(new(cell, from, length, meetings, between));
            }

        return [.. found.OrderBy(t => t.LengthM).ThenBy(t => t.Cell)];
    }

    private Way? Best(Grid<float> elevation, IEnumerable<Target> targets, Coordinate here, ref string reason)
    {
        var cellM = Math.Max(elevation.Frame.CellWidthM, elevation.Frame.CellHeightM);
        Way? best = null;
        double limit = double.PositiveInfinity, steepest = 0;
        foreach (var t in targets)
        {
            if (t.LengthM > limit) break;
            var slope = ((double)elevation.Cells[t.From] - elevation.Cells[t.Cell]) / t.LengthM;
            if (best is not null && slope * EquallySteep <= steepest) continue;
            if (Carve(elevation, t.From, t.Cell, t.Meetings) is not { } way) continue;
            if (way.RoadDepthM < _settings.SmallestPondM)
            {
                reason = $"the road stands only {way.RoadDepthM:0.0} m above the way: no embankment";
                continue;
            }

            if (way.DepthM > _settings.DeepestM)
            {
                reason = $"the embankment stands {way.DepthM:0.0} m above the way, the limit is {_settings.DeepestM:0.0} m";
                continue;
            }

            if (best is null) limit = t.LengthM + Math.Max(SlackCells * cellM, SlackShare * t.LengthM);
            (best, steepest) = (way, slope);
        }

        return best;
    }

    private static Way? Carve(Grid<float> elevation, int from, int to, IReadOnlyList<CentrelineMeeting> meetings)
    {
        var frame = elevation.Frame;
        var cells = Straight(frame, from, to);
        Coordinate a = FlowSteps.Centre(frame, from), b = FlowSteps.Centre(frame, to);
        var length = a.Distance(b);
        // Where the lower end is the higher one (a known culvert against the terrain), the whole way lies level at it.
        double zb = elevation.Cells[to], za = Math.Max(elevation.Cells[from], zb), depth = 0, volume = 0, before = za;
        if (double.IsNaN(za)) return null;
        var bed = new float[cells.Length];
        var overRoad = new double[meetings.Count];
        var nearest = new double[meetings.Count];
        Array.Fill(nearest, double.PositiveInfinity);
        for (var i = 0; i < cells.Length; i++)
        {
            var z = elevation.Cells[cells[i]];
            if (float.IsNaN(z)) return null;
            var p = FlowSteps.Centre(frame, cells[i]);
            var along = (((p.X - a.X) * (b.X - a.X)) + ((p.Y - a.Y) * (b.Y - a.Y))) / length;
            bed[i] = Math.Min(z, (float)Math.Max(zb, Math.Min(za + ((zb - za) * along / length), before)));
            before = bed[i];
            depth = Math.Max(depth, z - bed[i]);
            volume += (z - bed[i]) * frame.CellAreaM2;
            for (var m = 0; m < meetings.Count; m++)
            {
                var away = Math.Abs(meetings[m].AlongM - along);
                if (away < nearest[m]) (nearest[m], overRoad[m]) = (away, z - bed[i]);
            }
        }

        return new(cells, bed, depth, volume, overRoad.Min(), meetings);
    }

    /// <summary>The cells of a straight line, each a neighbour of the one before (Bresenham 1965).</summary>
    private static int[] Straight(GridFrame frame, int from, int to)
    {
        int row = from / frame.Columns, column = from % frame.Columns, lastRow = to / frame.Columns, lastColumn = to % frame.Columns;
        int rows = Math.Abs(lastRow - row), columns = Math.Abs(lastColumn - column), rowStep = Math.Sign(lastRow - row), columnStep = Math.Sign(lastColumn - column);
        var cells = new List<int> { from };
        var error = columns - rows;
        while (row != lastRow || column != lastColumn)
        {
            var twice = 2 * error;
            if (twice > -rows) (error, column) = (error - rows, column + columnStep);
            if (twice < columns) (error, row) = (error + columns, row + rowStep);
            cells.Add((row * frame.Columns) + column);
        }

        return [.. cells];
    }

    private readonly record struct Target(int Cell, int From, double LengthM, IReadOnlyList<CentrelineMeeting> Meetings, bool Between);
}
