using GeoCulvert.Design.Basis;

namespace GeoCulvert.Design.Hydrology;

/// <summary>
/// Time of overland flow after Kerby (1959), as in TxDOT Hydraulic Design Manual eq. 4-14.
/// <para>Notation: L overland length (ft), N retardance, S slope (ft/ft), t time (min).</para>
/// <para>t = 0.828 (L N)^0.467 S^-0.235 with feet, 1.44 with metres.</para>
/// <para>Range: L at most 1200 ft (366 m); N from 0.02 (paving) over 0.40 (average grass) to 0.80 (dense grass, woods with deep litter).</para>
/// </summary>
/// <param name="RetardanceN">N; null when not known, which is a finding.</param>
/// <param name="Slope">Which slope is S; fall over length by default.</param>
public sealed record Kerby(double? RetardanceN, FlowPathSlope Slope = FlowPathSlope.EndToEnd) : ITimeOfConcentration
{
    /// <summary>Longest overland flow behind the equation, m.</summary>
    public const double LongestOverlandM = 1200 * Units.Foot;

    internal const double LeastN = 0.02, MostN = 0.80;
    internal const string Origin = "Kerby (1959), TxDOT Hydraulic Design Manual eq. 4-14";

    /// <inheritdoc/>
    public string Name => "kerby";

    /// <summary>The equation itself.</summary>
    /// <param name="lengthM">L, m.</param>
    /// <param name="retardanceN">N.</param>
    /// <param name="slopeMPerM">S, above zero.</param>
    /// <returns>Time, min.</returns>
    public static double TimeMin(double lengthM, double retardanceN, double slopeMPerM)
    {
        double L = lengthM / Units.Foot, N = retardanceN, S = slopeMPerM;
        return 0.828 * Math.Pow(L * N, 0.467) * Math.Pow(S, -0.235);
    }

    /// <inheritdoc/>
    public TimeOfConcentration Compute(Catchment catchment, TimeOfConcentrationContext context)
    {
        if (RetardanceN is not { } n || !(n > 0)) return TimeOfConcentration.Missing(Name, "no retardance above zero");
        var (length, slope, missing) = TimeInputs.Path(catchment, Slope);
        if (missing is not null) return TimeOfConcentration.Missing(Name, missing);
        var findings = new List<Finding>();
        TimeInputs.Range(findings, Name, "overland length", length, 0, LongestOverlandM, 1, "m");
        TimeInputs.Range(findings, Name, "retardance", n, LeastN, MostN, 1, "");
        var time = TimeMin(length, n, slope);
        return new(Name, time, [],
        [
            new("flow_path_length_m", length, "m"),
            new("flow_path_slope_m_per_m", slope, "m/m", "", TimeInputs.Origin(Slope)),
            new("retardance", n, "", "", "setting"),
            new("time_of_concentration_min", time, "min", $"0.828 x ({length / Units.Foot:0.0} ft x {n:0.00})^0.467 x {slope:0.00000}^-0.235", Origin),
        ], findings);
    }
}

/// <summary>
/// Kerby for the overland part and Kirpich for the rest, TxDOT Hydraulic Design Manual eq. 4-13 after Roussel et al. (2005).
/// <para>t = t(Kerby over the overland length and its own slope) + t(Kirpich over the length that remains, with the slope of the whole path).</para>
/// <para>Range: 0.25 to 150 square miles, main channel 1 to 50 miles, main channel slope 0.002 to 0.02.</para>
/// </summary>
/// <param name="RetardanceN">N of the overland part; null when not known, which is a finding.</param>
public sealed record KerbyKirpich(double? RetardanceN) : ITimeOfConcentration
{
    private const string Origin = "TxDOT Hydraulic Design Manual eq. 4-13";
    private const double Mile = 5280 * Units.Foot;

    /// <inheritdoc/>
    public string Name => "kerby-kirpich";

    /// <summary>Overland length given outright, m; null ends it where the channel begins, at most at 366 m.</summary>
    public double? OverlandLengthM { get; init; }

    /// <summary>Slope of the overland part given outright, m/m; null takes it from the profile, or the slope of the path where there is none.</summary>
    public double? OverlandSlopeMPerM { get; init; }

