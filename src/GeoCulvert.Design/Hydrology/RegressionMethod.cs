using GeoCulvert.Design.Basis;
using MathNet.Numerics.Distributions;

namespace GeoCulvert.Design.Hydrology;

/// <summary>
/// Peak flow from published regional regression equations, which are data (<see cref="RegressionEquationSet"/>).
/// <para>Notation: Q flow, SE standard error (% of Q), sigma standard deviation of ln Q, z normal deviate of the interval.</para>
/// <para>Variables go in, and Q comes out, in the report's own units. Interval: sigma = (ln(1 + (SE/100)^2))^0.5 for log-normal errors,
/// Q exp(-+ z sigma). Where the report gives a covariance matrix its interval is wider for basins far from the mean; that is not covered here.</para>
/// <para>Return periods between two equations are interpolated (log flow against normal deviate) and flagged; outside there is no flow.</para>
/// </summary>
/// <param name="Set">The equations.</param>
/// <param name="Region">The region.</param>
/// <param name="ConfidenceShare">Probability inside the interval (0.90 by default).</param>
public sealed record RegressionMethod(RegressionEquationSet Set, string Region, double ConfidenceShare = 0.90) : IPeakFlowMethod
{
    /// <inheritdoc/>
    public string Name => "regression";

    /// <inheritdoc/>
    public PeakFlow Compute(Catchment catchment, double returnPeriodYr, PeakFlowContext context)
    {
        var equations = Set.Of(Region);
        if (equations.Count == 0)
            return PeakFlow.Missing(Name, returnPeriodYr, $"set {Set.Id} has no region '{Region}', only {string.Join(", ", Set.Regions)}");
        var periods = equations.Select(e => e.ReturnPeriodYr).ToList();
        if (FlowFrequency.Bracket(periods, returnPeriodYr) is not { } bracket) return FlowFrequency.Beyond(Name, returnPeriodYr, periods);
        var low = At(equations.First(e => e.ReturnPeriodYr == bracket.Low), catchment);
        return bracket.Low == bracket.High
            ? low with { ReturnPeriodYr = returnPeriodYr }
            : FlowFrequency.Between(Name, returnPeriodYr, low, At(equations.First(e => e.ReturnPeriodYr == bracket.High), catchment), bracket.Weight);
    }

    private PeakFlow At(RegressionEquation equation, Catchment catchment)
    {
        var values = new Dictionary<string, double>(StringComparer.Ordinal);
        var steps = new List<Step>();
        var findings = new List<Finding>();
        var withoutRange = new List<string>();
        foreach (var name in equation.Equation.Names)
        {
            var variable = Set.Variable(name, Region)!;
            if (ValueOf(variable, catchment, out var origin, out var trouble) is not { } value) return PeakFlow.Missing(Name, equation.ReturnPeriodYr, trouble);
            values[name] = value;
            steps.Add(new(name, value, variable.Unit, "", origin));
            var (low, high) = variable.Range;
            if (low is null || high is null) withoutRange.Add($"{name} {value:G5} {variable.Unit}".TrimEnd());
            if (value < low || value > high)
                findings.Add(HydrologyFindings.RegressionRange.With(
                    $"{Set.Id}, {Region}: {name} {value:G5} {variable.Unit} against {low:G5} to {high:G5}", value, value < low ? low : high));
        }
        if (withoutRange.Count > 0) findings.Add(HydrologyFindings.RegressionRangeUnknown.With($"{Set.Id}, {Region}: {string.Join(", ", withoutRange)}"));
        var printed = equation.Equation.Value(values);
        if (!double.IsFinite(printed) || printed < 0)
            return PeakFlow.Missing(Name, equation.ReturnPeriodYr, $"{equation.Equation.WithNumbers(values)} gives no flow") with { Steps = steps };
        var flow = Units.ToSi(printed, equation.FlowUnit);
        var suffix = Units.Get(equation.FlowUnit).Suffix;
        if (suffix != "m3_s") steps.Add(new($"flow_{suffix}", printed, equation.FlowUnit, equation.Equation.WithNumbers(values), equation.Source.ToString()));
        steps.Add(new("flow_m3_s", flow, "m3/s", suffix == "m3_s" ? equation.Equation.WithNumbers(values) : $"{printed:G6} {equation.FlowUnit}",
            equation.Source.ToString()));
        if (equation.StandardErrorPct is not { } se) return new(Name, equation.ReturnPeriodYr, flow, null, null, steps, findings);
        var sigma = Math.Sqrt(Math.Log(1 + se * se / 1e4));
        var factor = Math.Exp(Normal.InvCDF(0, 1, (1 + ConfidenceShare) / 2) * sigma);
        steps.Add(new("standard_error_pct", se, "%", "", equation.Source.ToString()));
        steps.Add(new("interval_factor", factor, "", $"exp(z ({ConfidenceShare:0.00}) x (ln(1 + {se / 100:0.00}^2))^0.5)", "log-normal errors"));
        return new(Name, equation.ReturnPeriodYr, flow, flow / factor, flow * factor, steps, findings);
    }

    private static double? ValueOf(RegressionVariable variable, Catchment catchment, out string origin, out string trouble)
    {
        trouble = "";
        if (catchment.Characteristics.TryGetValue(variable.Name, out var named))
        {
            origin = named.Origin;
            if (!double.IsFinite(named.Value))
            {
                trouble = $"{variable.Name} is not a number";
                return null;
            }
            // A figure without a unit is taken as it is only where no unit can be meant.
            if (named.Unit == variable.Unit) return named.Value;
            Unit? from = Units.Find(named.Unit.Length == 0 ? "m/m" : named.Unit), to = Units.Find(variable.Unit.Length == 0 ? "m/m" : variable.Unit);
            var percentWithoutUnit = named.Unit.Length == 0 && to?.Symbol == "%";
            if (from is not null && from.Dimension == to?.Dimension && !percentWithoutUnit) return named.Value * from.InSi / to.InSi;
            trouble = $"{variable.Name} is given as '{named.Value:G6} {named.Unit}'".TrimEnd() + $" and wanted in {(variable.Unit.Length == 0 ? "a pure number" : variable.Unit)}";
            return null;
        }
        origin = $"catchment, {variable.Quantity?.Name}";
        if (variable.Quantity?.InSi(catchment) is { } own && double.IsFinite(own)) return variable.Unit.Length == 0 ? own : Units.FromSi(own, variable.Unit);
        trouble = $"no value for {variable.Name} ({variable.Description}, {(variable.Unit.Length == 0 ? "no unit" : variable.Unit)})";
        return null;
    }
}
