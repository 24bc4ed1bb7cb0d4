using GeoCulvert.Design.Basis;

namespace GeoCulvert.Design.Sizing;

/// <summary>
/// Installed prices: per metre of barrel and per end (headwall, wingwalls, apron), by shape and size as the catalogue writes it.
/// <code>cost = n (p L + 2 e)      n barrels, p price per metre, L length m, e price of an end</code>
/// </summary>
public sealed class UnitPrices
{
    private readonly Dictionary<(string Shape, string Size), (double PerM, double PerEnd)> _prices = [];

    private UnitPrices(string name, bool isInvented) => (Name, IsInvented) = (name, isInvented);

    /// <summary>Table name.</summary>
    public string Name { get; }

    /// <summary>Whether the prices are the shipped example, which is invented.</summary>
    public bool IsInvented { get; }

    /// <summary>The shipped example: invented prices that only show how a table looks and keep the order of sizes sensible.</summary>
    public static UnitPrices Example => Read(PublishedTable.Embedded("Sizing/Tables/unit_prices.csv"), true);

    /// <summary>Reads a table with the columns shape, size, price_per_m (or price_per_ft) and price_per_end.</summary>
    /// <exception cref="InputException">Everything that is wrong with it.</exception>
    public static UnitPrices Read(PublishedTable table, bool isInvented = false)
    {
        ArgumentNullException.ThrowIfNull(table);
        var (column, unit) = table.Has("price_per_ft") ? ("price_per_ft", Units.Foot) : ("price_per_m", 1.0);
        if (!table.Has(column) || !table.Has("shape") || !table.Has("size") || !table.Has("price_per_end"))
            throw new InputException($"{table.Name} line 1", $"the columns {string.Join(", ", table.Columns)}", "shape, size, price_per_m or price_per_ft, price_per_end");
        var prices = new UnitPrices(table.Name, isInvented);
        var problems = new List<InputProblem>();
        foreach (var row in table.Rows)
        {
            try
            {
                var (per, end) = (row.Number(column) / unit, row.Number("price_per_end"));
                if (!(per > 0) || !(end >= 0)) problems.Add(new InputProblem($"{table.Name} line {row.Line}", FormattableString.Invariant($"{row.Text(column)} per length, {row.Text("price_per_end")} per end"), "a price above 0, and one of at least 0"));
                else if (!prices._prices.TryAdd(Key(row.Text("shape"), row.Text("size")), (per, end))) problems.Add(new InputProblem($"{table.Name} line {row.Line}", $"{row.Text("shape")} {row.Text("size")} a second time", "each size once"));
            }
            catch (InputException e)
            {
                problems.AddRange(e.Problems);
            }
        }

        return problems.Count > 0 ? throw new InputException(problems) : prices;
    }

    /// <summary>Installed cost; null where the table has no such size.</summary>
    /// <param name="choice">Barrel.</param>
    /// <param name="count">Barrels.</param>
    /// <param name="lengthM">Length of each, m.</param>
    public double? Of(BarrelChoice choice, int count, double lengthM)
    {
        ArgumentNullException.ThrowIfNull(choice);
        return _prices.TryGetValue(Key(choice.Shape, choice.SizeText), out var p) ? count * ((p.PerM * lengthM) + (2 * p.PerEnd)) : null;
    }

    private static (string, string) Key(string shape, string size) => (shape.Trim().ToLowerInvariant(), string.Join(' ', size.ToLowerInvariant().Split(' ', StringSplitOptions.RemoveEmptyEntries)));
}
