using GeoCulvert.Design.Basis;

namespace GeoCulvert.Design.Hydrology;

/// <summary>
/// Flows given in a table: <c>crossing_id,return_period_yr,flow_m3_s</c> (or <c>flow_cfs</c>), <c>*</c> for every crossing. A crossing
/// with rows of its own uses only those. Between given return periods the log of flow is linear in the normal deviate; outside there is no flow.
/// </summary>
public sealed class GivenFlows : IPeakFlowMethod
{
    private readonly Dictionary<string, SortedList<double, (double FlowM3PerS, int Line)>> _flows = new(StringComparer.Ordinal);
    private readonly string _origin;

    private GivenFlows(string origin) => _origin = origin;

    /// <inheritdoc/>
    public string Name => "given";

    /// <summary>Ids the table names, <c>*</c> included; for checking them against the crossings of a run.</summary>
    public IReadOnlyCollection<string> CrossingIds => _flows.Keys;

    /// <summary>Reads the table.</summary>
    /// <param name="name">File name for errors and for the sheet.</param>
    /// <param name="text">The CSV text.</param>
    /// <exception cref="InputException">Everything that is wrong with it.</exception>
    public static GivenFlows Read(string name, string text)
    {
        var table = PublishedTable.Parse(name, text, "crossing_id", "return_period_yr");
        bool si = table.Has("flow_m3_s"), us = table.Has("flow_cfs");
        if (si == us)
            throw new InputException($"{name} line 1", si ? "both flow_m3_s and flow_cfs" : $"the columns {string.Join(", ", table.Columns)}",
                "one column flow_m3_s or flow_cfs");
        var given = new GivenFlows(name);
        var problems = new List<InputProblem>();
        foreach (var row in table.Rows)
        {
            try
            {
                var id = row.Text("crossing_id");
                var t = row.Number("return_period_yr");
                var q = row.Number(si ? "flow_m3_s" : "flow_cfs");
                if (id.Length == 0) throw new InputException($"{name} line {row.Line}, column crossing_id", "nothing", "a crossing's id, or * for all");
                if (!(t >= 1)) throw new InputException($"{name} line {row.Line}, column return_period_yr", $"{t:G6}", "a return period of 1 year or more");
                if (!(q > 0)) throw new InputException($"{name} line {row.Line}, column {(si ? "flow_m3_s" : "flow_cfs")}", $"{q:G6}", "a flow above zero");
                if (!given._flows.TryGetValue(id, out var list)) given._flows[id] = list = [];
                if (list.TryGetValue(t, out var before))
                    throw new InputException($"{name} line {row.Line}", $"{id} at {t:G6} yr a second time, after line {before.Line}", "each return period once for a crossing");
                list.Add(t, (si ? q : Units.ToSi(q, "cfs"), row.Line));
            }
            catch (InputException e)
            {
                problems.AddRange(e.Problems);
            }
        }
        if (problems.Count > 0) throw new InputException(problems);
        return given._flows.Count > 0 ? given : throw new InputException(name, "no flows below the heading", "rows such as *,25,4.8");
    }

    /// <inheritdoc/>
    public PeakFlow Compute(Catchment catchment, double returnPeriodYr, PeakFlowContext context)
    {
        if (!_flows.TryGetValue(catchment.Id, out var list) && !_flows.TryGetValue("*", out list))
            return PeakFlow.Missing(Name, returnPeriodYr, $"{_origin} has no flow for crossing {catchment.Id}, nor for *");
        var periods = list.Keys.ToList();
        if (FlowFrequency.Bracket(periods, returnPeriodYr) is not { } bracket) return FlowFrequency.Beyond(Name, returnPeriodYr, periods);
        PeakFlow At(double t) => new(Name, t, list[t].FlowM3PerS, null, null,
            [new("flow_m3_s", list[t].FlowM3PerS, "m3/s", "", $"{_origin} line {list[t].Line}")], []);
        return bracket.Low == bracket.High
            ? At(bracket.Low) with { ReturnPeriodYr = returnPeriodYr }
            : FlowFrequency.Between(Name, returnPeriodYr, At(bracket.Low), At(bracket.High), bracket.Weight);
    }
}
