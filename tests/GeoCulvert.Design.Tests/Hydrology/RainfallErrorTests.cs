using GeoCulvert.Design.Basis;
using GeoCulvert.Design.Hydrology;

namespace GeoCulvert.Design.Tests.Hydrology;

/// <summary>Malformed rainfall files: one clear problem each, with file, line and what was expected.</summary>
public class RainfallErrorTests
{
    private const string Head = "Point precipitation frequency estimates (inches)\nData type: Precipitation depth\nTime series type: Partial duration\n"
        + "PRECIPITATION FREQUENCY ESTIMATES\nby duration for ARI (years):,2,10,100\n";

    private static readonly Dictionary<string, (string Text, string Place, string Found, string Expected)> Broken = new()
    {
        ["atlas: no head"] = ("PRECIPITATION FREQUENCY ESTIMATES\nby duration for ARI (years):,2,10,100\n5-min:,0.3,0.4,0.5\n", "r.csv", "no line that gives the unit", "stated beside the file"),
        ["atlas: a word among the values"] = (Head + "5-min:,0.3,0.4,0.5\n10-min:,0.5,n/a,0.8\n", "r.csv line 7, return period 10", "'n/a'", "a number above zero"),
        ["atlas: a blank among the values"] = (Head + "5-min:,0.3,,0.5\n", "r.csv line 6, return period 10", "nothing", "a number above zero"),
        ["atlas: negative"] = (Head + "5-min:,-0.3,0.4,0.5\n", "r.csv line 6, return period 2", "'-0.3'", "above zero"),
        ["atlas: a value short"] = (Head + "5-min:,0.3,0.4\n", "r.csv line 6", "2 values", "3 values"),
        ["atlas: a value too many"] = (Head + "5-min:,0.3,0.4,0.5,0.6\n", "r.csv line 6", "4 values", "3 values"),
        ["atlas: duration without unit"] = (Head + "5:,0.3,0.4,0.5\n", "r.csv line 6", "'5:'", "5-min"),
        ["atlas: durations out of order"] = (Head + "10-min:,0.5,0.6,0.8\n5-min:,0.3,0.4,0.5\n", "r.csv line 7", "5 min after 10 min", "rising"),
        ["atlas: falls with return period"] = (Head + "5-min:,0.3,0.6,0.5\n", "r.csv line 6, return period 100", "0.5 after 0.6", "do not fall"),
        ["atlas: no rows"] = (Head, "r.csv", "no rows", "5-min"),
        ["atlas: rows before a heading"] = ("Point precipitation frequency estimates (inches)\nNOAA Atlas 14\n5-min:,0.3,0.4\n", "r.csv line 3", "before any return periods", "by duration for ARI"),
        ["atlas: unit unknown"] = (Head.Replace("(inches)", "(furlongs)", StringComparison.Ordinal) + "5-min:,0.3,0.4,0.5\n", "r.csv line 1", "furlongs", "inches/hour"),
        ["atlas: unit against data type"] = (Head.Replace("(inches)", "(inches/hour)", StringComparison.Ordinal) + "5-min:,0.3,0.4,0.5\n", "r.csv line 2", "Precipitation depth", "agree"),
        ["atlas: intensity said to be depth"] = (Head + "5-min:,4.8,5.6,6.7\n15-min:,9.0,19.9,20.0\n", "r.csv line 7, return period 10", "19.9", "depth or intensity"),
        ["atlas: return period is a word"] = (Head.Replace("2,10,100", "2,ten,100", StringComparison.Ordinal) + "5-min:,0.3,0.4,0.5\n", "r.csv line 5", "'ten'", "2,10,25"),
        ["atlas: a web page"] = ("<html>NOAA Atlas 14</html>", "r.csv line 1", "a web page", "CSV"),
        ["atlas: two tables"] = (Head + "5-min:,0.3,0.4,0.5\n\n" + "PRECIPITATION FREQUENCY ESTIMATES\n,2,10,100\n5-min:,0.3,0.4,0.5\n", "r.csv line 9", "a second table", "one table"),
        ["plain: empty"] = ("", "r.csv", "an empty file", "duration_min"),
        ["plain: no unit of values"] = ("duration_min,2,10\n5,100,150\n", "r.csv", "no unit of the values", "duration_min\\intensity_mm_per_h"),
        ["plain: quantity unknown"] = ("duration_min\\rain,2,10\n5,100,150\n", "r.csv line 1", "'rain'", "intensity_mm_per_h"),
        ["plain: first cell unknown"] = ("time,2,10\n5,100,150\n", "r.csv line 1", "'time'", "duration_min"),
        ["plain: return periods not rising"] = ("duration_min\\depth_mm,10,2\n5,9,8\n", "r.csv line 1", "2 after 10", "rising"),
        ["plain: no return periods"] = ("duration_min\\depth_mm\n5\n", "r.csv line 1", "without return periods", "2,10,25"),
        ["plain: duration twice"] = ("duration_min\\depth_mm,2,10\n5,8,9\n5,8,9\n", "r.csv line 3", "5 min after 5 min", "each once"),
        ["plain: duration zero"] = ("duration_min\\depth_mm,2,10\n0,8,9\n", "r.csv line 2", "'0'", "a duration"),
        ["plain: infinite"] = ("duration_min\\depth_mm,2,10\n5,8,1e999\n", "r.csv line 2, return period 10", "'1e999'", "a number"),
        ["plain: series unknown"] = ("# series: monthly\nduration_min\\depth_mm,2,10\n5,8,9\n", "r.csv line 1", "monthly", "partial duration"),
        ["plain: two units"] = ("# intensity_mm_per_h\nduration_min\\depth_mm,2,10\n5,8,9\n", "r.csv line 2", "depth_mm", "agree"),
    };

