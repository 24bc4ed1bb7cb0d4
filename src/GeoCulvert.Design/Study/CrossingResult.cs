using GeoCulvert.Design.Basis;
using GeoCulvert.Design.Sizing;
using NetTopologySuite.Geometries;

namespace GeoCulvert.Design.Study;

/// <summary>What became of a crossing; the words are those of the results.</summary>
public static class CrossingStatus
{
    /// <summary>A culvert of the catalogue meets every criterion.</summary>
    public const string Sized = "sized";

    /// <summary>An existing culvert was rated; whether it meets the criteria is said with it.</summary>
    public const string Rated = "rated";

    /// <summary>No culvert of the catalogue meets every criterion.</summary>
    public const string NoSizeFits = "no size fits";

    /// <summary>Something needed is missing; the findings say what.</summary>
    public const string NotComputed = "not computed";
}

/// <summary>The land above a crossing as results carry it; SI.</summary>
public sealed record WatershedResult
{
    /// <summary>Total watershed outline.</summary>
    public required Geometry Outline { get; init; }

    /// <summary>Local watershed outline: what drains here without passing another crossing.</summary>
    public required Geometry LocalOutline { get; init; }

    /// <summary>All that is known of the total watershed.</summary>
    public required LandFigures Total { get; init; }

    /// <summary>All that is known of the local watershed.</summary>
    public required LandFigures Local { get; init; }

    /// <summary>Total area, the true area of its cells, m2.</summary>
    public required double AreaM2 { get; init; }

    /// <summary>Local area, m2.</summary>
    public required double LocalAreaM2 { get; init; }

    /// <summary>Perimeter of the total outline along cell edges, m.</summary>
    public required double PerimeterM { get; init; }

    /// <summary>Centroid of the total watershed.</summary>
    public required Coordinate Centroid { get; init; }

    /// <summary>Share of the boundary on the edge of the terrain or on nodata, 0-1.</summary>
    public required double EdgeContactShare { get; init; }

    /// <summary>Mean ground slope, m/m.</summary>
    public required double MeanSlopeMPerM { get; init; }

    /// <summary>Mean elevation, m.</summary>
    public required double MeanElevationM { get; init; }

    /// <summary>Highest less lowest elevation, m.</summary>
    public required double ReliefM { get; init; }

    /// <summary>Longest flow path from the divide to the crossing; null for a watershed of one cell.</summary>
    public LineString? FlowPath { get; init; }

    /// <summary>Its length, m.</summary>
    public required double FlowPathLengthM { get; init; }

    /// <summary>Its slope between 10 % and 85 % of the length, m/m; null when it cannot be measured.</summary>
    public double? FlowPathSlope1085MPerM { get; init; }

    /// <summary>Its slope from end to end, m/m.</summary>
    public double? FlowPathEndToEndSlopeMPerM { get; init; }

    /// <summary>Profile from the divide down: distance and elevation, m.</summary>
    public IReadOnlyList<(double DistanceM, double ElevationM)> FlowPathProfile { get; init; } = [];

    /// <summary>The crossing next downstream, or null.</summary>
    public string? DownstreamCrossingId { get; init; }
}

/// <summary>The culvert that was chosen, as results carry it; SI.</summary>
public sealed record CulvertResult
{
    /// <summary>One line, as on a drawing.</summary>
    public required string Description { get; init; }

    /// <summary>circle or box.</summary>
    public required string Shape { get; init; }

    /// <summary>Span, m.</summary>
    public required double SpanM { get; init; }

    /// <summary>Rise, m.</summary>
    public required double RiseM { get; init; }

    /// <summary>Barrels.</summary>
    public required int Barrels { get; init; }

    /// <summary>Total barrel area, m2.</summary>
    public required double BarrelAreaM2 { get; init; }

    /// <summary>Inlet type.</summary>
    public required string Inlet { get; init; }

    /// <summary>Control at the design flood: inlet or outlet.</summary>
    public required string Control { get; init; }

    /// <summary>Headwater depth above the inlet invert at the design flood, m.</summary>
    public required double HeadwaterDepthM { get; init; }

