using GeoCulvert.Design.Basis;

namespace GeoCulvert.Design.Tests.Hydrology;

/// <summary>Reads this room's oracle files, copied beside the tests.</summary>
internal static class Oracle
{
    public static string Text(string file) => File.ReadAllText(Path.Combine(AppContext.BaseDirectory, "Hydrology", "Oracles", file));

    public static PublishedTable Table(string file) => PublishedTable.Parse(file, Text(file));

    public static string Rainfall(string file) => Text(Path.Combine("rainfall", file));
}
