using GeoCulvert.Design.Basis;

namespace GeoCulvert.Design.Hydrology;

/// <summary>Finds the time of concentration at which a method's time and the intensity over that time agree.</summary>
internal static class IntensityIteration
{
    private const double ShortestMin = 0.1, LongestMin = 60 * 24 * 60, Ratio = 1.25;

    /// <summary>The time and its intensity; null when the rainfall gives nothing at all.</summary>
    /// <param name="rain">Rainfall.</param>
    /// <param name="returnPeriodYr">Return period, years.</param>
    /// <param name="timeMin">Time (min) for an intensity (mm/h); falls as the intensity rises.</param>
    /// <param name="method">Name for the findings.</param>
    /// <param name="findings">Receives doubts.</param>
    public static (double TimeMin, RainfallIntensity Rain)? Solve(
        IRainfall rain, double returnPeriodYr, Func<double, double> timeMin, string method, List<Finding> findings)
    {
        double? low = null, last = null;
        double Gap(double t) => t - timeMin(rain.Intensity(t, returnPeriodYr).IntensityMmPerH!.Value);
        for (var t = ShortestMin; t <= LongestMin; t *= Ratio)
        {
            if (rain.Intensity(t, returnPeriodYr).IntensityMmPerH is null) continue;
            last = t;
            if (Gap(t) < 0)
            {
                low = t;
                continue;
            }
            if (low is null) return End(t);
            var root = RootFinding.Bracketed(Gap, low.Value, t);
            var found = rain.Intensity(root, returnPeriodYr);
            findings.AddRange(found.Findings);
            return (root, found);
        }
        return last is { } end ? End(end) : null;

        (double, RainfallIntensity) End(double t)
        {
            var found = rain.Intensity(t, returnPeriodYr);
            var time = timeMin(found.IntensityMmPerH!.Value);
            findings.Add(TimeFindings.IterationEnd.With($"{method}: {time:0.0} min with the intensity over {t:0.0} min", time, t));
            return (time, found);
        }
    }

    /// <summary>What such a method needs and has not, or null.</summary>
    public static string? Missing(TimeOfConcentrationContext context) =>
        context.Rainfall is null ? "no rainfall" : context.ReturnPeriodYr is { } t && t > 0 ? null : "no return period for its intensity";
}

/// <summary>
/// Time of concentration after Papadakis and Kazan (1987), iterated with the intensity over that time.
/// <para>Notation: L flow path (ft), n roughness of the land, S slope (ft/ft), i intensity (in/h), t time (min).</para>
/// <para>t = 0.66 L^0.5 n^0.52 S^-0.31 i^-0.38 (coefficients from memory).</para>
/// <para>Range: basins up to 500 acres (from memory).</para>
/// </summary>
/// <param name="RoughnessN">n; null takes the mean sheet-flow roughness of the covers along the flow path.</param>
/// <param name="Slope">Which slope is S; fall over length by default.</param>
public sealed record PapadakisKazan(double? RoughnessN = null, FlowPathSlope Slope = FlowPathSlope.EndToEnd) : ITimeOfConcentration
{
    private const string Origin = "Papadakis and Kazan (1987), coefficients from memory";

    /// <inheritdoc/>
    public string Name => "papadakis-kazan";

    /// <summary>Roughness by cover id.</summary>
    public FlowSurfaces Surfaces { get; init; } = FlowSurfaces.Published;

    /// <summary>The equation itself.</summary>
    /// <param name="lengthM">L, m.</param>
    /// <param name="roughnessN">n.</param>
    /// <param name="slopeMPerM">S, above zero, m/m.</param>
    /// <param name="intensityMmPerH">i, mm/h.</param>
    /// <returns>Time, min.</returns>
    public static double TimeMin(double lengthM, double roughnessN, double slopeMPerM, double intensityMmPerH)
    {
        double L = lengthM / Units.Foot, n = roughnessN, S = slopeMPerM, i = intensityMmPerH / 25.4;
        return 0.66 * Math.Sqrt(L) * Math.Pow(n, 0.52) * Math.Pow(S, -0.31) * Math.Pow(i, -0.38);
    }

    /// <inheritdoc/>
    public TimeOfConcentration Compute(Catchment catchment, TimeOfConcentrationContext context)
    {
        if (IntensityIteration.Missing(context) is { } lack) return TimeOfConcentration.Missing(Name, lack);
        var (length, slope, missing) = TimeInputs.Path(catchment, Slope);
        if (missing is not null) return TimeOfConcentration.Missing(Name, missing);
        var (n, origin) = Roughness(catchment);
        if (!(n > 0)) return TimeOfConcentration.Missing(Name, "no roughness given, and not every cover along the flow path is known");
        var findings = new List<Finding>();
        TimeInputs.Range(findings, Name, "area", catchment.AreaM2, 0, 500 * TimeInputs.AcreM2, 1e4, "ha");
        if (IntensityIteration.Solve(context.Rainfall!, context.ReturnPeriodYr!.Value, i => TimeMin(length, n.Value, slope, i), Name, findings) is not { } solved)
            return TimeOfConcentration.Missing(Name, $"no intensity in {context.Rainfall!.Origin}");
        var rate = solved.Rain.IntensityMmPerH!.Value;
        return new(Name, solved.TimeMin, [],
        [
            new("flow_path_length_m", length, "m"),
            new("flow_path_slope_m_per_m", slope, "m/m", "", TimeInputs.Origin(Slope)),
            new("roughness", n.Value, "", "", origin),
            new("intensity_mm_per_h", rate, "mm/h", $"over {solved.Rain.DurationMin:0.00} min, found by iteration", solved.Rain.Origin),
            new("time_of_concentration_min", solved.TimeMin, "min",
                $"0.66 x ({length / Units.Foot:0.0} ft)^0.5 x {n:0.000}^0.52 x {slope:0.00000}^-0.31 x ({rate / 25.4:0.000} in/h)^-0.38", Origin),
        ], findings);
    }

