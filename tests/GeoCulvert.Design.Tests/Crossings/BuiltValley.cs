using GeoCulvert.Design.Crossings;
using GeoCulvert.Design.Terrain;
using NetTopologySuite.Geometries;

namespace GeoCulvert.Design.Tests.Crossings;

/// <summary>
/// Terrain built from formulas, so that culvert, embankment and drainage area are known beforehand. Cells of 1 m, x to the east, y to the north. A straight channel with a
/// bottom 2 m wide falls to the south; a bank stands on each road: crown falling 2 % to both shoulders, then the side slope.
/// </summary>
internal sealed class BuiltValley
{
    public const int Columns = 141, Rows = 160;
    public const double Fall = 0.01, Side = 0.05;

    private readonly List<(Coordinate From, Coordinate To, double WidthM, double SideSlope, Func<double, double> CrestM)> _banks = [];

    /// <summary>Level ground and its slopes without any bank.</summary>
    public Func<double, double, double> Ground { get; init; } = (_, _) => 0;

    public List<RoadAlignment> Roads { get; } = [];

    public static GridFrame Frame { get; } = new(Columns, Rows, 0, Rows, 1, 1);

    /// <summary>A channel through (x0, y0) that flows to the azimuth 180 + skew; a head slope closes the valley above.</summary>
    public static BuiltValley Channel(double skewDeg = 0, double x0 = 70.5, double y0 = 60) => new() { Ground = ChannelGround(skewDeg, x0, y0) };

    public static Func<double, double, double> ChannelGround(double skewDeg, double x0, double y0)
    {
        double sin = Math.Sin(skewDeg * Math.PI / 180), cos = Math.Cos(skewDeg * Math.PI / 180);
        return (x, y) =>
        {
            double along = ((x - x0) * sin) + ((y - y0) * cos), across = ((x - x0) * cos) - ((y - y0) * sin);
            return 100 + (Fall * along) + (Side * Math.Max(0, Math.Abs(across) - 1)) + (0.5 * Math.Max(0, along - 55));
        };
    }

    /// <summary>Adds a road with a bank under it.</summary>
    public BuiltValley Bank(string name, double x1, double y1, double x2, double y2, Func<double, double> crestM, double widthM = 8, double sideSlope = 2)
    {
        _banks.Add((new(x1, y1), new(x2, y2), widthM, sideSlope, crestM));
        Roads.Add(new(name, [new LineString([new(x1, y1), new(x2, y2)])]) { WidthM = widthM, SideSlope = sideSlope });
        return this;
    }

    public double BankM(double x, double y)
    {
        var highest = double.NegativeInfinity;
        foreach (var b in _banks)
        {
            double dx = b.To.X - b.From.X, dy = b.To.Y - b.From.Y, length = Math.Sqrt((dx * dx) + (dy * dy));
            double along = (((x - b.From.X) * dx) + ((y - b.From.Y) * dy)) / length, off = Math.Abs(((x - b.From.X) * dy) - ((y - b.From.Y) * dx)) / length;
            if (along < 0 || along > length) continue;
            highest = Math.Max(highest, b.CrestM(along) - (0.02 * Math.Min(off, b.WidthM / 2)) - (Math.Max(0, off - (b.WidthM / 2)) / b.SideSlope));
        }

        return highest;
    }

    public Grid<float> Elevation(Func<double, double, double>? change = null)
    {
        var grid = new Grid<float>(Frame);
        for (var r = 0; r < Rows; r++)
            for (var c = 0; c < Columns; c++)
            {
                double x = Frame.CentreX(c), y = Frame.CentreY(r);
                grid[r, c] = (float)(Math.Max(Ground(x, y), BankM(x, y)) + (change?.Invoke(x, y) ?? 0));
            }

        return grid;
    }

    public OpenedTerrain Solve(Grid<float> elevation, OpeningSettings? settings = null, IReadOnlyList<KnownCulvert>? culverts = null, IReadOnlyList<GivenPoint>? points = null) =>
        EmbankmentOpenings.Solve(elevation, Roads, culverts ?? [], points ?? [], settings ?? new(), (z, paths) => Drainage.Solve(z, paths));

    /// <summary>Crossings with at least a share of a hectare, as a study finds them.</summary>
    public CrossingList Crossings(OpenedTerrain opened, int streamCells = 10000) =>
        CrossingFinder.Find(Roads, opened.Terrain.Direction, opened.Terrain.Accumulation, streamCells);
}
