using GeoCulvert.Design.Basis;
using GeoCulvert.Design.Hydrology;

namespace GeoCulvert.Design.Study;

/// <summary>How design flows are computed in a run.</summary>
/// <param name="Methods">Peak-flow methods, in the order asked for.</param>
/// <param name="ChosenMethod">Name of the method that sets the design value.</param>
/// <param name="ReturnPeriodsYr">Return periods asked for, years.</param>
/// <param name="Times">Methods for the time of concentration; empty when no method needs one.</param>
/// <param name="TimeRule">How one of them is chosen.</param>
/// <param name="Rainfall">Rainfall, or null when no method needs it.</param>
public sealed record FlowSettings(
    IReadOnlyList<IPeakFlowMethod> Methods,
    string ChosenMethod,
    IReadOnlyList<double> ReturnPeriodsYr,
    IReadOnlyList<ITimeOfConcentration> Times,
    TimeOfConcentrationRule TimeRule,
    IRainfall? Rainfall);

/// <summary>Flows of one crossing.</summary>
/// <param name="Catchment">What the methods knew.</param>
/// <param name="Time">Time of concentration, or null when none was asked for.</param>
/// <param name="Flows">One for each return period, rising.</param>
/// <param name="Design">The design flood.</param>
/// <param name="Check">The check flood.</param>
/// <param name="Findings">Doubts, each once.</param>
public sealed record FlowResult(
    Catchment Catchment,
    ChosenTimeOfConcentration? Time,
    IReadOnlyList<DesignFlow> Flows,
    DesignFlow Design,
    DesignFlow Check,
    IReadOnlyList<Finding> Findings)
{
    /// <summary>The same with floods given for this crossing in place of the methods' values; the methods' flows stay beside them.</summary>
    public FlowResult WithGiven(double? designM3PerS, double? checkM3PerS, string origin)
    {
        DesignFlow Replace(DesignFlow flow, double? given)
        {
            if (given is not { } q) return flow;
            var peak = new PeakFlow("given", flow.ReturnPeriodYr, q, null, null, [new Step("flow_m3_s", q, "m3/s", "", origin)], []);
            return flow with { Chosen = peak, All = [peak, .. flow.All] };
        }

        if (designM3PerS is null && checkM3PerS is null) return this;
        var (design, check) = (Replace(Design, designM3PerS), Replace(Check, checkM3PerS));
        return this with { Design = design, Check = check, Flows = [.. Flows.Select(f => f == Design ? design : f == Check ? check : f)] };
    }
}

/// <summary>From a catchment to its flows.</summary>
public static class FlowStage
{
    /// <summary>Computes every method at every return period, the design and check floods among them.</summary>
    /// <param name="catchment">The land above the crossing.</param>
    /// <param name="settings">Methods and rules.</param>
    /// <param name="designReturnPeriodYr">Design flood, years.</param>
    /// <param name="checkReturnPeriodYr">Check flood, years.</param>
    /// <param name="givenTimeOfConcentrationMin">A time of concentration set for this crossing; goes before the methods.</param>
    public static FlowResult Compute(
        Catchment catchment, FlowSettings settings, double designReturnPeriodYr, double checkReturnPeriodYr, double? givenTimeOfConcentrationMin)
    {
        ArgumentNullException.ThrowIfNull(settings);
        var time = Time(catchment, settings, givenTimeOfConcentrationMin, designReturnPeriodYr);
        var periods = settings.ReturnPeriodsYr.Append(designReturnPeriodYr).Append(checkReturnPeriodYr).Distinct().Order().ToArray();
        var flows = new DesignFlowRule(settings.ChosenMethod)
            .Compute(catchment, settings.Methods, periods, new PeakFlowContext(settings.Rainfall, time?.TimeMin));
        var design = flows.First(f => f.ReturnPeriodYr == designReturnPeriodYr);
        var check = flows.First(f => f.ReturnPeriodYr == checkReturnPeriodYr);
        var findings = (time?.Findings ?? []).Concat(flows.SelectMany(f => f.Findings)).DistinctBy(f => (f.Code, f.Text)).ToArray();
        return new FlowResult(catchment, time, flows, design, check, Merge(findings));
    }

    private static ChosenTimeOfConcentration? Time(Catchment catchment, FlowSettings settings, double? givenMin, double designReturnPeriodYr)
    {
        if (givenMin is { } t)
        {
            var given = new TimeOfConcentration("given", t, [], [new Step("time_of_concentration_min", t, "min", "", "given for this crossing")], []);
            return new ChosenTimeOfConcentration(t, t, "given", [given], null, []);
        }

        return settings.Times.Count == 0
            ? null
            : settings.TimeRule.Compute(catchment, settings.Times, new TimeOfConcentrationContext(settings.Rainfall, null, designReturnPeriodYr));
    }

    /// <summary>One finding for each code: the same doubt at five return periods is one doubt; the worst value stands.</summary>
    private static Finding[] Merge(IReadOnlyList<Finding> findings) =>
    [
        .. findings.GroupBy(f => f.Code).Select(g => g.Count() == 1
            ? g.First()
            : g.OrderByDescending(f => Math.Abs(f.Value ?? 0)).First() with { Text = string.Join("; ", g.Select(f => f.Text).Take(4)) + (g.Count() > 4 ? $"; and {g.Count() - 4} more" : "") }),
    ];
}
