using GeoCulvert.Design.Basis;

namespace GeoCulvert.Design.Crossings;

/// <summary>
/// Stations as they are written along a road: full kilometres, a plus sign and metres ("12+340"), or full 100-ft stations and feet ("123+40").
/// Common practice; rounded to the whole metre or foot.
/// </summary>
public static class StationText
{
    /// <summary>The text of a station.</summary>
    /// <param name="stationM">Distance along the road, m; may be negative.</param>
    /// <param name="system">Metres with three digits after the plus, or international feet with two.</param>
    public static string Of(double stationM, UnitSystem system = UnitSystem.Si)
    {
        var whole = (long)Math.Round(system == UnitSystem.Si ? stationM : stationM / Units.Foot, MidpointRounding.AwayFromZero);
        var sign = whole < 0 ? "-" : "";
        var size = Math.Abs(whole);
        return system == UnitSystem.Si ? $"{sign}{size / 1000}+{size % 1000:000}" : $"{sign}{size / 100}+{size % 100:00}";
    }
}
