using System.Globalization;
using System.Text;
using System.Text.Json;
using GeoCulvert.Design.Basis;
using GeoCulvert.Design.Hydrology;

namespace GeoCulvert.Cli.Output;

/// <summary>Flows of <c>flow</c> as JSON and as a calculation line by line.</summary>
internal static class FlowText
{
    /// <summary>Writes the JSON.</summary>
    public static void Json(TextWriter output, IReadOnlyList<(double? ReturnPeriodYr, PeakFlow Flow)> flows, UnitSystem units)
    {
        using var buffer = new MemoryStream();
        using (var json = new Utf8JsonWriter(buffer, new JsonWriterOptions { Indented = true }))
        {
            json.WriteStartObject();
            json.WriteStartArray("results");
            foreach (var (period, flow) in flows)
            {
                json.WriteStartObject();
                json.WriteString("method", flow.Method);
                Number(json, "return_period_yr", period);
                Flow(json, "flow", flow.FlowM3PerS, units);
                Flow(json, "lower", flow.LowerM3PerS, units);
                Flow(json, "upper", flow.UpperM3PerS, units);
                Steps(json, flow.Steps);
                json.WriteStartArray("findings");
                foreach (var f in flow.Findings)
                {
                    json.WriteStartObject();
                    json.WriteString("code", f.Code);
                    json.WriteString("text", f.Sentence);
                    json.WriteEndObject();
                }

                json.WriteEndArray();
                json.WriteEndObject();
            }

            json.WriteEndArray();
            json.WriteEndObject();
        }

        output.WriteLine(Encoding.UTF8.GetString(buffer.ToArray()));
    }

    /// <summary>Writes the calculation.</summary>
    public static void Calculation(TextWriter output, IReadOnlyList<(double? ReturnPeriodYr, PeakFlow Flow)> flows, UnitSystem units)
    {
        foreach (var (period, flow) in flows)
        {
            output.WriteLine(period is { } years ? FormattableString.Invariant($"{flow.Method}, return period {years:G6} years") : flow.Method);
            var name = Math.Max(12, flow.Steps.Select(s => s.Name.Length).DefaultIfEmpty(0).Max());
            var value = flow.Steps.Select(s => $"{Shown(s.Value)} {s.Unit}".TrimEnd().Length).DefaultIfEmpty(0).Max();
            foreach (var s in flow.Steps)
            {
                var how = s.Formula.Length > 0 ? "= " + s.Formula : "";
                output.WriteLine($"  {s.Name.PadRight(name)}  {$"{Shown(s.Value)} {s.Unit}".TrimEnd().PadRight(value)}  {how}{(s.Source.Length > 0 ? $"  [{s.Source}]" : "")}".TrimEnd());
            }

            output.WriteLine(flow.FlowM3PerS is { } q
                ? $"  peak flow: {Rounded(q, units)}{(flow.LowerM3PerS is { } low && flow.UpperM3PerS is { } high ? $" (from {Rounded(low, units)} to {Rounded(high, units)})" : "")}"
                : "  peak flow: not computed");
            foreach (var f in flow.Findings) output.WriteLine($"  {f.Severity.ToString().ToLowerInvariant()}: {f.Sentence} ({f.Code})");
            output.WriteLine();
        }

        output.WriteLine(GeoCulvert.Report.ReportCaution.Short);
    }

    private static void Steps(Utf8JsonWriter json, IReadOnlyList<Step> steps)
    {
        json.WriteStartArray("steps");
        foreach (var s in steps)
        {
            json.WriteStartObject();
            json.WriteString("name", s.Name);
            Number(json, "value", s.Value);
            json.WriteString("unit", s.Unit);
            json.WriteString("formula", s.Formula);
            json.WriteString("source", s.Source);
            json.WriteEndObject();
        }

        json.WriteEndArray();
    }

    private static void Flow(Utf8JsonWriter json, string name, double? si, UnitSystem units) =>
        Number(json, name + DisplayUnits.FieldSuffix(QuantityKind.Flow, units), si is { } q ? DisplayUnits.FromSi(q, QuantityKind.Flow, units) : null);

    private static void Number(Utf8JsonWriter json, string name, double? value)
    {
        if (value is { } v && double.IsFinite(v)) json.WriteNumber(name, v);
        else json.WriteNull(name);
    }

    private static string Shown(double value) => value.ToString("G5", CultureInfo.InvariantCulture);

    private static string Rounded(double si, UnitSystem units) => $"{DisplayUnits.FromSi(si, QuantityKind.Flow, units).ToString("G3", CultureInfo.InvariantCulture)} {DisplayUnits.Symbol(QuantityKind.Flow, units)}";
}
