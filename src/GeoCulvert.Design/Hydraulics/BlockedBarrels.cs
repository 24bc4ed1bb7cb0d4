using GeoCulvert.Design.Basis;

namespace GeoCulvert.Design.Hydraulics;

/// <summary>One flow through barrels that are blocked in part.</summary>
/// <param name="BlockedShare">Share of the area of every barrel that is blocked, 0-1.</param>
/// <param name="Clean">The rating without blockage.</param>
/// <param name="Silted">The rating with the share filled from the bed up.</param>
/// <param name="Narrowed">The rating with barrels of the same shape and the area that is left.</param>
public sealed record BlockedRating(double BlockedShare, CulvertRating Clean, CulvertRating Silted, CulvertRating Narrowed)
{
    /// <summary>Which of the two kinds of blockage stands higher: "silted" or "narrowed".</summary>
    public string Governing => Silted.HeadwaterElevationM >= Narrowed.HeadwaterElevationM ? "silted" : "narrowed";

    /// <summary>Headwater elevation: the higher of both kinds of blockage and the clean barrel, m.</summary>
    public double HeadwaterElevationM => Math.Max(Clean.HeadwaterElevationM, Math.Max(Silted.HeadwaterElevationM, Narrowed.HeadwaterElevationM));

    /// <summary>Rise of the headwater by the blockage, m.</summary>
    public double RiseM => HeadwaterElevationM - Clean.HeadwaterElevationM;

    /// <summary>Doubts.</summary>
    public IReadOnlyList<Finding> Findings { get; init; } = [];
}

/// <summary>
/// A case of blockage (own rule, on the high side): the share of the area of every barrel is lost over its whole length, once filled level from the bed up, with both inverts
/// raised to the fill (silt), and once as barrels of the same shape and less area on the same inverts (debris); inlet coefficients stay those of the clean inlet with
/// the area and rise that are left. The higher headwater counts.
/// </summary>
public static class BlockedBarrels
{
    /// <summary>Largest share that is rated; beyond it a barrel is as good as closed.</summary>
    public const double LargestShare = 0.95;

    /// <summary>Rates a flow with a share of every barrel blocked.</summary>
    /// <param name="site">Culvert, tailwater and road.</param>
    /// <param name="flowM3PerS">Total flow, m3/s.</param>
    /// <param name="blockedShare">Share of the area that is blocked, 0 to <see cref="LargestShare"/>.</param>
    public static BlockedRating Rate(CulvertSite site, double flowM3PerS, double blockedShare)
    {
        ArgumentNullException.ThrowIfNull(site);
        ArgumentOutOfRangeException.ThrowIfNegative(blockedShare);
        ArgumentOutOfRangeException.ThrowIfGreaterThan(blockedShare, LargestShare);
        var clean = CulvertHydraulics.Rate(site, flowM3PerS);
        if (blockedShare == 0) return new(0, clean, clean, clean);
        var b = site.Barrels;
        var silt = new SiltedSection(b.Section, blockedShare);
        CulvertRating Of(CulvertBarrels barrels) => CulvertHydraulics.Rate(site with { Barrels = barrels }, flowM3PerS);
        var silted = Of(b with { Section = silt, InletElevationM = b.InletElevationM + silt.FillM, OutletElevationM = b.OutletElevationM + silt.FillM });
        var narrowed = Of(b with { Section = Narrowed(b.Section, blockedShare) });
        var result = new BlockedRating(blockedShare, clean, silted, narrowed);
        return result with
        {
            Findings =
            [
                HydraulicsFindings.Blocked.With(
                    $"{100 * blockedShare:0} % blocked raises the headwater by {result.RiseM:0.00} m to {result.HeadwaterElevationM:0.00} m ({result.Governing})", result.HeadwaterElevationM, clean.HeadwaterElevationM),
            ],
        };
    }

    private static ISection Narrowed(ISection section, double share) => section switch
    {
        BoxSection box => box with { WidthM = box.WidthM * (1 - share) },
        CircleSection circle => circle with { DiameterM = circle.DiameterM * Math.Sqrt(1 - share) },
        _ => new SiltedSection(section, share),
    };
}

/// <summary>A closed section filled level from its bed up by a share of its area; depths are above the fill.</summary>
public sealed class SiltedSection : ISection
{
    private readonly ISection _whole;
    private readonly double _fillArea, _fillPerimeter, _fillCentroid;

    /// <summary>Fills a section.</summary>
    /// <param name="whole">Closed section.</param>
    /// <param name="share">Share of its area that is filled, above 0, below 1.</param>
    public SiltedSection(ISection whole, double share)
    {
        ArgumentNullException.ThrowIfNull(whole);
        ArgumentOutOfRangeException.ThrowIfNegativeOrZero(share);
        ArgumentOutOfRangeException.ThrowIfGreaterThanOrEqual(share, 1);
        _whole = whole;
        FillM = RootFinding.Bracketed(y => whole.AreaM2(y) - (share * whole.FullAreaM2), 0, whole.RiseM);
        (_fillArea, _fillPerimeter, _fillCentroid) = (whole.AreaM2(FillM), whole.WettedPerimeterM(FillM), whole.CentroidDepthM(FillM));
        BedWidthM = whole.TopWidthM(FillM);
        PeakConveyanceDepthM = Peak();
    }

    /// <summary>Depth of the fill, m.</summary>
    public double FillM { get; }

    /// <summary>Width of the fill at its top, m.</summary>
    public double BedWidthM { get; }

    /// <inheritdoc/>
    public double RiseM => _whole.RiseM - FillM;

    /// <inheritdoc/>
    public double SpanM => _whole.SpanM;

    /// <inheritdoc/>
    public double FullAreaM2 => _whole.FullAreaM2 - _fillArea;

    /// <inheritdoc/>
    public double FullPerimeterM => _whole.FullPerimeterM - _fillPerimeter + BedWidthM;

    /// <inheritdoc/>
    public double PeakConveyanceDepthM { get; }

    /// <inheritdoc/>
    public double AreaM2(double depthM) => Math.Max(0, _whole.AreaM2(FillM + Math.Clamp(depthM, 0, RiseM)) - _fillArea);

    /// <inheritdoc/>
    public double TopWidthM(double depthM) => _whole.TopWidthM(FillM + depthM);

    /// <inheritdoc/>
    public double WettedPerimeterM(double depthM) => _whole.WettedPerimeterM(FillM + depthM) - _fillPerimeter + BedWidthM;

    /// <inheritdoc/>
    public double CentroidDepthM(double depthM)
    {
        var area = AreaM2(depthM);
        if (area <= 0) return 0;
        var whole = _whole.AreaM2(FillM + depthM) * _whole.CentroidDepthM(FillM + depthM);
        return Math.Max(0, (whole - (_fillArea * (_fillCentroid + depthM))) / area);
    }

    /// <summary>Depth of the largest conveyance, by golden section between half the rise and the crown.</summary>
    private double Peak()
    {
        var ratio = (Math.Sqrt(5) - 1) / 2;
        double low = RiseM / 2, high = RiseM * (1 - 1e-12);
        var crown = OpenChannelFlow.ConveyanceFactor(this, high);
        while (high - low > 1e-9 * RiseM)
        {
            double a = high - (ratio * (high - low)), b = low + (ratio * (high - low));
            if (OpenChannelFlow.ConveyanceFactor(this, a) > OpenChannelFlow.ConveyanceFactor(this, b)) high = b;
            else low = a;
        }

        return crown >= OpenChannelFlow.ConveyanceFactor(this, low) ? RiseM : low;
    }
}
