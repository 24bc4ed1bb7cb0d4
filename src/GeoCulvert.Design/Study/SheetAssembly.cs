using GeoCulvert.Design.Basis;
using GeoCulvert.Design.Crossings;
using GeoCulvert.Design.Hydraulics;
using GeoCulvert.Design.Sizing;

namespace GeoCulvert.Design.Study;

/// <summary>Writes what a sheet prints, in SI, from what the stages found out.</summary>
internal static class SheetAssembly
{
    private const int OptionsShown = 12;
    private const string Assumed = "assumed: the least level that serves";

    public static CrossingSheet Build(
        Crossing crossing, WatershedResult land, FlowResult flow, CulvertStageResult culvert, IReadOnlyList<SheetRatingPoint> rating,
        IReadOnlyList<SheetOption> options, IReadOnlyList<Finding> findings, UnitSystem units)
    {
        var chosen = culvert.Outcome?.Chosen;
        return new CrossingSheet
        {
            CrossingId = crossing.Id,
            Road = crossing.Road?.Name ?? "",
            Station = crossing.StationM is { } s ? StationText.Of(s, units) : "",
            Status = culvert.Status,
            Culvert = chosen?.Description ?? "",
            Location = crossing.Point,
            Watershed = land.Outline,
            FlowPath = land.FlowPath,
            Groups = [Place(crossing), Watershed(land), Runoff(flow), Barrel(culvert)],
            FlowPathProfile = land.FlowPathProfile,
            Flows = [.. flow.Flows.SelectMany(f => f.All.Select(p => new SheetFlow(p.Method, p.ReturnPeriodYr, p.FlowM3PerS, p.LowerM3PerS, p.UpperM3PerS, p == f.Chosen)))],
            Barrel = chosen is null ? null : Section(chosen, culvert.Line, crossing),
            Floods = chosen is null ? [] : [Flood("Design flood", flow.Design.ReturnPeriodYr, chosen.Design), Flood("Check flood", flow.Check.ReturnPeriodYr, chosen.Check)],
            Rating = rating,
            Criteria = [.. ((chosen ?? culvert.Outcome?.Closest)?.Criteria ?? []).Select(c => new SheetCriterion(c.Name, c.Flood, c.Value, c.Limit, c.Kind, c.IsMet, c.Origin))],
            Options = Near(options),
            Calculations = [.. Calculations(flow, culvert, chosen)],
            Findings = findings,
        };
    }

    private static SheetGroup Place(Crossing crossing) => new("Place",
    [
        Fact("Road", crossing.Road?.Name ?? "none", crossing.Origin == CrossingOrigin.Given ? "given point" : "found along the road"),
        Fact("Station", crossing.StationM, QuantityKind.Length, "measured along the road"),
        Fact("x", crossing.Point.X, QuantityKind.Length, "working coordinate system"),
        Fact("y", crossing.Point.Y, QuantityKind.Length, "working coordinate system"),
        .. crossing.MovedM > 0 ? new[] { Fact("Moved to the stream by", crossing.MovedM, QuantityKind.Length, "measured") } : [],
        Fact("Skew", crossing.SkewDeg, QuantityKind.Angle, "flow against the perpendicular to the road"),
    ]);

    private static SheetGroup Watershed(WatershedResult w) => new("Watershed",
    [
        Fact("Drainage area", w.AreaM2, QuantityKind.Area, "true area of its cells"),
        Fact("Of which local", w.LocalAreaM2, QuantityKind.Area, "not through another crossing"),
        Fact("Perimeter", w.PerimeterM, QuantityKind.Length, "along cell edges"),
        Fact("Edge contact", w.EdgeContactShare, QuantityKind.Share, "share of the boundary without terrain beyond it"),
        Fact("Longest flow path", w.FlowPathLengthM, QuantityKind.Length, "measured on the terrain"),
        Fact("10-85 slope", w.FlowPathSlope1085MPerM, QuantityKind.Slope, "measured on the terrain"),
        Fact("Basin slope", w.MeanSlopeMPerM, QuantityKind.Slope, "mean over the cells, Horn 1981"),
        Fact("Relief", w.ReliefM, QuantityKind.Length, "highest less lowest"),
        Fact("Mean elevation", w.MeanElevationM, QuantityKind.Length, "mean over the cells"),
        Fact("Next crossing downstream", w.DownstreamCrossingId ?? "none", "flow directions"),
    ]);

    private static SheetGroup Runoff(FlowResult flow) => new("Flow",
    [
        Fact("Runoff coefficient", flow.Catchment.RunoffCoefficient?.For(flow.Design.ReturnPeriodYr), QuantityKind.None, flow.Catchment.RunoffCoefficient?.Origin ?? ""),
        Fact("Time of concentration", flow.Time?.TimeMin * 60, QuantityKind.Time, flow.Time is { } t ? t.Choice : ""),
        .. (flow.Time?.All ?? []).Where(m => m.TimeMin is not null).Select(m => Fact($"  by {m.Method}", m.TimeMin * 60, QuantityKind.Time, "computed")),
        Fact("Design flood", flow.Design.ReturnPeriodYr, QuantityKind.Years, "return period"),
        Fact("Design flow", flow.Design.FlowM3PerS, QuantityKind.Flow, flow.Design.Chosen.Method),
        Fact("Check flood", flow.Check.ReturnPeriodYr, QuantityKind.Years, "return period"),
        Fact("Check flow", flow.Check.FlowM3PerS, QuantityKind.Flow, flow.Check.Chosen.Method),
    ]);

