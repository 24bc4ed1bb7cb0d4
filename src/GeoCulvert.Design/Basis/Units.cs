using System.Globalization;

namespace GeoCulvert.Design.Basis;

/// <summary>System of units in which results are written. Inside the program everything is SI.</summary>
public enum UnitSystem
{
    /// <summary>Metres, m3/s, km2, mm/h.</summary>
    Si,

    /// <summary>Feet, ft3/s (cfs), square miles, inches per hour.</summary>
    Us,
}

/// <summary>A unit: its spellings, its dimension and its size in the SI unit of that dimension.</summary>
/// <param name="Symbol">The symbol the program writes.</param>
/// <param name="Dimension">Dimension, for messages: "length", "area", ...</param>
/// <param name="InSi">Size in the SI unit of the dimension (m, m2, m3, m3/s, m/s, s, m/m).</param>
/// <param name="Suffix">Suffix of field names: <c>m</c>, <c>cfs</c>, <c>m3_s</c>.</param>
public sealed record Unit(string Symbol, string Dimension, double InSi, string Suffix);

/// <summary>
/// The few units of the trade, used only where a person or a file meets the program.
/// Sizes are exact by definition: the international foot 0.3048 m and the US survey foot 1200/3937 m (NIST SP 811), the acre of
/// 43 560 international square feet, the mile of 5 280 feet.
/// </summary>
public static class Units
{
    /// <summary>The international foot in metres.</summary>
    public const double Foot = 0.3048;

    /// <summary>The US survey foot in metres.</summary>
    public const double SurveyFoot = 1200.0 / 3937.0;

    private const double Mile = 5280 * Foot;

    private static readonly (Unit Unit, string[] Spellings)[] All =
    [
        (new("m", "length", 1, "m"), ["metre", "metres", "meter", "meters"]),
        (new("mm", "length", 1e-3, "mm"), ["millimetre", "millimetres", "millimeter", "millimeters"]),
        (new("cm", "length", 1e-2, "cm"), []),
        (new("km", "length", 1e3, "km"), []),
        (new("ft", "length", Foot, "ft"), ["foot", "feet", "'"]),
        (new("us-ft", "length", SurveyFoot, "us_ft"), ["ftus", "us_ft", "survey-ft"]),
        (new("in", "length", Foot / 12, "in"), ["inch", "inches", "\""]),
        (new("mi", "length", Mile, "mi"), ["mile", "miles"]),
        (new("m2", "area", 1, "m2"), ["m^2", "m²", "sq m"]),
        (new("ha", "area", 1e4, "ha"), ["hectare", "hectares"]),
        (new("km2", "area", 1e6, "km2"), ["km^2", "km²", "sq km"]),
        (new("ft2", "area", Foot * Foot, "ft2"), ["ft^2", "ft²", "sq ft"]),
        (new("ac", "area", 43560 * Foot * Foot, "ac"), ["acre", "acres"]),
        (new("mi2", "area", Mile * Mile, "mi2"), ["mi^2", "mi²", "sq mi"]),
        (new("m3", "volume", 1, "m3"), ["m^3", "m³"]),
        (new("ft3", "volume", Foot * Foot * Foot, "ft3"), ["ft^3", "ft³"]),
        (new("ac-ft", "volume", 43560 * Foot * Foot * Foot, "ac_ft"), ["acre-ft", "acre-feet"]),
        (new("m3/s", "flow", 1, "m3_s"), ["m^3/s", "m³/s", "cms"]),
        (new("L/s", "flow", 1e-3, "l_s"), []),
        (new("cfs", "flow", Foot * Foot * Foot, "cfs"), ["ft3/s", "ft^3/s", "ft³/s"]),
        (new("m/s", "velocity", 1, "m_s"), []),
        (new("ft/s", "velocity", Foot, "ft_s"), ["fps"]),
        (new("mm/h", "intensity", 1e-3 / 3600, "mm_per_h"), ["mm/hr"]),
        (new("in/h", "intensity", Foot / 12 / 3600, "in_per_h"), ["in/hr"]),
        (new("s", "time", 1, "s"), ["sec"]),
        (new("min", "time", 60, "min"), ["minute", "minutes"]),
        (new("h", "time", 3600, "h"), ["hr", "hour", "hours"]),
        (new("d", "time", 86400, "d"), ["day", "days"]),
        (new("m/m", "slope", 1, "m_per_m"), ["ft/ft"]),
        (new("%", "slope", 0.01, "pct"), ["percent"]),
    ];

