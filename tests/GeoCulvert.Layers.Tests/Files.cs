using System.Diagnostics;
using GeoCulvert.Design.Terrain;
using GeoCulvert.Layers;

namespace GeoCulvert.Layers.Tests;

internal static class Files
{
    public static string Data(string name) => Path.Combine(AppContext.BaseDirectory, "Data", name);

    public static string NewFolder() => Directory.CreateTempSubdirectory("geoculvert-layers-").FullName;

    public static WorkingPlane Utm12() => new(Crs.Parse("EPSG:26912"));

    /// <summary>A small raster of plain text, in a wrapper that names its coordinate system.</summary>
    public static string Raster(string folder, string name, string cells, string crs, double cell = 10, double x = 430000, double y = 4514000, string more = "")
    {
        var rows = cells.Split('\n', StringSplitOptions.RemoveEmptyEntries);
        var columns = rows[0].Split(' ').Length;
        Directory.CreateDirectory(Path.Combine(folder, "cells"));
        File.WriteAllText(Path.Combine(folder, "cells", name + ".asc"), $"ncols {columns}\nnrows {rows.Length}\nxllcorner {x}\nyllcorner {y}\ncellsize {cell}\n{more}" + string.Join('\n', rows) + "\n");
        var path = Path.Combine(folder, name + ".vrt");
        var noData = more.Length > 0 ? $"<NoDataValue>{more.Split(' ')[1].Trim()}</NoDataValue>" : "";
        File.WriteAllText(path, $"""
            <VRTDataset rasterXSize="{columns}" rasterYSize="{rows.Length}"><SRS>{crs}</SRS><GeoTransform>{x}, {cell}, 0, {y + (cell * rows.Length)}, 0, -{cell}</GeoTransform>
            <VRTRasterBand dataType="Float32" band="1">{noData}<SimpleSource><SourceFilename relativeToVRT="1">cells/{name}.asc</SourceFilename><SourceBand>1</SourceBand></SimpleSource></VRTRasterBand></VRTDataset>
            """);
        return path;
    }

    public static Grid<float> Plane(int columns, int rows)
    {
        var grid = new Grid<float>(new GridFrame(columns, rows, 430000, 4515000, 10, 10));
        for (var i = 0; i < grid.Cells.Length; i++) grid.Cells[i] = 100 + (i % columns) + (0.25f * (i / columns));
        grid.Cells[3] = float.NaN;
        return grid;
    }

    public static (int Code, string Text) Start(string program, params string[] arguments)
    {
        var info = new ProcessStartInfo(program) { RedirectStandardOutput = true, RedirectStandardError = true, UseShellExecute = false };
        foreach (var a in arguments) info.ArgumentList.Add(a);
        using var process = Process.Start(info)!;
        var (output, errors) = (process.StandardOutput.ReadToEndAsync(), process.StandardError.ReadToEndAsync());
        process.WaitForExit();
        return (process.ExitCode, output.Result + errors.Result);
    }
}
