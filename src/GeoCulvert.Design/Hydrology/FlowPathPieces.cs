using GeoCulvert.Design.Basis;

namespace GeoCulvert.Design.Hydrology;

/// <summary>Cuts a flow path into pieces with slope and cover, and keeps account of what had to be assumed.</summary>
internal sealed class FlowPathPieces(IReadOnlyList<FlowPathPoint> path, double leastSlope, FlowSurfaces surfaces, FlowSurface fallback)
{
    private double _flooredM;

    /// <summary>The catchment's profile from distance 0, or an even slope made of length and fall with a finding; null when neither is known.</summary>
    public static IReadOnlyList<FlowPathPoint>? Path(Catchment catchment, List<Finding> findings)
    {
        var given = catchment.FlowPath;
        if (given.Count >= 2)
        {
            for (var i = 1; i < given.Count; i++)
                if (!(given[i].DistanceM > given[i - 1].DistanceM))
                    throw new ArgumentException($"The flow path of {catchment.Id} does not run from the divide down: point {i} at {given[i].DistanceM:R} m.", nameof(catchment));
            var start = given[0].DistanceM;
            return start == 0 ? given : [.. given.Select(p => p with { DistanceM = p.DistanceM - start })];
        }
        if (catchment.LongestFlowPathM is not { } length || !(length > 0)) return null;
        if ((catchment.FlowPathEndToEndSlopeMPerM ?? catchment.FlowPathSlope1085MPerM) is not { } slope) return null;
        findings.Add(HydrologyFindings.ProfileMissing.With($"{length:0} m at an even slope of {slope:0.0000} m/m", length));
        return [new(0, slope * length), new(length, 0)];
    }

    /// <summary>Distance at which the channel begins; infinity when none does.</summary>
    public static double ChannelBegin(Catchment catchment, IReadOnlyList<FlowPathPoint> path, double? areaM2)
    {
        if (catchment.ChannelBeginsAtM is { } at) return Math.Max(at, 0);
        return areaM2 is { } threshold && path.FirstOrDefault(p => p.DrainedAreaM2 >= threshold) is { } point ? point.DistanceM : double.PositiveInfinity;
    }

    /// <summary>Fall over length between two distances, not below the least slope.</summary>
    public double Slope(double fromM, double toM)
    {
        var slope = (Elevation(fromM) - Elevation(toM)) / (toM - fromM);
        if (slope >= leastSlope) return slope;
        _flooredM += toM - fromM;
        return leastSlope;
    }

    /// <summary>Pieces between two distances, about <paramref name="lengthM"/> long, also cut where cover changes.</summary>
    public IReadOnlyList<(double From, double To, FlowSurface Surface)> Cut(double fromM, double toM, double lengthM, bool byCover)
    {
        var result = new List<(double, double, FlowSurface)>();
        if (!(toM > fromM)) return result;
        var ends = new List<double> { fromM };
        if (byCover)
            for (var i = 1; i < path.Count; i++)
                if (path[i].DistanceM > fromM && path[i].DistanceM < toM && SurfaceAt(path[i].DistanceM) != SurfaceAt(path[i - 1].DistanceM)) ends.Add(path[i].DistanceM);
        ends.Add(toM);
        for (var k = 1; k < ends.Count; k++)
        {
            var pieces = Math.Max(1, (int)Math.Round((ends[k] - ends[k - 1]) / lengthM));
            var step = (ends[k] - ends[k - 1]) / pieces;
            for (var j = 0; j < pieces; j++)
            {
                var a = ends[k - 1] + j * step;
                result.Add((a, j == pieces - 1 ? ends[k] : a + step, SurfaceAt(a)));
            }
        }
        return result;
    }

    /// <summary>Sheet-flow n between two distances, weighted by length (the equation takes one n for the whole reach).</summary>
    public double MeanSheetN(double fromM, double toM) => ByCover(fromM, toM).Sum(c => c.LengthM * c.Surface.SheetN) / (toM - fromM);

    /// <summary>Names of the covers between two distances.</summary>
    public string Names(double fromM, double toM) => string.Join(" and ", ByCover(fromM, toM).Select(c => c.Surface.Name).Distinct(StringComparer.Ordinal));

    /// <summary>Adds findings for least slopes and unknown cover.</summary>
    public void Report(List<Finding> findings, double overlandEndM, string defaultSurface)
    {
        var total = path[^1].DistanceM;
        if (_flooredM > 0)
            findings.Add(HydrologyFindings.SlopeFloor.With(
                $"{_flooredM:0} m of {total:0} m of flow path ({100 * _flooredM / total:0} %) taken at the least slope {leastSlope:G3} m/m", _flooredM / total));
        var unknown = ByCover(0, overlandEndM).Where(c => !c.Known).Sum(c => c.LengthM);
        if (unknown > 0)
            findings.Add(HydrologyFindings.SurfaceAssumed.With($"{unknown:0} m of {overlandEndM:0} m of overland flow path taken as {defaultSurface}", unknown));
    }

    private List<(double LengthM, FlowSurface Surface, bool Known)> ByCover(double fromM, double toM)
    {
        var result = new List<(double, FlowSurface, bool)>();
        for (var i = 0; i < path.Count - 1; i++)
        {
            var length = Math.Min(toM, path[i + 1].DistanceM) - Math.Max(fromM, path[i].DistanceM);
            if (length > 0) result.Add((length, SurfaceOf(i), surfaces.Find(path[i].CoverId) is not null));
        }
        return result;
    }

    private FlowSurface SurfaceOf(int point) => surfaces.Find(path[point].CoverId) ?? fallback;

    private FlowSurface SurfaceAt(double distanceM) => SurfaceOf(IndexAt(distanceM));

    private double Elevation(double distanceM)
    {
        var i = IndexAt(distanceM);
        var (a, b) = (path[i], path[i + 1]);
        return a.ElevationM + (b.ElevationM - a.ElevationM) * (distanceM - a.DistanceM) / (b.DistanceM - a.DistanceM);
    }

    // Index of the piece of profile that holds a distance: the last point at or before it, but never the last point of all.
    private int IndexAt(double distanceM)
    {
        int low = 0, high = path.Count - 2;
        while (low < high)
        {
            var middle = (low + high + 1) / 2;
            if (path[middle].DistanceM <= distanceM) low = middle;
            else high = middle - 1;
        }
        return low;
    }
}
