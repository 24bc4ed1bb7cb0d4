using GeoCulvert.Design.Basis;

namespace GeoCulvert.Design.Hydrology;

/// <summary>What a climate factor multiplies.</summary>
public enum ClimateTarget
{
    /// <summary>The rainfall intensity (and so the depth).</summary>
    Intensity,

    /// <summary>The flow.</summary>
    Flow,
}

/// <summary>A climate factor from a return period on.</summary>
/// <param name="ReturnPeriodYr">From this return period on, years.</param>
/// <param name="Factor">Factor.</param>
public sealed record ClimateFactor(double ReturnPeriodYr, double Factor);

/// <summary>
/// Climate factors by return period, on intensity or on flow. Each holds from its return period up to the next; below the first the factor is 1.00.
/// </summary>
/// <param name="Target">What they multiply.</param>
/// <param name="Factors">The factors, in any order.</param>
public sealed record ClimateFactors(ClimateTarget Target, IReadOnlyList<ClimateFactor> Factors)
{
    /// <summary>The factor of a return period.</summary>
    public double For(double returnPeriodYr) => Factors.Where(f => f.ReturnPeriodYr <= returnPeriodYr * (1 + 1e-9)).MaxBy(f => f.ReturnPeriodYr)?.Factor ?? 1;

    /// <summary>The same method with these factors on it.</summary>
    public IPeakFlowMethod On(IPeakFlowMethod method) => new ClimateAdjusted(method, this);
}

/// <summary>Rainfall with every intensity multiplied; the entries it was read from stay as they are printed.</summary>
/// <param name="Plain">The rainfall as published.</param>
/// <param name="Factors">Factors by return period.</param>
public sealed record ClimateRainfall(IRainfall Plain, ClimateFactors Factors) : IRainfall
{
    /// <inheritdoc/>
    public string Origin => $"{Plain.Origin} with climate factors";

    /// <inheritdoc/>
    public RainfallIntensity Intensity(double durationMin, double returnPeriodYr)
    {
        var (found, factor) = (Plain.Intensity(durationMin, returnPeriodYr), Factors.For(returnPeriodYr));
        return factor == 1 ? found : found with { IntensityMmPerH = found.IntensityMmPerH * factor, Origin = $"{found.Origin}, times climate factor {factor:0.00}" };
    }
}

/// <summary>A flow method with a climate factor on its rainfall or on its flow; the plain flow stands beside the adjusted one in the steps.</summary>
/// <param name="Method">The method.</param>
/// <param name="Factors">Factors by return period.</param>
public sealed record ClimateAdjusted(IPeakFlowMethod Method, ClimateFactors Factors) : IPeakFlowMethod
{
    /// <inheritdoc/>
    public string Name => Method.Name;

    /// <inheritdoc/>
    public PeakFlow Compute(Catchment catchment, double returnPeriodYr, PeakFlowContext context)
    {
        var plain = Method.Compute(catchment, returnPeriodYr, context);
        var factor = Factors.For(returnPeriodYr);
        if (!(factor > 0) || !double.IsFinite(factor)) return PeakFlow.Missing(Name, returnPeriodYr, $"the climate factor {factor:G4} is not above zero");
        if (plain.FlowM3PerS is not { } before) return plain;
        Step[] Shown(double after, string formula) =>
        [
            new("climate_factor", factor, "", "", Factors.Target == ClimateTarget.Intensity ? "setting, on intensity" : "setting, on flow"),
            new("flow_without_climate_factor_m3_s", before, "m3/s"),
            new("flow_with_climate_factor_m3_s", after, "m3/s", formula),
        ];
        if (factor == 1) return plain with { Steps = [.. plain.Steps, .. Shown(before, "")] };
        if (Factors.Target == ClimateTarget.Flow)
            return plain with
            {
                FlowM3PerS = before * factor, LowerM3PerS = plain.LowerM3PerS * factor, UpperM3PerS = plain.UpperM3PerS * factor,
                Steps = [.. plain.Steps, .. Shown(before * factor, $"{before:0.0000} x {factor:0.00}")],
            };
        var adjusted = Method.Compute(catchment, returnPeriodYr, context with
        {
            Rainfall = context.Rainfall is { } rain ? new ClimateRainfall(rain, Factors) : null,
            GivenIntensityMmPerH = context.GivenIntensityMmPerH * factor,
        });
        if (adjusted.FlowM3PerS is not { } after) return adjusted;
        Finding[] idle = after == before ? [RainfallFindings.ClimateIdle.With($"{Name}: factor {factor:0.00} on intensity", factor, 1)] : [];
        return adjusted with { Steps = [.. adjusted.Steps, .. Shown(after, "the method again, with intensity times the factor")], Findings = [.. adjusted.Findings, .. idle] };
    }
}
