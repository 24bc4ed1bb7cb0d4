using System.CommandLine;
using GeoCulvert.Cli.Output;
using GeoCulvert.Design.Basis;
using GeoCulvert.Design.Hydraulics;
using GeoCulvert.Design.Study;
using GeoCulvert.Report.Plots;

namespace GeoCulvert.Cli.Commands;

/// <summary>geoculvert rate: headwater of a given culvert, without a map.</summary>
internal static class RateCommand
{
    /// <summary>Makes the command.</summary>
    public static Command Create()
    {
        var options = new CulvertOptions();
        var diameter = CulvertOptions.Text("--diameter", "Inside diameter of a circle.", "48 in");
        var span = CulvertOptions.Text("--span", "Span of a box.", "1.5 m");
        var rise = CulvertOptions.Text("--rise", "Rise of a box.", "1.5 m");
        var range = new Option<string[]>("--flow-range")
        {
            Description = "Flows from A to B in N steps.", HelpName = "A B N", Arity = new ArgumentArity(3, 3), AllowMultipleArgumentsPerToken = true,
        };
        var plot = new Option<string?>("--plot") { Description = "Also draw the rating to an SVG file.", HelpName = "FILE.svg" };
        var command = new Command(
            "rate",
            "Headwater rating of a given culvert, without a map. Every dimension carries its unit.\n\n"
            + "Example: geoculvert rate --shape box --span \"1.5 m\" --rise \"1.5 m\" --inlet hds5-8-1 --length \"36 m\" --inlet-elevation \"100 m\" --outlet-elevation \"99.5 m\" --tailwater \"0.8 m\" --flow \"4.8 m3/s\"")
        {
            diameter, span, rise, range, plot,
        };
        options.AddTo(command);
        command.SetAction(parse => Shell.Run(parse, _ =>
        {
            var values = new CommandValues(parse);
            var question = CulvertQuestion.Read(parse, options, values);
            var section = Section(parse, options, values, diameter, span, rise);
            var flows = values.Quantities(options.Flow, "flow").Concat(Range(parse.GetValue(range), values)).ToArray();
            if (flows.Length == 0 && values.Problems.Count == 0) values.Wrong("--flow", "no flow", "--flow \"4.8 m3/s\", or --flow-range A B N");
            if (flows.Any(q => q < 0)) values.Wrong("--flow", "a negative flow", "0 or more");
            if (values.Problems.Count > 0 || section is null) throw new InputException(values.Problems);

            var site = question.Site(section);
            var ratings = flows.Select(q => CulvertHydraulics.Rate(site, q)).ToArray();
            if (parse.GetValue(options.Json)) RatingText.Json(Console.Out, ratings, question.Units);
            else RatingText.Table(Console.Out, ratings, question.Units);
            if (parse.GetValue(plot) is { } file) File.WriteAllText(file, Plot(ratings, question.Units, site));
            return Shell.Done;
        }));
        return command;
    }

    internal static string Plot(IReadOnlyList<CulvertRating> ratings, UnitSystem units, CulvertSite site)
    {
        // One flow makes no curve: the rating is drawn from nothing to a fifth beyond the largest flow asked for.
        var most = 1.2 * ratings.Max(r => r.FlowM3PerS);
        var points = Enumerable.Range(0, 41).Select(i => CulvertHydraulics.Rate(site, most * i / 40)).Select(r => new SheetRatingPoint(
            r.FlowM3PerS, site.Barrels.InletElevationM + r.InletControlHeadwaterM, site.Barrels.InletElevationM + r.OutletControlHeadwaterM, r.HeadwaterElevationM, r.RoadFlowM3PerS));
        return RatingPlot.Write([.. points], units, site.Road?.LowestM);
    }

    private static ISection? Section(ParseResult parse, CulvertOptions options, CommandValues values, Option<string?> diameter, Option<string?> span, Option<string?> rise)
    {
        if (parse.GetValue(options.Shape) == "circle")
        {
            if (parse.GetValue(diameter) is null && parse.GetValue(span) is not null)
            {
                var (b, d) = (values.Quantity(span, "length"), values.Quantity(rise, "length"));
                if (b is { } same && (d is null || d == b)) return same > 0 ? new CircleSection(same) : Wrong(values, "--span");
                values.Wrong("--rise", "a circle whose span and rise differ", "--diameter");
                return null;
            }

            var D = values.Needed(diameter, "length", "48 in");
            return D > 0 ? new CircleSection(D) : double.IsNaN(D) ? null : Wrong(values, "--diameter");
        }

        var B = values.Needed(span, "length", "1.5 m");
        var H = values.Needed(rise, "length", "1.5 m");
        return B > 0 && H > 0 ? new BoxSection(B, H) : double.IsNaN(B) || double.IsNaN(H) ? null : Wrong(values, B > 0 ? "--rise" : "--span");
    }

    private static ISection? Wrong(CommandValues values, string option)
    {
        values.Wrong(option, "a size that is not positive", "a positive size");
        return null;
    }

    private static IEnumerable<double> Range(string[]? words, CommandValues values)
    {
        if (words is not { Length: 3 }) yield break;
        double from = double.NaN, to = double.NaN;
        var ok = true;
        foreach (var (word, i) in words.Take(2).Select((w, i) => (w, i)))
        {
            try
            {
                if (i == 0) from = Units.Parse(word, "flow", "--flow-range");
                else to = Units.Parse(word, "flow", "--flow-range");
            }
            catch (InputException e)
            {
                ok = false;
                foreach (var p in e.Problems) values.Wrong(p.Place, p.Found, p.Expected);
            }
        }

        if (!int.TryParse(words[2], out var n) || n is < 2 or > 10000)
        {
            values.Wrong("--flow-range", $"'{words[2]}' steps", "a whole number from 2 to 10000");
            yield break;
        }

        if (!ok) yield break;
        for (var k = 0; k < n; k++) yield return from + ((to - from) * k / (n - 1));
    }
}
