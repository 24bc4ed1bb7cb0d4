using System.Text.Json.Nodes;

namespace GeoCulvert.Cli.Project;

/// <summary>The published JSON schema of the project file, for completion in editors.</summary>
internal static class ProjectSchema
{
    /// <summary>The schema (draft 2020-12) as indented text.</summary>
    public static string Write()
    {
        var tables = new JsonObject();
        foreach (var (name, about) in ProjectKeys.Tables)
        {
            var keys = new JsonObject();
            foreach (var key in ProjectKeys.All.Where(k => k.Table == name)) keys[key.Name] = Value(key);
            var table = new JsonObject
            {
                ["type"] = "object",
                ["description"] = about,
                ["additionalProperties"] = false,
                ["properties"] = keys,
            };
            tables[name] = name == "road" ? new JsonObject { ["type"] = "array", ["items"] = table } : table;
        }

        var schema = new JsonObject
        {
            ["$schema"] = "https://json-schema.org/draft/2020-12/schema",
            ["title"] = "GeoCulvert project file",
            ["type"] = "object",
            ["additionalProperties"] = false,
            ["properties"] = tables,
        };
        return schema.ToJsonString(new System.Text.Json.JsonSerializerOptions { WriteIndented = true }).ReplaceLineEndings("\n") + "\n";
    }

    private static JsonObject Value(ProjectKey key)
    {
        var node = key.Kind switch
        {
            KeyKind.Number => Type("number"),
            KeyKind.Integer => Type("integer"),
            KeyKind.Boolean => Type("boolean"),
            KeyKind.Choice => Words(key),
            KeyKind.Choices => List(Words(key)),
            KeyKind.Numbers => List(Type("number")),
            KeyKind.Texts => List(Type("string")),
            KeyKind.Paths => new JsonObject { ["anyOf"] = new JsonArray(Type("string"), List(Type("string"))) },
            KeyKind.Quantity => new JsonObject { ["type"] = "string", ["pattern"] = @"^\s*[-+]?[0-9.]+([eE][-+]?[0-9]+)?\s*\S+.*$" },
            _ => Type("string"),
        };
        node["description"] = key.Description + (key.Default is null ? "" : $"; default {key.Default}");
        return node;
    }

    private static JsonObject Type(string name) => new() { ["type"] = name };

    private static JsonObject List(JsonObject item) => new() { ["type"] = "array", ["items"] = item };

    private static JsonObject Words(ProjectKey key) => new() { ["enum"] = new JsonArray([.. key.Words.Select(w => (JsonNode)w)]) };
}
