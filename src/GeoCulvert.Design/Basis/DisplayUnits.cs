namespace GeoCulvert.Design.Basis;

/// <summary>What a figure measures, so that it can be written in the chosen system of units.</summary>
public enum QuantityKind
{
    /// <summary>A count, a coefficient, a text: written as it is, no unit.</summary>
    None,

    /// <summary>Elevation, depth, length: m or ft.</summary>
    Length,

    /// <summary>Rainfall depth, stone size: mm or in. SI value in m.</summary>
    SmallLength,

    /// <summary>Drainage area: km2 or mi2. SI value in m2.</summary>
    Area,

    /// <summary>Barrel area: m2 or ft2.</summary>
    SmallArea,

    /// <summary>Volume: m3 or ac-ft.</summary>
    Volume,

    /// <summary>Flow: m3/s or cfs.</summary>
    Flow,

    /// <summary>Velocity: m/s or ft/s.</summary>
    Velocity,

    /// <summary>Rainfall intensity: mm/h or in/h. SI value in m/s.</summary>
    Intensity,

    /// <summary>Time: min in both systems. SI value in s.</summary>
    Time,

    /// <summary>Slope, m/m = ft/ft.</summary>
    Slope,

    /// <summary>Share of a whole, 0 to 1.</summary>
    Share,

    /// <summary>Angle in degrees.</summary>
    Angle,

    /// <summary>Return period in years.</summary>
    Years,
}

/// <summary>Units in which results are written: one unit per kind of figure and system.</summary>
public static class DisplayUnits
{
    /// <summary>The unit symbol of a kind in a system; "" where there is none.</summary>
    public static string Symbol(QuantityKind kind, UnitSystem system) => (kind, system) switch
    {
        (QuantityKind.Length, UnitSystem.Si) => "m",
        (QuantityKind.Length, _) => "ft",
        (QuantityKind.SmallLength, UnitSystem.Si) => "mm",
        (QuantityKind.SmallLength, _) => "in",
        (QuantityKind.Area, UnitSystem.Si) => "km2",
        (QuantityKind.Area, _) => "mi2",
        (QuantityKind.SmallArea, UnitSystem.Si) => "m2",
        (QuantityKind.SmallArea, _) => "ft2",
        (QuantityKind.Volume, UnitSystem.Si) => "m3",
        (QuantityKind.Volume, _) => "ac-ft",
        (QuantityKind.Flow, UnitSystem.Si) => "m3/s",
        (QuantityKind.Flow, _) => "cfs",
        (QuantityKind.Velocity, UnitSystem.Si) => "m/s",
        (QuantityKind.Velocity, _) => "ft/s",
        (QuantityKind.Intensity, UnitSystem.Si) => "mm/h",
        (QuantityKind.Intensity, _) => "in/h",
        (QuantityKind.Time, _) => "min",
        (QuantityKind.Slope, UnitSystem.Si) => "m/m",
        (QuantityKind.Slope, _) => "ft/ft",
        (QuantityKind.Angle, _) => "deg",
        (QuantityKind.Years, _) => "yr",
        _ => "",
    };

    /// <summary>An SI value in the unit of its kind and system.</summary>
    public static double FromSi(double value, QuantityKind kind, UnitSystem system)
    {
        if (kind is QuantityKind.None or QuantityKind.Share or QuantityKind.Angle or QuantityKind.Years or QuantityKind.Slope) return value;
        return Units.FromSi(value, Symbol(kind, system));
    }

    /// <summary>The suffix of a field name, with its underscore: "_m3_s", "_cfs", "_min"; "" for slopes, shares and counts.</summary>
    public static string FieldSuffix(QuantityKind kind, UnitSystem system) => kind switch
    {
        QuantityKind.None or QuantityKind.Share or QuantityKind.Slope => "",
        QuantityKind.Angle => "_deg",
        QuantityKind.Years => "_yr",
        _ => "_" + Units.Get(Symbol(kind, system)).Suffix,
    };
}
