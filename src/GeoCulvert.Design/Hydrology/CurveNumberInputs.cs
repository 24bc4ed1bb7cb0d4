using GeoCulvert.Design.Basis;

namespace GeoCulvert.Design.Hydrology;

/// <summary>What the two NRCS methods ask of their input.</summary>
internal static class CurveNumberInputs
{
    private const double LeastCurveNumber = 40, DayMin = 1440;

    /// <summary>What is missing, or null.</summary>
    public static string? Check(Catchment catchment, double ratio, double? timeMin)
    {
        if (!(catchment.AreaM2 > 0) || !double.IsFinite(catchment.AreaM2)) return "no drainage area above zero";
        if (catchment.CurveNumber is not { } cn) return "no curve number";
        if (!CurveNumberRunoff.IsCurveNumber(cn)) return $"the curve number {cn:G4} is not above 0 and at most 100";
        if (!CurveNumberRunoff.HasRatio(ratio)) return $"the ratio Ia/S {ratio:G4} is neither 0.2 nor 0.05, and no other has a published conversion";
        return timeMin is { } t && t > 0 && double.IsFinite(t) ? null : "no time of concentration above zero";
    }

    /// <summary>The 24-hour rainfall, mm, with its step; null when there is none.</summary>
    public static double? DailyDepthMm(double? given, double returnPeriodYr, PeakFlowContext context, List<Step> steps, List<Finding> findings)
    {
        if (given is { } depth)
        {
            if (!(depth > 0) || !double.IsFinite(depth)) return null;
            steps.Add(new("rainfall_24_h_mm", depth, "mm", "", "given"));
            return depth;
        }
        if (context.Rainfall?.Intensity(DayMin, returnPeriodYr) is not { } rain) return null;
        findings.AddRange(rain.Findings);
        if (rain.DepthMm is not { } p || !(p > 0)) return null;
        steps.Add(new("rainfall_24_h_mm", p, "mm", $"{rain.IntensityMmPerH:0.000} mm/h x 24 h", rain.Origin));
        return p;
    }

    /// <summary>Flags what the runoff depth itself has to say.</summary>
    public static void Flag(CurveNumberRunoff loss, double rainMm, List<Finding> findings)
    {
        if (loss.InitialAbstractionRatio == CurveNumberRunoff.LowerRatio)
            findings.Add(NrcsFindings.CurveNumberConverted.With($"{loss.PublishedCurveNumber:0.#} became {loss.EffectiveCurveNumber:0.0}", loss.EffectiveCurveNumber));
        if (loss.PublishedCurveNumber < LeastCurveNumber)
            findings.Add(NrcsFindings.CurveNumberLow.With($"{loss.PublishedCurveNumber:0.#} against {LeastCurveNumber:0}", loss.PublishedCurveNumber, LeastCurveNumber));
        if (rainMm <= loss.InitialAbstractionMm)
            findings.Add(NrcsFindings.NoRunoff.With($"{rainMm:0.0} mm of rain, {loss.InitialAbstractionMm:0.0} mm of initial abstraction", rainMm, loss.InitialAbstractionMm));
    }
}
