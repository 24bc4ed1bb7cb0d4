using GeoCulvert.Design.Basis;
using GeoCulvert.Design.Crossings;
using GeoCulvert.Design.Hydraulics;
using GeoCulvert.Design.Sizing;
using GeoCulvert.Design.Watersheds;
using NetTopologySuite.Geometries;

namespace GeoCulvert.Design.Study;

/// <summary>Puts what the stages found out about a crossing into its result.</summary>
public static class CrossingAssembly
{
    private const int RatingPoints = 25;

    /// <summary>Builds the result of one crossing.</summary>
    public static CrossingResult Build(
        Crossing crossing, Watershed watershed, (LandFigures Total, LandFigures Local) figures, FlowResult flow, CulvertStageResult culvert, string? downstreamId, IReadOnlyList<Finding> findings, UnitSystem units)
    {
        ArgumentNullException.ThrowIfNull(crossing);
        ArgumentNullException.ThrowIfNull(watershed);
        ArgumentNullException.ThrowIfNull(flow);
        ArgumentNullException.ThrowIfNull(culvert);
        var land = Land(watershed, figures.Total, figures.Local, downstreamId);
        var chosen = culvert.Outcome?.Chosen;
        var rating = chosen is null ? [] : Rating(chosen, flow);
        var options = culvert.Outcome is { } o ? Options(o) : [];
        var sheet = SheetAssembly.Build(crossing, land, flow, culvert, rating, options, findings, units);
        return new CrossingResult
        {
            CrossingId = crossing.Id,
            Road = crossing.Road?.Name ?? "",
            StationM = crossing.StationM,
            IsGiven = crossing.Origin == CrossingOrigin.Given,
            FoundBy = FoundBy(crossing.Origin),
            AlsoUnder = string.Join(", ", crossing.Over.Select(o => o.Road.Name).Where(n => n != crossing.Road?.Name).Distinct()),
            Existing = culvert.Existing,
            Location = new Point(crossing.Point.X, crossing.Point.Y),
            Status = culvert.Status,
            DesignReturnPeriodYr = flow.Design.ReturnPeriodYr,
            CheckReturnPeriodYr = flow.Check.ReturnPeriodYr,
            Watershed = land,
            Flow = flow,
            Barrel = Barrel(culvert.Line),
            Culvert = chosen is null ? null : Culvert(chosen, flow),
            HeadwaterLimitElevationM = culvert.Request is { } request ? HeadwaterLimit(request, chosen) : null,
            Options = options,
            Rating = rating,
            Sheet = sheet,
            Findings = findings,
        };
    }

    private static string FoundBy(CrossingOrigin origin) => origin switch
    {
        CrossingOrigin.Given => "given point",
        CrossingOrigin.Opening => "opened embankment",
        CrossingOrigin.LowPoint => "low point of the road",
        CrossingOrigin.DitchRelief => "ditch relief",
        _ => "stream",
    };

    private static WatershedResult Land(Watershed watershed, LandFigures totalFigures, LandFigures localFigures, string? downstreamId)
    {
        var (total, local) = (watershed.Total, watershed.Local);
        var path = total.LongestFlowPath;
        return new WatershedResult
        {
            Outline = total.Outline.Polygon,
            LocalOutline = local.Outline.Polygon,
            Total = totalFigures,
            Local = localFigures,
            AreaM2 = total.AreaM2,
            LocalAreaM2 = local.AreaM2,
            PerimeterM = total.Outline.PerimeterM,
            Centroid = total.Centroid ?? new Coordinate(double.NaN, double.NaN),
            EdgeContactShare = total.EdgeContactShare,
            MeanSlopeMPerM = total.MeanBasinSlopeMPerM ?? double.NaN,
            MeanElevationM = total.MeanElevationM ?? double.NaN,
            ReliefM = total.ReliefM ?? double.NaN,
            FlowPath = path is { Profile.Count: > 1 } ? path.Line : null,
            FlowPathLengthM = path?.LengthM ?? 0,
            FlowPathSlope1085MPerM = path?.Slope1085MPerM,
            FlowPathEndToEndSlopeMPerM = path?.EndToEndSlopeMPerM,
            FlowPathProfile = path is null ? [] : ListView.WithElevation(path.Profile, p => (p.DistanceM, p.ElevationM)),
            DownstreamCrossingId = downstreamId,
        };
    }

