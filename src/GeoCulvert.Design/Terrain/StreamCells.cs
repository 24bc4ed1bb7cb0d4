using NetTopologySuite.Geometries;

namespace GeoCulvert.Design.Terrain;

/// <summary>A line as cells of a grid.</summary>
/// <param name="Runs">Chains of neighbouring valid cells, two at least each, in the order of drawing, no cell twice in one.</param>
/// <param name="Broken">Whether part of the line lies outside the grid, over nodata or over a kept sink.</param>
/// <param name="IsPlace">Whether all coordinates are numbers within reach of the grid.</param>
internal sealed record StreamCells(IReadOnlyList<int[]> Runs, bool Broken, bool IsPlace)
{
    /// <summary>Cells from the corner of the grid beyond which a coordinate is an error: farther out, rounding would move the line.</summary>
    private const double FarthestCells = 1e9;

    /// <summary>
    /// Samples the line each half cell or closer, so that two samples that follow each other lie in one cell or in neighbours; a corner of a cell shorter than
    /// that may be passed over. Where a chain comes back to a cell of its own, the loop between is left out.
    /// </summary>
    public static StreamCells Of(LineString line, Grid<float> elevation)
    {
        var frame = elevation.Frame;
        var points = line.Coordinates;
        bool IsPlace(Coordinate p) =>
            Math.Abs(p.X - frame.West) <= FarthestCells * frame.CellWidthM && Math.Abs(p.Y - frame.North) <= FarthestCells * frame.CellHeightM;
        if (!points.All(IsPlace)) return new StreamCells([], false, false);
        var runs = new List<int[]>();
        var run = new List<int>();
        var placeOf = new Dictionary<int, int>();
        var broken = false;
        for (var s = 0; s + 1 < points.Length; s++)
        {
            // In cells from the north-west corner.
            double x0 = (points[s].X - frame.West) / frame.CellWidthM, y0 = (frame.North - points[s].Y) / frame.CellHeightM;
            double dx = ((points[s + 1].X - frame.West) / frame.CellWidthM) - x0, dy = ((frame.North - points[s + 1].Y) / frame.CellHeightM) - y0;
            var (from, to) = Inside(x0, dx, frame.Columns, Inside(y0, dy, frame.Rows, (0, 1)));
            if (!(from <= to))
            {
                End();
                broken = true;
                continue;
            }

            if (from > 0) End();
            broken |= from > 0 || to < 1;
            var samples = Math.Max(1, (int)Math.Ceiling(2.5 * (to - from) * Math.Max(Math.Abs(dx), Math.Abs(dy))));
            for (var k = 0; k <= samples; k++)
            {
                var t = from + ((to - from) * k / samples);
                int row = Math.Clamp((int)Math.Floor(y0 + (t * dy)), 0, frame.Rows - 1), column = Math.Clamp((int)Math.Floor(x0 + (t * dx)), 0, frame.Columns - 1);
                if (!float.IsFinite(elevation[row, column]))
                {
                    broken = true;
                    End();
                }
                else
                {
                    Add((row * frame.Columns) + column);
                }
            }

            if (to < 1) End();
        }

        End();
        return new StreamCells(runs, broken, true);

        void Add(int cell)
        {
            if (placeOf.TryGetValue(cell, out var place))
            {
                foreach (var dropped in run.Skip(place + 1)) placeOf.Remove(dropped);
                run.RemoveRange(place + 1, run.Count - place - 1);
                return;
            }

            placeOf[cell] = run.Count;
            run.Add(cell);
        }

        void End()
        {
            if (run.Count > 1) runs.Add([.. run]);
            run.Clear();
            placeOf.Clear();
        }
    }

    /// <summary>The share of a segment that lies between 0 and a width along one axis (Liang and Barsky 1984).</summary>
    private static (double From, double To) Inside(double start, double way, int width, (double From, double To) share)
    {
        if (way == 0) return start >= 0 && start <= width ? share : (1, 0);
        double a = -start / way, b = (width - start) / way;
        return (Math.Max(share.From, Math.Min(a, b)), Math.Min(share.To, Math.Max(a, b)));
    }
}
