using GeoCulvert.Design.Basis;
using GeoCulvert.Design.Terrain;
using NetTopologySuite.Geometries;

namespace GeoCulvert.Design.Crossings;

/// <summary>
/// Measures the barrel of a crossing on the untouched terrain and the road. On each side the barrel ends where the embankment slope meets the bed:
/// <code>
///   reach = (W/2 + m (zr - zb)) / cos(skew),   length = reach upstream + reach downstream
/// </code>
/// W width of the road, m side slope (horizontal per one vertical), zr road level at the crossing, zb bed at that end (m), solved by
/// repetition because the bed depends on the reach. Plane geometry; the slope is taken as it is, not skewed.
/// </summary>
public static class CulvertLineSurvey
{
    private const int Repetitions = 50;

    /// <summary>Measures one crossing.</summary>
    /// <param name="crossing">The crossing.</param>
    /// <param name="direction">D8 directions.</param>
    /// <param name="accumulation">Cells drained.</param>
    /// <param name="elevation">The untouched terrain.</param>
    /// <param name="filledDepthM">Depth to which conditioning raised each cell, m; null when not known.</param>
    /// <param name="overrides">Figures given instead; null for none.</param>
    /// <param name="settings">Settings; null for the defaults.</param>
    /// <exception cref="InputException">A given skew outside 0-80 degrees.</exception>
    public static CulvertLine Measure(
        Crossing crossing,
        Grid<byte> direction,
        Grid<int> accumulation,
        Grid<float> elevation,
        Grid<float>? filledDepthM = null,
        CrossingOverrides? overrides = null,
        CulvertLineSettings? settings = null)
    {
        ArgumentNullException.ThrowIfNull(crossing);
        ArgumentNullException.ThrowIfNull(elevation);
        settings ??= new();
        overrides ??= new(crossing.Id);
        var findings = new List<Finding>();
        var cellM = Math.Max(elevation.Frame.CellWidthM, elevation.Frame.CellHeightM);
        var windowM = settings.BedWindowM ?? Math.Max(5 * cellM, 15);
        var road = crossing.Road;
        var (level, lowest, profile) = road is null
            ? (Figure.Of(overrides.RoadElevationM, double.NaN, ""), new ProfilePoint(double.NaN, double.NaN), null)
            : RoadLevel(road, crossing.StationM!.Value, elevation, overrides, settings, cellM, findings);
        var (upper, lower) = (EndRoad.Of(crossing, true, level), EndRoad.Of(crossing, false, level));
        foreach (var over in crossing.Over.Where(o => !ReferenceEquals(o.Road, road)))
        {
            var (otherLevel, otherLowest, _) = RoadLevel(over.Road, over.StationM, elevation, overrides, settings, cellM, findings);
            if (ReferenceEquals(over, crossing.Over[0])) upper = upper with { Level = otherLevel ?? level };
            if (ReferenceEquals(over, crossing.Over[^1])) lower = lower with { Level = otherLevel ?? level };
            if (otherLowest.ElevationM < lowest.ElevationM) lowest = new(double.NaN, otherLowest.ElevationM);
        }

        if (level is null) findings.Add(CrossingFindings.RoadLevelUnknown.With(road is null ? "no road at this crossing" : $"station {StationText.Of(crossing.StationM!.Value)}"));

        var skew = Skew(crossing, overrides, settings, findings);
        // A known culvert brings its own ends; figures given for the crossing go before it.
        var known = crossing.Opening?.Known?.Ends(crossing.Opening.Line.StartPoint.Coordinate);
        var given = overrides with
        {
            LengthM = overrides.LengthM ?? known?.Inlet.Distance(known.Value.Outlet),
            InletElevationM = overrides.InletElevationM ?? Finite(known?.Inlet.Z),
            OutletElevationM = overrides.OutletElevationM ?? Finite(known?.Outlet.Z),
        };
        var farM = (road is null ? 0 : Math.Max(upper.AwayM, lower.AwayM) + (road.WidthM / 2) + (road.SideSlope * 60)) / Math.Cos(Math.Min(skew ?? 0, 80) * Math.PI / 180);
        var bed = new ChannelBed(crossing, direction, accumulation, elevation, windowM, windowM + Math.Max(farM, given.LengthM ?? 0));
        double up = double.NaN, down = double.NaN;
        if (road is not null && level is not null)
        {
            up = upper.AwayM + ReachM(upper.Road!, given, upper.Level!.Value, skew ?? 0, bed.AtCrossingM, given.InletElevationM, r => bed.UpstreamM(upper.AwayM + r));
            down = lower.AwayM + ReachM(lower.Road!, given, lower.Level!.Value, skew ?? 0, bed.AtCrossingM, given.OutletElevationM, r => bed.DownstreamM(lower.AwayM + r));
        }

        if (given.LengthM is { } whole)
        {
            // A given length is shared out as the measured one, or evenly.
            var upShare = double.IsNaN(up + down) ? 0.5 : up / (up + down);
            (up, down) = (whole * upShare, whole * (1 - upShare));
        }

        var inlet = Figure.Of(given.InletElevationM, bed.UpstreamM(double.IsNaN(up) ? 0 : up), $"bed of the stream smoothed over {windowM:0.#} m upstream of the inlet");
        var outlet = Figure.Of(given.OutletElevationM, bed.DownstreamM(double.IsNaN(down) ? 0 : down), $"bed of the stream smoothed over {windowM:0.#} m downstream of the outlet");
        if (inlet is null || outlet is null) findings.Add(CrossingFindings.BedUnknown.With(inlet is null ? "at the inlet" : "at the outlet"));
        var line = new CulvertLine(crossing.Id)
        {
            Length = Figure.Of(given.LengthM, up + down, LengthText(crossing, skew ?? 0)),
            InletElevation = inlet,
            OutletElevation = outlet,
            RoadElevation = level,
            LowestRoadElevation = Figure.Of(overrides.RoadElevationM, lowest.ElevationM, $"lowest within {settings.RoadReachM:0.#} m of the crossing"),
            LowestRoadStationM = double.IsNaN(lowest.StationM) ? null : lowest.StationM,
            SkewDeg = skew,
            Profile = profile,
            Line = known is { } ends && overrides.LengthM is null ? Between(ends.Inlet, inlet, ends.Outlet, outlet) : double.IsNaN(up + down) ? null : Barrel(crossing, up, down, skew, inlet, outlet),
        };
        if (line.SlopeMPerM <= 0) findings.Add(CrossingFindings.AdverseBed.With($"slope {line.SlopeMPerM:0.0000} m/m from {inlet!.Value:0.00} m to {outlet!.Value:0.00} m", line.SlopeMPerM, 0));
        if (line.FillHeightM <= 0) findings.Add(CrossingFindings.NoFill.With($"road {level!.Value:0.00} m, inlet bed {inlet!.Value:0.00} m", line.FillHeightM, 0));
        if (road is not null && cellM > road.WidthM && new[] { line.InletElevation, line.OutletElevation, line.Length }.Any(f => f is { Origin: FigureOrigin.Measured }))
            findings.Add(CrossingFindings.TerrainCoarse.With($"cells of {cellM:0.#} m, road {road.WidthM:0.#} m wide", cellM, road.WidthM));
        Filled(crossing, filledDepthM, settings, findings);
        return line with { Findings = [.. findings.Select(f => f.At(crossing.Id))] };
    }

