using GeoCulvert.Design.Basis;

namespace GeoCulvert.Design.Hydrology;

/// <summary>
/// Reads a plain table of durations by return periods. Heading, first spelling: <c>duration_min\intensity_mm_per_h,2,10,25</c>
/// (units min, h or d; quantity intensity_mm_per_h, intensity_in_per_h, depth_mm or depth_in; the sign between may be \ / | or a
/// space). Second spelling: <c>duration_min,2,10,25</c> under a line <c># intensity_mm_per_h</c>. A line
/// <c># series: partial duration</c> or <c># series: annual maximum</c> names the series. Comma, semicolon or tab may separate.
/// </summary>
internal static class PlainRainfallReader
{
    private const string HeadingExpected =
        "a first heading cell with the unit of the durations and of the values, such as duration_min\\intensity_mm_per_h or duration_h\\depth_in";

    private static readonly Dictionary<string, RainfallMeasure> Measures = new(StringComparer.OrdinalIgnoreCase)
    {
        ["intensity_mm_per_h"] = RainfallMeasure.IntensityMmPerH,
        ["intensity_in_per_h"] = RainfallMeasure.IntensityInPerH,
        ["depth_mm"] = RainfallMeasure.DepthMm,
        ["depth_in"] = RainfallMeasure.DepthIn,
    };

    private static readonly Dictionary<string, double?> DurationUnits = new(StringComparer.OrdinalIgnoreCase)
    {
        ["duration"] = null, ["duration_min"] = 1, ["duration_h"] = 60, ["duration_hr"] = 60, ["duration_d"] = 1440, ["duration_day"] = 1440,
    };

    public static RainfallTable Read(string name, string text, RainfallMeasure? stated)
    {
        RainfallMeasure? measure = null;
        var series = RainfallSeries.NotStated;
        var head = new List<string>();
        RainfallCells? table = null;
        double? unit = null;
        var separator = ',';
        var lines = text.TrimStart('\uFEFF').Split('\n');
        for (var i = 0; i < lines.Length; i++)
        {
            var line = lines[i].Trim('\r', ' ');
            var place = $"{name} line {i + 1}";
            if (line.Trim(',', ';', '\t', ' ').Length == 0) continue;
            if (line.StartsWith('#'))
            {
                var comment = line.TrimStart('#').Trim(' ', ',', ';', '\t');
                head.Add(comment);
                if (Measures.TryGetValue(comment, out var m)) measure = m;
                if (comment.StartsWith("series:", StringComparison.OrdinalIgnoreCase)) series = SeriesOf(place, comment);
                continue;
            }
            if (table is null)
            {
                separator = line.Contains(',', StringComparison.Ordinal) ? ',' : line.Contains(';', StringComparison.Ordinal) ? ';' : '\t';
                var heading = RainfallCells.WithoutTrailingBlanks(CsvText.Read(line, separator)[0].Fields);
                (unit, var own) = Heading(place, heading[0]);
                if (own is not null && measure is not null && own != measure)
                    throw new InputException(place, $"'{heading[0]}' under a line that says {measure}", "the two to agree");
                measure ??= own;
                table = new RainfallCells(name, RainfallCells.ReturnPeriods(name, i + 1, heading.Skip(1).ToList()));
                continue;
            }
            var cells = RainfallCells.WithoutTrailingBlanks(CsvText.Read(line, separator)[0].Fields);
            table.Add(i + 1, cells[0], RainfallCells.DurationMin(cells[0], unit), cells.Skip(1).ToList());
        }
        if (table is null) throw new InputException(name, "an empty file", HeadingExpected);
        if (measure is not null && stated is not null && measure != stated)
            throw new InputException(name, $"{measure} in the file and {stated} stated beside it", "the two to agree");
        return table.Build(name, measure ?? stated ?? throw new InputException(name, "no unit of the values", HeadingExpected), series, head);
    }

    private static (double? Unit, RainfallMeasure? Measure) Heading(string place, string cell)
    {
        var parts = cell.Split(['\\', '/', '|', ' '], StringSplitOptions.RemoveEmptyEntries | StringSplitOptions.TrimEntries);
        if (parts.Length is 0 or > 2 || !DurationUnits.TryGetValue(parts[0], out var unit))
            throw new InputException(place, $"the heading '{cell}'", HeadingExpected);
        if (parts.Length == 1) return (unit, null);
        return Measures.TryGetValue(parts[1], out var measure)
            ? (unit, measure)
            : throw new InputException(place, $"the quantity '{parts[1]}'", $"one of {string.Join(", ", Measures.Keys)}");
    }

    private static RainfallSeries SeriesOf(string place, string comment) =>
        comment.Contains("partial", StringComparison.OrdinalIgnoreCase) ? RainfallSeries.PartialDuration
        : comment.Contains("annual", StringComparison.OrdinalIgnoreCase) ? RainfallSeries.AnnualMaximum
        : throw new InputException(place, $"'{comment}'", "'series: partial duration' or 'series: annual maximum'");
}
