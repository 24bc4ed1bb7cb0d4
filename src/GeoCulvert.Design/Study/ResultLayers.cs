using GeoCulvert.Design.Basis;
using NetTopologySuite.Geometries;

namespace GeoCulvert.Design.Study;

/// <summary>A stream reach as results carry it.</summary>
/// <param name="Line">From its head down.</param>
/// <param name="AreaM2">Drainage area at its lower end, m2.</param>
/// <param name="Order">Strahler order.</param>
public sealed record StreamResult(LineString Line, double AreaM2, int Order);

/// <summary>A road as results carry it.</summary>
/// <param name="Name">Road name.</param>
/// <param name="Class">Road class.</param>
/// <param name="Line">Alignment.</param>
/// <param name="WidthM">Shoulder to shoulder, m.</param>
/// <param name="Surface">paved or gravel.</param>
public sealed record RoadResult(string Name, string Class, Geometry Line, double WidthM, string Surface);

/// <summary>The layers and tables of the results. Rows, field descriptions and <c>docs/formats</c> all come from these definitions.</summary>
public static class ResultLayers
{
    /// <summary>Crossings, one point each.</summary>
    public static LayerDefinition<CrossingResult> Crossings { get; } = new(
        "crossings", "Crossings", "A place where water crosses the road, with its flow and its culvert.", LayerGeometry.Point, c => c.Location,
        [
            Id<CrossingResult>(c => c.CrossingId),
            Text<CrossingResult>("road", "Road", "Name of the road; empty for a given point without a road.", c => c.Road),
            Real<CrossingResult>("station", QuantityKind.Length, "Station", "Distance along the road from its first point.", c => c.StationM),
            Text<CrossingResult>("also_under", "Also under", "Other roads over the same culvert.", c => c.AlsoUnder),
            Text<CrossingResult>("found_by", "Found by", "stream, given point, opened embankment, low point of the road or ditch relief.", c => c.FoundBy),
            Text<CrossingResult>("status", "Status", "sized, rated, no size fits or not computed.", c => c.Status),
            Real<CrossingResult>("watershed_area", QuantityKind.Area, "Drainage area", "True area of the total watershed: its cells, each with its area on the ellipsoid.", c => c.Watershed.AreaM2),
            Real<CrossingResult>("edge_contact_share", QuantityKind.Share, "Edge contact", "Share of the watershed's boundary on the edge of the terrain or on nodata; the area is understated when it is not 0.", c => c.Watershed.EdgeContactShare),
            Real<CrossingResult>("time_of_concentration", QuantityKind.Time, "Time of concentration", "The chosen time of concentration.", c => c.Flow?.Time?.TimeMin * 60),
            Real<CrossingResult>("design_return_period", QuantityKind.Years, "Design flood", "Return period of the design flood.", c => c.DesignReturnPeriodYr),
            Real<CrossingResult>("design_flow", QuantityKind.Flow, "Design flow", "Peak flow of the design flood.", c => c.Flow?.Design.FlowM3PerS),
            Real<CrossingResult>("check_return_period", QuantityKind.Years, "Check flood", "Return period of the check flood.", c => c.CheckReturnPeriodYr),
            Real<CrossingResult>("check_flow", QuantityKind.Flow, "Check flow", "Peak flow of the check flood.", c => c.Flow?.Check.FlowM3PerS),
            Text<CrossingResult>("flow_method", "Flow method", "Method that set the design flow.", c => c.Flow?.Design.Chosen.Method),
            Text<CrossingResult>("culvert", "Culvert", "The culvert in one line, as on a drawing.", c => c.Culvert?.Description),
            Text<CrossingResult>("shape", "Shape", "Shape of the barrels.", c => c.Culvert?.Shape),
            Real<CrossingResult>("span", QuantityKind.Length, "Span", "Span of one barrel.", c => c.Culvert?.SpanM),
            Real<CrossingResult>("rise", QuantityKind.Length, "Rise", "Rise of one barrel.", c => c.Culvert?.RiseM),
            Whole<CrossingResult>("barrels", "Barrels", "Equal barrels side by side.", c => c.Culvert?.Barrels),
            Text<CrossingResult>("inlet", "Inlet", "Inlet type, hds5-CHART-SCALE.", c => c.Culvert?.Inlet),
            Real<CrossingResult>("length", QuantityKind.Length, "Length", "Length of the barrel.", c => c.Barrel?.LengthM),
            Real<CrossingResult>("inlet_elevation", QuantityKind.Length, "Inlet invert", "Elevation of the inlet invert.", c => c.Barrel?.InletElevationM),
            Real<CrossingResult>("outlet_elevation", QuantityKind.Length, "Outlet invert", "Elevation of the outlet invert.", c => c.Barrel?.OutletElevationM),
            Real<CrossingResult>("skew", QuantityKind.Angle, "Skew", "Angle between the barrel and the perpendicular to the road.", c => c.Barrel?.SkewDeg),
            Real<CrossingResult>("road_elevation", QuantityKind.Length, "Road level", "Lowest road level near the crossing.", c => c.Barrel?.RoadElevationM),
            Text<CrossingResult>("control", "Control", "Control at the design flood: inlet or outlet.", c => c.Culvert?.Control),
            Real<CrossingResult>("headwater_depth", QuantityKind.Length, "Headwater depth", "Headwater above the inlet invert at the design flood.", c => c.Culvert?.HeadwaterDepthM),
            Real<CrossingResult>("headwater_elevation", QuantityKind.Length, "Headwater", "Headwater elevation at the design flood.", c => c.Culvert?.HeadwaterElevationM),
            Real<CrossingResult>("headwater_limit_elevation", QuantityKind.Length, "Headwater limit", "The lowest of all limits on the design headwater.", c => c.HeadwaterLimitElevationM),
            Real<CrossingResult>("hw_over_d", QuantityKind.None, "HW/D", "Headwater depth over rise at the design flood.", c => c.Culvert?.HeadwaterOverRise),
            Real<CrossingResult>("outlet_velocity", QuantityKind.Velocity, "Outlet velocity", "Velocity at the outlet at the design flood.", c => c.Culvert?.OutletVelocityMPerS),
            Real<CrossingResult>("overtopping_return_period", QuantityKind.Years, "Overtopped at", "Shortest return period asked for at which the road is overtopped; empty when none.", c => c.Culvert?.OvertoppingReturnPeriodYr),
            Text<CrossingResult>("first_failure", "First failure", "Criterion that an existing culvert breaks first; empty for new ones and where all hold.", c => c.Existing?.First?.Name),
            Real<CrossingResult>("first_failure_return_period", QuantityKind.Years, "Fails at", "Shortest return period asked for at which an existing culvert breaks a criterion.", c => c.Existing?.First?.FailsAtYr),
            Real<CrossingResult>("cost", QuantityKind.None, "Cost", "Installed cost by the table of unit prices, in its currency; empty without one.", c => c.Culvert?.Cost),
            Whole<CrossingResult>("findings", "Findings", "Number of findings on the crossing.", c => c.Findings.Count),
            Text<CrossingResult>("first_finding", "First finding", "Code of the gravest finding.", c => c.Findings.Count > 0 ? c.Findings[0].Code : null),
        ]);