    /// <summary>Headwater elevation at the design flood, m.</summary>
    public required double HeadwaterElevationM { get; init; }

    /// <summary>Headwater depth over rise at the design flood.</summary>
    public required double HeadwaterOverRise { get; init; }

    /// <summary>Outlet velocity at the design flood, m/s.</summary>
    public required double OutletVelocityMPerS { get; init; }

    /// <summary>Headwater elevation at the check flood, m.</summary>
    public required double CheckHeadwaterElevationM { get; init; }

    /// <summary>Flow over the road at the check flood, m3/s.</summary>
    public required double CheckRoadFlowM3PerS { get; init; }

    /// <summary>Return period at which the road is first overtopped, years; null when not within those asked for.</summary>
    public double? OvertoppingReturnPeriodYr { get; init; }

    /// <summary>Installed cost in the currency of the prices; null without prices.</summary>
    public double? Cost { get; init; }
}

/// <summary>Where the barrel lies, as results carry it; SI.</summary>
/// <param name="Line">Inlet to outlet in plan.</param>
/// <param name="LengthM">Barrel length, m.</param>
/// <param name="InletElevationM">Inlet invert, m.</param>
/// <param name="OutletElevationM">Outlet invert, m.</param>
/// <param name="SkewDeg">Angle between the barrel and the perpendicular to the road, degrees.</param>
/// <param name="RoadElevationM">Lowest road level near the crossing, m.</param>
/// <param name="FillHeightM">Road level above the bed, m.</param>
public sealed record BarrelLineResult(
    LineString? Line, double LengthM, double InletElevationM, double OutletElevationM, double SkewDeg, double RoadElevationM, double FillHeightM);

/// <summary>A crossing with all that was found out about it, in SI; null parts were not computed.</summary>
public sealed record CrossingResult
{
    /// <summary>Crossing id.</summary>
    public required string CrossingId { get; init; }

    /// <summary>Road name; "" for a given point without a road.</summary>
    public required string Road { get; init; }

    /// <summary>Station along the road, m; null without a road.</summary>
    public double? StationM { get; init; }

    /// <summary>Whether it was given as a point.</summary>
    public bool IsGiven { get; init; }

    /// <summary>How it was found: stream, given point, opened embankment, low point of the road, ditch relief.</summary>
    public string FoundBy { get; init; } = "";

    /// <summary>Other roads over the same culvert; empty for none.</summary>
    public string AlsoUnder { get; init; } = "";

    /// <summary>How the existing culvert stands; null without one.</summary>
    public ExistingAssessment? Existing { get; init; }

    /// <summary>Where it is.</summary>
    public required Point Location { get; init; }

    /// <summary>One of <see cref="CrossingStatus"/>.</summary>
    public required string Status { get; init; }

    /// <summary>Design flood, years.</summary>
    public required double DesignReturnPeriodYr { get; init; }

    /// <summary>Check flood, years.</summary>
    public required double CheckReturnPeriodYr { get; init; }

    /// <summary>The land above it.</summary>
    public required WatershedResult Watershed { get; init; }

    /// <summary>Its flows, or null.</summary>
    public FlowResult? Flow { get; init; }

    /// <summary>Where the barrel lies, or null.</summary>
    public BarrelLineResult? Barrel { get; init; }

    /// <summary>The chosen culvert, or null.</summary>
    public CulvertResult? Culvert { get; init; }

    /// <summary>The lowest of all limits on the design headwater, m; null when nothing was asked of the search.</summary>
    public double? HeadwaterLimitElevationM { get; init; }

    /// <summary>Options in the order of the search: the chosen first.</summary>
    public IReadOnlyList<SheetOption> Options { get; init; } = [];

    /// <summary>Headwater rating of the chosen culvert.</summary>
    public IReadOnlyList<SheetRatingPoint> Rating { get; init; } = [];

    /// <summary>The sheet that prints it.</summary>
    public required CrossingSheet Sheet { get; init; }

    /// <summary>Findings on it, errors first.</summary>
    public IReadOnlyList<Finding> Findings { get; init; } = [];
}
