using GeoCulvert.Design.Basis;
using GeoCulvert.Design.Crossings;
using GeoCulvert.Design.Hydraulics;
using GeoCulvert.Design.Sizing;
using GeoCulvert.Design.Terrain;
using GeoCulvert.Design.Watersheds;

namespace GeoCulvert.Design.Study;

/// <summary>What came of sizing one crossing.</summary>
/// <param name="Status">One of <see cref="CrossingStatus"/>.</param>
/// <param name="Line">Where the barrel lies.</param>
/// <param name="Request">What was asked of the search; null when it could not be asked.</param>
/// <param name="Outcome">Its answer.</param>
/// <param name="Findings">Doubts.</param>
/// <param name="IsRoadLevelAssumed">Whether the road level is the least that serves, because the terrain shows no embankment.</param>
public sealed record CulvertStageResult(
    string Status, CulvertLine Line, SizingRequest? Request, SizingOutcome? Outcome, IReadOnlyList<Finding> Findings, bool IsRoadLevelAssumed = false)
{
    /// <summary>How the existing culvert stands; null without one.</summary>
    public ExistingAssessment? Existing { get; init; }
}

/// <summary>Where a flow meets a barrel: line, road, tailwater, criteria, search.</summary>
public static class CulvertStage
{
    /// <summary>Outlet velocity above which a finding is raised, m/s (common practice: unprotected natural channels bear less).</summary>
    public const double HighVelocityMPerS = 4;

