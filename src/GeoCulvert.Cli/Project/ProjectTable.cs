namespace GeoCulvert.Cli.Project;

/// <summary>The values of one table of the project file, SI and checked, with the line each came from.</summary>
internal sealed class ProjectTable(string name, int line)
{
    private readonly Dictionary<string, (object Value, int Line)> _values = new(StringComparer.Ordinal);

    /// <summary>Table name.</summary>
    public string Name { get; } = name;

    /// <summary>Line of its heading; 0 when the file does not have it.</summary>
    public int Line { get; } = line;

    /// <summary>Keys the file sets.</summary>
    public IEnumerable<string> KeysSet => _values.Keys;

    /// <summary>Whether the file sets a key.</summary>
    public bool Has(string key) => _values.ContainsKey(key);

    /// <summary>The line on which a key is set, or the table's.</summary>
    public int LineOf(string key) => _values.TryGetValue(key, out var v) ? v.Line : Line;

    /// <summary>A text, choice or path; the default when the file does not set it.</summary>
    public string? Text(string key) => (string?)Get(key);

    /// <summary>A number, or a quantity in SI.</summary>
    public double? Number(string key) => Get(key) is { } v ? Convert.ToDouble(v, System.Globalization.CultureInfo.InvariantCulture) : null;

    /// <summary>A number or quantity that has a default.</summary>
    public double Needed(string key) => Number(key) ?? throw new InvalidOperationException($"[{Name}] {key} has no default.");

    /// <summary>A list of texts; empty when neither file nor default gives one.</summary>
    public IReadOnlyList<string> Texts(string key) => Get(key) switch
    {
        null => [],
        string one => [one],
        var list => (IReadOnlyList<string>)list,
    };

    /// <summary>A list of numbers.</summary>
    public IReadOnlyList<double> Numbers(string key) => (IReadOnlyList<double>?)Get(key) ?? [];

    internal bool Set(string key, object value, int line) => _values.TryAdd(key, (value, line));

    private object? Get(string key)
    {
        if (_values.TryGetValue(key, out var v)) return v.Value;
        var definition = ProjectKeys.Find(Name, key) ?? throw new InvalidOperationException($"No key [{Name}] {key}.");
        return ProjectFile.DefaultOf(definition);
    }
}
