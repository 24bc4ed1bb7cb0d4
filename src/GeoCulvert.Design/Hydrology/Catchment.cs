using GeoCulvert.Design.Basis;

namespace GeoCulvert.Design.Hydrology;

/// <summary>A point of the longest flow path, from the divide down.</summary>
/// <param name="DistanceM">Distance from the divide along the path, m; rising from point to point.</param>
/// <param name="ElevationM">Ground elevation, m.</param>
/// <param name="CoverId">Cover from this point down to the next, as in the table of flow surfaces; null when unknown.</param>
/// <param name="DrainedAreaM2">Area drained at this point, m2; null when unknown.</param>
public sealed record FlowPathPoint(double DistanceM, double ElevationM, string? CoverId = null, double? DrainedAreaM2 = null);

/// <summary>The runoff coefficient C of the rational method and where it comes from.</summary>
/// <param name="Value">C, 0-1; for return periods below 25 years when <paramref name="ValueFrom25Yr"/> is given.</param>
/// <param name="Origin">Where it comes from: "given", or the table with its weighting.</param>
/// <param name="ValueFrom25Yr">C for return periods of 25 years and more; null when one value serves all.</param>
public sealed record RunoffCoefficient(double Value, string Origin, double? ValueFrom25Yr = null)
{
    /// <summary>The coefficient for a return period.</summary>
    public double For(double returnPeriodYr) => returnPeriodYr >= 25 && ValueFrom25Yr is { } high ? high : Value;
}

/// <summary>A named figure of a catchment, for the variables of regression equations.</summary>
/// <param name="Value">The figure, in <paramref name="Unit"/>.</param>
/// <param name="Unit">Its unit; "" for a pure number or a slope in m/m.</param>
/// <param name="Origin">Where it comes from.</param>
public sealed record Characteristic(double Value, string Unit, string Origin = "given");

/// <summary>
/// What the flow methods know about the land above a crossing: numbers, no maps. A figure that is not known is null, and a
/// method that needs it says so in a finding instead of assuming one.
/// </summary>
/// <param name="Id">The crossing's id; given flows are looked up by it.</param>
/// <param name="AreaM2">Drainage area, m2.</param>
public sealed record Catchment(string Id, double AreaM2)
{
    /// <summary>Length of the longest flow path from the divide to the crossing, m.</summary>
    public double? LongestFlowPathM { get; init; }

    /// <summary>Slope of the longest flow path between 10 % and 85 % of its length above the outlet, m/m.</summary>
    public double? FlowPathSlope1085MPerM { get; init; }

    /// <summary>Fall of the longest flow path divided by its length, m/m.</summary>
    public double? FlowPathEndToEndSlopeMPerM { get; init; }

    /// <summary>Highest less lowest elevation of the catchment, m.</summary>
    public double? ReliefM { get; init; }

    /// <summary>Mean slope of the ground, m/m.</summary>
    public double? MeanBasinSlopeMPerM { get; init; }

    /// <summary>Mean elevation, m.</summary>
    public double? MeanElevationM { get; init; }

    /// <summary>Runoff coefficient of the rational method.</summary>
    public RunoffCoefficient? RunoffCoefficient { get; init; }

    /// <summary>Runoff curve number, 0-100.</summary>
    public double? CurveNumber { get; init; }

    /// <summary>Impervious share of the area, 0-1.</summary>
    public double? ImperviousShare { get; init; }

    /// <summary>Profile of the longest flow path from the divide down; empty when not known.</summary>
    public IReadOnlyList<FlowPathPoint> FlowPath { get; init; } = [];

    /// <summary>Distance from the divide at which the channel begins, m; null to find it by drained area.</summary>
    public double? ChannelBeginsAtM { get; init; }

    /// <summary>Section of the channel for its travel time; null when not known.</summary>
    public ChannelReach? Channel { get; init; }

    /// <summary>Named figures for regression variables; a name here goes before the catchment's own figure.</summary>
    public IReadOnlyDictionary<string, Characteristic> Characteristics { get; init; } = new Dictionary<string, Characteristic>();
}

/// <summary>The channel part of a flow path at bankfull flow.</summary>
/// <param name="HydraulicRadiusM">Flow area over wetted perimeter, m.</param>
/// <param name="ManningN">Manning's n.</param>
/// <param name="Origin">Where the two come from.</param>
public sealed record ChannelReach(double HydraulicRadiusM, double ManningN, string Origin = "given");
