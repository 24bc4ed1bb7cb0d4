using System.Text;
using GeoCulvert.Design.Basis;
using GeoCulvert.Report.Page;

namespace GeoCulvert.Report.Tests;

/// <summary>Writes the invented study to files when a folder is named, for looking at in a browser.</summary>
public sealed class PageForEyesTests
{
    [Fact]
    public void WritesFilesForLookingAt()
    {
        var folder = Environment.GetEnvironmentVariable("GEOCULVERT_PAGE_FOLDER");
        if (string.IsNullOrEmpty(folder)) Assert.Skip("GEOCULVERT_PAGE_FOLDER names no folder.");
        Directory.CreateDirectory(folder);
        foreach (var (name, units, copies) in new[] { ("si", UnitSystem.Si, 1), ("us", UnitSystem.Us, 1), ("many", UnitSystem.Si, 286) })
        {
            using var file = File.Create(Path.Combine(folder, name + ".html"));
            ReportPage.Write(InventedStudy.Make(units, copies: copies), file);
            Assert.True(file.Length > 10_000);
        }
        using (var hostile = File.Create(Path.Combine(folder, "hostile.html")))
            ReportPage.Write(InventedStudy.Make(name: "<script>alert(1)</script>\"' \u202Egnp.exe \u05e9\u05dc\u05d5\u05dd " + new string('W', 260)), hostile);
        using var schedule = File.Create(Path.Combine(folder, "schedule.csv"));
        Report.Schedule.ScheduleCsv.Write(InventedStudy.Make(), schedule);
    }
}
