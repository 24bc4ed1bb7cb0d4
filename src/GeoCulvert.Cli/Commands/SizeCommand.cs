using System.CommandLine;
using System.Text;
using System.Text.Json;
using GeoCulvert.Cli.Output;
using GeoCulvert.Design.Basis;
using GeoCulvert.Design.Hydraulics;
using GeoCulvert.Design.Sizing;

namespace GeoCulvert.Cli.Commands;

/// <summary>geoculvert size: a standard size for a flow, without a map.</summary>
internal static class SizeCommand
{
    private const int OptionsShown = 8;

    /// <summary>Makes the command.</summary>
    public static Command Create()
    {
        var options = new CulvertOptions();
        var limit = CulvertOptions.Text("--headwater-limit", "Highest headwater elevation allowed.", "102 m");
        var ratio = CulvertOptions.Text("--hw-over-d", "Largest headwater depth over rise (default 1.5, common practice).", "1.2");
        var freeboard = CulvertOptions.Text("--freeboard", "Headwater below the road, when a road is given (default 0.3 m, common practice).", "0.3 m");
        var smallest = CulvertOptions.Text("--smallest-rise", "Smallest diameter or rise.", "24 in");
        var plot = new Option<string?>("--plot") { Description = "Also draw the rating of the chosen culvert to an SVG file.", HelpName = "FILE.svg" };
        var command = new Command(
            "size",
            "The smallest standard culvert for a flow, without a map: least barrel area, then fewest barrels. --barrels is the largest number allowed (default 4).\n\n"
            + "Example: geoculvert size --shape box --flow \"12 m3/s\" --length \"36 m\" --inlet-elevation \"100 m\" --outlet-elevation \"99.5 m\" --hw-over-d 1.2")
        {
            limit, ratio, freeboard, smallest, plot,
        };
        options.AddTo(command);
        command.SetAction(parse => Shell.Run(parse, terminal =>
        {
            var values = new CommandValues(parse);
            var question = CulvertQuestion.Read(parse, options, values);
            var flows = values.Quantities(options.Flow, "flow");
            if (flows.Count == 0 && values.Problems.Count == 0) values.Wrong("--flow", "no flow", "--flow \"12 m3/s\"; a second --flow is the check flood");
            if (flows.Any(q => q <= 0)) values.Wrong("--flow", "a flow that is not positive", "a positive flow");
            if (flows.Count > 2) values.Wrong("--flow", $"{flows.Count} flows", "the design flow, and at most a check flow");
            var criteria = new SizingCriteria
            {
                LargestHeadwaterRatio = values.Number(ratio, 0.3, 10) ?? 1.5,
                HighestHeadwaterElevationM = values.Quantity(limit, "length"),
                FreeboardM = values.Quantity(freeboard, "length") ?? 0.3,
                SmallestRiseM = values.Quantity(smallest, "length") ?? 0,
            };
            if (values.Problems.Count > 0) throw new InputException(values.Problems);

            var most = parse.GetValue(options.Barrels) is null ? 4 : question.Barrels;
            var catalogue = CulvertCatalogue.Build([question.Inlet!], [parse.GetValue(options.Shape)!], question.RoughnessN, question.EntranceLoss, most);
            var outcome = CulvertSizing.Choose(new SizingRequest(
                catalogue, criteria, flows[0], flows.Count > 1 ? flows[1] : flows[0], question.LengthM, question.InletElevationM, question.OutletElevationM, question.Tailwater, question.Road));
            if (parse.GetValue(options.Json)) Json(outcome, question.Units);
            else Print(outcome, question.Units);
            if (outcome.Chosen is { } chosen && parse.GetValue(plot) is { } file) File.WriteAllText(file, RateCommand.Plot([chosen.Design, chosen.Check], question.Units, chosen.Design.Site));
            return outcome.Chosen is null ? Shell.DoneInPart : Shell.Done;
        }));
        return command;
    }

    private static void Print(SizingOutcome outcome, UnitSystem units)
    {
        var shown = outcome.Chosen ?? outcome.Closest;
        Console.Out.WriteLine(outcome.Chosen is null ? $"No size fits. The option that fails by least is {shown?.Description ?? "none"}:" : $"{shown!.Description}");
        foreach (var c in shown?.Criteria ?? [])
        {
            var unit = DisplayUnits.Symbol(c.Kind, units);
            Console.Out.WriteLine($"  {(c.IsMet ? "met   " : "BROKEN")} {c.Name,-22} {DisplayUnits.FromSi(c.Value, c.Kind, units),9:0.00} {unit,-4} limit {DisplayUnits.FromSi(c.Limit, c.Kind, units):0.00} {unit} ({c.Origin})");
        }

        if (shown is null) return;
        Console.Out.WriteLine();
        RatingText.Table(Console.Out, shown.Check.FlowM3PerS == shown.Design.FlowM3PerS ? [shown.Design] : [shown.Design, shown.Check], units);
        Console.Out.WriteLine("Nearest other options");
        var area = shown.Barrels.AreaM2;
        foreach (var o in outcome.Options.Where(o => !ReferenceEquals(o, shown)).OrderBy(o => Math.Abs(o.Barrels.AreaM2 - area)).Take(OptionsShown).OrderBy(o => o.Barrels.AreaM2))
            Console.Out.WriteLine($"  {o.Description,-36} {(outcome.Chosen is null ? string.Join("; ", o.Criteria.Where(c => !c.IsMet).Select(c => c.Name)) : outcome.Reason(o))}");
    }

    private static void Json(SizingOutcome outcome, UnitSystem units)
    {
        using var buffer = new MemoryStream();
        using (var json = new Utf8JsonWriter(buffer, new JsonWriterOptions { Indented = true }))
        {
            var shown = outcome.Chosen;
            json.WriteStartObject();
            json.WriteString("status", shown is null ? "no size fits" : "sized");
            json.WriteString("culvert", shown?.Description);
            json.WriteStartArray("results");
            foreach (var r in shown is null ? [] : shown.Check.FlowM3PerS == shown.Design.FlowM3PerS ? new[] { shown.Design } : [shown.Design, shown.Check])
            {
                json.WriteStartObject();
                json.WriteString("shape", shown!.Choice.Shape);
                json.WriteNumber("span" + DisplayUnits.FieldSuffix(QuantityKind.Length, units), DisplayUnits.FromSi(shown.Barrels.Section.SpanM, QuantityKind.Length, units));
                json.WriteNumber("rise" + DisplayUnits.FieldSuffix(QuantityKind.Length, units), DisplayUnits.FromSi(shown.Barrels.Section.RiseM, QuantityKind.Length, units));
                json.WriteNumber("barrels", shown.Barrels.Count);
                RatingText.Write(json, r, units);
                json.WriteEndObject();
            }

            json.WriteEndArray();
            json.WriteStartArray("options");
            foreach (var o in outcome.Options)
            {
                json.WriteStartObject();
                json.WriteString("culvert", o.Description);
                json.WriteNumber("barrel_area" + DisplayUnits.FieldSuffix(QuantityKind.SmallArea, units), DisplayUnits.FromSi(o.Barrels.AreaM2, QuantityKind.SmallArea, units));
                json.WriteString("reason", outcome.Chosen is null ? string.Join("; ", o.Criteria.Where(c => !c.IsMet).Select(c => $"{c.Name} {c.Value:0.00} beyond {c.Limit:0.00}")) : outcome.Reason(o));
                json.WriteEndObject();
            }

            json.WriteEndArray();
            json.WriteEndObject();
        }

        Console.Out.WriteLine(Encoding.UTF8.GetString(buffer.ToArray()));
    }
}