    /// <summary>Total watersheds.</summary>
    public static LayerDefinition<CrossingResult> Watersheds { get; } = new(
        "watersheds", "Watersheds", "All the land that drains to a crossing, through other crossings too.", LayerGeometry.Polygon, c => c.Watershed.Outline,
        [
            Id<CrossingResult>(c => c.CrossingId),
            Real<CrossingResult>("area", QuantityKind.Area, "Area", "True area: the cells, each with its area on the ellipsoid; not the area of the drawn outline in the plane.", c => c.Watershed.AreaM2),
            Real<CrossingResult>("local_area", QuantityKind.Area, "Local area", "The part that reaches the crossing without passing another.", c => c.Watershed.LocalAreaM2),
            Text<CrossingResult>("downstream_crossing_id", "Next downstream", "Crossing that this one drains to, if any.", c => c.Watershed.DownstreamCrossingId),
            .. LandLayers.Columns(c => c.Watershed.Total),
            Real<CrossingResult>("runoff_coefficient", QuantityKind.None, "C", "Runoff coefficient of the rational method at the design flood.", c => c.Flow?.Catchment.RunoffCoefficient?.For(c.DesignReturnPeriodYr)),
        ]);

    /// <summary>Local watersheds.</summary>
    public static LayerDefinition<CrossingResult> LocalWatersheds { get; } = new(
        "local_watersheds", "Local watersheds", "The land that reaches a crossing without passing another crossing; they tile the total watersheds.", LayerGeometry.Polygon, c => c.Watershed.LocalOutline,
        [
            Id<CrossingResult>(c => c.CrossingId),
            Real<CrossingResult>("area", QuantityKind.Area, "Area", "True area: the cells, each with its area on the ellipsoid; not the area of the drawn outline in the plane.", c => c.Watershed.LocalAreaM2),
            Text<CrossingResult>("downstream_crossing_id", "Next downstream", "Crossing that this one drains to, if any.", c => c.Watershed.DownstreamCrossingId),
            .. LandLayers.Columns(c => c.Watershed.Local),
            Real<CrossingResult>("runoff_coefficient", QuantityKind.None, "C", "Runoff coefficient of the local land cover at the design flood; empty without a land cover.", c => c.Watershed.Local.Cover?.RunoffCoefficient is { } v ? (c.DesignReturnPeriodYr >= 25 ? v.From25Yr : v.Below25Yr) : null),
        ]);

