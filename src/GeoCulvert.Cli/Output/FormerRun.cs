using System.Text.Json;
using GeoCulvert.Design.Study;
using NetTopologySuite.Geometries;

namespace GeoCulvert.Cli.Output;

/// <summary>The crossings of a run as its <c>run.json</c> keeps them, so that the next run keeps their ids and lists what changed.</summary>
internal static class FormerRun
{
    private const string Key = "known_crossings";

    /// <summary>Writes the crossings as a member of the open object.</summary>
    public static void Write(Utf8JsonWriter json, IReadOnlyList<CrossingResult> crossings)
    {
        json.WriteStartArray(Key);
        foreach (var c in crossings.Select(CrossingIdentity.Of))
        {
            json.WriteStartObject();
            json.WriteString("crossing_id", c.Id);
            json.WriteString("road", c.Road);
            json.WriteBoolean("given", c.IsGiven);
            json.WriteNumber("x", c.Place.X);
            json.WriteNumber("y", c.Place.Y);
            json.WriteNumber("watershed_area_m2", c.AreaM2);
            if (c.DesignFlowM3PerS is { } q) json.WriteNumber("design_flow_m3_s", q);
            if (c.Culvert is { } culvert) json.WriteString("culvert", culvert);
            json.WriteEndObject();
        }

        json.WriteEndArray();
    }

    /// <summary>The crossings of the run whose results lie in a folder; none when there is no run, when it cannot be read, or when it worked in another plane.</summary>
    /// <param name="folder">Results folder.</param>
    /// <param name="workingCrs">Working plane of this run.</param>
    public static IReadOnlyList<FormerCrossing> Read(string folder, string workingCrs)
    {
        var file = Path.Combine(folder, "run.json");
        if (!File.Exists(file)) return [];
        try
        {
            using var json = JsonDocument.Parse(File.ReadAllBytes(file));
            var run = json.RootElement;
            if (run.GetProperty("working_crs").GetString() != workingCrs || !run.TryGetProperty(Key, out var crossings)) return [];
            return [.. crossings.EnumerateArray().Select(c => new FormerCrossing(
                c.GetProperty("crossing_id").GetString()!,
                c.GetProperty("road").GetString()!,
                c.GetProperty("given").GetBoolean(),
                new Coordinate(c.GetProperty("x").GetDouble(), c.GetProperty("y").GetDouble()),
                c.GetProperty("watershed_area_m2").GetDouble(),
                c.TryGetProperty("design_flow_m3_s", out var q) ? q.GetDouble() : null,
                c.TryGetProperty("culvert", out var k) ? k.GetString() : null)).DistinctBy(c => c.Id)];
        }
        catch (Exception e) when (e is JsonException or IOException or UnauthorizedAccessException or KeyNotFoundException or InvalidOperationException or FormatException or ArgumentNullException)
        {
            // A record of another version, or one that somebody edited: this run stands on its own.
            return [];
        }
    }
}
