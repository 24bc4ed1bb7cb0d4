using GeoCulvert.Design.Terrain;

namespace GeoCulvert.Layers;

/// <summary>Writes grids as cloud-optimised GeoTIFFs.</summary>
public static unsafe class RasterWriter
{
    /// <summary>Writes a grid; the file is written under a temporary name beside it and then moved.</summary>
    /// <typeparam name="T">byte, short, int or float.</typeparam>
    /// <param name="path">File to write.</param>
    /// <param name="grid">The grid.</param>
    /// <param name="plane">Where it lies.</param>
    /// <param name="description">What a cell is.</param>
    /// <param name="noData">Value of cells without data, or null.</param>
    /// <param name="unit">Unit of the values, or "".</param>
    /// <exception cref="GdalException">GDAL could not write; the former file is untouched.</exception>
    /// <exception cref="IOException">The disk or the folder refused; the former file is untouched.</exception>
    public static void WriteCog<T>(string path, Grid<T> grid, WorkingPlane plane, string description, double? noData = null, string unit = "")
        where T : unmanaged
    {
        ArgumentNullException.ThrowIfNull(grid);
        ArgumentNullException.ThrowIfNull(plane);
        var (type, predictor) = default(T) switch
        {
            byte => (1, "NO"),
            short => (3, "STANDARD"),
            int => (5, "STANDARD"),
            float => (6, "FLOATING_POINT"),
            _ => throw new ArgumentException($"Cells of {typeof(T).Name} are not written.", nameof(grid)),
        };
        MovedIntoPlace.FromMemory(path, ".tif", temporary =>
        {
            var frame = grid.Frame;
            var scale = plane.Crs.LinearUnitM;
            using var none = new NativeList();
            using var memory = new DatasetHandle(Gdal.Check(
                Native.GDALCreate(Native.GDALGetDriverByName("MEM"), "", frame.Columns, frame.Rows, 1, type, none.Pointer), $"Preparing {path}"));
            var six = stackalloc double[6] { frame.West / scale, frame.CellWidthM / scale, 0, frame.North / scale, 0, -frame.CellHeightM / scale };
            Gdal.Check(Native.GDALSetGeoTransform(memory.Pointer, six), $"Preparing {path}");
            Gdal.Check(Native.GDALSetSpatialRef(memory.Pointer, plane.Crs.Pointer), $"Preparing {path}");
            var band = Native.GDALGetRasterBand(memory.Pointer, 1);
            Native.GDALSetDescription(band, description);
            if (unit.Length > 0) Gdal.Check(Native.GDALSetRasterUnitType(band, unit), $"Preparing {path}");
            if (noData is { } n) Gdal.Check(Native.GDALSetRasterNoDataValue(band, n), $"Preparing {path}");
            fixed (T* p = grid.Cells)
                Gdal.Check(Native.GDALRasterIO(band, 1, 0, 0, frame.Columns, frame.Rows, p, frame.Columns, frame.Rows, type, 0, 0), $"Preparing {path}");
            using var options = new NativeList("COMPRESS=DEFLATE", $"PREDICTOR={predictor}", "OVERVIEWS=AUTO", "RESAMPLING=NEAREST", "BIGTIFF=IF_SAFER");
            using var written = new DatasetHandle(Gdal.Check(
                Native.GDALCreateCopy(Native.GDALGetDriverByName("COG"), temporary, memory.Pointer, 1, options.Pointer, 0, 0), $"Writing {path}"));
            MovedIntoPlace.Flush(written, path);
        });
    }
}
