using CsCheck;
using GeoCulvert.Design.Hydraulics;

namespace GeoCulvert.Design.Tests.Hydraulics;

/// <summary>
/// Outlet-control headwater against a plain standard step in energy (Chow 1959, sec. 10-3) with many even steps of distance: an own, slow and
/// different computation of the same equation, for every kind of barrel and tailwater.
/// </summary>
public class StandardStepEquivalenceTests
{
    private const double G = OpenChannelFlow.GravityMPerS2;

    private static readonly Gen<(ISection Section, double Flow, double N, double Loss, double Length, double Slope, double Tailwater)> Barrels =
        from circle in Gen.Bool
        from rise in Gen.Double[0.3, 3.5]
        from ratio in Gen.Double[0.5, 3]
        from x in Gen.Double[0.05, 6]
        from n in Gen.Double[0.009, 0.035]
        from loss in Gen.Double[0.2, 0.9]
        from length in Gen.Double[5, 200]
        from slope in Gen.OneOf(Gen.Const(0.0), Gen.Double[-0.01, 0.01], Gen.Double[-4, -1].Select(e => Math.Pow(10, e)))
        from tailwater in Gen.OneOf(Gen.Const(0.0), Gen.Double[0, 2.2])
        let section = circle ? (ISection)new CircleSection(rise) : new BoxSection(rise * ratio, rise)
        select (section, x * section.FullAreaM2 * Math.Sqrt(rise) / InletControl.Ku, n, loss, length, slope, tailwater * rise);

    [Fact]
    public void HeadwaterAgreesOnRandomBarrels() => Barrels.Sample(
        b =>
        {
            var reference = Headwater(b.Section, b.Flow, b.N, b.Loss, b.Length, b.Slope, b.Tailwater, 2000);
            var computed = BarrelFlow.Profile(b.Section, b.Flow, b.N, b.Loss, b.Length, b.Slope, b.Tailwater).HeadwaterM;
            // The coarse reference errs most where it steps over the crown of a box, whose friction jumps there.
            return Math.Abs(computed - reference) < 5e-3 * b.Section.RiseM;
        },
        iter: 150);

    // Nearly level with normal depth at the crown, where even steps of depth fail; a surface that reaches the crown; a drowned steep inlet.
    [Theory]
    [InlineData("box", 0.800, 0.484, 0.294, 0.0295, 198.6, 0.00373, 0.024)]
    [InlineData("box", 1.024, 0.373, 0.381, 0.0344, 90.7, 0.00861, 0.0)]
    [InlineData("circle", 0.729, 0.729, 0.333, 0.0136, 107.3, 0.00183, 0.778)]
    [InlineData("circle", 0.484, 0.484, 0.102, 0.0344, 114.6, 0.00413, 0.298)]
    [InlineData("box", 0.279, 0.487, 0.290, 0.0239, 191.0, 0.03104, 0.0)]
    [InlineData("box", 2.0, 1.5, 6.0, 0.012, 30, 0.02, 2.9)]
    public void HeadwaterAgreesOnHardBarrels(string shape, double span, double rise, double flow, double n, double length, double slope, double tailwater)
    {
        ISection section = shape == "circle" ? new CircleSection(rise) : new BoxSection(span, rise);
        Assert.Equal(
            Headwater(section, flow, n, 0.5, length, slope, tailwater, 12000),
            BarrelFlow.Profile(section, flow, n, 0.5, length, slope, tailwater).HeadwaterM,
            1e-3 * rise);
    }

    private static double Headwater(ISection s, double Q, double n, double ke, double L, double S, double tailwater, int steps)
    {
        var D = s.RiseM;
        double Area(double y) => s.AreaM2(Math.Min(y, D));
        double Energy(double y) => y + (Q * Q / (2 * G * Area(y) * Area(y)));
        double Friction(double y)
        {
            var R = Area(y) / (y >= D ? s.FullPerimeterM : s.WettedPerimeterM(y));
            return Math.Pow(Q * n / Area(y), 2) / Math.Pow(R, 4.0 / 3);
        }

        var dc = Critical(s, Q);
        var y = Math.Max(dc, tailwater);
        var dx = L / steps;
        for (var i = 0; i < steps; i++)
        {
            var below = Energy(y) - (S * dx) + (dx * Friction(y) / 2);
            double Excess(double u) => Energy(u) - (dx * Friction(u) / 2) - below;
            if (Excess(dc) > 0)
            {
                if (S > Friction(dc) && dc < D)
                {
                    y = dc; // steep: the surface comes down to critical depth inside the barrel, the inlet is free
                    break;
                }

                y = dc;
                continue;
            }

            y = Nearest(Excess, y, dc, 1e-3 * D);
        }

        var free = Free(s, Q, n, S, dc);
        var headwater = y + ((1 + ke) * (Energy(y) - y));
        return y > free ? Math.Max(headwater, free + ((1 + ke) * (Energy(free) - free))) : headwater;
    }

    /// <summary>The root nearest to a depth, by widening and bisection.</summary>
    private static double Nearest(Func<double, double> excess, double y, double least, double step)
    {
        double low = y, high = y;
        if (excess(y) <= 0)
        {
            for (high = y + step; excess(high) < 0; high += step *= 2) low = high;
        }
        else
        {
            for (low = Math.Max(least, y - step); excess(low) > 0; low = Math.Max(least, low - (step *= 2))) high = low;
        }

        for (var k = 0; k < 50; k++)
        {
            var middle = (low + high) / 2;
            if (excess(middle) > 0) high = middle;
            else low = middle;
        }

        return (low + high) / 2;
    }

    private static double Critical(ISection s, double Q)
    {
        double low = 1e-6 * s.RiseM, high = s.RiseM;
        bool Fast(double y) => Q * Q * s.TopWidthM(y) > G * Math.Pow(s.AreaM2(y), 3);
        if (Fast(high * (1 - 1e-12))) return high;
        for (var k = 0; k < 100; k++)
        {
            var middle = (low + high) / 2;
            if (Fast(middle)) low = middle;
            else high = middle;
        }

        return high;
    }

    /// <summary>The larger of critical and normal depth; the rise where the barrel has no normal depth.</summary>
    private static double Free(ISection s, double Q, double n, double S, double dc)
    {
        if (S <= 0) return s.RiseM;
        double low = 1e-6 * s.RiseM, high = s.PeakConveyanceDepthM;
        bool TooShallow(double y) => s.AreaM2(y) * Math.Pow(s.AreaM2(y) / s.WettedPerimeterM(y), 2.0 / 3) * Math.Sqrt(S) / n < Q;
        if (TooShallow(high)) return s.RiseM;
        for (var k = 0; k < 100; k++)
        {
            var middle = (low + high) / 2;
            if (TooShallow(middle)) low = middle;
            else high = middle;
        }

        return Math.Max(dc, high);
    }
}
