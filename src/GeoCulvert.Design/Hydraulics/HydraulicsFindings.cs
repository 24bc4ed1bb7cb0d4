using GeoCulvert.Design.Basis;

namespace GeoCulvert.Design.Hydraulics;

/// <summary>Codes of the hydraulics room.</summary>
public static class HydraulicsFindings
{
    /// <summary>HW/D above the charts.</summary>
    public static readonly FindingCode HeadwaterExtrapolated = new(
        "headwater-extrapolated", Severity.Warning, "Headwater is more than three times the rise, beyond the published inlet-control charts.", "Use a larger barrel, or check the inlet by another method.");

    /// <summary>Inlet and outlet control nearly equal.</summary>
    public static readonly FindingCode ControlNearTie = new(
        "control-near-tie", Severity.Note, "Inlet and outlet control give nearly the same headwater.", "A small change of inlet, length or tailwater moves the control; check both.");

    /// <summary>Road overtopped.</summary>
    public static readonly FindingCode RoadOvertopped = new(
        "road-overtopped", Severity.Warning, "Water flows over the road.", "Check depth and velocity on the road against what traffic and embankment bear.");

    /// <summary>Shorthand outside its range.</summary>
    public static readonly FindingCode ShorthandOutOfRange = new(
        "shorthand-out-of-range", Severity.Note, "The shorthand for outlet control lies below 0.75 of the rise, where it may not be used.", "Rely on the water-surface profile.");

    /// <summary>Barrel rises.</summary>
    public static readonly FindingCode AdverseBarrel = new(
        "barrel-adverse", Severity.Warning, "The barrel rises from inlet to outlet.", "Check the inverts; a culvert that rises silts up.");

    /// <summary>Tapered inlet.</summary>
    public static readonly FindingCode ThroatOnly = new(
        "throat-control-only", Severity.Warning, "Inlet control was computed at the throat of a tapered inlet; its face was not checked.", "Check the face of the inlet with its own dimensions.");

    /// <summary>A group without water.</summary>
    public static readonly FindingCode GroupDry = new(
        "barrel-group-dry", Severity.Note, "A group of barrels carries nothing at this flow.", "Nothing, if it is a relief barrel; else check its inverts.");

    /// <summary>Between free and full flow.</summary>
    public static readonly FindingCode BetweenFreeAndFull = new(
        "barrel-between-free-and-full", Severity.Warning, "The headwater lies where the barrel passes from free to full flow and its own headwater jumps.",
        "Expect the level to swing between the two; a larger or shorter barrel avoids it.");

    /// <summary>Apron of another shape.</summary>
    public static readonly FindingCode ApronShape = new(
        "apron-shape-assumed", Severity.Note, "The riprap equation is published for circular culverts; the barrel was taken as the circle of the same area.",
        "Check the stone size by another method for large boxes.");

    /// <summary>Apron of a large culvert.</summary>
    public static readonly FindingCode ApronLarge = new(
        "apron-large-culvert", Severity.Note, "The culvert is larger than those the published aprons are meant for.", "Consider a riprap basin or another dissipator.");

    /// <summary>No class large enough.</summary>
    public static readonly FindingCode ApronBeyondClasses = new(
        "apron-beyond-classes", Severity.Warning, "The outlet asks for stones larger than the largest class of riprap, so no apron is given.",
        "Design an energy dissipator, or slow the flow by a larger, flatter or rougher barrel.");

    /// <summary>Not self-cleansing.</summary>
    public static readonly FindingCode SiltsUp = new(
        "barrel-not-self-cleansing", Severity.Note, "At the small flow the barrel does not reach what keeps it clean.", "Expect silt; steepen or narrow the barrel, or plan for cleaning.");

    /// <summary>Blockage.</summary>
    public static readonly FindingCode Blocked = new(
        "barrel-blocked-case", Severity.Note, "Headwater was also computed with a share of the barrels blocked.", "Hold it against the road level where debris or silt is expected.");

    /// <summary>Control depends on tailwater.</summary>
    public static readonly FindingCode TailwaterMovesControl = new(
        "tailwater-moves-control", Severity.Warning, "Between the low and the high tailwater the control of the culvert changes.", "Find out the tailwater by survey or a water-surface computation of the stream.");
}
