using System.Globalization;
using GeoCulvert.Design.Basis;

namespace GeoCulvert.Report;

/// <summary>
/// Figures as the trade prints them (common practice): flow, area and volume to three significant figures, elevations and lengths to
/// 0.01, velocity to 0.01, slope to 0.0001. The full value stays available for the hover text.
/// </summary>
public static class FigureText
{
    /// <summary>What stands for a figure that is missing.</summary>
    public const string Missing = "\u2013";

    /// <summary>Rounds a value that is already in the output unit of its kind.</summary>
    /// <param name="value">Value in output units; null or not finite gives <see cref="Missing"/>.</param>
    /// <param name="kind">What it measures.</param>
    public static string Round(double? value, QuantityKind kind) => value is not { } v || !double.IsFinite(v) ? Missing : kind switch
    {
        QuantityKind.Flow or QuantityKind.Area or QuantityKind.Volume => Significant(v, 3),
        QuantityKind.Length or QuantityKind.SmallArea or QuantityKind.Velocity => Decimals(v, 2),
        QuantityKind.SmallLength or QuantityKind.Intensity => Significant(v, 3),
        QuantityKind.Time or QuantityKind.Angle => Decimals(v, 1),
        QuantityKind.Slope => Decimals(v, 4),
        QuantityKind.Share => Decimals(v, 3),
        QuantityKind.Years => Trimmed(v, 6),
        _ => Trimmed(v, 4),
    };

    /// <summary>An SI value in the output unit, rounded, without its unit.</summary>
    public static string FromSi(double? value, QuantityKind kind, UnitSystem units) =>
        Round(value is { } v ? DisplayUnits.FromSi(v, kind, units) : null, kind);

    /// <summary>An SI value in the output unit, rounded, with its unit as printed.</summary>
    public static string WithUnit(double? value, QuantityKind kind, UnitSystem units)
    {
        var unit = Unit(kind, units);
        return unit.Length == 0 || value is not { } v || !double.IsFinite(v) ? FromSi(value, kind, units) : FromSi(value, kind, units) + " " + unit;
    }

    /// <summary>The unit as printed to people: m3/s as m\u00b3/s, deg as \u00b0.</summary>
    public static string Unit(QuantityKind kind, UnitSystem units) => Pretty(DisplayUnits.Symbol(kind, units));

    /// <summary>A unit symbol as printed to people.</summary>
    public static string Pretty(string symbol) => symbol switch
    {
        "m2" => "m\u00b2",
        "m3" => "m\u00b3",
        "km2" => "km\u00b2",
        "ft2" => "ft\u00b2",
        "mi2" => "mi\u00b2",
        "ft3" => "ft\u00b3",
        "m3/s" => "m\u00b3/s",
        "deg" => "\u00b0",
        _ => symbol,
    };

    /// <summary>The value with every digit that matters, shortest text that reads back to the same number.</summary>
    public static string Full(double value) => value.ToString("R", CultureInfo.InvariantCulture);

    /// <summary>Fixed decimals, never "-0".</summary>
    public static string Decimals(double value, int decimals)
    {
        var text = value.ToString("F" + decimals, CultureInfo.InvariantCulture);
        return text.StartsWith('-') && text.AsSpan(1).IndexOfAnyExcept("0.") < 0 ? text[1..] : text;
    }

    /// <summary>Significant figures without an exponent: 1234 to three is 1230, 0.045678 is 0.0457, 0 is 0.</summary>
    public static string Significant(double value, int figures)
    {
        if (value == 0) return "0";
        var scientific = value.ToString("E" + (figures - 1), CultureInfo.InvariantCulture);
        var exponent = int.Parse(scientific.AsSpan(scientific.IndexOf('E', StringComparison.Ordinal) + 1), NumberStyles.AllowLeadingSign, CultureInfo.InvariantCulture);
        if (exponent is < -9 or > 14) return scientific;
        return Decimals(double.Parse(scientific, CultureInfo.InvariantCulture), Math.Max(0, figures - 1 - exponent));
    }

    private static string Trimmed(double value, int figures)
    {
        if (value == Math.Floor(value) && Math.Abs(value) < 1e15) return Decimals(value, 0);
        var text = Significant(value, Math.Abs(value) >= 1000 ? figures + 2 : figures);
        return text.Contains('.', StringComparison.Ordinal) && !text.Contains('E', StringComparison.Ordinal) ? text.TrimEnd('0').TrimEnd('.') : text;
    }
}
