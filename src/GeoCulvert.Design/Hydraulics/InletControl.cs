namespace GeoCulvert.Design.Hydraulics;

/// <summary>Headwater under inlet control with what it was made of.</summary>
/// <param name="HeadwaterM">Headwater depth above the inlet invert, m.</param>
/// <param name="XNumber">X = Ku Q / (A D^0.5) in the US unit of the published coefficients.</param>
/// <param name="Range">unsubmerged, between, or submerged.</param>
/// <param name="CriticalHeadRatio">Hc/D of form 1; null for form 2.</param>
public sealed record InletControlHeadwater(double HeadwaterM, double XNumber, string Range, double? CriticalHeadRatio);

/// <summary>
/// Inlet control (FHWA HDS-5, 2nd ed., appendix A, eqs. 26-28). Per barrel.
/// <code>
/// Q   flow of one barrel              m3/s        D   rise                       m
/// A   full area of one barrel         m2          S   barrel slope               m/m
/// Hc  specific head at critical depth m           Ku  1.811 (SI into the published US unit)
/// X = Ku Q / (A D^0.5)
/// form 1      HW/D = Hc/D + K X^M + Ks S          X up to 3.5   (eq. 26)
/// form 2      HW/D = K X^M                        X up to 3.5   (eq. 27)
/// submerged   HW/D = c X^2 + Y + Ks S             X from 4.0    (eq. 28)
/// </code>
/// Between X = 3.5 and 4.0 a cubic with the value and slope of both ends, kept monotone (Fritsch and Carlson 1980).
/// </summary>
public static class InletControl
{
    /// <summary>X up to which the unsubmerged form holds.</summary>
    public const double UnsubmergedToX = 3.5;

    /// <summary>X from which the submerged form holds.</summary>
    public const double SubmergedFromX = 4.0;

    /// <summary>HW/D above which the result extends the published charts.</summary>
    public const double ChartLimitRatio = 3.0;

    /// <summary>SI into the US unit of the coefficients: 3.28084^0.5, the handbook's 1.811.</summary>
    public const double Ku = 1.811;

    /// <summary>Headwater depth above the inlet invert for the flow of one barrel.</summary>
    /// <param name="section">Barrel.</param>
    /// <param name="inlet">Inlet.</param>
    /// <param name="flowM3PerS">Flow of one barrel, m3/s.</param>
    /// <param name="slopeMPerM">Barrel slope, m/m; a rising barrel counts as level.</param>
    public static InletControlHeadwater Headwater(ISection section, InletType inlet, double flowM3PerS, double slopeMPerM)
    {
        ArgumentNullException.ThrowIfNull(section);
        ArgumentNullException.ThrowIfNull(inlet);
        var D = section.RiseM;
        var unit = section.FullAreaM2 * Math.Sqrt(D) / Ku; // flow at X = 1
        var X = flowM3PerS / unit;
        if (X <= 0) return new InletControlHeadwater(0, 0, "unsubmerged", null);
        var S = Math.Max(0, slopeMPerM);
        double ratio;
        double? criticalHead = null;
        string range;
        if (X <= UnsubmergedToX)
        {
            (ratio, criticalHead) = Unsubmerged(section, inlet, X, unit, S);
            range = "unsubmerged";
        }
        else if (X >= SubmergedFromX)
        {
            ratio = Submerged(inlet, X, S);
            // A join that falls would let headwater drop with flow; hold the end of the unsubmerged form instead. Far above the join no row needs it.
            if (X < 8) ratio = Math.Max(ratio, Unsubmerged(section, inlet, UnsubmergedToX, unit, S).Ratio);
            range = "submerged";
        }
        else
        {
            ratio = Between(section, inlet, X, unit, S);
            range = "between";
        }

        return new InletControlHeadwater(ratio * D, X, range, criticalHead);
    }

    private static (double Ratio, double? CriticalHead) Unsubmerged(ISection section, InletType inlet, double X, double unit, double S)
    {
        var power = inlet.K * Math.Pow(X, inlet.M);
        if (inlet.Form == 2) return (power, null);
        var D = section.RiseM;
        var dc = OpenChannelFlow.CriticalDepthM(section, X * unit);
        var Hc = OpenChannelFlow.SpecificEnergyM(section, X * unit, dc) / D;
        // At a trickle in a steep barrel the slope term would outweigh the head; water is never lower than critical depth.
        return (Math.Max(Hc + power + (inlet.Ks * S), dc / D), Hc);
    }

    private static double Submerged(InletType inlet, double X, double S) => (inlet.C * X * X) + inlet.Y + (inlet.Ks * S);

    private static double Between(ISection section, InletType inlet, double X, double unit, double S)
    {
        const double width = SubmergedFromX - UnsubmergedToX, h = 1e-4;
        var (low, _) = Unsubmerged(section, inlet, UnsubmergedToX, unit, S);
        var (before, _) = Unsubmerged(section, inlet, UnsubmergedToX - h, unit, S);
        var high = Math.Max(low, Submerged(inlet, SubmergedFromX, S));
        var secant = (high - low) / width;
        var lowSlope = Math.Clamp((low - before) / h, 0, 3 * secant);
        var highSlope = Math.Clamp(2 * inlet.C * SubmergedFromX, 0, 3 * secant);
        var t = (X - UnsubmergedToX) / width;
        double t2 = t * t, t3 = t2 * t;
        return (((2 * t3) - (3 * t2) + 1) * low) + ((t3 - (2 * t2) + t) * width * lowSlope)
            + (((-2 * t3) + (3 * t2)) * high) + ((t3 - t2) * width * highSlope);
    }
}
