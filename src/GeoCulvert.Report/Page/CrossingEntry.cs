using GeoCulvert.Design.Basis;
using GeoCulvert.Design.Study;

namespace GeoCulvert.Report.Page;

/// <summary>A crossing as the page lists it: its row of the layer, its sheet, and how urgently it wants a look.</summary>
/// <param name="Index">Place in the order of road and station; ties list, map and sheet together.</param>
/// <param name="Id">Crossing id.</param>
/// <param name="Row">Row of the layer <c>crossings</c>, or null.</param>
/// <param name="Sheet">Sheet, or null.</param>
/// <param name="Findings">Findings on it, worst first.</param>
internal sealed record CrossingEntry(int Index, string Id, ResultRow? Row, CrossingSheet? Sheet, IReadOnlyList<Finding> Findings)
{
    public string Status { get; private init; } = "";

    public string Culvert { get; private init; } = "";

    /// <summary>Headwater elevation at the design flood and its limit, output units; the limit from the layer, else from the sheet's criteria.</summary>
    public (double? Level, double? Limit) Headwater { get; private init; }

    public double? DesignFlow { get; private init; }

    public bool HasNoCulvert => Status is not ("sized" or "rated");

    /// <summary>Whether a criterion is broken: one of the sheet's, or the headwater above its limit.</summary>
    public bool IsBroken => Sheet?.Criteria.Any(c => !c.IsMet) == true || (Headwater is { Level: { } h, Limit: { } l } && h > l);

    public bool NeedsLook => HasNoCulvert || IsBroken || Findings.Any(f => f.Severity >= Severity.Warning);

    public int Count(Severity severity) => Findings.Count(f => f.Severity == severity);

    /// <summary>All crossings of a study: the rows of the layer in their order, then sheets that have no row.</summary>
    public static IReadOnlyList<CrossingEntry> All(StudyReport report, LayerTable crossings)
    {
        var sheets = new Dictionary<string, CrossingSheet>(StringComparer.Ordinal);
        foreach (var sheet in report.Sheets) sheets.TryAdd(sheet.CrossingId, sheet);
        var findings = report.Findings.Where(f => f.CrossingId is not null).ToLookup(f => f.CrossingId!, StringComparer.Ordinal);
        var entries = new List<CrossingEntry>();
        var seen = new HashSet<string>(StringComparer.Ordinal);
        foreach (var row in crossings.Rows)
        {
            var id = crossings.Text(row, "crossing_id");
            if (seen.Add(id)) entries.Add(Make(id, row));
        }
        foreach (var sheet in report.Sheets.Where(s => seen.Add(s.CrossingId))) entries.Add(Make(sheet.CrossingId, null));
        return entries;

        CrossingEntry Make(string id, ResultRow? row)
        {
            var sheet = sheets.GetValueOrDefault(id);
            var own = findings[id].Concat((sheet?.Findings ?? []).Where(f => f.CrossingId is null));
            var level = row is null ? null : crossings.Number(row, "headwater_elevation", QuantityKind.Length);
            var limit = row is null ? null : crossings.Number(row, "headwater_limit_elevation", QuantityKind.Length);
            limit ??= sheet?.Criteria
                .Where(c => c.Kind == QuantityKind.Length && double.IsFinite(c.Limit) && c.Name.Contains("headwater", StringComparison.OrdinalIgnoreCase))
                .Select(c => (double?)DisplayUnits.FromSi(c.Limit, QuantityKind.Length, report.Units)).Min();
            return new CrossingEntry(entries.Count, id, row, sheet, [.. own.OrderByDescending(f => f.Severity)])
            {
                Status = row is null ? sheet?.Status ?? "" : crossings.Text(row, "status"),
                Culvert = row is null ? sheet?.Culvert ?? "" : crossings.Text(row, "culvert"),
                DesignFlow = row is null ? null : crossings.Number(row, "design_flow", QuantityKind.Flow),
                Headwater = (level, limit),
            };
        }
    }

    /// <summary>Worst first: no culvert, then errors, broken criteria, warnings, the smallest margin below the limit.</summary>
    public static IEnumerable<CrossingEntry> WorstFirst(IEnumerable<CrossingEntry> entries) => entries
        .OrderByDescending(e => e.HasNoCulvert)
        .ThenByDescending(e => e.Count(Severity.Error))
        .ThenByDescending(e => e.IsBroken)
        .ThenByDescending(e => e.Count(Severity.Warning))
        .ThenBy(e => e.Headwater is { Level: { } h, Limit: { } l } ? l - h : double.PositiveInfinity)
        .ThenBy(e => e.Index);
}
