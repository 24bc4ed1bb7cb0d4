using System.Buffers;
using System.Text;
using GeoCulvert.Design.Study;

namespace GeoCulvert.Report.Schedule;

/// <summary>Writes <c>schedule.csv</c> after RFC 4180: a heading row, then a row per crossing; the caution stands in every row.</summary>
public static class ScheduleCsv
{
    private static readonly SearchValues<char> Quoted = SearchValues.Create(",\";\t\r\n");

    /// <summary>Writes the schedule as UTF-8 without a byte-order mark, lines ended by CR LF.</summary>
    /// <param name="report">The study; the layer <c>crossings</c> in output units.</param>
    /// <param name="output">Receives the table; stays open.</param>
    public static void Write(StudyReport report, Stream output)
    {
        ArgumentNullException.ThrowIfNull(report);
        ArgumentNullException.ThrowIfNull(output);
        using var writer = new StreamWriter(output, new UTF8Encoding(false), leaveOpen: true) { NewLine = "\r\n" };
        writer.WriteLine(string.Join(',', ScheduleColumn.All.Select(c => c.Heading(report.Units))));
        foreach (var row in ScheduleRow.All(report))
        {
            writer.WriteLine(string.Join(',', ScheduleColumn.All.Select(c => c.Value(row) switch
            {
                string text => Field(text),
                double number => c.Print(number),
                _ => "",
            })));
        }
    }

    /// <summary>
    /// A text as a CSV field: quoted where it must be, and begun with an apostrophe where a spreadsheet would take it for a formula
    /// (= + - @, their full-width forms, tab, carriage return or line feed in front, also behind spaces).
    /// </summary>
    public static string Field(string text)
    {
        ArgumentNullException.ThrowIfNull(text);
        var seen = text.TrimStart(' ', '\u00a0');
        if (seen.Length > 0 && "=+-@\t\r\n\uff1d\uff0b\uff0d\uff20".Contains(seen[0], StringComparison.Ordinal)) text = "'" + text;
        return text.AsSpan().ContainsAny(Quoted) || text.StartsWith(' ') || text.EndsWith(' ') ? $"\"{text.Replace("\"", "\"\"", StringComparison.Ordinal)}\"" : text;
    }
}
