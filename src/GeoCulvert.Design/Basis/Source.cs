namespace GeoCulvert.Design.Basis;

/// <summary>Where a formula, a coefficient or a figure comes from.</summary>
/// <param name="Document">Handbook, report or law, with its edition.</param>
/// <param name="Locator">Chapter, table, chart or equation number.</param>
/// <param name="Status">How well it was checked, for example VERIFIED, CROSS-CHECKED, MEMORY, OWN CALC.</param>
public sealed record Source(string Document, string Locator = "", string Status = "")
{
    /// <summary>"HDS-5, Chart 8" and, when the status is not plain, "(status)".</summary>
    public override string ToString()
    {
        var place = Locator.Length == 0 ? Document : $"{Document}, {Locator}";
        return Status.Length == 0 ? place : $"{place} ({Status})";
    }
}

/// <summary>One line of a calculation that a reviewer can follow by hand.</summary>
/// <param name="Name">snake_case name with its unit suffix, stable for scripts: <c>intensity_mm_per_h</c>.</param>
/// <param name="Value">The value, in <paramref name="Unit"/>.</param>
/// <param name="Unit">Unit of the value; "" for a pure number.</param>
/// <param name="Formula">The formula with the numbers put in, or "" for an input.</param>
/// <param name="Source">Where the formula or the input comes from.</param>
public sealed record Step(string Name, double Value, string Unit, string Formula = "", string Source = "");
