using GeoCulvert.Design.Basis;

namespace GeoCulvert.Design.Hydrology;

/// <summary>A part of a catchment with one cover, hydrologic condition and soil group.</summary>
/// <param name="CoverId">Cover id, as in the table; null when unknown.</param>
/// <param name="SoilGroup">A, B, C, D or a dual group such as "B/D"; null when unknown.</param>
/// <param name="AreaM2">Area, m2.</param>
/// <param name="Condition">"poor", "fair" or "good" as in the table; null for the table's default condition.</param>
public sealed record CurveNumberArea(string? CoverId, string? SoilGroup, double AreaM2, string? Condition = null);

/// <summary>A line of the weighting.</summary>
/// <param name="Name">Cover, with its condition where it has one.</param>
/// <param name="SoilGroup">Soil group that was used; null when none was known.</param>
/// <param name="AreaM2">Area, m2.</param>
/// <param name="CurveNumber">Curve number; null when the table has none.</param>
/// <param name="Origin">Row of the table.</param>
public sealed record CurveNumberLine(string Name, string? SoilGroup, double AreaM2, double? CurveNumber, string Origin);

/// <summary>An area-weighted curve number with its lines.</summary>
/// <param name="CurveNumber">The curve number over the area that has one; null when none has.</param>
/// <param name="Lines">The weighting, line by line.</param>
/// <param name="WithoutValueShare">Share of the area without a value, 0-1.</param>
/// <param name="Findings">Doubts.</param>
public sealed record CompositeCurveNumber(double? CurveNumber, IReadOnlyList<CurveNumberLine> Lines, double WithoutValueShare, IReadOnlyList<Finding> Findings);

/// <summary>
/// Curve numbers by cover, hydrologic condition and soil group, TR-55 (1986) table 2-2 and the land-cover classes of this project's crosswalk,
/// or tables of the user with the heading cover_id, name, CN_A, CN_B, CN_C, CN_D and, where covers have several, condition.
/// CN = sum(CN_j A_j) / sum(A_j).
/// </summary>
public sealed class CurveNumberTable
{
    private readonly Dictionary<string, List<Row>> _covers = new(StringComparer.OrdinalIgnoreCase);

    private CurveNumberTable(IEnumerable<PublishedTable> tables)
    {
        var problems = new List<InputProblem>();
        foreach (var table in tables)
            foreach (var row in table.Rows)
            {
                try
                {
                    Add(table, row);
                }
                catch (InputException e)
                {
                    problems.AddRange(e.Problems);
                }
            }
        if (problems.Count > 0) throw new InputException(problems);
    }

    /// <summary>The program's own: land-cover classes and the covers of TR-55.</summary>
    public static CurveNumberTable Published { get; } = PublishedWith(DualSoilGroup.Undrained);

    /// <summary>The program's own with a rule for dual soil groups.</summary>
    /// <param name="dual">Which letter of a dual soil group counts.</param>
    public static CurveNumberTable PublishedWith(DualSoilGroup dual) =>
        new([PublishedTable.Embedded("Hydrology/Tables/land_cover.csv"), PublishedTable.Embedded("Hydrology/Tables/curve_numbers.csv")]) { Dual = dual };

    /// <summary>Which letter of a dual soil group counts; the second, undrained, by default.</summary>
    public DualSoilGroup Dual { get; init; } = DualSoilGroup.Undrained;

    /// <summary>Soil group where none is known; null (the default) leaves such areas without a value.</summary>
    public string? DefaultSoilGroup { get; init; }

    /// <summary>Condition where none is given and the cover has several; "fair" by default, null for none.</summary>
    public string? DefaultCondition { get; init; } = "fair";

    /// <summary>Cover ids of the table.</summary>
    public IReadOnlyCollection<string> Ids => _covers.Keys;

    /// <summary>Builds the lookup from a table of the user.</summary>
    /// <param name="table">Columns cover_id, name, CN_A ... CN_D, optionally condition.</param>
    /// <param name="dual">Which letter of a dual soil group counts.</param>
    /// <param name="defaultSoilGroup">Soil group where none is known; null for none.</param>
    /// <param name="defaultCondition">Condition where none is given; null for none.</param>
    /// <exception cref="InputException">Everything that is wrong with it.</exception>
    public static CurveNumberTable From(
        PublishedTable table, DualSoilGroup dual = DualSoilGroup.Undrained, string? defaultSoilGroup = null, string? defaultCondition = "fair") =>
        new([table]) { Dual = dual, DefaultSoilGroup = defaultSoilGroup, DefaultCondition = defaultCondition };

