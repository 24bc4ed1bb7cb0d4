using GeoCulvert.Design.Basis;

namespace GeoCulvert.Design.Hydraulics;

/// <summary>
/// Steady flow in a section (Chow 1959, ch. 3-6). Symbols: Q flow m3/s, y depth m, A area m2, T top width m, P wetted perimeter m, R = A/P m,
/// n Manning's roughness, S slope m/m, g = 9.80665 m/s2.
/// </summary>
public static class OpenChannelFlow
{
    /// <summary>Standard gravity, m/s2 (exact by definition, CGPM 1901).</summary>
    public const double GravityMPerS2 = 9.80665;

    /// <summary>Critical depth, m: Q2 T = g A3. Never above the rise of a closed section; 0 for no flow.</summary>
    public static double CriticalDepthM(ISection section, double flowM3PerS)
    {
        ArgumentNullException.ThrowIfNull(section);
        if (flowM3PerS <= 0) return 0;
        double Excess(double y)
        {
            var area = section.AreaM2(y);
            return (GravityMPerS2 * area * area * area) - (flowM3PerS * flowM3PerS * section.TopWidthM(y));
        }

        var high = section.RiseM;
        if (double.IsInfinity(high))
        {
            high = 1;
            while (Excess(high) < 0) high *= 2;
        }
        else if (Excess(high) <= 0)
        {
            return high;
        }

        var low = high * 1e-3;
        while (Excess(low) > 0) low /= 100;
        return RootFinding.Bracketed(Excess, low, high);
    }

    /// <summary>Normal depth, m: Q = A R^(2/3) S^(1/2) / n, the lower of the two roots near the crown of a circle.</summary>
    /// <returns>Null when there is none: no downward slope, or the flow is beyond the largest the section carries with a free surface (it flows full).</returns>
    public static double? NormalDepthM(ISection section, double flowM3PerS, double roughnessN, double slopeMPerM)
    {
        ArgumentNullException.ThrowIfNull(section);
        if (flowM3PerS <= 0) return 0;
        if (slopeMPerM <= 0) return null;
        var needed = flowM3PerS * roughnessN / Math.Sqrt(slopeMPerM);
        double Excess(double y) => ConveyanceFactor(section, y) - needed;
        var high = section.PeakConveyanceDepthM;
        if (double.IsInfinity(high))
        {
            high = 1;
            while (Excess(high) < 0) high *= 2;
        }
        else if (Excess(high) < 0)
        {
            return null;
        }

        var low = high * 1e-3;
        while (Excess(low) > 0) low /= 100;
        return RootFinding.Bracketed(Excess, low, high);
    }

    /// <summary>A R^(2/3), m^(8/3), at a depth with a free surface.</summary>
    public static double ConveyanceFactor(ISection section, double depthM)
    {
        ArgumentNullException.ThrowIfNull(section);
        var area = section.AreaM2(depthM);
        return area <= 0 ? 0 : area * Math.Cbrt(Square(area / section.WettedPerimeterM(depthM)));
    }

    /// <summary>Friction slope, m/m, at a depth with a free surface (Manning).</summary>
    public static double FrictionSlope(ISection section, double flowM3PerS, double roughnessN, double depthM) =>
        Square(flowM3PerS * roughnessN / ConveyanceFactor(section, depthM));

    /// <summary>Friction slope of a full barrel, m/m (Manning).</summary>
    public static double FullFrictionSlope(ISection section, double flowM3PerS, double roughnessN)
    {
        ArgumentNullException.ThrowIfNull(section);
        var area = section.FullAreaM2;
        return Square(flowM3PerS * roughnessN / (area * Math.Cbrt(Square(area / section.FullPerimeterM))));
    }

    /// <summary>Specific energy, m: y + Q2 / (2 g A2).</summary>
    public static double SpecificEnergyM(ISection section, double flowM3PerS, double depthM)
    {
        ArgumentNullException.ThrowIfNull(section);
        return depthM + (Square(flowM3PerS / section.AreaM2(depthM)) / (2 * GravityMPerS2));
    }

    /// <summary>Specific force, m3: A z + Q2 / (g A), z the depth of the centroid; above the crown the pressure head counts on the whole area.</summary>
    public static double SpecificForceM3(ISection section, double flowM3PerS, double depthM)
    {
        ArgumentNullException.ThrowIfNull(section);
        var y = Math.Min(depthM, section.RiseM);
        var area = section.AreaM2(y);
        return (area * (section.CentroidDepthM(y) + depthM - y)) + (flowM3PerS * flowM3PerS / (GravityMPerS2 * area));
    }

    /// <summary>Froude number V / (g A/T)^(1/2); null where there is no free surface.</summary>
    public static double? FroudeNumber(ISection section, double flowM3PerS, double depthM)
    {
        ArgumentNullException.ThrowIfNull(section);
        var width = section.TopWidthM(depthM);
        if (depthM <= 0 || depthM >= section.RiseM || width <= 0) return null;
        var area = section.AreaM2(depthM);
        return flowM3PerS / area / Math.Sqrt(GravityMPerS2 * area / width);
    }

    private static double Square(double x) => x * x;
}
