using GeoCulvert.Design.Basis;
using MathNet.Numerics.Distributions;

namespace GeoCulvert.Design.Hydrology;

/// <summary>What the values of a rainfall table are.</summary>
public enum RainfallMeasure
{
    /// <summary>Depths in millimetres.</summary>
    DepthMm,

    /// <summary>Depths in inches.</summary>
    DepthIn,

    /// <summary>Intensities in millimetres per hour.</summary>
    IntensityMmPerH,

    /// <summary>Intensities in inches per hour.</summary>
    IntensityInPerH,
}

/// <summary>The series behind a rainfall table: what its return periods mean.</summary>
public enum RainfallSeries
{
    /// <summary>Not said by the file; treated as a partial-duration series.</summary>
    NotStated,

    /// <summary>Partial duration: the return period is an average recurrence interval (ARI).</summary>
    PartialDuration,

    /// <summary>Annual maxima: the return period is the inverse of the annual exceedance probability.</summary>
    AnnualMaximum,
}

/// <summary>One of the four table entries around a value.</summary>
/// <param name="DurationMin">Duration, min.</param>
/// <param name="ReturnPeriodYr">Return period, years.</param>
/// <param name="Value">The entry as printed, in the table's own unit.</param>
/// <param name="IntensityMmPerH">The entry as an intensity, mm/h.</param>
public sealed record RainfallCorner(double DurationMin, double ReturnPeriodYr, double Value, double IntensityMmPerH);

/// <summary>A rainfall intensity with the entries it was interpolated from.</summary>
/// <param name="DurationMin">Duration asked for, min.</param>
/// <param name="ReturnPeriodYr">Return period asked for, years.</param>
/// <param name="IntensityMmPerH">Intensity, mm/h; null when the source does not reach so far (see the findings).</param>
/// <param name="Corners">Entries shorter-rarer order: (d1,T1), (d1,T2), (d2,T1), (d2,T2); empty when there is no value.</param>
/// <param name="LongerDurationShare">Weight of the longer duration, 0-1 inside the table.</param>
/// <param name="LongerReturnPeriodShare">Weight of the longer return period, 0-1 inside the table.</param>
/// <param name="Origin">The table, for the sheet.</param>
/// <param name="Findings">Doubts.</param>
public sealed record RainfallIntensity(
    double DurationMin, double ReturnPeriodYr, double? IntensityMmPerH, IReadOnlyList<RainfallCorner> Corners,
    double LongerDurationShare, double LongerReturnPeriodShare, string Origin, IReadOnlyList<Finding> Findings)
{
    /// <summary>Depth over the duration, mm.</summary>
    public double? DepthMm => IntensityMmPerH * DurationMin / 60;
}

/// <summary>A source of rainfall intensities: a table now; equations and rasters fit the same shape.</summary>
public interface IRainfall
{
    /// <summary>What it is, for the sheet.</summary>
    string Origin { get; }

    /// <summary>The intensity for a duration in minutes and a return period in years.</summary>
    RainfallIntensity Intensity(double durationMin, double returnPeriodYr);
}

/// <summary>
/// Intensity-duration-frequency table.
/// <para>Notation: d duration (min), T return period (yr), i intensity (mm/h), z standard normal deviate of the non-exceedance probability.</para>
/// <para>Between durations ln i is linear in ln d (log-log); between return periods ln i is linear in z. For a partial-duration
/// series the annual non-exceedance probability is exp(-1/T) (Langbein 1949), so that ARI 1 yr has z = -0.337; for annual maxima
/// it is 1 - 1/T. Outside the table the last two entries are extended up to <see cref="ExtensionFactor"/>, with a finding;
/// beyond that there is no value.</para>
/// </summary>
public sealed class RainfallTable : IRainfall
{
    /// <summary>How far beyond its ends the table is extended: to this factor on duration and return period (a setting of the program).</summary>
    public const double ExtensionFactor = 2;

