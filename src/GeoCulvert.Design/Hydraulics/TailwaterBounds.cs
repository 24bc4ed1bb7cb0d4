using GeoCulvert.Design.Basis;

namespace GeoCulvert.Design.Hydraulics;

/// <summary>A tailwater raised or lowered: its depth above a bed times a factor.</summary>
/// <param name="Expected">The tailwater as expected.</param>
/// <param name="BedElevationM">Bed, m.</param>
/// <param name="DepthFactor">Factor on the depth above the bed.</param>
public sealed record ScaledTailwater(ITailwater Expected, double BedElevationM, double DepthFactor) : ITailwater
{
    /// <inheritdoc/>
    public string Description => FormattableString.Invariant($"{DepthFactor:0.##} times the depth of: {Expected.Description}");

    /// <inheritdoc/>
    public double ElevationM(double flowM3PerS) => BedElevationM + (DepthFactor * Math.Max(0, Expected.ElevationM(flowM3PerS) - BedElevationM));
}

/// <summary>One flow with a low, the expected and a high tailwater: headwater by the high one, outlet velocity and protection by the low one.</summary>
/// <param name="Low">Rating with the low tailwater.</param>
/// <param name="Expected">Rating as expected.</param>
/// <param name="High">Rating with the high tailwater.</param>
public sealed record TailwaterBounds(CulvertRating Low, CulvertRating Expected, CulvertRating High)
{
    /// <summary>Whether the control is not the same with both.</summary>
    public bool ControlChanges => Low.Control != High.Control;

    /// <summary>Doubts.</summary>
    public IReadOnlyList<Finding> Findings { get; init; } = [];

    /// <summary>Rates a flow with both bounds.</summary>
    /// <param name="site">Culvert with the expected tailwater.</param>
    /// <param name="low">Low tailwater.</param>
    /// <param name="high">High tailwater, not below the low one.</param>
    /// <param name="flowM3PerS">Total flow, m3/s.</param>
    public static TailwaterBounds Rate(CulvertSite site, ITailwater low, ITailwater high, double flowM3PerS)
    {
        ArgumentNullException.ThrowIfNull(site);
        ArgumentNullException.ThrowIfNull(low);
        ArgumentNullException.ThrowIfNull(high);
        if (low.ElevationM(flowM3PerS) > high.ElevationM(flowM3PerS)) throw new ArgumentException("The low tailwater lies above the high one.", nameof(low));
        var bounds = new TailwaterBounds(
            CulvertHydraulics.Rate(site with { Tailwater = low }, flowM3PerS), CulvertHydraulics.Rate(site, flowM3PerS), CulvertHydraulics.Rate(site with { Tailwater = high }, flowM3PerS));
        if (!bounds.ControlChanges) return bounds;
        var (l, h) = (bounds.Low, bounds.High);
        return bounds with
        {
            Findings =
            [
                HydraulicsFindings.TailwaterMovesControl.With(
                    $"{l.Control} control and headwater {l.HeadwaterElevationM:0.00} m at tailwater {l.TailwaterElevationM:0.00} m; {h.Control} control and headwater {h.HeadwaterElevationM:0.00} m at tailwater {h.TailwaterElevationM:0.00} m",
                    h.HeadwaterElevationM, l.HeadwaterElevationM),
            ],
        };
    }
}
