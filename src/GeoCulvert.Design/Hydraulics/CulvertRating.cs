using GeoCulvert.Design.Basis;

namespace GeoCulvert.Design.Hydraulics;

/// <summary>Equal barrels side by side.</summary>
/// <param name="Section">One barrel.</param>
/// <param name="Count">How many.</param>
/// <param name="Inlet">Inlet of each.</param>
/// <param name="RoughnessN">Manning's n.</param>
/// <param name="EntranceLossCoefficient">ke.</param>
/// <param name="LengthM">Length, m.</param>
/// <param name="InletElevationM">Inlet invert, m.</param>
/// <param name="OutletElevationM">Outlet invert, m.</param>
public sealed record CulvertBarrels(
    ISection Section, int Count, InletType Inlet, double RoughnessN, double EntranceLossCoefficient, double LengthM, double InletElevationM, double OutletElevationM)
{
    /// <summary>Slope from inlet to outlet, m/m; negative when the barrel rises.</summary>
    public double SlopeMPerM => (InletElevationM - OutletElevationM) / LengthM;

    /// <summary>Total barrel area, m2.</summary>
    public double AreaM2 => Count * Section.FullAreaM2;
}

/// <summary>A culvert in its place.</summary>
/// <param name="Barrels">Barrels.</param>
/// <param name="Tailwater">Tailwater.</param>
/// <param name="Road">The road as a weir; null when flow over it is not considered.</param>
public sealed record CulvertSite(CulvertBarrels Barrels, ITailwater Tailwater, RoadCrest? Road);

/// <summary>One flow through a culvert, with every intermediate a reviewer would check.</summary>
public sealed record CulvertRating
{
    /// <summary>Total flow, m3/s.</summary>
    public required double FlowM3PerS { get; init; }

    /// <summary>Flow through all barrels, m3/s.</summary>
    public required double BarrelFlowM3PerS { get; init; }

    /// <summary>Flow over the road, m3/s.</summary>
    public required double RoadFlowM3PerS { get; init; }

    /// <summary>Headwater under inlet control, m above the inlet invert.</summary>
    public required double InletControlHeadwaterM { get; init; }

    /// <summary>Headwater under outlet control, m above the inlet invert.</summary>
    public required double OutletControlHeadwaterM { get; init; }

    /// <summary>The higher of the two, m above the inlet invert.</summary>
    public double HeadwaterM => Math.Max(InletControlHeadwaterM, OutletControlHeadwaterM);

    /// <summary>"inlet" or "outlet".</summary>
    public string Control => OutletControlHeadwaterM > InletControlHeadwaterM ? "outlet" : "inlet";

    /// <summary>Headwater elevation, m.</summary>
    public double HeadwaterElevationM => Site.Barrels.InletElevationM + HeadwaterM;

    /// <summary>Headwater depth over rise.</summary>
    public double HeadwaterOverRise => HeadwaterM / Site.Barrels.Section.RiseM;

    /// <summary>Tailwater elevation, m.</summary>
    public required double TailwaterElevationM { get; init; }

    /// <summary>Water-surface profile of one barrel.</summary>
    public required BarrelProfile Profile { get; init; }

    /// <summary>Inlet control in detail.</summary>
    public required InletControlHeadwater Inlet { get; init; }

    /// <summary>The handbook's shorthand for outlet control.</summary>
    public required ShorthandHeadwater Shorthand { get; init; }

    /// <summary>
    /// Whether the level lies in a jump of the barrels' own headwater, where they pass from free to full flow and carry the same at any level between.
    /// </summary>
    public bool IsBetweenFreeAndFull { get; init; }

    /// <summary>What the inlet and the profile give for the barrel flow itself, m above the inlet invert; differs from <see cref="HeadwaterM"/> only in such a jump.</summary>
    public double OwnHeadwaterM => BarrelFlowM3PerS > 0 ? Math.Max(Inlet.HeadwaterM, Profile.HeadwaterM) : HeadwaterM;

