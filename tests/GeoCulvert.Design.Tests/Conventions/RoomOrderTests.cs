using System.Text.RegularExpressions;

namespace GeoCulvert.Design.Tests.Conventions;

/// <summary>The rooms of Design use only the rooms that the table in DEVELOPERS.md names for them.</summary>
public partial class RoomOrderTests
{
    public static TheoryData<string> Rooms() => [.. Table().Keys];

    [Fact]
    public void TheTableNamesEveryRoom() => Assert.Equal(
        Directory.GetDirectories(Repository.Path("src", "GeoCulvert.Design")).Select(Path.GetFileName).Where(d => d is not ("bin" or "obj")).Order(StringComparer.Ordinal),
        Table().Keys.Order(StringComparer.Ordinal));

    [Fact]
    public void TheTableHasNoCycle()
    {
        var table = Table();
        var done = new HashSet<string>(StringComparer.Ordinal);
        foreach (var (room, uses) in table)
        {
            Assert.All(uses, u => Assert.Contains(u, done));
            done.Add(room);
        }
    }

    [Theory]
    [MemberData(nameof(Rooms))]
    public void ARoomUsesOnlyWhatItsLineNames(string room)
    {
        var allowed = Table()[room].Append(room).ToHashSet(StringComparer.Ordinal);
        var found = Repository.SourceFiles("src", "GeoCulvert.Design", room)
            .SelectMany(f => Mention().Matches(File.ReadAllText(f)).Select(m => (File: Path.GetFileName(f), Room: m.Groups[1].Value)))
            .Where(m => !allowed.Contains(m.Room));
        Assert.Empty(found);
    }

    [Theory]
    [MemberData(nameof(Rooms))]
    public void NamespacesFollowFolders(string room) => Assert.All(
        Repository.SourceFiles("src", "GeoCulvert.Design", room),
        f => Assert.Contains($"namespace GeoCulvert.Design.{room}", File.ReadAllText(f), StringComparison.Ordinal));

    [Fact]
    public void AssembliesKeepApart()
    {
        string[] design = ["GeoCulvert.Layers", "GeoCulvert.Report", "GeoCulvert.Cli"];
        Assert.All(Repository.SourceFiles("src", "GeoCulvert.Design"), f => AssertNoMention(f, design));
        Assert.All(Repository.SourceFiles("src", "GeoCulvert.Layers"), f => AssertNoMention(f, ["GeoCulvert.Report", "GeoCulvert.Cli"]));
        Assert.All(Repository.SourceFiles("src", "GeoCulvert.Report"), f => AssertNoMention(f, ["GeoCulvert.Layers", "GeoCulvert.Cli"]));

        static void AssertNoMention(string file, string[] names)
        {
            var text = File.ReadAllText(file);
            Assert.All(names, n => Assert.DoesNotContain(n, text, StringComparison.Ordinal));
        }
    }

    [Fact]
    public void NoFileIsLongerThan400Lines() => Assert.DoesNotContain(
        Repository.SourceFiles("src").Concat(Repository.SourceFiles("tests")).Concat(Repository.SourceFiles("sample-data"))
            .Select(f => (File: f, Lines: File.ReadLines(f).Count())),
        f => f.Lines > 400);

    [Fact]
    public void TheStudyReadsLikeTheReadme() =>
        Assert.True(File.ReadLines(Repository.Path("src", "GeoCulvert.Design", "Study", "DrainageStudy.cs")).Count() < 150);

    [Fact]
    public void NoRoomForOddments() => Assert.DoesNotContain(
        Repository.SourceFiles("src").SelectMany(f => Path.GetRelativePath(Repository.Root, f).Split('/', '\\', '.')),
        part => part is "Common" or "Utils" or "Helpers" or "Core" or "Models" or "Services" or "Manager");

    [GeneratedRegex(@"GeoCulvert\.Design\.([A-Z][A-Za-z]+)")]
    private static partial Regex Mention();

    [GeneratedRegex(@"^\|\s*`([A-Z][a-z]+)`\s*\|[^|]*\|\s*([^|]*)\|\s*$", RegexOptions.Multiline)]
    private static partial Regex Line();

    private static Dictionary<string, string[]> Table() => Line()
        .Matches(File.ReadAllText(Repository.Path("DEVELOPERS.md")))
        .ToDictionary(
            m => m.Groups[1].Value,
            m => m.Groups[2].Value.Split(',', StringSplitOptions.TrimEntries | StringSplitOptions.RemoveEmptyEntries).Where(r => r != "nothing").ToArray(),
            StringComparer.Ordinal);
}
