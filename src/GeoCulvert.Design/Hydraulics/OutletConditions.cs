using GeoCulvert.Design.Basis;

namespace GeoCulvert.Design.Hydraulics;

/// <summary>The flow where it leaves a barrel; SI.</summary>
/// <param name="DepthM">Depth, not above the rise, m.</param>
/// <param name="VelocityMPerS">Velocity V, m/s.</param>
/// <param name="FroudeNumber">Froude number; null when the outlet is full.</param>
/// <param name="ChannelVelocityMPerS">Velocity Vd in the channel below; null when it is not counted.</param>
/// <param name="ExitLossM">Exit loss, m.</param>
/// <param name="ShearPa">Mean shear on the wetted perimeter, Pa.</param>
/// <param name="Steps">The calculation line by line.</param>
public sealed record OutletConditions(
    double DepthM, double VelocityMPerS, double? FroudeNumber, double? ChannelVelocityMPerS, double ExitLossM, double ShearPa, IReadOnlyList<Step> Steps)
{
    /// <summary>Density of water, kg/m3, at 4 degrees C; the weight in shear is this times g.</summary>
    public const double WaterDensityKgPerM3 = 1000;

    /// <summary>
    /// Outlet depth, velocity, Froude number, exit loss and shear of a rating:
    /// <code>
    /// ho = (V^2 - Vd^2) / 2g     (FHWA HDS-5, 2nd ed., ch. III; Vd = 0 where it is not counted)      shear = rho g R Sf
    /// </code>
    /// The exit loss is what the water gives up between the outlet and the channel; the energy line of the channel lies Vd^2/2g above the tailwater, so that
    /// the pressure line at a drowned outlet is the tailwater with or without Vd and the headwater does not depend on it.
    /// </summary>
    /// <param name="rating">Rating.</param>
    /// <param name="channelVelocityMPerS">Velocity in the channel below the outlet, m/s; null not to count it.</param>
    /// <returns>Null where the barrels carry nothing.</returns>
    public static OutletConditions? Of(CulvertRating rating, double? channelVelocityMPerS = null)
    {
        ArgumentNullException.ThrowIfNull(rating);
        if (rating.BarrelFlowM3PerS <= 0) return null;
        var b = rating.Site.Barrels;
        var Q = rating.BarrelFlowM3PerS / b.Count;
        var y = rating.Profile.OutletDepthM;
        var A = b.Section.AreaM2(y);
        var (V, g) = (Q / A, OpenChannelFlow.GravityMPerS2);
        // A channel faster than the barrel gives nothing back.
        var Vd = Math.Min(channelVelocityMPerS ?? 0, V);
        var loss = ((V * V) - (Vd * Vd)) / (2 * g);
        var shear = SelfCleansing.MeanShearPa(b.Section, Q, b.RoughnessN, y);
        List<Step> steps =
        [
            new("outlet_depth_m", y, "m", rating.Profile.Name.Length > 0 ? $"water-surface profile {rating.Profile.Name}" : ""),
            new("outlet_velocity_m_s", V, "m/s", $"Q / A = {Q:G4} / {A:G4}"),
            .. rating.OutletFroudeNumber is { } fr ? new[] { new Step("outlet_froude_number", fr, "", "V / (g A/T)^(1/2)", "Chow 1959, sec. 3-3") } : [],
            new("exit_loss_m", loss, "m", $"(V^2 - Vd^2) / 2g = ({V:0.000}^2 - {Vd:0.000}^2) / (2 x {g})", "FHWA HDS-5, 2nd ed., ch. III"),
            new("outlet_shear_pa", shear, "Pa", "rho g R Sf", "Chow 1959, sec. 7-13"),
        ];
        return new(y, V, rating.OutletFroudeNumber, channelVelocityMPerS, loss, shear, steps);
    }
}