    /// <summary>Velocity at the outlet, m/s.</summary>
    public required double OutletVelocityMPerS { get; init; }

    /// <summary>Froude number at the outlet; null when the outlet is full or nothing flows.</summary>
    public double? OutletFroudeNumber { get; init; }

    /// <summary>What was rated.</summary>
    public required CulvertSite Site { get; init; }

    /// <summary>Doubts.</summary>
    public IReadOnlyList<Finding> Findings { get; init; } = [];
}

/// <summary>Rates culverts: headwater for a flow.</summary>
public static class CulvertHydraulics
{
    /// <summary>Difference between the shared level and the barrels' own headwater, over the rise, above which the headwater is taken to jump there.</summary>
    internal const double JumpShare = 1e-6;

    /// <summary>Share by which the two controls may differ and still be near a tie.</summary>
    public const double TieShare = 0.02;

    /// <summary>Headwater and all that belongs to it for one total flow.</summary>
    /// <param name="site">Culvert, tailwater and road.</param>
    /// <param name="flowM3PerS">Total flow, m3/s, not negative.</param>
    public static CulvertRating Rate(CulvertSite site, double flowM3PerS)
    {
        ArgumentNullException.ThrowIfNull(site);
        ArgumentOutOfRangeException.ThrowIfNegative(flowM3PerS);
        var tailwater = site.Tailwater.ElevationM(flowM3PerS);
        var split = SharedHeadwater.Divide([site.Barrels], site.Road, flowM3PerS, tailwater);
        var rating = Detail(site, flowM3PerS, split.FlowsM3PerS[0], tailwater, split.LevelM);
        return rating with { Findings = Doubts(rating) };
    }

    /// <summary>Headwater elevation when a flow goes through the barrels, m.</summary>
    internal static double HeadwaterElevationM(CulvertBarrels b, double barrelFlowM3PerS, double tailwaterM)
    {
        var flow = barrelFlowM3PerS / b.Count;
        if (flow <= 0) return Math.Max(b.InletElevationM, tailwaterM);
        var inlet = InletControl.Headwater(b.Section, b.Inlet, flow, b.SlopeMPerM).HeadwaterM;
        var outlet = BarrelFlow.HeadwaterM(b.Section, flow, b.RoughnessN, b.EntranceLossCoefficient, b.LengthM, b.SlopeMPerM, tailwaterM - b.OutletElevationM);
        return b.InletElevationM + Math.Max(inlet, outlet);
    }

