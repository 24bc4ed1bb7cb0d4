using GeoCulvert.Design.Basis;

namespace GeoCulvert.Design.Hydrology;

/// <summary>A peak flow with the hydrograph it is the peak of.</summary>
/// <param name="Peak">Peak flow with steps and findings.</param>
/// <param name="Hydrograph">Flow against time; null when the peak is missing.</param>
public sealed record HydrographResult(PeakFlow Peak, RunoffHydrograph? Hydrograph);

/// <summary>
/// NRCS unit hydrograph method, NEH-630 chapters 10 and 16.
/// <para>Notation: D duration of excess rain (h), Tc time of concentration (h), L = 0.6 Tc lag (h), Tp = D/2 + L time to peak (h), K peak factor,
/// A area (mi2), qp = K A Q / Tp peak of the unit hydrograph (cfs, Q in inches), P rain and Q runoff up to a time (mm).</para>
/// <para>D = 0.133 Tc, so that Tp = 5 D. The runoff up to every multiple of D is taken by curve number from the storm's mass curve; its increments are
/// convolved with the unit hydrograph read at multiples of D and scaled to exactly one unit of volume, so that the volume is conserved.</para>
/// </summary>
public sealed record NrcsUnitHydrographMethod(IDesignStorm Storm) : IPeakFlowMethod
{
    private const string Origin = "NRCS NEH-630 ch. 16";
    private const double SquareMileM2 = 5280 * Units.Foot * 5280 * Units.Foot, Cfs = Units.Foot * Units.Foot * Units.Foot;
    private const double DurationOfConcentration = 0.133, LagOfConcentration = 0.6, LongestOfPeakTime = 0.25;
    private const double LowPeakFactor = 100, HighPeakFactor = 600;
    private const int MostSteps = 20000;

    /// <inheritdoc/>
    public string Name => "nrcs-unit-hydrograph";

    /// <summary>K, 484 by default.</summary>
    public double PeakFactor { get; init; } = DimensionlessUnitHydrograph.StandardPeakFactor;

    /// <summary>Ia/S: 0.2 or 0.05.</summary>
    public double InitialAbstractionRatio { get; init; } = CurveNumberRunoff.CustomaryRatio;

    /// <summary>D given outright, min; null (the default) for 0.133 Tc.</summary>
    public double? GivenDurationMin { get; init; }

    /// <inheritdoc/>
    public PeakFlow Compute(Catchment catchment, double returnPeriodYr, PeakFlowContext context) => Hydrograph(catchment, returnPeriodYr, context).Peak;