    /// <summary>The composite curve number of a catchment's parts.</summary>
    public CompositeCurveNumber Composite(IReadOnlyList<CurveNumberArea> parts)
    {
        var lines = new List<CurveNumberLine>();
        double total = 0, known = 0, sum = 0, memory = 0;
        foreach (var part in parts.Where(p => p.AreaM2 > 0))
        {
            var (line, fromMemory) = Line(part);
            lines.Add(line);
            total += line.AreaM2;
            if (line.CurveNumber is not { } cn) continue;
            known += line.AreaM2;
            sum += cn * line.AreaM2;
            if (fromMemory) memory += line.AreaM2;
        }
        var share = total > 0 ? (total - known) / total : 1;
        var findings = new List<Finding>();
        if (known < total || total == 0)
            findings.Add(NrcsFindings.CurveNumberMissing.With(
                $"{100 * share:0.0} % of the area: {string.Join(", ", lines.Where(l => l.CurveNumber is null).Select(l => l.Name).Distinct(StringComparer.Ordinal))}", share, 0));
        if (memory > 0) findings.Add(NrcsFindings.CurveNumberFromMemory.With($"{100 * memory / total:0.0} % of the area", memory / total, 0));
        return new(known > 0 ? sum / known : null, lines, share, findings);
    }

    private (CurveNumberLine Line, bool FromMemory) Line(CurveNumberArea part)
    {
        var group = SoilGroups.Letter(part.SoilGroup, Dual) ?? SoilGroups.Letter(DefaultSoilGroup, Dual);
        CurveNumberLine Without(string name) => new(name, group, part.AreaM2, null, "");
        if (part.CoverId is null) return (Without("cover unknown"), false);
        if (!_covers.TryGetValue(part.CoverId.Trim(), out var rows)) return (Without($"cover {part.CoverId}"), false);
        var asked = part.Condition?.Trim() ?? DefaultCondition;
        var row = rows.Count == 1 && rows[0].Condition.Length == 0
            ? rows[0]
            : rows.FirstOrDefault(r => string.Equals(r.Condition, asked, StringComparison.OrdinalIgnoreCase));
        if (row is null) return (Without($"{rows[0].Name}, condition {asked ?? "not given"} (there are {string.Join(", ", rows.Select(r => r.Condition))})"), false);
        var name = row.Condition.Length == 0 ? row.Name : $"{row.Name}, {row.Condition}";
        // Paving and water shed the same on every soil, so their group need not be known.
        var value = group is not null ? row.Values[Array.IndexOf(SoilGroups.All, group)] : row.Values.Distinct().Count() == 1 ? row.Values[0] : null;
        return (new(value is null ? $"{name}, soil group {group ?? "unknown"}" : name, group, part.AreaM2, value, row.Origin), row.FromMemory);
    }

    private void Add(PublishedTable table, TableRow row)
    {
        var values = SoilGroups.All.Select(g => row.NumberOrNull("CN_" + g)).ToArray();
        for (var k = 0; k < values.Length; k++)
            if (values[k] is { } cn && !CurveNumberRunoff.IsCurveNumber(cn))
                throw new InputException($"{table.Name} line {row.Line}, column CN_{SoilGroups.All[k]}", $"{cn:G6}", "a curve number above 0, at most 100");
        var (id, condition) = (row.Text("cover_id"), table.Has("condition") ? row.Text("condition") : "");
        if (!_covers.TryGetValue(id, out var rows)) _covers[id] = rows = [];
        if (rows.Any(r => string.Equals(r.Condition, condition, StringComparison.OrdinalIgnoreCase)))
            throw new InputException($"{table.Name} line {row.Line}", $"cover '{id}'{(condition.Length > 0 ? $", condition '{condition}'" : "")} a second time", "each cover and condition once");
        rows.Add(new(row.Text("name"), condition, values, $"{table.Name} line {row.Line}",
            table.Has("status") && row.Text("status").StartsWith("MEMORY", StringComparison.OrdinalIgnoreCase)));
    }

    private sealed record Row(string Name, string Condition, double?[] Values, string Origin, bool FromMemory);
}
