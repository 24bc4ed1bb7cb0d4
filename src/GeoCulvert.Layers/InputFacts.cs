using System.Security.Cryptography;
using GeoCulvert.Design.Study;

namespace GeoCulvert.Layers;

/// <summary>Size and hash of input files, for the record of a run.</summary>
public static class InputFacts
{
    /// <summary>The facts of one input; a folder or a data source that is not a file has size 0 and no hash.</summary>
    /// <param name="shownPath">Path as the project gave it.</param>
    /// <param name="fullPath">Path to read.</param>
    /// <param name="role">What it is used for.</param>
    /// <param name="crs">Coordinate system as read, "" for plain tables.</param>
    public static InputFact Of(string shownPath, string fullPath, string role, string crs)
    {
        if (!File.Exists(fullPath)) return new InputFact(shownPath, role, 0, "", crs);
        using var stream = File.OpenRead(fullPath);
        return new InputFact(shownPath, role, stream.Length, Convert.ToHexStringLower(SHA256.HashData(stream)), crs);
    }
}
