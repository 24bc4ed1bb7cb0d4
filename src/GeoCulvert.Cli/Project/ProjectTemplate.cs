using System.Text;

namespace GeoCulvert.Cli.Project;

/// <summary>Writes a commented project file to start from.</summary>
internal static class ProjectTemplate
{
    /// <summary>The text of a project file; values given are filled in, keys without one stand as comments with their default.</summary>
    /// <param name="values">"table.key" and the value as TOML.</param>
    /// <param name="remarks">Lines for the head of the file.</param>
    public static string Write(IReadOnlyDictionary<string, string> values, IEnumerable<string> remarks)
    {
        var text = new StringBuilder();
        text.AppendLine("# GeoCulvert project. Every value with a dimension carries its unit in the text: \"0.6 m\", \"24 in\", \"10 ha\".");
        text.AppendLine("# Lines that begin with # are defaults or options; remove the # to set them.");
        foreach (var remark in remarks) text.AppendLine($"# {remark}");
        foreach (var (table, about) in ProjectKeys.Tables)
        {
            text.AppendLine();
            text.AppendLine($"# ---- {about}");
            text.AppendLine(table == "road" ? "[[road]]" : $"[{table}]");
            foreach (var key in ProjectKeys.All.Where(k => k.Table == table))
            {
                var line = values.TryGetValue($"{table}.{key.Name}", out var value)
                    ? $"{key.Name} = {value}"
                    : $"# {key.Name} = {key.Default ?? Placeholder(key)}";
                text.AppendLine($"{line,-44} # {key.Description}{Words(key)}");
            }
        }

        return text.ToString().ReplaceLineEndings("\n");
    }

    /// <summary>A text as a TOML basic string.</summary>
    public static string Quote(string text)
    {
        var quoted = new StringBuilder("\"");
        foreach (var c in text)
        {
            quoted.Append(c switch
            {
                '"' => "\\\"",
                '\\' => "\\\\",
                < ' ' => $"\\u{(int)c:X4}",
                _ => c.ToString(),
            });
        }

        return quoted.Append('"').ToString();
    }

    private static string Words(ProjectKey key) => key.Words.Count > 0 ? $" ({string.Join(", ", key.Words)})" : "";

    private static string Placeholder(ProjectKey key) => key.Kind switch
    {
        KeyKind.Number or KeyKind.Integer => "0",
        KeyKind.Numbers => "[]",
        KeyKind.Boolean => "false",
        KeyKind.Choice => $"\"{key.Words[0]}\"",
        KeyKind.Choices or KeyKind.Texts => "[]",
        KeyKind.Quantity => key.Dimension switch { "area" => "\"10 ha\"", "velocity" => "\"3 m/s\"", "slope" => "\"1 %\"", "time" => "\"5 min\"", _ => "\"1 m\"" },
        _ => "\"\"",
    };
}