    public static TheoryData<string> Cases() => [.. Broken.Keys];

    [Theory]
    [MemberData(nameof(Cases))]
    public void SaysWhereWhatAndWhatElse(string name)
    {
        var (text, place, found, expected) = Broken[name];
        var problem = Assert.Single(Assert.Throws<InputException>(() => RainfallTable.Read("r.csv", text)).Problems);
        Assert.Equal(place, problem.Place);
        Assert.Contains(found, problem.Found, StringComparison.Ordinal);
        Assert.Contains(expected, problem.Expected, StringComparison.Ordinal);
    }

    [Fact]
    public void TheStatedUnitServesWhereTheHeadIsMissing()
    {
        const string text = "PRECIPITATION FREQUENCY ESTIMATES\n,2,10\n5-min,0.3,0.4\n10-min,0.5,0.6\n";
        Assert.Equal(0.3 * 25.4 * 12, RainfallTable.Read("r.csv", text, RainfallMeasure.DepthIn).Intensity(5, 2).IntensityMmPerH!.Value, 1e-9);
        var other = "duration_min,2,10\n5,100,150\n";
        Assert.Equal(100, RainfallTable.Read("r.csv", other, RainfallMeasure.IntensityMmPerH).Intensity(5, 2).IntensityMmPerH);
        Assert.Throws<InputException>(() => RainfallTable.Read("r.csv", Head + "5-min:,0.3,0.4,0.5\n", RainfallMeasure.DepthMm));
    }

    [Fact]
    public void FilesFromTheWildAreRead()
    {
        // Spreadsheet blanks, carriage returns, a damaged degree sign, a stray quote, confidence blocks, a footer.
        const string text = "\uFEFFPoint precipitation frequency estimates (millimeters),,,,,\r\nLatitude: 40.4\uFFFD,,,\r\nLocation name: \"Some town,,,\r\n"
            + "Data type: Precipitation depth\r\nTime series type: Annual maximum\r\n,,,\r\nPRECIPITATION FREQUENCY ESTIMATES\r\n"
            + "by duration for AEP:, 1/2,1/10,1/100\r\n5-min:, 8,12,20,,\r\n1-hr:, 24,36,60,,\r\n\r\n"
            + "PRECIPITATION FREQUENCY ESTIMATES: LOWER BOUND OF 90% CONFIDENCE INTERVAL\r\nby duration for AEP:,1/2,1/10,1/100\r\n5-min:,7,10,15\r\n1-hr:,20,30,45\r\n\r\n"
            + "PRECIPITATION FREQUENCY ESTIMATES: UPPER BOUND OF 90% CONFIDENCE INTERVAL\r\nby duration for AEP:,1/2,1/10,1/100\r\n5-min:,9,15,26\r\n1-hr:,28,44,80\r\n\r\n"
            + "1 Estimates at some durations rest on few gauges\r\nDate/time (GMT):  Sun Jun  7 07:54:20 2026\r\nPyRunTime: 0.01\r\n";
        var table = RainfallTable.Read("wild.csv", text);
        Assert.Equal((RainfallMeasure.DepthMm, RainfallSeries.AnnualMaximum), (table.Measure, table.Series));
        Assert.Equal(36, table.Intensity(60, 10).IntensityMmPerH!.Value, 1e-9);
        Assert.Equal(30, table.LowerBound!.Intensity(60, 10).IntensityMmPerH!.Value, 1e-9);
        Assert.Equal(44, table.UpperBound!.Intensity(60, 10).IntensityMmPerH!.Value, 1e-9);
    }

    [Theory]
    [InlineData("# intensity_mm_per_h\nduration_min,2yr,10-yr\n5,100,150\n")]
    [InlineData("duration_min/intensity_mm_per_h;2;10\n5;100;150\n")]
    [InlineData("duration_min|intensity_mm_per_h\t2\t10\n5\t100\t150\n")]
    [InlineData("duration\\intensity_mm_per_h,2,10\n5 min,100,150\n")]
    [InlineData("\"duration_min intensity_mm_per_h\",2,10,,\r\n5,100,150,,\r\n,,,\r\n")]
    public void PlainSpellings(string text) => Assert.Equal(150, RainfallTable.Read("r.csv", text).Intensity(5, 10).IntensityMmPerH);
}
