namespace GeoCulvert.Design.Tests.Conventions;

/// <summary>The checkout the tests run from.</summary>
internal static class Repository
{
    public static string Root { get; } = Find();

    public static string Path(params string[] parts) => System.IO.Path.Combine([Root, .. parts]);

    public static IEnumerable<string> SourceFiles(params string[] parts) => Directory
        .EnumerateFiles(Path(parts), "*.cs", SearchOption.AllDirectories)
        .Where(f => !f.Contains("/obj/", StringComparison.Ordinal) && !f.Contains("/bin/", StringComparison.Ordinal)
            && !f.Contains("\\obj\\", StringComparison.Ordinal) && !f.Contains("\\bin\\", StringComparison.Ordinal))
        .Order(StringComparer.Ordinal);

    private static string Find()
    {
        var folder = new DirectoryInfo(AppContext.BaseDirectory);
        while (folder is not null && !File.Exists(System.IO.Path.Combine(folder.FullName, "GeoCulvert.sln"))) folder = folder.Parent;
        return folder?.FullName ?? throw new InvalidOperationException("The tests must run inside a checkout.");
    }
}
