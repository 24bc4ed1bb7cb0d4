using GeoCulvert.Design.Terrain;

namespace GeoCulvert.Design.Crossings;

/// <summary>
/// The bed of the stream up- and downstream of a crossing: elevations of the untouched terrain at the cells of the flow path, smoothed on each side
/// by a robust line (slope: median of all pairwise slopes; level: median of the residuals; Theil 1950, Sen 1968), so that one pit or
/// one boulder does not move it.
/// </summary>
internal sealed class ChannelBed
{
    private readonly List<(double AlongM, double ElevationM)> _up;
    private readonly List<(double AlongM, double ElevationM)> _down;
    private readonly double _windowM;

    /// <summary>Walks up the main stem and down the flow path from the crossing.</summary>
    public ChannelBed(Crossing crossing, Grid<byte> direction, Grid<int> accumulation, Grid<float> elevation, double windowM, double reachM)
    {
        _windowM = windowM;
        _up = Along(FlowSteps.UpstreamPath(direction, accumulation, crossing.MeetingCell, reachM), crossing, elevation);
        var next = FlowSteps.Downstream(direction, crossing.MeetingCell);
        _down = next < 0 ? [] : Along(FlowSteps.DownstreamPath(direction, next, reachM), crossing, elevation);
    }

    /// <summary>Bed at a distance upstream of the crossing, from the cells at or beyond it within the window; NaN without any.</summary>
    public double UpstreamM(double distanceM) => At(_up, distanceM);

    /// <summary>Bed at a distance downstream of the crossing; NaN without any.</summary>
    public double DownstreamM(double distanceM) => At(_down, distanceM);

    /// <summary>The cells' bed nearest to the crossing, the lower of both sides; NaN without any.</summary>
    public double AtCrossingM => _up.Count == 0 ? First(_down) : _down.Count == 0 ? First(_up) : Math.Min(First(_up), First(_down));

    private static double First(List<(double AlongM, double ElevationM)> side) => side.Count == 0 ? double.NaN : side[0].ElevationM;

    private static List<(double AlongM, double ElevationM)> Along(List<int> path, Crossing crossing, Grid<float> elevation)
    {
        var points = new List<(double, double)>();
        var alongM = 0.0;
        var before = crossing.Point;
        foreach (var cell in path)
        {
            var centre = FlowSteps.Centre(elevation.Frame, cell);
            alongM += before.Distance(centre);
            before = centre;
            if (!float.IsNaN(elevation.Cells[cell])) points.Add((alongM, elevation.Cells[cell]));
        }

        return points;
    }

    private double At(List<(double AlongM, double ElevationM)> side, double distanceM)
    {
        var window = side.Where(p => p.AlongM >= distanceM && p.AlongM <= distanceM + _windowM).ToList();
        // A reach shorter than two cells: take what lies nearest beyond the end, or the last cell there is.
        if (window.Count < 2) window = [.. side.Where(p => p.AlongM >= distanceM).Take(2)];
        if (window.Count == 0) return side.Count == 0 ? double.NaN : side[^1].ElevationM;
        if (window.Count == 1) return window[0].ElevationM;
        var slopes = new List<double>();
        for (var i = 0; i < window.Count; i++)
            for (var j = i + 1; j < window.Count; j++)
                slopes.Add((window[j].ElevationM - window[i].ElevationM) / (window[j].AlongM - window[i].AlongM));
        var slope = Median(slopes);
        return Median([.. window.Select(p => p.ElevationM - (slope * (p.AlongM - distanceM)))]);
    }

    private static double Median(List<double> values)
    {
        values.Sort();
        var middle = values.Count / 2;
        return values.Count % 2 == 1 ? values[middle] : (values[middle - 1] + values[middle]) / 2;
    }
}
