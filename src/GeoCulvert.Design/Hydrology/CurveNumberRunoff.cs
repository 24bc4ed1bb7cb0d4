using GeoCulvert.Design.Basis;

namespace GeoCulvert.Design.Hydrology;

/// <summary>
/// Runoff depth by curve number: NRCS NEH-630 chapter 10, TR-55 (1986) chapter 2.
/// <para>Notation: CN curve number, S potential retention (mm), Ia initial abstraction (mm), k ratio Ia/S, P rainfall (mm), Q runoff (mm).</para>
/// <para>TR-55 eq. 2-4: S = 1000/CN - 10 (in), here 25.4 (1000/CN - 10) mm. Eq. 2-1: Q = (P - Ia)^2 / (P - Ia + S) above Ia, else 0; Ia = k S.</para>
/// <para>Published curve numbers belong to k = 0.2. For k = 0.05 the retention is converted first: S05 = 1.33 S20^1.15 in inches
/// (Hawkins et al. 2002), which is CN05 = 100 / (1.879 (100/CN - 1)^1.15 + 1). Other ratios have no published conversion and are refused.</para>
/// </summary>
public sealed record CurveNumberRunoff
{
    private const string Origin = "TR-55 (1986) eq. 2-1", RetentionOrigin = "TR-55 (1986) eq. 2-4", ConversionOrigin = "Hawkins et al. (2002)";

    /// <summary>The customary ratio Ia/S, for which curve numbers are published.</summary>
    public const double CustomaryRatio = 0.2;

    /// <summary>The ratio of Hawkins et al. (2002).</summary>
    public const double LowerRatio = 0.05;

    /// <summary>Takes a published curve number and a ratio Ia/S.</summary>
    /// <param name="curveNumber">Curve number as published (for a ratio of 0.2), above 0, at most 100.</param>
    /// <param name="initialAbstractionRatio">0.2 or 0.05.</param>
    /// <exception cref="ArgumentOutOfRangeException">One of the two is outside its range (a programmer's error: both are checked before).</exception>
    public CurveNumberRunoff(double curveNumber, double initialAbstractionRatio = CustomaryRatio)
    {
        if (!IsCurveNumber(curveNumber)) throw new ArgumentOutOfRangeException(nameof(curveNumber));
        if (!HasRatio(initialAbstractionRatio)) throw new ArgumentOutOfRangeException(nameof(initialAbstractionRatio));
        (PublishedCurveNumber, InitialAbstractionRatio) = (curveNumber, initialAbstractionRatio);
        EffectiveCurveNumber = initialAbstractionRatio == LowerRatio ? Converted(curveNumber) : curveNumber;
        RetentionMm = Retention(EffectiveCurveNumber);
    }

    /// <summary>The curve number as published.</summary>
    public double PublishedCurveNumber { get; }

    /// <summary>Ia/S.</summary>
    public double InitialAbstractionRatio { get; }

    /// <summary>The curve number that belongs to the ratio.</summary>
    public double EffectiveCurveNumber { get; }

    /// <summary>Potential retention S, mm.</summary>
    public double RetentionMm { get; }

    /// <summary>Initial abstraction Ia, mm.</summary>
    public double InitialAbstractionMm => InitialAbstractionRatio * RetentionMm;

    /// <summary>Whether a number can be a curve number.</summary>
    public static bool IsCurveNumber(double value) => value is > 0 and <= 100;

    /// <summary>Whether a ratio Ia/S can be used.</summary>
    public static bool HasRatio(double value) => value is CustomaryRatio or LowerRatio;

    /// <summary>S, mm.</summary>
    public static double Retention(double curveNumber) => 25.4 * (1000 / curveNumber - 10);

    /// <summary>The curve number for Ia/S = 0.05 that belongs to a published one.</summary>
    public static double Converted(double curveNumber) => 100 / (1.879 * Math.Pow(100 / curveNumber - 1, 1.15) + 1);

    /// <summary>Runoff depth, mm: zero up to the initial abstraction, never more than the rain.</summary>
    public double RunoffMm(double rainfallMm)
    {
        double P = rainfallMm, Ia = InitialAbstractionMm, S = RetentionMm;
        return P <= Ia ? 0 : (P - Ia) * (P - Ia) / (P - Ia + S);
    }

    /// <summary>The lines of the calculation.</summary>
    /// <param name="rainfallMm">P, mm.</param>
    public IReadOnlyList<Step> Steps(double rainfallMm)
    {
        var steps = new List<Step> { new("curve_number", PublishedCurveNumber, "") };
        if (InitialAbstractionRatio == LowerRatio)
            steps.Add(new("curve_number_for_ratio", EffectiveCurveNumber, "", $"100 / (1.879 (100/{PublishedCurveNumber:0.##} - 1)^1.15 + 1)", ConversionOrigin));
        steps.Add(new("potential_retention_mm", RetentionMm, "mm", $"25.4 (1000/{EffectiveCurveNumber:0.00} - 10)", RetentionOrigin));
        steps.Add(new("initial_abstraction_mm", InitialAbstractionMm, "mm", $"{InitialAbstractionRatio:0.##} x {RetentionMm:0.00}", RetentionOrigin));
        steps.Add(new("runoff_depth_mm", RunoffMm(rainfallMm), "mm", rainfallMm <= InitialAbstractionMm
            ? $"0: {rainfallMm:0.00} mm of rain do not exceed the initial abstraction"
            : $"({rainfallMm:0.00} - {InitialAbstractionMm:0.00})^2 / ({rainfallMm:0.00} - {InitialAbstractionMm:0.00} + {RetentionMm:0.00})", Origin));
        return steps;
    }
}
