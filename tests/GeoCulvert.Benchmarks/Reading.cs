using GeoCulvert.Layers;

namespace GeoCulvert.Benchmarks;

/// <summary>
/// Reading a raster beside GDAL reading it, in one process and into the same memory: processor time, one thread. GDAL's turn asks for windows that are one column
/// short, which the reader leaves to GDAL, block by block all the same.
/// </summary>
internal static class Reading
{
    /// <summary>Prints nanoseconds a cell, best of the turns, and the ratio.</summary>
    public static void Report(string file, int turns)
    {
        using var first = RasterSource.Open(file);
        var cells = new float[checked(first.Columns * first.Rows)];
        Array.Fill(cells, 1f); // pages are there before any clock runs
        double Best(int columns) => Enumerable.Range(0, turns + 2).Select(_ => Spent(file, columns, cells)).Skip(2).Min() * 1e9 / cells.Length;
        double gdal = Best(first.Columns - 1), own = Best(first.Columns);
        Console.WriteLine($"{Path.GetFileName(file)}, {first.Columns} x {first.Rows} cells, {(first.ReadsBlocksItself ? "unpacked here" : "left to GDAL")}, best of {turns}, ns a cell: GDAL {gdal:0.0}, own {own:0.0}, ratio {own / gdal:0.00}");
    }

    private static double Spent(string file, int columns, float[] cells)
    {
        var before = Environment.CpuUsage.TotalTime;
        using var source = RasterSource.Open(file); // opened anew: GDAL keeps blocks of an open file
        var step = Math.Max(1, (1 << 22) / source.Columns / source.BlockRows) * source.BlockRows;
        for (var row = 0; row < source.Rows; row += step)
        {
            var height = Math.Min(step, source.Rows - row);
            source.ReadWindow(0, row, columns, height, cells.AsSpan(row * source.Columns));
        }

        return (Environment.CpuUsage.TotalTime - before).TotalSeconds;
    }
}
