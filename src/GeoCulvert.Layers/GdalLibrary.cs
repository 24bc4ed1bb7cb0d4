using System.Reflection;
using System.Runtime.InteropServices;

namespace GeoCulvert.Layers;

/// <summary>GDAL's library is not on this machine.</summary>
public sealed class GdalMissingException(string tried) : Exception(
    "The GDAL library was not found. Install it: on Debian or Ubuntu 'apt-get install libgdal32' (or the libgdal package of your release), on macOS "
    + "'brew install gdal', on Windows a GDAL build whose folder is on PATH; or name the library file in the environment variable GEOCULVERT_GDAL. Tried: " + tried);

/// <summary>Finds and loads GDAL's own C library.</summary>
internal static class GdalLibrary
{
    /// <summary>Name used in the imports; resolved here.</summary>
    public const string Name = "gdal-c-api";

    private static readonly Lock Gate = new();
    private static nint _handle;

    /// <summary>Loads the library once; every import goes through it.</summary>
    /// <exception cref="GdalMissingException">No candidate could be loaded.</exception>
    public static void Load()
    {
        lock (Gate)
        {
            if (_handle != 0) return;
            var candidates = Candidates().ToArray();
            foreach (var candidate in candidates)
            {
                if (!NativeLibrary.TryLoad(candidate, out var handle)) continue;
                _handle = handle;
                NativeLibrary.SetDllImportResolver(typeof(GdalLibrary).Assembly, static (name, _, _) => name == Name ? _handle : 0);
                return;
            }

            throw new GdalMissingException(string.Join(", ", candidates));
        }
    }

    private static IEnumerable<string> Candidates()
    {
        if (Environment.GetEnvironmentVariable("GEOCULVERT_GDAL") is { Length: > 0 } named)
        {
            yield return named; // and no other: a library that was named is not silently replaced
            yield break;
        }

        if (OperatingSystem.IsWindows())
        {
            for (var abi = 312; abi >= 300; abi--) yield return $"gdal{abi}.dll";
            yield return "gdal.dll";
            yield return "libgdal.dll";
            yield break;
        }

        if (OperatingSystem.IsMacOS())
        {
            yield return "libgdal.dylib";
            yield return "/opt/homebrew/lib/libgdal.dylib";
            yield return "/usr/local/lib/libgdal.dylib";
            yield break;
        }

        yield return "libgdal.so.32";
        for (var abi = 40; abi >= 28; abi--)
        {
            if (abi != 32) yield return $"libgdal.so.{abi}";
        }

        yield return "libgdal.so";
    }
}