    /// <summary>Least slope of the overland part, m/m (0.001 by default; common practice).</summary>
    public double LeastSlopeMPerM { get; init; } = 0.001;

    /// <summary>Drained area at which the channel begins where the catchment does not say, m2; null for none.</summary>
    public double? ChannelAreaM2 { get; init; }

    /// <inheritdoc/>
    public TimeOfConcentration Compute(Catchment catchment, TimeOfConcentrationContext context)
    {
        if (RetardanceN is not { } n || !(n > 0)) return TimeOfConcentration.Missing(Name, "no retardance above zero");
        if (OverlandLengthM is < 0 or double.NaN) return TimeOfConcentration.Missing(Name, "an overland length below zero");
        var (length, slope, missing) = TimeInputs.Path(catchment, FlowPathSlope.EndToEnd);
        if (missing is not null) return TimeOfConcentration.Missing(Name, missing);
        var findings = new List<Finding>();
        var path = FlowPathPieces.Path(catchment, findings)!;
        var begin = FlowPathPieces.ChannelBegin(catchment, path, ChannelAreaM2);
        var overland = Math.Min(length, OverlandLengthM ?? Math.Min(begin, Kerby.LongestOverlandM));
        double overlandSlope = slope, kerby = 0;
        if (overland > 0)
        {
            var surfaces = FlowSurfaces.Published;
            var cuts = new FlowPathPieces(path, LeastSlopeMPerM, surfaces, surfaces.Find("short-grass-pasture")!);
            overlandSlope = OverlandSlopeMPerM ?? cuts.Slope(0, Math.Min(overland, path[^1].DistanceM));
            if (!(overlandSlope > 0)) return TimeOfConcentration.Missing(Name, "no slope of the overland part above zero");
            cuts.Report(findings, 0, "");
            kerby = Kerby.TimeMin(overland, n, overlandSlope);
        }
        var rest = length - overland;
        var kirpich = rest > 0 ? Kirpich.TimeMin(rest, slope) : 0;
        TimeInputs.Range(findings, Name, "overland length", overland, 0, Kerby.LongestOverlandM, 1, "m");
        TimeInputs.Range(findings, Name, "retardance", n, Kerby.LeastN, Kerby.MostN, 1, "");
        TimeInputs.Range(findings, Name, "area", catchment.AreaM2, 0.25 * TimeInputs.SquareMileM2, 150 * TimeInputs.SquareMileM2, 1e6, "km2");
        TimeInputs.Range(findings, Name, "flow path", length, Mile, 50 * Mile, 1000, "km");
        TimeInputs.Range(findings, Name, "slope", slope, 0.002, 0.02, 1, "m/m");
        TravelSegment Segment(string kind, double from, double to, double s, string surface, double t, string formula) => new(kind, from, to, s, surface, (to - from) / (60 * t), t, formula);
        var segments = new List<TravelSegment>();
        var first = $"0.828 x ({overland / Units.Foot:0.0} ft x {n:0.00})^0.467 x {overlandSlope:0.00000}^-0.235";
        var second = $"0.0078 x ({rest / Units.Foot:0.0} ft)^0.77 x {slope:0.00000}^-0.385";
        if (overland > 0) segments.Add(Segment("sheet", 0, overland, overlandSlope, $"retardance {n:0.00}", kerby, first));
        if (rest > 0) segments.Add(Segment("channel", overland, length, slope, "Kirpich", kirpich, second));
        return new(Name, kerby + kirpich, segments,
        [
            new("flow_path_length_m", length, "m"),
            new("flow_path_slope_m_per_m", slope, "m/m", "", TimeInputs.Origin(FlowPathSlope.EndToEnd)),
            new("overland_length_m", overland, "m", "", OverlandLengthM is null ? "to the channel, at most 366 m" : "setting"),
            new("overland_slope_m_per_m", overlandSlope, "m/m"),
            new("retardance", n, "", "", "setting"),
            new("overland_time_min", kerby, "min", overland > 0 ? first : "", Kerby.Origin),
            new("channel_time_min", kirpich, "min", rest > 0 ? second : "", "Kirpich (1940)"),
            new("time_of_concentration_min", kerby + kirpich, "min", $"{kerby:0.00} + {kirpich:0.00}", Origin),
        ], findings);
    }
}
