namespace GeoCulvert.Design.Hydraulics;

/// <summary>A point of the water surface along a barrel.</summary>
/// <param name="DistanceM">Distance from the inlet along the barrel, m.</param>
/// <param name="DepthM">Depth above the invert, or pressure head where the barrel is full, m.</param>
public readonly record struct ProfilePoint(double DistanceM, double DepthM);

/// <summary>The water-surface profile of one barrel and what follows from it.</summary>
/// <param name="Name">Chow's classes from inlet to outlet, "full" where the barrel is full: "S2", "M2", "full + M2".</param>
/// <param name="InletDepthM">Depth or pressure head at the inlet that outlet control is reckoned from, m.</param>
/// <param name="HeadwaterM">Outlet-control headwater above the inlet invert, m.</param>
/// <param name="OutletDepthM">Depth at the outlet, not above the rise, m.</param>
/// <param name="CriticalDepthM">Critical depth, m.</param>
/// <param name="NormalDepthM">Normal depth, m; null when there is none.</param>
/// <param name="FullLengthM">Length that flows full, m.</param>
/// <param name="JumpAtM">Distance of a hydraulic jump from the inlet, m; null when there is none in the barrel.</param>
/// <param name="Points">The surface from inlet to outlet.</param>
public sealed record BarrelProfile(
    string Name, double InletDepthM, double HeadwaterM, double OutletDepthM, double CriticalDepthM, double? NormalDepthM, double FullLengthM,
    double? JumpAtM, IReadOnlyList<ProfilePoint> Points);

/// <summary>
/// Gradually varied flow through a barrel (Chow 1959, ch. 9-11): from the outlet upstream with max(critical depth, tailwater); where the surface meets the
/// crown on with full-flow friction; in a steep barrel also from critical depth at the inlet downstream, with the jump where the specific forces of both are equal.
/// <code>
/// dx/dy = (1 - Q2 T/(g A3)) / (S - Sf)        Sf = (Q n / (A R^(2/3)))2
/// HW = y1 + (1 + ke) V1^2 / 2g                 full all the way: HW = TW - S L + (1 + ke + kf L) V^2 / 2g
/// </code>
/// </summary>
public static class BarrelFlow
{
    /// <summary>Computes the profile of one barrel.</summary>
    /// <param name="section">Barrel.</param>
    /// <param name="flowM3PerS">Flow of one barrel, m3/s, above 0.</param>
    /// <param name="roughnessN">Manning's n.</param>
    /// <param name="entranceLoss">Entrance loss coefficient ke.</param>
    /// <param name="lengthM">Length, m.</param>
    /// <param name="slopeMPerM">Slope, m/m; 0 or negative are allowed.</param>
    /// <param name="tailwaterDepthM">Tailwater above the outlet invert, m; may be negative.</param>
    public static BarrelProfile Profile(
        ISection section, double flowM3PerS, double roughnessN, double entranceLoss, double lengthM, double slopeMPerM, double tailwaterDepthM)
    {
        ArgumentNullException.ThrowIfNull(section);
        var reach = new Reach(section, flowM3PerS, roughnessN, lengthM, slopeMPerM);
        double D = section.RiseM, dc = reach.CriticalDepthM;
        var surface = new Surface();
        var start = Math.Max(dc, tailwaterDepthM);
        reach.FromOutlet(surface, start);
        var inletDepth = surface.AtInlet;
        double? jump = null;

        if (reach.IsSteep && surface.ReachesCriticalAtM is { } end)
        {
            // The inlet is not drowned: supercritical from critical depth at the inlet, until its specific force no longer beats that of the water below.
            var fast = new Surface();
            reach.FromInlet(fast);
            jump = reach.Jump(fast, surface, end);
            surface = Surface.Join(fast, surface, jump ?? lengthM);
            inletDepth = dc;
        }

        var headwater = Entered(section, flowM3PerS, entranceLoss, reach, ref inletDepth);
        return new BarrelProfile(
            surface.Name, inletDepth, headwater, Math.Min(surface.AtOutlet, D), dc, reach.NormalDepthM, surface.FullLengthM, jump, surface.FromInlet());
    }

    /// <summary>Only the headwater of <see cref="Profile"/>, m, for a search.</summary>
    internal static double HeadwaterM(
        ISection section, double flowM3PerS, double roughnessN, double entranceLoss, double lengthM, double slopeMPerM, double tailwaterDepthM)
    {
        var reach = new Reach(section, flowM3PerS, roughnessN, lengthM, slopeMPerM);
        var surface = new Surface(keepsPoints: false);
        reach.FromOutlet(surface, Math.Max(reach.CriticalDepthM, tailwaterDepthM));
        var inletDepth = reach.IsSteep && surface.ReachesCriticalAtM is not null ? reach.CriticalDepthM : surface.AtInlet;
        return Entered(section, flowM3PerS, entranceLoss, reach, ref inletDepth);
    }

    /// <summary>Headwater above a depth at the inlet, and the depth it is reckoned from.</summary>
    private static double Entered(ISection section, double flowM3PerS, double entranceLoss, Reach reach, ref double inletDepth)
    {
        var headwater = Headwater(section, flowM3PerS, entranceLoss, inletDepth);
        // Where a rising flow just drowns an inlet with nearly critical depth, depth grows so fast that the entrance loss would shrink and headwater with it.
        // A drowned inlet is never let below the free one, so that headwater rises with flow (own rule; on the high side).
        var freeDepth = Math.Max(reach.CriticalDepthM, reach.NormalDepthM ?? section.RiseM);
        if (inletDepth <= freeDepth || Headwater(section, flowM3PerS, entranceLoss, freeDepth) is var free && free <= headwater) return headwater;
        inletDepth = freeDepth;
        return free;
    }

    private static double Headwater(ISection section, double flowM3PerS, double entranceLoss, double inletDepthM)
    {
        var area = section.AreaM2(Math.Min(inletDepthM, section.RiseM));
        return inletDepthM + ((1 + entranceLoss) * flowM3PerS * flowM3PerS / (area * area) / (2 * OpenChannelFlow.GravityMPerS2));
    }
}
