using GeoCulvert.Design.Terrain;
using NetTopologySuite.Geometries;

namespace GeoCulvert.Benchmarks;

/// <summary>Times of cuts, depressions and mapped streams: nanoseconds of processor time a cell, best of the turns.</summary>
internal static class Conditioning
{
    public static void Print(int side, int turns)
    {
        Console.WriteLine($"{side} x {side} cells, processor time, best of {turns}; ns a cell; cuts up to 100 m long and 3 m deep");
        Console.WriteLine("| terrain | pits | breach | cuts | left | filled after % | mix | cuts | left | filled after % | depressions | number | 200 streams |");
        Console.WriteLine("|---|---|---|---|---|---|---|---|---|---|---|---|---|");
        foreach (var (name, make) in Shapes.All)
        {
            var z = make(side);
            var filled = DepressionFilling.Fill(z);
            var best = new double[4];
            Array.Fill(best, double.PositiveInfinity);
            BreachedSurface? breach = null, mix = null;
            DepressionMap? map = null;
            for (var turn = 0; turn < turns; turn++)
            {
                breach = Time(0, () => DepressionBreaching.Breach(z, new BreachSettings(DepressionMethod.Breach, 100, 3)));
                mix = Time(1, () => DepressionBreaching.Breach(z, new BreachSettings(DepressionMethod.Mix, 100, 3)));
                map = Time(2, () => Depressions.Find(z, filled.Surface));
                var streams = Streams(z.Frame);
                Time(3, () => StreamEnforcement.Enforce(z, streams, new StreamSettings()));
            }

            Console.WriteLine(
                $"| {name} | {breach!.Pits} | {best[0]:0} | {breach.Breaches.Count} | {breach.Left} | {FilledPct(breach):0.0} | {best[1]:0} | {mix!.Breaches.Count} | {mix.Left} | {FilledPct(mix):0.0} | {best[2]:0} | {map!.All.Count} | {best[3]:0} |");

            T Time<T>(int column, Func<T> work)
            {
                GC.Collect();
                var before = Environment.CpuUsage.TotalTime;
                var result = work();
                best[column] = Math.Min(best[column], (Environment.CpuUsage.TotalTime - before).TotalNanoseconds / z.Cells.Length);
                return result;
            }
        }
    }

    private static double FilledPct(BreachedSurface surface) => 100.0 * DepressionFilling.Fill(surface.Surface).RaisedCells / surface.Surface.Cells.Length;

    private static List<MappedCourse> Streams(GridFrame frame)
    {
        var chance = new Random(3);
        Coordinate Point() => new(frame.West + (chance.NextDouble() * (frame.East - frame.West)), frame.South + (chance.NextDouble() * (frame.North - frame.South)));
        return [.. Enumerable.Range(0, 200).Select(k => new MappedCourse($"{k}", new LineString([Point(), Point(), Point()])))];
    }
}
