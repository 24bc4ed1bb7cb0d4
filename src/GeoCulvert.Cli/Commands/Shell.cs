using System.CommandLine;
using GeoCulvert.Cli.Output;
using GeoCulvert.Design.Basis;
using GeoCulvert.Layers;

namespace GeoCulvert.Cli.Commands;

/// <summary>Exit codes and the frame every command runs in.</summary>
internal static class Shell
{
    /// <summary>Done.</summary>
    public const int Done = 0;

    /// <summary>The program failed.</summary>
    public const int Failed = 1;

    /// <summary>The input is wrong.</summary>
    public const int WrongInput = 2;

    /// <summary>Done, but some crossings could not be computed or sized.</summary>
    public const int DoneInPart = 3;

    /// <summary>No progress and no information on stderr.</summary>
    public static Option<bool> Quiet { get; } = new("--quiet") { Description = "Say nothing on stderr but errors.", Recursive = true };

    /// <summary>JSON lines on stderr.</summary>
    public static Option<bool> JsonLog { get; } = new("--json-log") { Description = "One JSON object a line on stderr.", Recursive = true };

    /// <summary>Runs a command's work: problems of the input are printed all at once, other failures in one sentence.</summary>
    public static int Run(ParseResult parse, Func<Terminal, int> work)
    {
        var terminal = new Terminal(parse.GetValue(Quiet), parse.GetValue(JsonLog));
        try
        {
            return work(terminal);
        }
        catch (InputException e)
        {
            terminal.Problems(e.Problems);
            return WrongInput;
        }
        catch (OperationCanceledException)
        {
            terminal.Failed("Stopped. The former results are untouched.");
            return Failed;
        }
        catch (Exception e) when (e is GdalMissingException or GdalException)
        {
            terminal.Failed(e.Message);
            return Failed;
        }
        catch (Exception e) when (e is IOException or UnauthorizedAccessException)
        {
            terminal.Failed($"{e.Message} The former results are untouched.");
            return Failed;
        }
        catch (Exception e) when (e is InvalidOperationException or ArgumentException or NullReferenceException or IndexOutOfRangeException or ArithmeticException or KeyNotFoundException)
        {
            terminal.Failed($"The program failed: {e.Message} This is a defect; please report it with the project file. The former results are untouched.\n{e.StackTrace}");
            return Failed;
        }
        catch (OutOfMemoryException)
        {
            terminal.Failed("Not enough memory for this terrain model: name a coarser cell_size, or cut the terrain to the study.");
            return Failed;
        }
    }
}
