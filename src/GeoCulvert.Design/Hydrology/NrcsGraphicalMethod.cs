using GeoCulvert.Design.Basis;

namespace GeoCulvert.Design.Hydrology;

/// <summary>
/// NRCS graphical peak discharge, TR-55 (1986) chapter 4.
/// <para>Notation: A area (mi2), Q runoff of the 24-hour rain (in), qu unit peak (csm/in), Fp pond factor, qp peak (cfs).</para>
/// <para>Eq. 4-1: qp = qu A Q Fp. Ia/P and Tc outside the curves are clamped and flagged. In SI qu is 0.0004304 of its value (m3/s per km2 and mm; printed 0.000431).</para>
/// <para>Range: Tc 0.1 to 10 h, Ia/P of table F-1, one main stream, ponds up to 5 % away from the flow path, curve number 40 and more.</para>
/// </summary>
public sealed record NrcsGraphicalMethod(NrcsStormType Storm) : IPeakFlowMethod
{
    private const double SquareMileM2 = 5280 * Units.Foot * 5280 * Units.Foot, Cfs = Units.Foot * Units.Foot * Units.Foot;
    private const string Origin = "TR-55 (1986) eq. 4-1";

    /// <inheritdoc/>
    public string Name => "nrcs-graphical";

    /// <summary>Share of the area in ponds and swamps away from the main flow path, 0-1.</summary>
    public double PondShare { get; init; }

    /// <summary>Ia/S: 0.2, or 0.05, which the curves were not made for and which is flagged.</summary>
    public double InitialAbstractionRatio { get; init; } = CurveNumberRunoff.CustomaryRatio;

    /// <summary>24-hour rainfall given outright, mm; goes before the rainfall table.</summary>
    public double? GivenDepthMm { get; init; }

    /// <inheritdoc/>
    public PeakFlow Compute(Catchment catchment, double returnPeriodYr, PeakFlowContext context)
    {
        var findings = new List<Finding>();
        var steps = new List<Step>();
        if (CurveNumberInputs.Check(catchment, InitialAbstractionRatio, context.TimeOfConcentrationMin) is { } missing) return PeakFlow.Missing(Name, returnPeriodYr, missing);
        if (!(PondShare is >= 0 and <= 1)) return PeakFlow.Missing(Name, returnPeriodYr, $"the share of ponds {PondShare:G4} is not between 0 and 1");
        if (CurveNumberInputs.DailyDepthMm(GivenDepthMm, returnPeriodYr, context, steps, findings) is not { } rain)
            return new(Name, returnPeriodYr, null, null, null, steps, [HydrologyFindings.InputMissing.With($"{Name}: no 24-hour rainfall above zero"), .. findings]);

        var loss = new CurveNumberRunoff(catchment.CurveNumber!.Value, InitialAbstractionRatio);
        CurveNumberInputs.Flag(loss, rain, findings);
        if (InitialAbstractionRatio != CurveNumberRunoff.CustomaryRatio)
            findings.Add(NrcsFindings.GraphicalRatio.With($"{InitialAbstractionRatio:0.##} against {CurveNumberRunoff.CustomaryRatio:0.##}", InitialAbstractionRatio, CurveNumberRunoff.CustomaryRatio));
        double hours = context.TimeOfConcentrationMin!.Value / 60, ratio = loss.InitialAbstractionMm / rain;
        var peak = UnitPeakTable.Find(Storm, ratio, hours);
        if (peak.AbstractionRatio != ratio)
            findings.Add(NrcsFindings.AbstractionRange.With($"Ia/P {ratio:0.000}, {peak.AbstractionRatio:0.00} used", ratio, peak.AbstractionRatio));
        if (peak.TimeHours != hours)
            findings.Add(NrcsFindings.GraphicalTime.With($"{hours:0.000} h, {peak.TimeHours:0.0} h used", hours, peak.TimeHours));
        if (PondShare > UnitPeakTable.LargestPondShare)
            findings.Add(NrcsFindings.PondShare.With($"{100 * PondShare:0.0} % against 5 %", PondShare, UnitPeakTable.LargestPondShare));

        double qu = peak.PerSquareMileAndInchCoefficient, fp = UnitPeakTable.PondFactor(PondShare);
        double miles = catchment.AreaM2 / SquareMileM2, inches = loss.RunoffMm(rain) / 25.4, qp = qu * miles * inches * fp;
        steps.AddRange(
        [
            new("area_mi2", miles, "mi2"),
            .. loss.Steps(rain),
            new("initial_abstraction_over_rainfall", ratio, "", $"{loss.InitialAbstractionMm:0.00} / {rain:0.00}", Origin),
            new("time_of_concentration_h", hours, "h"),
            new("unit_peak", qu, "csm/in",
                $"{peak.LowerCurveCoefficient:0.0} at Ia/P {peak.LowerCurveRatio:0.00}, {peak.UpperCurveCoefficient:0.0} at {peak.UpperCurveRatio:0.00}; linear to {peak.AbstractionRatio:0.000}",
                $"TR-55 (1986) table F-1, type {Storm}"),
            new("pond_factor", fp, "", $"{100 * PondShare:0.##} % of the area", "TR-55 (1986) table 4-2"),
            new("flow_cfs", qp, "cfs", $"{qu:0.0} x {miles:0.0000} x {inches:0.000} x {fp:0.000}", Origin),
            new("flow_m3_s", qp * Cfs, "m3/s", $"{qp:0.000} x 0.0283168"),
        ]);
        return new(Name, returnPeriodYr, qp * Cfs, null, null, steps, findings);
    }
}
