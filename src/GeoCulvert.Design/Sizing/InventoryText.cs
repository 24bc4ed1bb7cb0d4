using System.Globalization;
using System.Text.RegularExpressions;
using GeoCulvert.Design.Basis;

namespace GeoCulvert.Design.Sizing;

/// <summary>
/// Sizes, counts and words as inventories hold them: "36 in", "36\"", "3'-6\"", "4 1/2 ft", "900", "2x48", "N/A", "RCP", blanks. Nothing is guessed: a number without a unit takes
/// the unit stated for its field, and without one it is not used.
/// </summary>
public static partial class InventoryText
{
    private static readonly HashSet<string> Nothing = new(["", "-", "--", "?", "n/a", "na", "none", "null", "nil", "unknown", "unk", "tbd", "see notes", "x"], StringComparer.OrdinalIgnoreCase);

    /// <summary>Whether a value says nothing.</summary>
    public static bool IsBlank(string? text) => text is null || Nothing.Contains(text.Trim());

    /// <summary>A length in m; null with the trouble in words when it cannot be used, null without trouble when there is nothing.</summary>
    /// <param name="text">Text of the field.</param>
    /// <param name="unit">Unit stated for bare numbers; null when none is.</param>
    /// <param name="trouble">What is wrong; "" when nothing is.</param>
    public static double? LengthM(string? text, string? unit, out string trouble)
    {
        trouble = "";
        if (IsBlank(text)) return null;
        var t = text!.Trim().Replace('\u2019', '\'').Replace('\u2032', '\'').Replace('\u201d', '"').Replace('\u2033', '"').Replace("''", "\"", StringComparison.Ordinal);
        if (FeetInches().Match(t) is { Success: true } fi && Number(fi.Groups["f"].Value) is { } feet && (fi.Groups["i"].Value.Length == 0 ? 0 : Number(fi.Groups["i"].Value)) is { } inches)
            return Positive((feet * Units.Foot) + (inches * Units.Foot / 12), text, out trouble);
        if (Measure().Match(t) is { Success: true } m && Number(m.Groups["n"].Value) is { } number)
        {
            var word = m.Groups["u"].Value.TrimEnd('.').Trim();
            if (word.Length == 0)
            {
                if (unit is null) trouble = $"'{text}' without a unit, and none is stated";
                else return Positive(number * Units.Get(unit).InSi, text, out trouble);
                return null;
            }

            if (Units.Find(word) is { Dimension: "length" } found) return Positive(number * found.InSi, text, out trouble);
        }

        trouble = $"'{text}' is no length";
        return null;
    }

    /// <summary>A whole number of barrels; 1 when there is nothing.</summary>
    public static int? Count(string? text, out string trouble)
    {
        trouble = "";
        if (IsBlank(text)) return null;
        var t = text!.Trim().ToLowerInvariant();
        var words = new[] { "single", "double", "twin", "triple", "quad" };
        var at = Array.FindIndex(words, w => t.StartsWith(w, StringComparison.Ordinal));
        if (at >= 0) return at switch { 0 => 1, 1 or 2 => 2, 3 => 3, _ => 4 };
        if (double.TryParse(t, NumberStyles.Float, CultureInfo.InvariantCulture, out var n) && n == Math.Floor(n) && n is >= 1 and <= 50) return (int)n;
        trouble = $"'{text}' is no number of barrels";
        return null;
    }

