using GeoCulvert.Design.Basis;
using MathNet.Numerics.Distributions;

namespace GeoCulvert.Design.Hydrology;

/// <summary>The equation of one return period: i = a / (t + b)^c.</summary>
/// <param name="ReturnPeriodYr">Return period, years.</param>
/// <param name="ScaleCoefficient">a, for i in mm/h and t in min.</param>
/// <param name="OffsetMin">b, min.</param>
/// <param name="ExponentNumber">c.</param>
/// <param name="WorstMisfitShare">Largest difference from the table it was fitted to, as a share with its sign; null when it was not fitted.</param>
/// <param name="WorstDurationMin">Duration of that difference, min.</param>
public sealed record RainfallEquationRow(
    double ReturnPeriodYr, double ScaleCoefficient, double OffsetMin, double ExponentNumber, double? WorstMisfitShare = null, double? WorstDurationMin = null)
{
    /// <summary>i, mm/h.</summary>
    public double IntensityMmPerH(double durationMin) => ScaleCoefficient / Math.Pow(durationMin + OffsetMin, ExponentNumber);
}

/// <summary>
/// Rainfall as an equation for each return period: i = a / (t + b)^c.
/// <para>Between return periods ln i is linear in the normal deviate, as in a table; outside them there is no value. Outside the stated durations the equation is used up to
/// <see cref="RainfallTable.ExtensionFactor"/>, with a finding; beyond that there is no value.</para>
/// <para>File: <c>return_period_yr</c>, <c>a_mm_per_h</c> or <c>a_in_per_h</c>, <c>b_min</c>, <c>c</c>, optionally <c>shortest_min</c>, <c>longest_min</c>, <c>series</c>.</para>
/// </summary>
public sealed class RainfallEquation : IRainfall
{
    private const double InchMm = 25.4;
    private static readonly double[] ProbesMin = [5, 60, 1440];

    private RainfallEquation(string origin, RainfallSeries series, IReadOnlyList<RainfallEquationRow> rows, double? shortestMin, double? longestMin) =>
        (Origin, Series, Rows, ShortestMin, LongestMin) = (origin, series, rows, shortestMin, longestMin);

    /// <inheritdoc/>
    public string Origin { get; }

    /// <summary>The series behind the equations.</summary>
    public RainfallSeries Series { get; }

    /// <summary>The equations, by rising return period.</summary>
    public IReadOnlyList<RainfallEquationRow> Rows { get; }

    /// <summary>Shortest duration they hold for, min; null when not stated.</summary>
    public double? ShortestMin { get; }

    /// <summary>Longest duration they hold for, min; null when not stated.</summary>
    public double? LongestMin { get; }

    /// <summary>Reads a file of equations.</summary>
    /// <param name="name">File name for errors and for the sheet.</param>
    /// <param name="text">The whole text.</param>
    /// <exception cref="InputException">Everything that is wrong with it.</exception>
    public static RainfallEquation Read(string name, string text)
    {
        var table = PublishedTable.Parse(name, text, "return_period_yr", "b_min", "c");
        var scales = table.Columns.Where(c => c is "a_mm_per_h" or "a_in_per_h").ToArray();
        if (scales.Length != 1) throw new InputException($"{name} line 1", $"the columns {string.Join(", ", table.Columns)}", "one column a_mm_per_h or a_in_per_h");
        var problems = new List<InputProblem>();
        var rows = new List<RainfallEquationRow>();
        var (shortest, longest, series) = ((double?)null, (double?)null, (string?)null);
        foreach (var row in table.Rows)
        {
            try
            {
                double Checked(string column, Func<double, bool> ok, string expected) =>
                    row.Number(column) is var v && ok(v) ? v : throw new InputException($"{name} line {row.Line}, column {column}", $"{v:G6}", expected);
                var t = Checked("return_period_yr", v => v > (rows.Count > 0 ? rows[^1].ReturnPeriodYr : 0), "return periods above zero, rising from row to row");
                var a = Checked(scales[0], v => v > 0, "a number above zero") * (scales[0] == "a_in_per_h" ? InchMm : 1);
                var b = Checked("b_min", v => v >= 0, "minutes, zero or more");
                var c = Checked("c", v => v is > 0 and <= 2, "an exponent above 0, at most 2");
                (shortest, longest) = (Range("shortest_min", shortest), Range("longest_min", longest));
                if (table.Has("series")) series = row.Text("series") is var s && (series is null || s == series) ? s : throw new InputException($"{name} line {row.Line}, column series", $"'{s}' after '{series}'", "one series in a file");
                rows.Add(new(t, a, b, c));

                double? Range(string column, double? before) => !table.Has(column) ? null
                    : Checked(column, v => v > 0 && (before is null || v == before), before is null ? "minutes above zero" : $"the same durations in every row ({before:G6})");
            }
            catch (InputException e)
            {
                problems.AddRange(e.Problems);
            }
        }
        if (problems.Count > 0) throw new InputException(problems);
        if (rows.Count == 0) throw new InputException(name, "no rows", "a row for each return period");
        if (shortest >= longest) throw new InputException($"{name} line 2, column longest_min", $"{longest:G6}", $"more than shortest_min, {shortest:G6}");
        for (var k = 1; k < rows.Count; k++)
            foreach (var d in ProbesMin.Where(d => !(d < shortest) && !(d > longest)))
                if (rows[k].IntensityMmPerH(d) < rows[k - 1].IntensityMmPerH(d))
                    throw new InputException($"{name} line {table.Rows[k].Line}", $"{rows[k].IntensityMmPerH(d):G4} mm/h over {d:G4} min after {rows[k - 1].IntensityMmPerH(d):G4} mm/h at {rows[k - 1].ReturnPeriodYr:G6} yr",
                        "intensities that do not fall as the return period rises");
        return new(name, SeriesOf(name, series), rows, shortest, longest);
    }

