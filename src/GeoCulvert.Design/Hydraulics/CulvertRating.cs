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
    /// <summary>Share by which the two controls may differ and still be near a tie.</summary>
    public const double TieShare = 0.02;

    // A barrel that carries less than this share beside a road is taken as empty.
    private const double LeastBarrelShare = 1e-9;

    /// <summary>Headwater and all that belongs to it for one total flow.</summary>
    /// <param name="site">Culvert, tailwater and road.</param>
    /// <param name="flowM3PerS">Total flow, m3/s, not negative.</param>
    public static CulvertRating Rate(CulvertSite site, double flowM3PerS)
    {
        ArgumentNullException.ThrowIfNull(site);
        ArgumentOutOfRangeException.ThrowIfNegative(flowM3PerS);
        var tailwater = site.Tailwater.ElevationM(flowM3PerS);
        var barrelFlow = flowM3PerS;
        var still = Math.Max(site.Barrels.InletElevationM, tailwater);
        if (site.Road is { } road && flowM3PerS > 0 && HeadwaterElevationM(site, flowM3PerS, tailwater) > road.LowestM)
        {
            double Surplus(double through) =>
                through + RoadOvertopping.FlowM3PerS(road, HeadwaterElevationM(site, through, tailwater), tailwater) - flowM3PerS;
            var least = LeastBarrelShare * flowM3PerS;
            // Barrels mostly carry a fair share: come down to it by quarters, so that the search begins close.
            double high = flowM3PerS, low = flowM3PerS / 4;
            while (low > least && Surplus(low) >= 0) (high, low) = (low, low / 4);
            if (low > least || Surplus(low = least) < 0)
            {
                barrelFlow = RootFinding.Bracketed(Surplus, low, high);
            }
            else
            {
                // A road below the inlet invert, or drowned from below, takes all the water: the weir alone sets the level, never below the tailwater.
                barrelFlow = 0;
                var level = RootFinding.Bracketed(
                    z => RoadOvertopping.FlowM3PerS(road, z, tailwater) - flowM3PerS, road.LowestM, HeadwaterElevationM(site, flowM3PerS, tailwater));
                still = Math.Max(level, tailwater);
            }
        }

        var rating = Detail(site, flowM3PerS, barrelFlow, tailwater, still - site.Barrels.InletElevationM);
        return rating with { Findings = Doubts(rating) };
    }

    /// <summary>Headwater elevation when a flow goes through the barrels, m.</summary>
    internal static double HeadwaterElevationM(CulvertSite site, double barrelFlowM3PerS, double tailwaterM)
    {
        var b = site.Barrels;
        var flow = barrelFlowM3PerS / b.Count;
        if (flow <= 0) return Math.Max(b.InletElevationM, tailwaterM);
        var inlet = InletControl.Headwater(b.Section, b.Inlet, flow, b.SlopeMPerM).HeadwaterM;
        var outlet = BarrelFlow.HeadwaterM(b.Section, flow, b.RoughnessN, b.EntranceLossCoefficient, b.LengthM, b.SlopeMPerM, tailwaterM - b.OutletElevationM);
        return b.InletElevationM + Math.Max(inlet, outlet);
    }

    private static CulvertRating Detail(CulvertSite site, double total, double barrelFlow, double tailwater, double still)
    {
        var b = site.Barrels;
        var flow = barrelFlow / b.Count;
        var depth = tailwater - b.OutletElevationM;
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
        return new CulvertRating
        {
            FlowM3PerS = total,
            BarrelFlowM3PerS = barrelFlow,
            RoadFlowM3PerS = total - barrelFlow,
            InletControlHeadwaterM = inlet.HeadwaterM,
            OutletControlHeadwaterM = profile.HeadwaterM,
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

    private static List<Finding> Doubts(CulvertRating r)
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
        if (b.SlopeMPerM < 0) findings.Add(HydraulicsFindings.AdverseBarrel.With($"slope {b.SlopeMPerM:0.0000} m/m", b.SlopeMPerM, 0));
        if (b.Inlet.IsThroat) findings.Add(HydraulicsFindings.ThroatOnly.With(b.Inlet.Id));
        return findings;
    }
}
