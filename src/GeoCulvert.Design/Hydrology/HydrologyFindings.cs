using GeoCulvert.Design.Basis;

namespace GeoCulvert.Design.Hydrology;

/// <summary>The findings this room can raise; codes are stable.</summary>
public static class HydrologyFindings
{
    /// <summary>A rainfall value was taken beyond the table.</summary>
    public static readonly FindingCode RainfallExtrapolated = new(
        "rainfall-extrapolated", Severity.Warning,
        "The duration or return period lies outside the rainfall table; the intensity was extended from its last two entries.",
        "Extend the table with published values, or confirm the extended intensity.");

    /// <summary>No rainfall value: too far outside the table.</summary>
    public static readonly FindingCode RainfallBeyondTable = new(
        "rainfall-beyond-table", Severity.Error,
        "The duration or return period lies too far outside the rainfall table for a value to be given.",
        "Give a table that covers it.");

    /// <summary>The table's values are for a partial-duration series.</summary>
    public static readonly FindingCode PartialDurationSeries = new(
        "rainfall-partial-duration", Severity.Note,
        "The rainfall table is for a partial-duration series, so its return period is an average recurrence interval, not the inverse of an annual chance.",
        "Below about 10 years the two differ; check which of them the criterion means.");

    /// <summary>Something a method needs was not given.</summary>
    public static readonly FindingCode InputMissing = new(
        "flow-input-missing", Severity.Error,
        "A method could not be computed because a figure it needs is missing.",
        "Give the figure, or leave the method out.");

    /// <summary>A method beside the chosen one gave nothing.</summary>
    public static readonly FindingCode OtherMethodMissing = new(
        "other-method-missing", Severity.Note,
        "A method that was asked for beside the chosen one could not be computed; the chosen value does not depend on it.",
        "Give what it needs, or leave the method out.");

    /// <summary>Kirpich's basins were of another kind.</summary>
    public static readonly FindingCode KirpichRange = new(
        "kirpich-outside-range", Severity.Note,
        "The basin lies outside the area or slope of the basins behind the Kirpich equation.",
        "Compare with another method for time of concentration.");

    /// <summary>Part of the flow path is flatter than the least slope.</summary>
    public static readonly FindingCode SlopeFloor = new(
        "flow-path-slope-floor", Severity.Note,
        "Part of the flow path is flat or rises; the least slope of the settings was used there.",
        "Check the terrain there, or set another least slope.");

    /// <summary>Cover along the path was not known.</summary>
    public static readonly FindingCode SurfaceAssumed = new(
        "flow-path-surface-assumed", Severity.Note,
        "Part of the flow path has no known cover; the default surface of the settings was used there.",
        "Give land cover along the path, or confirm the default surface.");

    /// <summary>The channel's section was not given.</summary>
    public static readonly FindingCode ChannelAssumed = new(
        "channel-section-assumed", Severity.Note,
        "Travel time in the channel rests on a default hydraulic radius and roughness.",
        "Give the bankfull section and roughness of the channel.");

    /// <summary>No profile of the flow path.</summary>
    public static readonly FindingCode ProfileMissing = new(
        "flow-path-profile-missing", Severity.Warning,
        "The flow path has no profile; it was taken as one even slope.",
        "Give the profile, or use a method that needs only length and fall.");

    /// <summary>No channel on the flow path.</summary>
    public static readonly FindingCode NoChannel = new(
        "flow-path-without-channel", Severity.Note,
        "No channel begins on the flow path, so all of it below the sheet flow is shallow concentrated flow.",
        "Check the drainage area at which a channel begins.");

    /// <summary>Methods for time of concentration differ.</summary>
    public static readonly FindingCode TimeSpread = new(
        "time-of-concentration-spread", Severity.Note,
        "The methods for time of concentration differ by more than the stated factor.",
        "Look at the spread and confirm the one that was chosen.");

    /// <summary>The time of concentration was raised to its least value.</summary>
    public static readonly FindingCode TimeFloor = new(
        "time-of-concentration-floor", Severity.Note,
        "The computed time of concentration is shorter than the least time of the settings, which was used.",
        "Nothing, when the least time is the agency's.");

    /// <summary>The basin is larger than the rational method is meant for.</summary>
    public static readonly FindingCode RationalArea = new(
        "rational-area-limit", Severity.Warning,
        "The drainage area is larger than the limit set for the rational method.",
        "Use another method for the design value, or confirm this one.");

    /// <summary>C times its frequency factor was held at one.</summary>
    public static readonly FindingCode CoefficientCapped = new(
        "runoff-coefficient-capped", Severity.Note,
        "The runoff coefficient times its frequency factor exceeds one; one was used.",
        "Nothing; a catchment cannot shed more than falls on it.");

    /// <summary>Part of the area has no runoff coefficient.</summary>
    public static readonly FindingCode CoefficientMissing = new(
        "runoff-coefficient-missing-share", Severity.Warning,
        "Part of the drainage area has no runoff coefficient (cover or soil group unknown or without a value); the rest was averaged.",
        "Complete the cover table or the rasters.");

    /// <summary>A variable lies outside an equation's range.</summary>
    public static readonly FindingCode RegressionRange = new(
        "regression-outside-range", Severity.Warning,
        "A variable lies outside the range of the basins behind the regression equation.",
        "Use another method for the design value, or justify the equation.");

    /// <summary>The equation file states no range.</summary>
    public static readonly FindingCode RegressionRangeUnknown = new(
        "regression-range-unknown", Severity.Note,
        "The equation file gives no range for a variable, so it could not be checked.",
        "Look the range up in the report and add it to the file.");

    /// <summary>A flow lies between two return periods of its source.</summary>
    public static readonly FindingCode FlowInterpolated = new(
        "flow-interpolated", Severity.Note,
        "The flow was interpolated between two return periods of its source (log of flow against the normal deviate).",
        "Give the flow or the equation at this return period if there is one.");

    /// <summary>The source of flows does not reach the return period.</summary>
    public static readonly FindingCode FlowBeyondSource = new(
        "flow-beyond-source", Severity.Error,
        "The return period lies outside those of the flows or equations; no flow is given.",
        "Give a source that covers the return period.");

    /// <summary>A flow falls as the return period rises.</summary>
    public static readonly FindingCode FlowFalls = new(
        "flow-falls-with-return-period", Severity.Warning,
        "A method gives a smaller flow for a longer return period.",
        "Check the coefficients, flows or rainfall behind it.");

    /// <summary>Methods for the flow differ.</summary>
    public static readonly FindingCode FlowSpread = new(
        "flow-methods-differ", Severity.Warning,
        "The methods for the peak flow differ by more than the stated factor.",
        "Look at all of them before the design value is accepted.");

    /// <summary>The named method gave no flow.</summary>
    public static readonly FindingCode NoDesignFlow = new(
        "design-flow-missing", Severity.Error,
        "The method chosen for the design value gave no flow; another one was not put in its place.",
        "Complete its input, or choose another method.");
}
