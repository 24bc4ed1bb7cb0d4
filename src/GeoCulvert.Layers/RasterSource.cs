using System.Globalization;
using GeoCulvert.Design.Basis;

namespace GeoCulvert.Layers;

/// <summary>A raster that is open for reading, in windows.</summary>
public sealed unsafe class RasterSource : IDisposable
{
    private const int Float32 = 6;
    private const int Int32 = 5;
    private readonly DatasetHandle _dataset;
    private readonly IReadOnlyList<RasterSource> _parts;
    private readonly nint _band;
    private readonly Lazy<DeflatedTiles?> _tiles;

    /// <param name="path">Path as given.</param>
    /// <param name="dataset">Open dataset, owned from here on.</param>
    /// <param name="parts">What the dataset reads from and must outlive it.</param>
    internal RasterSource(string path, nint dataset, IReadOnlyList<RasterSource> parts)
    {
        (Path, _dataset, _parts) = (path, new DatasetHandle(dataset), parts);
        Columns = Native.GDALGetRasterXSize(dataset);
        Rows = Native.GDALGetRasterYSize(dataset);
        Bands = Native.GDALGetRasterCount(dataset);
        if (Bands < 1) throw new InputException(path, "no raster band", "a raster with at least one band");
        _band = Native.GDALGetRasterBand(dataset, 1);
        var six = stackalloc double[6];
        HasGeoTransform = Native.GDALGetGeoTransform(dataset, six) == 0;
        GeoTransform = new ReadOnlySpan<double>(six, 6).ToArray();
        Crs = Crs.FromBorrowed(Native.GDALGetSpatialRef(dataset));
        int has;
        var nodata = Native.GDALGetRasterNoDataValue(_band, &has);
        NoData = has != 0 ? nodata : null;
        TaggedNoData = has != 0 ? [nodata] : [];
        UnitName = Native.Text(Native.GDALGetRasterUnitType(_band));
        DataType = Native.GDALGetRasterDataType(_band);
        ColourInterpretation = Native.GDALGetRasterColorInterpretation(_band);
        var scale = Native.GDALGetRasterScale(_band, &has);
        Scale = has != 0 && scale != 0 ? scale : 1;
        var offset = Native.GDALGetRasterOffset(_band, &has);
        Offset = has != 0 ? offset : 0;
        int width, height;
        Native.GDALGetBlockSize(_band, &width, &height);
        BlockRows = Math.Max(1, height);
        _tiles = new(() => DeflatedTiles.Of(this, _band));
        Gdal.Clear();
    }

    /// <summary>Path as given.</summary>
    public string Path { get; }

    /// <summary>Number of columns.</summary>
    public int Columns { get; }

    /// <summary>Number of rows.</summary>
    public int Rows { get; }

    /// <summary>Whether the file says where it lies.</summary>
    public bool HasGeoTransform { get; }

    /// <summary>GDAL's six numbers: x origin, x per column, x per row, y origin, y per column, y per row.</summary>
    public IReadOnlyList<double> GeoTransform { get; }

    /// <summary>Coordinate system, or null when the file has none.</summary>
    public Crs? Crs { get; }

    /// <summary>Tagged nodata value, or null.</summary>
    public double? NoData { get; }

    /// <summary>Nodata values as the file, or each of the tiles, tags them.</summary>
    public IReadOnlyList<double> TaggedNoData { get; internal init; }

    /// <summary>Unit of the values as the file says it, or "".</summary>
    public string UnitName { get; }

    /// <summary>GDAL's number of the cell type: 1 byte, 2 and 3 16-bit, 4 and 5 32-bit integers, 6 and 7 floating point.</summary>
    internal int DataType { get; }

    /// <summary>Factor on stored values.</summary>
    public double Scale { get; }

    /// <summary>Added to stored values after the factor.</summary>
    public double Offset { get; }

    /// <summary>Whether whole blocks are read past GDAL (deflate-compressed float32 GeoTIFF on a disk).</summary>
    public bool ReadsBlocksItself => _tiles.Value is not null;

