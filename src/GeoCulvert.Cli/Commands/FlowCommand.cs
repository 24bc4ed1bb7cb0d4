using System.CommandLine;
using GeoCulvert.Cli.Output;
using GeoCulvert.Design.Basis;

namespace GeoCulvert.Cli.Commands;

/// <summary>geoculvert flow: the peak flow of one watershed, without a map.</summary>
internal static class FlowCommand
{
    /// <summary>Makes the command.</summary>
    public static Command Create()
    {
        var options = new FlowOptions();
        var command = new Command(
            "flow",
            "Peak flow of one watershed, without a map, printed as a calculation that can be followed. Every dimension carries its unit.\n\n"
            + "Examples:\n"
            + "  geoculvert flow --method rational --area \"43.3 ac\" --runoff-coefficient 0.235 --intensity \"1.9 in/h\"\n"
            + "  geoculvert flow --method nrcs-graphical --area \"250 ac\" --time-of-concentration \"1.53 h\" --curve-number 75 --rainfall \"6.0 in\" --storm II\n"
            + "  geoculvert flow --method regression --equations equations.toml --region \"Western\" --variable \"A=60.9 mi2\" --variable \"S=0.0436\"");
        options.AddTo(command, FlowQuestion.Methods);
        command.SetAction(parse => Shell.Run(parse, _ =>
        {
            var units = parse.GetValue(options.UnitsOption) == "us" ? UnitSystem.Us : UnitSystem.Si;
            var flows = new FlowQuestion(parse, options, new CommandValues(parse)).Compute();
            if (parse.GetValue(options.Json)) FlowText.Json(Console.Out, flows, units);
            else FlowText.Calculation(Console.Out, flows, units);
            return flows.All(f => f.Flow.FlowM3PerS is not null) ? Shell.Done : Shell.DoneInPart;
        }));
        return command;
    }
}
