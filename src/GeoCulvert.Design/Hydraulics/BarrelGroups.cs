using GeoCulvert.Design.Basis;

namespace GeoCulvert.Design.Hydraulics;

/// <summary>A crossing of several groups of barrels, each with its own shape, inlet, inverts and length, under one headwater.</summary>
/// <param name="Groups">Groups of equal barrels, one or more.</param>
/// <param name="Tailwater">Tailwater of all, by the total flow.</param>
/// <param name="Road">The road as a weir; null when flow over it is not considered.</param>
public sealed record GroupedSite(IReadOnlyList<CulvertBarrels> Groups, ITailwater Tailwater, RoadCrest? Road)
{
    /// <summary>Lowest inlet invert, m.</summary>
    public double LowestInletM => Groups.Min(g => g.InletElevationM);
}

/// <summary>One flow through several groups of barrels and over the road.</summary>
/// <param name="FlowM3PerS">Total flow, m3/s.</param>
/// <param name="RoadFlowM3PerS">Flow over the road, m3/s.</param>
/// <param name="HeadwaterElevationM">Headwater elevation, m.</param>
/// <param name="TailwaterElevationM">Tailwater elevation, m.</param>
/// <param name="Groups">Every group with its flow; the flow of its own rating is the group's, without the road.</param>
/// <param name="Site">What was rated.</param>
public sealed record GroupedRating(
    double FlowM3PerS, double RoadFlowM3PerS, double HeadwaterElevationM, double TailwaterElevationM, IReadOnlyList<CulvertRating> Groups, GroupedSite Site)
{
    /// <summary>Flow through all barrels, m3/s.</summary>
    public double BarrelFlowM3PerS => Groups.Sum(g => g.BarrelFlowM3PerS);

    /// <summary>Doubts, those of the groups included.</summary>
    public IReadOnlyList<Finding> Findings { get; init; } = [];
}

/// <summary>
/// Several groups of barrels and the road under one headwater: the level at which the flows of the groups, each by its own inlet and outlet control, and the
/// flow over the road add up to the total (FHWA HDS-5, 2nd ed., ch. III). Flow and headwater rise together; either gives the other.
/// </summary>
public static class BarrelGroups
{
    /// <summary>Headwater, division of the flow and all that belongs to it.</summary>
    /// <param name="site">Groups, tailwater and road.</param>
    /// <param name="flowM3PerS">Total flow, m3/s, not negative.</param>
    public static GroupedRating Rate(GroupedSite site, double flowM3PerS)
    {
        ArgumentNullException.ThrowIfNull(site);
        if (site.Groups.Count == 0) throw new ArgumentException("A crossing has one group of barrels or more.", nameof(site));
        ArgumentOutOfRangeException.ThrowIfNegative(flowM3PerS);
        var tailwater = site.Tailwater.ElevationM(flowM3PerS);
        var split = SharedHeadwater.Divide(site.Groups, site.Road, flowM3PerS, tailwater);
        var still = new FixedTailwater(tailwater);
        var groups = site.Groups.Select((barrels, i) =>
        {
            var through = split.FlowsM3PerS[i];
            var rating = CulvertHydraulics.Detail(new CulvertSite(barrels, still, null), through, through, tailwater, split.LevelM);
            return rating with { Findings = through > 0 ? CulvertHydraulics.Doubts(rating) : [] };
        }).ToArray();
        return new GroupedRating(flowM3PerS, split.RoadFlowM3PerS, split.LevelM, tailwater, groups, site) { Findings = Doubts(site, split, groups, flowM3PerS) };
    }

    /// <summary>Total flow under a headwater, m3/s: all groups and the road, with the tailwater that the flow itself raises.</summary>
    /// <param name="site">Groups, tailwater and road.</param>
    /// <param name="headwaterElevationM">Headwater elevation, m.</param>
    public static double FlowM3PerS(GroupedSite site, double headwaterElevationM)
    {
        ArgumentNullException.ThrowIfNull(site);
        double Passes(double tailwater) => headwaterElevationM <= tailwater ? 0
            : site.Groups.Sum(g => SharedHeadwater.FlowM3PerS(g, headwaterElevationM, tailwater))
                + (site.Road is null ? 0 : RoadOvertopping.FlowM3PerS(site.Road, headwaterElevationM, tailwater));
        var most = Passes(site.Tailwater.ElevationM(0));
        double Excess(double flow) => Passes(site.Tailwater.ElevationM(flow)) - flow;
        return most == 0 || Excess(most) >= 0 ? most : RootFinding.Bracketed(Excess, 0, most);
    }

    private static List<Finding> Doubts(GroupedSite site, FlowSplit split, CulvertRating[] groups, double flow)
    {
        var findings = groups.SelectMany((g, i) => g.Findings.Select(f => f with { Text = $"group {i + 1}: {f.Text}" })).ToList();
        if (split.RoadFlowM3PerS > 0)
            findings.Add(HydraulicsFindings.RoadOvertopped.With($"{split.RoadFlowM3PerS:G3} of {flow:G4} m3/s, {split.LevelM - site.Road!.LowestM:0.00} m deep at the lowest point", split.RoadFlowM3PerS, 0));
        if (flow > 0)
        {
            foreach (var (g, i) in groups.Select((g, i) => (g, i)).Where(p => p.g.BarrelFlowM3PerS <= 0))
                findings.Add(HydraulicsFindings.GroupDry.With($"group {i + 1}, inlet invert {g.Site.Barrels.InletElevationM:0.00} m, headwater {split.LevelM:0.00} m", split.LevelM, g.Site.Barrels.InletElevationM));
        }

        return findings;
    }
}
