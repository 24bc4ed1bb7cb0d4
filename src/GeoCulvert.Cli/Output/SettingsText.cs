using GeoCulvert.Cli.Project;

namespace GeoCulvert.Cli.Output;

/// <summary>Settings as resolved: every key with the file's value or its default.</summary>
internal static class SettingsText
{
    /// <summary>Keys and values of a project file, in the order of the template.</summary>
    public static IReadOnlyList<(string Key, string Value)> Of(string path)
    {
        var project = ProjectFile.Parse(Path.GetFileName(path), Path.GetDirectoryName(Path.GetFullPath(path))!, File.ReadAllText(path));
        var settings = new List<(string, string)>();
        foreach (var (table, _) in ProjectKeys.Tables)
        {
            var tables = table == "road" ? project.Roads : [project[table]];
            for (var i = 0; i < tables.Count; i++)
            {
                foreach (var key in ProjectKeys.All.Where(k => k.Table == table))
                {
                    if (Value(tables[i], key) is { } value)
                        settings.Add((table == "road" ? $"road[{i + 1}].{key.Name}" : $"{table}.{key.Name}", tables[i].Has(key.Name) ? value : value + " (default)"));
                }
            }
        }

        return settings;
    }

    private static string? Value(ProjectTable table, ProjectKey key) => key.Kind switch
    {
        KeyKind.Number or KeyKind.Integer => table.Number(key.Name)?.ToString("R"),
        KeyKind.Quantity => table.Number(key.Name) is { } v ? $"{v:R} {Design.Basis.Units.SymbolsOf(key.Dimension).First()}" : null,
        KeyKind.Numbers => table.Numbers(key.Name) is { Count: > 0 } n ? string.Join(", ", n) : null,
        KeyKind.Paths or KeyKind.Choices or KeyKind.Texts => table.Texts(key.Name) is { Count: > 0 } t ? string.Join(", ", t) : null,
        _ => table.Text(key.Name),
    };
}
