using System.Diagnostics;
using GeoCulvert.Layers;

namespace GeoCulvert.Cli.Tests;

/// <summary>Runs the command as a stranger would: another process, its exit code, what it says.</summary>
internal static class Geoculvert
{
    public static string DataFolder => Path.Combine(AppContext.BaseDirectory, "Data");

    public static (int Code, string Output, string Errors) Run(params string[] arguments) => Start("dotnet", [Path.Combine(AppContext.BaseDirectory, "geoculvert.dll"), .. arguments]);

    public static (int Code, string Output, string Errors) Start(string program, params string[] arguments)
    {
        var info = new ProcessStartInfo(program) { RedirectStandardOutput = true, RedirectStandardError = true, UseShellExecute = false };
        foreach (var a in arguments) info.ArgumentList.Add(a);
        using var process = Process.Start(info)!;
        var output = process.StandardOutput.ReadToEndAsync();
        var errors = process.StandardError.ReadToEndAsync();
        process.WaitForExit();
        return (process.ExitCode, output.Result, errors.Result);
    }

    /// <summary>A new folder under the test's own temporary folder.</summary>
    public static string NewFolder() => Directory.CreateTempSubdirectory("geoculvert-test-").FullName;

    /// <summary>Rows of a table of a GeoPackage.</summary>
    public static IReadOnlyList<VectorFeature> Rows(string geoPackage, string layer)
    {
        using var crs = Crs.Parse("EPSG:26912");
        return VectorSource.Read(geoPackage, layer, null, new WorkingPlane(crs)).Features;
    }

    /// <summary>Rows of a plain table of a GeoPackage.</summary>
    public static IReadOnlyList<VectorFeature> Table(string geoPackage, string table) => VectorSource.ReadTable(geoPackage, table);
}