    /// <summary>Computes the hydrograph and its peak; a missing figure is a finding, not an exception.</summary>
    public HydrographResult Hydrograph(Catchment catchment, double returnPeriodYr, PeakFlowContext context)
    {
        if (CurveNumberInputs.Check(catchment, InitialAbstractionRatio, context.TimeOfConcentrationMin) is { } missing)
            return new(PeakFlow.Missing(Name, returnPeriodYr, missing), null);
        var (least, most) = DimensionlessUnitHydrograph.Possible;
        if (!(PeakFactor >= least && PeakFactor <= most))
            return new(PeakFlow.Missing(Name, returnPeriodYr, $"the peak factor {PeakFactor:G5} is not between {least:0} and {most:0}"), null);
        if (GivenDurationMin is { } d0 && !(d0 > 0 && double.IsFinite(d0)))
            return new(PeakFlow.Missing(Name, returnPeriodYr, $"the duration {d0:G5} min is not above zero"), null);
        var storm = Storm.Build(returnPeriodYr, context);
        if (storm.Rain is not { } rain) return new(new(Name, returnPeriodYr, null, null, null, storm.Steps, storm.Findings), null);

        var findings = storm.Findings.ToList();
        var loss = new CurveNumberRunoff(catchment.CurveNumber!.Value, InitialAbstractionRatio);
        CurveNumberInputs.Flag(loss, rain.DepthMm, findings);
        if (PeakFactor is < LowPeakFactor or > HighPeakFactor)
            findings.Add(NrcsFindings.PeakFactorRange.With($"{PeakFactor:0}", PeakFactor, PeakFactor < LowPeakFactor ? LowPeakFactor : HighPeakFactor));
        double tc = context.TimeOfConcentrationMin!.Value;
        if (rain.DurationMin < tc) findings.Add(NrcsFindings.StormShort.With($"{rain.DurationMin:0} min against {tc:0} min", rain.DurationMin, tc));
        if (Storm is NrcsStorm && tc < NrcsStorm.CoarseBelowMin) findings.Add(NrcsFindings.StormCoarse.With($"{Storm.Name}: {tc:0.0} min against {NrcsStorm.CoarseBelowMin:0} min", tc, NrcsStorm.CoarseBelowMin));
        var d = Math.Max(GivenDurationMin ?? DurationOfConcentration * tc, rain.DurationMin / MostSteps);
        double lag = LagOfConcentration * tc, tp = d / 2 + lag;
        if (d > LongestOfPeakTime * tp)
            findings.Add(NrcsFindings.DurationLong.With($"D {d:0.0} min against {LongestOfPeakTime * tp:0.0} min", d, LongestOfPeakTime * tp));

        var shape = DimensionlessUnitHydrograph.For(PeakFactor);
        var unit = UnitOrdinates(shape, d / tp);
        var volume = unit.Sum() * d / tp * PeakFactor / DimensionlessUnitHydrograph.SquareMileInchPerHourFactor;
        var excess = Excess(rain, loss, d);
        var hydrograph = Convolve(excess, unit, d, catchment.AreaM2);
        double miles = catchment.AreaM2 / SquareMileM2, qp = PeakFactor * miles / (tp / 60), peak = hydrograph.PeakM3PerS;
        List<Step> steps =
        [
            .. storm.Steps,
            new("area_mi2", miles, "mi2"),
            .. loss.Steps(rain.DepthMm),
            new("time_of_concentration_min", tc, "min"),
            new("excess_duration_min", d, "min", GivenDurationMin is null ? $"0.133 x {tc:0.00}" : "", GivenDurationMin is null ? Origin : "given"),
            new("lag_min", lag, "min", $"0.6 x {tc:0.00}", Origin),
            new("time_to_peak_min", tp, "min", $"{d:0.00} / 2 + {lag:0.00}", Origin),
            new("peak_factor", PeakFactor, "", shape.GammaExponentNumber > 0 ? $"gamma form, m {shape.GammaExponentNumber:0.0000}" : "table 16-1", Origin),
            new("unit_peak", qp, "cfs/in", $"{PeakFactor:0.#} x {miles:0.0000} / {tp / 60:0.0000} h", Origin),
            new("unit_volume_before_scaling", volume, "", "sum of the ordinates at multiples of D over one unit of runoff", Origin),
            new("runoff_volume_m3", hydrograph.VolumeM3, "m3", $"{loss.RunoffMm(rain.DepthMm):0.000} mm off {catchment.AreaM2 / 1e4:0.00} ha"),
            new("time_of_peak_flow_min", hydrograph.TimeToPeakMin, "min"),
            new("flow_cfs", peak / Cfs, "cfs", $"largest of {hydrograph.FlowsM3PerS.Count} ordinates of the convolution", Origin),
            new("flow_m3_s", peak, "m3/s"),
        ];
        return new(new(Name, returnPeriodYr, peak, null, null, steps, findings), hydrograph);
    }

    // q/qp at D, 2D, ...; the last is the first zero after the end.
    private static double[] UnitOrdinates(DimensionlessUnitHydrograph shape, double stepRatio)
    {
        var n = (int)Math.Ceiling(shape.EndRatio / stepRatio);
        var unit = new double[Math.Max(n, 1)];
        for (var k = 0; k < unit.Length; k++) unit[k] = shape.At((k + 1) * stepRatio);
        if (unit.Sum() <= 0) unit[0] = 1; // D longer than the whole unit hydrograph
        return unit;
    }

    // Runoff of each stretch of D, mm.
    private static double[] Excess(MassCurve rain, CurveNumberRunoff loss, double d)
    {
        var n = (int)Math.Ceiling(rain.DurationMin / d - 1e-9);
        var excess = new double[n];
        double before = 0;
        for (var k = 0; k < n; k++)
        {
            var runoff = loss.RunoffMm(rain.AtMm(k == n - 1 ? rain.DurationMin : (k + 1) * d));
            (excess[k], before) = (Math.Max(0, runoff - before), runoff);
        }
        return excess;
    }

    private static RunoffHydrograph Convolve(double[] excessMm, double[] unit, double d, double areaM2)
    {
        // One mm off the area as a mean flow over D, m3/s, shared out in the proportions of the ordinates.
        var scale = areaM2 / 1000 / (60 * d) / unit.Sum();
        var flows = new double[excessMm.Length + unit.Length + 1];
        for (var i = 0; i < excessMm.Length; i++)
        {
            if (excessMm[i] == 0) continue;
            for (var j = 0; j < unit.Length; j++) flows[i + j + 1] += scale * excessMm[i] * unit[j];
        }
        return new([.. Enumerable.Range(0, flows.Length).Select(k => k * d)], flows);
    }
}
