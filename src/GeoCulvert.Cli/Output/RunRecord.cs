using System.Diagnostics;
using System.Text.Json;
using GeoCulvert.Design.Study;

namespace GeoCulvert.Cli.Output;

/// <summary>run.json: what was run, on what, with what outcome.</summary>
internal static class RunRecord
{
    /// <summary>Writes the record.</summary>
    public static void Write(
        string file, string projectPath, StudyReport report, StudyResult result, IReadOnlyList<(string Name, double Seconds, long? Cells)> stages)
    {
        using var stream = File.Create(file);
        using var json = new Utf8JsonWriter(stream, new JsonWriterOptions { Indented = true });
        json.WriteStartObject();
        json.WriteString("version", report.Version);
        json.WriteString("command", $"run {projectPath}");
        json.WriteString("study", report.StudyName);
        json.WriteString("working_crs", report.CrsName);
        json.WriteStartArray("inputs");
        foreach (var input in report.Inputs)
        {
            json.WriteStartObject();
            json.WriteString("path", input.Path);
            json.WriteString("role", input.Role);
            json.WriteNumber("bytes", input.Bytes);
            json.WriteString("sha256", input.Sha256);
            json.WriteString("crs", input.Crs);
            if (input.NoData.Length > 0) json.WriteString("nodata", input.NoData);
            json.WriteEndObject();
        }

        json.WriteEndArray();
        json.WriteStartObject("settings");
        foreach (var (key, value) in report.Settings) json.WriteString(key, value);
        json.WriteEndObject();
        json.WriteStartArray("stages");
        foreach (var (name, seconds, cells) in stages)
        {
            json.WriteStartObject();
            json.WriteString("name", name);
            json.WriteNumber("seconds", Math.Round(seconds, 3));
            json.WriteBoolean("from_cache", false);
            if (cells is { } n) json.WriteNumber("cells", n);
            json.WriteEndObject();
        }

        json.WriteEndArray();
        json.WriteNumber("peak_memory_bytes", Process.GetCurrentProcess().PeakWorkingSet64);
        Counts(json, "crossings", result.Crossings.Select(c => c.Status));
        Counts(json, "findings", report.Findings.Select(f => f.Code));
        FormerRun.Write(json, result.Crossings);
        json.WriteEndObject();
    }

    private static void Counts(Utf8JsonWriter json, string name, IEnumerable<string> items)
    {
        json.WriteStartObject(name);
        foreach (var group in items.GroupBy(i => i).OrderBy(g => g.Key, StringComparer.Ordinal)) json.WriteNumber(group.Key, group.Count());
        json.WriteEndObject();
    }
}
