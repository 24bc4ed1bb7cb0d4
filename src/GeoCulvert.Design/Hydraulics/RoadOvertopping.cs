using GeoCulvert.Design.Basis;

namespace GeoCulvert.Design.Hydraulics;

/// <summary>Surface of a road, for its discharge coefficient.</summary>
public enum RoadSurface
{
    /// <summary>Paved.</summary>
    Paved,

    /// <summary>Gravel.</summary>
    Gravel,
}

/// <summary>The road as a weir: its profile across the flow.</summary>
/// <param name="Profile">Station along the road and crest elevation, m; rising stations, two points or more.</param>
/// <param name="WidthM">Width of the road along the flow, m.</param>
/// <param name="Surface">Surface.</param>
public sealed record RoadCrest(IReadOnlyList<(double StationM, double ElevationM)> Profile, double WidthM, RoadSurface Surface)
{
    /// <summary>Lowest crest level, m.</summary>
    public double LowestM { get; } = Profile.Min(p => p.ElevationM);

    // Segments as lower end, upper end and length, the lowest first, so that a flow over the road meets only the wet ones.
    internal (double LowM, double HighM, double LengthM)[] Segments { get; } =
    [
        .. Profile.Zip(Profile.Skip(1), (a, b) => (LowM: Math.Min(a.ElevationM, b.ElevationM), HighM: Math.Max(a.ElevationM, b.ElevationM), LengthM: Math.Abs(b.StationM - a.StationM)))
            .Where(s => s.LengthM > 0).OrderBy(s => s.LowM),
    ];

    /// <summary>A level road.</summary>
    public static RoadCrest Level(double elevationM, double lengthM, double widthM, RoadSurface surface) =>
        new([(0, elevationM), (lengthM, elevationM)], widthM, surface);
}

/// <summary>
/// Flow over a road as over a broad-crested weir (FHWA HDS-5, 2nd ed., ch. III, eq. 8): Q = kt Cr L HWr^1.5, summed over the profile.
/// Cr and kt are read from tables whose status is MEMORY (within 3 % of the published chart); US unit of Cr times 0.552 is SI.
/// </summary>
public static class RoadOvertopping
{
    private const double UsToSi = 0.552;
    private const double DeepFromRatio = 0.15;

    // Places of two-point Gauss quadrature on a sloping segment: within 0.3 % of the integral of HWr^1.5 where the segment runs dry, far closer elsewhere.
    private static readonly double[] Places = [0.5 - (0.5 / Math.Sqrt(3)), 0.5 + (0.5 / Math.Sqrt(3))];
    private static readonly PublishedTable Published = PublishedTable.Embedded("Hydraulics/Tables/road_overtopping.csv");
    private static readonly string[] Surfaces = ["paved", "gravel"]; // in the order of RoadSurface
    private static readonly Curve[] Shallow = Read("shallow"), Deep = Read("deep"), Submergence = Read("submergence");

    /// <summary>Source of the coefficients, with its status.</summary>
    public static Source Source => Published.Rows[0].Source;

    /// <summary>Discharge coefficient Cr, US unit, for a head over the road.</summary>
    /// <param name="headM">Head HWr, m.</param>
    /// <param name="widthM">Road width Lr along the flow, m.</param>
    /// <param name="surface">Surface.</param>
    public static double CoefficientUs(double headM, double widthM, RoadSurface surface)
    {
        var ratio = headM / widthM;
        var shallow = Shallow[(int)surface].At(Math.Min(headM, DeepFromRatio * widthM) / Units.Foot);
        // The two published curves do not meet exactly; the larger keeps flow rising with head.
        return ratio <= DeepFromRatio ? shallow : Math.Max(shallow, Deep[(int)surface].At(ratio));
    }

    /// <summary>Submergence factor kt for the ratio of tailwater to headwater above the crest.</summary>
    public static double SubmergenceFactor(double ratio, RoadSurface surface) => Submergence[(int)surface].At(Math.Clamp(ratio, 0, 1));

