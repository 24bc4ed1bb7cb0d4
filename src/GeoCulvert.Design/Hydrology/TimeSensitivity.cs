using GeoCulvert.Design.Basis;

namespace GeoCulvert.Design.Hydrology;

/// <summary>What a change of the time of concentration does to a flow.</summary>
/// <param name="Method">Name of the flow method.</param>
/// <param name="ReturnPeriodYr">Return period, years.</param>
/// <param name="TimeMin">Time of concentration, min.</param>
/// <param name="FlowM3PerS">Flow at that time, m3/s; null when there is none.</param>
/// <param name="ShorterTimeFlowM3PerS">Flow at the time less 20 %, m3/s.</param>
/// <param name="LongerTimeFlowM3PerS">Flow at the time plus 20 %, m3/s.</param>
/// <param name="Findings">The note, when the flow moves by more than the stated share.</param>
public sealed record TimeSensitivity(
    string Method, double ReturnPeriodYr, double TimeMin, double? FlowM3PerS, double? ShorterTimeFlowM3PerS, double? LongerTimeFlowM3PerS, IReadOnlyList<Finding> Findings)
{
    /// <summary>The change of time that is tried, as a share.</summary>
    public const double ChangeShare = 0.2;

    /// <summary>Flow at the shorter time over the flow, null without both.</summary>
    public double? ShorterTimeRatio => FlowM3PerS > 0 ? ShorterTimeFlowM3PerS / FlowM3PerS : null;

    /// <summary>Flow at the longer time over the flow, null without both.</summary>
    public double? LongerTimeRatio => FlowM3PerS > 0 ? LongerTimeFlowM3PerS / FlowM3PerS : null;

    /// <summary>Computes the flow at the time of concentration and 20 % to both sides; null when the context has no time.</summary>
    /// <param name="method">Flow method.</param>
    /// <param name="catchment">Catchment.</param>
    /// <param name="returnPeriodYr">Return period, years.</param>
    /// <param name="context">Rainfall and the chosen time.</param>
    /// <param name="notedShare">Share of the flow from which the change is noted (0.2 by default).</param>
    public static TimeSensitivity? Of(IPeakFlowMethod method, Catchment catchment, double returnPeriodYr, PeakFlowContext context, double notedShare = 0.2)
    {
        if (context.TimeOfConcentrationMin is not { } tc) return null;
        double? At(double factor) => method.Compute(catchment, returnPeriodYr, context with { TimeOfConcentrationMin = tc * factor }).FlowM3PerS;
        var result = new TimeSensitivity(method.Name, returnPeriodYr, tc, At(1), At(1 - ChangeShare), At(1 + ChangeShare), []);
        var most = Math.Max(Math.Abs((result.ShorterTimeRatio ?? 1) - 1), Math.Abs((result.LongerTimeRatio ?? 1) - 1));
        return most > notedShare
            ? result with
            {
                Findings = [TimeFindings.FlowSensitive.With(
                    $"{method.Name} at {returnPeriodYr:G6} yr: {result.FlowM3PerS:G4} m3/s at {tc:0.0} min, {result.ShorterTimeFlowM3PerS:G4} at {0.8 * tc:0.0} min, {result.LongerTimeFlowM3PerS:G4} at {1.2 * tc:0.0} min",
                    most, notedShare)],
            }
            : result;
    }
}
