using GeoCulvert.Design.Basis;
using GeoCulvert.Design.Crossings;
using GeoCulvert.Design.Hydraulics;
using GeoCulvert.Design.Terrain;

namespace GeoCulvert.Design.Study;

/// <summary>The water level at the outlet of a crossing, from the settings, the drainage area and the terrain below.</summary>
public static class TailwaterStage
{
    /// <summary>Length of stream over which the bed slope is taken, m (own rule; at least five cells).</summary>
    public const double SlopeReachM = 100;

    /// <summary>Least bed slope, m/m (own rule).</summary>
    public const double LeastSlopeMPerM = 0.0005;

    // How much wider than the first a cross-section may be cut where it does not hold the flow.
    private static readonly int[] Widths = [1, 2, 4];

    /// <summary>
    /// Channel width assumed from the drainage area: bankfull width = 2.70 A^0.352, A in km2, width in m (Bieger and others 2015, United States as a
    /// whole). From memory, which the finding says.
    /// </summary>
    public static double AssumedWidthM(double areaM2) => 2.70 * Math.Pow(areaM2 / 1e6, 0.352);

    /// <summary>Makes the tailwater of a crossing.</summary>
    /// <param name="crossing">The crossing.</param>
    /// <param name="line">Its barrel; the outlet invert must be known.</param>
    /// <param name="terrain">Drained terrain.</param>
    /// <param name="areaM2">Drainage area, m2.</param>
    /// <param name="largestFlowM3PerS">Largest flow it is asked for, m3/s.</param>
    /// <param name="settings">Settings.</param>
    /// <param name="givenElevationM">Level given for this crossing, m.</param>
    /// <param name="findings">Doubts are added here.</param>
    public static ITailwater For(
        Crossing crossing, CulvertLine line, DrainedTerrain terrain, double areaM2, double largestFlowM3PerS, TailwaterSettings settings, double? givenElevationM, List<Finding> findings)
    {
        ArgumentNullException.ThrowIfNull(crossing);
        ArgumentNullException.ThrowIfNull(line);
        ArgumentNullException.ThrowIfNull(terrain);
        ArgumentNullException.ThrowIfNull(settings);
        ArgumentNullException.ThrowIfNull(findings);
        var outlet = line.OutletElevation!.Value;
        if ((givenElevationM ?? (settings.Method == TailwaterMethod.Fixed ? settings.FixedElevationM : null)) is { } level) return new FixedTailwater(level);
        if (settings is { Method: TailwaterMethod.Rating, Rating: { } table })
        {
            if (largestFlowM3PerS > table.LargestFlowM3PerS)
                findings.Add(StudyFindings.TailwaterRatingExceeded.With($"{largestFlowM3PerS:G4} m3/s, {table.Name} ends at {table.LargestFlowM3PerS:G4} m3/s", largestFlowM3PerS, table.LargestFlowM3PerS));
            return table.At(outlet);
        }

        var width = settings.BottomWidthM ?? AssumedWidthM(areaM2);
        var slope = settings.SlopeMPerM ?? BedSlope(crossing, terrain);
        if (!(slope >= LeastSlopeMPerM))
        {
            findings.Add(StudyFindings.TailwaterSlopeFloor.With($"measured {slope:0.00000}, used {LeastSlopeMPerM} m/m", slope, LeastSlopeMPerM));
            slope = LeastSlopeMPerM;
        }

        if (settings.Method == TailwaterMethod.ChannelFromDem)
        {
            var cut = Cut(crossing, line, terrain, width, slope, largestFlowM3PerS, settings);
            if (cut.Section is { } section)
            {
                var channel = new CrossSectionTailwater(section, slope, cut.DistanceM);
                if (channel.LevelAtSectionM(largestFlowM3PerS) is var top && top > section.LowerEndM)
                    findings.Add(StudyFindings.TailwaterSectionLow.With($"level {top:0.00} m at {largestFlowM3PerS:G4} m3/s, lower end {section.LowerEndM:0.00} m", top, section.LowerEndM));
                return channel;
            }

            findings.Add(StudyFindings.TailwaterNoSection.With(cut.Trouble));
        }

        if (settings.BottomWidthM is null)
        {
            findings.Add(StudyFindings.TailwaterAssumed.With(
                $"bottom width {width:0.0} m from {areaM2 / 1e6:0.###} km2 (bankfull width 2.70 A^0.352, Bieger and others 2015, from memory), side slopes {settings.SideSlope:0.#} to 1, n = {settings.RoughnessN:0.###}", width));
        }

        return new NormalDepthTailwater(new TrapezoidSection(width, settings.SideSlope), settings.RoughnessN, slope, outlet);
    }