    private static SheetGroup Barrel(CulvertStageResult culvert)
    {
        var line = culvert.Line;
        SheetFact Of(string label, Figure? figure) => Fact(label, figure?.Value, QuantityKind.Length, figure?.How ?? "not known");
        return new SheetGroup("Barrel",
        [
            Of("Length", line.Length),
            Of("Inlet invert", line.InletElevation),
            Of("Outlet invert", line.OutletElevation),
            Fact("Slope", line.SlopeMPerM, QuantityKind.Slope, "fall over length"),
            Of("Road level at the crossing", line.RoadElevation) with { Origin = culvert.IsRoadLevelAssumed ? Assumed : line.RoadElevation?.How ?? "not known" },
            Of("Lowest road level", line.LowestRoadElevation) with { Origin = culvert.IsRoadLevelAssumed ? Assumed : line.LowestRoadElevation?.How ?? "not known" },
            Fact("Tailwater", culvert.Request?.Tailwater.Description ?? "not computed", ""),
        ]);
    }

    private static SheetBarrel Section(SizingOption chosen, CulvertLine line, Crossing crossing) => new(
        chosen.Description, chosen.Barrels.LengthM, chosen.Barrels.InletElevationM, chosen.Barrels.OutletElevationM, chosen.Barrels.Section.RiseM,
        line.LowestRoadElevation?.Value ?? double.NaN, crossing.Road?.WidthM ?? 0, crossing.Road?.SideSlope ?? 0);

    private static SheetFlood Flood(string name, double returnPeriodYr, CulvertRating rating)
    {
        var b = rating.Site.Barrels;
        return new SheetFlood(
            $"{name}, {returnPeriodYr:0.##} yr", returnPeriodYr, rating.FlowM3PerS, rating.HeadwaterElevationM, rating.TailwaterElevationM, rating.OutletVelocityMPerS,
            rating.RoadFlowM3PerS, rating.Control, rating.Profile.Name,
            [.. rating.Profile.Points.Select(p => (p.DistanceM, b.InletElevationM - (b.SlopeMPerM * p.DistanceM) + p.DepthM))]);
    }

    /// <summary>The chosen option and the runners-up nearest to it by barrel area.</summary>
    private static IReadOnlyList<SheetOption> Near(IReadOnlyList<SheetOption> options)
    {
        if (options.Count == 0 || options[0].Status != "chosen") return [.. options.OrderBy(o => o.HeadwaterElevationM).Take(OptionsShown)];
        var area = options[0].BarrelAreaM2;
        return [options[0], .. options.Skip(1).OrderBy(o => Math.Abs(Math.Log(o.BarrelAreaM2 / area))).Take(OptionsShown - 1).OrderBy(o => o.BarrelAreaM2)];
    }

    private static IEnumerable<SheetCalculation> Calculations(FlowResult flow, CulvertStageResult culvert, SizingOption? chosen)
    {
        foreach (var time in flow.Time?.All ?? []) yield return new SheetCalculation($"Time of concentration, {time.Method}", time.Steps);
        foreach (var peak in flow.Design.All) yield return new SheetCalculation($"Flow, {peak.Method}, {peak.ReturnPeriodYr:0.##} yr", peak.Steps);
        if (chosen is null) yield break;
        var tailwater = culvert.Request!.Tailwater;
        if (tailwater.Steps(chosen.Design.FlowM3PerS) is { Count: > 0 } level) yield return new SheetCalculation("Tailwater at the design flood", level);
        yield return new SheetCalculation("Culvert at the design flood", RatingSteps.Of(chosen.Design));
        yield return new SheetCalculation("Culvert at the check flood", RatingSteps.Of(chosen.Check));
        if (OutletConditions.Of(chosen.Design, tailwater.VelocityMPerS(chosen.Design.FlowM3PerS)) is not { } outlet) yield break;
        yield return new SheetCalculation("Outlet at the design flood", outlet.Steps);
        if (outlet.VelocityMPerS > CulvertStage.HighVelocityMPerS && RiprapApron.For(chosen.Design) is { } apron)
            yield return new SheetCalculation("Riprap apron at the design flood", apron.Steps);
    }

    private static SheetFact Fact(string label, double? value, QuantityKind kind, string origin) =>
        new(label, value is { } v && double.IsFinite(v) ? v : null, kind, value is null ? "not known" : null, origin);

    private static SheetFact Fact(string label, string text, string origin) => new(label, null, QuantityKind.None, text, origin);
}
