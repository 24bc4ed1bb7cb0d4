namespace GeoCulvert.Design.Basis;

/// <summary>One thing wrong with an input, said so that its owner can mend it.</summary>
/// <param name="Place">File, and line, key or feature where known: <c>rain.csv line 14</c>.</param>
/// <param name="Found">What was found there.</param>
/// <param name="Expected">What was expected instead, with an example where it helps.</param>
public sealed record InputProblem(string Place, string Found, string Expected)
{
    /// <summary>The problem as one line: place, found, expected.</summary>
    public override string ToString() => $"{Place}: found {Found}; expected {Expected}";
}

/// <summary>Input that cannot be used. Callers collect the problems of several inputs and print all of them (exit code 2).</summary>
public sealed class InputException : Exception
{
    /// <summary>Creates the exception for one problem.</summary>
    public InputException(string place, string found, string expected)
        : this([new InputProblem(place, found, expected)])
    {
    }

    /// <summary>Creates the exception for several problems.</summary>
    public InputException(IReadOnlyList<InputProblem> problems)
        : base(string.Join('\n', problems)) => Problems = problems;

    /// <summary>Everything that is wrong, in the order it was found.</summary>
    public IReadOnlyList<InputProblem> Problems { get; }
}
