namespace GeoCulvert.Design.Hydrology;

/// <summary>The four hydrologic soil groups and how a text names one.</summary>
internal static class SoilGroups
{
    /// <summary>A to D, from the most to the least pervious.</summary>
    public static readonly string[] All = ["A", "B", "C", "D"];

    /// <summary>The letter of "B", "b" or, by the rule, "B/D"; null when the text names no group.</summary>
    public static string? Letter(string? text, DualSoilGroup dual)
    {
        var letters = (text ?? "").Trim().ToUpperInvariant().Split('/', StringSplitOptions.TrimEntries);
        var letter = letters.Length == 2 && dual == DualSoilGroup.Undrained ? letters[1] : letters[0];
        return letters.Length <= 2 && letters.All(All.Contains) ? letter : null;
    }
}
