using GeoCulvert.Design.Basis;

namespace GeoCulvert.Design.Hydrology;

/// <summary>
/// Reads the point precipitation frequency CSV of NOAA Atlas 14: a head that names unit, data type and series, then one block of
/// durations by return periods, optionally two more with the bounds of the 90 % confidence interval, then footer lines.
/// Lines are read one by one, so that a stray quote or a damaged degree sign in the head does no harm. Files saved again with semicolons or tabs,
/// with decimal commas, are read too.
/// </summary>
internal static class Atlas14Reader
{
    private const string Title = "PRECIPITATION FREQUENCY ESTIMATES";
    private const string HeadExpected =
        "the head of a NOAA Atlas 14 file, 'Point precipitation frequency estimates (inches)' with 'Data type: Precipitation depth', "
        + "or the quantity and unit stated beside the file: depth in mm or in, intensity in mm/h or in/h";

    public static bool Recognises(string text)
    {
        foreach (var (_, cells) in Lines(text))
        {
            var line = string.Join(',', cells).Trim();
            if (line.Contains(Title, StringComparison.OrdinalIgnoreCase) || line.Contains("NOAA Atlas 14", StringComparison.OrdinalIgnoreCase)
                || cells[0].Trim().StartsWith("by duration", StringComparison.OrdinalIgnoreCase)) return true;
            if (cells[0].Trim().Length == 0 && cells.Count > 1 && RainfallCells.Number(cells[1]) is not null) return true;
        }
        return false;
    }

    public static RainfallTable Read(string name, string text, RainfallMeasure? stated)
    {
        var head = new List<string>();
        (string Text, int Line)? unit = null, type = null, series = null;
        var blocks = new List<(string Kind, int Line, RainfallCells Cells)>();
        RainfallCells? open = null;
        var kind = "";
        foreach (var (number, cells) in Lines(text))
        {
            var first = cells[0].Trim();
            var line = string.Join(',', cells).Trim(' ', ',');
            if (line.Length == 0) continue;
            if (line.StartsWith('<')) throw new InputException($"{name} line {number}", "a web page", "the CSV file of NOAA Atlas 14");
            if (line.StartsWith(Title, StringComparison.OrdinalIgnoreCase)) (open, kind) = (null, line[Title.Length..].ToLowerInvariant());
            else if (BoundOf(line) is { } bound) (open, kind) = (null, bound);
            else if (line.StartsWith("Point precipitation frequency", StringComparison.OrdinalIgnoreCase)) unit = (line, number);
            else if (line.StartsWith("Data type:", StringComparison.OrdinalIgnoreCase)) type = (line, number);
            else if (line.StartsWith("Time series type:", StringComparison.OrdinalIgnoreCase)) series = (line, number);
            else if (IsColumnHeading(cells))
            {
                open = new RainfallCells(name, RainfallCells.ReturnPeriods(name, number, cells.Skip(1).ToList()));
                blocks.Add((kind, number, open));
            }
            else if (first.Length > 0 && char.IsAsciiDigit(first[0]) && (cells.Count > 1 || RainfallCells.DurationMin(first) is not null))
            {
                if (open is null)
                    throw new InputException($"{name} line {number}", $"the row '{first}' before any return periods",
                        "a heading row such as 'by duration for ARI (years):,1,2,5,10,25,50,100'");
                open.Add(number, first, RainfallCells.DurationMin(first), cells.Skip(1).ToList());
            }
            else open = null; // head or footer, a numbered footnote among them
            if (blocks.Count == 0 && line.Length > 0) head.Add(line);
        }
        if (blocks.Count == 0)
            throw new InputException(name, "no table of durations by return periods", $"the line '{Title}' and a table below it");
        var measure = MeasureOf(name, unit, type, stated);
        var which = series is null ? RainfallSeries.NotStated : SeriesOf(name, series.Value);
        RainfallTable Build((string Kind, int Line, RainfallCells Cells) b, string suffix, RainfallTable? lower = null, RainfallTable? upper = null) =>
            b.Cells.Build(name + suffix, measure, which, head, lower, upper);
        RainfallTable? Bound(string word) => blocks.FirstOrDefault(b => b.Kind.Contains(word, StringComparison.Ordinal)) is { Cells: { } } b
            ? Build(b, $" ({word} bound)") : null;
        var main = blocks.Where(b => !b.Kind.Contains("upper", StringComparison.Ordinal) && !b.Kind.Contains("lower", StringComparison.Ordinal)).ToList();
        return main.Count switch
        {
            0 => throw new InputException(name, "only confidence bounds", $"the block '{Title}'"),
            1 => Build(main[0], "", Bound("lower"), Bound("upper")),
            _ => throw new InputException($"{name} line {main[1].Line}", "a second table of estimates", "one table of estimates in a file"),
        };
    }

