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
    double OutletElevationM, ITailwater Tailwater, RoadCrest? Road)
{
    /// <summary>Unit prices; with them the least cost is sought, without them the least barrel area.</summary>
    public UnitPrices? Prices { get; init; }
}

/// <summary>An option that was looked at.</summary>
/// <param name="Barrels">The barrels.</param>
/// <param name="Choice">Row of the catalogue.</param>
/// <param name="DesignFlood">Rating at the design flood, computed when it is first asked for: many options lose by their size or under inlet control alone.</param>
/// <param name="CheckFlood">Rating at the check flood, computed when it is first asked for: most options lose before it matters.</param>
/// <param name="Criteria">Criteria one by one; of an option that was not rated only those broken already.</param>
/// <param name="IsRated">Whether it was rated at the design flood; not so where it fails by its size or under inlet control alone, which headwater never falls below.</param>
/// <param name="Cost">Installed cost in the currency of the prices; null without prices or without one for this size.</param>
public sealed record SizingOption(
    CulvertBarrels Barrels, BarrelChoice Choice, Lazy<CulvertRating> DesignFlood, Lazy<CulvertRating> CheckFlood, IReadOnlyList<CriterionResult> Criteria, bool IsRated, double? Cost)
{
    /// <summary>Rating at the design flood.</summary>
    public CulvertRating Design => DesignFlood.Value;

    /// <summary>Rating at the check flood.</summary>
    public CulvertRating Check => CheckFlood.Value;

    /// <summary>Whether every criterion is met.</summary>
    public bool MeetsAll => Criteria.All(c => c.IsMet);

    /// <summary>"2 x 48 in circle, hds5-1-1".</summary>
    public string Description => $"{(Barrels.Count > 1 ? $"{Barrels.Count} x " : "")}{Choice.SizeText} {Choice.Shape}, {Choice.Inlet.Id}";
}

/// <summary>The outcome of a search.</summary>
/// <param name="Chosen">The option with the least cost (with prices), else the least barrel area, then the fewest barrels, that meets every criterion; null when none does.</param>
/// <param name="Options">Options in the order of the search: all that come before the chosen one, and some after it; all when none fits.</param>
/// <param name="Closest">When nothing fits: the option that fails by least.</param>
public sealed record SizingOutcome(SizingOption? Chosen, IReadOnlyList<SizingOption> Options, SizingOption? Closest)
{
    /// <summary>Whether the option is a culvert that is there, which was rated, not chosen.</summary>
    public bool IsExisting { get; init; }

    /// <summary>Why an option was not chosen, or "chosen"; of an existing culvert what it breaks, or that it meets all.</summary>
    public string Reason(SizingOption option)
    {
        ArgumentNullException.ThrowIfNull(option);
        if (IsExisting && option.MeetsAll) return "existing; meets every criterion";
        if (!IsExisting && ReferenceEquals(option, Chosen)) return "chosen";
        var broken = option.Criteria.Where(c => !c.IsMet).Select(c => $"{c.Name} {c.Value:0.00} beyond {c.Limit:0.00}{(option.IsRated ? "" : c.Origin)}").ToArray();
        if (broken.Length > 0) return string.Join("; ", broken);
        if (Chosen is null) return "";
        if (Chosen.Cost is { } least && option.Cost > least) return FormattableString.Invariant($"dearer: {option.Cost:0} against {least:0}");
        if (Chosen.Cost is not null && option.Cost is null) return "no price for this size";
        return option.Barrels.AreaM2 > Chosen.Barrels.AreaM2 * (1 + 1e-9) ? $"larger: {option.Barrels.AreaM2:0.00} m2 of barrel against {Chosen.Barrels.AreaM2:0.00} m2"
            : option.Barrels.Count > Chosen.Barrels.Count ? "as large, with more barrels" : "as good; later in the catalogue";
    }
}

/// <summary>
/// Chooses a culvert from the whole catalogue: options are taken in the order of cost (or barrel area), the first that meets every criterion wins. An option whose size, or whose
/// headwater under inlet control alone, breaks a criterion is not rated further: headwater is never below that of inlet control while no water goes over the road, and an option that
/// sends water over the road at the design flood fails anyway.
/// </summary>
public static class CulvertSizing
{
    /// <summary>Options after the chosen one that are looked at too.</summary>
    public const int RunnersUp = 12;

    private const double Tolerance = 1e-9;

    // Rounding of the full rating may not turn an option that passes into one that was screened out.
    private const double Margin = 1e-6;
    private const string NotRated = " under inlet control alone";

