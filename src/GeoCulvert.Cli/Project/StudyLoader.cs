using GeoCulvert.Design.Basis;
using GeoCulvert.Design.Crossings;
using GeoCulvert.Design.Hydrology;
using GeoCulvert.Design.Sizing;
using GeoCulvert.Design.Study;
using GeoCulvert.Layers;
using NetTopologySuite.Geometries;

namespace GeoCulvert.Cli.Project;

/// <summary>A project read and ready to run.</summary>
/// <param name="Name">Study name.</param>
/// <param name="OutputFolder">Where results go.</param>
/// <param name="Inputs">Maps and tables.</param>
/// <param name="Settings">Settings.</param>
/// <param name="Plane">Working plane.</param>
/// <param name="Findings">Doubts of reading.</param>
/// <param name="Files">Inputs with size and hash.</param>
internal sealed record LoadedStudy(
    string Name, string OutputFolder, StudyInputs Inputs, StudySettings Settings, WorkingPlane Plane, IReadOnlyList<Finding> Findings, IReadOnlyList<InputFact> Files);

/// <summary>
/// Reads everything a project names. Every problem of every input is gathered; reading goes on where it can, so that all are said at once.
/// </summary>
internal sealed partial class StudyLoader
{
    private readonly ProjectFile _project;
    private readonly List<InputProblem> _problems;
    private readonly List<Finding> _findings = [];
    private readonly List<InputFact> _files = [];
    private readonly string _shownName;
    private UnitPrices? _prices;
    private string _terrainDatum = "";
    private TailwaterSettings? _tailwater;

    private StudyLoader(ProjectFile project, string shownName) => (_project, _shownName, _problems) = (project, shownName, [.. project.Problems]);

    /// <summary>Reads a project file and all it names.</summary>
    /// <param name="path">The project file.</param>
    /// <param name="checkOnly">Leave class rasters unprojected: everything is opened and the terrain is read, nothing is computed.</param>
    /// <exception cref="InputException">Everything that is wrong.</exception>
    public static LoadedStudy Load(string path, bool checkOnly = false)
    {
        string text;
        try
        {
            text = File.ReadAllText(path);
        }
        catch (Exception e) when (e is IOException or UnauthorizedAccessException)
        {
            throw new InputException(path, $"a project file that cannot be read ({e.Message})", "a TOML file; 'geoculvert new FOLDER' writes one to start from");
        }

        var full = Path.GetFullPath(path);
        var project = ProjectFile.Parse(Path.GetFileName(path), Path.GetDirectoryName(full)!, text);
        return new StudyLoader(project, Path.GetFileName(path)).Assemble(full, checkOnly);
    }