    private readonly double[,] _values;

    internal RainfallTable(
        string origin, RainfallMeasure measure, RainfallSeries series, double[] durationsMin, double[] returnPeriodsYr, double[,] values)
    {
        (Origin, Measure, Series, DurationsMin, ReturnPeriodsYr, _values) = (origin, measure, series, durationsMin, returnPeriodsYr, values);
    }

    /// <inheritdoc/>
    public string Origin { get; }

    /// <summary>What the printed values are.</summary>
    public RainfallMeasure Measure { get; }

    /// <summary>The series behind the table.</summary>
    public RainfallSeries Series { get; }

    /// <summary>Durations, min, rising.</summary>
    public IReadOnlyList<double> DurationsMin { get; }

    /// <summary>Return periods, years, rising.</summary>
    public IReadOnlyList<double> ReturnPeriodsYr { get; }

    /// <summary>Lines of the file that say where it comes from (title, location, volume); may be empty.</summary>
    public IReadOnlyList<string> Heading { get; init; } = [];

    /// <summary>Lower bound of the published 90 % confidence interval in the same shape, when the file has it.</summary>
    public RainfallTable? LowerBound { get; init; }

    /// <summary>Upper bound of the published 90 % confidence interval in the same shape, when the file has it.</summary>
    public RainfallTable? UpperBound { get; init; }

    /// <summary>Reads a table of either kind, recognising which.</summary>
    /// <param name="name">File name for errors and for the sheet.</param>
    /// <param name="text">The whole text.</param>
    /// <param name="stated">What the values are, when the file does not say.</param>
    /// <exception cref="InputException">The file cannot be used; says line, found and expected.</exception>
    public static RainfallTable Read(string name, string text, RainfallMeasure? stated = null) =>
        Atlas14Reader.Recognises(text) ? Atlas14Reader.Read(name, text, stated) : PlainRainfallReader.Read(name, text, stated);

    /// <summary>Reads a NOAA Atlas 14 point precipitation frequency file as its server writes it.</summary>
    /// <inheritdoc cref="Read"/>
    public static RainfallTable ReadAtlas14(string name, string text, RainfallMeasure? stated = null) => Atlas14Reader.Read(name, text, stated);

    /// <summary>Reads a plain table, see <c>docs/theory/hydrology.md</c>: <c>duration_min\intensity_mm_per_h,2,10,25</c>.</summary>
    /// <inheritdoc cref="Read"/>
    public static RainfallTable ReadPlain(string name, string text, RainfallMeasure? stated = null) => PlainRainfallReader.Read(name, text, stated);

    /// <summary>The printed value, in the table's own unit.</summary>
    public double TableValue(int duration, int returnPeriod) => _values[duration, returnPeriod];

    /// <summary>The entry as an intensity, mm/h.</summary>
    public double EntryIntensityMmPerH(int duration, int returnPeriod) =>
        ToIntensityMmPerH(_values[duration, returnPeriod], Measure, DurationsMin[duration]);

    /// <inheritdoc/>
    public RainfallIntensity Intensity(double durationMin, double returnPeriodYr)
    {
        if (!(durationMin > 0) || !double.IsFinite(durationMin)) throw new ArgumentOutOfRangeException(nameof(durationMin));
        if (!(returnPeriodYr > 0) || !double.IsFinite(returnPeriodYr)) throw new ArgumentOutOfRangeException(nameof(returnPeriodYr));
        var findings = new List<Finding>();
        var d = Bracket(DurationsMin, durationMin, Math.Log, "duration", "min", findings);
        var t = Bracket(ReturnPeriodsYr, returnPeriodYr, Deviate, "return period", "yr", findings);
        if (d is not { } dd || t is not { } tt)
            return new(durationMin, returnPeriodYr, null, [], 0, 0, Origin, findings);
        RainfallCorner Corner(int i, int j) => new(DurationsMin[i], ReturnPeriodsYr[j], _values[i, j], EntryIntensityMmPerH(i, j));
        RainfallCorner[] corners = [Corner(dd.Low, tt.Low), Corner(dd.Low, tt.High), Corner(dd.High, tt.Low), Corner(dd.High, tt.High)];
        double u = dd.Weight, v = tt.Weight;
        var i = Blend(
            Blend(corners[0].IntensityMmPerH, corners[1].IntensityMmPerH, v),
            Blend(corners[2].IntensityMmPerH, corners[3].IntensityMmPerH, v), u);
        return new(durationMin, returnPeriodYr, i, corners, u, v, Origin, findings);
    }

