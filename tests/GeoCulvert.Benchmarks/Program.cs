using System.Diagnostics;
using GeoCulvert.Benchmarks;
using GeoCulvert.Design.Terrain;

// Usage: GeoCulvert.Benchmarks sizing [CROSSINGS]          sizes random crossings beside a plain scan.
//        GeoCulvert.Benchmarks rating [CULVERTS]           times ratings.
//        GeoCulvert.Benchmarks survey [SIDE [OUTLETS]]     times the survey of watersheds.
//        GeoCulvert.Benchmarks conditioning [SIDE [TURNS]] times cuts, depressions and mapped streams.
//        GeoCulvert.Benchmarks reading FILE [TURNS]        times the reading of a raster beside GDAL.
//        GeoCulvert.Benchmarks [SIDE [TURNS]]              prints nanoseconds a cell (best of the turns) for terrain of SIDE x SIDE cells.
if (args is ["sizing", ..])
{
    SizingBenchmark.Run(args.Length > 1 ? int.Parse(args[1]) : 10000);
    return;
}

if (args is ["survey", ..])
{
    SurveyTimes.Print(args.Length > 1 ? int.Parse(args[1]) : 2000, args.Length > 2 ? int.Parse(args[2]) : 6000);
    return;
}

var conditioning = args is ["conditioning", ..];
if (conditioning) args = args[1..];

if (args is ["reading", var file, ..])
{
    Reading.Report(file, args.Length > 2 ? int.Parse(args[2]) : 3);
    return;
}

if (args is ["rating", ..])
{
    RatingBenchmark.Run(args.Length > 1 ? int.Parse(args[1]) : 4000);
    return;
}

var side = args.Length > 0 ? int.Parse(args[0]) : 2000;
var turns = args.Length > 1 ? int.Parse(args[1]) : 3;
if (conditioning)
{
    Conditioning.Print(side, turns);
    return;
}

Console.WriteLine($"{side} x {side} cells, one thread, best of {turns}; ns a cell");
Console.WriteLine("Ratio: processor time of the whole stage and the labels over that of `gdaldem slope` on the same cells in a bare / a compressed file.");
Console.WriteLine("| terrain | raised % | fill | directions | accumulation | whole stage | labels 1000 | paths 1000 | streams | allocated B a cell | whole + labels, CPU | gdaldem slope, CPU | ratio |");
Console.WriteLine("|---|---|---|---|---|---|---|---|---|---|---|---|---|");
foreach (var (name, make) in Shapes.All)
{
    var z = make(side);
    var best = new double[7];
    Array.Fill(best, double.PositiveInfinity);
    FilledSurface? filled = null;
    long bytes = 0;
    var cpu = double.PositiveInfinity;
    for (var turn = 0; turn < turns; turn++)
    {
        filled = Time(0, () => DepressionFilling.Fill(z));
        var direction = Time(1, () => FlowDirections.Resolve(filled.Surface));
        var accumulation = Time(2, () => FlowAccumulation.Count(direction, z));
        var before = GC.GetAllocatedBytesForCurrentThread();
        Time(3, () => Drainage.Solve(z));
        bytes = GC.GetAllocatedBytesForCurrentThread() - before;
        var outlets = Outlets(accumulation);
        Time(4, () => WatershedLabels.Label(direction, outlets));
        Time(5, () => LongestFlowPath.Trace(direction, outlets));
        Time(6, () => StreamNetwork.Extract(direction, accumulation, 80_000));

        // All threads count, the collector's and the compiler's too.
        GC.Collect();
        var spent = Environment.CpuUsage.TotalTime;
        WatershedLabels.Label(Drainage.Solve(z).Direction, outlets);
        cpu = Math.Min(cpu, (Environment.CpuUsage.TotalTime - spent).TotalNanoseconds / z.Cells.Length);
    }

    var slope = GdalSlope.NanosecondsPerCell(z, turns);

    Console.WriteLine(
        $"| {name} | {100.0 * filled!.RaisedCells / z.Cells.Length:0.0} | {string.Join(" | ", best.Select(b => $"{b:0}"))} | {bytes / (double)z.Cells.Length:0.0} | {cpu:0} | {(slope is { } s ? $"{s.Bare:0} / {s.Compressed:0} | {Ratio(cpu, s.Bare)} / {Ratio(cpu, s.Compressed)}" : "no gdaldem |")} |");

    T Time<T>(int column, Func<T> work)
    {
        GC.Collect();
        var clock = Stopwatch.StartNew();
        var result = work();
        best[column] = Math.Min(best[column], clock.Elapsed.TotalNanoseconds / z.Cells.Length);
        return result;
    }
}

// The shell counts processor time in 10 ms: a grid that gdaldem runs through within one tick gives no ratio.
static string Ratio(double own, double other) => other > 0 ? $"{own / other:0.00}" : "grid too small";

static int[] Outlets(Grid<int> accumulation)
{
    // Cells of some size, spread over the grid: they nest.
    var chance = new Random(1);
    var outlets = new HashSet<int>();
    for (var draw = 0; outlets.Count < 1000 && draw < 100_000_000; draw++)
    {
        var cell = chance.Next(accumulation.Cells.Length);
        if (accumulation.Cells[cell] > 100) outlets.Add(cell);
    }

    return [.. outlets];
}