    private LoadedStudy Assemble(string fullPath, bool checkOnly)
    {
        var (elevation, plane, _) = Terrain();
        var roads = plane is null ? NameRoadFiles() : Roads(plane, elevation?.Elevation.Frame);
        var points = plane is null ? NameFile("crossings", "points", "crossings") : Points(plane);
        var culverts = plane is null ? null : KnownCulverts(plane);
        var mapped = plane is null ? null : MappedStreams(plane);
        var basins = plane is null ? null : BasinPoints(plane);
        var inventory = plane is null ? null : Inventory(plane);
        if (inventory is { } existing)
        {
            points = [.. points ?? [], .. existing.Points];
            culverts = [.. culverts ?? [], .. existing.Lines];
            if (points.GroupBy(p => p.Id).FirstOrDefault(g => g.Count() > 1) is { } twice)
                _problems.Add(new InputProblem($"{_shownName}, [inventory] id", $"the id '{twice.Key}' in the inventory and in [crossings] points", "an id of its own for each crossing"));
        }

        var flow = Flow();
        var catalogue = Catalogue();
        _prices = Prices();
        _tailwater = Tailwater();
        var overrides = Try(() => TextFile("crossings", "overrides", "overrides") is { } t ? Overrides.Read(t.Name, t.Text) : Overrides.None) ?? Overrides.None;
        var covers = Try(() =>
        {
            if (TextFile("cover", "lookup", "cover lookup") is not { } t) return Tuple.Create(RunoffCoefficientTable.Published, CoverClasses.Published);
            var table = PublishedTable.Parse(t.Name, t.Text, "cover_id", "name", "C_A", "C_B", "C_C", "C_D");
            return Tuple.Create(RunoffCoefficientTable.From(table, null), CoverClasses.From(table));
        });
        var dual = _project["cover"].Text("dual_soil_group") == "drained" ? DualSoilGroup.Drained : DualSoilGroup.Undrained;
        var curveNumbers = Try(() => TextFile("cover", "curve_numbers", "curve numbers") is { } t
            ? CurveNumberTable.From(PublishedTable.Parse(t.Name, t.Text, "cover_id", "name", "CN_A", "CN_B", "CN_C", "CN_D"), dual)
            : CurveNumberTable.PublishedWith(dual));
        var landCover = Classes("land_cover", elevation?.Elevation.Frame, plane, checkOnly);
        var soilGroup = Classes("soil_group", elevation?.Elevation.Frame, plane, checkOnly);
        var rasters = Rasters(elevation?.Elevation.Frame, plane, checkOnly);
        if (_project.Roads.Count == 0 && points is null && !_project["crossings"].Has("points") && !_project["inventory"].Has("file"))
            _problems.Add(new InputProblem(_shownName, "neither a road nor given crossings", "a [[road]] with file = \"...\", or [crossings] points = \"...\""));
        NeedCoefficient(landCover is not null || _project["cover"].Has("land_cover"));
        if (_problems.Count > 0) throw new InputException(_problems);

        var settings = Settings(flow!, catalogue!);
        var inputs = new StudyInputs
        {
            Elevation = elevation!.Elevation,
            PlaneScale = elevation.Scale,
            Roads = roads,
            Points = points,
            KnownCulverts = culverts ?? [],
            MappedStreams = mapped ?? [],
            BasinPoints = basins ?? [],
            Inventory = inventory?.Barrels ?? [],
            LandCover = landCover,
            SoilGroup = soilGroup,
            Coefficients = covers!.Item1,
            CoverClasses = covers.Item2,
            CurveNumbers = curveNumbers!,
            Rasters = rasters,
            Overrides = overrides,
        };
        var study = _project["study"];
        return new LoadedStudy(
            study.Text("name") ?? Path.GetFileNameWithoutExtension(fullPath), _project.PathOf(study, "folder")!, inputs, settings, plane!, _findings, _files);
    }

    private T? Try<T>(Func<T> read)
        where T : class
    {
        try
        {
            return read();
        }
        catch (InputException e)
        {
            _problems.AddRange(e.Problems);
            return null;
        }
        catch (GdalException e)
        {
            _problems.Add(new InputProblem(_shownName, e.Message, "an input that GDAL can use"));
            return null;
        }
    }

    private Crs? CrsOf(string key)
    {
        var terrain = _project["terrain"];
        if (terrain.Text(key) is not { } text) return null;
        try
        {
            return Crs.Parse(text);
        }
        catch (GdalException e)
        {
            _problems.Add(new InputProblem(_project.Place(terrain, key), e.Message, "a coordinate system, for example \"EPSG:26912\""));
            return null;
        }
    }

    private (string Name, string Text)? TextFile(string table, string key, string role)
    {
        var t = _project[table];
        if (_project.PathOf(t, key) is not { } path) return null;
        var shown = t.Text(key)!;
        try
        {
            var text = File.ReadAllText(path);
            _files.Add(InputFacts.Of(shown, path, role, ""));
            return (shown, text);
        }
        catch (Exception e) when (e is IOException or UnauthorizedAccessException)
        {
            throw new InputException(_project.Place(t, key), $"'{shown}', which cannot be read ({e.Message})", "a file that is there");
        }
    }

    private List<GivenPoint>? NameFile(string table, string key, string role)
    {
        _ = Try(() => _project.PathOf(_project[table], key) is { } p && !File.Exists(p) && !p.StartsWith("/vsi", StringComparison.Ordinal)
            ? throw new InputException(_project.Place(_project[table], key), $"'{_project[table].Text(key)}', which is not there", $"a file of {role}")
            : "");
        return null;
    }

    private List<StudyRoad> NameRoadFiles()
    {
        foreach (var road in _project.Roads)
        {
            if (road.Text("file") is null) _problems.Add(new InputProblem(_project.Place(road, "file"), "no file", "the alignment, for example file = \"road.geojson\""));
            else if (_project.PathOf(road, "file") is { } p && !File.Exists(p) && !p.StartsWith("/vsi", StringComparison.Ordinal))
                _problems.Add(new InputProblem(_project.Place(road, "file"), $"'{road.Text("file")}', which is not there", "a file of lines"));
        }

        return [];
    }

    private static Envelope EnvelopeOf(Design.Terrain.GridFrame frame) => new(frame.West, frame.East, frame.South, frame.North);
}
