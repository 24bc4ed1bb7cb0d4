using System.Globalization;
using System.Text;
using GeoCulvert.Design.Basis;
using GeoCulvert.Design.Hydrology;
using Tomlyn.Parsing;
using Tomlyn.Syntax;

namespace GeoCulvert.Cli.Project;

/// <summary>
/// Regression equations in TOML: tables [[variable]] and [[equation]] whose keys are the columns of the CSV form. They are handed to the CSV reader line
/// for line, so that both forms are checked by the same code and errors name the line of the table.
/// </summary>
internal static class RegressionToml
{
    private static readonly string[] Columns =
        ["set", "region", "return_period_yr", "name", "quantity", "unit", "low", "high", "equation", "standard_error_pct", "description", "status", "source", "locator", "note"];

    /// <summary>Reads the sets of a file.</summary>
    /// <exception cref="InputException">Everything that is wrong with it.</exception>
    public static IReadOnlyList<RegressionEquationSet> Read(string name, string text)
    {
        var document = SyntaxParser.Parse(text, name);
        var problems = document.Diagnostics.Where(d => d.Kind == DiagnosticMessageKind.Error)
            .Select(d => new InputProblem($"{name} line {d.Span.Start.Line + 1}", d.Message, "valid TOML")).ToList();
        var csv = new StringBuilder("record," + string.Join(',', Columns));
        var line = 1;
        foreach (var table in document.Tables)
        {
            var record = table.Name?.ToString().Trim();
            var at = table.Span.Start.Line + 1;
            if (record is not ("variable" or "equation") || table is not TableArraySyntax)
            {
                problems.Add(new InputProblem($"{name} line {at}", $"[{record}]", "[[variable]] or [[equation]]"));
                continue;
            }

            var values = new Dictionary<string, string>(StringComparer.Ordinal);
            foreach (var item in table.Items)
            {
                var key = item.Key?.ToString().Trim() ?? "";
                var value = item.Value switch
                {
                    StringValueSyntax s => s.Value ?? "",
                    IntegerValueSyntax i => i.Value.ToString(CultureInfo.InvariantCulture),
                    FloatValueSyntax f => f.Value.ToString("R", CultureInfo.InvariantCulture),
                    _ => null,
                };
                if (!Columns.Contains(key) || value is null)
                    problems.Add(new InputProblem($"{name} line {item.Span.Start.Line + 1}", $"{key} = {item.Value}", $"a text or a number for one of {string.Join(", ", Columns)}"));
                else values[key] = value;
            }

            // The heading of the CSV takes line 1; a table cannot begin before line 1, so a first table on line 1 goes to line 2.
            for (at = Math.Max(at, line + 1); line < at; line++) csv.Append('\n');
            csv.Append(record).Append(',').AppendJoin(',', Columns.Select(c => Quote(values.GetValueOrDefault(c, ""))));
        }

        if (problems.Count > 0) throw new InputException(problems);
        return RegressionEquationCsv.Read(name, csv.ToString());
    }

    private static string Quote(string text) => $"\"{text.Replace("\"", "\"\"", StringComparison.Ordinal).ReplaceLineEndings(" ")}\"";
}
