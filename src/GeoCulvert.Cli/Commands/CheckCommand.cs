using System.CommandLine;
using GeoCulvert.Cli.Project;
using GeoCulvert.Design.Basis;

namespace GeoCulvert.Cli.Commands;

/// <summary>geoculvert check: everything wrong or doubtful in the inputs, at once.</summary>
internal static class CheckCommand
{
    /// <summary>Makes the command.</summary>
    public static Command Create()
    {
        var project = new Argument<string>("PROJECT") { Description = "Project file (TOML)." };
        var command = new Command("check", "Reads and checks every input and says everything that is wrong or doubtful at once; computes nothing.\n\nExample: geoculvert check my-road/project.toml")
        {
            project,
        };
        command.SetAction(parse => Shell.Run(parse, _ =>
        {
            var loaded = StudyLoader.Load(parse.GetValue(project)!, checkOnly: true);
            var frame = loaded.Inputs.Elevation.Frame;
            Console.Out.WriteLine($"{loaded.Name}: the inputs can be used.");
            Console.Out.WriteLine($"  terrain   {frame.Columns} x {frame.Rows} cells of {frame.CellWidthM:0.###} x {frame.CellHeightM:0.###} m, {loaded.Plane.Crs.Label}");
            foreach (var road in loaded.Inputs.Roads)
                Console.Out.WriteLine($"  road      {road.Alignment.Name}: {road.Alignment.LengthM:0} m, {road.Class.Name}, {(road.Alignment.Profile is not null ? "given profile" : road.Alignment.HasElevation ? "elevations of the line" : "levels from the terrain")}");
            if (loaded.Inputs.Points is { } points) Console.Out.WriteLine($"  crossings {points.Count} given");
            Console.Out.WriteLine($"  results   {loaded.OutputFolder}");
            foreach (var finding in loaded.Findings.OrderByDescending(f => f.Severity))
                Console.Out.WriteLine($"  {(finding.Severity == Severity.Note ? "note" : "doubt")}     {finding.Sentence} [{finding.Code}]");
            return Shell.Done;
        }));
        return command;
    }
}
