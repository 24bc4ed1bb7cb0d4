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

    /// <summary>A level road.</summary>
    public static RoadCrest Level(double elevationM, double lengthM, double widthM, RoadSurface surface) =>
        new([(0, elevationM), (lengthM, elevationM)], widthM, surface);
}

/// <summary>
/// Flow over a road as over a broad-crested weir (FHWA HDS-5, 2nd ed., ch. III, eq. 8): Q = kt Cr L HWr^1.5, summed over strips of the profile.
/// Cr and kt are read from tables whose status is MEMORY (within 3 % of the published chart); US unit of Cr times 0.552 is SI.
/// </summary>
public static class RoadOvertopping
{
    private const double UsToSi = 0.552;
    private const double DeepFromRatio = 0.15;
    private const int Strips = 4;
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
        if (headwaterM <= crest.LowestM) return 0;
        var flow = 0.0;
        for (var i = 1; i < crest.Profile.Count; i++)
        {
            var (s0, z0) = crest.Profile[i - 1];
            var (s1, z1) = crest.Profile[i];
            if (z0 > z1) (s0, z0, s1, z1) = (s1, z1, s0, z0);
            if (headwaterM <= z0 || s0 == s1) continue;
            // The wet part of the segment in strips of even width, each at its middle level.
            var wet = z1 > headwaterM ? (headwaterM - z0) / (z1 - z0) : 1;
            var length = Math.Abs(s1 - s0) * wet;
            var strips = z0 == z1 ? 1 : Strips;
            for (var k = 0; k < strips; k++)
            {
                var z = z0 + ((z1 - z0) * wet * (k + 0.5) / strips);
                var head = headwaterM - z;
                var kt = tailwaterM > z ? SubmergenceFactor((tailwaterM - z) / head, crest.Surface) : 1;
                flow += kt * UsToSi * CoefficientUs(head, crest.WidthM, crest.Surface) * length / strips * head * Math.Sqrt(head);
            }
        }

        return flow;
    }

    private static Curve[] Read(string curve) =>
    [
        .. Surfaces.Select(surface => Published.Rows.Where(r => r.Text("curve") == curve && r.Text("surface") == surface).ToArray())
            .Select(rows => new Curve([.. rows.Select(r => r.Number("x"))], [.. rows.Select(r => r.Number("value"))])),
    ];

    /// <summary>A curve of the chart, straight between its points and held at its ends.</summary>
    private sealed class Curve(double[] x, double[] value)
    {
        public double At(double at)
        {
            if (at <= x[0]) return value[0];
            for (var i = 1; i < x.Length; i++)
            {
                if (at <= x[i]) return value[i - 1] + ((value[i] - value[i - 1]) * (at - x[i - 1]) / (x[i] - x[i - 1]));
            }

            return value[^1];
        }
    }
}