    /// <summary>Sizes the culvert of one crossing.</summary>
    public static CulvertStageResult Size(
        Crossing crossing, Watershed watershed, FlowResult flow, RoadClass? roadClass, DrainedTerrain terrain, Grid<float> filledDepth, StudyInputs inputs, StudySettings settings,
        DownstreamPool? pool = null)
    {
        ArgumentNullException.ThrowIfNull(crossing);
        ArgumentNullException.ThrowIfNull(watershed);
        ArgumentNullException.ThrowIfNull(flow);
        ArgumentNullException.ThrowIfNull(inputs);
        ArgumentNullException.ThrowIfNull(settings);
        var existing = inputs.Inventory.GetValueOrDefault(crossing.Id);
        double? Given(string column) => inputs.Overrides.Of(crossing.Id, column) ?? column switch
        {
            "inlet_elevation" => existing?.InletElevationM,
            "outlet_elevation" => existing?.OutletElevationM,
            "length" => existing?.LengthM,
            _ => null,
        };
        CulvertLine Measure(double? roadElevationM) => CulvertLineSurvey.Measure(
            crossing, terrain.Direction, terrain.Accumulation, terrain.Elevation, filledDepth, new CrossingOverrides(crossing.Id)
            {
                InletElevationM = Given("inlet_elevation"),
                OutletElevationM = Given("outlet_elevation"),
                LengthM = Given("length"),
                RoadElevationM = roadElevationM,
                SkewDeg = Given("skew_deg"),
                RoadWidthM = Given("road_width"),
                SideSlope = Given("side_slope"),
            });
        var line = Measure(Given("road_elevation"));
        var findings = line.Findings.ToList();
        var edge = watershed.Total.EdgeContactShare;
        if (edge > settings.AcceptedEdgeContactShare)
        {
            findings.Add(StudyFindings.SizeWithheld.With($"{100 * edge:0.0} % of the boundary on the edge", edge, settings.AcceptedEdgeContactShare));
            return new CulvertStageResult(CrossingStatus.NotComputed, line, null, null, findings);
        }

        var missing = Missing(line, flow);
        if (missing.Count > 0)
        {
            findings.Add(StudyFindings.CulvertNotComputed.With("missing: " + string.Join(", ", missing)));
            return new CulvertStageResult(CrossingStatus.NotComputed, line, null, null, findings);
        }

        var criteria = settings.Criteria with
        {
            LargestHeadwaterRatio = Given("hw_over_d") ?? settings.Criteria.LargestHeadwaterRatio,
            HighestHeadwaterElevationM = Given("highest_headwater_elevation") ?? settings.Criteria.HighestHeadwaterElevationM,
            SmallestRiseM = Given("smallest_rise") ?? settings.SmallestRiseM ?? roadClass?.SmallestRiseM ?? 0,
        };
        var (designFlow, checkFlow) = (flow.Design.FlowM3PerS!.Value, flow.Check.FlowM3PerS!.Value);
        ITailwater Tailwater(CulvertLine at, List<Finding> doubts) => TailwaterStage.WithPool(
            TailwaterStage.For(crossing, at, terrain, watershed.Total.AreaM2, Math.Max(designFlow, checkFlow), settings.Tailwater, Given("tailwater_elevation"), doubts),
            pool, at.OutletElevation!.Value, designFlow, checkFlow, doubts);
        SizingRequest Ask(CulvertLine at, RoadCrest? road, List<Finding> doubts) => new(
            settings.Catalogue, criteria, designFlow, checkFlow, at.Length!.Value, at.InletElevation!.Value, at.OutletElevation!.Value, Tailwater(at, doubts), road) { Prices = settings.Prices };

        if (existing is not null) return Existing(existing, Ask(line, Crest(crossing, line), findings), line, flow, findings);
        var assumed = false;
        if (ShowsNoEmbankment(crossing, line, terrain, criteria) && CulvertSizing.Choose(Ask(line, null, [])).Chosen is { } first)
        {
            // The terrain cannot say where the road will be: lay the barrel under the least road that serves it.
            var level = LeastRoadLevelM(first, criteria);
            var under = Measure(level);
            if (Missing(under, flow).Count == 0)
            {
                (line, assumed) = (under, true);
                findings = [.. under.Findings.Where(f => f.Kind != CrossingFindings.RoadLevelFromDem)];
                findings.Add(StudyFindings.RoadLevelAssumed.With($"least level that serves: {level:0.00} m; the ground at the crossing lies at {first.Barrels.InletElevationM:0.00} m", level));
            }
        }

        var request = Ask(line, Crest(crossing, line), findings);
        var outcome = CulvertSizing.Choose(request);
        if (outcome.Chosen is not { } chosen)
        {
            var closest = outcome.Closest;
            findings.Add(StudyFindings.NoSizeFits.With(closest is null
                ? "the catalogue is empty"
                : $"closest: {closest.Description}: " + string.Join("; ", closest.Criteria.Where(c => !c.IsMet).Select(c => $"{c.Name} {c.Value:0.00}, limit {c.Limit:0.00}"))));
            return new CulvertStageResult(CrossingStatus.NoSizeFits, line, request, outcome, findings, assumed);
        }

        findings.AddRange(chosen.Design.Findings.Concat(chosen.Check.Findings).DistinctBy(f => f.Code));
        if (chosen.Design.OutletVelocityMPerS > HighVelocityMPerS)
            findings.Add(StudyFindings.OutletVelocityHigh.With($"{chosen.Design.OutletVelocityMPerS:0.0} m/s", chosen.Design.OutletVelocityMPerS, HighVelocityMPerS));
        if (chosen.Design.OutletVelocityMPerS > HighVelocityMPerS && RiprapApron.For(chosen.Design) is { } apron) findings.AddRange(apron.Findings);
        findings.AddRange(Bounds(chosen.Design, settings.Tailwater));
        return new CulvertStageResult(CrossingStatus.Sized, line, request, outcome, findings, assumed);
    }

    /// <summary>Rates a culvert that is there.</summary>
    private static CulvertStageResult Existing(ExistingBarrels existing, SizingRequest request, CulvertLine line, FlowResult flow, List<Finding> findings)
    {
        findings.AddRange(existing.Findings);
        if (existing.Choice is null) return new CulvertStageResult(CrossingStatus.NotComputed, line, null, null, findings);
        var option = CulvertSizing.Rate(request, existing.Choice, existing.Barrels);
        var floods = flow.Flows.Where(f => f.FlowM3PerS is not null).Select(f => (f.ReturnPeriodYr, f.FlowM3PerS!.Value)).ToList();
        var assessment = ExistingCulvert.Assess(option.Design.Site, request.Criteria, floods);
        findings.AddRange(option.Design.Findings.Concat(option.Check.Findings).DistinctBy(f => f.Code));
        if (assessment.First is { } first)
            findings.Add(InventoryFindings.Fails.With($"{first.Name} beyond {first.Limit:0.00} at the {first.FailsAtYr:G6}-year flood; capacity {first.FlowM3PerS:G3} m3/s", first.FailsAtYr));
        return new CulvertStageResult(CrossingStatus.Rated, line, request, new SizingOutcome(option, [option], null) { IsExisting = true }, findings) { Existing = assessment };
    }