    private static BarrelLineResult? Barrel(CulvertLine line) =>
        line is { Length: { } length, InletElevation: { } inlet, OutletElevation: { } outlet }
            ? new BarrelLineResult(
                line.Line, length.Value, inlet.Value, outlet.Value, line.SkewDeg ?? double.NaN, line.LowestRoadElevation?.Value ?? double.NaN, line.FillHeightM ?? double.NaN)
            : null;

    private static CulvertResult Culvert(SizingOption chosen, FlowResult flow)
    {
        var section = chosen.Barrels.Section;
        var overtopped = chosen.Design.Site.Road is null ? null : flow.Flows
            .FirstOrDefault(f => f.FlowM3PerS is { } q && CulvertHydraulics.Rate(chosen.Design.Site, q).RoadFlowM3PerS > 0)?.ReturnPeriodYr;
        return new CulvertResult
        {
            Description = chosen.Description,
            Shape = chosen.Choice.Shape,
            SpanM = section.SpanM,
            RiseM = section.RiseM,
            Barrels = chosen.Barrels.Count,
            BarrelAreaM2 = chosen.Barrels.AreaM2,
            Inlet = chosen.Choice.Inlet.Id,
            Control = chosen.Design.Control,
            HeadwaterDepthM = chosen.Design.HeadwaterM,
            HeadwaterElevationM = chosen.Design.HeadwaterElevationM,
            HeadwaterOverRise = chosen.Design.HeadwaterOverRise,
            OutletVelocityMPerS = chosen.Design.OutletVelocityMPerS,
            CheckHeadwaterElevationM = chosen.Check.HeadwaterElevationM,
            CheckRoadFlowM3PerS = chosen.Check.RoadFlowM3PerS,
            OvertoppingReturnPeriodYr = overtopped,
            Cost = chosen.Cost,
        };
    }

    /// <summary>The lowest of all limits on the design headwater, as an elevation.</summary>
    private static double? HeadwaterLimit(SizingRequest request, SizingOption? chosen)
    {
        var c = request.Criteria;
        double? ByRatio = chosen is null ? null : request.InletElevationM + (c.LargestHeadwaterRatio * chosen.Barrels.Section.RiseM);
        return new[] { ByRatio, request.InletElevationM + c.LargestHeadwaterDepthM, c.HighestHeadwaterElevationM, request.Road?.LowestM - c.FreeboardM }.Min();
    }

    private static List<SheetRatingPoint> Rating(SizingOption chosen, FlowResult flow)
    {
        var largest = 1.2 * Math.Max(flow.Design.FlowM3PerS!.Value, flow.Check.FlowM3PerS!.Value);
        return [.. Enumerable.Range(0, RatingPoints).Select(i => CulvertHydraulics.Rate(chosen.Design.Site, largest * i / (RatingPoints - 1))).Select(r => new SheetRatingPoint(
            r.FlowM3PerS,
            r.Site.Barrels.InletElevationM + r.InletControlHeadwaterM,
            r.Site.Barrels.InletElevationM + r.OutletControlHeadwaterM,
            r.HeadwaterElevationM,
            r.RoadFlowM3PerS))];
    }

    private static List<SheetOption> Options(SizingOutcome outcome)
    {
        var ordered = outcome.Options.OrderBy(o => !ReferenceEquals(o, outcome.Chosen)); // a stable sort: the rest keep their order
        return [.. ordered.Select(o => new SheetOption(
            o.Description,
            o.Barrels.AreaM2,
            o.IsRated ? o.Design.HeadwaterElevationM : double.NaN,
            o.IsRated ? o.Design.HeadwaterOverRise : double.NaN,
            o.IsRated ? o.Design.OutletVelocityMPerS : double.NaN,
            outcome.Reason(o)) { Cost = o.Cost })];
    }
}
