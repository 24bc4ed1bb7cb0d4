using GeoCulvert.Design.Basis;
using GeoCulvert.Design.Sizing;
using GeoCulvert.Design.Terrain;
using NetTopologySuite.Geometries;

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

    /// <summary>Cuts of depressions.</summary>
    public static LayerDefinition<(Breach Cut, GridFrame Frame)> Breaches { get; } = new(
        "breaches", "Cuts", "Where a depression of the terrain model was cut open, from the pit down.", LayerGeometry.Line, r => Line(r.Frame, r.Cut.Cells),
        [
            ResultLayers.Real<(Breach Cut, GridFrame Frame)>("length", QuantityKind.Length, "Length", "Along the cells.", r => r.Cut.LengthM),
            ResultLayers.Real<(Breach Cut, GridFrame Frame)>("depth", QuantityKind.Length, "Depth", "Deepest cut.", r => r.Cut.MaxDepthM),
            ResultLayers.Real<(Breach Cut, GridFrame Frame)>("volume", QuantityKind.Volume, "Volume", "Taken out of the terrain model.", r => r.Cut.VolumeM3),
        ]);

    /// <summary>Mapped streams as enforced.</summary>
    public static LayerDefinition<(EnforcedCourse Course, GridFrame Frame)> MappedStreams { get; } = new(
        "mapped_streams", "Mapped streams", "A stream from the map as it was enforced on the terrain model, drawn downstream.", LayerGeometry.Line, r => Lines(r.Frame, r.Course.Runs),
        [
            ResultLayers.Text<(EnforcedCourse Course, GridFrame Frame)>("name", "Name", "As on the map.", r => r.Course.Name),
            ResultLayers.Real<(EnforcedCourse Course, GridFrame Frame)>("length", QuantityKind.Length, "Length", "Along its cells.", r => r.Course.LengthM),
            ResultLayers.Real<(EnforcedCourse Course, GridFrame Frame)>("depth", QuantityKind.Length, "Deepest cut", "Deepest cut below the terrain model.", r => r.Course.MaxCutM),
            ResultLayers.Real<(EnforcedCourse Course, GridFrame Frame)>("volume", QuantityKind.Volume, "Volume", "Taken out of the terrain model along it.", r => r.Course.CutVolumeM3),
            ResultLayers.Real<(EnforcedCourse Course, GridFrame Frame)>("disagreeing_share", QuantityKind.Share, "In disagreement", "Share of its length away from the terrain model's own streams.", r => r.Course.DisagreeingShare),
            new("turned", QuantityKind.None, FieldType.Boolean, "Turned", "Whether it runs against the drawing.", r => r.Course.Turned),
        ]);

    /// <summary>Closed basins kept as sinks.</summary>
    public static LayerDefinition<(NonContributingArea Basin, GridFrame Frame)> ClosedBasins { get; } = new(
        "closed_basins", "Closed basins", "A closed basin that was kept: its land drains to no crossing.", LayerGeometry.Point, r => new Point(Centre(r.Frame, r.Basin.Basin.Pool.DeepestCell)),
        [
            ResultLayers.Text<(NonContributingArea Basin, GridFrame Frame)>("name", "Name", "Its name.", r => r.Basin.Basin.Name),
            ResultLayers.Real<(NonContributingArea Basin, GridFrame Frame)>("area", QuantityKind.Area, "Non-contributing area", "Land that drains to it.", r => r.Basin.AreaM2),
            ResultLayers.Real<(NonContributingArea Basin, GridFrame Frame)>("pool_area", QuantityKind.Area, "Pool area", "Area below its spill level.", r => r.Basin.Basin.Pool.AreaM2),
            ResultLayers.Real<(NonContributingArea Basin, GridFrame Frame)>("depth", QuantityKind.Length, "Depth", "Greatest depth below its spill level.", r => r.Basin.Basin.Pool.MaxDepthM),
            ResultLayers.Real<(NonContributingArea Basin, GridFrame Frame)>("volume", QuantityKind.Volume, "Volume", "Below its spill level.", r => r.Basin.Basin.Pool.VolumeM3),
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

    private static Coordinate Centre(GridFrame frame, int cell) => new(frame.CentreX(cell % frame.Columns), frame.CentreY(cell / frame.Columns));

    private static LineString? Line(GridFrame frame, int[] cells) => cells.Length < 2 ? null : new LineString([.. cells.Select(c => Centre(frame, c))]);

    private static Geometry? Lines(GridFrame frame, IReadOnlyList<int[]> runs)
    {
        var lines = runs.Select(r => Line(frame, r)).OfType<LineString>().ToArray();
        return lines.Length == 0 ? null : lines.Length == 1 ? lines[0] : new MultiLineString(lines);
    }
}
