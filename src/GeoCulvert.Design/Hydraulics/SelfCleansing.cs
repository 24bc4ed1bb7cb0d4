using GeoCulvert.Design.Basis;

namespace GeoCulvert.Design.Hydraulics;

/// <summary>What a barrel must reach at a small flow to keep itself clean.</summary>
public enum CleansingMeasure
{
    /// <summary>Mean velocity.</summary>
    Velocity,

    /// <summary>Mean shear on the wetted perimeter.</summary>
    Shear,
}

/// <summary>The criterion of self-cleansing.</summary>
/// <param name="Measure">Velocity or shear.</param>
/// <param name="Least">Least value, m/s or Pa.</param>
/// <param name="Origin">Where it comes from.</param>
public sealed record CleansingCriterion(CleansingMeasure Measure, double Least, string Origin)
{
    /// <summary>0.9 m/s (3 ft/s): common practice for culverts at a flow of two years or less.</summary>
    public static CleansingCriterion Common { get; } = new(CleansingMeasure.Velocity, 3 * Units.Foot, "common practice: 3 ft/s");
}

/// <summary>Whether a barrel keeps itself clean at a small flow; SI.</summary>
/// <param name="FlowM3PerS">The small flow, m3/s.</param>
/// <param name="DepthM">Greatest depth along the barrel, where the flow is slowest, m.</param>
/// <param name="VelocityMPerS">Velocity there, m/s.</param>
/// <param name="ShearPa">Shear there, Pa.</param>
/// <param name="Criterion">Criterion.</param>
/// <param name="IsMet">Whether it is met.</param>
/// <param name="Findings">A finding when it is not.</param>
public sealed record SelfCleansing(
    double FlowM3PerS, double DepthM, double VelocityMPerS, double ShearPa, CleansingCriterion Criterion, bool IsMet, IReadOnlyList<Finding> Findings)
{
    private const double Weight = OutletConditions.WaterDensityKgPerM3 * OpenChannelFlow.GravityMPerS2;

    /// <summary>Checks the slowest place of a rating at a small flow, commonly that of two years.</summary>
    /// <param name="rating">Rating at the small flow.</param>
    /// <param name="criterion">Criterion.</param>
    /// <returns>Null where the barrels carry nothing.</returns>
    public static SelfCleansing? Of(CulvertRating rating, CleansingCriterion criterion)
    {
        ArgumentNullException.ThrowIfNull(rating);
        ArgumentNullException.ThrowIfNull(criterion);
        if (rating.BarrelFlowM3PerS <= 0) return null;
        var b = rating.Site.Barrels;
        var flow = rating.BarrelFlowM3PerS / b.Count;
        var depth = Math.Min(b.Section.RiseM, rating.Profile.Points.Max(p => p.DepthM));
        var velocity = flow / b.Section.AreaM2(depth);
        var shear = MeanShearPa(b.Section, flow, b.RoughnessN, depth);
        var (value, unit) = criterion.Measure == CleansingMeasure.Velocity ? (velocity, "m/s") : (shear, "Pa");
        var met = value >= criterion.Least;
        return new(rating.FlowM3PerS, depth, velocity, shear, criterion, met, met ? [] :
        [
            HydraulicsFindings.SiltsUp.With($"{value:0.00} {unit} at {rating.FlowM3PerS:G3} m3/s and {depth:0.00} m depth, least {criterion.Least:0.00} {unit} ({criterion.Origin})", value, criterion.Least),
        ]);
    }

    /// <summary>Mean shear on the wetted perimeter, Pa: rho g R Sf (Chow 1959, sec. 7-13), Sf by Manning.</summary>
    internal static double MeanShearPa(ISection section, double flowM3PerS, double roughnessN, double depthM)
    {
        if (depthM >= section.RiseM)
            return Weight * section.FullAreaM2 / section.FullPerimeterM * OpenChannelFlow.FullFrictionSlope(section, flowM3PerS, roughnessN);
        return Weight * section.AreaM2(depthM) / section.WettedPerimeterM(depthM) * OpenChannelFlow.FrictionSlope(section, flowM3PerS, roughnessN, depthM);
    }
}
