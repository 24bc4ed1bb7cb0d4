namespace GeoCulvert.Cli.Project;

/// <summary>What a key of the project file holds.</summary>
internal enum KeyKind
{
    /// <summary>Any text.</summary>
    Text,

    /// <summary>A path, relative to the project file.</summary>
    Path,

    /// <summary>One path or a list of paths.</summary>
    Paths,

    /// <summary>One of a few words.</summary>
    Choice,

    /// <summary>A list of words, each one of a few.</summary>
    Choices,

    /// <summary>A number without a unit.</summary>
    Number,

    /// <summary>A list of numbers.</summary>
    Numbers,

    /// <summary>A whole number.</summary>
    Integer,

    /// <summary>true or false.</summary>
    Boolean,

    /// <summary>A number with its unit, in a text.</summary>
    Quantity,

    /// <summary>A list of texts.</summary>
    Texts,
}

/// <summary>One key of the project file: the same list reads the file, names near misses, writes the template and the schema.</summary>
/// <param name="Table">The table it stands in.</param>
/// <param name="Name">The key.</param>
/// <param name="Kind">What it holds.</param>
/// <param name="Default">Default as it would be written in the file, or null when there is none.</param>
/// <param name="Description">One line for people.</param>
internal sealed record ProjectKey(string Table, string Name, KeyKind Kind, string? Default, string Description)
{
    /// <summary>Dimension of a quantity: length, area, ...</summary>
    public string Dimension { get; init; } = "";

    /// <summary>The words allowed in a choice.</summary>
    public IReadOnlyList<string> Words { get; init; } = [];

    /// <summary>Smallest value allowed (SI for quantities).</summary>
    public double Least { get; init; } = double.NegativeInfinity;

    /// <summary>Largest value allowed (SI for quantities).</summary>
    public double Most { get; init; } = double.PositiveInfinity;

    /// <summary>"[table] name".</summary>
    public string FullName => $"[{Table}] {Name}";
}
