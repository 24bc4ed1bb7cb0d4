using GeoCulvert.Design.Basis;
using GeoCulvert.Design.Hydraulics;

namespace GeoCulvert.Design.Sizing;

/// <summary>The flow at which an existing culvert reaches a criterion.</summary>
/// <param name="Name">The criterion, as in sizing; "overtopping" for the lowest road level.</param>
/// <param name="Limit">Its limit, SI.</param>
/// <param name="Kind">What the limit measures.</param>
/// <param name="FlowM3PerS">Largest flow that meets it, m3/s; 0 when it is broken with no flow; null when no flow within reach breaks it.</param>
/// <param name="ReturnPeriodYr">Return period of that flow, years; null outside the flows known.</param>
/// <param name="FailsAtYr">The shortest return period asked for whose flow breaks it; null when none does.</param>
public sealed record CriterionCapacity(string Name, double Limit, QuantityKind Kind, double? FlowM3PerS, double? ReturnPeriodYr, double? FailsAtYr);

/// <summary>How an existing culvert stands.</summary>
/// <param name="Capacities">Every criterion, the smallest capacity first.</param>
/// <param name="Floods">The rating at each return period, rising.</param>
public sealed record ExistingAssessment(IReadOnlyList<CriterionCapacity> Capacities, IReadOnlyList<(double ReturnPeriodYr, CulvertRating Rating)> Floods)
{
    /// <summary>The criterion that fails first; null when all hold at every flow known.</summary>
    public CriterionCapacity? First => Capacities.Where(c => c.FailsAtYr is not null).OrderBy(c => c.FailsAtYr).ThenBy(c => c.FlowM3PerS).FirstOrDefault();
}

/// <summary>Rates an existing culvert with the code that sizes new ones: at each criterion the flow that just meets it, and the flood that first breaks it.</summary>
public static class ExistingCulvert
{
    // Far above any culvert: where a criterion still holds, it is taken as out of reach.
    private const double MostM3PerS = 5000;

    /// <summary>Assesses a culvert.</summary>
    /// <param name="site">Culvert, tailwater and road.</param>
    /// <param name="criteria">Criteria; cover and smallest rise are for new ones and left out.</param>
    /// <param name="floods">Return period and flow, rising.</param>
    public static ExistingAssessment Assess(CulvertSite site, SizingCriteria criteria, IReadOnlyList<(double ReturnPeriodYr, double FlowM3PerS)> floods)
    {
        ArgumentNullException.ThrowIfNull(site);
        ArgumentNullException.ThrowIfNull(criteria);
        ArgumentNullException.ThrowIfNull(floods);
        double invert = site.Barrels.InletElevationM, rise = site.Barrels.Section.RiseM;
        var limits = new List<(string Name, double Limit, QuantityKind Kind, double HeadwaterElevationM)>
        {
            ("HW/D", criteria.LargestHeadwaterRatio, QuantityKind.None, invert + (criteria.LargestHeadwaterRatio * rise)),
        };
        if (criteria.LargestHeadwaterDepthM is { } depth) limits.Add(("headwater depth", depth, QuantityKind.Length, invert + depth));
        if (criteria.HighestHeadwaterElevationM is { } level) limits.Add(("headwater elevation", level, QuantityKind.Length, level));
        if (site.Road is { } road)
        {
            limits.Add(("freeboard", criteria.FreeboardM, QuantityKind.Length, road.LowestM - criteria.FreeboardM));
            limits.Add(("overtopping", road.LowestM, QuantityKind.Length, road.LowestM));
        }

        var capacities = limits.Select(l => Capacity(l.Name, l.Limit, l.Kind, q => CulvertHydraulics.Rate(site, q).HeadwaterElevationM - l.HeadwaterElevationM, floods)).ToList();
        if (criteria.LargestOutletVelocityMPerS is { } fastest)
            capacities.Add(Capacity("outlet velocity", fastest, QuantityKind.Velocity, q => CulvertHydraulics.Rate(site, q).OutletVelocityMPerS - fastest, floods));
        return new(
            [.. capacities.OrderBy(c => c.FlowM3PerS ?? double.PositiveInfinity).ThenBy(c => c.Name, StringComparer.Ordinal)],
            [.. floods.Select(f => (f.ReturnPeriodYr, CulvertHydraulics.Rate(site, f.FlowM3PerS)))]);
    }

    private static CriterionCapacity Capacity(
        string name, double limit, QuantityKind kind, Func<double, double> excess, IReadOnlyList<(double ReturnPeriodYr, double FlowM3PerS)> floods)
    {
        double? flow;
        if (excess(0) > 0) flow = 0;
        else
        {
            double low = 0, high = Math.Max(0.01, floods.Count > 0 ? floods[^1].FlowM3PerS : 1);
            while (high <= MostM3PerS && excess(high) <= 0) (low, high) = (high, 2 * high);
            flow = high > MostM3PerS ? null : RootFinding.Bracketed(excess, low, high);
        }

        double? failsAt = flow is { } q ? floods.Where(f => f.FlowM3PerS > q && excess(f.FlowM3PerS) > 1e-9).Select(f => (double?)f.ReturnPeriodYr).FirstOrDefault() : null;
        return new(name, limit, kind, flow, flow is { } capacity ? PeriodOf(capacity, floods) : null, failsAt);
    }

    /// <summary>Return period of a flow: log of flow linear in the log of the return period between the floods known; null outside.</summary>
    private static double? PeriodOf(double flow, IReadOnlyList<(double ReturnPeriodYr, double FlowM3PerS)> floods)
    {
        for (var i = 1; i < floods.Count; i++)
        {
            var ((t0, q0), (t1, q1)) = (floods[i - 1], floods[i]);
            if (q0 <= 0 || q1 <= q0 || flow < q0 || flow > q1) continue;
            return Math.Exp(Math.Log(t0) + (Math.Log(t1 / t0) * Math.Log(flow / q0) / Math.Log(q1 / q0)));
        }

        return null;
    }
}
