namespace GeoCulvert.Design.Terrain;

/// <summary>
/// The metric of the ellipsoid in a plane at one place: a step (dx, dy) in the plane has the true length
/// sqrt(e dx^2 + 2 f dx dy + g dy^2) (first fundamental form, Gauss).
/// </summary>
/// <param name="XxRatio">e: square of the true length of a unit step along x.</param>
/// <param name="XyRatio">f: product of a unit step along x with one along y; zero where they are at right angles on the ground.</param>
/// <param name="YyRatio">g: square of the true length of a unit step along y.</param>
public readonly record struct PlaneMetric(double XxRatio, double XyRatio, double YyRatio)
{
    /// <summary>A plane that is true to size.</summary>
    public static PlaneMetric True { get; } = new(1, 0, 1);

    /// <summary>True area by plane area.</summary>
    public double AreaRatio => Math.Sqrt((XxRatio * YyRatio) - (XyRatio * XyRatio));

    /// <summary>Largest and smallest true length by plane length, over all directions: square roots of the eigenvalues.</summary>
    public (double Most, double Least) LengthRatios
    {
        get
        {
            double middle = (XxRatio + YyRatio) / 2, apart = (XxRatio - YyRatio) / 2, half = Math.Sqrt((apart * apart) + (XyRatio * XyRatio));
            return (Math.Sqrt(middle + half), Math.Sqrt(Math.Max(0, middle - half)));
        }
    }
}

/// <summary>
/// How true to size a projected plane is over a terrain model: the metric of the ellipsoid at the nodes of a coarse grid, bilinear between
/// them. Plane lengths and areas times these ratios are those on the ellipsoid.
/// </summary>
public sealed class PlaneScale
{
    private readonly double _west, _south, _stepX, _stepY;
    private readonly int _columns, _rows;
    private readonly double[] _e, _f, _g, _area;

    /// <summary>Makes a scale from its nodes.</summary>
    /// <param name="west">x of the first node, m.</param>
    /// <param name="south">y of the first node, m.</param>
    /// <param name="stepX">Distance of nodes along x, m.</param>
    /// <param name="stepY">Distance of nodes along y, m.</param>
    /// <param name="columns">Nodes along x, at least 2.</param>
    /// <param name="nodes">Metrics, row by row from the south; at least two rows.</param>
    public PlaneScale(double west, double south, double stepX, double stepY, int columns, IReadOnlyList<PlaneMetric> nodes)
    {
        ArgumentNullException.ThrowIfNull(nodes);
        ArgumentOutOfRangeException.ThrowIfLessThan(columns, 2);
        ArgumentOutOfRangeException.ThrowIfNegativeOrZero(stepX);
        ArgumentOutOfRangeException.ThrowIfNegativeOrZero(stepY);
        if (nodes.Count < 2 * columns || nodes.Count % columns != 0) throw new ArgumentException($"{nodes.Count} nodes in rows of {columns}.", nameof(nodes));
        (_west, _south, _stepX, _stepY, _columns, _rows) = (west, south, stepX, stepY, columns, nodes.Count / columns);
        (_e, _f, _g) = ([.. nodes.Select(n => n.XxRatio)], [.. nodes.Select(n => n.XyRatio)], [.. nodes.Select(n => n.YyRatio)]);
        _area = [.. nodes.Select(n => n.AreaRatio)];
        LargestAreaErrorShare = nodes.Max(n => Math.Abs((1 / n.AreaRatio) - 1));
        LargestLengthErrorShare = nodes.Max(n => Math.Max(Math.Abs((1 / n.LengthRatios.Most) - 1), Math.Abs((1 / n.LengthRatios.Least) - 1)));
    }

    /// <summary>A plane that is true to size everywhere, or of which nothing is known.</summary>
    public static PlaneScale None { get; } = new(0, 0, 1, 1, 2, [PlaneMetric.True, PlaneMetric.True, PlaneMetric.True, PlaneMetric.True]);

    /// <summary>Whether plane figures are taken as they are.</summary>
    public bool IsNone => ReferenceEquals(this, None);

    /// <summary>Largest error of a plane area, as a share of the true one: |plane area / true area - 1|.</summary>
    public double LargestAreaErrorShare { get; }

    /// <summary>Largest error of a plane length in any direction, as a share of the true one.</summary>
    public double LargestLengthErrorShare { get; }

    /// <summary>True area by plane area at a place.</summary>
    public double AreaRatioAt(double x, double y)
    {
        var at = Place(x, y);
        return at.Of(_area);
    }

    /// <summary>The metric at a place.</summary>
    public PlaneMetric At(double x, double y)
    {
        var at = Place(x, y);
        return new(at.Of(_e), at.Of(_f), at.Of(_g));
    }

    /// <summary>True length of a step (dx, dy) about a place, m; the place is the step's middle.</summary>
    public double LengthM(double x, double y, double dx, double dy)
    {
        if (IsNone) return Math.Sqrt((dx * dx) + (dy * dy));
        var m = At(x, y);
        return Math.Sqrt((m.XxRatio * dx * dx) + (2 * m.XyRatio * dx * dy) + (m.YyRatio * dy * dy));
    }

    private Spot Place(double x, double y)
    {
        // Beyond the nodes the value at their edge: a place that is looked up lies on the terrain but for rounding.
        var column = Math.Clamp((x - _west) / _stepX, 0, _columns - 1);
        var row = Math.Clamp((y - _south) / _stepY, 0, _rows - 1);
        int c = Math.Min((int)column, _columns - 2), r = Math.Min((int)row, _rows - 2);
        return new((r * _columns) + c, _columns, column - c, row - r);
    }

    private readonly record struct Spot(int Node, int Columns, double East, double North)
    {
        public double Of(double[] v) =>
            (((v[Node] * (1 - East)) + (v[Node + 1] * East)) * (1 - North)) + (((v[Node + Columns] * (1 - East)) + (v[Node + Columns + 1] * East)) * North);
    }
}
