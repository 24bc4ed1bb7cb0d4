using GeoCulvert.Design.Basis;
using GeoCulvert.Design.Terrain;
using GeoCulvert.Layers;
using NetTopologySuite.Geometries;

namespace GeoCulvert.Cli.Project;

/// <summary>Mapped streams and closed basins of a project.</summary>
internal sealed partial class StudyLoader
{
    private List<MappedCourse>? MappedStreams(WorkingPlane plane) => Vector("streams", "mapped streams", "streams_layer", "streams_where", "streams_name", plane) is not var (layer, named) ? null : Try(() =>
    {
        var lines = layer.Features.SelectMany((f, i) => Lines(f.Geometry).Where(l => l.Length > 0).Select(l => new MappedCourse(named(f, i), l))).ToList();
        return lines.Count > 0 ? lines : throw new InputException(_project.Place(_project["terrain"], "streams"), $"no line in layer {layer.LayerName}", "a layer of lines");
    });

    private List<BasinPoint>? BasinPoints(WorkingPlane plane) => Vector("closed_basins", "closed basins", null, null, "closed_basins_name", plane) is not var (layer, named) ? null : Try(() =>
    {
        var points = layer.Features.Where(f => f.Geometry is Point).Select((f, i) => new BasinPoint(named(f, i), f.Geometry.Coordinate)).ToList();
        return points.Count > 0 ? points : throw new InputException(_project.Place(_project["terrain"], "closed_basins"), $"no point in layer {layer.LayerName}", "a layer of points");
    });

    private (VectorLayer Layer, Func<VectorFeature, int, string> Named)? Vector(string key, string role, string? layerKey, string? whereKey, string nameKey, WorkingPlane plane)
    {
        var table = _project["terrain"];
        NameFile("terrain", key, role);
        if (_project.PathOf(table, key) is not { } path || (!File.Exists(path) && !path.StartsWith("/vsi", StringComparison.Ordinal))) return null;
        var read = Try(() => VectorSource.Read(path, layerKey is null ? null : table.Text(layerKey), whereKey is null ? null : table.Text(whereKey), plane));
        if (read is null) return null;
        _files.Add(InputFacts.Of(table.Text(key)!, path, role, read.Crs));
        _findings.AddRange(read.Findings);
        var field = table.Text(nameKey);
        if (field is not null && !read.FieldNames.Contains(field, StringComparer.OrdinalIgnoreCase))
            _problems.Add(new InputProblem(_project.Place(table, nameKey), $"'{field}'", $"one of the fields {string.Join(", ", read.FieldNames)}"));
        return (read, (f, i) => (field is null ? null : f.Text(field)) ?? $"{i + 1}");
    }
}