    /// <summary>Fits an equation to each return period of a table: least squares of ln i, b from 0 to 200 min.</summary>
    /// <param name="table">Table.</param>
    /// <param name="shortestMin">Shortest duration to use, min.</param>
    /// <param name="longestMin">Longest duration to use, min (a day by default).</param>
    /// <returns>The equations, each with its worst misfit; null when fewer than four durations lie in the range.</returns>
    public static RainfallEquation? Fit(RainfallTable table, double shortestMin = 0, double longestMin = 1440)
    {
        var used = Enumerable.Range(0, table.DurationsMin.Count).Where(k => table.DurationsMin[k] >= shortestMin && table.DurationsMin[k] <= longestMin).ToArray();
        if (used.Length < 4) return null;
        double[] t = [.. used.Select(k => table.DurationsMin[k])];
        var rows = new List<RainfallEquationRow>();
        for (var j = 0; j < table.ReturnPeriodsYr.Count; j++)
        {
            double[] i = [.. used.Select(k => table.EntryIntensityMmPerH(k, j))];
            var (a, b, c) = RainfallEquationFit.LeastSquares(t, i);
            var row = new RainfallEquationRow(table.ReturnPeriodsYr[j], a, b, c);
            var misfits = t.Select((d, k) => row.IntensityMmPerH(d) / i[k] - 1).ToArray();
            var worst = Enumerable.Range(0, t.Length).MaxBy(k => Math.Abs(misfits[k]));
            rows.Add(row with { WorstMisfitShare = misfits[worst], WorstDurationMin = t[worst] });
        }
        return new($"{table.Origin}, fitted equations", table.Series, rows, t[0], t[^1]);
    }

    /// <summary>The finding on the worst misfit, when it exceeds a share; null otherwise.</summary>
    public Finding? MisfitFinding(double share = 0.05) => Rows.Where(r => r.WorstMisfitShare is not null).MaxBy(r => Math.Abs(r.WorstMisfitShare!.Value)) is { } row
        && Math.Abs(row.WorstMisfitShare!.Value) > share
        ? RainfallFindings.EquationMisfit.With($"{100 * row.WorstMisfitShare:+0.0;-0.0} % over {row.WorstDurationMin:G6} min at {row.ReturnPeriodYr:G6} yr in {Origin}", row.WorstMisfitShare, share)
        : null;

