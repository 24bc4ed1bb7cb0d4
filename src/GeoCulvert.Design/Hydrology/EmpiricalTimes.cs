using GeoCulvert.Design.Basis;

namespace GeoCulvert.Design.Hydrology;

/// <summary>
/// Time of concentration of the Federal Aviation Administration (1965, 1970), for overland flow on airfields.
/// <para>Notation: C runoff coefficient, L length (ft), S slope (%), t time (min).</para>
/// <para>t = 1.8 (1.1 - C) L^0.5 / S^(1/3). With metres the constant is 3.26 (1.8 x 3.2808^0.5).</para>
/// <para>Range: overland flow to about 1000 ft, where the chart of the FAA ends (from memory).</para>
/// </summary>
/// <param name="Slope">Which slope is S; fall over length by default.</param>
public sealed record FaaTime(FlowPathSlope Slope = FlowPathSlope.EndToEnd) : ITimeOfConcentration
{
    private const string Origin = "FAA AC 150/5320-5B (1970)";
    private const double LongestM = 1000 * Units.Foot;

    /// <inheritdoc/>
    public string Name => "faa";

    /// <summary>The equation itself.</summary>
    /// <param name="runoffCoefficient">C, 0 to 1.</param>
    /// <param name="lengthM">L, m.</param>
    /// <param name="slopeMPerM">S, above zero, m/m.</param>
    /// <returns>Time, min.</returns>
    public static double TimeMin(double runoffCoefficient, double lengthM, double slopeMPerM)
    {
        double C = runoffCoefficient, L = lengthM / Units.Foot, S = 100 * slopeMPerM;
        return 1.8 * (1.1 - C) * Math.Sqrt(L) / Math.Cbrt(S);
    }

    /// <inheritdoc/>
    public TimeOfConcentration Compute(Catchment catchment, TimeOfConcentrationContext context)
    {
        if (catchment.RunoffCoefficient is not { } coefficient) return TimeOfConcentration.Missing(Name, "no runoff coefficient");
        var c = coefficient.For(context.ReturnPeriodYr ?? 0);
        if (!(c is >= 0 and <= 1)) return TimeOfConcentration.Missing(Name, $"the runoff coefficient {c:G4} is not between 0 and 1");
        var (length, slope, missing) = TimeInputs.Path(catchment, Slope);
        if (missing is not null) return TimeOfConcentration.Missing(Name, missing);
        var findings = new List<Finding>();
        TimeInputs.Range(findings, Name, "overland length", length, 0, LongestM, 1, "m");
        var time = TimeMin(c, length, slope);
        return new(Name, time, [],
        [
            new("flow_path_length_m", length, "m"),
            new("flow_path_slope_m_per_m", slope, "m/m", "", TimeInputs.Origin(Slope)),
            new("runoff_coefficient", c, "", "", coefficient.Origin),
            new("time_of_concentration_min", time, "min", $"1.8 x (1.1 - {c:0.000}) x ({length / Units.Foot:0.0} ft)^0.5 / ({100 * slope:0.000} %)^(1/3)", Origin),
        ], findings);
    }
}

/// <summary>
/// NRCS watershed lag, NEH-630 chapter 15 (equations 15-4a and 15-4b).
/// <para>Notation: l flow length (ft), S retention 1000/CN - 10 (in), Y mean slope of the land (%), L lag (h), Tc = L/0.6 (h).</para>
/// <para>L = l^0.8 (S + 1)^0.7 / (1900 Y^0.5), so Tc = l^0.8 (S + 1)^0.7 / (1140 Y^0.5).</para>
/// <para>Range: curve number 50 to 95, land slope 0.5 to 64 %, natural land up to 2000 acres (NEH-4, 1972; from memory).</para>
/// </summary>
public sealed record NrcsLag : ITimeOfConcentration
{
    private const string Origin = "NRCS NEH-630 ch. 15";
    private const double LagOfConcentration = 0.6;

    /// <inheritdoc/>
    public string Name => "nrcs-lag";

    /// <summary>The lag itself.</summary>
    /// <param name="lengthM">l, m.</param>
    /// <param name="curveNumber">CN, for Ia = 0.2 S.</param>
    /// <param name="landSlopeMPerM">Y, above zero, m/m.</param>
    /// <returns>Lag L, min; time of concentration is L/0.6.</returns>
    public static double LagMin(double lengthM, double curveNumber, double landSlopeMPerM)
    {
        double l = lengthM / Units.Foot, S = 1000 / curveNumber - 10, Y = 100 * landSlopeMPerM;
        return 60 * Math.Pow(l, 0.8) * Math.Pow(S + 1, 0.7) / (1900 * Math.Sqrt(Y));
    }

