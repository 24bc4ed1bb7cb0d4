namespace GeoCulvert.Layers;

/// <summary>
/// Files written under a temporary name in the same folder and moved into place when they are whole, so that a failure or a kill at any
/// moment leaves the former file as it was. What an earlier, killed run left under the temporary name is removed first.
/// </summary>
internal static unsafe class MovedIntoPlace
{
    private static long _count;

    /// <summary>GDAL writes on the disk; for formats that report a full disk (GeoPackage).</summary>
    public static void OnDisk(string path, string extension, Action<string> write)
    {
        Gdal.Ensure();
        Move(path, extension, temporary => Written(path, temporary, write));
    }

    /// <summary>
    /// GDAL writes into memory, .NET onto the disk; for formats that stay silent when the disk is full (GeoJSON, GeoTIFF: seen with 3.6.2,
    /// where the file is cut short and no error comes).
    /// </summary>
    public static void FromMemory(string path, string extension, Action<string> write)
    {
        Gdal.Ensure();
        var inMemory = $"/vsimem/geoculvert-{Interlocked.Increment(ref _count)}{extension}";
        try
        {
            Written(path, inMemory, write);
            Move(path, extension, temporary =>
            {
                using var source = Buffer(path, inMemory);
                using var target = new FileStream(temporary, FileMode.Create, FileAccess.Write);
                source.CopyTo(target);
                target.Flush(flushToDisk: true);
            });
        }
        finally
        {
            _ = Native.VSIUnlink(inMemory);
        }
    }

    /// <summary>Writes out what GDAL still holds and asks for errors while the dataset is open: closing reports none before GDAL 3.7.</summary>
    public static void Flush(DatasetHandle dataset, string path)
    {
        Gdal.Clear();
        Native.GDALFlushCache(dataset.Pointer);
        var says = Gdal.Says();
        if (says.Length > 0) throw new GdalException($"Writing {path}", says);
    }

    private static UnmanagedMemoryStream Buffer(string path, string inMemory)
    {
        ulong length;
        var buffer = Gdal.Check(Native.VSIGetMemFileBuffer(inMemory, &length, 0), $"Writing {path}");
        return new UnmanagedMemoryStream((byte*)buffer, checked((long)length));
    }

    private static void Written(string path, string temporary, Action<string> write)
    {
        Gdal.Clear();
        write(temporary);
        // Closing the dataset may still write, and say so only through the error handler.
        var says = Gdal.Says();
        if (says.Length > 0) throw new GdalException($"Writing {path}", says);
    }

    private static void Move(string path, string extension, Action<string> write)
    {
        var temporary = path + ".part" + extension;
        Remove(temporary);
        try
        {
            write(temporary);
            File.Move(temporary, path, overwrite: true);
        }
        finally
        {
            Remove(temporary);
        }
    }

    private static void Remove(string temporary)
    {
        var full = Path.GetFullPath(temporary);
        var folder = Path.GetDirectoryName(full)!;
        if (!Directory.Exists(folder)) return;
        foreach (var rest in Directory.GetFiles(folder).Where(f => f.StartsWith(full, StringComparison.Ordinal))) File.Delete(rest);
    }
}