    /// <summary>The outermost road on one side and its distance from the crossing's point.</summary>
    private sealed record EndRoad(RoadAlignment? Road, double AwayM, Figure? Level)
    {
        public static EndRoad Of(Crossing crossing, bool upstream, Figure? level)
        {
            if (crossing.Over.Count < 2) return new(crossing.Road, 0, level);
            var over = upstream ? crossing.Over[0] : crossing.Over[^1];
            return new(over.Road, ReferenceEquals(over.Road, crossing.Road) ? 0 : crossing.Point.Distance(over.Road.PointAt(over.StationM)), level);
        }
    }

    private static string LengthText(Crossing crossing, double skewDeg) => crossing.Road is not { } road ? "" : crossing.Over.Count > 1
        ? $"(under {string.Join(", ", crossing.Over.Select(o => o.Road.Name))}; skew {skewDeg:0} deg)"
        : $"({road.WidthM:0.##} m wide, side slopes {road.SideSlope:0.##} to 1, skew {skewDeg:0} deg)";

    /// <summary>
    /// Road level at the crossing and lowest level near it. From the terrain the level at the crossing is the highest within one and a half cells or half the
    /// width along the road, because the terrain model may be cut open along the stream; that stretch then stands at that level.
    /// </summary>
    private static (Figure? Level, ProfilePoint Lowest, RoadProfile Profile) RoadLevel(
        RoadAlignment road, double stationM, Grid<float> elevation, CrossingOverrides overrides, CulvertLineSettings settings, double cellM, List<Finding> findings)
    {
        var stepM = Math.Max(cellM / 2, 1);
        var profile = RoadProfile.Sample(road, stationM - settings.RoadReachM, stationM + settings.RoadReachM, stepM, elevation);
        var fromTerrain = profile.Origin == RoadLevelOrigin.Terrain;
        var nearM = fromTerrain ? Math.Max(1.5 * cellM, road.WidthM / 2) : 0;
        var near = RoadProfile.Sample(road, stationM - nearM, stationM + nearM, stepM, elevation).Points;
        var measured = near.Count == 0 ? double.NaN : near.Max(p => p.ElevationM);
        if (fromTerrain && !double.IsNaN(measured))
        {
            profile = profile with
            {
                Points = [.. profile.Points.Select(p => Math.Abs(p.StationM - stationM) <= nearM ? p with { ElevationM = measured } : p)],
            };
            if (overrides.RoadElevationM is null) findings.Add(CrossingFindings.RoadLevelFromDem.With($"{measured:0.00} m, cells of {cellM:0.##} m", measured));
        }

        var how = profile.Origin switch
        {
            RoadLevelOrigin.Table => "given road profile",
            RoadLevelOrigin.Line => "elevations of the road's line",
            _ => $"highest terrain across the road within {nearM:0.#} m of the crossing",
        };
        var lowest = profile.Lowest ?? new(double.NaN, double.NaN);
        return (Figure.Of(overrides.RoadElevationM, measured, how), lowest, profile);
    }

