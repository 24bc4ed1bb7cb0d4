using System.CommandLine;
using System.Globalization;
using GeoCulvert.Design.Basis;

namespace GeoCulvert.Cli.Commands;

/// <summary>Reads the values of one command line and gathers everything that is wrong with them.</summary>
internal sealed class CommandValues(ParseResult parse)
{
    private readonly List<InputProblem> _problems = [];

    /// <summary>What is wrong so far.</summary>
    public IReadOnlyList<InputProblem> Problems => _problems;

    /// <summary>A quantity in SI, or null when the option is not given.</summary>
    public double? Quantity(Option<string?> option, string dimension) =>
        parse.GetValue(option) is { } text ? QuantityOf(option.Name, text, dimension) : null;

    /// <summary>Quantities in SI.</summary>
    public IReadOnlyList<double> Quantities(Option<string[]> option, string dimension) =>
        [.. (parse.GetValue(option) ?? []).Select(t => QuantityOf(option.Name, t, dimension)).OfType<double>()];

    /// <summary>A quantity that must be given and be at least a bound.</summary>
    public double Needed(Option<string?> option, string dimension, string example, double least = 0)
    {
        if (parse.GetValue(option) is null)
        {
            _problems.Add(new InputProblem(option.Name, "nothing", $"the option, for example {option.Name} \"{example}\""));
            return double.NaN;
        }

        var value = Quantity(option, dimension) ?? double.NaN;
        if (value < least) _problems.Add(new InputProblem(option.Name, $"'{parse.GetValue(option)}'", least > 0 ? "a positive value" : "a value of at least 0"));
        return value;
    }

    /// <summary>A pure number in a range, or null when the option is not given.</summary>
    public double? Number(Option<string?> option, double least, double most)
    {
        if (parse.GetValue(option) is not { } text) return null;
        if (double.TryParse(text, NumberStyles.Float, CultureInfo.InvariantCulture, out var value) && value >= least && value <= most) return value;
        _problems.Add(new InputProblem(option.Name, $"'{text}'", $"a number from {least:0.####} to {most:0.####}, without a unit"));
        return null;
    }

    /// <summary>Adds a problem.</summary>
    public void Wrong(string place, string found, string expected) => _problems.Add(new InputProblem(place, found, expected));

    /// <summary>Runs a reader of the design and keeps its problems.</summary>
    public T? Try<T>(Func<T> read)
        where T : class
    {
        try
        {
            return read();
        }
        catch (InputException e)
        {
            _problems.AddRange(e.Problems);
            return null;
        }
    }

    private double? QuantityOf(string name, string text, string dimension)
    {
        try
        {
            return Units.Parse(text, dimension, name);
        }
        catch (InputException e)
        {
            _problems.AddRange(e.Problems);
            return null;
        }
    }
}