    private static bool IsColumnHeading(List<string> cells) => cells.Count > 1
        && (cells[0].Trim().StartsWith("by duration", StringComparison.OrdinalIgnoreCase)
            || (cells[0].Trim().Length == 0 && cells[1].Trim().Length > 0));

    // "UPPER BOUND OF 90% CONFIDENCE INTERVAL" and the like, standing alone above a block.
    private static string? BoundOf(string line)
    {
        if (!line.Contains("confidence", StringComparison.OrdinalIgnoreCase)) return null;
        bool lower = line.Contains("lower", StringComparison.OrdinalIgnoreCase), upper = line.Contains("upper", StringComparison.OrdinalIgnoreCase);
        return lower == upper ? null : lower ? "lower" : "upper";
    }

    private static List<(int Number, List<string> Cells)> Lines(string text)
    {
        var result = new List<(int, List<string>)>();
        var lines = text.TrimStart('\uFEFF').Split('\n');
        var separator = SeparatorOf(lines);
        for (var i = 0; i < lines.Length; i++)
        {
            var records = CsvText.Read(lines[i].TrimEnd('\r'), separator);
            if (records.Count == 0) continue;
            var cells = RainfallCells.WithoutTrailingBlanks(records[0].Fields);
            result.Add((i + 1, separator == ',' ? cells : [.. cells.Select(PointForComma)]));
        }
        return result;
    }

    // The sign after the first duration of the table; the head may hold any sign.
    private static char SeparatorOf(string[] lines)
    {
        foreach (var line in lines)
        {
            var start = line.TrimStart(' ', '"');
            if (start.IndexOfAny([',', ';', '\t']) is var at && at > 0 && RainfallCells.DurationMin(start[..at].Trim('"', ' ')) is not null) return start[at];
        }
        return ',';
    }

    private static string PointForComma(string cell) =>
        cell.Count(c => c == ',') == 1 && cell.All(c => char.IsAsciiDigit(c) || c is ',' or '-' or ' ') ? cell.Replace(',', '.') : cell;

    private static RainfallMeasure MeasureOf(string name, (string Text, int Line)? unit, (string Text, int Line)? type, RainfallMeasure? stated)
    {
        RainfallMeasure? found = null;
        if (unit is { } u)
        {
            var inside = u.Text[(u.Text.IndexOf('(', StringComparison.Ordinal) + 1)..].TrimEnd(')', ' ').Trim().ToLowerInvariant();
            found = inside switch
            {
                "inches" or "inch" or "in" => RainfallMeasure.DepthIn,
                "millimeters" or "millimetres" or "millimeter" or "mm" => RainfallMeasure.DepthMm,
                "inches/hour" or "inches per hour" or "in/hr" or "in/h" => RainfallMeasure.IntensityInPerH,
                "millimeters/hour" or "millimetres/hour" or "millimeters per hour" or "mm/hr" or "mm/h" => RainfallMeasure.IntensityMmPerH,
                _ => throw new InputException($"{name} line {u.Line}", $"the unit '{inside}'", "inches, millimeters, inches/hour or millimeters/hour"),
            };
        }
        if (found is { } f && type is { } t)
        {
            var intensity = t.Text.Contains("intensity", StringComparison.OrdinalIgnoreCase);
            if (intensity != f is RainfallMeasure.IntensityInPerH or RainfallMeasure.IntensityMmPerH)
                throw new InputException($"{name} line {t.Line}", $"'{t.Text}' beside the unit of line {unit!.Value.Line}", "a data type and a unit that agree");
        }
        if (found is not null && stated is not null && found != stated)
            throw new InputException($"{name} line {unit!.Value.Line}", $"{found} in the file and {stated} stated beside it", "the two to agree");
        return found ?? stated ?? throw new InputException(name, "no line that gives the unit of the values", HeadExpected);
    }

    private static RainfallSeries SeriesOf(string name, (string Text, int Line) line) =>
        line.Text.Contains("partial", StringComparison.OrdinalIgnoreCase) ? RainfallSeries.PartialDuration
        : line.Text.Contains("annual", StringComparison.OrdinalIgnoreCase) ? RainfallSeries.AnnualMaximum
        : throw new InputException($"{name} line {line.Line}", $"'{line.Text}'", "'Time series type: Partial duration' or 'Annual maximum'");
}
