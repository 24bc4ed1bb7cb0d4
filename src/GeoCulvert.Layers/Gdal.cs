using System.Collections.Concurrent;
using System.Runtime.InteropServices;

namespace GeoCulvert.Layers;

/// <summary>GDAL refused or failed; the message holds GDAL's own words.</summary>
public sealed class GdalException(string what, string gdalSays)
    : Exception(gdalSays.Length > 0 ? $"{what}: {gdalSays}" : what);

/// <summary>Start-up and errors of GDAL.</summary>
public static unsafe class Gdal
{
    // Errors belong to the thread that called GDAL; those of GDAL's own worker threads, which never call in here, go to a common queue.
    private static readonly ConcurrentQueue<string> FromWorkers = new();
    private const int Most = 8;
    private static readonly Lazy<string> Started = new(Start);

    [ThreadStatic]
    private static List<string>? _own;

    /// <summary>GDAL's version, "3.6.2"; loads the library.</summary>
    /// <exception cref="GdalMissingException">The library is not there.</exception>
    public static string Version => Started.Value;

    internal static void Ensure()
    {
        _own ??= [];
        _ = Started.Value;
    }

    internal static void Clear()
    {
        (_own ??= []).Clear();
        FromWorkers.Clear();
    }

    internal static string Says()
    {
        var texts = (_own ?? []).Concat(FromWorkers).Distinct(StringComparer.Ordinal).TakeLast(3).ToArray();
        Clear();
        return string.Join("; ", texts);
    }

    internal static nint Check(nint handle, string what) => handle != 0 ? handle : throw new GdalException(what, Says());

    internal static void Check(int code, string what)
    {
        if (code != 0) throw new GdalException(what, Says());
    }

    private static string Start()
    {
        GdalLibrary.Load();
        Native.CPLSetErrorHandler(&OnError);
        // Same input, same bytes: no clock in the files written.
        Native.CPLSetConfigOption("OGR_CURRENT_DATE", "2000-01-01T00:00:00.000Z");
        Native.CPLSetConfigOption("CPL_DEBUG", "OFF");
        Native.GDALAllRegister();
        return Native.Text(Native.GDALVersionInfo("RELEASE_NAME"));
    }

    [UnmanagedCallersOnly]
    private static void OnError(int severity, int number, nint message)
    {
        if (severity < 3) return; // 1 debug, 2 warning, 3 failure, 4 fatal
        var text = Native.Text(message);
        if (_own is { } own)
        {
            if (own.Count >= Most) own.RemoveAt(0);
            own.Add(text);
            return;
        }

        FromWorkers.Enqueue(text);
        while (FromWorkers.Count > Most) FromWorkers.TryDequeue(out _);
    }
}

/// <summary>A dataset of GDAL, closed at the end of its scope. One handle is used by one thread.</summary>
internal sealed class DatasetHandle : SafeHandle
{
    public DatasetHandle(nint handle)
        : base(0, ownsHandle: true) => SetHandle(handle);

    public override bool IsInvalid => handle == 0;

    public nint Pointer => IsClosed ? throw new ObjectDisposedException(nameof(DatasetHandle)) : handle;

    protected override bool ReleaseHandle()
    {
        Native.GDALClose(handle);
        return true;
    }
}
