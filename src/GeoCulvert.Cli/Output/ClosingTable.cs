using System.Globalization;
using GeoCulvert.Design.Basis;
using GeoCulvert.Design.Study;

namespace GeoCulvert.Cli.Output;

/// <summary>The table at the end of a run: every crossing, worst first, within 100 columns.</summary>
internal static class ClosingTable
{
    private const int MostRows = 40;
    private const int IdWidth = 24;
    private const int CulvertWidth = 30;

    /// <summary>Writes the table.</summary>
    public static void Write(TextWriter output, StudyResult result, UnitSystem units)
    {
        string Unit(QuantityKind kind) => DisplayUnits.Symbol(kind, units);
        output.WriteLine(Row("crossing", $"area {Unit(QuantityKind.Area)}", $"flow {Unit(QuantityKind.Flow)}", "culvert", "HW/D", $"v {Unit(QuantityKind.Velocity)}", "look"));
        output.WriteLine(new string('-', 98));
        var ordered = result.Crossings.Select((c, i) => (c, i)).OrderByDescending(p => Rank(p.c)).ThenBy(p => p.i).Select(p => p.c).ToArray();
        foreach (var c in ordered.Take(MostRows))
        {
            output.WriteLine(Row(
                c.CrossingId,
                Significant(DisplayUnits.FromSi(c.Watershed.AreaM2, QuantityKind.Area, units)),
                c.Flow?.Design.FlowM3PerS is { } q ? Significant(DisplayUnits.FromSi(q, QuantityKind.Flow, units)) : "-",
                c.Culvert?.Description ?? c.Status,
                c.Culvert is { } k ? k.HeadwaterOverRise.ToString("0.00", CultureInfo.InvariantCulture) : "-",
                c.Culvert is { } v ? DisplayUnits.FromSi(v.OutletVelocityMPerS, QuantityKind.Velocity, units).ToString("0.0", CultureInfo.InvariantCulture) : "-",
                Look(c)));
        }

        if (ordered.Length > MostRows) output.WriteLine($"... and {ordered.Length - MostRows} more in schedule.csv");
        output.WriteLine();
        var counts = string.Join(", ", result.Crossings.GroupBy(c => c.Status).OrderBy(g => g.Key, StringComparer.Ordinal).Select(g => $"{g.Count()} {g.Key}"));
        output.WriteLine($"{result.Crossings.Count} crossings: {(counts.Length > 0 ? counts : "none")}. Findings: {Count(result, Severity.Error)} errors, {Count(result, Severity.Warning)} warnings, {Count(result, Severity.Note)} notes.");
        Changes(output, result, units);
        output.WriteLine(GeoCulvert.Report.ReportCaution.Short);
    }

    /// <summary>What differs from the run before, one line each.</summary>
    private static void Changes(TextWriter output, StudyResult result, UnitSystem units)
    {
        if (result.Openings.Count > 0) output.WriteLine($"{result.Openings.Count} embankment openings, see layer openings.");
        if (result.Changes.Count == 0) return;
        output.WriteLine("Since the run before:");
        foreach (var change in result.Changes.Take(MostRows))
            output.WriteLine($"  {Fit(change.CrossingId, IdWidth)} {change.Change}{(change.MovedM is > 0 ? $" ({change.MovedM:0.0} m)" : "")}: {Was(change.Before, units)} -> {Was(change.After, units)}");
        if (result.Changes.Count > MostRows) output.WriteLine($"  ... and {result.Changes.Count - MostRows} more in layer changes");
    }

    private static string Was(FormerCrossing? crossing, UnitSystem units) => crossing is null ? "none"
        : $"{(crossing.DesignFlowM3PerS is { } q ? $"{Significant(DisplayUnits.FromSi(q, QuantityKind.Flow, units))} {DisplayUnits.Symbol(QuantityKind.Flow, units)}" : "no flow")}, {crossing.Culvert ?? "no culvert"}";

    private static int Count(StudyResult result, Severity severity) => result.Findings.Count(f => f.Severity == severity);

    private static int Rank(CrossingResult c) => (c.Culvert is null ? 1000 : 0) + (100 * c.Findings.Count(f => f.Severity == Severity.Error)) + c.Findings.Count(f => f.Severity == Severity.Warning);

    private static string Look(CrossingResult c) => c.Findings.FirstOrDefault(f => f.Severity != Severity.Note)?.Severity switch
    {
        Severity.Error => "error",
        Severity.Warning => $"{c.Findings.Count(f => f.Severity == Severity.Warning)} warn.",
        _ => "",
    };

    private static string Row(string id, string area, string flow, string culvert, string ratio, string velocity, string look) =>
        $"{Fit(id, IdWidth),-IdWidth} {area,9} {flow,10} {Fit(culvert, CulvertWidth),-CulvertWidth} {ratio,5} {velocity,6} {look,8}".TrimEnd();

    private static string Fit(string text, int width)
    {
        var plain = new string([.. text.Select(ch => char.IsControl(ch) || char.GetUnicodeCategory(ch) == UnicodeCategory.Format ? ' ' : ch)]);
        return plain.Length <= width ? plain : plain[..(width - 1)] + "…";
    }

    private static string Significant(double value) => value == 0 ? "0" : value >= 100
        ? Math.Round(value).ToString("0", CultureInfo.InvariantCulture)
        : value.ToString("G3", CultureInfo.InvariantCulture);
}
