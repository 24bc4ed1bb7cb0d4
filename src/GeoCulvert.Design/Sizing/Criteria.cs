namespace GeoCulvert.Design.Sizing;

/// <summary>What a culvert must meet; SI. Null means no limit.</summary>
public sealed record SizingCriteria
{
    /// <summary>Largest HW/D at the design flood (1.5, common practice).</summary>
    public double LargestHeadwaterRatio { get; init; } = 1.5;

    /// <summary>Least height of the lowest road level above the design headwater, m (0.3, common practice). Needs a road level.</summary>
    public double FreeboardM { get; init; } = 0.3;

    /// <summary>Largest headwater depth above the inlet invert at the design flood, m.</summary>
    public double? LargestHeadwaterDepthM { get; init; }

    /// <summary>Highest headwater elevation at the design flood, m.</summary>
    public double? HighestHeadwaterElevationM { get; init; }

    /// <summary>Smallest rise, m.</summary>
    public double SmallestRiseM { get; init; }

    /// <summary>Least cover from the crown at the inlet invert level to the lowest road level, m (0.3, common practice). Needs a road level.</summary>
    public double SmallestCoverM { get; init; } = 0.3;

    /// <summary>Largest outlet velocity at the design flood, m/s.</summary>
    public double? LargestOutletVelocityMPerS { get; init; }

    /// <summary>Largest depth over the lowest road point at the check flood, m.</summary>
    public double? LargestOvertoppingDepthM { get; init; }
}
