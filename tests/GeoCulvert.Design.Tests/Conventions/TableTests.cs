using GeoCulvert.Design.Basis;

namespace GeoCulvert.Design.Tests.Conventions;

/// <summary>Every published figure in the program says where it comes from and how well it was checked.</summary>
public class TableTests
{
    public static TheoryData<string> Tables() => [.. typeof(Finding).Assembly.GetManifestResourceNames().Where(n => n.Contains(".Tables.", StringComparison.Ordinal))];

    [Theory]
    [MemberData(nameof(Tables))]
    public void EveryRowHasASourceAndAStatus(string resource)
    {
        using var reader = new StreamReader(typeof(Finding).Assembly.GetManifestResourceStream(resource)!);
        var table = PublishedTable.Parse(resource, reader.ReadToEnd(), "status", "source", "locator", "note");
        Assert.Equal(["source", "locator", "note"], table.Columns.TakeLast(3));
        Assert.NotEmpty(table.Rows);
        Assert.All(table.Rows, r =>
        {
            Assert.NotEqual("", r.Source.Document);
            Assert.NotEqual("", r.Source.Status);
        });
    }

    [Fact]
    public void OracleRowsNameTheirSourceAndAreNotAllFromMemory()
    {
        foreach (var file in Directory.EnumerateFiles(Repository.Path("tests", "GeoCulvert.Design.Tests"), "*.csv", SearchOption.AllDirectories)
            .Where(f => f.Contains("Oracles", StringComparison.Ordinal) && !f.Contains("/bin/", StringComparison.Ordinal)))
        {
            var table = PublishedTable.Parse(Path.GetFileName(file), File.ReadAllText(file));
            if (!table.Has("expected")) continue; // data that an oracle reads, not rows of expected values
            Assert.True(table.Has("source") && table.Has("status") && table.Has("tolerance"), file);
            Assert.All(table.Rows, r => Assert.NotEqual("", r.Text("source")));
            Assert.Contains(table.Rows, r => !r.Text("status").StartsWith("MEMORY", StringComparison.Ordinal));
        }
    }
}