    /// <summary>Longest flow paths.</summary>
    public static LayerDefinition<CrossingResult> FlowPaths { get; } = new(
        "flow_paths", "Longest flow paths", "The longest way of water from the divide to a crossing.", LayerGeometry.Line, c => c.Watershed.FlowPath,
        [
            Id<CrossingResult>(c => c.CrossingId),
            Real<CrossingResult>("length", QuantityKind.Length, "Length", "From the divide to the crossing.", c => c.Watershed.FlowPathLengthM),
            Real<CrossingResult>("slope_10_85", QuantityKind.Slope, "10-85 slope", "Between 10 % and 85 % of the length above the crossing.", c => c.Watershed.FlowPathSlope1085MPerM),
            Real<CrossingResult>("slope_end_to_end", QuantityKind.Slope, "End-to-end slope", "Fall over length.", c => c.Watershed.FlowPathEndToEndSlopeMPerM),
            Real<CrossingResult>("slope_equal_area", QuantityKind.Slope, "Equal-area slope", "Slope of the line from the crossing with as much area under it as the profile.", c => c.Watershed.Total.Ground.LongestFlowPath?.EqualAreaSlopeMPerM),
        ]);

    /// <summary>Barrel lines.</summary>
    public static LayerDefinition<CrossingResult> Culverts { get; } = new(
        "culverts", "Culverts", "The barrel from inlet to outlet.", LayerGeometry.Line, c => c.Barrel?.Line,
        [
            Id<CrossingResult>(c => c.CrossingId),
            Text<CrossingResult>("culvert", "Culvert", "In one line, as on a drawing.", c => c.Culvert?.Description),
            Text<CrossingResult>("status", "Status", "sized, rated, no size fits or not computed.", c => c.Status),
            Real<CrossingResult>("length", QuantityKind.Length, "Length", "Length of the barrel.", c => c.Barrel?.LengthM),
            Real<CrossingResult>("inlet_elevation", QuantityKind.Length, "Inlet invert", "Elevation of the inlet invert.", c => c.Barrel?.InletElevationM),
            Real<CrossingResult>("outlet_elevation", QuantityKind.Length, "Outlet invert", "Elevation of the outlet invert.", c => c.Barrel?.OutletElevationM),
            Real<CrossingResult>("design_flow", QuantityKind.Flow, "Design flow", "Peak flow of the design flood.", c => c.Flow?.Design.FlowM3PerS),
        ]);