    private (double? N, string Origin) Roughness(Catchment catchment)
    {
        if (RoughnessN is { } given) return (given, "setting");
        var path = catchment.FlowPath;
        double sum = 0, length = 0;
        for (var k = 0; k + 1 < path.Count; k++)
        {
            if (Surfaces.Find(path[k].CoverId) is not { } surface) return (null, "");
            sum += surface.SheetN * (path[k + 1].DistanceM - path[k].DistanceM);
            length += path[k + 1].DistanceM - path[k].DistanceM;
        }
        return length > 0 ? (sum / length, "sheet-flow roughness of the covers along the flow path, by length") : (null, "");
    }
}

/// <summary>
/// Travel times with kinematic-wave sheet flow, HEC-22 (4th ed., 2024) chapter 4, iterated with the intensity over the whole time of concentration.
/// <para>Notation: n sheet-flow roughness, L length (m), S slope (m/m), i intensity (mm/h), t time (min).</para>
/// <para>Sheet: t = 6.92 (n L / S^0.5)^0.6 / i^0.4 with m and mm/h, 0.933 with ft and in/h. Shallow and channel flow: as the NRCS velocity method.</para>
/// <para>Range: sheet flow up to 30 m (100 ft), by the setting of <see cref="Path"/>.</para>
/// </summary>
public sealed record KinematicWave : ITimeOfConcentration
{
    private const string Origin = "HEC-22 (4th ed., 2024) ch. 4";

    /// <inheritdoc/>
    public string Name => "kinematic-wave";

    /// <summary>How the flow path is cut, and how its shallow and channel parts run.</summary>
    public NrcsVelocityMethod Path { get; init; } = new();

    /// <summary>The sheet-flow equation itself.</summary>
    /// <param name="lengthM">L, m.</param>
    /// <param name="n">Roughness n.</param>
    /// <param name="slopeMPerM">S, above zero, m/m.</param>
    /// <param name="intensityMmPerH">i, mm/h.</param>
    /// <returns>Time, min.</returns>
    public static double SheetTimeMin(double lengthM, double n, double slopeMPerM, double intensityMmPerH) =>
        6.92 / Math.Pow(intensityMmPerH, 0.4) * Math.Pow(n * lengthM / Math.Sqrt(slopeMPerM), 0.6);

    /// <inheritdoc/>
    public TimeOfConcentration Compute(Catchment catchment, TimeOfConcentrationContext context)
    {
        if (IntensityIteration.Missing(context) is { } lack) return TimeOfConcentration.Missing(Name, lack);
        // The velocity method cuts the path; its sheet time is put aside, so the depth it is given does not matter.
        const double anyDepthMm = 100;
        var cut = Path.Compute(catchment, context with { TwoYear24HourDepthMm = anyDepthMm });
        if (cut.TimeMin is null) return new(Name, null, [], [], cut.Findings);
        var findings = cut.Findings.ToList();
        var rest = cut.Segments.Where(s => s.Kind != "sheet").Sum(s => s.TimeMin);
        if (cut.Segments.FirstOrDefault(s => s.Kind == "sheet") is not { } sheet)
            return new(Name, rest, cut.Segments, [new("time_of_concentration_min", rest, "min", "no sheet flow on the path", Origin)], findings);
        double length = sheet.ToM - sheet.FromM, slope = sheet.SlopeMPerM;
        // n from the sheet time itself, which is linear in (n L)^0.8.
        var n = Math.Pow(sheet.TimeMin / NrcsVelocityMethod.SheetTimeMin(length, 1, anyDepthMm, slope), 1 / 0.8);
        if (IntensityIteration.Solve(context.Rainfall!, context.ReturnPeriodYr!.Value, i => rest + SheetTimeMin(length, n, slope, i), Name, findings) is not { } solved)
            return TimeOfConcentration.Missing(Name, $"no intensity in {context.Rainfall!.Origin}");
        double rate = solved.Rain.IntensityMmPerH!.Value, time = SheetTimeMin(length, n, slope, rate);
        var formula = $"6.92 / ({rate:0.00} mm/h)^0.4 x ({n:0.000} x {length:0.00} m / {slope:0.0000}^0.5)^0.6";
        return new(Name, time + rest, [sheet with { TimeMin = time, VelocityMPerS = length / (60 * time), Formula = formula }, .. cut.Segments.Where(s => s.Kind != "sheet")],
        [
            new("sheet_length_m", length, "m"),
            new("sheet_roughness", n, ""),
            new("intensity_mm_per_h", rate, "mm/h", $"over {solved.Rain.DurationMin:0.00} min, found by iteration", solved.Rain.Origin),
            new("sheet_time_min", time, "min", formula, Origin),
            new("shallow_and_channel_time_min", rest, "min", "sum of L / V over the pieces", "NEH-630 ch. 15"),
            new("time_of_concentration_min", time + rest, "min", $"{time:0.00} + {rest:0.00}", Origin),
        ], findings);
    }
}
