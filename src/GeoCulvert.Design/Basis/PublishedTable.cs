using System.Globalization;
using System.Reflection;
using System.Security.Cryptography;
using System.Text;

namespace GeoCulvert.Design.Basis;

/// <summary>A row of a <see cref="PublishedTable"/>, read by column name.</summary>
public sealed class TableRow
{
    private readonly PublishedTable _table;
    private readonly CsvRecord _record;

    internal TableRow(PublishedTable table, CsvRecord record) => (_table, _record) = (table, record);

    /// <summary>1-based line of the file.</summary>
    public int Line => _record.Line;

    /// <summary>The trimmed text of a column; "" when the row is short.</summary>
    /// <exception cref="InputException">The table has no such column.</exception>
    public string Text(string column)
    {
        var index = _table.IndexOf(column);
        return index < _record.Fields.Count ? _record.Fields[index].Trim() : "";
    }

    /// <summary>The number in a column.</summary>
    /// <exception cref="InputException">The text is not a finite number.</exception>
    public double Number(string column) => NumberOrNull(column)
        ?? throw new InputException($"{_table.Name} line {Line}, column {column}", "nothing", "a number");

    /// <summary>The number in a column, or null when the column is blank.</summary>
    /// <exception cref="InputException">The text is not a finite number.</exception>
    public double? NumberOrNull(string column)
    {
        var text = Text(column);
        if (text.Length == 0) return null;
        return double.TryParse(text, NumberStyles.Float, CultureInfo.InvariantCulture, out var value) && double.IsFinite(value)
            ? value
            : throw new InputException($"{_table.Name} line {Line}, column {column}", $"'{text}'", "a number");
    }

    /// <summary>The row's own source, from its columns source, locator and status.</summary>
    public Source Source => new(
        Text("source"), Text("locator"), _table.Has("status") ? Text("status") : "");
}

/// <summary>
/// A table of published figures: CSV with a heading whose last columns are <c>source,locator,note</c>.
/// Embedded in the assembly from <c>&lt;Room&gt;/Tables/*.csv</c>, or the user's own with the same heading.
/// </summary>
public sealed class PublishedTable
{
    private readonly Dictionary<string, int> _columns = new(StringComparer.OrdinalIgnoreCase);

    private PublishedTable(string name, string text)
    {
        Name = name;
        Sha256 = Convert.ToHexStringLower(SHA256.HashData(Encoding.UTF8.GetBytes(text)));
        var records = CsvText.Read(text);
        if (records.Count == 0) throw new InputException(name, "an empty file", "a CSV table with a heading line");
        for (var i = 0; i < records[0].Fields.Count; i++) _columns.TryAdd(records[0].Fields[i].Trim(), i);
        Columns = [.. records[0].Fields.Select(f => f.Trim())];
        Rows = [.. records.Skip(1).Select(r => new TableRow(this, r))];
    }

    /// <summary>File name, as it is shown in errors and on the sheet.</summary>
    public string Name { get; }

    /// <summary>SHA-256 of the text, lower-case hexadecimal.</summary>
    public string Sha256 { get; }

    /// <summary>Column names in order.</summary>
    public IReadOnlyList<string> Columns { get; }

    /// <summary>All rows after the heading.</summary>
    public IReadOnlyList<TableRow> Rows { get; }

    /// <summary>Whether the heading names the column.</summary>
    public bool Has(string column) => _columns.ContainsKey(column);

    /// <summary>Reads a table from text.</summary>
    /// <param name="name">File name for error messages.</param>
    /// <param name="text">The CSV text.</param>
    /// <param name="required">Columns that must be there.</param>
    /// <exception cref="InputException">A required column is missing; all missing ones are named.</exception>
    public static PublishedTable Parse(string name, string text, params ReadOnlySpan<string> required)
    {
        var table = new PublishedTable(name, text);
        var missing = required.ToArray().Where(c => !table.Has(c)).ToArray();
        if (missing.Length > 0)
            throw new InputException(
                $"{name} line 1", $"the columns {string.Join(", ", table.Columns)}", $"also the columns {string.Join(", ", missing)}");
        return table;
    }

    /// <summary>Reads a table embedded in this assembly, for example <c>Hydraulics/Tables/inlet_coefficients.csv</c>.</summary>
    /// <exception cref="InvalidOperationException">The assembly does not hold it (a programmer's error).</exception>
    public static PublishedTable Embedded(string path)
    {
        var assembly = typeof(PublishedTable).Assembly;
        var resource = "GeoCulvert.Design." + path.Replace('/', '.');
        using var stream = assembly.GetManifestResourceStream(resource)
            ?? throw new InvalidOperationException($"No embedded table {path}.");
        using var reader = new StreamReader(stream, Encoding.UTF8);
        return new PublishedTable(path[(path.LastIndexOf('/') + 1)..], reader.ReadToEnd());
    }

    internal int IndexOf(string column) => _columns.TryGetValue(column, out var index)
        ? index
        : throw new InputException($"{Name} line 1", $"the columns {string.Join(", ", Columns)}", $"a column {column}");
}