    /// <summary>Rows of a block of the file: windows that begin and end at blocks are read fastest.</summary>
    public int BlockRows { get; }

    /// <summary>Number of bands; the first is read.</summary>
    public int Bands { get; }

    /// <summary>GDAL's number for what the first band's values mean as colours: 0 and 1 nothing, 2 palette, 3 to 6 red, green, blue, alpha.</summary>
    internal int ColourInterpretation { get; }

    /// <summary>Doubts of joining tiles.</summary>
    public IReadOnlyList<Finding> Findings { get; internal init; } = [];

    /// <summary>Every file that is read: each tile with its sidecars, and what a VRT names.</summary>
    public IReadOnlyList<string> Files => [.. _parts.SelectMany(p => p.Files).Concat(OwnFiles()).Distinct(StringComparer.Ordinal)];

    /// <summary>Whether rows run south and columns east, without rotation.</summary>
    public bool IsNorthUp => GeoTransform[1] > 0 && GeoTransform[5] < 0 && GeoTransform[2] == 0 && GeoTransform[4] == 0;

    internal nint Dataset => _dataset.Pointer;

    /// <summary>Opens a raster.</summary>
    /// <exception cref="InputException">It is not there or not a raster; GDAL's own words are in the text.</exception>
    public static RasterSource Open(string path)
    {
        ArgumentNullException.ThrowIfNull(path);
        Gdal.Ensure();
        Gdal.Clear();
        if (!path.StartsWith("/vsi", StringComparison.Ordinal) && !File.Exists(path) && !Directory.Exists(path))
            throw new InputException(path, "no such file", "a raster that GDAL reads");
        var dataset = Native.GDALOpenEx(path, 0x02 /* raster */ | 0x40 /* say errors */, 0, 0, 0);
        return dataset != 0
            ? new RasterSource(path, dataset, [])
            : throw new InputException(path, $"something GDAL does not open as a raster ({Gdal.Says()})", "a raster that GDAL reads");
    }

    /// <summary>Opens one file, several, or the rasters of a folder as one.</summary>
    /// <param name="paths">Files and folders.</param>
    /// <param name="statedNoData">Nodata of tiles that do not say their own.</param>
    /// <exception cref="InputException">One of them cannot be used, or they do not share coordinate system, unit, scale and direction.</exception>
    public static RasterSource OpenMany(IReadOnlyList<string> paths, double? statedNoData = null)
    {
        ArgumentNullException.ThrowIfNull(paths);
        var files = paths.SelectMany(p => Directory.Exists(p)
            ? Directory.EnumerateFiles(p).Where(f => System.IO.Path.GetExtension(f).ToLowerInvariant() is ".tif" or ".tiff" or ".asc" or ".img" or ".vrt" or ".bil" or ".flt").Order(StringComparer.Ordinal)
            : Enumerable.Repeat(p, 1)).ToArray();
        if (files.Length == 0) throw new InputException(string.Join(", ", paths), "no raster in the folder", "files ending in .tif, .tiff, .asc, .img, .vrt, .bil or .flt");
        if (files.Length == 1) return Open(files[0]);
        return RasterTiles.Join(string.Join(", ", paths), files, statedNoData);
    }

    /// <summary>The raster as it would be after projection; nothing is computed until it is read.</summary>
    /// <param name="arguments">Arguments of GDAL's warp utility.</param>
    internal RasterSource Warped(params IReadOnlyList<string> arguments)
    {
        Gdal.Clear();
        using var list = new NativeList([.. arguments, "-of", "VRT"]);
        var options = Native.GDALWarpAppOptionsNew(list.Pointer, 0);
        var source = Dataset;
        int wrong;
        var warped = Native.GDALWarp("", 0, 1, &source, options, &wrong);
        Native.GDALWarpAppOptionsFree(options);
        return warped != 0
            ? new RasterSource(Path, warped, [])
            : throw new InputException(Path, $"a raster that cannot be projected ({Gdal.Says()})", "a raster with a known coordinate system");
    }

