using GeoCulvert.Design.Crossings;
using GeoCulvert.Design.Hydraulics;
using GeoCulvert.Design.Terrain;
using NetTopologySuite.Geometries;

namespace GeoCulvert.Design.Study;

/// <summary>A cross-section cut from the terrain below an outlet, or why there is none.</summary>
/// <param name="Section">The section; null where the terrain does not show one.</param>
/// <param name="DistanceM">Its distance below the outlet along the stream, m.</param>
/// <param name="Trouble">Why there is none, with figures; "" where there is one.</param>
internal sealed record TailwaterSectionCut(ChannelCrossSection? Section, double DistanceM, string Trouble);

/// <summary>Cuts the untouched terrain across the stream below an outlet.</summary>
internal static class TailwaterSection
{
    /// <summary>Least height of the lower bank above the bed for a section to count, m (own rule: the noise of terrain models).</summary>
    public const double LeastBankM = 0.3;

    private const double LeastReachM = 5, ReachCells = 3; // stream on each side of the section that gives its direction
    private const double LeastHalfWidthM = 30, HalfWidthCells = 10, HalfWidthChannels = 3;

    /// <summary>Cuts a section.</summary>
    /// <param name="path">Cells of the stream from the crossing downstream.</param>
    /// <param name="outletM">Distance of the outlet from the crossing along them, m.</param>
    /// <param name="elevation">Untouched terrain.</param>
    /// <param name="widthM">Width of the channel, m.</param>
    /// <param name="settings">Settings.</param>
    /// <param name="wider">Factor on the reach of the section to each side.</param>
    public static TailwaterSectionCut Cut(IReadOnlyList<int> path, double outletM, Grid<float> elevation, double widthM, TailwaterSettings settings, int wider = 1)
    {
        var frame = elevation.Frame;
        var cell = Math.Max(frame.CellWidthM, frame.CellHeightM);
        var distance = Math.Max(settings.SectionDistanceM, 2 * cell);
        TailwaterSectionCut None(string trouble) => new(null, distance, trouble);
        if (cell > widthM) return None(FormattableString.Invariant($"cells of {cell:0.#} m do not show a channel {widthM:0.0} m wide"));
        var reach = Math.Max(LeastReachM, ReachCells * cell);
        if (At(path, frame, outletM + distance) is not { } centre || At(path, frame, outletM + distance - reach) is not { } above || At(path, frame, outletM + distance + reach) is not { } below)
            return None(FormattableString.Invariant($"the stream leaves the terrain model within {distance + reach:0} m below the outlet"));
        var length = above.Distance(below);
        if (length < reach) return None("the stream turns back on itself there");
        // Across the stream, left to right looking downstream.
        double dx = (below.Y - above.Y) / length, dy = -(below.X - above.X) / length;
        var half = wider * Math.Max(LeastHalfWidthM, Math.Max(HalfWidthCells * cell, HalfWidthChannels * widthM));
        var step = Math.Min(frame.CellWidthM, frame.CellHeightM);
        double Ground(int k) => RoadProfile.Bilinear(elevation, centre.X + (k * step * dx), centre.Y + (k * step * dy));

        // The bed: the lowest ground near the flow path, which keeps to cells.
        var near = (int)Math.Ceiling(((2 * cell) + (widthM / 2)) / step);
        var bed = Enumerable.Range(-near, (2 * near) + 1).Where(k => !double.IsNaN(Ground(k))).OrderBy(Ground).ThenBy(Math.Abs).Cast<int?>().FirstOrDefault();
        if (bed is not { } lowest) return None("there is no terrain there");
        var reachSteps = (int)Math.Ceiling(half / step);
        var left = Bank(lowest, -1);
        var right = Bank(lowest, 1);
        var bank = Math.Min(Ground(left), Ground(right)) - Ground(lowest);
        if (!(bank >= LeastBankM)) return None(FormattableString.Invariant($"no banks: the lower one rises {bank:0.00} m within {half:0} m"));
        var points = Enumerable.Range(left, right - left + 1).Select(k => (k * step, Ground(k))).ToArray();
        var middle = lowest * step;
        return new(new ChannelCrossSection(points, middle - (widthM / 2), middle + (widthM / 2), settings.RoughnessN, settings.OverbankRoughnessN), distance, "");

        // Ground behind the highest place of a side is another valley's.
        int Bank(int from, int side)
        {
            var highest = from;
            for (var k = from + side; Math.Abs(k) <= reachSteps && !double.IsNaN(Ground(k)); k += side)
                if (Ground(k) > Ground(highest)) highest = k;
            return highest;
        }
    }

    /// <summary>The point at a distance along the cells' centres; null beyond their end.</summary>
    private static Coordinate? At(IReadOnlyList<int> path, GridFrame frame, double distanceM)
    {
        var walked = 0.0;
        for (var i = 1; i < path.Count; i++)
        {
            var (a, b) = (FlowSteps.Centre(frame, path[i - 1]), FlowSteps.Centre(frame, path[i]));
            var step = a.Distance(b);
            if (walked + step >= distanceM)
            {
                var share = Math.Max(0, distanceM - walked) / step;
                return new Coordinate(a.X + (share * (b.X - a.X)), a.Y + (share * (b.Y - a.Y)));
            }

            walked += step;
        }

        return null;
    }
}
