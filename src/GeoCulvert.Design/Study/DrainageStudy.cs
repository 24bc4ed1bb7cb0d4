using GeoCulvert.Design.Basis;
using GeoCulvert.Design.Crossings;
using GeoCulvert.Design.Terrain;
using GeoCulvert.Design.Watersheds;
using NetTopologySuite.Geometries;

namespace GeoCulvert.Design.Study;

/// <summary>The pipeline: terrain, crossings, watersheds, flows, culverts.</summary>
public static class DrainageStudy
{
    /// <summary>Runs a whole study.</summary>
    /// <param name="inputs">Maps and tables, in one plane and SI.</param>
    /// <param name="settings">Settings.</param>
    /// <param name="stages">Runs and times the stages.</param>
    /// <param name="cancel">Stops the work between and inside stages.</param>
    public static StudyResult Run(StudyInputs inputs, StudySettings settings, IStages stages, CancellationToken cancel = default)
    {
        ArgumentNullException.ThrowIfNull(inputs);
        ArgumentNullException.ThrowIfNull(settings);
        ArgumentNullException.ThrowIfNull(stages);
        var frame = inputs.Elevation.Frame;

        // Make water leave: mapped streams enforced, embankments opened, depressions kept, cut or filled; directions and accumulation.
        var (opened, conditioning) = stages.Run("terrain", frame.Count, p => ConditioningStage.Drain(inputs, settings, p, cancel));
        var terrain = opened.Terrain;
        cancel.ThrowIfCancellationRequested();

        // Where water crosses the road: found along it, or given and moved to the stream; ids stay those of the run before.
        var streamCells = Math.Max(1, (long)Math.Ceiling(settings.StreamAreaM2 / frame.CellAreaM2));
        var found = stages.Run("crossings", null, _ => CrossingIdentity.Keep(CrossingStage.Find(inputs, settings, opened, streamCells), inputs.Former));
        var openings = CrossingStage.Results(opened, found.Crossings);

        // The land above every crossing, all in one pass.
        var watersheds = stages.Run("watersheds", frame.Count, _ => WatershedSurvey.Survey(terrain, found.Crossings, new() { SmoothOutlines = settings.SmoothOutlines }, inputs.PlaneScale));
        cancel.ThrowIfCancellationRequested();

        // From land to flow, from flow to culvert.
        var crossings = stages.Run("flows and culverts", null, p => Compute(inputs, settings, terrain, found.Crossings, watersheds, p, cancel));

        var streams = StreamNetwork.Extract(terrain.Direction, terrain.Accumulation, streamCells)
            .Where(s => s.Cells.Length > 1)
            .Select(s => new StreamResult(new LineString([.. s.Cells.Select(c => Centre(frame, c))]), s.LowerAccumulationCells * frame.CellAreaM2 * ScaleAt(s.Cells[^1]), s.Order));
        var roads = inputs.Roads.Select(r => new RoadResult(r.Alignment.Name, r.Class.Name, r.Alignment.Line, r.Alignment.WidthM, r.Alignment.Surface));
        var whole = terrain.Findings.Concat(conditioning.Findings).Concat(found.Findings).Concat(RunFindings(inputs, found.Crossings));
        return new StudyResult(terrain, crossings, [.. streams], [.. roads], [.. whole.Concat(crossings.SelectMany(c => c.Findings))])
        {
            Openings = openings,
            Conditioning = conditioning,
            Untouched = CrossingStage.Untouched(opened, openings),
            Changes = CrossingIdentity.Changes(inputs.Former, crossings),
        };

        // A reach's drainage area is not summed cell by cell: the scale at its lower end stands for all of it.
        double ScaleAt(int cell) => inputs.PlaneScale.AreaRatioAt(frame.CentreX(cell % frame.Columns), frame.CentreY(cell / frame.Columns));
    }

