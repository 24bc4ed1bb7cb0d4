using System.Diagnostics;
using System.Globalization;
using System.Runtime.InteropServices;
using GeoCulvert.Design.Terrain;
using GeoCulvert.Layers;

namespace GeoCulvert.Benchmarks;

/// <summary>
/// The yardstick: processor time of `gdaldem slope` on the same cells, less its time for nine cells (start-up). How the file is kept moves it
/// by a factor of two, so both are measured: bare float32, and the compressed GeoTIFF this program writes.
/// </summary>
internal static class GdalSlope
{
    /// <summary>Nanoseconds a cell, best of the turns; null where there is no gdaldem or no POSIX shell.</summary>
    public static (double Bare, double Compressed)? NanosecondsPerCell(Grid<float> elevation, int turns)
    {
        if (OperatingSystem.IsWindows() || !IsInstalled()) return null;
        var folder = Directory.CreateTempSubdirectory("geoculvert-benchmark-");
        try
        {
            string File(string name) => Path.Combine(folder.FullName, name);
            string bare = File("bare.bil"), compressed = File("compressed.tif"), tiny = File("tiny.bil"), slope = File("slope.tif");
            Write(bare, elevation);
            Write(tiny, new Grid<float>(new GridFrame(3, 3, 0, 3, 1, 1)));
            using (var crs = Crs.Parse("EPSG:26912")) RasterWriter.WriteCog(compressed, elevation, new WorkingPlane(crs), "Elevation", double.NaN, "m");
            double Best(string file) => Enumerable.Range(0, turns).Min(_ => CpuSeconds("gdaldem", "slope", "-q", file, slope));
            var start = Best(tiny);
            return ((Best(bare) - start) * 1e9 / elevation.Cells.Length, (Best(compressed) - start) * 1e9 / elevation.Cells.Length);
        }
        finally
        {
            folder.Delete(recursive: true);
        }
    }

    private static bool IsInstalled() => (Environment.GetEnvironmentVariable("PATH") ?? "")
        .Split(Path.PathSeparator).Any(folder => File.Exists(Path.Combine(folder, "gdaldem")));

    /// <summary>User and system time of a program: the second line of the shell's `times`, as 0m1.23s 0m0.04s.</summary>
    private static double CpuSeconds(params string[] command)
    {
        using var shell = Process.Start(new ProcessStartInfo(
            "sh", ["-c", "\"$@\" > /dev/null || exit 1; times", "sh", .. command]) { RedirectStandardOutput = true, UseShellExecute = false })!;
        var lines = shell.StandardOutput.ReadToEnd().Split('\n');
        shell.WaitForExit();
        if (shell.ExitCode != 0) throw new InvalidOperationException($"{string.Join(' ', command)} failed.");
        return lines[1].Split(' ').Sum(time =>
        {
            var parts = time.Split('m');
            return (60 * double.Parse(parts[0], CultureInfo.InvariantCulture)) + double.Parse(parts[1].TrimEnd('s'), CultureInfo.InvariantCulture);
        });
    }

    private static void Write(string file, Grid<float> elevation)
    {
        var frame = elevation.Frame;
        File.WriteAllText(Path.ChangeExtension(file, ".hdr"), string.Create(CultureInfo.InvariantCulture, $"""
            BYTEORDER I
            LAYOUT BIL
            NROWS {frame.Rows}
            NCOLS {frame.Columns}
            NBANDS 1
            NBITS 32
            PIXELTYPE FLOAT
            ULXMAP {frame.West + (frame.CellWidthM / 2)}
            ULYMAP {frame.North - (frame.CellHeightM / 2)}
            XDIM {frame.CellWidthM}
            YDIM {frame.CellHeightM}

            """));
        using var stream = File.Create(file);
        for (var row = 0; row < frame.Rows; row++)
            stream.Write(MemoryMarshal.AsBytes(elevation.Cells.AsSpan(row * frame.Columns, frame.Columns)));
    }
}
