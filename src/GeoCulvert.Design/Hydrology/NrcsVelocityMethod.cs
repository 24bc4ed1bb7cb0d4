using GeoCulvert.Design.Basis;

namespace GeoCulvert.Design.Hydrology;

/// <summary>
/// Time of concentration by travel times along the longest flow path: NRCS National Engineering Handbook part 630, chapter 15, and TR-55 (1986) chapter 3.
/// <para>Notation: n sheet-flow roughness, L length (ft), P2 2-year 24-hour rainfall (in), s slope (ft/ft), Tt travel time (h), V velocity (ft/s),
/// k velocity at unit slope (ft/s), r hydraulic radius (ft).</para>
/// <para>Sheet, TR-55 eq. 3-3: Tt = 0.007 (n L)^0.8 / (P2^0.5 s^0.4), at most 100 ft / 30 m. Shallow concentrated, NEH-630 table 15-3: V = k s^0.5.
/// Channel, TR-55 eq. 3-4: V = 1.49 r^(2/3) s^0.5 / n at bankfull.</para>
/// <para>The path is cut where the sheet flow ends, where the channel begins, where cover changes, and into pieces of about
/// <see cref="PieceLengthM"/>, each with its own slope from the profile: single cells would give flats and steps that the terrain does not have.</para>
/// </summary>
public sealed record NrcsVelocityMethod : ITimeOfConcentration
{
    private const string SheetSource = "TR-55 (1986) eq. 3-3", ShallowSource = "NEH-630 table 15-3", ChannelSource = "TR-55 (1986) eq. 3-4";

    /// <summary>The channel taken when none is given: r 0.3 m, n 0.05 (an assumption of this program, flagged).</summary>
    public static readonly ChannelReach AssumedChannel = new(0.3, 0.05, "assumed");

    /// <inheritdoc/>
    public string Name => "nrcs-velocity";

    /// <summary>Longest sheet flow, m (30 by default, NEH-630 limits it to 100 ft).</summary>
    public double SheetLengthLimitM { get; init; } = 30;

    /// <summary>Length of a piece of the path, m.</summary>
    public double PieceLengthM { get; init; } = 30;

    /// <summary>Least slope, m/m (0.001 by default; common practice).</summary>
    public double LeastSlopeMPerM { get; init; } = 0.001;

    /// <summary>Drained area at which a channel begins when the catchment does not say where, m2; null for none.</summary>
    public double? ChannelAreaM2 { get; init; }

    /// <summary>Surface where the path's cover is unknown.</summary>
    public string DefaultSurface { get; init; } = "short-grass-pasture";

    /// <summary>Surfaces by cover id.</summary>
    public FlowSurfaces Surfaces { get; init; } = FlowSurfaces.Published;

    /// <summary>Travel time of sheet flow, min.</summary>
    public static double SheetTimeMin(double lengthM, double n, double twoYear24HourMm, double slopeMPerM)
    {
        double L = lengthM / Units.Foot, P2 = twoYear24HourMm / 25.4;
        return 60 * 0.007 * Math.Pow(n * L, 0.8) / (Math.Sqrt(P2) * Math.Pow(slopeMPerM, 0.4));
    }

    /// <summary>Velocity of shallow concentrated flow, m/s.</summary>
    public static double ShallowVelocityMPerS(double velocityAtUnitSlopeMPerS, double slopeMPerM) => velocityAtUnitSlopeMPerS * Math.Sqrt(slopeMPerM);

    /// <summary>Velocity in a channel by Manning's equation with the printed 1.49, m/s.</summary>
    public static double ChannelVelocityMPerS(double hydraulicRadiusM, double n, double slopeMPerM)
    {
        var r = hydraulicRadiusM / Units.Foot;
        return Units.Foot * 1.49 * Math.Pow(r, 2.0 / 3) * Math.Sqrt(slopeMPerM) / n;
    }

