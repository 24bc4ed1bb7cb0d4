namespace GeoCulvert.Design.Hydraulics;

/// <summary>The handbook's shorthand for outlet control with what it was made of.</summary>
/// <param name="HeadwaterM">Headwater above the inlet invert, m.</param>
/// <param name="HeadLossM">Full-flow head H, m.</param>
/// <param name="OutletHeadM">ho, m above the outlet invert.</param>
/// <param name="IsInRange">Whether HW is at least 0.75 D, the range in which the shorthand may be used.</param>
public sealed record ShorthandHeadwater(double HeadwaterM, double HeadLossM, double OutletHeadM, bool IsInRange);

/// <summary>
/// FHWA HDS-5, 2nd ed., ch. III, eqs. 5 and 7, for a reviewer with the charts; the water-surface profile is what is used.
/// <code>H = (1 + ke + 19.63 n^2 L / R^1.33) V^2 / 2g     ho = max(TW, (dc + D)/2)     HW = H + ho - S L</code>
/// </summary>
public static class OutletControlShorthand
{
    /// <summary>HW/D below which the shorthand may not be used.</summary>
    public const double LeastRatio = 0.75;

    /// <summary>Computes the shorthand for the flow of one barrel.</summary>
    public static ShorthandHeadwater Headwater(
        ISection section, double flowM3PerS, double criticalDepthM, double roughnessN, double entranceLoss, double lengthM, double slopeMPerM, double tailwaterDepthM)
    {
        ArgumentNullException.ThrowIfNull(section);
        var V = flowM3PerS / section.FullAreaM2;
        var R = section.FullAreaM2 / section.FullPerimeterM;
        var H = (1 + entranceLoss + (2 * OpenChannelFlow.GravityMPerS2 * roughnessN * roughnessN * lengthM / (R * Math.Cbrt(R)))) * V * V / (2 * OpenChannelFlow.GravityMPerS2);
        var ho = Math.Max(tailwaterDepthM, (criticalDepthM + section.RiseM) / 2);
        var HW = H + ho - (slopeMPerM * lengthM);
        return new ShorthandHeadwater(HW, H, ho, HW >= LeastRatio * section.RiseM);
    }
}