    /// <summary>Searches the whole catalogue.</summary>
    public static SizingOutcome Choose(SizingRequest request)
    {
        ArgumentNullException.ThrowIfNull(request);
        var seen = new List<SizingOption>();
        SizingOption? chosen = null;
        var after = 0;
        foreach (var (choice, count) in Ordered(request))
        {
            if (chosen is not null && after++ == RunnersUp) break;
            var option = Screen(request, choice, count) ?? Rate(request, choice, count);
            seen.Add(option);
            if (chosen is null && option.MeetsAll && (request.Prices is null || option.Cost is not null)) chosen = option;
        }

        if (chosen is not null) return new SizingOutcome(chosen, seen, null);
        // Nothing fits: now every option has to be rated to know which fails by least.
        var all = seen.Select(o => o.IsRated ? o : Rate(request, o.Choice, o.Barrels.Count)).ToArray();
        return new SizingOutcome(null, all, all.MinBy(o => o.Criteria.Sum(c => c.MissShare)));
    }

    /// <summary>Rates one option at both floods against every criterion.</summary>
    public static SizingOption Rate(SizingRequest request, BarrelChoice choice, int count)
    {
        ArgumentNullException.ThrowIfNull(request);
        ArgumentNullException.ThrowIfNull(choice);
        var barrels = Barrels(request, choice, count);
        var site = new CulvertSite(barrels, request.Tailwater, request.Road);
        var design = CulvertHydraulics.Rate(site, request.DesignFlowM3PerS);
        var check = new Lazy<CulvertRating>(() => CulvertHydraulics.Rate(site, request.CheckFlowM3PerS));
        return new SizingOption(barrels, choice, new Lazy<CulvertRating>(design), check, Judge(request, design, check), true, Cost(request, choice, count));
    }

    /// <summary>Options by cost, those without a price last; without prices by barrel area; then by number of barrels, then as the catalogue has them.</summary>
    private static IEnumerable<(BarrelChoice Choice, int Count)> Ordered(SizingRequest request)
    {
        var ordered = request.Catalogue.ByArea;
        return request.Prices is null ? ordered : ordered
            .Select((o, i) => (o.Choice, o.Count, Cost: Cost(request, o.Choice, o.Count) ?? double.PositiveInfinity, Index: i))
            .OrderBy(o => o.Cost).ThenBy(o => o.Index).Select(o => (o.Choice, o.Count));
    }

    private static double? Cost(SizingRequest request, BarrelChoice choice, int count) => request.Prices?.Of(choice, count, request.LengthM);

    private static CulvertBarrels Barrels(SizingRequest request, BarrelChoice choice, int count) => new(
        choice.Section, count, choice.Inlet, choice.RoughnessN, choice.EntranceLossCoefficient, request.LengthM, request.InletElevationM, request.OutletElevationM);

    /// <summary>An option that fails by its size or under inlet control alone, not rated; null when it has to be rated.</summary>
    private static SizingOption? Screen(SizingRequest request, BarrelChoice choice, int count)
    {
        var c = request.Criteria;
        var barrels = Barrels(request, choice, count);
        double inlet = InletControl.Headwater(choice.Section, choice.Inlet, request.DesignFlowM3PerS / count, barrels.SlopeMPerM).HeadwaterM, level = request.InletElevationM + inlet;
        var rise = choice.Section.RiseM;
        var broken = new List<CriterionResult>();
        Above("HW/D", inlet / rise, c.LargestHeadwaterRatio, QuantityKind.None);
        if (rise < c.SmallestRiseM - Tolerance) broken.Add(new("rise", "", rise, c.SmallestRiseM, QuantityKind.Length, false, ""));
        if (c.LargestHeadwaterDepthM is { } depth) Above("headwater depth", inlet, depth, QuantityKind.Length);
        if (c.HighestHeadwaterElevationM is { } highest) Above("headwater elevation", level, highest, QuantityKind.Length);
        if (request.Road is { } road)
        {
            if (road.LowestM - level < c.FreeboardM - Margin) broken.Add(new("freeboard", "design", road.LowestM - level, c.FreeboardM, QuantityKind.Length, false, NotRated));
            else if (level > road.LowestM + Margin) Above("headwater above the road", level, road.LowestM, QuantityKind.Length);
            var cover = road.LowestM - (request.InletElevationM + rise);
            if (cover < c.SmallestCoverM - Tolerance) broken.Add(new("cover", "", cover, c.SmallestCoverM, QuantityKind.Length, false, ""));
        }

        if (broken.Count == 0) return null;
        var site = new CulvertSite(barrels, request.Tailwater, request.Road);
        return new SizingOption(
            barrels, choice, new Lazy<CulvertRating>(() => CulvertHydraulics.Rate(site, request.DesignFlowM3PerS)), new Lazy<CulvertRating>(() => CulvertHydraulics.Rate(site, request.CheckFlowM3PerS)),
            broken, false, Cost(request, choice, count));

        void Above(string name, double value, double limit, QuantityKind kind)
        {
            if (value > limit + Margin) broken.Add(new(name, "design", value, limit, kind, false, NotRated));
        }
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
        new(name, flood, value, limit, kind, value <= limit + Tolerance, origin);

    private static CriterionResult AtLeast(string name, string flood, double value, double limit, QuantityKind kind, string origin) =>
        new(name, flood, value, limit, kind, value >= limit - Tolerance, origin);
}
