using System.Collections.Concurrent;
using GeoCulvert.Design.Basis;
using Tomlyn.Parsing;
using Tomlyn.Syntax;

namespace GeoCulvert.Cli.Project;

/// <summary>A project file: its tables, and everything that is wrong in it.</summary>
internal sealed class ProjectFile
{
    private static readonly ConcurrentDictionary<ProjectKey, object?> Defaults = new();
    private readonly Dictionary<string, ProjectTable> _tables = new(StringComparer.Ordinal);
    private readonly List<ProjectTable> _roads = [];
    private readonly List<InputProblem> _problems = [];
    private readonly string _shown;

    private ProjectFile(string shownName, string folder, string text)
    {
        (_shown, Folder) = (shownName, folder);
        var document = SyntaxParser.Parse(text, shownName);
        foreach (var message in document.Diagnostics.Where(d => d.Kind == DiagnosticMessageKind.Error))
            _problems.Add(new InputProblem($"{shownName} line {message.Span.Start.Line + 1}", message.Message, "valid TOML"));
        if (_problems.Count > 0) return;
        foreach (var item in document.KeyValues)
            _problems.Add(new InputProblem(At(item), $"the key {Name(item.Key)} outside any table", "a table first, for example [study]"));
        foreach (var table in document.Tables) Read(table);
    }

    /// <summary>Folder of the file; paths in it are relative to this.</summary>
    public string Folder { get; }

    /// <summary>Everything that is wrong so far.</summary>
    public IReadOnlyList<InputProblem> Problems => _problems;

    /// <summary>The road tables, in order.</summary>
    public IReadOnlyList<ProjectTable> Roads => _roads;

    /// <summary>A table other than road; empty (all defaults) when the file does not have it.</summary>
    public ProjectTable this[string table] => _tables.TryGetValue(table, out var t) ? t : new ProjectTable(table, 0);

    /// <summary>Reads a project file from text.</summary>
    /// <param name="shownName">File name for messages.</param>
    /// <param name="folder">Folder that relative paths start from.</param>
    /// <param name="text">The TOML text.</param>
    public static ProjectFile Parse(string shownName, string folder, string text) => new(shownName, folder, text);

    /// <summary>"project.toml line 12, [road] width".</summary>
    public string Place(ProjectTable table, string key)
    {
        var line = table.LineOf(key);
        return line > 0 ? $"{_shown} line {line}, [{table.Name}] {key}" : $"{_shown}, [{table.Name}] {key}";
    }

    /// <summary>Full path of a path key, or null when it is not set.</summary>
    public string? PathOf(ProjectTable table, string key) => table.Text(key) is { } p ? Full(p) : null;

    /// <summary>Full path, unless it is one of GDAL's virtual file systems.</summary>
    public string Full(string path) => path.StartsWith("/vsi", StringComparison.Ordinal) ? path : Path.GetFullPath(path, Folder);

    internal static object? DefaultOf(ProjectKey key) => Defaults.GetOrAdd(key, static k =>
    {
        if (k.Default is null) return null;
        var document = SyntaxParser.ParseStrict($"d = {k.Default}", "default");
        var problems = new List<InputProblem>();
        return Convert(k, document.KeyValues.Single().Value!, "default", problems)
            ?? throw new InvalidOperationException($"Default of {k.FullName}: {string.Join("; ", problems)}");
    });

    private static string Name(KeySyntax? key) => key?.ToString()?.Trim().Trim('"') ?? "";

    private static string Nearest(string word, IEnumerable<string> known)
    {
        var best = known.MinBy(k => Distance(word, k));
        return best is not null && Distance(word, best) <= Math.Max(2, word.Length / 2)
            ? $"one of the known names; the nearest is {best}"
            : $"one of {string.Join(", ", known)}";
    }

    /// <summary>Levenshtein distance of two words.</summary>
    private static int Distance(string a, string b)
    {
        var row = Enumerable.Range(0, b.Length + 1).ToArray();
        for (var i = 1; i <= a.Length; i++)
        {
            var diagonal = row[0];
            row[0] = i;
            for (var j = 1; j <= b.Length; j++)
            {
                var above = row[j];
                row[j] = Math.Min(Math.Min(row[j] + 1, row[j - 1] + 1), diagonal + (a[i - 1] == b[j - 1] ? 0 : 1));
                diagonal = above;
            }
        }

        return row[b.Length];
    }

    private static object? Convert(ProjectKey key, ValueSyntax value, string place, List<InputProblem> problems)
    {
        var raw = value.ToString().Trim();
        object? Wrong(string expected)
        {
            problems.Add(new InputProblem(place, raw, expected));
            return null;
        }

        object? Ranged(double number) => number >= key.Least && number <= key.Most
            ? number
            : Wrong($"a value from {Bound(key, key.Least)} to {Bound(key, key.Most)}");

