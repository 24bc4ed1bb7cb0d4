using GeoCulvert.Design.Basis;

namespace GeoCulvert.Design.Hydraulics;

/// <summary>Water level at the outlet for a flow.</summary>
public interface ITailwater
{
    /// <summary>What it is, for the sheet.</summary>
    string Description { get; }

    /// <summary>Tailwater elevation for the total flow, m.</summary>
    double ElevationM(double flowM3PerS);

    /// <summary>Mean velocity in the channel below for the total flow, m/s; null where it is not known.</summary>
    double? VelocityMPerS(double flowM3PerS) => null;

    /// <summary>The calculation for one flow, line by line; empty where there is none.</summary>
    IReadOnlyList<Step> Steps(double flowM3PerS) => [];
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

    /// <inheritdoc/>
    public double? VelocityMPerS(double flowM3PerS) => flowM3PerS <= 0 ? 0 : flowM3PerS / Section.AreaM2(ElevationM(flowM3PerS) - BedElevationM);

    /// <inheritdoc/>
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

/// <summary>Normal depth in a natural cross-section some way below the outlet, its surface carried up to the outlet parallel to the bed.</summary>
/// <param name="Section">Cross-section.</param>
/// <param name="SlopeMPerM">Bed slope, above 0.</param>
/// <param name="DistanceM">Distance of the section below the outlet, m.</param>
public sealed record CrossSectionTailwater(ChannelCrossSection Section, double SlopeMPerM, double DistanceM) : ITailwater
{
    /// <inheritdoc/>
    public string Description => "normal depth in a cross-section of the terrain";

    /// <summary>Bed at the outlet, m.</summary>
    public double BedElevationM => Section.BedM + (SlopeMPerM * DistanceM);

    /// <inheritdoc/>
    public double ElevationM(double flowM3PerS) => LevelAtSectionM(flowM3PerS) + (SlopeMPerM * DistanceM);

    /// <summary>Level at the section itself, m.</summary>
    public double LevelAtSectionM(double flowM3PerS) => Section.LevelForConveyanceM(flowM3PerS / Math.Sqrt(SlopeMPerM));

    /// <inheritdoc/>
    public double? VelocityMPerS(double flowM3PerS) => flowM3PerS <= 0 ? 0 : flowM3PerS / Section.At(LevelAtSectionM(flowM3PerS)).AreaM2;

    /// <inheritdoc/>
    public IReadOnlyList<Step> Steps(double flowM3PerS)
    {
        var level = LevelAtSectionM(flowM3PerS);
        var at = Section.At(level);
        const string source = "Manning's equation, subdivided conveyance (Chow 1959, sec. 6-5)";
        return
        [
            new("section_distance_m", DistanceM, "m", "below the outlet"),
            new("section_points", Section.Points.Count, ""),
            new("section_bed_m", Section.BedM, "m"),
            new("channel_width_m", Section.RightBankM - Section.LeftBankM, "m"),
            new("channel_roughness", Section.ChannelN, ""),
            new("overbank_roughness", Section.OverbankN, ""),
            new("channel_slope", SlopeMPerM, "m/m"),
            new("section_level_m", level, "m", $"Q = K S^(1/2): {flowM3PerS:G4} = {at.ConveyanceM3PerS:G4} x {SlopeMPerM:G4}^(1/2), area {at.AreaM2:G4} m2, width {at.TopWidthM:0.0} m", source),
            new("tailwater_depth_m", level - Section.BedM, "m"),
            new("tailwater_elevation_m", level + (SlopeMPerM * DistanceM), "m", $"{level:0.00} + {SlopeMPerM:G4} x {DistanceM:0.0}"),
        ];
    }
}

/// <summary>The tailwater of the channel, never below the pool of the crossing next downstream.</summary>
/// <param name="Channel">Tailwater without the pool.</param>
/// <param name="Pool">Headwater of the crossing downstream, by the flow of this one.</param>
/// <param name="DownstreamId">The crossing downstream.</param>
public sealed record PoolTailwater(ITailwater Channel, RatingTailwater Pool, string DownstreamId) : ITailwater
{
    /// <inheritdoc/>
    public string Description => $"{Channel.Description}, not below the pool of {DownstreamId}";

    /// <inheritdoc/>
    public double ElevationM(double flowM3PerS) => Math.Max(Channel.ElevationM(flowM3PerS), Pool.ElevationM(flowM3PerS));

    /// <summary>Whether the pool sets the level at a flow.</summary>
    public bool IsPool(double flowM3PerS) => Pool.ElevationM(flowM3PerS) > Channel.ElevationM(flowM3PerS);

    /// <inheritdoc/>
    public double? VelocityMPerS(double flowM3PerS) => IsPool(flowM3PerS) ? null : Channel.VelocityMPerS(flowM3PerS);

    /// <inheritdoc/>
    public IReadOnlyList<Step> Steps(double flowM3PerS)
    {
        var (channel, pool) = (Channel.ElevationM(flowM3PerS), Pool.ElevationM(flowM3PerS));
        return
        [
            .. Channel.Steps(flowM3PerS),
            new("downstream_pool_m", pool, "m", $"headwater of {DownstreamId}"),
            new("tailwater_elevation_m", Math.Max(channel, pool), "m", $"the higher of {channel:0.00} (channel) and {pool:0.00} (pool)"),
        ];
    }
}