    /// <inheritdoc/>
    public TimeOfConcentration Compute(Catchment catchment, TimeOfConcentrationContext context)
    {
        var findings = new List<Finding>();
        var rain = context.TwoYear24HourDepthMm is null ? context.Rainfall?.Intensity(1440, 2) : null;
        if ((context.TwoYear24HourDepthMm ?? rain?.DepthMm) is not { } p2 || !(p2 > 0))
            return TimeOfConcentration.Missing(Name, "no 2-year 24-hour rainfall for the sheet flow"
                + (rain is null ? "" : $"; {rain.Origin} does not reach it"));
        if (FlowPathPieces.Path(catchment, findings) is not { } path)
            return TimeOfConcentration.Missing(Name, "no flow path with a profile, nor its length and slope");
        var end = path[^1].DistanceM;
        var channelAt = FlowPathPieces.ChannelBegin(catchment, path, ChannelAreaM2);
        if (channelAt >= end) findings.Add(HydrologyFindings.NoChannel.With($"{end:0} m of flow path without a channel", end));
        var sheetEnd = Math.Min(Math.Min(SheetLengthLimitM, end), channelAt);
        var fallback = Surfaces.Find(DefaultSurface) ?? throw new InvalidOperationException($"No surface '{DefaultSurface}'.");
        var cuts = new FlowPathPieces(path, LeastSlopeMPerM, Surfaces, fallback);
        var segments = new List<TravelSegment>();

        if (sheetEnd > 0)
        {
            var (s, n, names) = (cuts.Slope(0, sheetEnd), cuts.MeanSheetN(0, sheetEnd), cuts.Names(0, sheetEnd));
            var t = SheetTimeMin(sheetEnd, n, p2, s);
            segments.Add(new("sheet", 0, sheetEnd, s, $"{names}, n {n:0.000}", sheetEnd / (60 * t), t,
                $"60 x 0.007 x ({n:0.000} x {sheetEnd / Units.Foot:0.0} ft)^0.8 / (({p2 / 25.4:0.00} in)^0.5 x {s:0.0000}^0.4)"));
        }
        foreach (var (from, to, surface) in cuts.Cut(sheetEnd, Math.Min(channelAt, end), PieceLengthM, byCover: true))
        {
            var s = cuts.Slope(from, to);
            var v = ShallowVelocityMPerS(surface.ShallowVelocityMPerS, s);
            segments.Add(new("shallow", from, to, s, surface.Name, v, (to - from) / v / 60,
                $"{to - from:0.0} m / ({surface.ShallowVelocityMPerS:0.00} m/s x {s:0.0000}^0.5) / 60"));
        }
        var channel = catchment.Channel ?? AssumedChannel;
        foreach (var (from, to, _) in cuts.Cut(channelAt, end, PieceLengthM, byCover: false))
        {
            var s = cuts.Slope(from, to);
            var v = ChannelVelocityMPerS(channel.HydraulicRadiusM, channel.ManningN, s);
            segments.Add(new("channel", from, to, s, $"r {channel.HydraulicRadiusM:0.00} m, n {channel.ManningN:0.000} ({channel.Origin})", v, (to - from) / v / 60,
                $"{to - from:0.0} m / (0.3048 x 1.49 x ({channel.HydraulicRadiusM / Units.Foot:0.00} ft)^(2/3) x {s:0.0000}^0.5 / {channel.ManningN:0.000}) / 60"));
        }
        if (catchment.Channel is null && channelAt < end)
            findings.Add(HydrologyFindings.ChannelAssumed.With(
                $"{end - channelAt:0} m of channel with hydraulic radius {channel.HydraulicRadiusM:0.00} m and n {channel.ManningN:0.000}"));
        cuts.Report(findings, Math.Min(channelAt, end), DefaultSurface);

        double Sum(string kind) => segments.Where(g => g.Kind == kind).Sum(g => g.TimeMin);
        double sheet = Sum("sheet"), shallow = Sum("shallow"), inChannel = Sum("channel");
        return new(Name, sheet + shallow + inChannel, segments,
        [
            new("two_year_24_hour_depth_mm", p2, "mm", "", rain?.Origin ?? "given"),
            new("sheet_length_m", sheetEnd, "m"),
            new("shallow_length_m", Math.Min(channelAt, end) - sheetEnd, "m"),
            new("channel_length_m", Math.Max(end - channelAt, 0), "m"),
            new("sheet_time_min", sheet, "min", segments.FirstOrDefault(g => g.Kind == "sheet")?.Formula ?? "", SheetSource),
            new("shallow_time_min", shallow, "min", "sum of L / (k s^0.5) over the pieces", ShallowSource),
            new("channel_time_min", inChannel, "min", "sum of L / V over the pieces", ChannelSource),
            new("time_of_concentration_min", sheet + shallow + inChannel, "min", $"{sheet:0.00} + {shallow:0.00} + {inChannel:0.00}", "NEH-630 ch. 15"),
        ], [.. findings, .. rain?.Findings ?? []]);
    }
}
