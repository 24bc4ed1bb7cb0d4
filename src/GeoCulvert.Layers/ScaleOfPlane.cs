using GeoCulvert.Design.Terrain;

namespace GeoCulvert.Layers;

/// <summary>
/// Finds how true to size a projected plane is over a terrain model. Each node and four places beside it are taken back to longitude and latitude and
/// put on the ellipsoid in space; differences along x and y give the metric. Nothing of the projection need be known, and poles and
/// date line are places like others.
/// </summary>
public static class ScaleOfPlane
{
    /// <summary>Errors of area and length up to this share are left alone (own rule; a tenth of what terrain models are good for).</summary>
    public const double SmallShare = 0.0002;

    /// <summary>Above this share of error in area or length the plane is said to be off (own rule).</summary>
    public const double DoubtfulShare = 0.005;

    /// <summary>Above this share of error no study is made in the plane (own rule).</summary>
    public const double LargestShare = 0.02;

    // A second difference over 10 km leaves 3e-7 of error between nodes: step^2 / 8 / R^2.
    private const double NodeStepM = 10_000;
    private const int MostNodes = 129;

    // The chord across 200 m differs from the arc by 4e-11; coordinates in space are good to 1e-9 m, which is 5e-12 of it.
    private const double ReachM = 100;

    /// <summary>The scale over a frame; null where part of it has no place on the ellipsoid.</summary>
    /// <param name="frame">The terrain, m.</param>
    /// <param name="plane">Its projected system.</param>
    public static PlaneScale? Over(GridFrame frame, Crs plane)
    {
        ArgumentNullException.ThrowIfNull(plane);
        double width = frame.East - frame.West, height = frame.North - frame.South;
        int columns = Nodes(width), rows = Nodes(height);
        double stepX = width / (columns - 1), stepY = height / (rows - 1);
        var places = new List<(double X, double Y)>(columns * rows * 4);
        for (var r = 0; r < rows; r++)
        {
            for (var c = 0; c < columns; c++)
            {
                double x = frame.West + (c * stepX), y = frame.South + (r * stepY);
                places.AddRange([(x - ReachM, y), (x + ReachM, y), (x, y - ReachM), (x, y + ReachM)]);
            }
        }

        if (plane.OnEllipsoid([.. places.Select(p => p.X)], [.. places.Select(p => p.Y)]) is not { } inSpace) return null;
        var nodes = new PlaneMetric[columns * rows];
        for (var i = 0; i < nodes.Length; i++)
        {
            var alongX = Difference(inSpace[(4 * i) + 1], inSpace[4 * i]);
            var alongY = Difference(inSpace[(4 * i) + 3], inSpace[(4 * i) + 2]);
            nodes[i] = new(Product(alongX, alongX), Product(alongX, alongY), Product(alongY, alongY));
            if (!(nodes[i].AreaRatio > 0)) return null;
        }

        return new PlaneScale(frame.West, frame.South, stepX, stepY, columns, nodes);
    }

    private static int Nodes(double lengthM) => (int)Math.Clamp(Math.Ceiling(lengthM / NodeStepM) + 1, 2, MostNodes);

    private static (double X, double Y, double Z) Difference((double X, double Y, double Z) a, (double X, double Y, double Z) b) =>
        ((a.X - b.X) / (2 * ReachM), (a.Y - b.Y) / (2 * ReachM), (a.Z - b.Z) / (2 * ReachM));

    private static double Product((double X, double Y, double Z) a, (double X, double Y, double Z) b) => (a.X * b.X) + (a.Y * b.Y) + (a.Z * b.Z);
}
