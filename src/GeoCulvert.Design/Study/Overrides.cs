using GeoCulvert.Design.Basis;

namespace GeoCulvert.Design.Study;

/// <summary>Values set for single crossings, by hand or from survey: a CSV with crossing_id and any of the columns below.</summary>
public sealed class Overrides
{
    /// <summary>Names of the columns, what they measure ("" for a pure number) and what they set. Lengths, flows and times carry their unit in the heading.</summary>
    public static readonly IReadOnlyList<(string Name, string Dimension, string Sets)> Columns =
    [
        ("runoff_coefficient", "", "rational C"),
        ("curve_number", "", "runoff curve number"),
        ("time_of_concentration", "time", "time of concentration"),
        ("design_flow", "flow", "flow of the design flood"),
        ("check_flow", "flow", "flow of the check flood"),
        ("design_return_period_yr", "", "design flood"),
        ("check_return_period_yr", "", "check flood"),
        ("inlet_elevation", "length", "inlet invert"),
        ("outlet_elevation", "length", "outlet invert"),
        ("length", "length", "barrel length"),
        ("skew_deg", "", "skew of the barrel, degrees from the perpendicular of the road"),
        ("road_width", "length", "road width from shoulder to shoulder at the crossing"),
        ("side_slope", "", "embankment slope at the crossing, horizontal per one vertical"),
        ("road_elevation", "length", "lowest road level"),
        ("tailwater_elevation", "length", "fixed tailwater"),
        ("hw_over_d", "", "largest HW/D at the design flood"),
        ("highest_headwater_elevation", "length", "highest headwater at the design flood"),
        ("smallest_rise", "length", "smallest diameter or rise"),
    ];

    private readonly Dictionary<string, Dictionary<string, double>> _values = new(StringComparer.Ordinal);

    private Overrides(string name) => Name = name;

    /// <summary>No overrides.</summary>
    public static Overrides None { get; } = new("");

    /// <summary>File name, for the origin of a value.</summary>
    public string Name { get; }

    /// <summary>Crossing ids named in the file.</summary>
    public IReadOnlyCollection<string> CrossingIds => _values.Keys;

    /// <summary>Reads the table.</summary>
    /// <param name="name">File name.</param>
    /// <param name="text">CSV text.</param>
    /// <exception cref="InputException">Everything that is wrong with it.</exception>
    public static Overrides Read(string name, string text)
    {
        var table = PublishedTable.Parse(name, text, "crossing_id");
        var problems = new List<InputProblem>();
        var columns = table.Columns.Where(c => c != "crossing_id" && c.Length > 0 && c != "note").Select(c => (Heading: c, Column: Column(c))).ToList();
        foreach (var (heading, column) in columns.Where(c => c.Column is null))
            problems.Add(new InputProblem($"{name} line 1", $"the column {heading}", $"crossing_id, note, or one of {string.Join(", ", Columns.Select(Heading))}"));
        var overrides = new Overrides(name);
        foreach (var row in table.Rows)
        {
            var id = row.Text("crossing_id");
            if (id.Length == 0) problems.Add(new InputProblem($"{name} line {row.Line}, column crossing_id", "nothing", "a crossing id"));
            else if (overrides._values.ContainsKey(id)) problems.Add(new InputProblem($"{name} line {row.Line}, column crossing_id", $"'{id}' a second time", "each crossing once"));
            else overrides._values[id] = [];
            foreach (var (heading, column) in columns.Where(c => c.Column is not null))
            {
                try
                {
                    if (row.NumberOrNull(heading) is { } value && overrides._values.TryGetValue(id, out var values))
                        values[column!.Value.Name] = value * column.Value.InSi;
                }
                catch (InputException e)
                {
                    problems.AddRange(e.Problems);
                }
            }
        }

        return problems.Count > 0 ? throw new InputException(problems) : overrides;
    }

    /// <summary>A value set for a crossing, SI; null when it is not set.</summary>
    public double? Of(string crossingId, string column) =>
        _values.TryGetValue(crossingId, out var values) && values.TryGetValue(column, out var value) ? value : null;

    /// <summary>Where a value came from, for the sheet.</summary>
    public string Origin => $"given in {Name}";

    private static string Heading((string Name, string Dimension, string Sets) c) => c.Dimension switch
    {
        "length" => $"{c.Name}_m or _ft",
        "flow" => $"{c.Name}_m3_s or _cfs",
        "time" => $"{c.Name}_min or _h",
        _ => c.Name,
    };

    private static (string Name, double InSi)? Column(string heading)
    {
        foreach (var (name, dimension, _) in Columns)
        {
            if (dimension.Length == 0 && heading == name) return (name, 1);
            if (dimension.Length == 0 || !heading.StartsWith(name + "_", StringComparison.Ordinal)) continue;
            var suffix = heading[(name.Length + 1)..];
            var unit = Units.SymbolsOf(dimension).Select(Units.Get).FirstOrDefault(u => u.Suffix == suffix);
            if (unit is not null) return (name, unit.InSi);
        }

        return null;
    }
}