        switch (key.Kind)
        {
            case KeyKind.Text or KeyKind.Path:
                return value is StringValueSyntax { Value: { Length: > 0 } s } ? s : Wrong("a text in quotes");
            case KeyKind.Paths or KeyKind.Texts:
                return Items(value, static v => v is StringValueSyntax { Value.Length: > 0 } s ? s.Value : null, loneAllowed: key.Kind == KeyKind.Paths)
                    ?? Wrong(key.Kind == KeyKind.Paths ? "a path in quotes, or a list of them" : "a list of texts, for example [\"a\", \"b\"]");
            case KeyKind.Choice:
                return value is StringValueSyntax { Value: { } w } && key.Words.Contains(w) ? w : Wrong($"one of {Quoted(key.Words)}");
            case KeyKind.Choices:
                return Items(value, v => v is StringValueSyntax { Value: { } w } && key.Words.Contains(w) ? w : null, loneAllowed: true)
                    ?? Wrong($"a list of words out of {Quoted(key.Words)}");
            case KeyKind.Number:
                return NumberOf(value) is { } n ? Ranged(n) : Wrong("a number without a unit");
            case KeyKind.Integer:
                return value is IntegerValueSyntax i && i.Value >= key.Least && i.Value <= key.Most
                    ? (double)i.Value
                    : Wrong($"a whole number from {key.Least:0} to {key.Most:0}");
            case KeyKind.Numbers:
                return Items<double?>(value, v => NumberOf(v) is { } d && d >= key.Least && d <= key.Most ? d : null, loneAllowed: false)
                        is { } list ? list.Select(d => d!.Value).ToArray()
                    : Wrong($"a list of numbers from {Bound(key, key.Least)} to {Bound(key, key.Most)}, for example {key.Default}");
            case KeyKind.Boolean:
                return value is BooleanValueSyntax b ? b.Value : Wrong("true or false");
            default:
                if (value is not StringValueSyntax q)
                {
                    return Wrong($"a {key.Dimension} with its unit, in quotes, one of {string.Join(", ", Units.SymbolsOf(key.Dimension))}"
                        + (NumberOf(value) is not null ? ": a bare number is never taken" : ""));
                }

                try
                {
                    return Ranged(Units.Parse(q.Value ?? "", key.Dimension, place));
                }
                catch (InputException e)
                {
                    problems.AddRange(e.Problems);
                    return null;
                }
        }
    }

    private static string Quoted(IEnumerable<string> words) => string.Join(", ", words.Select(w => $"\"{w}\""));

    private static string Bound(ProjectKey key, double si)
    {
        if (double.IsInfinity(si)) return "any size";
        return key.Kind == KeyKind.Quantity ? $"{si:0.######} {Units.SymbolsOf(key.Dimension).First()}" : $"{si:0.####}";
    }

    private static double? NumberOf(SyntaxNode? value) => value switch
    {
        IntegerValueSyntax i => i.Value,
        FloatValueSyntax f when double.IsFinite(f.Value) => f.Value,
        _ => null,
    };

    private static List<T>? Items<T>(ValueSyntax value, Func<ValueSyntax, T?> item, bool loneAllowed)
    {
        if (value is not ArraySyntax array) return loneAllowed && item(value) is { } one ? [one] : null;
        var list = new List<T>();
        foreach (var entry in array.Items)
        {
            if (entry.Value is null || item(entry.Value) is not { } v) return null;
            list.Add(v);
        }

        return list.Count > 0 ? list : null;
    }

    private string At(SyntaxNode node) => $"{_shown} line {node.Span.Start.Line + 1}";

    private void Read(TableSyntaxBase syntax)
    {
        var name = Name(syntax.Name);
        if (ProjectKeys.Tables.All(t => t.Name != name))
        {
            _problems.Add(new InputProblem(At(syntax), $"the table [{name}]", Nearest(name, ProjectKeys.Tables.Select(t => t.Name))));
            return;
        }

        var isArray = syntax is TableArraySyntax;
        if (isArray != (name == "road"))
        {
            _problems.Add(new InputProblem(At(syntax), isArray ? $"[[{name}]]" : "[road]", isArray ? $"[{name}], which stands once" : "[[road]], which may repeat"));
            return;
        }

        var table = new ProjectTable(name, syntax.Span.Start.Line + 1);
        if (name == "road") _roads.Add(table);
        else if (!_tables.TryAdd(name, table)) _problems.Add(new InputProblem(At(syntax), $"a second [{name}]", "each table once"));
        foreach (var item in syntax.Items)
        {
            var keyName = Name(item.Key);
            var place = $"{At(item)}, [{name}] {keyName}";
            if (ProjectKeys.NotYet.TryGetValue($"[{name}] {keyName}", out var notYet))
                _problems.Add(new InputProblem(place, "a key this version does not compute", $"the key removed: {notYet}"));
            else if (ProjectKeys.Find(name, keyName) is not { } key)
                _problems.Add(new InputProblem(place, "an unknown key", Nearest(keyName, ProjectKeys.All.Where(k => k.Table == name).Select(k => k.Name))));
            else if (Convert(key, item.Value!, place, _problems) is { } v && !table.Set(keyName, v, item.Span.Start.Line + 1))
                _problems.Add(new InputProblem(place, "the key a second time", "each key once in a table"));
        }
    }
}
