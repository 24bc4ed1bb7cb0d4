using GeoCulvert.Design.Basis;
using GeoCulvert.Design.Crossings;
using GeoCulvert.Design.Study;
using GeoCulvert.Design.Terrain;
using GeoCulvert.Layers;
using NetTopologySuite.Geometries;

namespace GeoCulvert.Cli.Project;

/// <summary>Terrain, roads, points and class rasters of a project.</summary>
internal sealed partial class StudyLoader
{
    private (ElevationModel? Model, WorkingPlane? Plane, string Crs) Terrain()
    {
        var terrain = _project["terrain"];
        var shown = terrain.Texts("dem");
        if (shown.Count == 0)
        {
            if (terrain.KeysSet.All(k => k != "dem")) _problems.Add(new InputProblem($"{_shownName}, [terrain] dem", "no terrain model", "a raster, for example dem = \"dem.tif\""));
            return (null, null, "");
        }

        var options = new ElevationOptions(
            CrsOf("crs"), CrsOf("working_crs"), terrain.Number("nodata"), terrain.Text("vertical_unit") is { } unit ? Units.Get(unit).InSi : null, terrain.Number("cell_size"));
        try
        {
            using var source = RasterSource.OpenMany([.. shown.Select(_project.Full)], options.NoData);
            var (crs, _) = ElevationReader.Check(source, options, []);
            foreach (var file in source.Files) _files.Add(InputFacts.Of(Shown(file, shown), file, "terrain", crs.Label) with { NoData = NoDataText(source.TaggedNoData, options.NoData) });
            var model = ElevationReader.Read(source, options);
            _findings.AddRange(model.Findings);
            _terrainDatum = model.VerticalDatum;
            if (model.Elevation.Cells.AsSpan().IndexOfAnyExcept(float.NaN) < 0)
                _problems.Add(new InputProblem(_project.Place(terrain, "dem"), "no cell with data", "a terrain model with elevations"));
            return (model, model.Plane, crs.Label);
        }
        catch (InputException e)
        {
            // The problem names the raster; the key that named it is what its owner will look for.
            _problems.AddRange(e.Problems.Select(p => p.Place.StartsWith('[') ? p : p with { Place = $"{_project.Place(terrain, "dem")}: {p.Place}" }));
            return (null, null, "");
        }
        catch (GdalException e)
        {
            _problems.Add(new InputProblem(_project.Place(terrain, "dem"), e.Message, "a raster that GDAL reads"));
            return (null, null, "");
        }
    }

    /// <summary>A file as the project names it, or by its way from the project's folder: no folder of this machine goes into a record.</summary>
    private string Shown(string file, IReadOnlyList<string> named) =>
        named.FirstOrDefault(n => _project.Full(n) == file) ?? (file.StartsWith("/vsi", StringComparison.Ordinal) ? file : Path.GetRelativePath(_project.Folder, file));

    private static string NoDataText(IReadOnlyList<double> tagged, double? stated) => string.Join(
        ", ", tagged.Select(t => $"{t:R} (file)").Concat(stated is { } s ? [$"{s:R} (project)"] : []));

    private List<StudyRoad> Roads(WorkingPlane plane, GridFrame? frame)
    {
        var roads = new List<StudyRoad>();
        NameRoadFiles();
        foreach (var table in _project.Roads)
        {
            if (_project.PathOf(table, "file") is not { } path || (!File.Exists(path) && !path.StartsWith("/vsi", StringComparison.Ordinal))) continue;
            _ = Try(() =>
            {
                var layer = VectorSource.Read(path, table.Text("layer"), table.Text("where"), plane);
                _files.Add(InputFacts.Of(table.Text("file")!, path, "road", layer.Crs));
                _findings.AddRange(layer.Findings);
                if (!table.Has("profile")) _findings.AddRange(layer.Heights.Doubts(table.Text("file")!, _terrainDatum));
                roads.AddRange(RoadsOf(table, layer, frame));
                return layer;
            });
        }

        var twice = roads.GroupBy(r => r.Alignment.Name).FirstOrDefault(g => g.Count() > 1);
        if (twice is not null)
            _problems.Add(new InputProblem(_shownName, $"{twice.Count()} roads named '{twice.Key}'", "a name of its own for each [[road]]: crossings are known by road and station"));
        return roads;
    }