    /// <summary>Streams.</summary>
    public static LayerDefinition<StreamResult> Streams { get; } = new(
        "streams", "Streams", "A stream reach from a head or confluence to the next.", LayerGeometry.Line, s => s.Line,
        [
            Real<StreamResult>("drainage_area", QuantityKind.Area, "Drainage area", "At the lower end of the reach.", s => s.AreaM2),
            Whole<StreamResult>("stream_order", "Order", "Strahler order.", s => s.Order),
        ]);

    /// <summary>Roads.</summary>
    public static LayerDefinition<RoadResult> Roads { get; } = new(
        "roads", "Roads", "A road alignment of the project.", LayerGeometry.Line, r => r.Line,
        [
            Text<RoadResult>("road", "Road", "Name of the road.", r => r.Name),
            Text<RoadResult>("class", "Class", "Road class.", r => r.Class),
            Real<RoadResult>("width", QuantityKind.Length, "Width", "Shoulder to shoulder.", r => r.WidthM),
            Text<RoadResult>("surface", "Surface", "paved or gravel.", r => r.Surface),
        ]);

    /// <summary>Flows of every crossing, return period and method.</summary>
    public static LayerDefinition<(string CrossingId, SheetFlow Flow)> Flows { get; } = new(
        "flows", "Flows", "A flow of one crossing, return period and method.", LayerGeometry.None, _ => null,
        [
            Id<(string CrossingId, SheetFlow Flow)>(r => r.CrossingId),
            Real<(string CrossingId, SheetFlow Flow)>("return_period", QuantityKind.Years, "Return period", "Return period.", r => r.Flow.ReturnPeriodYr),
            Text<(string CrossingId, SheetFlow Flow)>("method", "Method", "Flow method.", r => r.Flow.Method),
            Real<(string CrossingId, SheetFlow Flow)>("flow", QuantityKind.Flow, "Flow", "Peak flow; empty when the method could not be computed.", r => r.Flow.FlowM3PerS),
            Real<(string CrossingId, SheetFlow Flow)>("lower", QuantityKind.Flow, "Lower limit", "Lower limit, where the method has one.", r => r.Flow.LowerM3PerS),
            Real<(string CrossingId, SheetFlow Flow)>("upper", QuantityKind.Flow, "Upper limit", "Upper limit, where the method has one.", r => r.Flow.UpperM3PerS),
            new("chosen", QuantityKind.None, FieldType.Boolean, "Chosen", "Whether this method sets the design value.", r => r.Flow.IsChosen),
        ]);

    /// <summary>Options of every crossing.</summary>
    public static LayerDefinition<(string CrossingId, int Rank, SheetOption Option)> Options { get; } = new(
        "options", "Options", "A culvert that was rated for a crossing, and why it lost.", LayerGeometry.None, _ => null,
        [
            Id<(string CrossingId, int Rank, SheetOption Option)>(r => r.CrossingId),
            Whole<(string CrossingId, int Rank, SheetOption Option)>("rank", "Rank", "Order of the search, 1 first.", r => r.Rank),
            Text<(string CrossingId, int Rank, SheetOption Option)>("culvert", "Culvert", "In one line, as on a drawing.", r => r.Option.Culvert),
            Real<(string CrossingId, int Rank, SheetOption Option)>("barrel_area", QuantityKind.SmallArea, "Barrel area", "Total area of the barrels.", r => r.Option.BarrelAreaM2),
            Real<(string CrossingId, int Rank, SheetOption Option)>("headwater_elevation", QuantityKind.Length, "Headwater", "At the design flood; empty where the option failed before it had to be rated.", r => r.Option.HeadwaterElevationM),
            Real<(string CrossingId, int Rank, SheetOption Option)>("hw_over_d", QuantityKind.None, "HW/D", "At the design flood.", r => r.Option.HeadwaterOverRise),
            Real<(string CrossingId, int Rank, SheetOption Option)>("outlet_velocity", QuantityKind.Velocity, "Outlet velocity", "At the design flood.", r => r.Option.OutletVelocityMPerS),
            Real<(string CrossingId, int Rank, SheetOption Option)>("cost", QuantityKind.None, "Cost", "Installed cost by the table of unit prices; empty without one.", r => r.Option.Cost),
            Text<(string CrossingId, int Rank, SheetOption Option)>("reason", "Reason", "chosen, or why it lost.", r => r.Option.Status),
        ]);

