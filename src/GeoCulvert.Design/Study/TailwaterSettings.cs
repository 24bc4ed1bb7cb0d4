using GeoCulvert.Design.Hydraulics;

namespace GeoCulvert.Design.Study;

/// <summary>How the water level at the outlet is found.</summary>
public enum TailwaterMethod
{
    /// <summary>Normal depth in a cross-section cut from the terrain; where it shows none, normal depth in a trapezoid, with a finding.</summary>
    ChannelFromDem,

    /// <summary>Normal depth in a trapezoid.</summary>
    NormalDepth,

    /// <summary>A fixed elevation.</summary>
    Fixed,

    /// <summary>A rating table.</summary>
    Rating,
}

/// <summary>How the water level at the outlet is found; SI.</summary>
public sealed record TailwaterSettings
{
    /// <summary>Method.</summary>
    public TailwaterMethod Method { get; init; } = TailwaterMethod.ChannelFromDem;

    /// <summary>Fixed elevation, m, for <see cref="TailwaterMethod.Fixed"/>.</summary>
    public double? FixedElevationM { get; init; }

    /// <summary>Table for <see cref="TailwaterMethod.Rating"/>.</summary>
    public TailwaterRatingTable? Rating { get; init; }

    /// <summary>Channel bottom width, m; null to take it from the drainage area, with a finding.</summary>
    public double? BottomWidthM { get; init; }

    /// <summary>Side slope, horizontal per one vertical.</summary>
    public double SideSlope { get; init; } = 2;

    /// <summary>Manning's n of the channel.</summary>
    public double RoughnessN { get; init; } = 0.04;

    /// <summary>Manning's n of the overbanks of a cross-section.</summary>
    public double OverbankRoughnessN { get; init; } = 0.08;

    /// <summary>Bed slope; null to take it from the terrain below the outlet.</summary>
    public double? SlopeMPerM { get; init; }

    /// <summary>Distance of the cross-section below the outlet, m; at least two cells.</summary>
    public double SectionDistanceM { get; init; } = 20;

    /// <summary>Factor on the depth for a low tailwater; null not to rate one.</summary>
    public double? LowDepthFactor { get; init; }

    /// <summary>Factor on the depth for a high tailwater; null not to rate one.</summary>
    public double? HighDepthFactor { get; init; }
}
