using System.CommandLine;
using GeoCulvert.Cli.Output;
using GeoCulvert.Cli.Project;
using GeoCulvert.Design.Study;
using GeoCulvert.Design.Terrain;
using GeoCulvert.Layers;
using GeoCulvert.Report.Page;
using GeoCulvert.Report.Schedule;

namespace GeoCulvert.Cli.Commands;

/// <summary>geoculvert run: the whole pipeline.</summary>
internal static class RunCommand
{
    /// <summary>Makes the command.</summary>
    public static Command Create()
    {
        var project = new Argument<string>("PROJECT") { Description = "Project file (TOML)." };
        var geoJson = new Option<bool>("--geojson") { Description = "Also write every layer as RFC 7946 GeoJSON (WGS 84) into geojson/." };
        var terrain = new Option<bool>("--terrain") { Description = "Also write the filled terrain, flow directions (degrees from grid north, 0 = none) and accumulation (cells) as cloud-optimised GeoTIFFs into terrain/." };
        var command = new Command("run", "Runs the whole pipeline and writes results.gpkg, report.html, schedule.csv and run.json into the project's results folder.\n\nExample: geoculvert run my-road/project.toml --geojson")
        {
            project, geoJson, terrain,
        };
        command.SetAction((parse, cancel) => Task.FromResult(Shell.Run(
            parse, t => Run(parse.GetValue(project)!, parse.GetValue(geoJson), parse.GetValue(terrain), t, cancel))));
        return command;
    }

    private static int Run(string path, bool geoJson, bool terrain, Terminal terminal, CancellationToken cancel)
    {
        var stages = new TimedStages(terminal);
        var loaded = stages.Run("reading", null, _ => StudyLoader.Load(path));
        using var folder = ResultsFolder.Open(loaded.OutputFolder, $"{Path.GetFileName(path)}, [study] folder");
        var inputs = loaded.Inputs with { Former = FormerRun.Read(loaded.OutputFolder, loaded.Plane.Crs.Label) };
        var result = DrainageStudy.Run(inputs, loaded.Settings, stages, cancel);
        result = result with { Findings = [.. loaded.Findings, .. result.Findings] };
        var settings = SettingsText.Of(path);
        var report = Report(loaded, result, settings);
        stages.Run("writing", null, _ =>
        {
            ResultsWriter.WriteGeoPackage(folder.PathOf("results.gpkg"), report.Layers, loaded.Plane);
            cancel.ThrowIfCancellationRequested();
            if (geoJson)
            {
                Directory.CreateDirectory(folder.PathOf("geojson"));
                ResultsWriter.WriteGeoJson(folder.PathOf("geojson"), report.Layers, loaded.Plane);
            }

            if (terrain) WriteTerrain(folder, result.Terrain, loaded.Plane);
            using (var page = File.Create(folder.PathOf("report.html"))) ReportPage.Write(report, page);
            using (var schedule = File.Create(folder.PathOf("schedule.csv"))) ScheduleCsv.Write(report, schedule);
            return 0;
        });
        cancel.ThrowIfCancellationRequested();
        RunRecord.Write(folder.PathOf("run.json"), path, report, result, stages.Done);
        var files = folder.Publish();
        ClosingTable.Write(Console.Out, result, loaded.Settings.Units);
        Console.Out.WriteLine($"Results: {loaded.OutputFolder} ({string.Join(", ", files.Where(f => !f.Contains(Path.DirectorySeparatorChar, StringComparison.Ordinal)))})");
        return result.Crossings.Any(c => c.Status is CrossingStatus.NotComputed or CrossingStatus.NoSizeFits) ? Shell.DoneInPart : Shell.Done;
    }

    private static StudyReport Report(LoadedStudy loaded, StudyResult result, IReadOnlyList<(string Key, string Value)> settings)
    {
        var run = new List<(string, string)>
        {
            ("program", "GeoCulvert"), ("version", ProgramVersion.Text), ("study", loaded.Name), ("working_crs", loaded.Plane.Crs.Label),
            ("caution", GeoCulvert.Report.ReportCaution.Text),
        };
        run.AddRange(loaded.Files.Select(f => ($"input {f.Role}", $"{f.Path} ({f.Bytes} bytes, sha256 {f.Sha256}) {f.Crs}".TrimEnd())));
        run.AddRange(settings.Select(s => ($"setting {s.Key}", s.Value)));
        return new StudyReport
        {
            StudyName = loaded.Name,
            Units = loaded.Settings.Units,
            CrsName = loaded.Plane.Crs.Label,
            Version = ProgramVersion.Text,
            RunDate = DateTime.Now.ToString("yyyy-MM-dd", System.Globalization.CultureInfo.InvariantCulture),
            Relief = result.Terrain.Elevation,
            Layers = result.Layers(loaded.Settings.Units, run),
            Sheets = [.. result.Crossings.Select(c => c.Sheet)],
            Findings = result.Findings,
            Inputs = loaded.Files,
            Settings = settings,
        };
    }

    private static void WriteTerrain(ResultsFolder folder, DrainedTerrain terrain, WorkingPlane plane)
    {
        Directory.CreateDirectory(folder.PathOf("terrain"));
        RasterWriter.WriteCog(folder.PathOf(Path.Combine("terrain", "filled.tif")), terrain.Filled.Surface, plane, "Elevation, depressions filled", double.NaN, "m");
        RasterWriter.WriteCog(folder.PathOf(Path.Combine("terrain", "accumulation.tif")), terrain.Accumulation, plane, "Cells drained, each cell included", 0);
        var azimuth = new Grid<short>(terrain.Direction.Frame);
        for (var i = 0; i < azimuth.Cells.Length; i++) azimuth.Cells[i] = (short)D8.AzimuthDeg(terrain.Direction.Cells[i]);
        RasterWriter.WriteCog(folder.PathOf(Path.Combine("terrain", "flow_direction.tif")), azimuth, plane, "Flow direction, degrees from grid north, 0 = none", 0);
    }
}

/// <summary>Times stages and shows their progress.</summary>
internal sealed class TimedStages(Terminal terminal) : IStages
{
    private readonly List<(string Name, double Seconds, long? Cells)> _done = [];

    /// <summary>Stages done, in order.</summary>
    public IReadOnlyList<(string Name, double Seconds, long? Cells)> Done => _done;

    /// <inheritdoc/>
    public T Run<T>(string name, long? cells, Func<IProgress<double>, T> work)
    {
        var result = terminal.Stage(name, work, out var seconds);
        _done.Add((name, seconds, cells));
        return result;
    }
}
