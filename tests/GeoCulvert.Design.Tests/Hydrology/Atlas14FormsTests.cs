using System.Globalization;
using System.Text;
using GeoCulvert.Design.Basis;
using GeoCulvert.Design.Hydrology;

namespace GeoCulvert.Design.Tests.Hydrology;

/// <summary>NOAA Atlas 14 files in the ways they are served and re-saved: one rainfall, many spellings, one table.</summary>
public class Atlas14FormsTests
{
    // Depths in inches of a made-up place, 2, 10 and 100 years: what every spelling must give back.
    private static readonly (string Name, double Minutes)[] Durations = [("5-min", 5), ("15-min", 15), ("60-min", 60), ("2-hr", 120), ("24-hr", 1440), ("2-day", 2880)];
    private static readonly double[,] Inches = { { 0.4, 0.6, 0.9 }, { 0.7, 1.0, 1.6 }, { 1.2, 1.8, 2.8 }, { 1.5, 2.2, 3.5 }, { 2.5, 3.8, 6.0 }, { 3.0, 4.4, 6.8 } };

    private static readonly Dictionary<string, (string Unit, string Type, Func<double, double, double> From)> Measures = new()
    {
        ["depth-in"] = ("inches", "depth", (p, d) => p),
        ["depth-mm"] = ("millimeters", "depth", (p, d) => p * 25.4),
        ["intensity-in"] = ("inches/hour", "intensity", (p, d) => p * 60 / d),
        ["intensity-mm"] = ("millimeters/hour", "intensity", (p, d) => p * 25.4 * 60 / d),
    };

    private static readonly Dictionary<string, string> Headings = new()
    {
        ["partial"] = "by duration for ARI (years):, 2,10,100",
        ["annual"] = "by duration for AEP:, 1/2,1/10,1/100",
        ["annual-percent"] = "by duration for AEP:, 50%,10%,1%",
        ["bare"] = ",2,10,100",
    };

    private static readonly Dictionary<string, Func<string, string>> Dressings = new()
    {
        ["as served"] = t => t,
        ["trailing commas"] = t => t.Replace("\n", ",,,,\n", StringComparison.Ordinal),
        ["all quoted"] = t => Lines(t, l => string.Join(',', l.Split(',').Select(c => $"\"{c.Trim()}\""))),
        ["whole lines quoted"] = t => Lines(t, l => l.Contains(':', StringComparison.Ordinal) && !l.Contains('-', StringComparison.Ordinal) ? $"\"{l}\"" : l, fromHead: true),
        ["carriage returns"] = t => t.Replace("\n", "\r\n", StringComparison.Ordinal),
        ["byte-order mark"] = t => "\uFEFF" + t,
        ["damaged degree sign"] = t => t.Replace("\u00B0", "\uFFFD", StringComparison.Ordinal),
        ["Latin-1 read as UTF-8"] = t => Encoding.UTF8.GetString(Encoding.Latin1.GetBytes(t)),
        ["blanks about"] = t => Lines(t, l => "  " + l.Replace(",", " ,  ", StringComparison.Ordinal) + "  "),
        ["no colons"] = t => Lines(t, l => char.IsAsciiDigit(l.FirstOrDefault()) ? l.Replace(":,", ",", StringComparison.Ordinal) : l),
        ["semicolons"] = t => t.Replace(',', ';'),
        ["semicolons and decimal commas"] = t => t.Replace(',', ';').Replace('.', ','),
        ["tabs"] = t => t.Replace(',', '\t'),
        ["footer"] = t => t + "\nDate/time (GMT):  Sun Jun  7 07:54:20 2026\npyRunTime:  0.02\n1 Some estimates rest on few gauges\n",
        ["blank lines"] = t => t.Replace("\n", "\n\n", StringComparison.Ordinal),
    };

    public static TheoryData<string, string, string> Forms()
    {
        var data = new TheoryData<string, string, string>();
        foreach (var m in Measures.Keys)
            foreach (var h in Headings.Keys)
                foreach (var d in Dressings.Keys) data.Add(m, h, d);
        return data;
    }

