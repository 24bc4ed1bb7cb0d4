using GeoCulvert.Design.Basis;

namespace GeoCulvert.Design.Hydrology;

/// <summary>
/// Reads regression equations from CSV. Each row is a <c>variable</c> or an <c>equation</c> (column record) of a set; the columns are
/// record, set, region, return_period_yr, name, quantity, unit, low, high, equation, standard_error_pct, description and, last, status, source, locator, note.
/// </summary>
public static class RegressionEquationCsv
{
    /// <summary>The sets that come with the program, each equation with its source and status.</summary>
    public static IReadOnlyList<RegressionEquationSet> Published { get; } = From(PublishedTable.Embedded("Hydrology/Tables/regression_equations.csv"));

    /// <summary>Reads the sets of a file.</summary>
    /// <param name="name">File name for errors.</param>
    /// <param name="text">The CSV text.</param>
    /// <exception cref="InputException">Everything that is wrong with it.</exception>
    public static IReadOnlyList<RegressionEquationSet> Read(string name, string text) => From(PublishedTable.Parse(
        name, text, "record", "set", "region", "return_period_yr", "name", "quantity", "unit", "low", "high", "equation", "standard_error_pct",
        "description", "source", "locator"));

    private static List<RegressionEquationSet> From(PublishedTable table)
    {
        var problems = new List<InputProblem>();
        var variables = new List<(string Set, RegressionVariable Variable)>();
        var equations = new List<(string Set, RegressionEquation Equation)>();
        foreach (var row in table.Rows)
        {
            var place = $"{table.Name} line {row.Line}";
            try
            {
                var set = row.Text("set");
                if (set.Length == 0) throw new InputException($"{place}, column set", "nothing", "the id of the set");
                switch (row.Text("record"))
                {
                    case "variable": variables.Add((set, Variable(row, place))); break;
                    case "equation": equations.Add((set, Equation(row, place))); break;
                    default: throw new InputException($"{place}, column record", $"'{row.Text("record")}'", "variable or equation");
                }
            }
            catch (InputException e)
            {
                problems.AddRange(e.Problems);
            }
        }
        if (problems.Count > 0) throw new InputException(problems);
        var ids = variables.Select(v => v.Set).Concat(equations.Select(e => e.Set)).Distinct(StringComparer.Ordinal).ToList();
        if (ids.Count == 0) throw new InputException(table.Name, "no rows below the heading", "variables and equations");
        return [.. ids.Select(id => RegressionEquationSet.Create(table.Name, id,
            [.. variables.Where(v => v.Set == id).Select(v => v.Variable)], [.. equations.Where(e => e.Set == id).Select(e => e.Equation)]))];
    }

    private static RegressionVariable Variable(TableRow row, string place)
    {
        var quantity = row.Text("quantity");
        if (row.Text("name").Length == 0) throw new InputException($"{place}, column name", "nothing", "the variable's name");
        if (quantity.Length > 0 && RegressionQuantity.Find(quantity) is null)
            throw new InputException($"{place}, column quantity", $"'{quantity}'", $"nothing, or one of {string.Join(", ", RegressionQuantity.All.Select(q => q.Name))}");
        return new(row.Text("name"), row.Text("unit"), RegressionQuantity.Find(quantity), row.Text("description"),
            (row.NumberOrNull("low"), row.NumberOrNull("high")), row.Text("region") is { Length: > 0 } region ? region : null);
    }

    private static RegressionEquation Equation(TableRow row, string place)
    {
        if (row.Text("region").Length == 0) throw new InputException($"{place}, column region", "nothing", "the region's name");
        return new(row.Text("region"), row.Number("return_period_yr"), EquationText.Parse(row.Text("equation"), $"{place}, column equation"),
            row.Text("unit"), row.NumberOrNull("standard_error_pct"), row.Source);
    }
}