    private static List<CrossingResult> Compute(
        StudyInputs inputs, StudySettings settings, DrainedTerrain terrain, IReadOnlyList<Crossing> crossings, CrossingWatersheds watersheds, IProgress<double> progress, CancellationToken cancel)
    {
        var catchments = new CatchmentStage(inputs, settings, terrain, watersheds);
        var filledDepth = FilledDepth(terrain);
        var idOfOutlet = watersheds.Watersheds.Zip(crossings).GroupBy(p => p.First.Outlet).ToDictionary(g => g.Key, g => g.First().Second.Id);
        var results = new CrossingResult[crossings.Count];
        var pools = new Dictionary<int, DownstreamPool?>();
        var done = 0;
        // Downstream crossings first, so that their pools are known; a crossing downstream always drains more.
        foreach (var i in Enumerable.Range(0, crossings.Count).OrderByDescending(k => watersheds.Watersheds[k].Total.AreaM2))
        {
            cancel.ThrowIfCancellationRequested();
            var (crossing, watershed) = (crossings[i], watersheds.Watersheds[i]);
            var road = inputs.Roads.FirstOrDefault(r => ReferenceEquals(r.Alignment, crossing.Road));
            double? Given(string column) => inputs.Overrides.Of(crossing.Id, column);
            var design = Given("design_return_period_yr") ?? road?.DesignReturnPeriodYr ?? settings.DesignReturnPeriodYr ?? (road?.Class ?? RoadClass.Named("local")).DesignReturnPeriodYr;
            var check = Given("check_return_period_yr") ?? road?.CheckReturnPeriodYr ?? settings.CheckReturnPeriodYr ?? (road?.Class ?? RoadClass.Named("local")).CheckReturnPeriodYr;

            var doubts = crossing.Findings.Concat(watershed.Findings).ToList();
            var catchment = catchments.For(crossing.Id, watershed, doubts);
            var flow = FlowStage
                .Compute(catchment, settings.Flow, design, check, Given("time_of_concentration") / 60)
                .WithGiven(Given("design_flow"), Given("check_flow"), inputs.Overrides.Origin);
            doubts.AddRange(flow.Findings);
            var culvert = CulvertStage.Size(crossing, watershed, flow, road?.Class, terrain, filledDepth, inputs, settings, pools.GetValueOrDefault(watershed.ParentOutlet));
            doubts.AddRange(culvert.Findings);
            pools[watershed.Outlet] = DownstreamPool.Of(crossing.Id, culvert);

            var downstream = idOfOutlet.GetValueOrDefault(watershed.ParentOutlet);
            var findings = doubts.Select(f => f.At(crossing.Id)).DistinctBy(f => (f.Code, f.Text)).OrderByDescending(f => f.Severity).ToList();
            results[i] = CrossingAssembly.Build(crossing, watershed, catchments.Land(watershed), flow, culvert, downstream, findings, settings.Units);
            progress.Report(++done / (double)crossings.Count);
        }

        return [.. results];
    }

    private static List<Finding> RunFindings(StudyInputs inputs, IReadOnlyList<Crossing> crossings)
    {
        var findings = new List<Finding>();
        if (crossings.Count == 0) findings.Add(StudyFindings.NoCrossing.With("none"));
        var known = crossings.Select(c => c.Id).ToHashSet(StringComparer.Ordinal);
        foreach (var id in inputs.Overrides.CrossingIds.Where(id => !known.Contains(id)).Order(StringComparer.Ordinal))
            findings.Add(StudyFindings.OverrideUnused.With($"'{id}' in {inputs.Overrides.Name}"));
        var frame = inputs.Elevation.Frame;
        var terrain = new Envelope(frame.West, frame.East, frame.South, frame.North);
        foreach (var road in inputs.Roads.Where(r => !terrain.Contains(r.Alignment.Line.EnvelopeInternal)))
            findings.Add(StudyFindings.RoadLeavesTerrain.With(road.Alignment.Name));
        return findings;
    }

    private static Grid<float> FilledDepth(DrainedTerrain terrain)
    {
        var depth = new Grid<float>(terrain.Elevation.Frame);
        for (var i = 0; i < depth.Cells.Length; i++) depth.Cells[i] = Math.Max(0, terrain.Filled.Surface.Cells[i] - terrain.Elevation.Cells[i]);
        return depth;
    }

    private static Coordinate Centre(GridFrame frame, int cell) => new(frame.CentreX(cell % frame.Columns), frame.CentreY(cell / frame.Columns));
}
