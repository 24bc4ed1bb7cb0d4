using GeoCulvert.Design.Basis;

namespace GeoCulvert.Design.Hydraulics;

/// <summary>Water level at the outlet for a flow.</summary>
public interface ITailwater
{
    /// <summary>What it is, for the sheet.</summary>
    string Description { get; }

    /// <summary>Tailwater elevation for the total flow, m.</summary>
    double ElevationM(double flowM3PerS);
}

/// <summary>The same level for every flow.</summary>
/// <param name="LevelM">Elevation, m.</param>
public sealed record FixedTailwater(double LevelM) : ITailwater
{
    /// <inheritdoc/>
    public string Description => "fixed level";

    /// <inheritdoc/>
    public double ElevationM(double flowM3PerS) => LevelM;
}

/// <summary>A table of flow and level, straight between its points and held at its ends.</summary>
public sealed record RatingTailwater : ITailwater
{
    private readonly IReadOnlyList<(double FlowM3PerS, double LevelM)> _points;

    /// <summary>Creates the rating.</summary>
    /// <exception cref="ArgumentException">Fewer than two points, or flow or level do not rise.</exception>
    public RatingTailwater(IReadOnlyList<(double FlowM3PerS, double LevelM)> points)
    {
        ArgumentNullException.ThrowIfNull(points);
        if (points.Count < 2 || points.Zip(points.Skip(1)).Any(p => p.Second.FlowM3PerS <= p.First.FlowM3PerS || p.Second.LevelM < p.First.LevelM))
            throw new ArgumentException("A tailwater rating needs two points or more with rising flow and level.", nameof(points));
        _points = points;
    }

    /// <inheritdoc/>
    public string Description => "rating table";

    /// <inheritdoc/>
    public double ElevationM(double flowM3PerS)
    {
        if (flowM3PerS <= _points[0].FlowM3PerS) return _points[0].LevelM;
        for (var i = 1; i < _points.Count; i++)
        {
            var (a, b) = (_points[i - 1], _points[i]);
            if (flowM3PerS <= b.FlowM3PerS) return a.LevelM + ((b.LevelM - a.LevelM) * (flowM3PerS - a.FlowM3PerS) / (b.FlowM3PerS - a.FlowM3PerS));
        }

        return _points[^1].LevelM;
    }
}

/// <summary>Normal depth in a channel below the outlet (Manning).</summary>
/// <param name="Section">Channel.</param>
/// <param name="RoughnessN">Manning's n.</param>
/// <param name="SlopeMPerM">Bed slope, above 0.</param>
/// <param name="BedElevationM">Bed elevation at the outlet, m.</param>
public sealed record NormalDepthTailwater(TrapezoidSection Section, double RoughnessN, double SlopeMPerM, double BedElevationM) : ITailwater
{
    /// <inheritdoc/>
    public string Description => "normal depth in the channel";

    /// <inheritdoc/>
    public double ElevationM(double flowM3PerS) => BedElevationM + OpenChannelFlow.NormalDepthM(Section, flowM3PerS, RoughnessN, SlopeMPerM)!.Value;

    /// <summary>The calculation for one flow, line by line.</summary>
    public IReadOnlyList<Step> Steps(double flowM3PerS)
    {
        var depth = ElevationM(flowM3PerS) - BedElevationM;
        double area = Section.AreaM2(depth), perimeter = Section.WettedPerimeterM(depth);
        const string source = "Manning's equation (Chow 1959, sec. 5-6)";
        return
        [
            new("channel_bottom_width_m", Section.BottomWidthM, "m"),
            new("channel_side_slope", Section.SideSlope, ""),
            new("channel_roughness", RoughnessN, ""),
            new("channel_slope", SlopeMPerM, "m/m"),
            new("tailwater_depth_m", depth, "m", $"Q = A R^(2/3) S^(1/2) / n: {flowM3PerS:G4} = {area:G4} x ({area:G4}/{perimeter:G4})^(2/3) x {SlopeMPerM:G4}^(1/2) / {RoughnessN:G3}", source),
            new("tailwater_elevation_m", BedElevationM + depth, "m", $"{BedElevationM:0.00} + {depth:0.00}"),
        ];
    }
}
