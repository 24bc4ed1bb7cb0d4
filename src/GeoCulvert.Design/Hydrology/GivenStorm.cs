using GeoCulvert.Design.Basis;

namespace GeoCulvert.Design.Hydrology;

/// <summary>
/// A storm of the user: CSV with a time column (<c>time_min</c> or <c>time_h</c>, rising) and one of <c>depth_mm</c>, <c>depth_in</c> (rain since the row before),
/// <c>cumulative_mm</c>, <c>cumulative_in</c> (rain since the beginning) or <c>cumulative_share</c> (0 to 1, times the depth of the storm's duration).
/// </summary>
public sealed class GivenStorm : IDesignStorm
{
    private const string TimeExpected = "a column time_min or time_h";
    private const double InchMm = 25.4;
    private static readonly Dictionary<string, (double Mm, bool Cumulative)> Depths = new(StringComparer.OrdinalIgnoreCase)
    {
        ["depth_mm"] = (1, false), ["depth_in"] = (InchMm, false), ["cumulative_mm"] = (1, true), ["cumulative_in"] = (InchMm, true), ["cumulative_share"] = (1, true),
    };

    private readonly string _origin;
    private readonly MassCurve _curve;
    private readonly bool _isShare;

    private GivenStorm(string origin, MassCurve curve, bool isShare) => (_origin, _curve, _isShare) = (origin, curve, isShare);

    /// <inheritdoc/>
    public string Name => "given";

    /// <summary>Depth for a file of shares, mm; null takes the depth of the storm's duration from the rainfall.</summary>
    public double? GivenDepthMm { get; private init; }

    /// <summary>Whether the file holds shares, which need a depth.</summary>
    public bool NeedsDepth => _isShare;

    /// <summary>The same storm with a depth for its shares.</summary>
    public GivenStorm WithDepthMm(double? depthMm) => new(_origin, _curve, _isShare) { GivenDepthMm = depthMm };

    /// <summary>Reads a storm.</summary>
    /// <param name="name">File name for errors and for the sheet.</param>
    /// <param name="text">The whole text.</param>
    /// <exception cref="InputException">Everything that is wrong with it.</exception>
    public static GivenStorm Read(string name, string text)
    {
        var table = PublishedTable.Parse(name, text);
        var times = table.Columns.Where(c => c is "time_min" or "time_h").ToArray();
        var depths = table.Columns.Where(Depths.ContainsKey).ToArray();
        if (times.Length != 1) throw new InputException($"{name} line 1", $"the columns {string.Join(", ", table.Columns)}", TimeExpected);
        if (depths.Length != 1) throw new InputException($"{name} line 1", $"the columns {string.Join(", ", table.Columns)}", $"one of the columns {string.Join(", ", Depths.Keys)}");
        var (mm, cumulative) = Depths[depths[0]];
        var minutes = times[0] == "time_h" ? 60 : 1;
        var isShare = depths[0].Equals("cumulative_share", StringComparison.OrdinalIgnoreCase);

        var problems = new List<InputProblem>();
        var (t, p) = (new List<double> { 0 }, new List<double> { 0 });
        var first = true;
        foreach (var row in table.Rows)
        {
            try
            {
                double time = row.Number(times[0]) * minutes, value = row.Number(depths[0]) * mm;
                if (value < 0) throw new InputException($"{name} line {row.Line}, column {depths[0]}", $"{row.Text(depths[0])}", "a depth of zero or more");
                if (first && time == 0)
                {
                    if (value > 0) throw new InputException($"{name} line {row.Line}, column {depths[0]}", $"{row.Text(depths[0])} at time 0", "0 at time 0, where the storm begins");
                }
                else if (time <= t[^1])
                    throw new InputException($"{name} line {row.Line}, column {times[0]}", $"{row.Text(times[0])} after {t[^1] / minutes:G6}", first ? "a time above zero" : "times rising from row to row");
                else
                {
                    var total = cumulative ? value : p[^1] + value;
                    if (total < p[^1]) throw new InputException($"{name} line {row.Line}, column {depths[0]}", $"{row.Text(depths[0])} after {p[^1] / mm:G6}", "a sum that does not fall");
                    t.Add(time);
                    p.Add(total);
                }
            }
            catch (InputException e)
            {
                problems.AddRange(e.Problems);
            }
            first = false;
        }
        if (problems.Count > 0) throw new InputException(problems);
        if (t.Count < 2) throw new InputException(name, "no rows with rain", $"rows such as 5,1.2 under {times[0]},{depths[0]}");
        if (isShare && Math.Abs(p[^1] - 1) > 0.0005) throw new InputException($"{name} line {table.Rows[^1].Line}, column {depths[0]}", $"{p[^1]:G6} at the end", "a share that ends at 1");
        return p[^1] > 0 ? new(name, new(t, isShare ? [.. p.Select(s => s / p[^1])] : p), isShare) : throw new InputException(name, "no rain at all", "a depth above zero in some row");
    }

    /// <inheritdoc/>
    public DesignStorm Build(double returnPeriodYr, PeakFlowContext context)
    {
        if (!_isShare)
            return new(Name, _curve, [new("storm_depth_mm", _curve.DepthMm, "mm", "", _origin), new("storm_duration_min", _curve.DurationMin, "min", "", _origin)], []);
        var found = GivenDepthMm is null ? context.Rainfall?.Intensity(_curve.DurationMin, returnPeriodYr) : null;
        if ((GivenDepthMm ?? found?.DepthMm) is not { } depth || !(depth > 0) || !double.IsFinite(depth))
            return DesignStorm.Missing(Name, $"no depth above zero for {_curve.DurationMin:G6} min", found?.Findings);
        return new(Name, new(_curve.TimesMin, [.. _curve.CumulativeMm.Select(s => s * depth)]),
            [new("storm_depth_mm", depth, "mm", $"depth of {_curve.DurationMin:G6} min", found?.Origin ?? "given"), new("storm_duration_min", _curve.DurationMin, "min", "", _origin)],
            found?.Findings ?? []);
    }
}
