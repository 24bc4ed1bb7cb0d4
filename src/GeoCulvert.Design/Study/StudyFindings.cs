using GeoCulvert.Design.Basis;

namespace GeoCulvert.Design.Study;

/// <summary>Codes raised where the legs of the pipeline meet.</summary>
public static class StudyFindings
{
    /// <summary>The example prices were used.</summary>
    public static readonly FindingCode PricesInvented = new(
        "prices-invented", Severity.Warning,
        "Costs rest on the shipped example prices, which are invented.",
        "Give a table of prices that are paid near you ([culvert] unit_prices).");

    /// <summary>No size because the watershed runs off the terrain.</summary>
    public static readonly FindingCode SizeWithheld = new(
        "size-withheld-edge-contact", Severity.Error, "No size was issued: the watershed runs off the terrain model, so its area and flow are lower bounds.",
        "Extend the terrain model; or, if nothing beyond its edge drains here, accept the contact with [crossings] accept_edge_contact.");

    /// <summary>Nothing in the catalogue meets every criterion.</summary>
    public static readonly FindingCode NoSizeFits = new(
        "no-size-fits", Severity.Error, "No culvert of the catalogue meets every criterion.",
        "Raise the road, allow more or larger barrels, bridge the stream, or split the flow; see the option that failed by least.");

    /// <summary>Something is missing for a culvert.</summary>
    public static readonly FindingCode CulvertNotComputed = new(
        "culvert-not-computed", Severity.Error, "The culvert could not be computed because something it needs is missing.",
        "Give what is missing in the project file or in the table of overrides.");

    /// <summary>Road level assumed.</summary>
    public static readonly FindingCode RoadLevelAssumed = new(
        "road-level-assumed", Severity.Warning, "The terrain model shows no embankment at the crossing, so the road was assumed at the least level that serves the culvert.",
        "Give the road's profile, or lines with elevations; or plan the road at least this high.");

    /// <summary>Channel below the outlet assumed.</summary>
    public static readonly FindingCode TailwaterAssumed = new(
        "tailwater-channel-assumed", Severity.Warning, "The channel below the outlet was assumed from the drainage area.",
        "Give its width, side slope and roughness from survey, or a tailwater level.");

    /// <summary>No cross-section in the terrain.</summary>
    public static readonly FindingCode TailwaterNoSection = new(
        "tailwater-no-section", Severity.Note, "The terrain model shows no usable cross-section below the outlet; normal depth in a trapezoid channel took its place.",
        "Give the channel from survey, a rating or a level; or a finer terrain model.");

    /// <summary>Cross-section overflows.</summary>
    public static readonly FindingCode TailwaterSectionLow = new(
        "tailwater-section-overflows", Severity.Note, "The largest flow stands above the lower end of the cross-section; the ground beyond was taken as a wall, which is on the high side.",
        "Look at the section; give the tailwater if the water spreads there.");

    /// <summary>Rating too short.</summary>
    public static readonly FindingCode TailwaterRatingExceeded = new(
        "tailwater-rating-exceeded", Severity.Warning, "The flow is beyond the tailwater rating; its last level was held, which may be too low.", "Extend the rating.");

    /// <summary>Pool downstream.</summary>
    public static readonly FindingCode TailwaterFromPool = new(
        "tailwater-from-pool", Severity.Note, "The pool of the crossing next downstream sets the tailwater.", "Lower that pool if this headwater is too high.");

    /// <summary>Headwater with bounds.</summary>
    public static readonly FindingCode TailwaterBounded = new(
        "tailwater-bounds", Severity.Note, "Headwater and outlet velocity were also computed with a low and a high tailwater.", "Hold the high headwater against the road level and the high velocity against the channel.");

    /// <summary>Bed slope at its floor.</summary>
    public static readonly FindingCode TailwaterSlopeFloor = new(
        "tailwater-slope-floor", Severity.Warning, "The terrain below the outlet hardly falls; a least bed slope was used for the tailwater.",
        "Give the bed slope or the tailwater level.");

    /// <summary>High outlet velocity.</summary>
    public static readonly FindingCode OutletVelocityHigh = new(
        "outlet-velocity-high", Severity.Warning, "The outlet velocity at the design flood is high.",
        "Provide outlet protection, or a flatter or rougher barrel.");

    /// <summary>An override names no crossing.</summary>
    public static readonly FindingCode OverrideUnused = new(
        "override-unused", Severity.Warning, "The table of overrides names a crossing that is not in the study.",
        "Check the id against the list of crossings.");

    /// <summary>No crossing was found.</summary>
    public static readonly FindingCode NoCrossing = new(
        "no-crossing", Severity.Warning, "No crossing was found.",
        "Check that the road meets the terrain model, and whether stream_area is too large.");

    /// <summary>Road beyond the terrain.</summary>
    public static readonly FindingCode RoadLeavesTerrain = new(
        "road-leaves-terrain", Severity.Warning, "Part of a road lies outside the terrain model; crossings there are not found.",
        "Extend the terrain model along the road.");
}
