using GeoCulvert.Design.Basis;
using GeoCulvert.Design.Hydraulics;

namespace GeoCulvert.Design.Sizing;

/// <summary>A criterion held against a rated culvert.</summary>
/// <param name="Name">What is limited.</param>
/// <param name="Flood">"design", "check" or "" when no flood enters.</param>
/// <param name="Value">Value found, SI.</param>
/// <param name="Limit">Limit, SI.</param>
/// <param name="Kind">What both measure.</param>
/// <param name="IsMet">Whether it is met.</param>
/// <param name="Origin">Where the limit comes from.</param>
public sealed record CriterionResult(string Name, string Flood, double Value, double Limit, QuantityKind Kind, bool IsMet, string Origin)
{
    /// <summary>By how much a broken criterion is missed, as a share of the limit or of 1 m where the limit is near zero.</summary>
    public double MissShare => IsMet ? 0 : Math.Abs(Value - Limit) / Math.Max(Math.Abs(Limit), 1);
}

/// <summary>What is asked of the search.</summary>
/// <param name="Catalogue">Barrels allowed.</param>
/// <param name="Criteria">Criteria.</param>
/// <param name="DesignFlowM3PerS">Design flow.</param>
/// <param name="CheckFlowM3PerS">Check flow.</param>
/// <param name="LengthM">Barrel length.</param>
/// <param name="InletElevationM">Inlet invert.</param>
/// <param name="OutletElevationM">Outlet invert.</param>
/// <param name="Tailwater">Tailwater.</param>
/// <param name="Road">Road as a weir; null when there is none.</param>
public sealed record SizingRequest(
    CulvertCatalogue Catalogue, SizingCriteria Criteria, double DesignFlowM3PerS, double CheckFlowM3PerS, double LengthM, double InletElevationM,
    double OutletElevationM, ITailwater Tailwater, RoadCrest? Road);

/// <summary>An option that was rated.</summary>
/// <param name="Barrels">The barrels.</param>
/// <param name="Choice">Row of the catalogue.</param>
/// <param name="Design">Rating at the design flood.</param>
/// <param name="CheckFlood">Rating at the check flood, computed when it is first asked for: most options lose before it matters.</param>
/// <param name="Criteria">Criteria one by one.</param>
public sealed record SizingOption(
    CulvertBarrels Barrels, BarrelChoice Choice, CulvertRating Design, Lazy<CulvertRating> CheckFlood, IReadOnlyList<CriterionResult> Criteria)
{
    /// <summary>Rating at the check flood.</summary>
    public CulvertRating Check => CheckFlood.Value;

    /// <summary>Whether every criterion is met.</summary>
    public bool MeetsAll => Criteria.All(c => c.IsMet);

    /// <summary>"2 x 48 in circle, hds5-1-1".</summary>
    public string Description => $"{(Barrels.Count > 1 ? $"{Barrels.Count} x " : "")}{Choice.SizeText} {Choice.Shape}, {Choice.Inlet.Id}";
}

/// <summary>The outcome of a search.</summary>
/// <param name="Chosen">The option with the least barrel area, then the fewest barrels, that meets every criterion; null when none does.</param>
/// <param name="Options">Every option in the order of the search.</param>
/// <param name="Closest">When nothing fits: the option that fails by least.</param>
public sealed record SizingOutcome(SizingOption? Chosen, IReadOnlyList<SizingOption> Options, SizingOption? Closest)
{
    /// <summary>Why an option was not chosen, or "chosen".</summary>
    public string Reason(SizingOption option)
    {
        ArgumentNullException.ThrowIfNull(option);
        if (ReferenceEquals(option, Chosen)) return "chosen";
        var broken = option.Criteria.Where(c => !c.IsMet).Select(c => $"{c.Name} {c.Value:0.00} beyond {c.Limit:0.00}").ToArray();
        if (broken.Length > 0) return string.Join("; ", broken);
        return option.Barrels.AreaM2 > Chosen!.Barrels.AreaM2 * (1 + 1e-9) ? $"larger: {option.Barrels.AreaM2:0.00} m2 of barrel against {Chosen.Barrels.AreaM2:0.00} m2"
            : option.Barrels.Count > Chosen.Barrels.Count ? "as large, with more barrels" : "as good; later in the catalogue";
    }
}

