using GeoCulvert.Design.Basis;

namespace GeoCulvert.Design.Hydrology;

/// <summary>Rain of a design storm as a mass curve: depth fallen up to a time, straight between its points.</summary>
/// <param name="TimesMin">Times, min, rising from 0.</param>
/// <param name="CumulativeMm">Depth fallen up to each time, mm, from 0, not falling.</param>
public sealed record MassCurve(IReadOnlyList<double> TimesMin, IReadOnlyList<double> CumulativeMm)
{
    /// <summary>Length of the storm, min.</summary>
    public double DurationMin => TimesMin[^1];

    /// <summary>Depth of the storm, mm.</summary>
    public double DepthMm => CumulativeMm[^1];

    /// <summary>Depth fallen up to a time, mm; the whole depth after the end.</summary>
    public double AtMm(double timeMin)
    {
        if (timeMin <= TimesMin[0]) return CumulativeMm[0];
        if (timeMin >= TimesMin[^1]) return CumulativeMm[^1];
        int low = 0, high = TimesMin.Count - 1;
        while (high - low > 1)
        {
            var middle = (low + high) / 2;
            if (TimesMin[middle] <= timeMin) low = middle;
            else high = middle;
        }
        return CumulativeMm[low] + (timeMin - TimesMin[low]) / (TimesMin[high] - TimesMin[low]) * (CumulativeMm[high] - CumulativeMm[low]);
    }

    /// <summary>Largest depth in any stretch of a length, mm, beginning at a point of the curve or ending at one.</summary>
    public double LargestDepthMm(double lengthMin) => Math.Max(
        TimesMin.Max(t => AtMm(t + lengthMin) - AtMm(t)), TimesMin.Max(t => AtMm(t) - AtMm(t - lengthMin)));
}

/// <summary>A design storm with what it was made of.</summary>
/// <param name="Name">Name of the storm.</param>
/// <param name="Rain">The mass curve; null when the storm could not be made (see the findings).</param>
/// <param name="Steps">The calculation, line by line.</param>
/// <param name="Findings">Doubts.</param>
public sealed record DesignStorm(string Name, MassCurve? Rain, IReadOnlyList<Step> Steps, IReadOnlyList<Finding> Findings)
{
    /// <summary>A storm that could not be made, and why.</summary>
    public static DesignStorm Missing(string name, string what, IReadOnlyList<Finding>? findings = null) =>
        new(name, null, [], [HydrologyFindings.InputMissing.With($"storm {name}: {what}"), .. findings ?? []]);
}

/// <summary>A way to make the design storm of a return period.</summary>
public interface IDesignStorm
{
    /// <summary>Stable name: <c>type-II</c>, <c>nested</c>, <c>given</c>.</summary>
    string Name { get; }

    /// <summary>Makes the storm; a missing figure is a finding, not an exception.</summary>
    DesignStorm Build(double returnPeriodYr, PeakFlowContext context);
}

/// <summary>
/// The 24-hour storms of the NRCS: the share of the day's rain fallen up to each hour, times the 24-hour depth. Most ordinates are from memory, which the
/// storm says; they are held up by the unit-peak curves of TR-55, which were made with these storms.
/// </summary>
public sealed record NrcsStorm(NrcsStormType Type) : IDesignStorm
{
    /// <summary>Time of concentration below which the ordinates are too far apart, min: against the unit-peak curves of TR-55 peaks come out up to 18 % low at 6 min.</summary>
    public const double CoarseBelowMin = 15;

    private static readonly Dictionary<NrcsStormType, (double Hour, double Share, bool FromMemory)[]> Table =
        PublishedTable.Embedded("Hydrology/Tables/storm_distributions.csv").Rows
            .GroupBy(r => Enum.Parse<NrcsStormType>(r.Text("storm")))
            .ToDictionary(g => g.Key, g => g.Select(r => (r.Number("hour"), r.Number("cumulative_share"), r.Text("status") == "MEMORY")).ToArray());

    /// <inheritdoc/>
    public string Name => $"type-{Type}";

    /// <summary>24-hour rainfall given outright, mm; goes before the rainfall table.</summary>
    public double? GivenDepthMm { get; init; }

    /// <summary>The storm of 1 mm.</summary>
    public static MassCurve Unit(NrcsStormType type) => new([.. Table[type].Select(r => 60 * r.Hour)], [.. Table[type].Select(r => r.Share)]);

    /// <inheritdoc/>
    public DesignStorm Build(double returnPeriodYr, PeakFlowContext context)
    {
        var (steps, findings) = (new List<Step>(), new List<Finding>());
        if (CurveNumberInputs.DailyDepthMm(GivenDepthMm, returnPeriodYr, context, steps, findings) is not { } depth)
            return DesignStorm.Missing(Name, "no 24-hour rainfall above zero", findings);
        var memory = Table[Type].Count(r => r.FromMemory);
        if (memory > 0) findings.Add(NrcsFindings.StormFromMemory.With($"type {Type}: {memory} of {Table[Type].Length} ordinates"));
        var unit = Unit(Type);
        return new(Name, new(unit.TimesMin, [.. unit.CumulativeMm.Select(s => s * depth)]), steps, findings);
    }
}