    /// <summary>Headwater ratings of the chosen culverts.</summary>
    public static LayerDefinition<(string CrossingId, SheetRatingPoint Point)> Ratings { get; } = new(
        "ratings", "Ratings", "A point of the headwater rating of a chosen culvert.", LayerGeometry.None, _ => null,
        [
            Id<(string CrossingId, SheetRatingPoint Point)>(r => r.CrossingId),
            Real<(string CrossingId, SheetRatingPoint Point)>("flow", QuantityKind.Flow, "Flow", "Total flow.", r => r.Point.FlowM3PerS),
            Real<(string CrossingId, SheetRatingPoint Point)>("inlet_control_elevation", QuantityKind.Length, "Inlet control", "Headwater elevation under inlet control.", r => r.Point.InletControlElevationM),
            Real<(string CrossingId, SheetRatingPoint Point)>("outlet_control_elevation", QuantityKind.Length, "Outlet control", "Headwater elevation under outlet control.", r => r.Point.OutletControlElevationM),
            Real<(string CrossingId, SheetRatingPoint Point)>("headwater_elevation", QuantityKind.Length, "Headwater", "Headwater elevation.", r => r.Point.HeadwaterElevationM),
            Real<(string CrossingId, SheetRatingPoint Point)>("road_flow", QuantityKind.Flow, "Road flow", "Flow over the road.", r => r.Point.RoadFlowM3PerS),
        ]);

    /// <summary>Findings.</summary>
    public static LayerDefinition<Finding> Findings { get; } = new(
        "findings", "Findings", "A doubt about a crossing, or about the whole run when crossing_id is empty.", LayerGeometry.None, _ => null,
        [
            Text<Finding>("code", "Code", "Stable code, listed in docs/formats/findings.md.", f => f.Code),
            Text<Finding>("severity", "Severity", "error, warning or note.", f => f.Severity.ToString().ToLowerInvariant()),
            Text<Finding>("crossing_id", "Crossing", "Crossing it is about; empty for the whole run.", f => f.CrossingId),
            Text<Finding>("text", "Text", "What was seen, with figures (SI) and units.", f => f.Sentence),
            Real<Finding>("value", QuantityKind.None, "Value", "The figure that was found, where there is one; SI.", f => f.Value),
            Real<Finding>("limit", QuantityKind.None, "Limit", "The limit it was held against; SI.", f => f.Limit),
            Text<Finding>("action", "Action", "What to do.", f => f.Action),
        ]);

    /// <summary>The run: keys and values.</summary>
    public static LayerDefinition<(string Key, string Value)> Run { get; } = new(
        "run", "Run", "Program, inputs and settings of the run.", LayerGeometry.None, _ => null,
        [
            Text<(string Key, string Value)>("key", "Key", "What it is.", r => r.Key),
            Text<(string Key, string Value)>("value", "Value", "Its value.", r => r.Value),
        ]);

    private static LayerColumn<T> Id<T>(Func<T, string> value) => Text("crossing_id", "Crossing", "Id of the crossing.", value);

    internal static LayerColumn<T> Text<T>(string name, string title, string description, Func<T, string?> value) =>
        new(name, QuantityKind.None, FieldType.Text, title, description, value);

    internal static LayerColumn<T> Real<T>(string name, QuantityKind kind, string title, string description, Func<T, double?> value) =>
        new(name, kind, FieldType.Real, title, description, r => value(r));

    private static LayerColumn<T> Whole<T>(string name, string title, string description, Func<T, int?> value) =>
        new(name, QuantityKind.None, FieldType.Integer, title, description, r => value(r));
}
