using GeoCulvert.Design.Basis;

namespace GeoCulvert.Design.Hydraulics;

/// <summary>One barrel with one flow: integrates its surface upstream or downstream.</summary>
internal sealed class Reach
{
    // Steps of depth: enough that the surface agrees with a ten-times finer one to 1e-4 of the rise (tested).
    private const int Steps = 24;
    private const double Ratio = 0.72;
    private readonly ISection _section;
    private readonly double _flow;
    private readonly double _n;
    private readonly double _length;
    private readonly double _slope;

    public Reach(ISection section, double flowM3PerS, double roughnessN, double lengthM, double slopeMPerM)
    {
        (_section, _flow, _n, _length, _slope) = (section, flowM3PerS, roughnessN, lengthM, slopeMPerM);
        CriticalDepthM = OpenChannelFlow.CriticalDepthM(section, flowM3PerS);
        NormalDepthM = OpenChannelFlow.NormalDepthM(section, flowM3PerS, roughnessN, slopeMPerM);
        IsSteep = NormalDepthM < CriticalDepthM && CriticalDepthM < section.RiseM;
    }

    public double CriticalDepthM { get; }

    public double? NormalDepthM { get; }

    /// <summary>Normal depth below critical depth.</summary>
    public bool IsSteep { get; }

    /// <summary>Integrates upstream from a depth (or pressure head) at the outlet.</summary>
    public void FromOutlet(Surface surface, double depth)
    {
        var D = _section.RiseM;
        surface.Start(new ProfilePoint(_length, depth), upstream: true);
        double x = _length, y = depth;
        if (y >= D) (x, y) = Full(surface, x, y);
        while (x > 0)
        {
            // Free surface upstream of here; where it rises to the crown the rest is full.
            (x, y) = Free(surface, x, y);
            if (surface.ReachesCriticalAtM is not null) return;
            if (x > 0) (x, y) = Full(surface, x, D);
        }
    }

    /// <summary>Integrates downstream from critical depth at the inlet (steep barrels): S2, toward normal depth.</summary>
    public void FromInlet(Surface surface)
    {
        var yn = NormalDepthM!.Value;
        surface.Start(new ProfilePoint(0, CriticalDepthM), upstream: false);
        surface.Class("S2");
        double x = 0, y = CriticalDepthM;
        foreach (var next in Toward(CriticalDepthM, yn))
        {
            var step = Distance(y, next);
            if (x + step >= _length)
            {
                surface.Add(_length, Within(y, next, _length - x));
                return;
            }

            x += step;
            y = next;
            surface.Add(x, y);
        }

        surface.Add(_length, yn);
    }

    /// <summary>Where a jump lets the fast surface pass into the slow one; null when the slow one is swept out of the barrel.</summary>
    public double? Jump(Surface fast, Surface slow, double slowBeginsM)
    {
        double Excess(double x) => Force(fast.DepthAt(x)) - Force(slow.DepthAt(x));
        if (slowBeginsM >= _length || Excess(_length) >= 0) return null;
        // At its upper end the slow surface is critical, where the specific force is least, so the fast one has more.
        return Excess(slowBeginsM) <= 0 ? slowBeginsM : RootFinding.Bracketed(Excess, slowBeginsM, _length);

        double Force(double y) => OpenChannelFlow.SpecificForceM3(_section, _flow, y);
    }

    private (double X, double Y) Full(Surface surface, double x, double y)
    {
        var D = _section.RiseM;
        var rise = OpenChannelFlow.FullFrictionSlope(_section, _flow, _n) - _slope; // of the pressure head, per m upstream
        surface.Class("full");
        // A flow whose critical depth is the crown has no free surface to fall to.
        var staysFull = rise >= 0 || CriticalDepthM >= D;
        var upTo = staysFull || y + (rise * x) >= D ? 0 : Math.Clamp(x - ((D - y) / rise), 0, x);
        surface.FullLengthM += x - upTo;
        var end = upTo == 0 ? Math.Max(D, y + (rise * x)) : D;
        surface.Add(upTo, end);
        return (upTo, end);
    }

    private (double X, double Y) Free(Surface surface, double x, double start)
    {
        var D = _section.RiseM;
        var dc = CriticalDepthM;
        var y = Math.Min(start, D);
        if (dc >= D) return (x, D);
        if (IsSteep && y <= dc)
        {
            surface.ReachesCriticalAtM = x;
            return (x, dc);
        }

        // Where the surface tends to, going upstream. Friction weaker than the bed slope lets it fall; in a circle nearly full friction may be stronger
        // again although normal depth lies lower: there it rises to the crown.
        var falls = _slope > OpenChannelFlow.FrictionSlope(_section, _flow, _n, Math.Min(y, D * (1 - 1e-9)));
        double target;
        string name;
        if (IsSteep) (target, name) = (falls ? dc : D, "S1");
        else if (NormalDepthM is { } yn && Math.Abs(y - yn) < 1e-9 * D) (target, name) = (yn, Math.Abs(yn - dc) < 1e-9 * D ? "C1" : "M1");
        else if (NormalDepthM is { } n && (y < n || falls)) (target, name) = (n, y > n ? "M1" : "M2");
        else (target, name) = (D, _slope > 0 ? "M2" : _slope == 0 ? "H2" : "A2");

        surface.Class(name);
        if (y >= D) y = D * (1 - 1e-9);
        foreach (var next in target == D || IsSteep ? Even(y, target) : Toward(y, target))
        {
            var step = -Distance(y, next);
            if (!(step > 0)) break; // at the end of the range the surface no longer moves
            if (x - step <= 0)
            {
                var last = Within(y, next, -x);
                surface.Add(0, last);
                return (0, last);
            }

            x -= step;
            y = next;
            surface.Add(x, y);
        }

        if (target == D) return (x, D);
        if (IsSteep)
        {
            surface.ReachesCriticalAtM = x;
            return (x, dc);
        }

        surface.Add(0, target);
        return (0, target);
    }

    /// <summary>dx/dy = (1 - Fr2) / (S - Sf), downstream positive.</summary>
    private double DxDy(double y)
    {
        var area = _section.AreaM2(y);
        var froude2 = _flow * _flow * _section.TopWidthM(y) / (OpenChannelFlow.GravityMPerS2 * area * area * area);
        return (1 - froude2) / (_slope - OpenChannelFlow.FrictionSlope(_section, _flow, _n, y));
    }

    /// <summary>Distance between two depths by Simpson's rule, downstream positive.</summary>
    private double Distance(double from, double to) =>
        (to - from) / 6 * (DxDy(from) + (4 * DxDy((from + to) / 2)) + DxDy(to));

    /// <summary>Depth at a distance inside the step from one depth to another.</summary>
    private double Within(double from, double to, double distance)
    {
        if (distance == 0) return from;
        double Excess(double y) => Distance(from, y) - distance;
        return Math.Sign(Excess(to)) == Math.Sign(-distance) ? to : RootFinding.Bracketed(Excess, from, to);
    }

    /// <summary>Depths from one to another, ever closer to the second, which is never reached.</summary>
    private static IEnumerable<double> Toward(double from, double to)
    {
        var gap = from - to;
        var least = Math.Max(Math.Abs(from), Math.Abs(to)) * 1e-7;
        while (Math.Abs(gap) > least)
        {
            gap *= Ratio;
            yield return to + gap;
        }
    }

    /// <summary>Depths from one to another in even steps.</summary>
    private static IEnumerable<double> Even(double from, double to)
    {
        for (var i = 1; i <= Steps; i++) yield return i == Steps ? to : from + ((to - from) * i / Steps);
    }
}