    /// <summary>The tailwater held up by the pool of the crossing next downstream, where that pool reaches the outlet.</summary>
    /// <param name="tailwater">Tailwater without the pool.</param>
    /// <param name="pool">The pool downstream; null for none.</param>
    /// <param name="outletElevationM">Outlet invert, m.</param>
    /// <param name="designFlowM3PerS">Design flow of this crossing, m3/s: the pool then stands at its own design headwater.</param>
    /// <param name="checkFlowM3PerS">Check flow of this crossing, m3/s.</param>
    /// <param name="findings">Doubts are added here.</param>
    public static ITailwater WithPool(
        ITailwater tailwater, DownstreamPool? pool, double outletElevationM, double designFlowM3PerS, double checkFlowM3PerS, List<Finding> findings)
    {
        ArgumentNullException.ThrowIfNull(tailwater);
        ArgumentNullException.ThrowIfNull(findings);
        if (pool is null || pool.CheckHeadwaterM <= outletElevationM || designFlowM3PerS <= 0) return tailwater;
        List<(double, double)> points = [(0, Math.Min(pool.InletInvertM, pool.DesignHeadwaterM)), (designFlowM3PerS, pool.DesignHeadwaterM)];
        if (checkFlowM3PerS > designFlowM3PerS) points.Add((checkFlowM3PerS, Math.Max(pool.DesignHeadwaterM, pool.CheckHeadwaterM)));
        var raised = new PoolTailwater(tailwater, new RatingTailwater(points), pool.CrossingId);
        foreach (var flow in new[] { designFlowM3PerS, checkFlowM3PerS }.Where(raised.IsPool).Take(1))
            findings.Add(StudyFindings.TailwaterFromPool.With($"pool of {pool.CrossingId} at {raised.ElevationM(flow):0.00} m, channel alone {tailwater.ElevationM(flow):0.00} m at {flow:G4} m3/s", raised.ElevationM(flow), tailwater.ElevationM(flow)));
        return raised;
    }

    private static TailwaterSectionCut Cut(
        Crossing crossing, CulvertLine line, DrainedTerrain terrain, double widthM, double slopeMPerM, double largestFlowM3PerS, TailwaterSettings settings)
    {
        var frame = terrain.Elevation.Frame;
        var cell = Math.Max(frame.CellWidthM, frame.CellHeightM);
        var reach = (line.Length?.Value ?? 0) + settings.SectionDistanceM + Math.Max(SlopeReachM, 10 * cell);
        var path = FlowSteps.DownstreamPath(terrain.Direction, crossing.MeetingCell, reach);
        var outlet = (crossing.Road?.WidthM ?? 0) / 2;
        if (line.Line?.EndPoint.Coordinate is { } end)
        {
            // The outlet lies where the path passes nearest to the end of the barrel.
            double walked = 0, nearest = double.PositiveInfinity;
            for (var i = 0; i < path.Count; i++)
            {
                var at = FlowSteps.Centre(frame, path[i]);
                if (i > 0) walked += FlowSteps.Centre(frame, path[i - 1]).Distance(at);
                if (at.Distance(end) < nearest) (nearest, outlet) = (at.Distance(end), walked);
            }
        }

        // Wider until it holds the largest flow: on a plain the first rise may be a mere hump.
        TailwaterSectionCut? best = null;
        foreach (var wider in Widths)
        {
            var cut = TailwaterSection.Cut(path, outlet, terrain.Elevation, widthM, settings, wider);
            if (cut.Section is not { } section) continue;
            best = cut;
            if (new CrossSectionTailwater(section, slopeMPerM, cut.DistanceM).LevelAtSectionM(largestFlowM3PerS) <= section.LowerEndM) break;
        }

        return best ?? TailwaterSection.Cut(path, outlet, terrain.Elevation, widthM, settings);
    }

    /// <summary>Fall of the untouched bed below the road by the length of stream: lowest ground in the first and last fifth of the reach.</summary>
    private static double BedSlope(Crossing crossing, DrainedTerrain terrain)
    {
        var frame = terrain.Elevation.Frame;
        var cell = Math.Max(frame.CellWidthM, frame.CellHeightM);
        var offRoad = (crossing.Road?.WidthM ?? 0) + cell;
        var reach = Math.Max(SlopeReachM, 5 * cell) + offRoad;
        var path = FlowSteps.DownstreamPath(terrain.Direction, crossing.MeetingCell, reach);
        var points = new List<(double DistanceM, double ElevationM)>();
        var distance = 0.0;
        for (var i = 0; i < path.Count; i++)
        {
            if (i > 0) distance += FlowSteps.Centre(frame, path[i - 1]).Distance(FlowSteps.Centre(frame, path[i]));
            var z = terrain.Elevation.Cells[path[i]];
            if (distance >= offRoad && !float.IsNaN(z)) points.Add((distance, z));
        }

        if (points.Count < 2) return double.NaN;
        // Least-squares line: one rough cell at either end does not set the slope.
        double mx = points.Average(p => p.DistanceM), mz = points.Average(p => p.ElevationM);
        return -points.Sum(p => (p.DistanceM - mx) * (p.ElevationM - mz)) / points.Sum(p => (p.DistanceM - mx) * (p.DistanceM - mx));
    }
}

/// <summary>The pool of the crossing next downstream.</summary>
/// <param name="CrossingId">The crossing.</param>
/// <param name="InletInvertM">Its inlet invert, m.</param>
/// <param name="DesignHeadwaterM">Its headwater elevation in its design flood, m.</param>
/// <param name="CheckHeadwaterM">Its headwater elevation in its check flood, m.</param>
public sealed record DownstreamPool(string CrossingId, double InletInvertM, double DesignHeadwaterM, double CheckHeadwaterM)
{
    /// <summary>The pool of a sized crossing; null where it has no size.</summary>
    public static DownstreamPool? Of(string crossingId, CulvertStageResult result)
    {
        ArgumentNullException.ThrowIfNull(result);
        return result.Outcome?.Chosen is { } chosen
            ? new(crossingId, chosen.Barrels.InletElevationM, chosen.Design.HeadwaterElevationM, chosen.Check.HeadwaterElevationM)
            : null;
    }
}
