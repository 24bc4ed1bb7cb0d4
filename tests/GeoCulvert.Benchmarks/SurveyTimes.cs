using GeoCulvert.Design.Crossings;
using GeoCulvert.Design.Terrain;
using GeoCulvert.Design.Watersheds;
using NetTopologySuite.Geometries;

namespace GeoCulvert.Benchmarks;

/// <summary>Times the survey of many nested watersheds, whole and in its parts.</summary>
internal static class SurveyTimes
{
    public static void Print(int side, int count)
    {
        Console.WriteLine($"{side} x {side} cells, lidar-like, {count} outlets; processor s");
        Console.WriteLine("| outlets | deepest nest | labels | paths | outlines | one zonal sum | ground slope | cover of 30 m | cover of 0.7 m | whole survey | allocated MB | vertices of totals | arrays of the outlines MB |");
        Console.WriteLine("|---|---|---|---|---|---|---|---|---|---|---|---|---|");
        var z = Shapes.All[0].Make(side);
        var terrain = Drainage.Solve(z);
        var chance = new Random(1);
        var scattered = Enumerable.Range(0, z.Cells.Length).Where(i => terrain.Accumulation.Cells[i] > 100).OrderBy(_ => chance.Next()).Take(count).ToArray();
        var chained = Enumerable.Range(0, z.Cells.Length).OrderByDescending(i => terrain.Accumulation.Cells[i]).Take(count).ToArray();
        Row("scattered, first turn", terrain, scattered);
        Row("scattered", terrain, scattered);
        Row("down the largest streams", terrain, chained);
    }

    private static void Row(string name, DrainedTerrain terrain, int[] cells)
    {
        WatershedLabelling? labelling = null;
        var labels = Seconds(() => labelling = WatershedLabels.Label(terrain.Direction, cells));
        var tree = new OutletTree(labelling!.Parent);
        var depth = new int[cells.Length];
        foreach (var k in tree.UpstreamFirst.Reverse()) depth[k] = tree.Parent(k) < 0 ? 1 : depth[tree.Parent(k)] + 1;
        var paths = Seconds(() => LongestFlowPath.Trace(terrain.Direction, cells));
        WatershedOutlines? outlines = null;
        var ground = terrain.Elevation.Cells;
        GC.Collect();
        var before = GC.GetTotalMemory(true);
        var traced = Seconds(() => outlines = WatershedPolygons.Trace(labelling.Labels, tree, cell => !float.IsNaN(ground[cell])));
        var held = (GC.GetTotalMemory(true) - before) / 1e6;
        var sums = Seconds(() => ZonalSums.Of(labelling.Labels, tree, terrain.Elevation));
        var slopes = Seconds(() => ZonalSums.Of(labelling.Labels, tree, cell => GroundSlope.At(terrain.Elevation, cell)));
        double coarse = Cover(30), fine = Cover(0.7);
        Crossing[] crossings = [.. cells.Select((c, k) => new Crossing($"{k}", CrossingOrigin.Given, new Coordinate(0, 0), c, 0))];
        var bytes = GC.GetAllocatedBytesForCurrentThread();
        var survey = Seconds(() => WatershedSurvey.Survey(terrain, crossings));
        bytes = GC.GetAllocatedBytesForCurrentThread() - bytes;
        Console.WriteLine(
            $"| {name} | {depth.Max()} | {labels:0.00} | {paths:0.00} | {traced:0.00} | {sums:0.00} | {slopes:0.00} | {coarse:0.00} | {fine:0.00} | {survey:0.00} | {bytes / 1e6:0} | {outlines!.Total.Sum(o => (long)o.Polygon.NumPoints)} | {held:0} |");

        double Cover(double cellM)
        {
            var frame = terrain.Elevation.Frame;
            var cover = new Grid<int>(new GridFrame((int)(frame.Columns / cellM) + 2, (int)(frame.Rows / cellM) + 2, frame.West - (cellM / 3), frame.North + (cellM / 3), cellM, cellM));
            for (var i = 0; i < cover.Cells.Length; i++) cover.Cells[i] = i / 5 % 16;
            return Seconds(() => ZonalOverlay.Classes(labelling.Labels, tree, cover));
        }
    }

    private static double Seconds(Action work)
    {
        // Processor time of all threads, the collector's too: a busy machine does not count.
        var before = Environment.CpuUsage.TotalTime;
        work();
        return (Environment.CpuUsage.TotalTime - before).TotalSeconds;
    }
}
