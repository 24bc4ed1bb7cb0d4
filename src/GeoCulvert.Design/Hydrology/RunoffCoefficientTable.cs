using System.Globalization;
using GeoCulvert.Design.Basis;

namespace GeoCulvert.Design.Hydrology;

/// <summary>Which letter of a dual soil group (A/D, B/D, C/D) counts.</summary>
public enum DualSoilGroup
{
    /// <summary>The second, D: the soil is not drained. The cautious choice and the default.</summary>
    Undrained,

    /// <summary>The first: the soil is drained.</summary>
    Drained,
}

/// <summary>A part of a catchment with one cover, one soil group and one slope.</summary>
/// <param name="CoverId">Land-cover id, as in the table; null when unknown.</param>
/// <param name="SoilGroup">A, B, C, D or a dual group such as "B/D"; null when unknown.</param>
/// <param name="AreaM2">Area, m2.</param>
/// <param name="SlopeMPerM">Ground slope, m/m; null to use the table's value without slope.</param>
public sealed record CoverArea(string? CoverId, string? SoilGroup, double AreaM2, double? SlopeMPerM = null);

/// <summary>A line of the weighting.</summary>
/// <param name="Name">Cover name.</param>
/// <param name="SoilGroup">Soil group that was used; null when none was known.</param>
/// <param name="AreaM2">Area, m2.</param>
/// <param name="Value">C below 25 years; null when the table has none.</param>
/// <param name="ValueFrom25Yr">C from 25 years on; null when the table has none.</param>
/// <param name="Origin">Row of the table.</param>
public sealed record WeightedCover(string Name, string? SoilGroup, double AreaM2, double? Value, double? ValueFrom25Yr, string Origin);

/// <summary>An area-weighted runoff coefficient with its lines.</summary>
/// <param name="Coefficient">The coefficient over the area that has a value; null when none has.</param>
/// <param name="Lines">The weighting, line by line.</param>
/// <param name="WithoutValueShare">Share of the area without a value, 0-1.</param>
/// <param name="Findings">Doubts.</param>
public sealed record CompositeRunoffCoefficient(
    RunoffCoefficient? Coefficient, IReadOnlyList<WeightedCover> Lines, double WithoutValueShare, IReadOnlyList<Finding> Findings);

/// <summary>
/// Runoff coefficients by land cover and soil group, and by slope where the cover's land use is in the finer table. Both are data and
/// may be replaced by tables with the same heading. C = sum(C_j A_j) / sum(A_j), HEC-22 (4th ed., 2024) ch. 4.
/// </summary>
public sealed class RunoffCoefficientTable
{
    private readonly Dictionary<string, (string Name, string LandUse, double?[] C, string Origin)> _covers = new(StringComparer.OrdinalIgnoreCase);
    private readonly Dictionary<(string LandUse, string Group), List<(double BelowPct, double Low, double High, string Origin)>> _bySlope = [];

    private RunoffCoefficientTable(PublishedTable landCover, PublishedTable? bySlope)
    {
        var problems = new List<InputProblem>();
        foreach (var row in landCover.Rows)
        {
            try
            {
                var values = SoilGroups.All.Select(g => Coefficient(landCover, row, "C_" + g, row.NumberOrNull("C_" + g))).ToArray();
                if (!_covers.TryAdd(row.Text("cover_id"), (row.Text("name"), landCover.Has("land_use") ? row.Text("land_use") : "", values, $"{landCover.Name} line {row.Line}")))
                    throw new InputException($"{landCover.Name} line {row.Line}", $"cover '{row.Text("cover_id")}' a second time", "each cover once");
            }
            catch (InputException e)
            {
                problems.AddRange(e.Problems);
            }
        }
        foreach (var row in bySlope?.Rows ?? [])
        {
            try
            {
                var key = (row.Text("land_use").ToUpperInvariant(), row.Text("hsg").ToUpperInvariant());
                if (!_bySlope.TryGetValue(key, out var list)) _bySlope[key] = list = [];
                list.Add((UpperPct(bySlope!, row),
                    Coefficient(bySlope!, row, "C_T_lt_25yr", row.Number("C_T_lt_25yr"))!.Value, Coefficient(bySlope!, row, "C_T_ge_25yr", row.Number("C_T_ge_25yr"))!.Value,
                    $"{bySlope!.Name} line {row.Line}"));
            }
            catch (InputException e)
            {
                problems.AddRange(e.Problems);
            }
        }
        if (problems.Count > 0) throw new InputException(problems);
        foreach (var list in _bySlope.Values) list.Sort((a, b) => a.BelowPct.CompareTo(b.BelowPct));
    }

    /// <summary>The program's own tables.</summary>
    public static RunoffCoefficientTable Published { get; } = new(
        PublishedTable.Embedded("Hydrology/Tables/land_cover.csv"), PublishedTable.Embedded("Hydrology/Tables/runoff_coefficients.csv"));

    /// <summary>Which letter of a dual soil group counts.</summary>
    public DualSoilGroup Dual { get; init; } = DualSoilGroup.Undrained;

