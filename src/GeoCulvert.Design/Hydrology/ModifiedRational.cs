using GeoCulvert.Design.Basis;

namespace GeoCulvert.Design.Hydrology;

/// <summary>
/// Hydrograph of the rational method for a storm of any length (modified rational method, HEC-22 4th ed. chapter 4).
/// <para>Notation: d storm length (min), Tc time of concentration (min), i intensity over d (mm/h), Q = C Cf i A / 360 (m3/s).</para>
/// <para>d above Tc: trapezoid that rises over Tc, stays at Q until d and falls over Tc. d equal to Tc: triangle of base 2 Tc. d below Tc: trapezoid that rises
/// over d to Q d/Tc, stays there until Tc and falls over d. In all three the volume is C Cf i A over d, and the flow ends at d + Tc.</para>
/// </summary>
public sealed record ModifiedRational : IPeakFlowMethod
{
    private const string Origin = "HEC-22 (4th ed., 2024) ch. 4";

    /// <inheritdoc/>
    public string Name => "modified-rational";

    /// <summary>The rational method behind it, with its limits and frequency factors.</summary>
    public RationalMethod Rational { get; init; } = new();

    /// <summary>Length of the storm, min; null for the time of concentration.</summary>
    public double? StormDurationMin { get; init; }

    /// <inheritdoc/>
    public PeakFlow Compute(Catchment catchment, double returnPeriodYr, PeakFlowContext context) => Hydrograph(catchment, returnPeriodYr, context).Peak;

    /// <summary>Computes the hydrograph and its peak; a missing figure is a finding, not an exception.</summary>
    public HydrographResult Hydrograph(Catchment catchment, double returnPeriodYr, PeakFlowContext context)
    {
        if (context.TimeOfConcentrationMin is not { } tc || !(tc > 0) || !double.IsFinite(tc)) return new(PeakFlow.Missing(Name, returnPeriodYr, "no time of concentration above zero"), null);
        var d = StormDurationMin ?? tc;
        if (!(d > 0) || !double.IsFinite(d)) return new(PeakFlow.Missing(Name, returnPeriodYr, $"a storm of {d:G4} min"), null);
        var steady = Rational.Compute(catchment, returnPeriodYr, context with { TimeOfConcentrationMin = d });
        if (steady.FlowM3PerS is not { } q) return new(steady with { Method = Name }, null);

        var findings = steady.Findings.ToList();
        if (d < tc) findings.Add(NrcsFindings.StormShort.With($"{d:0.0} min against {tc:0.0} min", d, tc));
        double ramp = Math.Min(d, tc), level = Math.Max(d, tc), peak = q * Math.Min(1, d / tc);
        var hydrograph = level > ramp
            ? new RunoffHydrograph([0, ramp, level, d + tc], [0, peak, peak, 0])
            : new RunoffHydrograph([0, ramp, d + tc], [0, peak, 0]);
        // The rational method was asked for the storm's length; the sheet names the two times apart.
        var steps = steady.Steps.Where(s => s.Name is not ("time_of_concentration_min" or "flow_m3_s")).ToList();
        steps.AddRange(
        [
            new("time_of_concentration_min", tc, "min"),
            new("storm_duration_min", d, "min", "", StormDurationMin is null ? "time of concentration" : "setting"),
            new("steady_flow_m3_s", q, "m3/s", steady.Steps[^1].Formula, Origin),
            new("flow_m3_s", peak, "m3/s", d < tc ? $"{q:0.0000} x {d:0.00} / {tc:0.00}" : $"{q:0.0000}", Origin),
            new("runoff_volume_m3", hydrograph.VolumeM3, "m3", $"60 x {q:0.0000} m3/s x {d:0.00} min"),
        ]);
        return new(new(Name, returnPeriodYr, peak, null, null, steps, findings), hydrograph);
    }
}
