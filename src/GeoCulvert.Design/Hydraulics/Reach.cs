using GeoCulvert.Design.Basis;

namespace GeoCulvert.Design.Hydraulics;

/// <summary>One barrel with one flow: integrates its surface upstream or downstream.</summary>
internal sealed class Reach
{
    // First division of the depths; each step is halved until two Simpson rules agree on its length and it is short beside the barrel.
    private const int Steps = 6;
    private const double Ratio = 0.4;
    private const double ShareOfLength = 2e-5;
    private const double LongestShare = 1.0 / 6;
    private const double LeastShareOfRise = 1e-10;
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
        if (!Toward(surface, ref x, ref y, yn, downstream: true)) surface.Add(_length, yn);
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
        var atInlet = target == D || IsSteep ? Even(surface, ref x, ref y, target) : Toward(surface, ref x, ref y, target, downstream: false);
        if (atInlet) return (0, y);
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

    /// <summary>Passes depths ever closer to a normal depth, which is never reached; true when the end of the barrel is.</summary>
    private bool Toward(Surface surface, ref double x, ref double y, double normalDepth, bool downstream)
    {
        var gap = y - normalDepth;
        var least = Math.Max(y, normalDepth) * 1e-6;
        for (var at = DxDy(y); Math.Abs(gap) > least;)
        {
            gap *= Ratio;
            var next = normalDepth + gap;
            var atNext = DxDy(next);
            if (Pass(surface, ref x, ref y, next, at, DxDy((y + next) / 2), atNext, downstream)) return true;
            at = atNext;
        }

        return false;
    }

    /// <summary>Passes depths upstream to one that is reached; true when the inlet comes first.</summary>
    private bool Even(Surface surface, ref double x, ref double y, double target)
    {
        var (start, at) = (y, DxDy(y));
        for (var i = 1; i <= Steps; i++)
        {
            var next = i == Steps ? target : start + ((target - start) * i / Steps);
            var atNext = DxDy(next);
            if (Pass(surface, ref x, ref y, next, at, DxDy((y + next) / 2), atNext, downstream: false)) return true;
            at = atNext;
        }

        return false;
    }

    /// <summary>
    /// Moves the surface from one depth to another by Simpson's rule on dx/dy, halving the step until the rule on its two halves agrees with that on the whole;
    /// true when the end of the barrel comes first, which is then the last point.
    /// </summary>
    private bool Pass(Surface surface, ref double x, ref double y, double to, double atFrom, double atMiddle, double atTo, bool downstream)
    {
        double from = y, middle = (from + to) / 2, toward = downstream ? 1 : -1;
        double atFirst = DxDy((from + middle) / 2), atSecond = DxDy((middle + to) / 2);
        var twelfth = toward * (to - from) / 12;
        var whole = 2 * twelfth * (atFrom + (4 * atMiddle) + atTo);
        var first = twelfth * (atFrom + (4 * atFirst) + atMiddle);
        var length = first + (twelfth * (atMiddle + (4 * atSecond) + atTo));
        var canSplit = Math.Abs(to - from) > LeastShareOfRise * _section.RiseM;
        if (canSplit && !(Math.Abs(length - whole) <= ShareOfLength * _length && length <= LongestShare * _length))
        {
            return Pass(surface, ref x, ref y, middle, atFrom, atFirst, atMiddle, downstream)
                || Pass(surface, ref x, ref y, to, atMiddle, atSecond, atTo, downstream);
        }

        var left = downstream ? _length - x : x;
        var end = downstream ? _length : 0;
        length += (length - whole) / 15; // what is left of the error (Richardson)
        if (!double.IsFinite(length))
        {
            // Friction equals the bed slope here: the surface keeps its depth.
            surface.Add(x = end, y);
            return true;
        }

        if (length >= left)
        {
            y = Within(from, to, toward * left);
            surface.Add(x = end, y);
            return true;
        }

        // At critical depth rounding may give a length just below nothing.
        first = Math.Clamp(first, 0, Math.Max(0, length));
        surface.Add(x + (toward * first), middle);
        x += toward * Math.Max(0, length);
        y = to;
        surface.Add(x, y);
        return false;
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
}
