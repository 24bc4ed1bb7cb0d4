using System.CommandLine;
using GeoCulvert.Cli.Commands;

var root = new RootCommand(
    "GeoCulvert: from a terrain model and a road alignment to sized culverts as map layers, a report and a schedule.\n\n"
    + "Results are for screening and as a design aid. They defer to local codes and need a licensed engineer's review.\n\n"
    + "Exit codes: 0 done; 1 the program failed; 2 the input is wrong; 3 done, but some crossings could not be computed or sized.")
{
    RunCommand.Create(),
    CheckCommand.Create(),
    NewCommand.Create(),
    SizeCommand.Create(),
    RateCommand.Create(),
    FlowCommand.Create(),
    Shell.Quiet,
    Shell.JsonLog,
};
var parse = root.Parse(args);
if (parse.Errors.Count == 0) return await parse.InvokeAsync();
foreach (var error in parse.Errors) Console.Error.WriteLine(error.Message);
Console.Error.WriteLine($"See geoculvert {(parse.CommandResult.Command == root ? "" : parse.CommandResult.Command.Name + " ")}--help.");
return Shell.WrongInput;