    /// <summary>Shape word of the program; null with trouble when it is not known.</summary>
    public static string? Shape(string? text, out string trouble)
    {
        trouble = "";
        if (IsBlank(text)) return null;
        var t = text!.Trim().ToLowerInvariant();
        if (t.Contains("arch", StringComparison.Ordinal)) return t.Contains("pipe", StringComparison.Ordinal) || t.Contains("cmpa", StringComparison.Ordinal) ? "pipe-arch" : "arch";
        if (t.Contains("ellip", StringComparison.Ordinal) || t.Contains("oval", StringComparison.Ordinal)) return "ellipse";
        if (t.Contains("box", StringComparison.Ordinal) || t.Contains("rcb", StringComparison.Ordinal) || t.Contains("rect", StringComparison.Ordinal) || t.Contains("square", StringComparison.Ordinal)) return "box";
        if (t.Contains("pipe", StringComparison.Ordinal) || t.Contains("circ", StringComparison.Ordinal) || t.Contains("round", StringComparison.Ordinal) || Material(t) is not null) return "circle";
        trouble = $"'{text}' is no shape";
        return null;
    }

    /// <summary>"concrete", "corrugated metal", "plastic", or null.</summary>
    public static string? Material(string? text)
    {
        if (IsBlank(text)) return null;
        var t = text!.ToLowerInvariant();
        bool Has(params string[] words) => words.Any(w => t.Contains(w, StringComparison.Ordinal));
        return Has("concrete", "rcp", "rcb", "conc") ? "concrete" : Has("cmp", "csp", "corrugated metal", "metal", "steel", "alum") ? "corrugated metal" : Has("hdpe", "plastic", "pvc", "poly") ? "plastic" : null;
    }

    /// <summary>A cell that holds count and size together, "2x48", "3 @ 36 in", "(2) 24\"": the count and the rest; null without one.</summary>
    public static (int Count, string Size)? CountAndSize(string? text) =>
        text is not null && Several().Match(text.Trim()) is { Success: true } m ? (int.Parse(m.Groups["n"].Value, CultureInfo.InvariantCulture), m.Groups["r"].Value.Trim()) : null;

    private static double? Positive(double value, string? text, out string trouble)
    {
        trouble = value > 0 && double.IsFinite(value) ? "" : $"'{text}' is not positive";
        return trouble.Length == 0 ? value : null;
    }

    private static double? Number(string text)
    {
        var parts = text.Trim().Replace('-', ' ').Split(' ', StringSplitOptions.RemoveEmptyEntries);
        double sum = 0;
        foreach (var part in parts)
        {
            var slash = part.IndexOf('/', StringComparison.Ordinal);
            if (slash > 0 && double.TryParse(part[..slash], NumberStyles.Float, CultureInfo.InvariantCulture, out var a) && double.TryParse(part[(slash + 1)..], NumberStyles.Float, CultureInfo.InvariantCulture, out var b) && b != 0) sum += a / b;
            else if (double.TryParse(part, NumberStyles.Float, CultureInfo.InvariantCulture, out var v)) sum += v;
            else return null;
        }

        return parts.Length == 0 ? null : text.TrimStart().StartsWith('-') ? -sum : sum;
    }

    [GeneratedRegex("^(?<f>[0-9.]+)\\s*(?:'|ft\\.?|feet|foot)\\s*-?\\s*(?:(?<i>[0-9]+(?:\\.[0-9]+)?(?:[ -][0-9]+/[0-9]+)?|[0-9]+/[0-9]+)\\s*(?:\"|in\\.?|inch(?:es)?)?)?$", RegexOptions.IgnoreCase | RegexOptions.CultureInvariant)]
    private static partial Regex FeetInches();

    [GeneratedRegex("^(?<n>-?[0-9.]+(?:[eE][-+]?[0-9]+)?(?:[ -][0-9]+/[0-9]+)?|[0-9]+/[0-9]+)\\s*(?<u>[^0-9]*)$", RegexOptions.CultureInvariant)]
    private static partial Regex Measure();

    [GeneratedRegex("^\\(?(?<n>[1-9][0-9]?)\\)?\\s*(?:x|X|@|\u00d7|each)\\s*(?<r>[0-9].*)$|^\\((?<n>[1-9][0-9]?)\\)\\s*(?<r>[0-9].*)$", RegexOptions.CultureInvariant)]
    private static partial Regex Several();
}
