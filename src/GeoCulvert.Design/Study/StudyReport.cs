using GeoCulvert.Design.Basis;
using GeoCulvert.Design.Terrain;
using NetTopologySuite.Geometries;

namespace GeoCulvert.Design.Study;

/// <summary>A labelled figure or text with where it came from: measured, given, default, or computed.</summary>
/// <param name="Label">The trade's word for it.</param>
/// <param name="Value">SI value, or null when <paramref name="Text"/> says it.</param>
/// <param name="Kind">What it measures.</param>
/// <param name="Text">Text instead of a value.</param>
/// <param name="Origin">"measured from the DEM", "given in overrides.csv", "default", "computed", ...</param>
public sealed record SheetFact(string Label, double? Value, QuantityKind Kind, string? Text, string Origin);

/// <summary>A group of facts with a heading.</summary>
public sealed record SheetGroup(string Heading, IReadOnlyList<SheetFact> Facts);

/// <summary>A calculation with its heading and steps.</summary>
public sealed record SheetCalculation(string Heading, IReadOnlyList<Step> Steps);

/// <summary>One flow of one method for one return period.</summary>
/// <param name="Method">Method name.</param>
/// <param name="ReturnPeriodYr">Return period, years.</param>
/// <param name="FlowM3PerS">Flow, or null where the method gave none.</param>
/// <param name="LowerM3PerS">Lower limit, if the method has one.</param>
/// <param name="UpperM3PerS">Upper limit, if the method has one.</param>
/// <param name="IsChosen">Whether this is the method that sets the design value.</param>
public sealed record SheetFlow(
    string Method, double ReturnPeriodYr, double? FlowM3PerS, double? LowerM3PerS, double? UpperM3PerS, bool IsChosen);

/// <summary>One point of a headwater rating; elevations in m, flows in m3/s.</summary>
public sealed record SheetRatingPoint(
    double FlowM3PerS, double InletControlElevationM, double OutletControlElevationM, double HeadwaterElevationM, double RoadFlowM3PerS);

/// <summary>One flood passing through the chosen culvert.</summary>
/// <param name="Name">"Design flood, 25 yr".</param>
/// <param name="ReturnPeriodYr">Return period, years.</param>
/// <param name="FlowM3PerS">Total flow.</param>
/// <param name="HeadwaterElevationM">Headwater elevation.</param>
/// <param name="TailwaterElevationM">Tailwater elevation.</param>
/// <param name="OutletVelocityMPerS">Outlet velocity.</param>
/// <param name="RoadFlowM3PerS">Flow over the road.</param>
/// <param name="Control">"inlet" or "outlet".</param>
/// <param name="ProfileName">Chow's class of the water surface.</param>
/// <param name="Surface">Water surface or pressure line along the barrel: distance from the inlet, elevation, m.</param>
public sealed record SheetFlood(
    string Name,
    double ReturnPeriodYr,
    double FlowM3PerS,
    double HeadwaterElevationM,
    double TailwaterElevationM,
    double OutletVelocityMPerS,
    double RoadFlowM3PerS,
    string Control,
    string ProfileName,
    IReadOnlyList<(double DistanceM, double ElevationM)> Surface);

/// <summary>The culvert in section along its barrel; elevations and lengths in m.</summary>
public sealed record SheetBarrel(
    string Description,
    double LengthM,
    double InletInvertM,
    double OutletInvertM,
    double RiseM,
    double RoadElevationM,
    double RoadWidthM,
    double SideSlope);

/// <summary>One criterion held against its limit.</summary>
/// <param name="Name">Criterion.</param>
/// <param name="Flood">Flood it is checked at.</param>
/// <param name="Value">Value found, SI.</param>
/// <param name="Limit">Limit, SI.</param>
/// <param name="Kind">What both measure.</param>
/// <param name="IsMet">Whether it is met.</param>
/// <param name="Source">Where the limit comes from.</param>
public sealed record SheetCriterion(
    string Name, string Flood, double Value, double Limit, QuantityKind Kind, bool IsMet, string Source);

/// <summary>One option that was rated.</summary>
/// <param name="Culvert">One line, as on a drawing.</param>
/// <param name="BarrelAreaM2">Total barrel area.</param>
/// <param name="HeadwaterElevationM">Headwater elevation at the design flood.</param>
/// <param name="HeadwaterOverRise">HW/D at the design flood.</param>
/// <param name="OutletVelocityMPerS">Outlet velocity at the design flood.</param>
/// <param name="Status">"chosen", or the reason it lost.</param>
public sealed record SheetOption(
    string Culvert, double BarrelAreaM2, double HeadwaterElevationM, double HeadwaterOverRise, double OutletVelocityMPerS, string Status)
{
    /// <summary>Installed cost; null without prices.</summary>
    public double? Cost { get; init; }
}

