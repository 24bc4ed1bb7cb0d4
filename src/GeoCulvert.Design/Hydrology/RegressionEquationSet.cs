using GeoCulvert.Design.Basis;

namespace GeoCulvert.Design.Hydrology;

/// <summary>A variable of a set of regression equations.</summary>
/// <param name="Name">Its name in the equations.</param>
/// <param name="Unit">The unit the equations want it in; "" for a pure number.</param>
/// <param name="Quantity">The catchment's own figure that serves for it (<see cref="RegressionQuantity"/>); null when it must be given by name.</param>
/// <param name="Description">What it is.</param>
/// <param name="Range">Smallest and largest value of the basins behind the equations, in <paramref name="Unit"/>; null when not known.</param>
/// <param name="Region">Region the row holds for; null for all.</param>
public sealed record RegressionVariable(
    string Name, string Unit, RegressionQuantity? Quantity, string Description, (double? Low, double? High) Range, string? Region);

/// <summary>One equation for one region and return period.</summary>
/// <param name="Region">Region name.</param>
/// <param name="ReturnPeriodYr">Return period, years.</param>
/// <param name="Equation">Right-hand side.</param>
/// <param name="FlowUnit">Unit of the left-hand side: "cfs" or "m3/s".</param>
/// <param name="StandardErrorPct">Standard error of the equation in percent of the flow; null when not known.</param>
/// <param name="Source">Report, place and status.</param>
public sealed record RegressionEquation(
    string Region, double ReturnPeriodYr, EquationText Equation, string FlowUnit, double? StandardErrorPct, Source Source);

/// <summary>A published set of regression equations.</summary>
/// <param name="Id">Short id.</param>
/// <param name="Variables">Variables with unit and range; one name may appear once for each region.</param>
/// <param name="Equations">Equations.</param>
public sealed record RegressionEquationSet(
    string Id, IReadOnlyList<RegressionVariable> Variables, IReadOnlyList<RegressionEquation> Equations)
{
    /// <summary>Regions, in the order of the equations.</summary>
    public IReadOnlyList<string> Regions => [.. Equations.Select(e => e.Region).Distinct(StringComparer.OrdinalIgnoreCase)];

    /// <summary>The equations of a region by return period, rising; empty when there is no such region.</summary>
    public IReadOnlyList<RegressionEquation> Of(string region) =>
        [.. Equations.Where(e => string.Equals(e.Region, region, StringComparison.OrdinalIgnoreCase)).OrderBy(e => e.ReturnPeriodYr)];

    /// <summary>The variable with a name, its regional row first; null when there is none.</summary>
    public RegressionVariable? Variable(string name, string region) =>
        Variables.FirstOrDefault(v => v.Name == name && string.Equals(v.Region, region, StringComparison.OrdinalIgnoreCase))
        ?? Variables.FirstOrDefault(v => v.Name == name && v.Region is null);

    /// <summary>
    /// Makes a set and checks it: every variable of an equation is described with a known unit, flow units are cfs or m3/s, return periods above 1
    /// year and each once for a region. Readers of any file format end here.
    /// </summary>
    /// <param name="place">File (and set) for errors.</param>
    /// <param name="id">Short id.</param>
    /// <param name="variables">Variables.</param>
    /// <param name="equations">Equations.</param>
    /// <exception cref="InputException">Everything that is wrong with it.</exception>
    public static RegressionEquationSet Create(
        string place, string id, IReadOnlyList<RegressionVariable> variables, IReadOnlyList<RegressionEquation> equations)
    {
        var set = new RegressionEquationSet(id, variables, equations);
        var problems = new List<InputProblem>();
        if (equations.Count == 0) problems.Add(new($"{place}, set {id}", "no equation", "at least one"));
        foreach (var v in variables)
        {
            if (v.Unit.Length > 0 && Units.Find(v.Unit) is null)
                problems.Add(new($"{place}, set {id}, variable {v.Name}", $"the unit '{v.Unit}'", "a unit the program knows, such as mi2, ft, in, % or ft/ft; or none"));
            else if (v.Quantity is { } q && v.Unit.Length > 0 && Units.Get(v.Unit).Dimension != q.Dimension)
                problems.Add(new($"{place}, set {id}, variable {v.Name}", $"the unit '{v.Unit}' for {q.Name}", $"a unit of {q.Dimension}"));
            else if (v.Quantity is { } plain && v.Unit.Length == 0 && plain.Dimension != "slope")
                problems.Add(new($"{place}, set {id}, variable {v.Name}", $"no unit for {plain.Name}", $"a unit of {plain.Dimension}"));
            if (v.Range.Low > v.Range.High) problems.Add(new($"{place}, set {id}, variable {v.Name}", $"a range from {v.Range.Low:G6} to {v.Range.High:G6}", "the smaller value first"));
        }
        foreach (var e in equations)
        {
            var where = $"{place}, set {id}, region {e.Region}, {e.ReturnPeriodYr:G6} yr";
            foreach (var name in e.Equation.Names.Where(n => set.Variable(n, e.Region) is null))
                problems.Add(new(where, $"'{name}' in the equation", $"a variable of the set, one of {string.Join(", ", variables.Select(v => v.Name).Distinct(StringComparer.Ordinal))}"));
            if (Units.Find(e.FlowUnit)?.Dimension != "flow") problems.Add(new(where, $"the flow unit '{e.FlowUnit}'", "cfs or m3/s"));
            if (!(e.ReturnPeriodYr > 1)) problems.Add(new(where, $"the return period {e.ReturnPeriodYr:G6}", "a return period above 1 year"));
            if (e.StandardErrorPct is <= 0) problems.Add(new(where, $"the standard error {e.StandardErrorPct:G6} %", "a standard error above zero, or none"));
        }
        foreach (var twice in equations.GroupBy(e => (e.Region.ToUpperInvariant(), e.ReturnPeriodYr)).Where(g => g.Count() > 1))
            problems.Add(new($"{place}, set {id}", $"{twice.Count()} equations for region {twice.First().Region} at {twice.Key.ReturnPeriodYr:G6} yr", "one"));
        return problems.Count == 0 ? set : throw new InputException(problems);
    }
}

/// <summary>A figure of the catchment that a regression variable may stand for.</summary>
/// <param name="Name">Stable name, as in the equation file.</param>
/// <param name="Dimension">Dimension of its unit.</param>
/// <param name="InSi">Reads it in SI; null when the catchment does not know it.</param>
public sealed record RegressionQuantity(string Name, string Dimension, Func<Catchment, double?> InSi)
{
    /// <summary>All of them.</summary>
    public static IReadOnlyList<RegressionQuantity> All { get; } =
    [
        new("area", "area", c => c.AreaM2),
        new("mean-basin-slope", "slope", c => c.MeanBasinSlopeMPerM),
        new("mean-elevation", "length", c => c.MeanElevationM),
        new("relief", "length", c => c.ReliefM),
        new("flow-path-length", "length", c => c.LongestFlowPathM),
        new("flow-path-slope-10-85", "slope", c => c.FlowPathSlope1085MPerM),
        new("flow-path-slope", "slope", c => c.FlowPathEndToEndSlopeMPerM),
        new("impervious-share", "slope", c => c.ImperviousShare),
    ];

    /// <summary>The quantity with a name, or null.</summary>
    public static RegressionQuantity? Find(string name) => All.FirstOrDefault(q => string.Equals(q.Name, name, StringComparison.OrdinalIgnoreCase));
}