    /// <summary>The same raster in memory as float32 with NaN for nodata, the tagged and the stated one; scale and offset are applied.</summary>
    internal RasterSource Cleaned(double statedNoData)
    {
        using var none = new NativeList();
        var memory = Gdal.Check(Native.GDALCreate(Native.GDALGetDriverByName("MEM"), "", Columns, Rows, 1, Float32, none.Pointer), $"Reading {Path}");
        var place = GeoTransform.ToArray();
        fixed (double* six = place) Gdal.Check(Native.GDALSetGeoTransform(memory, six), $"Reading {Path}");
        var band = Native.GDALGetRasterBand(memory, 1);
        Gdal.Check(Native.GDALSetRasterNoDataValue(band, double.NaN), $"Reading {Path}");
        var line = new float[Columns];
        fixed (float* p = line)
        {
            for (var row = 0; row < Rows; row++)
            {
                ReadWindow(0, row, Columns, 1, line, statedNoData);
                Gdal.Check(Native.GDALRasterIO(band, 1, 0, row, Columns, 1, p, Columns, 1, Float32, 0, 0), $"Reading {Path}");
            }
        }

        return new RasterSource(Path, memory, []);
    }

    /// <summary>Reads a window as float32; nodata becomes NaN, scale and offset are applied.</summary>
    /// <exception cref="InputException">The file is damaged; GDAL's own words are in the text.</exception>
    public void ReadWindow(int column, int row, int width, int height, Span<float> values, double? statedNoData = null)
    {
        if (values.Length < (long)width * height) throw new ArgumentException("The buffer is too small.", nameof(values));
        Gdal.Clear();
        var isWhole = width == Columns && height >= BlockRows && row % BlockRows == 0 && (height % BlockRows == 0 || row + height == Rows);
        if (!isWhole || _tiles.Value?.TryRead(row, height, values) != true)
        {
            fixed (float* p = values)
            {
                if (Native.GDALRasterIO(_band, 0, column, row, width, height, p, width, height, Float32, 0, 0) != 0) throw Damaged(column, row);
            }
        }

        var used = values[..(width * height)];
        foreach (var nodata in new[] { NoData, statedNoData })
        {
            if (nodata is { } n && !double.IsNaN(n)) used.Replace((float)n, float.NaN);
        }

        if (Scale == 1 && Offset == 0) return;
        for (var i = 0; i < used.Length; i++) used[i] = (float)((used[i] * Scale) + Offset);
    }

    /// <summary>Reads a window of classes; nodata becomes <see cref="int.MinValue"/>.</summary>
    /// <exception cref="InputException">The file is damaged.</exception>
    public void ReadWindow(int column, int row, int width, int height, Span<int> values)
    {
        if (values.Length < (long)width * height) throw new ArgumentException("The buffer is too small.", nameof(values));
        Gdal.Clear();
        fixed (int* p = values)
        {
            if (Native.GDALRasterIO(_band, 0, column, row, width, height, p, width, height, Int32, 0, 0) != 0) throw Damaged(column, row);
        }

        if (NoData is { } n && n >= int.MinValue && n <= int.MaxValue) values[..(width * height)].Replace((int)n, int.MinValue);
    }

    /// <inheritdoc/>
    public void Dispose()
    {
        Crs?.Dispose();
        if (_tiles.IsValueCreated) _tiles.Value?.Dispose();
        _dataset.Dispose();
        foreach (var part in _parts) part.Dispose();
    }

    private List<string> OwnFiles()
    {
        var list = Native.GDALGetFileList(Dataset);
        var files = new List<string>();
        for (var i = 0; list != 0 && ((nint*)list)[i] != 0; i++) files.Add(Native.Text(((nint*)list)[i]));
        Native.CSLDestroy(list);
        return files;
    }

    private InputException Damaged(int column, int row) => new(
        string.Create(CultureInfo.InvariantCulture, $"{Path}, row {row}, column {column}"), $"cells that GDAL cannot read ({Gdal.Says()})", "a whole, undamaged raster");
}
