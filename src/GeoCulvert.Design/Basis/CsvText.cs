using System.Text;

namespace GeoCulvert.Design.Basis;

/// <summary>One record of a CSV text with the line on which it began (1-based).</summary>
/// <param name="Line">1-based line of the text.</param>
/// <param name="Fields">Field texts, unquoted, not trimmed.</param>
public sealed record CsvRecord(int Line, IReadOnlyList<string> Fields);

/// <summary>Reads comma-separated text after RFC 4180 (quotes, doubled quotes, line breaks inside quotes; CR LF or LF).</summary>
public static class CsvText
{
    /// <summary>Splits a text into records. Blank lines are left out; a missing closing quote ends at the end of the text.</summary>
    /// <param name="text">The whole text; a leading byte-order mark is ignored.</param>
    /// <param name="separator">The field separator.</param>
    public static IReadOnlyList<CsvRecord> Read(string text, char separator = ',')
    {
        ArgumentNullException.ThrowIfNull(text);
        var records = new List<CsvRecord>();
        var fields = new List<string>();
        var field = new StringBuilder();
        int line = 1, start = 1;
        var quoted = false;
        for (var i = text.StartsWith('\uFEFF') ? 1 : 0; i < text.Length; i++)
        {
            var c = text[i];
            if (c == '\n') line++;
            if (quoted)
            {
                if (c != '"') field.Append(c);
                else if (i + 1 < text.Length && text[i + 1] == '"') { field.Append('"'); i++; }
                else quoted = false;
            }
            else if (c == '"' && string.IsNullOrWhiteSpace(field.ToString())) { field.Clear(); quoted = true; }
            else if (c == separator) { fields.Add(field.ToString()); field.Clear(); }
            else if (c == '\n') { EndRecord(); start = line; }
            else if (c != '\r') field.Append(c);
        }
        EndRecord();
        return records;

        void EndRecord()
        {
            fields.Add(field.ToString());
            field.Clear();
            if (fields.Count > 1 || fields[0].Length > 0) records.Add(new CsvRecord(start, fields.ToArray()));
            fields.Clear();
        }
    }
}
