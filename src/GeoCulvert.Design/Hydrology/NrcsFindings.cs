using GeoCulvert.Design.Basis;

namespace GeoCulvert.Design.Hydrology;

/// <summary>The findings of the NRCS methods; codes are stable.</summary>
public static class NrcsFindings
{
    /// <summary>Part of the area has no curve number.</summary>
    public static readonly FindingCode CurveNumberMissing = new(
        "curve-number-missing-share", Severity.Warning,
        "Part of the drainage area has no curve number (cover, condition or soil group unknown or without a value); the rest was averaged.",
        "Complete the table of curve numbers or the rasters.");

    /// <summary>The curve number was converted to another ratio of initial abstraction.</summary>
    public static readonly FindingCode CurveNumberConverted = new(
        "curve-number-converted", Severity.Note,
        "The curve number was converted for an initial abstraction of 0.05 S, which published curve numbers do not belong to.",
        "Nothing, when the agency asks for that ratio.");

    /// <summary>The curve number is low.</summary>
    public static readonly FindingCode CurveNumberLow = new(
        "curve-number-low", Severity.Note,
        "The curve number is below 40, where TR-55 asks for another procedure.",
        "Compare with another method before the flow is accepted.");

    /// <summary>No rain turns into runoff.</summary>
    public static readonly FindingCode NoRunoff = new(
        "no-runoff", Severity.Warning,
        "The rainfall does not exceed the initial abstraction, so the method gives no runoff.",
        "Check curve number and rainfall; do not size a culvert on a flow of zero.");

    /// <summary>Ia/P outside the table.</summary>
    public static readonly FindingCode AbstractionRange = new(
        "graphical-abstraction-outside-range", Severity.Warning,
        "Initial abstraction over rainfall lies outside the unit-peak table; the table's end was used, as TR-55 says.",
        "Use the unit hydrograph for the design value, or confirm this one.");

    /// <summary>Tc outside the table.</summary>
    public static readonly FindingCode GraphicalTime = new(
        "graphical-time-outside-range", Severity.Warning,
        "The time of concentration lies outside 0.1 to 10 h, the range of the unit-peak curves; the end of the range was used.",
        "Use the unit hydrograph for the design value, or confirm this one.");

    /// <summary>More ponds than the factor covers.</summary>
    public static readonly FindingCode PondShare = new(
        "pond-share-outside-range", Severity.Warning,
        "Ponds and swamps take more of the area than the 5 % that the pond factor covers; the factor at 5 % was used.",
        "Route the flow through the storage instead.");

    /// <summary>The graphical method with another ratio of initial abstraction.</summary>
    public static readonly FindingCode GraphicalRatio = new(
        "graphical-abstraction-ratio", Severity.Warning,
        "The unit-peak curves were made with an initial abstraction of 0.2 S; another ratio was set.",
        "Use the unit hydrograph with that ratio.");

    /// <summary>The peak factor is unusual.</summary>
    public static readonly FindingCode PeakFactorRange = new(
        "peak-factor-outside-range", Severity.Warning,
        "The peak factor lies outside 100 to 600, the range seen on gauged basins.",
        "Confirm the peak factor; 484 is the standard one.");

    /// <summary>The storm ends before the unit hydrograph has responded.</summary>
    public static readonly FindingCode StormShort = new(
        "storm-shorter-than-concentration", Severity.Warning,
        "The design storm is shorter than the time of concentration, so the whole basin never contributes at once.",
        "Give a longer storm.");

    /// <summary>The storm table is from memory.</summary>
    public static readonly FindingCode StormFromMemory = new(
        "storm-table-unconfirmed", Severity.Note,
        "The ordinates of this 24-hour storm were not compared with a print of the source.",
        "Compare them with the agency's table, or give the storm as a file.");

    /// <summary>A curve number rests on rows from memory.</summary>
    public static readonly FindingCode CurveNumberFromMemory = new(
        "curve-number-unconfirmed", Severity.Note,
        "Part of the curve number rests on rows of the table that were not compared with a print of TR-55.",
        "Compare those rows with table 2-2 of TR-55, or give the agency's table.");

    /// <summary>The duration of excess is long.</summary>
    public static readonly FindingCode DurationLong = new(
        "excess-duration-long", Severity.Warning,
        "The duration of excess rain is longer than a quarter of the time to peak, so the hydrograph is read too coarsely.",
        "Give a shorter duration, or leave it to the rule.");

    /// <summary>The storm table is coarse for a short time of concentration.</summary>
    public static readonly FindingCode StormCoarse = new(
        "storm-table-coarse", Severity.Warning,
        "The ordinates of this 24-hour storm are too far apart for so short a time of concentration; the peak may be read too low.",
        "Use a nested storm from the rainfall table, or give the storm as a file with closer ordinates.");
}
