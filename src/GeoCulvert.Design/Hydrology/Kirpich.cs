using GeoCulvert.Design.Basis;

namespace GeoCulvert.Design.Hydrology;

/// <summary>Which slope of the flow path a method takes.</summary>
public enum FlowPathSlope
{
    /// <summary>Fall of the whole path over its length.</summary>
    EndToEnd,

    /// <summary>Between 10 % and 85 % of the length.</summary>
    TenToEightyFive,
}

/// <summary>
/// Time of concentration after Kirpich (1940), Civil Engineering 10(6), p. 362.
/// <para>Notation: L length of the longest flow path (ft), S its slope (ft/ft), tc time of concentration (min), m multiplier for the surface.</para>
/// <para>tc = m 0.0078 L^0.77 S^-0.385. The coefficients are seen in TxDOT Hydraulic Design Manual eq. 4-15 (0.0078 ft, 0.0195 m: the exact
/// conversion is 0.01947).</para>
/// <para>Range: seven farm basins in Tennessee of 1 to 112 acres and 3 to 10 % slope (figures from memory).</para>
/// </summary>
/// <param name="Slope">Which slope is S; fall over length by default.</param>
/// <param name="SurfaceFactor">m: 1 for bare or farmed ground with well-defined channels; practice multiplies by 2 for grassed overland flow,
/// 0.4 for paved surfaces and 0.2 for concrete channels (common practice, from memory).</param>
public sealed record Kirpich(FlowPathSlope Slope = FlowPathSlope.EndToEnd, double SurfaceFactor = 1) : ITimeOfConcentration
{
    private const string Origin = "Kirpich (1940)";
    private const double SmallestAreaM2 = 1 * 43560 * Units.Foot * Units.Foot, LargestAreaM2 = 112 * 43560 * Units.Foot * Units.Foot;
    private const double LeastSlope = 0.03, MostSlope = 0.10;

    /// <inheritdoc/>
    public string Name => "kirpich";

    /// <summary>The equation itself.</summary>
    /// <param name="lengthM">Length of the flow path, m.</param>
    /// <param name="slopeMPerM">Slope, m/m, above zero.</param>
    /// <returns>Time of concentration, min.</returns>
    public static double TimeMin(double lengthM, double slopeMPerM)
    {
        double L = lengthM / Units.Foot, S = slopeMPerM;
        return 0.0078 * Math.Pow(L, 0.77) * Math.Pow(S, -0.385);
    }

    /// <inheritdoc/>
    public TimeOfConcentration Compute(Catchment catchment, TimeOfConcentrationContext context)
    {
        var slope = Slope == FlowPathSlope.EndToEnd ? catchment.FlowPathEndToEndSlopeMPerM : catchment.FlowPathSlope1085MPerM;
        if (catchment.LongestFlowPathM is not { } length || !(length > 0)) return TimeOfConcentration.Missing(Name, "no length of the longest flow path");
        if (slope is not { } s || !(s > 0)) return TimeOfConcentration.Missing(Name, $"no slope of the longest flow path above zero ({slope?.ToString("G4") ?? "none"})");
        var findings = new List<Finding>();
        if (catchment.AreaM2 is < SmallestAreaM2 or > LargestAreaM2)
            findings.Add(HydrologyFindings.KirpichRange.With(
                $"Area {catchment.AreaM2 / 1e4:G4} ha against {SmallestAreaM2 / 1e4:0.0} to {LargestAreaM2 / 1e4:0} ha",
                catchment.AreaM2, catchment.AreaM2 < SmallestAreaM2 ? SmallestAreaM2 : LargestAreaM2));
        if (s is < LeastSlope or > MostSlope)
            findings.Add(HydrologyFindings.KirpichRange.With(
                $"Slope {s:0.0000} m/m against {LeastSlope:0.00} to {MostSlope:0.00}", s, s < LeastSlope ? LeastSlope : MostSlope));
        var time = SurfaceFactor * TimeMin(length, s);
        return new(Name, time, [],
        [
            new("flow_path_length_m", length, "m"),
            new("flow_path_slope_m_per_m", s, "m/m", "", Slope == FlowPathSlope.EndToEnd ? "fall over length" : "between 10 % and 85 % of the length"),
            new("time_of_concentration_min", time, "min",
                $"{SurfaceFactor:G4} x 0.0078 x ({length / Units.Foot:0.0} ft)^0.77 x {s:0.00000}^-0.385", Origin),
        ], findings);
    }
}
