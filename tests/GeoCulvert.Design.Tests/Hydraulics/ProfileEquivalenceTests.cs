using GeoCulvert.Design.Hydraulics;
using MathNet.Numerics.OdeSolvers;

namespace GeoCulvert.Design.Tests.Hydraulics;

/// <summary>The profile against an independent integration: Runge-Kutta 4 of MathNet.Numerics on dy/dx = (S - Sf)/(1 - Fr2), fine steps.</summary>
public class ProfileEquivalenceTests
{
    // shape, span, rise, flow, n, length, slope, tailwater depth, class of Chow
    public static TheoryData<string, double, double, double, double, double, double, double, string> Barrels() => new()
    {
        { "circle", 1.5, 1.5, 2.0, 0.024, 60, 0.002, 0.2, "M2" },
        { "box", 2.0, 1.5, 4.0, 0.015, 80, 0.001, 0.2, "M2" },
        { "circle", 1.5, 1.5, 1.0, 0.012, 80, 0.001, 1.2, "M1" },
        { "box", 2.0, 1.5, 3.0, 0.012, 60, 0.002, 1.4, "M1" },
        { "circle", 1.5, 1.5, 1.5, 0.012, 40, 0.0, 0.1, "H2" },
        { "box", 2.0, 1.5, 3.0, 0.013, 50, 0.0, 0.1, "H2" },
        { "circle", 1.8, 1.8, 1.5, 0.012, 30, -0.004, 0.1, "A2" },
        { "box", 2.0, 1.8, 3.0, 0.013, 30, -0.005, 0.1, "A2" },
        { "circle", 1.5, 1.5, 2.0, 0.012, 20, 0.02, 0.1, "S2" },
        { "box", 2.0, 1.5, 4.0, 0.012, 20, 0.03, 0.1, "S2" },
    };

    [Theory]
    [MemberData(nameof(Barrels))]
    public void DepthsAgreeWithinATenthOfAPercent(string shape, double span, double rise, double flow, double n, double length, double slope, double tailwater, string chow)
    {
        ISection section = shape == "circle" ? new CircleSection(rise) : new BoxSection(span, rise);
        var profile = BarrelFlow.Profile(section, flow, n, 0.5, length, slope, tailwater);
        Assert.Equal(chow, profile.Name);
        double Derivative(double y)
        {
            double a = section.AreaM2(y), t = section.TopWidthM(y), r = a / section.WettedPerimeterM(y);
            return (slope - Math.Pow(flow * n / a, 2) / Math.Pow(r, 4.0 / 3)) / (1 - (flow * flow * t / (OpenChannelFlow.GravityMPerS2 * a * a * a)));
        }

        // Both ends of the surface are singular at critical depth: begin a little way from it, where the program's own surface passes.
        var supercritical = chow == "S2";
        var points = supercritical ? profile.Points : [.. profile.Points.Reverse()];
        var first = points.First(p => Math.Abs(p.DepthM - profile.CriticalDepthM) > 0.01 * rise);
        var last = points[^1];
        const int steps = 20000;
        var y = RungeKutta.FourthOrder(first.DepthM, first.DistanceM, last.DistanceM, steps, (_, depth) => Derivative(depth));
        foreach (var p in points.SkipWhile(p => p != first))
        {
            var at = (int)Math.Round((p.DistanceM - first.DistanceM) / (last.DistanceM - first.DistanceM) * (steps - 1));
            Assert.Equal(y[Math.Clamp(at, 0, steps - 1)], p.DepthM, 0.001 * p.DepthM);
        }

        // From critical depth to there: the distance by a fine trapezoid sum of dx/dy.
        double sum = 0, from = points[0].DepthM;
        for (var k = 0; k < 20000; k++)
        {
            double a = from + ((first.DepthM - from) * k / 20000), b = from + ((first.DepthM - from) * (k + 1) / 20000);
            sum += (b - a) / Derivative((a + b) / 2);
        }

        Assert.Equal(first.DistanceM - points[0].DistanceM, sum, Math.Max(0.002, 0.002 * Math.Abs(sum)));
    }

    [Fact]
    public void AFullBarrelHasTheClosedEnergy()
    {
        var section = new BoxSection(1.2, 1.0);
        const double Q = 3, n = 0.013, ke = 0.5, L = 50, S = 0.004, TW = 1.6;
        var profile = BarrelFlow.Profile(section, Q, n, ke, L, S, TW);
        Assert.Equal("full", profile.Name);
        Assert.Equal(L, profile.FullLengthM, 1e-9);
        double V = Q / 1.2, R = 1.2 / 4.4, g = 9.80665;
        var H = (1 + ke + (2 * g * n * n * L / Math.Pow(R, 4.0 / 3))) * V * V / (2 * g);
        Assert.Equal(TW - (S * L) + H, profile.HeadwaterM, 1e-9);
    }

    [Theory]
    [InlineData("circle", 0.9)]
    [InlineData("box", 1.05)]
    public void AJumpBalancesSpecificForce(string shape, double tailwater)
    {
        ISection section = shape == "circle" ? new CircleSection(1.5) : new BoxSection(1.5, 1.5);
        var profile = BarrelFlow.Profile(section, 1.6, 0.012, 0.5, 60, 0.012, tailwater);
        Assert.Equal("S2 + S1", profile.Name);
        var at = profile.JumpAtM!.Value;
        var pair = profile.Points.Where(p => p.DistanceM == at).Select(p => OpenChannelFlow.SpecificForceM3(section, 1.6, p.DepthM)).ToArray();
        Assert.Equal(2, pair.Length);
        Assert.Equal(pair[0], pair[1], pair[0] * 1e-6);
        Assert.Equal(tailwater, profile.OutletDepthM, 1e-9);
    }

    [Fact]
    public void ClosedFormsOfDepth()
    {
        var box = new BoxSection(2, 1.5);
        Assert.Equal(Math.Cbrt(4.0 / 9.80665), OpenChannelFlow.CriticalDepthM(box, 4), 1e-9); // yc = (q2/g)^(1/3), q = 2 m2/s
        Assert.Equal(1.5, OpenChannelFlow.CriticalDepthM(box, 100), 1e-12); // never above the rise
        var circle = new CircleSection(1);
        Assert.Equal(0.938, circle.PeakConveyanceDepthM, 0.0005); // Chow 1959, sec. 6-4
        var full = OpenChannelFlow.ConveyanceFactor(circle, 1);
        var peak = OpenChannelFlow.ConveyanceFactor(circle, circle.PeakConveyanceDepthM);
        Assert.Equal(1.076, peak / full, 0.001); // Chow 1959, fig. 6-5: about 1.076 of the full flow
        double Q(double factor) => factor * Math.Sqrt(0.01) / 0.013;
        Assert.Null(OpenChannelFlow.NormalDepthM(circle, Q(peak * 1.0001), 0.013, 0.01)); // flows full
        var between = OpenChannelFlow.NormalDepthM(circle, Q((peak + full) / 2), 0.013, 0.01)!.Value;
        Assert.InRange(between, 0.81, circle.PeakConveyanceDepthM); // the lower of two roots
        Assert.Null(OpenChannelFlow.NormalDepthM(circle, 0.1, 0.013, 0));
        Assert.Null(OpenChannelFlow.NormalDepthM(circle, 0.1, 0.013, -0.01));
    }
}
