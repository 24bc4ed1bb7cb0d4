using GeoCulvert.Design.Basis;

namespace GeoCulvert.Design.Hydrology;

/// <summary>The flow for one return period: the chosen method's, beside all others.</summary>
/// <param name="ReturnPeriodYr">Return period, years.</param>
/// <param name="Chosen">The named method's flow; its value is null when that method gave none.</param>
/// <param name="All">Every method's flow, in the order of the methods.</param>
/// <param name="SpreadRatio">Largest over smallest flow; null with fewer than two.</param>
/// <param name="Findings">Doubts of the chosen method and about the choice; doubts of the others stay with them in <see cref="All"/>.</param>
public sealed record DesignFlow(
    double ReturnPeriodYr, PeakFlow Chosen, IReadOnlyList<PeakFlow> All, double? SpreadRatio, IReadOnlyList<Finding> Findings)
{
    /// <summary>The design value, m3/s; null when the chosen method gave none.</summary>
    public double? FlowM3PerS => Chosen.FlowM3PerS;

    /// <summary>The chosen method's flow with 20 % less and more time of concentration; null when there is no time.</summary>
    public TimeSensitivity? TimeSensitivity { get; init; }
}

/// <summary>Rule that takes the design value out of several methods: the named one, never another in its place.</summary>
/// <param name="Method">The method's name.</param>
/// <param name="DifferenceFactor">Largest over smallest flow above which a finding is raised (2 by default).</param>
public sealed record DesignFlowRule(string Method, double DifferenceFactor = 2)
{
    /// <summary>Computes all methods at all return periods.</summary>
    /// <exception cref="ArgumentException">The named method is not among them (a programmer's error: settings are checked before).</exception>
    public IReadOnlyList<DesignFlow> Compute(
        Catchment catchment, IReadOnlyList<IPeakFlowMethod> methods, IReadOnlyList<double> returnPeriodsYr, PeakFlowContext context)
    {
        var named = methods.FirstOrDefault(m => m.Name == Method);
        var flows = returnPeriodsYr.Select(t => Choose([.. methods.Select(m => m.Compute(catchment, t, context))]) with
        {
            TimeSensitivity = named is null ? null : TimeSensitivity.Of(named, catchment, t, context),
        }).ToArray();
        for (var k = 0; k < flows.Length; k++)
        {
            // Return periods may be listed in any order: compare with the next shorter one.
            var before = flows.Where(f => f.ReturnPeriodYr < flows[k].ReturnPeriodYr).MaxBy(f => f.ReturnPeriodYr);
            if (flows[k].FlowM3PerS < before?.FlowM3PerS)
                flows[k] = flows[k] with
                {
                    Findings = [.. flows[k].Findings, HydrologyFindings.FlowFalls.With(
                        $"{Method}: {flows[k].FlowM3PerS:G4} m3/s at {flows[k].ReturnPeriodYr:G6} yr after {before.FlowM3PerS:G4} m3/s at {before.ReturnPeriodYr:G6} yr",
                        flows[k].FlowM3PerS, before.FlowM3PerS)],
                };
        }
        return flows;
    }

    /// <summary>Chooses among the flows of one return period.</summary>
    /// <exception cref="ArgumentException">The named method is not among them.</exception>
    public DesignFlow Choose(IReadOnlyList<PeakFlow> all)
    {
        var chosen = all.FirstOrDefault(f => f.Method == Method) ?? throw new ArgumentException($"No method '{Method}' among the flows.", nameof(all));
        var findings = chosen.Findings.ToList();
        if (chosen.FlowM3PerS is null)
            findings.Add(HydrologyFindings.NoDesignFlow.With($"{Method} at {chosen.ReturnPeriodYr:G6} yr"));
        else
            findings.AddRange(all.Where(f => f.FlowM3PerS is null).Select(f => HydrologyFindings.OtherMethodMissing.With(string.Join("; ", f.Findings.Select(k => k.Text)))));
        var values = all.Where(f => f.FlowM3PerS > 0).Select(f => f.FlowM3PerS!.Value).ToArray();
        double? spread = values.Length > 1 ? values.Max() / values.Min() : null;
        if (spread > DifferenceFactor)
            findings.Add(HydrologyFindings.FlowSpread.With(
                $"{chosen.ReturnPeriodYr:G6} yr: " + string.Join(", ", all.Where(f => f.FlowM3PerS is not null).Select(f => $"{f.Method} {f.FlowM3PerS:G4} m3/s")),
                spread, DifferenceFactor));
        return new(chosen.ReturnPeriodYr, chosen, all, spread, findings);
    }
}
