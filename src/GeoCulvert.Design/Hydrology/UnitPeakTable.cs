using GeoCulvert.Design.Basis;

namespace GeoCulvert.Design.Hydrology;

/// <summary>The four 24-hour storms of the NRCS.</summary>
public enum NrcsStormType
{
    /// <summary>Type I.</summary>
    I,

    /// <summary>Type IA.</summary>
    IA,

    /// <summary>Type II.</summary>
    II,

    /// <summary>Type III.</summary>
    III,
}

/// <summary>A unit peak discharge with the two curves it lies between.</summary>
/// <param name="PerSquareMileAndInchCoefficient">qu, cfs per square mile and inch of runoff.</param>
/// <param name="AbstractionRatio">Ia/P that was used, inside the table.</param>
/// <param name="TimeHours">Tc that was used, 0.1 to 10 h.</param>
/// <param name="LowerCurveRatio">Ia/P of the curve below.</param>
/// <param name="LowerCurveCoefficient">qu of the curve below.</param>
/// <param name="UpperCurveRatio">Ia/P of the curve above.</param>
/// <param name="UpperCurveCoefficient">qu of the curve above.</param>
public sealed record UnitPeak(
    double PerSquareMileAndInchCoefficient, double AbstractionRatio, double TimeHours,
    double LowerCurveRatio, double LowerCurveCoefficient, double UpperCurveRatio, double UpperCurveCoefficient);

/// <summary>
/// Unit peak discharge, TR-55 (1986) appendix F: log10 qu = C0 + C1 log10 Tc + C2 (log10 Tc)^2 (csm/in; Tc h), one curve for each Ia/P of table F-1.
/// Between the curves qu itself is linear in Ia/P; the coefficients are not interpolated.
/// </summary>
public static class UnitPeakTable
{
    /// <summary>Shortest time of concentration of the curves, h.</summary>
    public const double ShortestHours = 0.1;

    /// <summary>Longest time of concentration of the curves, h.</summary>
    public const double LongestHours = 10;

    /// <summary>Share of ponds and swamps up to which the factor is published, 0-1.</summary>
    public const double LargestPondShare = 0.05;

    private static readonly Dictionary<NrcsStormType, (double Ratio, double C0, double C1, double C2)[]> Curves =
        PublishedTable.Embedded("Hydrology/Tables/unit_peak_discharge.csv").Rows
            .GroupBy(r => Enum.Parse<NrcsStormType>(r.Text("storm")))
            .ToDictionary(g => g.Key, g => g.Select(r => (r.Number("ia_over_p"), r.Number("C0"), r.Number("C1"), r.Number("C2"))).ToArray());

    private static readonly (double Share, double Factor)[] Ponds =
        [.. PublishedTable.Embedded("Hydrology/Tables/pond_factor.csv").Rows.Select(r => (r.Number("pond_swamp_pct") / 100, r.Number("factor")))];

    /// <summary>Range of Ia/P of a storm's curves.</summary>
    public static (double Least, double Most) RatioRange(NrcsStormType storm) => (Curves[storm][0].Ratio, Curves[storm][^1].Ratio);

    /// <summary>The unit peak; ratio and time are clamped to the table, and the result says to what.</summary>
    /// <param name="storm">24-hour storm.</param>
    /// <param name="abstractionRatio">Ia/P.</param>
    /// <param name="timeHours">Tc, h.</param>
    public static UnitPeak Find(NrcsStormType storm, double abstractionRatio, double timeHours)
    {
        var curves = Curves[storm];
        var ratio = Math.Clamp(abstractionRatio, curves[0].Ratio, curves[^1].Ratio);
        var t = Math.Clamp(timeHours, ShortestHours, LongestHours);
        var high = 1;
        while (high < curves.Length - 1 && curves[high].Ratio < ratio) high++;
        var (a, b) = (curves[high - 1], curves[high]);
        double qa = OnCurve(a, t), qb = OnCurve(b, t), weight = (ratio - a.Ratio) / (b.Ratio - a.Ratio);
        return new(qa + weight * (qb - qa), ratio, t, a.Ratio, qa, b.Ratio, qb);
    }

    /// <summary>Pond and swamp factor Fp, TR-55 table 4-2, linear between its rows; beyond 5 % that of 5 %.</summary>
    /// <param name="pondShare">Share of the area in ponds and swamps, 0-1.</param>
    public static double PondFactor(double pondShare)
    {
        if (pondShare <= 0) return 1;
        for (var k = 1; k < Ponds.Length; k++)
            if (pondShare <= Ponds[k].Share)
                return Ponds[k - 1].Factor + (pondShare - Ponds[k - 1].Share) / (Ponds[k].Share - Ponds[k - 1].Share) * (Ponds[k].Factor - Ponds[k - 1].Factor);
        return Ponds[^1].Factor;
    }

    private static double OnCurve((double Ratio, double C0, double C1, double C2) curve, double hours)
    {
        var log = Math.Log10(hours);
        return Math.Pow(10, curve.C0 + curve.C1 * log + curve.C2 * log * log);
    }
}
