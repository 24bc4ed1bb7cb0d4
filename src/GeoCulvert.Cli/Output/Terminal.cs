using System.Diagnostics;
using System.Text.Json;
using GeoCulvert.Design.Basis;
using Spectre.Console;

namespace GeoCulvert.Cli.Output;

/// <summary>What the program says while it works: on stderr, so that stdout holds results only.</summary>
internal sealed class Terminal
{
    private readonly bool _quiet;
    private readonly bool _jsonLog;
    private readonly TextWriter _errors;

    /// <summary>Creates the terminal.</summary>
    /// <param name="quiet">Say nothing but errors.</param>
    /// <param name="jsonLog">One JSON object a line instead of text.</param>
    /// <param name="errors">Where to write; stderr when null.</param>
    public Terminal(bool quiet, bool jsonLog, TextWriter? errors = null)
    {
        (_quiet, _jsonLog, _errors) = (quiet, jsonLog, errors ?? Console.Error);
        Colour = errors is null && !Console.IsErrorRedirected && !jsonLog && Environment.GetEnvironmentVariable("NO_COLOR") is null or "";
    }

    private bool Colour { get; }

    /// <summary>Runs a stage and says how long it took.</summary>
    public T Stage<T>(string name, Func<IProgress<double>, T> work, out double seconds)
    {
        var watch = Stopwatch.StartNew();
        T result;
        if (!_quiet && !_jsonLog && _errors == Console.Error && !Console.IsErrorRedirected)
        {
            var console = AnsiConsole.Create(new AnsiConsoleSettings
            {
                Out = new AnsiConsoleOutput(_errors),
                ColorSystem = Colour ? ColorSystemSupport.Detect : ColorSystemSupport.NoColors,
            });
            T inner = default!;
            console.Progress()
                .AutoClear(true)
                .Columns(new TaskDescriptionColumn(), new ProgressBarColumn(), new PercentageColumn(), new RemainingTimeColumn())
                .Start(context =>
                {
                    var task = context.AddTask(Markup.Escape(name));
                    inner = work(new ShareOfWork(share => task.Value = 100 * share));
                    task.Value = 100;
                });
            result = inner;
        }
        else
        {
            result = work(new ShareOfWork(static _ => { }));
        }

        seconds = watch.Elapsed.TotalSeconds;
        Line("stage", $"{name}: {seconds:0.0} s", ("stage", name), ("seconds", Math.Round(seconds, 3)));
        return result;
    }

    /// <summary>One line of information.</summary>
    public void Say(string text) => Line("info", text);

    /// <summary>One line of warning.</summary>
    public void Warn(string text) => Line("warning", text);

    /// <summary>Everything that is wrong with the input, one problem a line.</summary>
    public void Problems(IReadOnlyList<InputProblem> problems)
    {
        if (_jsonLog)
        {
            foreach (var p in problems) Line("error", p.ToString(), ("place", p.Place), ("found", p.Found), ("expected", p.Expected));
            return;
        }

        _errors.WriteLine(problems.Count == 1 ? "The input is wrong in one place:" : $"The input is wrong in {problems.Count} places:");
        foreach (var p in problems)
        {
            _errors.WriteLine($"  {p.Place}");
            _errors.WriteLine($"    found     {p.Found}");
            _errors.WriteLine($"    expected  {p.Expected}");
        }
    }

    /// <summary>The program itself failed.</summary>
    public void Failed(string text)
    {
        if (_jsonLog) Line("error", text);
        else _errors.WriteLine(text);
    }

    private void Line(string level, string text, params (string Key, object Value)[] more)
    {
        if (_quiet && level is not "error") return;
        if (!_jsonLog)
        {
            _errors.WriteLine(text);
            return;
        }

        using var buffer = new MemoryStream();
        using (var json = new Utf8JsonWriter(buffer))
        {
            json.WriteStartObject();
            json.WriteString("level", level);
            json.WriteString("text", text);
            foreach (var (key, value) in more)
            {
                if (value is double d) json.WriteNumber(key, d);
                else json.WriteString(key, value.ToString());
            }

            json.WriteEndObject();
        }

        _errors.WriteLine(System.Text.Encoding.UTF8.GetString(buffer.ToArray()));
    }

    private sealed class ShareOfWork(Action<double> act) : IProgress<double>
    {
        public void Report(double value) => act(Math.Clamp(value, 0, 1));
    }
}
