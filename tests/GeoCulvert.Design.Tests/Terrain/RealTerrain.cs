using System.IO.Compression;
using System.Runtime.InteropServices;
using GeoCulvert.Design.Basis;
using GeoCulvert.Design.Terrain;
using GeoCulvert.Design.Tests.Conventions;

namespace GeoCulvert.Design.Tests.Terrain;

/// <summary>Real terrain and what general-purpose libraries make of it; see Oracles/make_oracles.py and terrains.csv for the origin.</summary>
internal static class RealTerrain
{
    private static readonly PublishedTable Terrains = PublishedTable.Parse("terrains.csv", File.ReadAllText(PathOf("terrains.csv")));

    public static TheoryData<string> Names => [.. Terrains.Rows.Select(r => r.Text("name"))];

    public static string PathOf(string file) => Repository.Path("tests", "GeoCulvert.Design.Tests", "Terrain", "Oracles", file);

    public static GridFrame Frame(string name)
    {
        var row = Terrains.Rows.Single(r => r.Text("name") == name);
        return new GridFrame(
            (int)row.Number("columns"), (int)row.Number("rows"), row.Number("west"), row.Number("north"),
            row.Number("cell_width_m"), row.Number("cell_height_m"));
    }

    public static Grid<float> Elevation(string name) => Grid<float>(name, "elevation");

    /// <summary>The directions that the expected accumulation and labels were computed for.</summary>
    public static Grid<byte> Direction(string name) => Grid<byte>(name, "direction");

    public static Grid<T> Grid<T>(string name, string what)
        where T : unmanaged => new(Frame(name), Read<T>(name, what));

    public static T[] Read<T>(string name, string what)
        where T : unmanaged
    {
        using var file = new GZipStream(File.OpenRead(PathOf($"{name}_{what}.bin.gz")), CompressionMode.Decompress);
        using var bytes = new MemoryStream();
        file.CopyTo(bytes);
        return MemoryMarshal.Cast<byte, T>(bytes.GetBuffer().AsSpan(0, (int)bytes.Length)).ToArray();
    }

    public static void Write(string name, string what, byte[] values)
    {
        using var file = new GZipStream(File.Create(PathOf($"{name}_{what}.bin.gz")), CompressionLevel.SmallestSize);
        file.Write(values);
    }
}