/// <summary>Everything a sheet of one crossing prints, in SI.</summary>
public sealed record CrossingSheet
{
    /// <summary>Crossing id.</summary>
    public required string CrossingId { get; init; }

    /// <summary>Road name.</summary>
    public required string Road { get; init; }

    /// <summary>Station text, "12+340".</summary>
    public required string Station { get; init; }

    /// <summary>sized, rated, no size fits, or not computed.</summary>
    public required string Status { get; init; }

    /// <summary>The answer in one line, as on a drawing; "" when there is none.</summary>
    public required string Culvert { get; init; }

    /// <summary>Where it is, in the working coordinate system.</summary>
    public required Coordinate Location { get; init; }

    /// <summary>Total watershed outline, or null.</summary>
    public Geometry? Watershed { get; init; }

    /// <summary>Longest flow path, or null.</summary>
    public LineString? FlowPath { get; init; }

    /// <summary>Inputs and characteristics with their origin, by group.</summary>
    public IReadOnlyList<SheetGroup> Groups { get; init; } = [];

    /// <summary>Longest flow path from the divide down: distance and elevation, m.</summary>
    public IReadOnlyList<(double DistanceM, double ElevationM)> FlowPathProfile { get; init; } = [];

    /// <summary>Every method's flow for every return period.</summary>
    public IReadOnlyList<SheetFlow> Flows { get; init; } = [];

    /// <summary>The barrel in section, or null when nothing was sized.</summary>
    public SheetBarrel? Barrel { get; init; }

    /// <summary>Design and check floods through the chosen culvert.</summary>
    public IReadOnlyList<SheetFlood> Floods { get; init; } = [];

    /// <summary>Headwater rating.</summary>
    public IReadOnlyList<SheetRatingPoint> Rating { get; init; } = [];

    /// <summary>Criteria one by one.</summary>
    public IReadOnlyList<SheetCriterion> Criteria { get; init; } = [];

    /// <summary>Chosen option first, then the runners-up.</summary>
    public IReadOnlyList<SheetOption> Options { get; init; } = [];

    /// <summary>Formulas with the numbers put in.</summary>
    public IReadOnlyList<SheetCalculation> Calculations { get; init; } = [];

    /// <summary>Findings on this crossing.</summary>
    public IReadOnlyList<Finding> Findings { get; init; } = [];
}

/// <summary>An input of the run, as listed in <c>run.json</c> and the report.</summary>
/// <param name="Path">Path as the project gave it.</param>
/// <param name="Role">What it was used for.</param>
/// <param name="Bytes">Size.</param>
/// <param name="Sha256">Hash, lower-case hexadecimal.</param>
/// <param name="Crs">Coordinate system as read, "" for plain tables.</param>
public sealed record InputFact(string Path, string Role, long Bytes, string Sha256, string Crs)
{
    /// <summary>Values taken as nodata and who said so, "" when none.</summary>
    public string NoData { get; init; } = "";
}

/// <summary>Everything a report and a schedule are made from.</summary>
public sealed record StudyReport
{
    /// <summary>Study name from the project file.</summary>
    public required string StudyName { get; init; }

    /// <summary>System of units of what is printed.</summary>
    public required UnitSystem Units { get; init; }

    /// <summary>Name of the working coordinate system.</summary>
    public required string CrsName { get; init; }

    /// <summary>Program version.</summary>
    public required string Version { get; init; }

    /// <summary>Date of the run as it is printed; "" in reproducible runs.</summary>
    public required string RunDate { get; init; }

    /// <summary>Terrain at map resolution for the relief; NaN is nodata.</summary>
    public required Grid<float> Relief { get; init; }

    /// <summary>All layers and tables, in output units.</summary>
    public required IReadOnlyList<ResultLayer> Layers { get; init; }

    /// <summary>A sheet per crossing, in order of road and station.</summary>
    public required IReadOnlyList<CrossingSheet> Sheets { get; init; }

    /// <summary>All findings, those of crossings included.</summary>
    public required IReadOnlyList<Finding> Findings { get; init; }

    /// <summary>Inputs with size and hash.</summary>
    public required IReadOnlyList<InputFact> Inputs { get; init; }

    /// <summary>Settings as resolved: key and value text.</summary>
    public required IReadOnlyList<(string Key, string Value)> Settings { get; init; }
}