    /// <summary>Flow over the road, m3/s.</summary>
    /// <param name="crest">Road.</param>
    /// <param name="headwaterM">Headwater elevation, m.</param>
    /// <param name="tailwaterM">Tailwater elevation, m.</param>
    public static double FlowM3PerS(RoadCrest crest, double headwaterM, double tailwaterM)
    {
        ArgumentNullException.ThrowIfNull(crest);
        var flow = 0.0;
        foreach (var (low, high, lengthM) in crest.Segments)
        {
            if (headwaterM <= low) break;
            if (low == high)
            {
                flow += lengthM * UnitFlow(crest, headwaterM - low, tailwaterM - low);
                continue;
            }

            // The wet part of a sloping segment.
            var wet = high > headwaterM ? (headwaterM - low) / (high - low) : 1;
            foreach (var place in Places)
            {
                var z = low + ((high - low) * wet * place);
                flow += lengthM * wet / 2 * UnitFlow(crest, headwaterM - z, tailwaterM - z);
            }
        }

        return flow;
    }

    /// <summary>
    /// Headwater elevation at which a flow goes over the road, m: the inverse of <see cref="FlowM3PerS"/>, never below the tailwater. Where the road is drowned and
    /// would pass more already at the level of the tailwater (the published submergence curve of gravel ends above 0), it is the tailwater.
    /// </summary>
    /// <param name="crest">Road.</param>
    /// <param name="flowM3PerS">Flow over the road, m3/s.</param>
    /// <param name="tailwaterM">Tailwater elevation, m.</param>
    public static double LevelM(RoadCrest crest, double flowM3PerS, double tailwaterM)
    {
        ArgumentNullException.ThrowIfNull(crest);
        ArgumentOutOfRangeException.ThrowIfNegative(flowM3PerS);
        var least = Math.Max(crest.LowestM, tailwaterM);
        if (flowM3PerS == 0) return least;
        // Searched as a height above the least level, in a power in which flow is nearly straight.
        var root = Math.Cbrt(flowM3PerS * flowM3PerS);
        double Excess(double above)
        {
            var q = FlowM3PerS(crest, least + above, tailwaterM);
            return Math.Cbrt(q * q) - root;
        }

        double low = 0, high = 1;
        while (Excess(high) < 0) (low, high) = (high, 2 * high);
        for (; low == 0 && high > 1e-12; high /= 4)
        {
            if (Excess(high / 4) >= 0) continue;
            low = high / 4;
            break;
        }

        return low == 0 ? least : least + RootFinding.Bracketed(Excess, low, high);
    }

    /// <summary>Flow over a metre of road, m2/s, by heads above its crest.</summary>
    private static double UnitFlow(RoadCrest crest, double headM, double tailwaterHeadM)
    {
        var kt = tailwaterHeadM > 0 ? SubmergenceFactor(tailwaterHeadM / headM, crest.Surface) : 1;
        return kt * UsToSi * CoefficientUs(headM, crest.WidthM, crest.Surface) * headM * Math.Sqrt(headM);
    }

    private static Curve[] Read(string curve) =>
    [
        .. Surfaces.Select(surface => Published.Rows.Where(r => r.Text("curve") == curve && r.Text("surface") == surface).ToArray())
            .Select(rows => new Curve([.. rows.Select(r => r.Number("x"))], [.. rows.Select(r => r.Number("value"))])),
    ];

    /// <summary>A curve of the chart, straight between its points and held at its ends.</summary>
    private sealed class Curve(double[] x, double[] value)
    {
        private readonly double[] _slope = [.. x.Skip(1).Select((next, i) => (value[i + 1] - value[i]) / (next - x[i]))];

        public double At(double at)
        {
            if (at <= x[0]) return value[0];
            for (var i = 1; i < x.Length; i++)
            {
                if (at <= x[i]) return value[i - 1] + (_slope[i - 1] * (at - x[i - 1]));
            }

            return value[^1];
        }
    }
}
