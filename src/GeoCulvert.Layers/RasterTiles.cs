using GeoCulvert.Design.Basis;

namespace GeoCulvert.Layers;

/// <summary>
/// Tiles joined to one raster in memory. GDAL's own joining leaves out tiles that differ in type, direction or bands with no more than a
/// warning, and fills gaps with 0 when the first tile has no nodata value; both would be wrong terrain, so tiles are made alike or refused here.
/// </summary>
internal static unsafe class RasterTiles
{
    private const int Int32 = 5, Float32 = 6, Float64 = 7;

    /// <summary>Joins rasters; later ones lie on top of earlier ones.</summary>
    /// <param name="shown">Path as the user knows the whole.</param>
    /// <param name="files">At least two files.</param>
    /// <param name="statedNoData">Nodata of tiles that do not say their own, so that it covers no cell of another tile.</param>
    /// <exception cref="InputException">A tile cannot be opened or does not fit the first.</exception>
    public static RasterSource Join(string shown, IReadOnlyList<string> files, double? statedNoData)
    {
        var open = new List<RasterSource>();
        try
        {
            foreach (var file in files) open.Add(RasterSource.Open(file));
            var problems = open.SelectMany(t => Differences(t, open[0])).ToList();
            if (problems.Count > 0) throw new InputException(problems);
            var findings = TileDoubts.Of(open, statedNoData);
            double[] tagged = [.. open.SelectMany(t => t.TaggedNoData).Distinct()];
            var type = open.All(t => t.DataType is >= 1 and <= Int32 and not 4) ? Int32 : open.Any(t => t.DataType is 4 or Float64) ? Float64 : Float32;
            var alike = open.Select(t => Typed(t, type, statedNoData)).ToList();
            open.AddRange(alike); // a tile in its new type reads from the one as it was
            return new RasterSource(shown, Joined(alike, type), [.. Enumerable.Reverse(open)]) { Findings = findings, TaggedNoData = tagged };
        }
        catch
        {
            foreach (var tile in Enumerable.Reverse(open)) tile.Dispose();
            throw;
        }
    }

    private static IEnumerable<InputProblem> Differences(RasterSource tile, RasterSource first)
    {
        if (!tile.HasGeoTransform || !tile.IsNorthUp)
            yield return new InputProblem(tile.Path, tile.HasGeoTransform ? "rows that do not run from north to south" : "no position (the file has no geotransform)", "a north-up tile; gdalwarp makes one");
        if ((tile.Crs is null) != (first.Crs is null) || (tile.Crs is not null && !tile.Crs.IsSameAs(first.Crs!)))
            yield return new InputProblem(tile.Path, $"the coordinate system {tile.Crs?.Label ?? "none"}", $"that of the first tile, {first.Crs?.Label ?? "none"}");
        if (!string.Equals(tile.UnitName.Trim(), first.UnitName.Trim(), StringComparison.OrdinalIgnoreCase))
            yield return new InputProblem(tile.Path, $"values in '{tile.UnitName}'", $"the unit of the first tile, '{first.UnitName}'");
        if (tile.Scale != first.Scale || tile.Offset != first.Offset)
            yield return new InputProblem(tile.Path, $"a scale of {tile.Scale} and offset of {tile.Offset}", $"those of the first tile, {first.Scale} and {first.Offset}");
    }

    private static RasterSource Typed(RasterSource tile, int type, double? statedNoData)
    {
        Gdal.Clear();
        List<string> wanted = ["-of", "VRT", "-b", "1", "-ot", type switch { Int32 => "Int32", Float32 => "Float32", _ => "Float64" }];
        if (tile.NoData is null && statedNoData is { } stated) wanted.AddRange(["-a_nodata", stated.ToString("R", System.Globalization.CultureInfo.InvariantCulture)]);
        using var arguments = new NativeList(wanted);
        var options = Native.GDALTranslateOptionsNew(arguments.Pointer, 0);
        int wrong;
        var made = Native.GDALTranslate("", tile.Dataset, options, &wrong);
        Native.GDALTranslateOptionsFree(options);
        return new RasterSource(tile.Path, Gdal.Check(made, $"Joining {tile.Path}"), []);
    }

    private static nint Joined(List<RasterSource> tiles, int type)
    {
        Gdal.Clear();
        using var arguments = new NativeList("-resolution", "highest", "-vrtnodata", type == Int32 ? "-2147483648" : "nan");
        var options = Native.GDALBuildVRTOptionsNew(arguments.Pointer, 0);
        var handles = tiles.Select(p => p.Dataset).ToArray();
        int wrong;
        fixed (nint* h = handles)
        {
            var vrt = Native.GDALBuildVRT("", tiles.Count, h, 0, options, &wrong);
            Native.GDALBuildVRTOptionsFree(options);
            return Gdal.Check(vrt, "Joining tiles");
        }
    }
}
