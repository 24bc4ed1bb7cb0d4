using GeoCulvert.Design.Basis;

namespace GeoCulvert.Design.Hydraulics;

/// <summary>A rating written out line by line, formulas with the numbers put in, for a reviewer to follow.</summary>
public static class RatingSteps
{
    private const string Hds5 = "FHWA HDS-5, 2nd ed.";

    /// <summary>The steps of a rating.</summary>
    public static IReadOnlyList<Step> Of(CulvertRating rating)
    {
        ArgumentNullException.ThrowIfNull(rating);
        var b = rating.Site.Barrels;
        var (D, A, S) = (b.Section.RiseM, b.Section.FullAreaM2, b.SlopeMPerM);
        var Q = rating.BarrelFlowM3PerS / b.Count;
        var p = rating.Profile;
        var steps = new List<Step>
        {
            new("flow_m3_s", rating.FlowM3PerS, "m3/s"),
            new("barrel_flow_m3_s", Q, "m3/s", $"{rating.BarrelFlowM3PerS:G4} / {b.Count} barrel(s)"),
            new("rise_m", D, "m"),
            new("area_m2", A, "m2", "one barrel, full"),
            new("slope", S, "m/m", $"({b.InletElevationM:0.000} - {b.OutletElevationM:0.000}) / {b.LengthM:0.00}"),
            new("critical_depth_m", p.CriticalDepthM, "m", "Q2 T = g A3", "Chow 1959, sec. 4-4"),
        };
        if (p.NormalDepthM is { } yn) steps.Add(new Step("normal_depth_m", yn, "m", $"Q = A R^(2/3) S^(1/2) / n, n = {b.RoughnessN:0.####}", "Chow 1959, sec. 6-6"));
        if (Q <= 0) return steps;
        steps.AddRange(InletSteps(rating, Q, D, A, S));
        steps.AddRange(OutletSteps(rating, Q));
        steps.Add(new Step("headwater_m", rating.HeadwaterM, "m", $"the higher of {rating.InletControlHeadwaterM:0.000} (inlet) and {rating.OutletControlHeadwaterM:0.000} (outlet): {rating.Control} control"));
        if (rating.IsBetweenFreeAndFull)
            steps.Add(new Step("own_headwater_m", rating.OwnHeadwaterM, "m", "the barrels pass from free to full flow: at this flow they stand anywhere from here to the headwater above, which the road sets"));
        steps.Add(new Step("headwater_elevation_m", rating.HeadwaterElevationM, "m", $"{b.InletElevationM:0.000} + {rating.HeadwaterM:0.000}"));
        if (rating.RoadFlowM3PerS > 0)
            steps.Add(new Step("road_flow_m3_s", rating.RoadFlowM3PerS, "m3/s", $"sum of kt Cr L HWr^1.5 over strips of the road, lowest level {rating.Site.Road!.LowestM:0.000} m", RoadOvertopping.Source.ToString()));
        steps.Add(new Step("outlet_velocity_m_s", rating.OutletVelocityMPerS, "m/s", $"Q / A at {p.OutletDepthM:0.000} m: {Q:G4} / {b.Section.AreaM2(p.OutletDepthM):G4}"));
        return steps;
    }

    private static IEnumerable<Step> InletSteps(CulvertRating rating, double Q, double D, double A, double S)
    {
        var inlet = rating.Site.Barrels.Inlet;
        var X = rating.Inlet.XNumber;
        yield return new Step("x_number", X, "", $"X = Ku Q / (A D^0.5) = {InletControl.Ku} x {Q:G4} / ({A:G4} x {D:G4}^0.5)", $"{Hds5}, app. A");
        var slope = Math.Max(0, S);
        var formula = (rating.Inlet.Range, inlet.Form) switch
        {
            ("unsubmerged", 1) => $"D (Hc/D + K X^M + Ks S) = {D:G4} ({rating.Inlet.CriticalHeadRatio:0.0000} + {inlet.K} x {X:0.000}^{inlet.M} + {inlet.Ks} x {slope:0.0000})",
            ("unsubmerged", _) => $"D K X^M = {D:G4} x {inlet.K} x {X:0.000}^{inlet.M}",
            ("submerged", _) => $"D (c X^2 + Y + Ks S) = {D:G4} ({inlet.C} x {X:0.000}^2 + {inlet.Y} + {inlet.Ks} x {slope:0.0000})",
            _ => $"cubic between X = {InletControl.UnsubmergedToX} and {InletControl.SubmergedFromX}",
        };
        yield return new Step("inlet_control_headwater_m", rating.InletControlHeadwaterM, "m", formula, inlet.Source.ToString());
    }

    private static IEnumerable<Step> OutletSteps(CulvertRating rating, double Q)
    {
        var b = rating.Site.Barrels;
        var p = rating.Profile;
        var depth = Math.Min(p.InletDepthM, b.Section.RiseM);
        var V = Q / b.Section.AreaM2(depth);
        yield return new Step("tailwater_depth_m", rating.TailwaterElevationM - b.OutletElevationM, "m", $"{rating.TailwaterElevationM:0.000} - {b.OutletElevationM:0.000}");
        yield return new Step("inlet_depth_m", p.InletDepthM, "m", $"water-surface profile {p.Name}", "Chow 1959, ch. 9-11");
        yield return new Step(
            "outlet_control_headwater_m", p.HeadwaterM, "m",
            $"y + (1 + ke) V^2/2g = {p.InletDepthM:0.000} + (1 + {b.EntranceLossCoefficient:0.##}) x {V:0.000}^2 / (2 x {OpenChannelFlow.GravityMPerS2})", $"{Hds5}, ch. III");
        yield return new Step(
            "shorthand_outlet_headwater_m", rating.Shorthand.HeadwaterM, "m",
            $"H + ho - S L = {rating.Shorthand.HeadLossM:0.000} + {rating.Shorthand.OutletHeadM:0.000} - {b.SlopeMPerM:0.00000} x {b.LengthM:0.00}"
            + (rating.Shorthand.IsInRange ? "" : "; below 0.75 D, not to be used"), $"{Hds5}, ch. III, eqs. 5 and 7");
    }
}