    private List<StudyRoad> RoadsOf(ProjectTable table, VectorLayer layer, GridFrame? frame)
    {
        var place = _project.Place(table, "file");
        var lines = layer.Features.SelectMany(f => Lines(f.Geometry).Select(l => (f, l))).ToList();
        if (lines.Count == 0) throw new InputException(place, $"no line in layer {layer.LayerName}", "an alignment of lines" + (table.Has("where") ? "; the filter may leave none" : ""));
        if (frame is { } f0 && !lines.Any(l => EnvelopeOf(f0).Intersects(l.l.EnvelopeInternal)))
        {
            var e = lines.Select(l => l.l.EnvelopeInternal).Aggregate(new Envelope(), (a, b) => a.ExpandedBy(b));
            throw new InputException(
                place,
                $"a road outside the terrain model: x {e.MinX:0} to {e.MaxX:0}, y {e.MinY:0} to {e.MaxY:0}",
                $"one that crosses it: x {f0.West:0} to {f0.East:0}, y {f0.South:0} to {f0.North:0} (check the coordinate systems)");
        }

        var field = table.Text("name_field");
        if (field is not null && !layer.FieldNames.Contains(field, StringComparer.OrdinalIgnoreCase))
            throw new InputException(_project.Place(table, "name_field"), $"'{field}'", $"one of the fields {string.Join(", ", layer.FieldNames)}");
        var single = table.Text("name") ?? Path.GetFileNameWithoutExtension(table.Text("file")!);
        var profile = Profile(table);
        return [.. lines.GroupBy(l => field is null ? single : l.f.Text(field) ?? single).Select(g => new StudyRoad(
            new RoadAlignment(g.Key, g.Select(l => l.l))
            {
                RoadClass = table.Text("class"),
                WidthM = table.Needed("width"),
                SideSlope = table.Needed("side_slope"),
                Surface = table.Text("surface")!,
                Profile = profile,
            },
            RoadClass.Named(table.Text("class")!),
            table.Number("design_return_period"),
            table.Number("check_return_period")))];
    }

    /// <summary>Station and elevation, units in the heading: station_m or station_ft, elevation_m or elevation_ft.</summary>
    private List<ProfilePoint>? Profile(ProjectTable table)
    {
        if (_project.PathOf(table, "profile") is not { } path) return null;
        if (!File.Exists(path)) throw new InputException(_project.Place(table, "profile"), $"'{table.Text("profile")}', which is not there", "a CSV table of station and elevation");
        var rows = PublishedTable.Parse(table.Text("profile")!, File.ReadAllText(path));
        var station = rows.Columns.FirstOrDefault(c => c is "station_m" or "station_ft");
        var elevation = rows.Columns.FirstOrDefault(c => c is "elevation_m" or "elevation_ft");
        if (station is null || elevation is null)
            throw new InputException($"{rows.Name} line 1", $"the columns {string.Join(", ", rows.Columns)}", "station_m or station_ft, and elevation_m or elevation_ft");
        double Unit(string column) => column.EndsWith("_ft", StringComparison.Ordinal) ? Units.Foot : 1;
        var points = rows.Rows.Select(r => new ProfilePoint(r.Number(station) * Unit(station), r.Number(elevation) * Unit(elevation))).ToList();
        for (var i = 1; i < points.Count; i++)
        {
            if (points[i].StationM <= points[i - 1].StationM)
                throw new InputException($"{rows.Name} line {rows.Rows[i].Line}", $"station {rows.Rows[i].Text(station)} after {rows.Rows[i - 1].Text(station)}", "rising stations");
        }

        _files.Add(InputFacts.Of(rows.Name, path, "road profile", ""));
        return points.Count > 1 ? points : throw new InputException(rows.Name, $"{points.Count} points", "at least two");
    }

    private List<GivenPoint>? Points(WorkingPlane plane)
    {
        var table = _project["crossings"];
        NameFile("crossings", "points", "points");
        if (_project.PathOf(table, "points") is not { } path || (!File.Exists(path) && !path.StartsWith("/vsi", StringComparison.Ordinal))) return null;
        return Try(() =>
        {
            var layer = VectorSource.Read(path, table.Text("layer"), table.Text("where"), plane);
            _files.Add(InputFacts.Of(table.Text("points")!, path, "crossings", layer.Crs));
            _findings.AddRange(layer.Findings);
            var field = table.Text("id");
            if (field is not null && !layer.FieldNames.Contains(field, StringComparer.OrdinalIgnoreCase))
                throw new InputException(_project.Place(table, "id"), $"'{field}'", $"one of the fields {string.Join(", ", layer.FieldNames)}");
            var points = layer.Features.Where(f => f.Geometry is Point or MultiPoint).SelectMany(f => f.Geometry.Coordinates.Select(c => (f, c))).ToList();
            if (points.Count == 0) throw new InputException(_project.Place(table, "points"), $"no point in layer {layer.LayerName}", "a layer of points");
            var given = points.Select((p, i) => new GivenPoint(field is null ? $"{i + 1}" : p.f.Text(field) ?? $"{i + 1}", p.c)).ToList();
            var twice = given.GroupBy(g => g.Id).FirstOrDefault(g => g.Count() > 1);
            return twice is null ? given : throw new InputException(_project.Place(table, "points"), $"{twice.Count()} points with the id '{twice.Key}'", "an id of its own for each point");
        });
    }

