using GeoCulvert.Design.Basis;

namespace GeoCulvert.Design.Hydrology;

/// <summary>How one time of concentration is taken out of several.</summary>
public enum TimeOfConcentrationChoice
{
    /// <summary>The method named in the rule.</summary>
    Named,

    /// <summary>The median; of an even number, the mean of the middle two.</summary>
    Median,

    /// <summary>The shortest, which gives the highest intensity.</summary>
    Smallest,

    /// <summary>The longest.</summary>
    Largest,
}

/// <summary>The time of concentration that was chosen, beside all that were computed.</summary>
/// <param name="TimeMin">The chosen time, not below the least time, min; null when there is none.</param>
/// <param name="ComputedTimeMin">The same before the least time was applied, min.</param>
/// <param name="Choice">The method's name, or "median", "smallest", "largest".</param>
/// <param name="All">Every method's result.</param>
/// <param name="SpreadRatio">Longest over shortest; null with fewer than two.</param>
/// <param name="Findings">Doubts about the choice and about the methods that have a part in it.</param>
public sealed record ChosenTimeOfConcentration(
    double? TimeMin, double? ComputedTimeMin, string Choice, IReadOnlyList<TimeOfConcentration> All, double? SpreadRatio,
    IReadOnlyList<Finding> Findings);

/// <summary>Rule that takes one time of concentration out of several methods.</summary>
/// <param name="Choice">How.</param>
/// <param name="Method">The method's name, for <see cref="TimeOfConcentrationChoice.Named"/>.</param>
/// <param name="LeastTimeMin">Least time, min (5 by default; agencies use 5 to 10, common practice).</param>
/// <param name="SpreadFactor">Longest over shortest above which a finding is raised (4 by default).</param>
public sealed record TimeOfConcentrationRule(
    TimeOfConcentrationChoice Choice, string? Method = null, double LeastTimeMin = 5, double SpreadFactor = 4)
{
    /// <summary>Computes all methods and chooses. A named method that gave nothing is not replaced by another.</summary>
    public ChosenTimeOfConcentration Compute(Catchment catchment, IReadOnlyList<ITimeOfConcentration> methods, TimeOfConcentrationContext context) =>
        Choose([.. methods.Select(m => m.Compute(catchment, context))]);

    /// <summary>Chooses among results.</summary>
    /// <exception cref="ArgumentException">The named method is not among them (a programmer's error: settings are checked before).</exception>
    public ChosenTimeOfConcentration Choose(IReadOnlyList<TimeOfConcentration> all)
    {
        var named = Choice == TimeOfConcentrationChoice.Named
            ? all.FirstOrDefault(t => t.Method == Method) ?? throw new ArgumentException($"No method '{Method}' among the results.", nameof(all))
            : null;
        var times = all.Where(t => t.TimeMin is not null).Select(t => t.TimeMin!.Value).Order().ToArray();
        double? computed = Choice switch
        {
            TimeOfConcentrationChoice.Named => named!.TimeMin,
            _ when times.Length == 0 => null,
            TimeOfConcentrationChoice.Median => (times[(times.Length - 1) / 2] + times[times.Length / 2]) / 2,
            TimeOfConcentrationChoice.Smallest => times[0],
            _ => times[^1],
        };
        // Doubts of a method that has no part in the choice stay with it in All.
        var part = named is not null ? [named] : times.Length == 0 ? all : [.. all.Where(t => t.TimeMin is not null)];
        var findings = part.SelectMany(t => t.Findings).ToList();
        if (computed is not null)
            findings.AddRange(all.Where(t => t.TimeMin is null).Select(t => HydrologyFindings.OtherMethodMissing.With(
                string.Join("; ", t.Findings.Select(f => f.Text)))));
        double? spread = times.Length > 1 ? times[^1] / times[0] : null;
        if (spread > SpreadFactor)
            findings.Add(HydrologyFindings.TimeSpread.With(
                "Times of concentration: " + string.Join(", ", all.Where(t => t.TimeMin is not null).Select(t => $"{t.Method} {t.TimeMin:0.0} min")),
                spread, SpreadFactor));
        if (computed < LeastTimeMin)
            findings.Add(HydrologyFindings.TimeFloor.With($"{computed:0.0} min computed, {LeastTimeMin:0.#} min used", computed, LeastTimeMin));
        return new(
            computed is { } c ? Math.Max(c, LeastTimeMin) : null, computed,
            Choice == TimeOfConcentrationChoice.Named ? Method! : Choice.ToString().ToLowerInvariant(), all, spread, findings);
    }
}
