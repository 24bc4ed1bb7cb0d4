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

    /// <summary>
    /// Channel width assumed from the drainage area: bankfull width = 2.70 A^0.352, A in km2, width in m (Bieger and others 2015, United States as a
    /// whole). From memory, which the finding says.
    /// </summary>
    public static double AssumedWidthM(double areaM2) => 2.70 * Math.Pow(areaM2 / 1e6, 0.352);

    /// <summary>Makes the tailwater of a crossing.</summary>
    /// <param name="crossing">The crossing.</param>
    /// <param name="terrain">Drained terrain.</param>
    /// <param name="areaM2">Drainage area, m2.</param>
    /// <param name="outletElevationM">Outlet invert, m.</param>
    /// <param name="settings">Settings.</param>
    /// <param name="givenElevationM">Level given for this crossing, m.</param>
    /// <param name="findings">Doubts are added here.</param>
    public static ITailwater For(
        Crossing crossing, DrainedTerrain terrain, double areaM2, double outletElevationM, TailwaterSettings settings, double? givenElevationM, List<Finding> findings)
    {
        ArgumentNullException.ThrowIfNull(crossing);
        ArgumentNullException.ThrowIfNull(terrain);
        ArgumentNullException.ThrowIfNull(settings);
        ArgumentNullException.ThrowIfNull(findings);
        if ((givenElevationM ?? settings.FixedElevationM) is { } level) return new FixedTailwater(level);
        var width = settings.BottomWidthM;
        if (width is null)
        {
            width = AssumedWidthM(areaM2);
            findings.Add(StudyFindings.TailwaterAssumed.With(
                $"bottom width {width:0.0} m from {areaM2 / 1e6:0.###} km2 (bankfull width 2.70 A^0.352, Bieger and others 2015, from memory), side slopes {settings.SideSlope:0.#} to 1, n = {settings.RoughnessN:0.###}", width));
        }

        var slope = settings.SlopeMPerM ?? BedSlope(crossing, terrain);
        if (!(slope >= LeastSlopeMPerM))
        {
            findings.Add(StudyFindings.TailwaterSlopeFloor.With($"measured {slope:0.00000}, used {LeastSlopeMPerM} m/m", slope, LeastSlopeMPerM));
            slope = LeastSlopeMPerM;
        }

        return new NormalDepthTailwater(new TrapezoidSection(width.Value, settings.SideSlope), settings.RoughnessN, slope, outletElevationM);
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
