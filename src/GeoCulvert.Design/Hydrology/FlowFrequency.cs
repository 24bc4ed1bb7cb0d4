using GeoCulvert.Design.Basis;
using MathNet.Numerics.Distributions;

namespace GeoCulvert.Design.Hydrology;

/// <summary>Flows known at some return periods, read at others.</summary>
internal static class FlowFrequency
{
    /// <summary>
    /// The return periods between which a flow is interpolated and the weight of the longer one: log of flow linear in the standard
    /// normal deviate of the annual non-exceedance probability 1 - 1/T. Null outside, and below 1 year, where T has no annual chance.
    /// </summary>
    /// <param name="periodsYr">Known return periods, rising, at least one.</param>
    /// <param name="returnPeriodYr">Return period asked for.</param>
    public static (double Low, double High, double Weight)? Bracket(IReadOnlyList<double> periodsYr, double returnPeriodYr)
    {
        foreach (var t in periodsYr)
            if (Math.Abs(t - returnPeriodYr) <= 1e-9 * t) return (t, t, 0);
        for (var k = 1; k < periodsYr.Count; k++)
        {
            double low = periodsYr[k - 1], high = periodsYr[k];
            if (low > 1 && returnPeriodYr > low && returnPeriodYr < high)
                return (low, high, (Deviate(returnPeriodYr) - Deviate(low)) / (Deviate(high) - Deviate(low)));
        }
        return null;
    }

    /// <summary>Interpolates one figure (flow or bound) with the weight of <see cref="Bracket"/>; null when an end is missing.</summary>
    public static double? Blend(double? low, double? high, double weight) =>
        weight == 0 ? low : low > 0 && high > 0 ? Math.Exp(Math.Log(low.Value) + weight * (Math.Log(high.Value) - Math.Log(low.Value))) : null;

    /// <summary>The finding for a return period that the source does not reach.</summary>
    public static PeakFlow Beyond(string method, double returnPeriodYr, IReadOnlyList<double> periodsYr) => new(method, returnPeriodYr, null, null, null, [],
        [HydrologyFindings.FlowBeyondSource.With(
            $"{method}: {returnPeriodYr:G6} yr; the source has {string.Join(", ", periodsYr.Select(t => t.ToString("G6")))} yr",
            returnPeriodYr, returnPeriodYr < periodsYr[0] ? periodsYr[0] : periodsYr[^1])]);

    /// <summary>A flow between two known ones, with its step and finding.</summary>
    public static PeakFlow Between(string method, double returnPeriodYr, PeakFlow low, PeakFlow high, double weight)
    {
        var flow = Blend(low.FlowM3PerS, high.FlowM3PerS, weight);
        var findings = low.Findings.Concat(high.Findings).Distinct().ToList();
        var steps = low.Steps.Concat(high.Steps).ToList();
        if (flow is { } q)
        {
            steps.Add(new("flow_m3_s", q, "m3/s",
                $"exp(ln {low.FlowM3PerS:G5} + {weight:0.0000} x (ln {high.FlowM3PerS:G5} - ln {low.FlowM3PerS:G5}))",
                $"between {low.ReturnPeriodYr:G6} and {high.ReturnPeriodYr:G6} yr"));
            findings.Add(HydrologyFindings.FlowInterpolated.With(
                $"{method}: {returnPeriodYr:G6} yr between {low.ReturnPeriodYr:G6} and {high.ReturnPeriodYr:G6} yr", returnPeriodYr));
        }
        return new(method, returnPeriodYr, flow,
            Blend(low.LowerM3PerS, high.LowerM3PerS, weight), Blend(low.UpperM3PerS, high.UpperM3PerS, weight), steps, findings);
    }

    private static double Deviate(double returnPeriodYr) => Normal.InvCDF(0, 1, 1 - 1 / returnPeriodYr);
}