    /// <inheritdoc/>
    public RainfallIntensity Intensity(double durationMin, double returnPeriodYr)
    {
        if (!(durationMin > 0) || !double.IsFinite(durationMin)) throw new ArgumentOutOfRangeException(nameof(durationMin));
        if (!(returnPeriodYr > 0) || !double.IsFinite(returnPeriodYr)) throw new ArgumentOutOfRangeException(nameof(returnPeriodYr));
        var findings = new List<Finding>();
        RainfallIntensity None(string what, double value, double limit) =>
            new(durationMin, returnPeriodYr, null, [], 0, 0, Origin, [HydrologyFindings.RainfallBeyondTable.With($"{what} in {Origin}", value, limit)]);
        if (ShortestMin is null || LongestMin is null) findings.Add(RainfallFindings.EquationRangeUnknown.With(Origin));
        if ((durationMin < ShortestMin ? ShortestMin : durationMin > LongestMin ? LongestMin : null) is { } limit)
        {
            var range = $"duration {durationMin:G6} min against {ShortestMin:G6} to {LongestMin:G6} min";
            if (durationMin < ShortestMin / RainfallTable.ExtensionFactor || durationMin > LongestMin * RainfallTable.ExtensionFactor) return None(range, durationMin, limit);
            findings.Add(HydrologyFindings.RainfallExtrapolated.With($"{range} in {Origin}", durationMin, limit));
        }
        for (var k = 0; k < Rows.Count; k++)
        {
            if (Math.Abs(Rows[k].ReturnPeriodYr - returnPeriodYr) <= 1e-9 * returnPeriodYr) return Found([Rows[k]], 0);
            if (k == 0 || !(returnPeriodYr < Rows[k].ReturnPeriodYr) || !(returnPeriodYr > Rows[k - 1].ReturnPeriodYr)) continue;
            double low = Deviate(Rows[k - 1].ReturnPeriodYr), high = Deviate(Rows[k].ReturnPeriodYr);
            if (double.IsFinite(low)) return Found([Rows[k - 1], Rows[k]], (Deviate(returnPeriodYr) - low) / (high - low));
        }
        return None($"return period {returnPeriodYr:G6} yr against {Rows[0].ReturnPeriodYr:G6} to {Rows[^1].ReturnPeriodYr:G6} yr", returnPeriodYr,
            returnPeriodYr < Rows[0].ReturnPeriodYr ? Rows[0].ReturnPeriodYr : Rows[^1].ReturnPeriodYr);

        RainfallIntensity Found(RainfallEquationRow[] rows, double weight)
        {
            RainfallCorner[] corners = [.. rows.Select(r => new RainfallCorner(durationMin, r.ReturnPeriodYr, r.IntensityMmPerH(durationMin), r.IntensityMmPerH(durationMin)))];
            var i = Math.Exp((1 - weight) * Math.Log(corners[0].IntensityMmPerH) + weight * Math.Log(corners[^1].IntensityMmPerH));
            return new(durationMin, returnPeriodYr, i, [corners[0], corners[^1], corners[0], corners[^1]], 0, weight, Origin, findings);
        }
    }

    private double Deviate(double years) => Series == RainfallSeries.AnnualMaximum
        ? years > 1 ? Normal.InvCDF(0, 1, 1 - 1 / years) : double.NegativeInfinity
        : Normal.InvCDF(0, 1, Math.Exp(-1 / years));

    private static RainfallSeries SeriesOf(string name, string? text) => string.IsNullOrEmpty(text) ? RainfallSeries.NotStated
        : text.Contains("partial", StringComparison.OrdinalIgnoreCase) ? RainfallSeries.PartialDuration
        : text.Contains("annual", StringComparison.OrdinalIgnoreCase) ? RainfallSeries.AnnualMaximum
        : throw new InputException($"{name} line 2, column series", $"'{text}'", "partial duration or annual maximum");
}

/// <summary>Least squares of ln i = ln a - c ln(t + b).</summary>
internal static class RainfallEquationFit
{
    private const double MostOffsetMin = 200;
    private const int Probes = 400;

    /// <summary>a, b, c: for each b the line is exact algebra; the best b is bracketed on a grid and closed in by golden section.</summary>
    public static (double A, double B, double C) LeastSquares(double[] t, double[] i)
    {
        double At(int k) => MostOffsetMin * k * k / (Probes * (double)Probes); // finer near zero
        var best = Enumerable.Range(0, Probes + 1).MinBy(k => Line(t, i, At(k)).Sum);
        double low = At(Math.Max(0, best - 1)), high = At(Math.Min(Probes, best + 1));
        var golden = (Math.Sqrt(5) - 1) / 2;
        while (high - low > 1e-10 * (1 + high))
        {
            double left = high - golden * (high - low), right = low + golden * (high - low);
            if (Line(t, i, left).Sum <= Line(t, i, right).Sum) high = right;
            else low = left;
        }
        var b = (low + high) / 2;
        if (Line(t, i, 0).Sum <= Line(t, i, b).Sum) b = 0;
        var (a, c, _) = Line(t, i, b);
        return (a, b, c);
    }

    private static (double A, double C, double Sum) Line(double[] t, double[] i, double b)
    {
        double[] x = [.. t.Select(d => Math.Log(d + b))], y = [.. i.Select(v => Math.Log(v))];
        double mx = x.Average(), my = y.Average();
        var slope = x.Zip(y, (p, q) => (p - mx) * (q - my)).Sum() / x.Sum(p => (p - mx) * (p - mx));
        var sum = x.Zip(y, (p, q) => my + slope * (p - mx) - q).Sum(r => r * r);
        return (Math.Exp(my - slope * mx), -slope, sum);
    }
}
