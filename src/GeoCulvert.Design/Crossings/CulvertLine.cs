using GeoCulvert.Design.Basis;
using NetTopologySuite.Geometries;

namespace GeoCulvert.Design.Crossings;

/// <summary>Where a figure of a crossing comes from.</summary>
public enum FigureOrigin
{
    /// <summary>Measured on the terrain or the road.</summary>
    Measured,

    /// <summary>Given by the user.</summary>
    Given,
}

/// <summary>A figure with its origin.</summary>
/// <param name="Value">The figure; unit by the member that holds it.</param>
/// <param name="Origin">Measured or given.</param>
/// <param name="How">How it came about, in words.</param>
public sealed record Figure(double Value, FigureOrigin Origin, string How)
{
    internal static Figure? Of(double? given, double measured, string how) =>
        given is { } g ? new(g, FigureOrigin.Given, "given") : double.IsNaN(measured) ? null : new(measured, FigureOrigin.Measured, how);
}

/// <summary>Figures of one crossing that the user gives instead of the measured ones; null leaves the measured one.</summary>
/// <param name="CrossingId">The crossing.</param>
public sealed record CrossingOverrides(string CrossingId)
{
    /// <summary>Invert at the inlet, m.</summary>
    public double? InletElevationM { get; init; }

    /// <summary>Invert at the outlet, m.</summary>
    public double? OutletElevationM { get; init; }

    /// <summary>Length of the barrel, m.</summary>
    public double? LengthM { get; init; }

    /// <summary>Lowest road level near the crossing, m; also taken as the level at the crossing.</summary>
    public double? RoadElevationM { get; init; }

    /// <summary>Width of the road from shoulder to shoulder here, m.</summary>
    public double? RoadWidthM { get; init; }

    /// <summary>Embankment slope here, horizontal per one vertical.</summary>
    public double? SideSlope { get; init; }

    /// <summary>Skew of the barrel, degrees, 0-90 measured from the perpendicular of the road; the sense stays that of the flow.</summary>
    public double? SkewDeg { get; init; }
}

/// <summary>Settings of measuring culvert lines.</summary>
public sealed record CulvertLineSettings
{
    /// <summary>Length of the stream over which the bed is smoothed beyond each end, m; null for the larger of five cells and 15 m (own rule).</summary>
    public double? BedWindowM { get; init; }

    /// <summary>Road on each side of the crossing in which its lowest level is sought, m. Default 50 m (own rule).</summary>
    public double RoadReachM { get; init; } = 50;

    /// <summary>Largest skew at which a barrel is laid, degrees; a flow more oblique is turned to it, with a finding. Default 60 (own rule).</summary>
    public double LargestSkewDeg { get; init; } = 60;

    /// <summary>Filled depth at the crossing above which a finding is raised, m. Default 0.3 m (own rule).</summary>
    public double FilledDepthLimitM { get; init; } = 0.3;
}

/// <summary>
/// The barrel of a crossing before it has a size: line from inlet to outlet, inverts, road level. What could not be measured is null and
/// has a finding.
/// </summary>
/// <param name="CrossingId">The crossing.</param>
public sealed record CulvertLine(string CrossingId)
{
    /// <summary>Inlet to outlet, with z where known; null without a road and a length.</summary>
    public LineString? Line { get; init; }

    /// <summary>Length of the barrel, m.</summary>
    public Figure? Length { get; init; }

    /// <summary>Invert at the inlet, m.</summary>
    public Figure? InletElevation { get; init; }

    /// <summary>Invert at the outlet, m.</summary>
    public Figure? OutletElevation { get; init; }

    /// <summary>Road level at the crossing, m.</summary>
    public Figure? RoadElevation { get; init; }

    /// <summary>Lowest road level near the crossing, m: water goes over the road here first.</summary>
    public Figure? LowestRoadElevation { get; init; }

    /// <summary>Station of the lowest road level, m.</summary>
    public double? LowestRoadStationM { get; init; }

    /// <summary>Angle between the barrel and the perpendicular of the road, degrees.</summary>
    public double? SkewDeg { get; init; }

    /// <summary>Road levels around the crossing.</summary>
    public RoadProfile? Profile { get; init; }

    /// <summary>Fall by length, m/m; may be zero or negative, then with a finding.</summary>
    public double? SlopeMPerM => (InletElevation?.Value - OutletElevation?.Value) / Length?.Value;

    /// <summary>Road level at the crossing above the inlet invert, m.</summary>
    public double? FillHeightM => RoadElevation?.Value - InletElevation?.Value;

    /// <summary>Doubts.</summary>
    public IReadOnlyList<Finding> Findings { get; init; } = [];

    /// <summary>Fill above the crown of a barrel at the inlet, wall thickness not counted, m.</summary>
    /// <param name="riseM">Rise of the barrel, m.</param>
    public double? CoverM(double riseM) => FillHeightM - riseM;
}
