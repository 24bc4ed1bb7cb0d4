using System.Globalization;
using GeoCulvert.Design.Basis;
using GeoCulvert.Design.Terrain;

namespace GeoCulvert.Layers;

/// <summary>
/// Reads rasters that are laid over the terrain: classes (land cover, soils) and values. One that lies north-up in the plane of the terrain keeps
/// its own cells, cut to the terrain's extent, so that overlaps are exact. Any other (another projection, turned) is sampled by the nearest
/// cell on a grid in the plane: each cell of the terrain in n x n parts, n = 2 x cell of the terrain / cell of the raster, rounded up, 1 to 8.
/// </summary>
public static class OverlayReader
{
    private const int MostParts = 8;
    private const int NoClass = int.MinValue;

    /// <summary>Classes; <see cref="int.MinValue"/> where there is none.</summary>
    /// <param name="source">An open raster.</param>
    /// <param name="terrain">Frame of the terrain, m.</param>
    /// <param name="plane">Plane of the terrain.</param>
    /// <exception cref="InputException">It has no coordinate system, or is damaged.</exception>
    public static Grid<int> Classes(RasterSource source, GridFrame terrain, WorkingPlane plane) => Read(source, terrain, plane, "Int32", "-2147483648", NoClass, static (s, c, r, w, h, cells) => s.ReadWindow(c, r, w, h, cells.AsSpan()));

    /// <summary>Values in their own unit, scale and offset applied; NaN where there is none.</summary>
    /// <inheritdoc cref="Classes"/>
    public static Grid<float> Values(RasterSource source, GridFrame terrain, WorkingPlane plane)
    {
        ArgumentNullException.ThrowIfNull(source);
        return Read(source, terrain, plane, "Float32", "nan", float.NaN, static (s, c, r, w, h, cells) => s.ReadWindow(c, r, w, h, cells.AsSpan()));
    }

    private delegate void Window<T>(RasterSource source, int column, int row, int width, int height, T[] cells);

    private static Grid<T> Read<T>(RasterSource source, GridFrame terrain, WorkingPlane plane, string type, string nodata, T none, Window<T> window)
        where T : unmanaged
    {
        ArgumentNullException.ThrowIfNull(source);
        ArgumentNullException.ThrowIfNull(plane);
        if (source.Crs is null) throw new InputException(source.Path, "no coordinate system", "a raster that says its own");
        if (!source.HasGeoTransform) throw new InputException(source.Path, "no position (the file has no geotransform)", "a georeferenced raster");
        using Crs from = source.Crs.Horizontal(), to = plane.Crs.Horizontal();
        if (source.IsNorthUp && from.IsSameAs(to)) return AsItLies(source, terrain, plane.Crs.LinearUnitM, none, window);

        var unit = plane.Crs.LinearUnitM;
        double cellM;
        using (var projected = source.Warped("-s_srs", from.Wkt, "-t_srs", to.Wkt)) cellM = projected.GeoTransform[1] * unit;
        var parts = (int)Math.Clamp(Math.Ceiling(2 * Math.Max(terrain.CellWidthM, terrain.CellHeightM) / cellM), 1, MostParts);
        while (parts > 1 && terrain.Count * parts * parts > Array.MaxLength) parts--;
        var frame = terrain with
        {
            Columns = terrain.Columns * parts,
            Rows = terrain.Rows * parts,
            CellWidthM = terrain.CellWidthM / parts,
            CellHeightM = terrain.CellHeightM / parts,
        };
        using var clean = typeof(T) == typeof(float) ? source.Cleaned(double.NaN) : null;
        using var warped = (clean ?? source).Warped(
            "-s_srs", from.Wkt, "-t_srs", to.Wkt, "-r", "near", "-ot", type, "-dstnodata", nodata,
            "-te", Say(terrain.West / unit), Say(terrain.South / unit), Say(terrain.East / unit), Say(terrain.North / unit),
            "-ts", Say(frame.Columns), Say(frame.Rows));
        var grid = new Grid<T>(frame);
        window(warped, 0, 0, frame.Columns, frame.Rows, grid.Cells);
        return grid;
    }

    private static Grid<T> AsItLies<T>(RasterSource source, GridFrame terrain, double unit, T none, Window<T> window)
        where T : unmanaged
    {
        var place = source.GeoTransform;
        var whole = new GridFrame(source.Columns, source.Rows, place[0] * unit, place[3] * unit, place[1] * unit, -place[5] * unit);
        int west = Inside(whole.ColumnAt(terrain.West), whole.Columns), east = Inside(whole.ColumnAt(terrain.East) + 1L, whole.Columns);
        int north = Inside(whole.RowAt(terrain.North), whole.Rows), south = Inside(whole.RowAt(terrain.South) + 1L, whole.Rows);
        if (east <= west || south <= north) return new Grid<T>(whole with { Columns = 1, Rows = 1 }, [none]);
        var frame = whole with
        {
            Columns = east - west,
            Rows = south - north,
            West = whole.West + (west * whole.CellWidthM),
            North = whole.North - (north * whole.CellHeightM),
        };
        if (frame.Count > Array.MaxLength)
        {
            throw new InputException(
                source.Path, $"{frame.Columns} x {frame.Rows} cells over the terrain model", "a raster of fewer cells; one as fine as the terrain model will do");
        }

        var grid = new Grid<T>(frame);
        window(source, west, north, frame.Columns, frame.Rows, grid.Cells);
        return grid;

        static int Inside(long at, int count) => (int)Math.Clamp(at, 0, count);
    }

    private static string Say(double value) => value.ToString("R", CultureInfo.InvariantCulture);
}