    private static double? Skew(Crossing crossing, CrossingOverrides overrides, CulvertLineSettings settings, List<Finding> findings)
    {
        if (overrides.SkewDeg is { } given)
            return given is >= 0 and <= 80 ? given : throw new InputException($"skew of {crossing.Id}", $"{given:0.##} degrees", "0 to 80 degrees from the perpendicular of the road");
        if (crossing.SkewDeg is not { } skew || skew <= settings.LargestSkewDeg) return crossing.SkewDeg;
        findings.Add(CrossingFindings.SkewTurned.With($"flow at {skew:0} deg, barrel at {settings.LargestSkewDeg:0} deg", skew, settings.LargestSkewDeg));
        return settings.LargestSkewDeg;
    }

    private static double ReachM(RoadAlignment road, CrossingOverrides given, double roadM, double skewDeg, double firstBedM, double? givenM, Func<double, double> bedAt)
    {
        var cos = Math.Cos(skewDeg * Math.PI / 180);
        double Reach(double bedM) => (((given.RoadWidthM ?? road.WidthM) / 2) + ((given.SideSlope ?? road.SideSlope) * Math.Max(roadM - bedM, 0))) / cos;
        if (givenM is { } level) return Reach(level);
        if (double.IsNaN(firstBedM)) return double.NaN;
        var reach = Reach(firstBedM);
        for (var i = 0; i < Repetitions; i++)
        {
            // Halving the step keeps a steep bed, or one that jumps from window to window, from swinging.
            var next = (reach + Reach(bedAt(reach))) / 2;
            if (double.IsNaN(next) || Math.Abs(next - reach) < 0.001) return next;
            reach = next;
        }

        return reach;
    }

    private static double? Finite(double? z) => z is { } v && double.IsFinite(v) ? v : null;

    private static LineString Between(Coordinate inlet, Figure? inletZ, Coordinate outlet, Figure? outletZ) => new([
        new CoordinateZ(inlet.X, inlet.Y, inletZ?.Value ?? double.NaN), new CoordinateZ(outlet.X, outlet.Y, outletZ?.Value ?? double.NaN)]);

    private static LineString Barrel(Crossing crossing, double upM, double downM, double? skewDeg, Figure? inlet, Figure? outlet)
    {
        var azimuth = crossing.FlowAzimuthDeg ?? 0;
        if (crossing.Road is { } road && crossing.StationM is { } station)
        {
            // The perpendicular on the side the flow goes to, turned towards the flow by the barrel's skew.
            var alongRoad = road.AzimuthAt(station);
            var relative = ((crossing.FlowAzimuthDeg ?? alongRoad + 90) - alongRoad + 720) % 360;
            var perpendicular = relative < 180 ? 90.0 : 270.0;
            azimuth = alongRoad + perpendicular + (Math.Sign(relative - perpendicular) * (skewDeg ?? 0));
        }

        double sin = Math.Sin(azimuth * Math.PI / 180), cos = Math.Cos(azimuth * Math.PI / 180);
        return new LineString([End(-upM, inlet), End(downM, outlet)]);

        CoordinateZ End(double alongM, Figure? z) => new(crossing.Point.X + (alongM * sin), crossing.Point.Y + (alongM * cos), z?.Value ?? double.NaN);
    }

    private static void Filled(Crossing crossing, Grid<float>? filledDepthM, CulvertLineSettings settings, List<Finding> findings)
    {
        if (filledDepthM is null) return;
        double depth = filledDepthM.Cells[crossing.OutletCell];
        if (depth > settings.FilledDepthLimitM) findings.Add(CrossingFindings.FilledAtCrossing.With($"filled {depth:0.00} m deep", depth, settings.FilledDepthLimitM));
    }
}
