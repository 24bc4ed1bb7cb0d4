namespace GeoCulvert.Design.Hydraulics;

/// <summary>A water surface while it is being computed: points in either direction, classes met on the way.</summary>
/// <param name="keepsPoints">Whether points and classes are kept; without them only the last point and the lengths are known.</param>
internal sealed class Surface(bool keepsPoints = true)
{
    private readonly List<ProfilePoint> _points = keepsPoints ? new(48) : new(1);
    private readonly List<string> _names = keepsPoints ? new(3) : [];
    private bool _upstream;

    /// <summary>Distance at which a subcritical surface of a steep barrel comes down to critical depth, or null.</summary>
    public double? ReachesCriticalAtM { get; set; }

    /// <summary>Length flowing full, m.</summary>
    public double FullLengthM { get; set; }

    public double AtInlet => _upstream ? _points[^1].DepthM : _points[0].DepthM;

    public double AtOutlet => _upstream ? _points[0].DepthM : _points[^1].DepthM;

    /// <summary>Classes from inlet to outlet.</summary>
    public string Name => string.Join(" + ", _upstream ? _names.AsEnumerable().Reverse() : _names);

    public void Start(ProfilePoint point, bool upstream)
    {
        _upstream = upstream;
        _points.Add(point);
    }

    public void Add(double distanceM, double depthM)
    {
        var point = new ProfilePoint(distanceM, depthM);
        if (keepsPoints) _points.Add(point);
        else _points[0] = point;
    }

    public void Class(string name)
    {
        if (!keepsPoints) return;
        if (_names.Count == 0 || _names[^1] != name) _names.Add(name);
    }

    /// <summary>Depth at a distance, straight between points.</summary>
    public double DepthAt(double distanceM)
    {
        var points = _points;
        int low = 0, high = points.Count - 1;
        while (high - low > 1)
        {
            var middle = (low + high) >> 1;
            if (_upstream ? points[middle].DistanceM > distanceM : points[middle].DistanceM < distanceM) low = middle;
            else high = middle;
        }

        var (a, b) = (points[low], points[high]);
        return a.DistanceM == b.DistanceM ? a.DepthM : a.DepthM + ((b.DepthM - a.DepthM) * (distanceM - a.DistanceM) / (b.DistanceM - a.DistanceM));
    }

    public IReadOnlyList<ProfilePoint> FromInlet()
    {
        if (!_upstream) return _points;
        var reversed = _points.ToArray();
        Array.Reverse(reversed);
        return reversed;
    }

    /// <summary>The supercritical surface down to a distance and the subcritical one from there.</summary>
    public static Surface Join(Surface fast, Surface slow, double atM)
    {
        var joined = new Surface();
        foreach (var p in fast.FromInlet().Where(p => p.DistanceM <= atM)) joined._points.Add(p);
        foreach (var name in fast._names) joined._names.Add(name);
        var length = slow._points[0].DistanceM;
        if (atM >= length) return joined;
        joined._points.Add(new ProfilePoint(atM, fast.DepthAt(atM)));
        joined._points.Add(new ProfilePoint(atM, slow.DepthAt(atM)));
        foreach (var p in slow.FromInlet().Where(p => p.DistanceM > atM)) joined._points.Add(p);
        foreach (var name in slow._names.AsEnumerable().Reverse()) joined.Class(name);
        joined.FullLengthM = Math.Min(slow.FullLengthM, length - atM);
        return joined;
    }
}