    /// <summary>Soil group where none is known; null (the default) leaves such areas without a value.</summary>
    public string? DefaultSoilGroup { get; init; }

    /// <summary>Builds the lookup from tables of the user: cover_id, name, C_A ... C_D (optionally land_use), and land_use, hsg, slope_pct, C_T_lt_25yr, C_T_ge_25yr.</summary>
    /// <param name="landCover">Land-cover table.</param>
    /// <param name="bySlope">Table by slope; null for none.</param>
    /// <param name="dual">Which letter of a dual soil group counts.</param>
    /// <param name="defaultSoilGroup">Soil group where none is known; null for none.</param>
    /// <exception cref="InputException">Everything that is wrong with them.</exception>
    public static RunoffCoefficientTable From(
        PublishedTable landCover, PublishedTable? bySlope, DualSoilGroup dual = DualSoilGroup.Undrained, string? defaultSoilGroup = null) =>
        new(landCover, bySlope) { Dual = dual, DefaultSoilGroup = defaultSoilGroup };

    /// <summary>The area-weighted mean of given coefficients.</summary>
    /// <param name="parts">Coefficient and area (any unit) of each part.</param>
    /// <returns>C; NaN never: an empty or weightless list is a programmer's error.</returns>
    public static double Weigh(IReadOnlyList<(double Coefficient, double Area)> parts)
    {
        var area = parts.Sum(p => p.Area);
        return area > 0 ? parts.Sum(p => p.Coefficient * p.Area) / area : throw new ArgumentException("No area to weigh by.", nameof(parts));
    }

    /// <summary>The composite coefficient of a catchment's parts.</summary>
    public CompositeRunoffCoefficient Composite(IReadOnlyList<CoverArea> parts)
    {
        var lines = parts.Where(p => p.AreaM2 > 0).Select(Line).ToList();
        double total = lines.Sum(l => l.AreaM2), without = lines.Where(l => l.Value is null).Sum(l => l.AreaM2);
        var share = total > 0 ? without / total : 1;
        var findings = new List<Finding>();
        if (share > 0)
            findings.Add(HydrologyFindings.CoefficientMissing.With(
                $"{100 * share:0.0} % of the area: {string.Join(", ", lines.Where(l => l.Value is null).Select(l => l.Name).Distinct(StringComparer.Ordinal))}", share, 0));
        var known = lines.Where(l => l.Value is not null).ToList();
        if (known.Count == 0) return new(null, lines, share, findings);
        var low = Weigh([.. known.Select(l => (l.Value!.Value, l.AreaM2))]);
        double? high = known.Any(l => l.ValueFrom25Yr is not null) ? Weigh([.. known.Select(l => (l.ValueFrom25Yr ?? l.Value!.Value, l.AreaM2))]) : null;
        return new(new(low, $"area-weighted over {known.Count} cover classes", high), lines, share, findings);
    }

    private WeightedCover Line(CoverArea part)
    {
        var group = SoilGroups.Letter(part.SoilGroup, Dual) ?? SoilGroups.Letter(DefaultSoilGroup, Dual);
        if (part.CoverId is null || !_covers.TryGetValue(part.CoverId, out var cover))
            return new(part.CoverId is null ? "cover unknown" : $"cover {part.CoverId}", group, part.AreaM2, null, null, "");
        if (group is not null && part.SlopeMPerM is { } slope && _bySlope.TryGetValue((cover.LandUse.ToUpperInvariant(), group), out var list))
        {
            // The steepest class has no upper end; a slope on a boundary belongs to the steeper class.
            var row = list.First(r => 100 * slope < r.BelowPct || r == list[^1]);
            return new(cover.Name, group, part.AreaM2, row.Low, row.High, row.Origin);
        }
        // Water and the like shed the same on every soil, so their group need not be known.
        var value = group is not null ? cover.C[Array.IndexOf(SoilGroups.All, group)] : cover.C.Distinct().Count() == 1 ? cover.C[0] : null;
        return new(value is null ? $"{cover.Name}, soil group {group ?? "unknown"}" : cover.Name, group, part.AreaM2, value, null, cover.Origin);
    }

    private static double? Coefficient(PublishedTable table, TableRow row, string column, double? value) => value is null or (>= 0 and <= 1)
        ? value
        : throw new InputException($"{table.Name} line {row.Line}, column {column}", $"{value:G6}", "a coefficient from 0 to 1");

    // "0-2" ends at 2 %, "6+" has no end.
    private static double UpperPct(PublishedTable table, TableRow row)
    {
        var text = row.Text("slope_pct");
        if (text.EndsWith('+')) return double.PositiveInfinity;
        return double.TryParse(text[(text.IndexOf('-', StringComparison.Ordinal) + 1)..], NumberStyles.Float, CultureInfo.InvariantCulture, out var value) && value > 0
            ? value
            : throw new InputException($"{table.Name} line {row.Line}, column slope_pct", $"'{text}'", "a slope class such as 0-2 or 6+");
    }
}