    /// <summary>The note on what the table's return periods mean, for a run that asks for short ones; once for a run, not for each crossing.</summary>
    /// <param name="shortestReturnPeriodYr">Shortest return period of the run, years.</param>
    /// <returns>Null for annual maxima, and from 10 years on, where the two kinds of series agree.</returns>
    public Finding? SeriesFinding(double shortestReturnPeriodYr) => Series == RainfallSeries.AnnualMaximum || shortestReturnPeriodYr >= 10
        ? null
        : HydrologyFindings.PartialDurationSeries.With(
            $"{Origin}: an average recurrence interval of {shortestReturnPeriodYr:G6} yr has an annual chance of {100 * (1 - Math.Exp(-1 / shortestReturnPeriodYr)):0.0} %"
            + (Series == RainfallSeries.NotStated ? "; the file does not name its series, partial duration is taken" : ""), shortestReturnPeriodYr);

    /// <summary>Standard normal deviate of the annual non-exceedance probability of a return period in this table's series.</summary>
    public double Deviate(double returnPeriodYr) => Normal.InvCDF(
        0, 1, Series == RainfallSeries.AnnualMaximum ? 1 - 1 / returnPeriodYr : Math.Exp(-1 / returnPeriodYr));

    internal static double ToIntensityMmPerH(double value, RainfallMeasure measure, double durationMin) => measure switch
    {
        RainfallMeasure.IntensityMmPerH => value,
        RainfallMeasure.IntensityInPerH => value * 25.4,
        RainfallMeasure.DepthMm => value * 60 / durationMin,
        _ => value * 25.4 * 60 / durationMin,
    };

    // exp of the weighted logs; an entry itself comes back unchanged.
    private static double Blend(double a, double b, double weight) =>
        weight == 0 ? a : weight == 1 ? b : Math.Exp(Math.Log(a) + weight * (Math.Log(b) - Math.Log(a)));

    private (int Low, int High, double Weight)? Bracket(
        IReadOnlyList<double> nodes, double x, Func<double, double> scale, string what, string unit, List<Finding> findings)
    {
        for (var k = 0; k < nodes.Count; k++)
            if (Math.Abs(nodes[k] - x) <= 1e-9 * nodes[k]) return (k, k, 0);
        double first = nodes[0], last = nodes[^1];
        if (x < first || x > last)
        {
            var range = $"{what} {x:G6} {unit} against {first:G6} to {last:G6} {unit} in {Origin}";
            var limit = x < first ? first : last;
            var annualChanceAboveOne = unit == "yr" && Series == RainfallSeries.AnnualMaximum && Math.Min(x, first) <= 1;
            if (nodes.Count < 2 || x < first / ExtensionFactor || x > last * ExtensionFactor || annualChanceAboveOne)
            {
                findings.Add(HydrologyFindings.RainfallBeyondTable.With(range, x, limit));
                return null;
            }
            findings.Add(HydrologyFindings.RainfallExtrapolated.With(range, x, limit));
        }
        var high = 1;
        while (high < nodes.Count - 1 && nodes[high] < x) high++;
        double s0 = scale(nodes[high - 1]), s1 = scale(nodes[high]);
        return (high - 1, high, (scale(x) - s0) / (s1 - s0));
    }
}
