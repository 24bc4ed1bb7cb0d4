using GeoCulvert.Design.Basis;
using GeoCulvert.Design.Sizing;

namespace GeoCulvert.Design.Study;

/// <summary>Layers of what was changed in the terrain, what existing culverts carry, and what differs from the run before.</summary>
public static class TerrainLayers
{
    /// <summary>Openings of embankments.</summary>
    public static LayerDefinition<OpeningResult> Openings { get; } = new(
        "openings", "Openings", "Where a road dams the terrain model and its embankment was opened, from the upstream to the downstream end.", LayerGeometry.Line, o => o.Opening.Line,
        [
            ResultLayers.Text<OpeningResult>("crossing_id", "Crossing", "Crossing whose water passes here; empty when none does.", o => o.CrossingId),
            ResultLayers.Text<OpeningResult>("road", "Road", "Roads over it, from upstream.", o => string.Join(", ", o.Opening.Roads.Select(r => r.Name))),
            ResultLayers.Real<OpeningResult>("station", QuantityKind.Length, "Station", "On the first of the roads.", o => o.Opening.StationM),
            ResultLayers.Real<OpeningResult>("length", QuantityKind.Length, "Length", "Between the ends in plan.", o => o.Opening.LengthM),
            ResultLayers.Real<OpeningResult>("depth", QuantityKind.Length, "Depth", "Largest depth below the terrain model.", o => o.Opening.DepthM),
            ResultLayers.Real<OpeningResult>("volume", QuantityKind.Volume, "Volume", "Taken out of the terrain model.", o => o.Opening.VolumeM3),
            ResultLayers.Real<OpeningResult>("skew", QuantityKind.Angle, "Skew", "Angle to the perpendicular of the first road.", o => o.Opening.SkewDeg),
            ResultLayers.Real<OpeningResult>("pond_depth", QuantityKind.Length, "Pond depth", "Depth of the water behind the embankment in the untouched terrain model.", o => o.Opening.PondDepthM),
            ResultLayers.Real<OpeningResult>("area_before", QuantityKind.Area, "Area before", "Drains to the downstream end in the untouched terrain model.", o => o.Opening.AreaBeforeM2),
            ResultLayers.Real<OpeningResult>("area_after", QuantityKind.Area, "Area after", "Drains to the downstream end with all openings.", o => o.Opening.AreaAfterM2),
            ResultLayers.Text<OpeningResult>("reason", "Reason", "Why it was opened.", o => o.Opening.ReasonText),
        ]);

    /// <summary>Watersheds of the untouched terrain beside those of the opened one.</summary>
    public static LayerDefinition<UntouchedWatershed> Untouched { get; } = new(
        "untouched_watersheds", "Watersheds without openings", "The land that reaches the downstream end of an opening in the untouched terrain model, where the opening changes its area by more than 1 %.", LayerGeometry.Polygon, w => w.Outline,
        [
            ResultLayers.Text<UntouchedWatershed>("crossing_id", "Crossing", "Crossing whose water passes the opening; empty when none does.", w => w.CrossingId),
            ResultLayers.Real<UntouchedWatershed>("area", QuantityKind.Area, "Area", "In the untouched terrain model.", w => w.AreaM2),
            ResultLayers.Real<UntouchedWatershed>("opened_area", QuantityKind.Area, "Area with openings", "With all openings.", w => w.OpenedAreaM2),
        ]);

    /// <summary>What existing culverts carry.</summary>
    public static LayerDefinition<(string CrossingId, CriterionCapacity Capacity)> Capacities { get; } = new(
        "capacities", "Capacities", "The flow at which an existing culvert just meets a criterion.", LayerGeometry.None, _ => null,
        [
            ResultLayers.Text<(string CrossingId, CriterionCapacity Capacity)>("crossing_id", "Crossing", "Id of the crossing.", r => r.CrossingId),
            ResultLayers.Text<(string CrossingId, CriterionCapacity Capacity)>("criterion", "Criterion", "What is limited; overtopping is the lowest road level.", r => r.Capacity.Name),
            ResultLayers.Real<(string CrossingId, CriterionCapacity Capacity)>("limit", QuantityKind.None, "Limit", "Its limit; SI.", r => r.Capacity.Limit),
            ResultLayers.Real<(string CrossingId, CriterionCapacity Capacity)>("capacity", QuantityKind.Flow, "Capacity", "Largest flow that meets it; empty when no flow within reach breaks it.", r => r.Capacity.FlowM3PerS),
            ResultLayers.Real<(string CrossingId, CriterionCapacity Capacity)>("capacity_return_period", QuantityKind.Years, "Return period", "Of that flow, between the floods asked for; empty outside them.", r => r.Capacity.ReturnPeriodYr),
            ResultLayers.Real<(string CrossingId, CriterionCapacity Capacity)>("fails_at", QuantityKind.Years, "Fails at", "Shortest return period asked for whose flow breaks it; empty when none does.", r => r.Capacity.FailsAtYr),
        ]);

    /// <summary>What differs from the run before.</summary>
    public static LayerDefinition<CrossingChange> Changes { get; } = new(
        "changes", "Changes", "A crossing that was added, removed, moved or changed since the run before in the same results folder.", LayerGeometry.None, _ => null,
        [
            ResultLayers.Text<CrossingChange>("crossing_id", "Crossing", "Id of the crossing.", c => c.CrossingId),
            ResultLayers.Text<CrossingChange>("change", "Change", "added, removed, moved, changed, or moved and changed.", c => c.Change),
            ResultLayers.Real<CrossingChange>("moved", QuantityKind.Length, "Moved", "Distance between the two places.", c => c.MovedM),
            ResultLayers.Real<CrossingChange>("area_before", QuantityKind.Area, "Area before", "Drainage area in the run before.", c => c.Before?.AreaM2),
            ResultLayers.Real<CrossingChange>("area_after", QuantityKind.Area, "Area now", "Drainage area.", c => c.After?.AreaM2),
            ResultLayers.Real<CrossingChange>("design_flow_before", QuantityKind.Flow, "Flow before", "Design flow in the run before.", c => c.Before?.DesignFlowM3PerS),
            ResultLayers.Real<CrossingChange>("design_flow_after", QuantityKind.Flow, "Flow now", "Design flow.", c => c.After?.DesignFlowM3PerS),
            ResultLayers.Text<CrossingChange>("culvert_before", "Culvert before", "Culvert in the run before.", c => c.Before?.Culvert),
            ResultLayers.Text<CrossingChange>("culvert_after", "Culvert now", "Culvert.", c => c.After?.Culvert),
        ]);
}