    private static readonly Dictionary<string, Unit> BySpelling = All
        .SelectMany(u => u.Spellings.Append(u.Unit.Symbol).Select(s => (Spelling: s, u.Unit)))
        .ToDictionary(p => p.Spelling, p => p.Unit, StringComparer.OrdinalIgnoreCase);

    /// <summary>The unit with a spelling, or null.</summary>
    public static Unit? Find(string spelling)
    {
        ArgumentNullException.ThrowIfNull(spelling);
        return BySpelling.GetValueOrDefault(spelling.Trim());
    }

    /// <summary>The unit with a symbol the program itself names.</summary>
    /// <exception cref="ArgumentException">There is none: a programmer's error.</exception>
    public static Unit Get(string symbol) => Find(symbol) ?? throw new ArgumentException($"No unit '{symbol}'.", nameof(symbol));

    /// <summary>Converts a value in a unit to SI.</summary>
    public static double ToSi(double value, string symbol) => value * Get(symbol).InSi;

    /// <summary>Converts an SI value to a unit.</summary>
    public static double FromSi(double value, string symbol) => value / Get(symbol).InSi;

    /// <summary>Reads a quantity with its unit, "0.6 m" or "24 in" or "1.5ft/s".</summary>
    /// <param name="text">Number and unit.</param>
    /// <param name="dimension">"length", "area", "flow", "velocity", "intensity", "time", "slope" or "volume".</param>
    /// <param name="place">File and key for the error.</param>
    /// <returns>The value in SI.</returns>
    /// <exception cref="InputException">Not a finite number, no unit, an unknown unit or one of another dimension.</exception>
    public static double Parse(string text, string dimension, string place)
    {
        ArgumentNullException.ThrowIfNull(text);
        var trimmed = text.Trim();
        var split = 0;
        while (split < trimmed.Length && (char.IsAsciiDigit(trimmed[split]) || "+-.".Contains(trimmed[split], StringComparison.Ordinal)
            || (trimmed[split] is 'e' or 'E' && split + 1 < trimmed.Length && (char.IsAsciiDigit(trimmed[split + 1]) || trimmed[split + 1] is '-' or '+')))) split++;
        var expected = $"{Article(dimension)} with its unit, one of {string.Join(", ", SymbolsOf(dimension))}, for example \"{Example(dimension)}\"";
        if (!double.TryParse(trimmed[..split], NumberStyles.Float, CultureInfo.InvariantCulture, out var number) || !double.IsFinite(number))
            throw new InputException(place, $"'{text}'", expected);
        var spelling = trimmed[split..].Trim();
        if (spelling.Length == 0) throw new InputException(place, $"the bare number '{text}'", expected);
        var unit = Find(spelling);
        if (unit is null) throw new InputException(place, $"the unit '{spelling}' in '{text}'", expected);
        return unit.Dimension == dimension
            ? number * unit.InSi
            : throw new InputException(place, $"'{text}', {Article(unit.Dimension)}", expected);
    }

    /// <summary>Symbols of a dimension, in the order of the list.</summary>
    public static IEnumerable<string> SymbolsOf(string dimension) =>
        All.Where(u => u.Unit.Dimension == dimension).Select(u => u.Unit.Symbol);

    private static string Article(string noun) => ("aeiou".Contains(noun[0], StringComparison.Ordinal) ? "an " : "a ") + noun;

    private static string Example(string dimension) => dimension switch
    {
        "length" => "0.6 m",
        "area" => "10 ha",
        "flow" => "4.8 m3/s",
        "velocity" => "1.5 ft/s",
        "intensity" => "25 mm/h",
        "time" => "10 min",
        "slope" => "2 %",
        _ => "1 " + SymbolsOf(dimension).FirstOrDefault(),
    };
}
