using System.Text;

namespace GeoCulvert.Report;

/// <summary>Turns any text of the inputs into text that is only text: in HTML, in an attribute, in SVG and in a CSS string.</summary>
public static class HtmlText
{
    /// <summary>
    /// Escapes for HTML and XML content and for attributes in double quotes. Characters that XML forbids, lone surrogates and the
    /// invisible marks that reorder the text after them (U+202A-202E, U+2066-2069) become U+FFFD, so that a name cannot hide or
    /// rearrange what stands beside it.
    /// </summary>
    public static string Escape(string? text)
    {
        if (string.IsNullOrEmpty(text)) return "";
        var result = new StringBuilder(text.Length + 16);
        for (var i = 0; i < text.Length; i++)
        {
            var c = text[i];
            switch (c)
            {
                case '&': result.Append("&amp;"); break;
                case '<': result.Append("&lt;"); break;
                case '>': result.Append("&gt;"); break;
                case '"': result.Append("&quot;"); break;
                case '\'': result.Append("&#39;"); break;
                case '\t' or '\n' or '\r': result.Append(' '); break;
                case >= '\uD800' and <= '\uDFFF':
                    if (char.IsHighSurrogate(c) && i + 1 < text.Length && char.IsLowSurrogate(text[i + 1])) result.Append(c).Append(text[++i]);
                    else result.Append('\uFFFD');
                    break;
                default: result.Append(IsHarmless(c) ? c : '\uFFFD'); break;
            }
        }
        return result.ToString();
    }

    /// <summary>Escaped text set apart from the direction of the text around it.</summary>
    public static string Isolated(string? text) => $"<bdi>{Escape(text)}</bdi>";

    /// <summary>A quoted CSS string in which everything but ASCII letters and digits is a numeric escape.</summary>
    public static string CssString(string text)
    {
        ArgumentNullException.ThrowIfNull(text);
        var result = new StringBuilder("\"");
        foreach (var rune in text.EnumerateRunes())
        {
            if (rune.IsAscii && char.IsAsciiLetterOrDigit((char)rune.Value)) result.Append((char)rune.Value);
            else if (rune.Value > 0xFFFF || IsHarmless((char)rune.Value)) result.Append('\\').Append(rune.Value.ToString("x")).Append(' ');
            else result.Append("\\fffd ");
        }
        return result.Append('"').ToString();
    }

    /// <summary>Cuts a long text for a label, with an ellipsis; never inside a surrogate pair.</summary>
    public static string Shorten(string? text, int longest)
    {
        if (text is null || text.Length <= longest) return text ?? "";
        var end = longest - 1;
        if (end > 0 && char.IsHighSurrogate(text[end - 1])) end--;
        return text[..end] + "\u2026";
    }

    private static bool IsHarmless(char c) =>
        c >= ' ' && c is not ((>= '\u007F' and <= '\u009F') or (>= '\u202A' and <= '\u202E') or (>= '\u2066' and <= '\u2069') or '\u2028' or '\u2029' or '\uFFFE' or '\uFFFF');
}
