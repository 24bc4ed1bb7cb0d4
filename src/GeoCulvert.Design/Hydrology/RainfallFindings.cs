using GeoCulvert.Design.Basis;

namespace GeoCulvert.Design.Hydrology;

/// <summary>The findings of rainfall equations and climate factors; codes are stable.</summary>
public static class RainfallFindings
{
    /// <summary>The climate factor did nothing.</summary>
    public static readonly FindingCode ClimateIdle = new(
        "climate-factor-without-effect", Severity.Warning,
        "A climate factor on rainfall does not reach this method, which takes its flow or depth from elsewhere.",
        "Put the factor on the flow for this method, or adjust the given figure by hand.");

    /// <summary>The equation's durations are not stated.</summary>
    public static readonly FindingCode EquationRangeUnknown = new(
        "rainfall-equation-range-unknown", Severity.Note,
        "The file of rainfall equations does not state the durations they hold for, so they could not be checked.",
        "Add the columns shortest_min and longest_min.");

    /// <summary>A fitted equation misses its table.</summary>
    public static readonly FindingCode EquationMisfit = new(
        "rainfall-equation-misfit", Severity.Warning,
        "A fitted rainfall equation misses an entry of its table by more than the stated share.",
        "Use the table, or fit a narrower range of durations.");
}
