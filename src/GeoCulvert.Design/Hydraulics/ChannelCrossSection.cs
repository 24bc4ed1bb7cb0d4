using GeoCulvert.Design.Basis;

namespace GeoCulvert.Design.Hydraulics;

/// <summary>Figures of a cross-section at a water level.</summary>
/// <param name="AreaM2">Area, m2.</param>
/// <param name="ConveyanceM3PerS">Conveyance K, m3/s.</param>
/// <param name="TopWidthM">Width of the water surface, m.</param>
public readonly record struct CrossSectionFlow(double AreaM2, double ConveyanceM3PerS, double TopWidthM);

/// <summary>
/// A natural cross-section of points with a channel between two overbanks, each with its own roughness (Chow 1959, sec. 6-5):
/// <code>K = sum over the three parts of A R^(2/3) / n        Q = K S^(1/2)</code>
/// The dividing lines are no wetted perimeter. Beyond the ends the ground is taken as a wall without friction.
/// </summary>
public sealed class ChannelCrossSection
{
    private const int Between = 3; // levels between two heights of points at which conveyance is tabulated

    private readonly (double StationM, double ElevationM)[] _points;
    private readonly (double LevelM, double Conveyance)[] _table;

    /// <summary>Creates a cross-section.</summary>
    /// <param name="points">Station across the stream and elevation, m; rising stations, three points or more.</param>
    /// <param name="leftBankM">Station of the left edge of the channel, m.</param>
    /// <param name="rightBankM">Station of its right edge, m.</param>
    /// <param name="channelN">Manning's n of the channel.</param>
    /// <param name="overbankN">Manning's n of both overbanks.</param>
    /// <exception cref="ArgumentException">Fewer than three points, stations that do not rise, or level ground.</exception>
    public ChannelCrossSection(IReadOnlyList<(double StationM, double ElevationM)> points, double leftBankM, double rightBankM, double channelN, double overbankN)
    {
        ArgumentNullException.ThrowIfNull(points);
        if (points.Count < 3 || points.Zip(points.Skip(1)).Any(p => !(p.Second.StationM > p.First.StationM)) || points.Min(p => p.ElevationM) == points.Max(p => p.ElevationM))
            throw new ArgumentException("A cross-section needs three points or more of rising station, not all of one level.", nameof(points));
        (LeftBankM, RightBankM, ChannelN, OverbankN) = (leftBankM, rightBankM, channelN, overbankN);
        Points = points;
        _points = [.. WithBanks(points, leftBankM, rightBankM)];
        BedM = _points.Min(p => p.ElevationM);
        LowerEndM = Math.Min(_points[0].ElevationM, _points[^1].ElevationM);
        _table = [.. Tabulate()];
    }

    /// <summary>Points as given.</summary>
    public IReadOnlyList<(double StationM, double ElevationM)> Points { get; }

    /// <summary>Left edge of the channel, m.</summary>
    public double LeftBankM { get; }

    /// <summary>Right edge of the channel, m.</summary>
    public double RightBankM { get; }

    /// <summary>Manning's n of the channel.</summary>
    public double ChannelN { get; }

    /// <summary>Manning's n of the overbanks.</summary>
    public double OverbankN { get; }

    /// <summary>Lowest ground, m.</summary>
    public double BedM { get; }

    /// <summary>Lower of both ends, m: above it the section does not hold the water.</summary>
    public double LowerEndM { get; }

    /// <summary>Area, conveyance and width at a level.</summary>
    public CrossSectionFlow At(double levelM)
    {
        Span<double> area = stackalloc double[3], perimeter = stackalloc double[3];
        var width = 0.0;
        for (var i = 1; i < _points.Length; i++)
        {
            var (a, b) = (_points[i - 1], _points[i]);
            var part = (a.StationM + b.StationM) / 2 is var middle && middle < LeftBankM ? 0 : middle > RightBankM ? 2 : 1;
            var (low, high) = a.ElevationM <= b.ElevationM ? (a.ElevationM, b.ElevationM) : (b.ElevationM, a.ElevationM);
            if (levelM <= low) continue;
            var wet = levelM >= high ? 1 : (levelM - low) / (high - low);
            var run = (b.StationM - a.StationM) * wet;
            var rise = (high - low) * wet;
            area[part] += run * (levelM - low - (rise / 2));
            perimeter[part] += Math.Sqrt((run * run) + (rise * rise));
            width += run;
        }

        var conveyance = 0.0;
        for (var k = 0; k < 3; k++)
            if (area[k] > 0) conveyance += area[k] * Math.Cbrt(area[k] / perimeter[k] * (area[k] / perimeter[k])) / (k == 1 ? ChannelN : OverbankN);
        return new CrossSectionFlow(area[0] + area[1] + area[2], conveyance, width);
    }

    /// <summary>
    /// The lowest level with a conveyance, m. Where water just spreads over a flat overbank conveyance may dip for a little rise; the lowest level that carries the flow is then
    /// reached and the level still rises with flow.
    /// </summary>
    public double LevelForConveyanceM(double conveyanceM3PerS)
    {
        if (conveyanceM3PerS <= 0) return BedM;
        double Excess(double level) => At(level).ConveyanceM3PerS - conveyanceM3PerS;
        for (var i = 1; i < _table.Length; i++)
            if (_table[i].Conveyance >= conveyanceM3PerS) return Root(Excess, _table[i - 1].LevelM, _table[i].LevelM);
        double low = _table[^1].LevelM, step = low - BedM;
        while (Excess(low + step) < 0) (low, step) = (low + step, 2 * step);
        return Root(Excess, low, low + step);
    }

    // As a height above the bed, so that the search is as fine at any elevation; from 0 the search would be fine only beside the whole step.
    private double Root(Func<double, double> excess, double low, double high)
    {
        double Above(double h) => excess(BedM + h);
        double from = low - BedM, to = high - BedM;
        if (from == 0)
        {
            from = to;
            while (Above(from) > 0) from /= 4;
            if (from == to) return high;
            to = Math.Min(to, 4 * from);
        }

        return Above(from) >= 0 ? BedM + from : Above(to) <= 0 ? BedM + to : BedM + RootFinding.Bracketed(Above, from, to);
    }

    private IEnumerable<(double, double)> Tabulate()
    {
        var levels = _points.Select(p => p.ElevationM).Distinct().Order().ToArray();
        yield return (levels[0], 0);
        for (var i = 1; i < levels.Length; i++)
        {
            for (var k = 1; k <= Between; k++)
            {
                var level = levels[i - 1] + ((levels[i] - levels[i - 1]) * k / Between);
                yield return (level, At(level).ConveyanceM3PerS);
            }
        }
    }

    private static IEnumerable<(double StationM, double ElevationM)> WithBanks(IReadOnlyList<(double StationM, double ElevationM)> points, double left, double right)
    {
        yield return points[0];
        for (var i = 1; i < points.Count; i++)
        {
            var (a, b) = (points[i - 1], points[i]);
            foreach (var s in new[] { left, right })
                if (s > a.StationM && s < b.StationM) yield return (s, a.ElevationM + ((b.ElevationM - a.ElevationM) * (s - a.StationM) / (b.StationM - a.StationM)));
            yield return b;
        }
    }
}
