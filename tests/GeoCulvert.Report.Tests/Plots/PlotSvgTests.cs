using System.Globalization;
using System.Text.RegularExpressions;
using System.Xml.Linq;
using GeoCulvert.Design.Basis;
using GeoCulvert.Design.Study;
using GeoCulvert.Report.Plots;

namespace GeoCulvert.Report.Tests.Plots;

public sealed class PlotSvgTests
{
    private static readonly SheetRatingPoint[] Points =
        [new(0, 100, 100.1, 100.1, 0), new(2, 101, double.NaN, 101, 0), new(4, 102.5, 101.5, 102.5, 0), new(6, 104.25, 103, 104, 1.2)];

    [Theory]
    [InlineData(0, 10, 5, 0, 2, 6)]
    [InlineData(99.7, 104.2, 6, 99, 1, 7)]
    [InlineData(0, 0.83, 7, 0, 0.2, 6)]
    [InlineData(5, 5, 4, 4.5, 0.5, 3)]
    public void TicksStandAtRoundNumbers(double low, double high, int steps, double first, double step, int count)
    {
        var ticks = AxisTicks.Enclosing(low, high, steps);
        Assert.Equal(first, ticks.First, 9);
        Assert.Equal(step, ticks.Step, 9);
        Assert.Equal(count, ticks.Count);
    }

    [Fact]
    public void StandsAloneAsXmlWithTitleAxesAndUnits()
    {
        var svg = XDocument.Parse(RatingPlot.Write(Points, UnitSystem.Us, 104, title: "Rating of <K-01> & \"co\""));
        XNamespace ns = "http://www.w3.org/2000/svg";
        Assert.Equal(ns + "svg", svg.Root!.Name);
        Assert.Equal("Rating of <K-01> & \"co\"", svg.Root.Element(ns + "title")!.Value);
        var texts = svg.Descendants(ns + "text").Select(t => t.Value).ToList();
        foreach (var expected in new[] { "Flow (cfs)", "Headwater elevation (ft)", "headwater", "inlet control", "outlet control", "road" }) Assert.Contains(expected, texts);
    }

    /// <summary>The drawn points, read back through the ticks of the axes, are the figures that went in.</summary>
    [Fact]
    public void PointsLieWhereTheAxesSay()
    {
        var svg = XDocument.Parse(RatingPlot.Write(Points, UnitSystem.Si));
        XNamespace ns = "http://www.w3.org/2000/svg";
        var ticks = svg.Descendants(ns + "text").Where(t => double.TryParse(t.Value, CultureInfo.InvariantCulture, out _)).ToList();
        double At(XElement t, string a) => double.Parse(t.Attribute(a)!.Value, CultureInfo.InvariantCulture);
        var xs = ticks.Where(t => t.Parent!.Attribute("text-anchor")!.Value == "middle").ToList();
        var ys = ticks.Where(t => t.Parent!.Attribute("text-anchor")!.Value == "end").ToList();
        double Value(XElement t) => double.Parse(t.Value, CultureInfo.InvariantCulture);
        double X(double px) => Value(xs[0]) + ((px - At(xs[0], "x")) * (Value(xs[^1]) - Value(xs[0])) / (At(xs[^1], "x") - At(xs[0], "x")));
        double Y(double py) => Value(ys[0]) + ((py + 4 - At(ys[0], "y")) * (Value(ys[^1]) - Value(ys[0])) / (At(ys[^1], "y") - At(ys[0], "y")));
        var line = svg.Descendants(ns + "path").First(p => p.Attribute("class")!.Value == "l c3").Attribute("d")!.Value;
        var numbers = Regex.Matches(line, @"[Ml]|-?\d+(?:\.\d+)?", RegexOptions.None, TimeSpan.FromSeconds(1)).Select(m => m.Value).ToList();
        var (px, py, found) = (0.0, 0.0, new List<(double X, double Y)>());
        for (var i = 0; i < numbers.Count; i += 3)
        {
            var (dx, dy) = (double.Parse(numbers[i + 1], CultureInfo.InvariantCulture), double.Parse(numbers[i + 2], CultureInfo.InvariantCulture));
            (px, py) = numbers[i] == "M" ? (dx, dy) : (px + dx, py + dy);
            found.Add((X(px), Y(py)));
        }
        Assert.Equal(Points.Length, found.Count);
        for (var i = 0; i < Points.Length; i++)
        {
            Assert.Equal(Points[i].FlowM3PerS, found[i].X, 0.02);
            Assert.Equal(Points[i].HeadwaterElevationM, found[i].Y, 0.02);
        }
    }

    [Fact]
    public void LinesBreakWhereAValueIsMissing()
    {
        var svg = XDocument.Parse(RatingPlot.Write(Points, UnitSystem.Si));
        var outlet = svg.Descendants().First(p => p.Attribute("class")?.Value == "l c2" && p.Attribute("d")!.Value.Contains('l', StringComparison.Ordinal)).Attribute("d")!.Value;
        Assert.Equal(2, outlet.Count(c => c == 'M'));
        Assert.DoesNotContain("NaN", svg.ToString(), StringComparison.Ordinal);
    }

    [Fact]
    public void NothingToDrawStillDraws() => Assert.NotNull(XDocument.Parse(RatingPlot.Write([], UnitSystem.Si)).Root);
}
