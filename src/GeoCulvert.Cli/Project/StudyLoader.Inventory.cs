using GeoCulvert.Design.Basis;
using GeoCulvert.Design.Crossings;
using GeoCulvert.Design.Study;
using GeoCulvert.Layers;
using NetTopologySuite.Geometries;

namespace GeoCulvert.Cli.Project;

/// <summary>Existing culverts of a project.</summary>
internal sealed partial class StudyLoader
{
    private static readonly string[] InventoryFieldKeys = ["id", "shape", "size", "span", "rise", "barrels", "material", "inlet", "length", "inlet_elevation", "outlet_elevation"];

    /// <summary>The inventory: existing barrels by id, their places, and those drawn as lines as known culverts.</summary>
    private (Dictionary<string, ExistingBarrels> Barrels, List<GivenPoint> Points, List<KnownCulvert> Lines)? Inventory(WorkingPlane plane)
    {
        var table = _project["inventory"];
        NameFile("inventory", "file", "existing culverts");
        if (_project.PathOf(table, "file") is not { } path || (!File.Exists(path) && !path.StartsWith("/vsi", StringComparison.Ordinal))) return null;
        var read = Try(() => VectorSource.Read(path, table.Text("layer"), table.Text("where"), plane));
        if (read is null) return null;
        _files.Add(InputFacts.Of(table.Text("file")!, path, "inventory", read.Crs));
        _findings.AddRange(read.Findings);
        foreach (var key in InventoryFieldKeys.Where(k => table.Text(k) is { } f && !read.FieldNames.Contains(f, StringComparer.OrdinalIgnoreCase)))
            _problems.Add(new InputProblem(_project.Place(table, key), $"'{table.Text(key)}'", $"one of the fields {string.Join(", ", read.FieldNames)}"));
        if (table.Text("size") is null && table.Text("span") is null)
            _problems.Add(new InputProblem($"{_shownName}, [inventory] size", "no field of sizes", "size = \"...\", or span and rise"));
        if (read.Features.Count == 0) _problems.Add(new InputProblem(_project.Place(table, "file"), $"no feature in layer {read.LayerName}", "a layer of points or lines"));

        var fields = new InventoryFields
        {
            Shape = table.Text("shape"), Size = table.Text("size"), Span = table.Text("span"), Rise = table.Text("rise"), Barrels = table.Text("barrels"), Material = table.Text("material"),
            Inlet = table.Text("inlet"), Length = table.Text("length"), InletElevation = table.Text("inlet_elevation"), OutletElevation = table.Text("outlet_elevation"),
            SizeUnit = table.Text("size_unit"), LengthUnit = table.Text("length_unit"), ElevationUnit = table.Text("elevation_unit"),
        };
        var barrels = new Dictionary<string, ExistingBarrels>(StringComparer.Ordinal);
        var points = new List<GivenPoint>();
        var lines = new List<KnownCulvert>();
        foreach (var (feature, i) in read.Features.Select((f, i) => (f, i)))
        {
            var named = table.Text("id") is { } field ? feature.Text(field)?.Trim() : null;
            var id = string.IsNullOrEmpty(named) ? $"row {i + 1}" : named;
            for (var n = 2; barrels.ContainsKey(id); n++) id = $"{(string.IsNullOrEmpty(named) ? $"row {i + 1}" : named)} ({n})";
            if (id != named)
                _findings.Add(InventoryFindings.Assumed.With($"{table.Text("file")}, feature {feature.Id}: {(string.IsNullOrEmpty(named) ? "no id" : $"id '{named}' a second time")}, called '{id}'").At(id));
            barrels[id] = Design.Study.Inventory.Read(id, feature.Fields, fields);
            var whole = Lines(feature.Geometry).FirstOrDefault(l => l.Length > 0);
            if (whole is not null) lines.Add(new KnownCulvert(id, whole.StartPoint.Coordinate, whole.EndPoint.Coordinate));
            var place = whole is null ? feature.Geometry.Centroid.Coordinate : new Coordinate((whole.StartPoint.X + whole.EndPoint.X) / 2, (whole.StartPoint.Y + whole.EndPoint.Y) / 2);
            points.Add(new GivenPoint(id, place));
        }

        return (barrels, points, lines);
    }
}
