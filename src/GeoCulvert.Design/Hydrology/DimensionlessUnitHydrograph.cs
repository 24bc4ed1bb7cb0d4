using GeoCulvert.Design.Basis;
using MathNet.Numerics;

namespace GeoCulvert.Design.Hydrology;

/// <summary>
/// Dimensionless unit hydrograph, NRCS NEH-630 chapter 16: q/qp against t/Tp.
/// <para>Peak factor 484: table 16-1, straight between its rows. Any other: the gamma form q/qp = ((t/Tp) exp(1 - t/Tp))^m, with m from the peak factor
/// by volume: K = 645.333 / integral of q/qp = 645.333 m^(m+1) / (e^m Gamma(m+1)); 645.333 cfs are one inch per hour off one square mile.</para>
/// <para>The table's own volume gives K = 483.05, the table being printed to two and three digits; results are scaled to the exact volume.</para>
/// </summary>
public sealed class DimensionlessUnitHydrograph
{
    /// <summary>The standard peak factor.</summary>
    public const double StandardPeakFactor = 484;

    /// <summary>Inch per hour off a square mile, cfs: 5280^2 / (12 x 3600).</summary>
    public const double SquareMileInchPerHourFactor = 5280.0 * 5280 / 43200;

    private const double LeastExponent = 0.01, MostExponent = 200, Negligible = 1e-7;
    private readonly (double T, double Q)[]? _table;

    private DimensionlessUnitHydrograph(double peakFactor, double exponent, (double T, double Q)[]? table)
    {
        (PeakFactor, GammaExponentNumber, _table) = (peakFactor, exponent, table);
        EndRatio = table is not null ? table[^1].T : RootFinding.Bracketed(x => Gamma(x) - Negligible, 1, 1e5);
    }

    /// <summary>Table 16-1.</summary>
    public static DimensionlessUnitHydrograph Standard { get; } = new(StandardPeakFactor, 0,
        [.. PublishedTable.Embedded("Hydrology/Tables/unit_hydrograph.csv").Rows.Select(r => (r.Number("t_over_tp"), r.Number("q_over_qp")))]);

    /// <summary>K, the peak factor in cfs h/(mi2 in).</summary>
    public double PeakFactor { get; }

    /// <summary>m of the gamma form; 0 for the table.</summary>
    public double GammaExponentNumber { get; }

    /// <summary>t/Tp at which the hydrograph ends.</summary>
    public double EndRatio { get; }

    /// <summary>Smallest and largest peak factor that the gamma form can hold here.</summary>
    public static (double Least, double Most) Possible { get; } = (PeakFactorOf(LeastExponent), PeakFactorOf(MostExponent));

    /// <summary>The hydrograph of a peak factor: the table for 484, the gamma form for others.</summary>
    /// <exception cref="ArgumentOutOfRangeException">No gamma form has it (a programmer's error: it is checked before).</exception>
    public static DimensionlessUnitHydrograph For(double peakFactor)
    {
        if (peakFactor == StandardPeakFactor) return Standard;
        if (!(peakFactor >= Possible.Least && peakFactor <= Possible.Most)) throw new ArgumentOutOfRangeException(nameof(peakFactor));
        return OfExponent(RootFinding.Bracketed(m => PeakFactorOf(m) - peakFactor, LeastExponent, MostExponent), peakFactor);
    }

    /// <summary>The gamma form of a peak factor, also for 484.</summary>
    public static DimensionlessUnitHydrograph GammaFor(double peakFactor) =>
        OfExponent(RootFinding.Bracketed(m => PeakFactorOf(m) - peakFactor, LeastExponent, MostExponent), peakFactor);

    /// <summary>K of a gamma exponent.</summary>
    public static double PeakFactorOf(double exponent) =>
        SquareMileInchPerHourFactor * Math.Exp((exponent + 1) * Math.Log(exponent) - exponent - SpecialFunctions.GammaLn(exponent + 1));

    /// <summary>q/qp at t/Tp.</summary>
    public double At(double ratio)
    {
        if (ratio <= 0 || ratio >= EndRatio) return 0;
        if (_table is null) return Gamma(ratio);
        var k = 1;
        while (_table[k].T < ratio) k++;
        return _table[k - 1].Q + (ratio - _table[k - 1].T) / (_table[k].T - _table[k - 1].T) * (_table[k].Q - _table[k - 1].Q);
    }

    private static DimensionlessUnitHydrograph OfExponent(double m, double peakFactor) => new(peakFactor, m, null);

    private double Gamma(double x) => Math.Exp(GammaExponentNumber * (Math.Log(x) + 1 - x));
}