    /// <summary>
    /// Whether the road level is only the terrain's and cannot be a road over a culvert: no room for the smallest barrel and its cover, or cells wider than the road.
    /// </summary>
    private static bool ShowsNoEmbankment(Crossing crossing, CulvertLine line, DrainedTerrain terrain, SizingCriteria criteria)
    {
        if (line.Profile is not { Origin: RoadLevelOrigin.Terrain } || line.LowestRoadElevation is { Origin: FigureOrigin.Given }) return false;
        var frame = terrain.Elevation.Frame;
        return Math.Max(frame.CellWidthM, frame.CellHeightM) > crossing.Road!.WidthM
            || !(line.LowestRoadElevation?.Value - line.InletElevation?.Value >= criteria.SmallestRiseM + criteria.SmallestCoverM);
    }

    /// <summary>Headwater with the high and outlet velocity with the low tailwater, where both are asked for.</summary>
    private static IEnumerable<Finding> Bounds(CulvertRating design, TailwaterSettings settings)
    {
        if (settings is not { LowDepthFactor: { } low, HighDepthFactor: { } high }) return [];
        var (site, bed) = (design.Site, design.Site.Barrels.OutletElevationM);
        var bounds = TailwaterBounds.Rate(site, new ScaledTailwater(site.Tailwater, bed, low), new ScaledTailwater(site.Tailwater, bed, high), design.FlowM3PerS);
        return
        [
            StudyFindings.TailwaterBounded.With(
                $"headwater {bounds.Low.HeadwaterElevationM:0.00} to {bounds.High.HeadwaterElevationM:0.00} m, outlet velocity {bounds.High.OutletVelocityMPerS:0.0} to {bounds.Low.OutletVelocityMPerS:0.0} m/s with {low:0.##} and {high:0.##} times the tailwater depth",
                bounds.High.HeadwaterElevationM, bounds.Low.HeadwaterElevationM),
            .. bounds.Findings,
        ];
    }

    private static double LeastRoadLevelM(SizingOption option, SizingCriteria criteria)
    {
        var level = Math.Max(
            option.Design.HeadwaterElevationM + criteria.FreeboardM,
            option.Barrels.InletElevationM + option.Barrels.Section.RiseM + criteria.SmallestCoverM);
        // Up to the next decimetre, so that a longer barrel under the raised road keeps its freeboard.
        return Math.Ceiling((level + 0.05) * 10) / 10;
    }

    private static List<string> Missing(CulvertLine line, FlowResult flow)
    {
        var missing = new List<string>();
        if (flow.Design.FlowM3PerS is null) missing.Add("design flow");
        if (flow.Check.FlowM3PerS is null) missing.Add("check flow");
        if (line.Length is null || line.Length.Value <= 0) missing.Add("barrel length");
        if (line.InletElevation is null) missing.Add("inlet invert");
        if (line.OutletElevation is null) missing.Add("outlet invert");
        return missing;
    }

    /// <summary>The road as a weir: its profile near the crossing, or a level given for it.</summary>
    private static RoadCrest? Crest(Crossing crossing, CulvertLine line)
    {
        if (line.LowestRoadElevation is not { } lowest) return null;
        var surface = crossing.Road?.Surface == "gravel" ? RoadSurface.Gravel : RoadSurface.Paved;
        var width = crossing.Road?.WidthM ?? 8;
        var points = line.Profile?.Points;
        if (lowest.Origin == FigureOrigin.Given || points is not { Count: > 1 })
        {
            var length = points is { Count: > 1 } ? points[^1].StationM - points[0].StationM : 100;
            return RoadCrest.Level(lowest.Value, length, width, surface);
        }

        return new RoadCrest([.. points.Select(p => (p.StationM, p.ElevationM))], width, surface);
    }
}
