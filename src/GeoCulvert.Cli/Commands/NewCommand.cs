using System.CommandLine;
using System.Globalization;
using GeoCulvert.Cli.Project;
using GeoCulvert.Design.Basis;
using GeoCulvert.Layers;

namespace GeoCulvert.Cli.Commands;

/// <summary>geoculvert new: a commented project file to start from.</summary>
internal static class NewCommand
{
    /// <summary>Makes the command.</summary>
    public static Command Create()
    {
        var folder = new Argument<string>("FOLDER") { Description = "Folder to create; a project file already in it is never overwritten." };
        var dem = new Option<string?>("--dem") { Description = "Terrain model; what it says of itself is filled in.", HelpName = "FILE" };
        var road = new Option<string?>("--road") { Description = "Alignment; what it says of itself is filled in.", HelpName = "FILE" };
        var command = new Command("new", "Writes a commented project file to start from, and the schema of its keys for editors.\n\nExample: geoculvert new my-road --dem dem.tif --road road.geojson")
        {
            folder, dem, road,
        };
        command.SetAction(parse => Shell.Run(parse, _ => Write(parse.GetValue(folder)!, parse.GetValue(dem), parse.GetValue(road))));
        return command;
    }

    private static int Write(string folder, string? dem, string? road)
    {
        var values = new Dictionary<string, string>(StringComparer.Ordinal)
        {
            ["study.name"] = ProjectTemplate.Quote(Path.GetFileName(Path.TrimEndingDirectorySeparator(Path.GetFullPath(folder)))),
            ["study.units"] = "\"si\"",
            ["terrain.dem"] = "\"dem.tif\"",
            ["terrain.stream_area"] = "\"10 ha\"",
            ["road.file"] = "\"road.geojson\"",
            ["rainfall.table"] = "\"rainfall.csv\"",
            ["flow.methods"] = "[\"rational\"]",
            ["flow.runoff_coefficient"] = "0.35",
        };
        var remarks = new List<string>();
        WorkingPlane? plane = null;
        if (dem is not null) plane = DescribeTerrain(folder, dem, values, remarks);
        if (road is not null) DescribeRoad(folder, road, plane, values, remarks);

        var file = Path.Combine(folder, "project.toml");
        Directory.CreateDirectory(folder);
        if (File.Exists(file)) throw new InputException(file, "a project file", "a folder without one: nothing is overwritten");
        File.WriteAllText(file, "#:schema project.schema.json\n" + ProjectTemplate.Write(values, remarks));
        File.WriteAllText(Path.Combine(folder, "project.schema.json"), ProjectSchema.Write());
        Console.Out.WriteLine($"Wrote {file}. Set what it asks for, then: geoculvert check {file}");
        return Shell.Done;
    }

    private static WorkingPlane? DescribeTerrain(string folder, string dem, Dictionary<string, string> values, List<string> remarks)
    {
        values["terrain.dem"] = ProjectTemplate.Quote(Relative(folder, dem));
        using var source = RasterSource.OpenMany([dem]);
        remarks.Add($"Terrain: {source.Columns} x {source.Rows} cells, {source.Crs?.Label ?? "no coordinate system: set [terrain] crs"}");
        var hasUnit = source.UnitName.Length > 0 || source.Crs?.VerticalUnitM is not null;
        if (!hasUnit) remarks.Add("The terrain model does not say the unit of its elevations: set [terrain] vertical_unit; it is never guessed.");
        if (source.Crs is not { IsProjected: true } crs) return null;
        values["terrain.working_crs"] = ProjectTemplate.Quote(crs.Code.Length > 0 ? crs.Code : crs.Wkt);
        return new WorkingPlane(Crs.Parse(crs.Wkt));
    }

    private static void DescribeRoad(string folder, string road, WorkingPlane? plane, Dictionary<string, string> values, List<string> remarks)
    {
        values["road.file"] = ProjectTemplate.Quote(Relative(folder, road));
        plane ??= new WorkingPlane(Crs.Parse("EPSG:4326"));
        var layer = VectorSource.Read(road, null, null, plane);
        var first = layer.Features.Count > 0 ? layer.Features[0] : null;
        remarks.Add(string.Create(CultureInfo.InvariantCulture, $"Road: layer {layer.LayerName}, {layer.Features.Count} features, {layer.Crs}, fields {string.Join(", ", layer.FieldNames)}"));
        var name = layer.FieldNames.FirstOrDefault(f => f.Equals("name", StringComparison.OrdinalIgnoreCase));
        if (layer.Features.Count > 1 && name is not null) values["road.name_field"] = ProjectTemplate.Quote(name);
        else if (name is not null && first?.Text(name) is { } text) values["road.name"] = ProjectTemplate.Quote(text);
    }

    private static string Relative(string folder, string path) => path.StartsWith("/vsi", StringComparison.Ordinal)
        ? path
        : Path.GetRelativePath(Path.GetFullPath(folder), Path.GetFullPath(path)).Replace('\\', '/');
}