    [Theory]
    [MemberData(nameof(Forms))]
    public void OneRainfallInEverySpelling(string measure, string heading, string dressing)
    {
        var table = RainfallTable.Read("a.csv", Dressings[dressing](Text(measure, heading)));
        Assert.Equal(heading.StartsWith("annual", StringComparison.Ordinal) ? RainfallSeries.AnnualMaximum : RainfallSeries.PartialDuration, table.Series);
        Assert.Equal([2, 10, 100], table.ReturnPeriodsYr);
        Assert.Equal(Durations.Select(d => d.Minutes), table.DurationsMin);
        for (var i = 0; i < Durations.Length; i++)
            for (var j = 0; j < 3; j++)
                Assert.Equal(Inches[i, j] * 25.4 * 60 / Durations[i].Minutes, table.EntryIntensityMmPerH(i, j), 1e-6);
    }

    [Theory]
    [InlineData("PRECIPITATION FREQUENCY ESTIMATES: LOWER BOUND OF 90% CONFIDENCE INTERVAL", "PRECIPITATION FREQUENCY ESTIMATES: UPPER BOUND OF 90% CONFIDENCE INTERVAL")]
    [InlineData("LOWER BOUND OF 90% CONFIDENCE INTERVAL", "UPPER BOUND OF 90% CONFIDENCE INTERVAL")]
    [InlineData("90% confidence interval (lower)", "90% confidence interval (upper)")]
    public void ConfidenceBlocks(string lower, string upper)
    {
        string Block(string title, double factor) => $"\n{title}\n{Headings["partial"]}\n" + Rows("depth-in", factor);
        var table = RainfallTable.Read("a.csv", Text("depth-in", "partial") + Block(upper, 1.3) + Block(lower, 0.8));
        Assert.Equal(0.4, table.TableValue(0, 0));
        Assert.Equal(0.4 * 0.8, table.LowerBound!.TableValue(0, 0), 1e-9);
        Assert.Equal(0.4 * 1.3, table.UpperBound!.TableValue(0, 0), 1e-9);
    }

    // Without a head nothing says what the figures are: the program asks, and takes the answer.
    [Theory]
    [InlineData("partial")]
    [InlineData("bare")]
    public void WithoutAHeadItAsks(string heading)
    {
        var text = $"{Headings[heading]}\n{Rows("depth-mm", 1)}";
        var problem = Assert.Single(Assert.Throws<InputException>(() => RainfallTable.Read("a.csv", text)).Problems);
        Assert.Equal("a.csv", problem.Place);
        Assert.Contains("stated beside the file", problem.Expected, StringComparison.Ordinal);
        Assert.Equal(0.4 * 25.4 * 12, RainfallTable.Read("a.csv", text, RainfallMeasure.DepthMm).EntryIntensityMmPerH(0, 0), 1e-6);
    }

    public static TheoryData<string> Malformed() => [.. Broken.Keys];

