using GeoCulvert.Design.Basis;

namespace GeoCulvert.Design.Hydrology;

/// <summary>The findings of the methods for time of concentration beside Kirpich and the velocity method; codes are stable.</summary>
public static class TimeFindings
{
    /// <summary>A figure lies outside the range of the basins behind an equation.</summary>
    public static readonly FindingCode OutsideRange = new(
        "time-method-outside-range", Severity.Note,
        "A figure lies outside the range of the basins or plots behind the equation for time of concentration; the equation was used all the same.",
        "Compare with another method before the time is accepted.");

    /// <summary>The iteration with intensity ended at the end of the rainfall.</summary>
    public static readonly FindingCode IterationEnd = new(
        "time-iteration-at-rainfall-end", Severity.Warning,
        "Time of concentration and intensity do not meet within the durations of the rainfall; the intensity at its end was used.",
        "Extend the rainfall to shorter or longer durations, or use a method without intensity.");

    /// <summary>The flow depends much on the time of concentration.</summary>
    public static readonly FindingCode FlowSensitive = new(
        "flow-sensitive-to-time", Severity.Note,
        "A change of 20 % in the time of concentration moves the flow by more than the stated share.",
        "Look at the spread of the times before the flow is accepted.");
}