    private List<KnownCulvert>? KnownCulverts(WorkingPlane plane)
    {
        var table = _project["terrain"];
        NameFile("terrain", "culverts", "culvert lines");
        if (_project.PathOf(table, "culverts") is not { } path || (!File.Exists(path) && !path.StartsWith("/vsi", StringComparison.Ordinal))) return null;
        return Try(() =>
        {
            var layer = VectorSource.Read(path, table.Text("culverts_layer"), table.Text("culverts_where"), plane);
            _files.Add(InputFacts.Of(table.Text("culverts")!, path, "known culverts", layer.Crs));
            _findings.AddRange(layer.Findings);
            var field = table.Text("culverts_id");
            if (field is not null && !layer.FieldNames.Contains(field, StringComparer.OrdinalIgnoreCase))
                throw new InputException(_project.Place(table, "culverts_id"), $"'{field}'", $"one of the fields {string.Join(", ", layer.FieldNames)}");
            var lines = layer.Features.SelectMany(f => Lines(f.Geometry).Where(l => l.Length > 0).Select(l => (f, l))).ToList();
            if (lines.Count == 0) throw new InputException(_project.Place(table, "culverts"), $"no line in layer {layer.LayerName}", "a layer of lines, one for each culvert");
            return lines.Select((p, i) => new KnownCulvert(field is null ? $"{i + 1}" : p.f.Text(field) ?? $"{i + 1}", p.l.StartPoint.Coordinate, p.l.EndPoint.Coordinate)).ToList();
        });
    }

    private Grid<int>? Classes(string key, GridFrame? frame, WorkingPlane? plane, bool checkOnly)
    {
        var table = _project["cover"];
        if (_project.PathOf(table, key) is not { } path) return null;
        return Try(() =>
        {
            using var source = RasterSource.Open(path);
            _files.Add(InputFacts.Of(table.Text(key)!, path, key == "land_cover" ? "land cover" : "soil group", source.Crs?.Label ?? ""));
            if (source.Crs is null) throw new InputException(_project.Place(table, key), $"'{table.Text(key)}' without a coordinate system", "a raster that says its own");
            return frame is null || plane is null || checkOnly ? new Grid<int>(new GridFrame(1, 1, 0, 0, 1, 1)) : OverlayReader.Classes(source, frame.Value, plane);
        });
    }

    private List<StudyRaster> Rasters(GridFrame? frame, WorkingPlane? plane, bool checkOnly)
    {
        var table = _project["cover"];
        var rasters = new List<StudyRaster>();
        foreach (var shown in table.Texts("means"))
        {
            _ = Try(() =>
            {
                var name = Path.GetFileNameWithoutExtension(shown);
                if (rasters.Any(r => r.Name == name)) throw new InputException(_project.Place(table, "means"), $"two rasters named '{name}'", "files with names of their own: results know them by name");
                using var source = RasterSource.Open(_project.Full(shown));
                _files.Add(InputFacts.Of(shown, _project.Full(shown), "raster", source.Crs?.Label ?? ""));
                if (source.Crs is null) throw new InputException(_project.Place(table, "means"), $"'{shown}' without a coordinate system", "a raster that says its own");
                rasters.Add(new(name, frame is null || plane is null || checkOnly ? new Grid<float>(new GridFrame(1, 1, 0, 0, 1, 1)) : OverlayReader.Values(source, frame.Value, plane)));
                return "";
            });
        }

        return rasters;
    }

    private static IEnumerable<LineString> Lines(Geometry geometry) => geometry switch
    {
        LineString l => [l],
        MultiLineString m => m.Geometries.Cast<LineString>(),
        GeometryCollection c => c.Geometries.SelectMany(Lines),
        _ => [],
    };
}