    /// <inheritdoc/>
    public TimeOfConcentration Compute(Catchment catchment, TimeOfConcentrationContext context)
    {
        if (catchment.LongestFlowPathM is not { } length || !(length > 0) || !double.IsFinite(length)) return TimeOfConcentration.Missing(Name, "no length of the longest flow path");
        if (catchment.MeanBasinSlopeMPerM is not { } y || !(y > 0) || !double.IsFinite(y)) return TimeOfConcentration.Missing(Name, "no mean slope of the ground above zero");
        if (catchment.CurveNumber is not { } cn || !CurveNumberRunoff.IsCurveNumber(cn)) return TimeOfConcentration.Missing(Name, "no curve number above 0 and at most 100");
        var findings = new List<Finding>();
        TimeInputs.Range(findings, Name, "curve number", cn, 50, 95, 1, "");
        TimeInputs.Range(findings, Name, "land slope", y, 0.005, 0.64, 0.01, "%");
        TimeInputs.Range(findings, Name, "area", catchment.AreaM2, 0, 2000 * TimeInputs.AcreM2, 1e6, "km2");
        double lag = LagMin(length, cn, y), time = lag / LagOfConcentration;
        return new(Name, time, [],
        [
            new("flow_path_length_m", length, "m"),
            new("mean_basin_slope_m_per_m", y, "m/m"),
            new("curve_number", cn, ""),
            new("lag_min", lag, "min", $"60 x ({length / Units.Foot:0.0} ft)^0.8 x (1000/{cn:0.##} - 9)^0.7 / (1900 x ({100 * y:0.000} %)^0.5)", Origin),
            new("time_of_concentration_min", time, "min", $"{lag:0.00} / 0.6", Origin),
        ], findings);
    }
}

/// <summary>
/// Time of concentration after Bransby Williams (1922), The Engineer 134, p. 321.
/// <para>Notation: L length of the longest flow path (mi), A area (mi2), S its slope (ft/ft), t time (min).</para>
/// <para>t = 21.3 L A^-0.1 S^-0.2; with kilometres and square kilometres the constant is 14.6, with S in m/km 58. The paper itself,
/// A = (t^5 100 S)^0.5 for a circle and t L/d for other shapes, gives 21.17.</para>
/// <para>Range: rural land up to 50 square miles (from memory).</para>
/// </summary>
/// <param name="Slope">Which slope is S; fall over length by default.</param>
public sealed record BransbyWilliams(FlowPathSlope Slope = FlowPathSlope.EndToEnd) : ITimeOfConcentration
{
    private const string Origin = "Bransby Williams (1922)";
    private const double Mile = 5280 * Units.Foot;

    /// <inheritdoc/>
    public string Name => "bransby-williams";

    /// <summary>The equation itself.</summary>
    /// <param name="lengthM">L, m.</param>
    /// <param name="areaM2">A, m2.</param>
    /// <param name="slopeMPerM">S, above zero, m/m.</param>
    /// <returns>Time, min.</returns>
    public static double TimeMin(double lengthM, double areaM2, double slopeMPerM)
    {
        double L = lengthM / Mile, A = areaM2 / TimeInputs.SquareMileM2, S = slopeMPerM;
        return 21.3 * L * Math.Pow(A, -0.1) * Math.Pow(S, -0.2);
    }

    /// <inheritdoc/>
    public TimeOfConcentration Compute(Catchment catchment, TimeOfConcentrationContext context)
    {
        if (!(catchment.AreaM2 > 0) || !double.IsFinite(catchment.AreaM2)) return TimeOfConcentration.Missing(Name, "no drainage area above zero");
        var (length, slope, missing) = TimeInputs.Path(catchment, Slope);
        if (missing is not null) return TimeOfConcentration.Missing(Name, missing);
        var findings = new List<Finding>();
        TimeInputs.Range(findings, Name, "area", catchment.AreaM2, 0, 50 * TimeInputs.SquareMileM2, 1e6, "km2");
        var time = TimeMin(length, catchment.AreaM2, slope);
        return new(Name, time, [],
        [
            new("flow_path_length_m", length, "m"),
            new("flow_path_slope_m_per_m", slope, "m/m", "", TimeInputs.Origin(Slope)),
            new("area_mi2", catchment.AreaM2 / TimeInputs.SquareMileM2, "mi2"),
            new("time_of_concentration_min", time, "min",
                $"21.3 x {length / Mile:0.0000} mi x ({catchment.AreaM2 / TimeInputs.SquareMileM2:0.0000} mi2)^-0.1 x {slope:0.00000}^-0.2", Origin),
        ], findings);
    }
}