    private static readonly Dictionary<string, (Func<string, string> Break, string Place, string Found, string Expected)> Broken = new()
    {
        ["a value missing"] = (t => t.Replace("0.7,1,1.6", "0.7,,1.6", StringComparison.Ordinal), "a.csv line 9, return period 10", "nothing", "a number above zero"),
        ["a dash for a value"] = (t => t.Replace("0.7,1,1.6", "0.7,-,1.6", StringComparison.Ordinal), "a.csv line 9, return period 10", "'-'", "a number above zero"),
        ["not available"] = (t => t.Replace("0.7,1,1.6", "0.7,NA,1.6", StringComparison.Ordinal), "a.csv line 9, return period 10", "'NA'", "a number above zero"),
        ["the server's -9.999"] = (t => t.Replace("0.7,1,1.6", "0.7,-9.999,1.6", StringComparison.Ordinal), "a.csv line 9, return period 10", "'-9.999'", "a number above zero"),
        ["a row cut short"] = (t => t.Replace("0.7,1,1.6", "0.7,1", StringComparison.Ordinal), "a.csv line 9", "2 values", "3 values"),
        ["a row twice"] = (t => t.Replace("15-min:,", "5-min:,", StringComparison.Ordinal), "a.csv line 9", "5 min after 5 min", "rising"),
        ["a duration no one knows"] = (t => t.Replace("15-min:", "15-xyz:", StringComparison.Ordinal), "a.csv line 9", "'15-xyz:'", "5-min"),
        ["a return period that is a word"] = (t => t.Replace(" 2,10,100", " 2,ten,100", StringComparison.Ordinal), "a.csv line 7", "'ten'", "2,10,25"),
        ["a chance of nothing"] = (t => t.Replace(" 2,10,100", " 50%,10%,0%", StringComparison.Ordinal), "a.csv line 7", "'0%'", "2,10,25"),
        ["return periods out of order"] = (t => t.Replace(" 2,10,100", " 2,100,10", StringComparison.Ordinal), "a.csv line 7", "10 after 100", "rising"),
        ["a unit no one knows"] = (t => t.Replace("(inches)", "(cubits)", StringComparison.Ordinal), "a.csv line 1", "'cubits'", "inches"),
        ["unit and type apart"] = (t => t.Replace("Precipitation depth", "Precipitation intensity", StringComparison.Ordinal), "a.csv line 3", "intensity", "agree"),
        ["a series no one knows"] = (t => t.Replace("Partial duration", "Monthly", StringComparison.Ordinal), "a.csv line 4", "Monthly", "Annual maximum"),
        ["no heading row"] = (t => t.Replace("by duration for ARI (years):, 2,10,100\n", "", StringComparison.Ordinal), "a.csv line 7", "before any return periods", "by duration"),
        ["only the head"] = (t => t[..t.IndexOf("PRECIPITATION FREQUENCY ESTIMATES", StringComparison.Ordinal)], "a.csv", "no table", "PRECIPITATION FREQUENCY"),
        ["a web page"] = (t => "<!DOCTYPE html><p>" + t, "a.csv line 1", "a web page", "CSV"),
        ["intensities under a depth head"] = (t => t.Replace("15-min:,0.7,1,1.6", "15-min:,7,10,16", StringComparison.Ordinal), "a.csv line 9, return period 2", "7", "depth or intensity"),
        ["only confidence bounds"] = (t => t.Replace("PRECIPITATION FREQUENCY ESTIMATES", "UPPER BOUND OF 90% CONFIDENCE INTERVAL", StringComparison.Ordinal), "a.csv", "only confidence bounds", "PRECIPITATION FREQUENCY"),
    };

    [Theory]
    [MemberData(nameof(Malformed))]
    public void MalformedFilesGiveAClearError(string name)
    {
        var (damage, place, found, expected) = Broken[name];
        var text = Text("depth-in", "partial");
        Assert.NotEqual(text, damage(text));
        var problem = Assert.Throws<InputException>(() => RainfallTable.Read("a.csv", damage(text))).Problems[0];
        Assert.Equal(place, problem.Place);
        Assert.Contains(found, problem.Found, StringComparison.Ordinal);
        Assert.Contains(expected, problem.Expected, StringComparison.Ordinal);
    }

    private static string Text(string measure, string heading) =>
        $"Point precipitation frequency estimates ({Measures[measure].Unit})\nNOAA Atlas 14 Volume 9 Version 2\nData type: Precipitation {Measures[measure].Type}\n"
        + $"Time series type: {(heading.StartsWith("annual", StringComparison.Ordinal) ? "Annual maximum" : "Partial duration")}\nLatitude: 40.4\u00B0\n"
        + $"PRECIPITATION FREQUENCY ESTIMATES\n{Headings[heading]}\n{Rows(measure, 1)}";

    private static string Rows(string measure, double factor) => string.Concat(Enumerable.Range(0, Durations.Length).Select(i =>
        $"{Durations[i].Name}:,{string.Join(',', Enumerable.Range(0, 3).Select(j => Measures[measure].From(factor * Inches[i, j], Durations[i].Minutes).ToString("G9", CultureInfo.InvariantCulture)))}\n"));

    private static string Lines(string text, Func<string, string> change, bool fromHead = false) =>
        string.Join('\n', text.Split('\n').Select((l, k) => l.Length == 0 || (fromHead && k > 4) ? l : change(l)));
}