/// <summary>Chooses a culvert: every option of the catalogue is rated at both floods and held against every criterion.</summary>
public static class CulvertSizing
{
    /// <summary>Searches the whole catalogue.</summary>
    public static SizingOutcome Choose(SizingRequest request)
    {
        ArgumentNullException.ThrowIfNull(request);
        var options = new List<SizingOption>();
        foreach (var choice in request.Catalogue.Barrels)
        {
            for (var count = 1; count <= request.Catalogue.LargestNumberOfBarrels; count++) options.Add(Rate(request, choice, count));
        }

        var ordered = options
            .Select((o, i) => (Option: o, Index: i))
            .OrderBy(o => Math.Round(o.Option.Barrels.AreaM2, 9)).ThenBy(o => o.Option.Barrels.Count).ThenBy(o => o.Index)
            .Select(o => o.Option).ToArray();
        var chosen = ordered.FirstOrDefault(o => o.MeetsAll);
        var closest = chosen is null ? ordered.MinBy(o => o.Criteria.Sum(c => c.MissShare)) : null;
        return new SizingOutcome(chosen, ordered, closest);
    }

    /// <summary>Rates one option at both floods against every criterion.</summary>
    public static SizingOption Rate(SizingRequest request, BarrelChoice choice, int count)
    {
        ArgumentNullException.ThrowIfNull(request);
        ArgumentNullException.ThrowIfNull(choice);
        var barrels = new CulvertBarrels(
            choice.Section, count, choice.Inlet, choice.RoughnessN, choice.EntranceLossCoefficient, request.LengthM, request.InletElevationM, request.OutletElevationM);
        var site = new CulvertSite(barrels, request.Tailwater, request.Road);
        var design = CulvertHydraulics.Rate(site, request.DesignFlowM3PerS);
        var check = new Lazy<CulvertRating>(() => CulvertHydraulics.Rate(site, request.CheckFlowM3PerS));
        return new SizingOption(barrels, choice, design, check, Judge(request, design, check));
    }

    private static List<CriterionResult> Judge(SizingRequest request, CulvertRating design, Lazy<CulvertRating> check)
    {
        var c = request.Criteria;
        var barrels = design.Site.Barrels;
        const string practice = "common practice", set = "set for this job";
        var results = new List<CriterionResult>
        {
            AtMost("HW/D", "design", design.HeadwaterOverRise, c.LargestHeadwaterRatio, QuantityKind.None, practice),
            AtLeast("rise", "", barrels.Section.RiseM, c.SmallestRiseM, QuantityKind.Length, practice),
        };
        if (c.LargestHeadwaterDepthM is { } depth) results.Add(AtMost("headwater depth", "design", design.HeadwaterM, depth, QuantityKind.Length, set));
        if (c.HighestHeadwaterElevationM is { } level) results.Add(AtMost("headwater elevation", "design", design.HeadwaterElevationM, level, QuantityKind.Length, set));
        if (c.LargestOutletVelocityMPerS is { } v) results.Add(AtMost("outlet velocity", "design", design.OutletVelocityMPerS, v, QuantityKind.Velocity, set));
        if (request.Road is { } road)
        {
            results.Add(AtLeast("freeboard", "design", road.LowestM - design.HeadwaterElevationM, c.FreeboardM, QuantityKind.Length, practice));
            results.Add(AtLeast("cover", "", road.LowestM - (barrels.InletElevationM + barrels.Section.RiseM), c.SmallestCoverM, QuantityKind.Length, practice));
            results.Add(AtMost("flow over the road", "design", design.RoadFlowM3PerS, 0, QuantityKind.Flow, practice));
            if (c.LargestOvertoppingDepthM is { } over)
                results.Add(AtMost("overtopping depth", "check", Math.Max(0, check.Value.HeadwaterElevationM - road.LowestM), over, QuantityKind.Length, set));
        }

        return results;
    }

    private static CriterionResult AtMost(string name, string flood, double value, double limit, QuantityKind kind, string origin) =>
        new(name, flood, value, limit, kind, value <= limit + 1e-9, origin);

    private static CriterionResult AtLeast(string name, string flood, double value, double limit, QuantityKind kind, string origin) =>
        new(name, flood, value, limit, kind, value >= limit - 1e-9, origin);
}
