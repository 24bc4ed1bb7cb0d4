namespace GeoCulvert.Design.Basis;

/// <summary>How much a finding matters to the person who signs the drawing.</summary>
public enum Severity
{
    /// <summary>Worth knowing; no action is needed for the result to stand.</summary>
    Note,

    /// <summary>The result stands only if somebody looks at this first.</summary>
    Warning,

    /// <summary>The result for this crossing is missing or must not be used.</summary>
    Error,
}

/// <summary>A stable code of the catalogue: what it means and what to do about it.</summary>
/// <param name="Code">Stable lower-case code with hyphens, unique in the program; scripts may rely on it.</param>
/// <param name="Severity">Severity of every finding raised with this code.</param>
/// <param name="Meaning">One sentence: what the program saw.</param>
/// <param name="Action">One sentence: what the reader should do.</param>
public sealed record FindingCode(string Code, Severity Severity, string Meaning, string Action)
{
    /// <summary>Raises a finding with this code.</summary>
    /// <param name="text">What was found, with figures and units.</param>
    /// <param name="value">The figure that was found, when there is one.</param>
    /// <param name="limit">The limit it was held against, in the same unit.</param>
    public Finding With(string text, double? value = null, double? limit = null) => new(this, text, value, limit);
}

/// <summary>One doubt about one crossing, or about the whole run when <see cref="CrossingId"/> is null.</summary>
/// <param name="Kind">Code, severity and action.</param>
/// <param name="Text">What was found, with figures and units.</param>
/// <param name="Value">The figure that was found, when there is one.</param>
/// <param name="Limit">The limit it was held against, in the same unit.</param>
public sealed record Finding(FindingCode Kind, string Text, double? Value = null, double? Limit = null)
{
    /// <summary>The crossing this is about; null for a finding on the whole run.</summary>
    public string? CrossingId { get; init; }

    /// <summary>The stable code.</summary>
    public string Code => Kind.Code;

    /// <summary>The severity.</summary>
    public Severity Severity => Kind.Severity;

    /// <summary>What the reader should do.</summary>
    public string Action => Kind.Action;

    /// <summary>What was seen and the figures, in one sentence that stands alone: the meaning of the code, a colon, the text.</summary>
    public string Sentence => $"{Kind.Meaning.TrimEnd('.')}: {Text}";

    /// <summary>The same finding, tied to a crossing.</summary>
    public Finding At(string crossingId) => this with { CrossingId = crossingId };
}