    /// <summary>All that belongs to a flow through the barrels under a headwater.</summary>
    internal static CulvertRating Detail(CulvertSite site, double total, double barrelFlow, double tailwater, double level)
    {
        var b = site.Barrels;
        var flow = barrelFlow / b.Count;
        var (still, depth) = (level - b.InletElevationM, tailwater - b.OutletElevationM);
        if (flow <= 0)
        {
            return new CulvertRating
            {
                FlowM3PerS = total, BarrelFlowM3PerS = 0, RoadFlowM3PerS = total, InletControlHeadwaterM = still, OutletControlHeadwaterM = still,
                TailwaterElevationM = tailwater, Profile = new BarrelProfile("", still, still, Math.Clamp(depth, 0, b.Section.RiseM), 0, 0, 0, null, []),
                Inlet = new InletControlHeadwater(still, 0, "unsubmerged", null), Shorthand = new ShorthandHeadwater(still, 0, depth, false),
                OutletVelocityMPerS = 0, Site = site,
            };
        }

        var inlet = InletControl.Headwater(b.Section, b.Inlet, flow, b.SlopeMPerM);
        var profile = BarrelFlow.Profile(b.Section, flow, b.RoughnessN, b.EntranceLossCoefficient, b.LengthM, b.SlopeMPerM, depth);
        // The controlling headwater is the shared level itself: equal to the group's own within the width of the search, or, where the barrels pass from
        // free to full flow and their headwater jumps, the level between that the road or the other groups set.
        var isInlet = inlet.HeadwaterM >= profile.HeadwaterM && Math.Abs(inlet.HeadwaterM - still) <= JumpShare * b.Section.RiseM;
        return new CulvertRating
        {
            FlowM3PerS = total,
            BarrelFlowM3PerS = barrelFlow,
            RoadFlowM3PerS = total - barrelFlow,
            InletControlHeadwaterM = isInlet ? still : Math.Min(inlet.HeadwaterM, still),
            OutletControlHeadwaterM = isInlet ? Math.Min(profile.HeadwaterM, still) : still,
            IsBetweenFreeAndFull = Math.Abs(Math.Max(inlet.HeadwaterM, profile.HeadwaterM) - still) > JumpShare * b.Section.RiseM,
            TailwaterElevationM = tailwater,
            Profile = profile,
            Inlet = inlet,
            Shorthand = OutletControlShorthand.Headwater(
                b.Section, flow, profile.CriticalDepthM, b.RoughnessN, b.EntranceLossCoefficient, b.LengthM, b.SlopeMPerM, depth),
            OutletVelocityMPerS = flow / b.Section.AreaM2(profile.OutletDepthM),
            OutletFroudeNumber = OpenChannelFlow.FroudeNumber(b.Section, flow, profile.OutletDepthM),
            Site = site,
        };
    }

    /// <summary>Doubts about a rating.</summary>
    internal static List<Finding> Doubts(CulvertRating r)
    {
        var findings = new List<Finding>();
        var b = r.Site.Barrels;
        if (r.HeadwaterOverRise > InletControl.ChartLimitRatio)
            findings.Add(HydraulicsFindings.HeadwaterExtrapolated.With($"HW/D = {r.HeadwaterOverRise:0.00} at {r.FlowM3PerS:G4} m3/s", r.HeadwaterOverRise, InletControl.ChartLimitRatio));
        if (r.BarrelFlowM3PerS > 0 && Math.Abs(r.InletControlHeadwaterM - r.OutletControlHeadwaterM) < TieShare * r.HeadwaterM)
            findings.Add(HydraulicsFindings.ControlNearTie.With($"inlet control {r.InletControlHeadwaterM:0.00} m, outlet control {r.OutletControlHeadwaterM:0.00} m at {r.FlowM3PerS:G4} m3/s"));
        if (r.RoadFlowM3PerS > 0)
            findings.Add(HydraulicsFindings.RoadOvertopped.With($"{r.RoadFlowM3PerS:G3} of {r.FlowM3PerS:G4} m3/s, {r.HeadwaterElevationM - r.Site.Road!.LowestM:0.00} m deep at the lowest point", r.RoadFlowM3PerS, 0));
        if (r.Control == "outlet" && !r.Shorthand.IsInRange)
            findings.Add(HydraulicsFindings.ShorthandOutOfRange.With($"shorthand {r.Shorthand.HeadwaterM:0.00} m, 0.75 D = {OutletControlShorthand.LeastRatio * b.Section.RiseM:0.00} m"));
        if (r.IsBetweenFreeAndFull)
            findings.Add(HydraulicsFindings.BetweenFreeAndFull.With($"{r.HeadwaterM:0.00} m at {r.BarrelFlowM3PerS:G4} m3/s through the barrels, which alone would stand at {r.OwnHeadwaterM:0.00} m just on one side"));
        if (b.SlopeMPerM < 0) findings.Add(HydraulicsFindings.AdverseBarrel.With($"slope {b.SlopeMPerM:0.0000} m/m", b.SlopeMPerM, 0));
        if (b.Inlet.IsThroat) findings.Add(HydraulicsFindings.ThroatOnly.With(b.Inlet.Id));
        return findings;
    }
}
