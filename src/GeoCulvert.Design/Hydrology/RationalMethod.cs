using GeoCulvert.Design.Basis;

namespace GeoCulvert.Design.Hydrology;

/// <summary>A frequency factor for the runoff coefficient.</summary>
/// <param name="ReturnPeriodYr">From this return period on, years.</param>
/// <param name="Factor">Factor on C.</param>
public sealed record FrequencyFactor(double ReturnPeriodYr, double Factor);

/// <summary>
/// The rational method, HEC-22 (4th ed., 2024) chapter 4.
/// <para>Notation: C runoff coefficient, Cf frequency factor, i intensity over the time of concentration (mm/h), A area (ha), Q peak flow (m3/s).</para>
/// <para>Q = C Cf i A / 360, exact in SI. The customary form Q = C i A (cfs, in/h, acres) drops a factor of 1.0083, so it reads 0.8 % lower;
/// <see cref="CustomaryConstant"/> computes that one instead. C Cf is held at 1.</para>
/// <para>Range: small basins; <see cref="AreaLimitM2"/> is 80 ha (200 acres) by default, larger areas are computed and flagged.</para>
/// </summary>
public sealed record RationalMethod : IPeakFlowMethod
{
    private const string Origin = "HEC-22 (4th ed., 2024) ch. 4";

    /// <summary>Frequency factors of common practice (from memory): 1.1 at 25, 1.2 at 50 and 1.25 at 100 years.</summary>
    public static IReadOnlyList<FrequencyFactor> CommonFrequencyFactors { get; } = [new(25, 1.1), new(50, 1.2), new(100, 1.25)];

    /// <inheritdoc/>
    public string Name => "rational";

    /// <summary>Largest area without a finding, m2.</summary>
    public double AreaLimitM2 { get; init; } = 80e4;

    /// <summary>Frequency factors, rising; empty (the default) leaves C as it is. Each holds from its return period up to the next.</summary>
    public IReadOnlyList<FrequencyFactor> FrequencyFactors { get; init; } = [];

    /// <summary>Uses Q = C i A in cfs, in/h and acres with the constant 1 as printed, instead of the exact 1/360.</summary>
    public bool CustomaryConstant { get; init; }

    /// <summary>The SI equation.</summary>
    /// <param name="runoffCoefficient">C Cf, 0-1.</param>
    /// <param name="intensityMmPerH">i, mm/h.</param>
    /// <param name="areaHa">A, ha.</param>
    /// <returns>Q, m3/s.</returns>
    public static double FlowM3PerS(double runoffCoefficient, double intensityMmPerH, double areaHa) => runoffCoefficient * intensityMmPerH * areaHa / 360;

    /// <summary>The customary equation as printed: Q (cfs) = C i (in/h) A (acres).</summary>
    public static double FlowCfs(double runoffCoefficient, double intensityInPerH, double areaAcres) => runoffCoefficient * intensityInPerH * areaAcres;

    /// <inheritdoc/>
    public PeakFlow Compute(Catchment catchment, double returnPeriodYr, PeakFlowContext context)
    {
        if (!(catchment.AreaM2 > 0) || !double.IsFinite(catchment.AreaM2)) return PeakFlow.Missing(Name, returnPeriodYr, "no drainage area above zero");
        if (catchment.RunoffCoefficient is not { } coefficient) return PeakFlow.Missing(Name, returnPeriodYr, "no runoff coefficient");
        var c = coefficient.For(returnPeriodYr);
        if (!(c is >= 0 and <= 1)) return PeakFlow.Missing(Name, returnPeriodYr, $"the runoff coefficient {c:G4} is not between 0 and 1");
        var findings = new List<Finding>();
        var steps = new List<Step> { new("area_ha", catchment.AreaM2 / 1e4, "ha"), new("runoff_coefficient", c, "", "", coefficient.Origin) };

        if (Intensity(returnPeriodYr, context, steps, findings) is not { } i)
            return new(Name, returnPeriodYr, null, null, null, steps, findings.Count > 0 ? findings
                : [HydrologyFindings.InputMissing.With($"{Name}: no intensity above zero given, and no rainfall with a time of concentration")]);

        var effective = c;
        if (FrequencyFactors.Count > 0)
        {
            var factor = FrequencyFactors.LastOrDefault(f => f.ReturnPeriodYr <= returnPeriodYr)?.Factor ?? 1;
            effective = Math.Min(1, c * factor);
            steps.Add(new("frequency_factor", factor, "", "", "setting"));
            steps.Add(new("runoff_coefficient_with_factor", effective, "", $"min(1, {c:0.000} x {factor:0.00})", Origin));
            if (c * factor > 1) findings.Add(HydrologyFindings.CoefficientCapped.With($"{c:0.000} x {factor:0.00} = {c * factor:0.000}", c * factor, 1));
        }
        if (catchment.AreaM2 > AreaLimitM2)
            findings.Add(HydrologyFindings.RationalArea.With($"{catchment.AreaM2 / 1e4:0.0} ha against {AreaLimitM2 / 1e4:0.0} ha", catchment.AreaM2, AreaLimitM2));

        double areaHa = catchment.AreaM2 / 1e4, acres = Units.FromSi(catchment.AreaM2, "ac");
        var flow = CustomaryConstant ? Units.ToSi(FlowCfs(effective, i / 25.4, acres), "cfs") : FlowM3PerS(effective, i, areaHa);
        steps.Add(new("flow_m3_s", flow, "m3/s", CustomaryConstant
            ? $"{effective:0.000} x {i / 25.4:0.000} in/h x {acres:0.00} ac x 0.0283168"
            : $"{effective:0.000} x {i:0.00} mm/h x {areaHa:0.00} ha / 360", Origin));
        return new(Name, returnPeriodYr, flow, null, null, steps, findings);
    }

    private static double? Intensity(double returnPeriodYr, PeakFlowContext context, List<Step> steps, List<Finding> findings)
    {
        if (context.GivenIntensityMmPerH is { } given)
        {
            if (!(given > 0) || !double.IsFinite(given)) return null;
            steps.Add(new("intensity_mm_per_h", given, "mm/h", "", "given"));
            return given;
        }
        if (context.Rainfall is not { } rain || context.TimeOfConcentrationMin is not { } tc || !(tc > 0)) return null;
        steps.Add(new("time_of_concentration_min", tc, "min"));
        var found = rain.Intensity(tc, returnPeriodYr);
        findings.AddRange(found.Findings);
        if (found.IntensityMmPerH is not { } i) return null;
        string Entry(RainfallCorner k) => $"{k.IntensityMmPerH:0.00} ({k.DurationMin:G6} min, {k.ReturnPeriodYr:G6} yr: {k.Value:G6})";
        var formula = found.Corners.Distinct().Count() == 1
            ? Entry(found.Corners[0])
            : $"log-log between {string.Join(", ", found.Corners.Distinct().Select(Entry))}; weights {found.LongerDurationShare:0.000} on duration, {found.LongerReturnPeriodShare:0.000} on return period";
        steps.Add(new("intensity_mm_per_h", i, "mm/h", formula, found.Origin));
        return i;
    }
}
