using GeoCulvert.Design.Basis;

namespace GeoCulvert.Design.Study;

/// <summary>What is known of a land-cover class.</summary>
/// <param name="Name">Its name.</param>
/// <param name="ImperviousShare">Impervious share of its area, 0-1; null when the table has none.</param>
/// <param name="IsLake">Whether it is open water.</param>
/// <param name="IsWetland">Whether it is wetland.</param>
public sealed record CoverClass(string Name, double? ImperviousShare, bool IsLake, bool IsWetland);

/// <summary>Names, impervious shares and storage of land-cover classes, by code. A user's table brings its own; what it leaves out is not known.</summary>
public sealed class CoverClasses
{
    private readonly Dictionary<string, CoverClass> _byCode = new(StringComparer.OrdinalIgnoreCase);

    private CoverClasses(PublishedTable table, Func<TableRow, string>? storage)
    {
        KnowsStorage = storage is not null;
        KnowsImperviousShare = table.Has("impervious_pct");
        var problems = new List<InputProblem>();
        foreach (var row in table.Rows)
        {
            var pct = KnowsImperviousShare ? row.NumberOrNull("impervious_pct") : null;
            if (pct is < 0 or > 100)
                problems.Add(new InputProblem($"{table.Name} line {row.Line}, column impervious_pct", $"{pct:G6}", "a percentage from 0 to 100"));
            var kind = storage?.Invoke(row) ?? "";
            if (kind is not ("" or "lake" or "wetland"))
                problems.Add(new InputProblem($"{table.Name} line {row.Line}, column storage", $"'{kind}'", "lake, wetland or nothing"));
            _byCode.TryAdd(row.Text("cover_id"), new(row.Text("name"), pct / 100, kind == "lake", kind == "wetland"));
        }

        if (problems.Count > 0) throw new InputException(problems);
    }

    /// <summary>The program's own table.</summary>
    public static CoverClasses Published { get; } = MakePublished();

    /// <summary>Whether the table tells lakes and wetlands from other land.</summary>
    public bool KnowsStorage { get; }

    /// <summary>Whether the table holds impervious shares.</summary>
    public bool KnowsImperviousShare { get; }

    /// <summary>From a user's table: cover_id, name and, where it has them, impervious_pct and storage (lake, wetland or nothing).</summary>
    /// <exception cref="InputException">Everything that is wrong with it.</exception>
    public static CoverClasses From(PublishedTable table)
    {
        ArgumentNullException.ThrowIfNull(table);
        return new(table, table.Has("storage") ? row => row.Text("storage").Trim().ToLowerInvariant() : null);
    }

    /// <summary>A class by its code; null when the table has none.</summary>
    public CoverClass? Find(string code) => _byCode.GetValueOrDefault(code);

    private static CoverClasses MakePublished()
    {
        var storage = PublishedTable.Embedded("Study/Tables/cover_storage.csv").Rows.ToDictionary(r => r.Text("cover_id"), r => r.Text("kind"));
        return new(PublishedTable.Embedded("Hydrology/Tables/land_cover.csv"), row => storage.GetValueOrDefault(row.Text("cover_id"), ""));
    }
}
