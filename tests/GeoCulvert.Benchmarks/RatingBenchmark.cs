using System.Diagnostics;
using GeoCulvert.Design.Hydraulics;

namespace GeoCulvert.Benchmarks;

/// <summary>Microseconds for one rating, by kind of road and whether it is overtopped, and for several groups of barrels; the same invented culverts every time.</summary>
internal static class RatingBenchmark
{
    private const int Turns = 3;

    /// <summary>Prints mean, median and 95th percentile of the best of three turns of every rating, one thread.</summary>
    /// <param name="culverts">Culverts.</param>
    public static void Run(int culverts)
    {
        var random = new Random(5);
        double Between(double low, double high) => low + ((high - low) * random.NextDouble());
        CulvertBarrels Barrels()
        {
            var inlet = InletCatalogue.All[random.Next(InletCatalogue.All.Count)];
            var (rise, length) = (Between(0.4, 3), Between(8, 100));
            ISection section = inlet.Shape == "circle" ? new CircleSection(rise) : new BoxSection(Between(0.6, 2) * rise, rise);
            return new(section, random.Next(1, 4), inlet, Between(0.01, 0.03), inlet.EntranceLossCoefficient, length, 100, 100 - (Between(-0.005, 0.06) * length));
        }

        RoadCrest Road(bool level, double low) => level ? RoadCrest.Level(low, 40, 9, RoadSurface.Paved)
            : new([.. Enumerable.Range(0, 51).Select(k => (2.0 * k, low + (0.02 * Math.Abs(k - 20))))], 9, RoadSurface.Gravel);

        var jobs = Enumerable.Range(0, culverts).Select(i =>
        {
            var barrels = Barrels();
            var rise = barrels.Section.RiseM;
            var site = new CulvertSite(barrels, new FixedTailwater(barrels.OutletElevationM + (Between(0, 1.5) * rise)), Road(i % 2 == 0, 100 + (Between(1.1, 3) * rise)));
            return (Kind: i % 2 == 0 ? "level road" : "road of 51 points", Site: site, FlowM3PerS: Between(0.1, 4) * barrels.AreaM2 * Math.Sqrt(rise));
        }).ToArray();
        foreach (var j in jobs) CulvertHydraulics.Rate(j.Site, j.FlowM3PerS);
        Console.WriteLine("| rating | culverts | mean us | median us | 95th percentile us |");
        Console.WriteLine("|---|---|---|---|---|");
        var timed = jobs.Select(j => (j.Kind, Us: Best(() => CulvertHydraulics.Rate(j.Site, j.FlowM3PerS), out var r), Over: r.RoadFlowM3PerS > 0)).ToList();
        foreach (var kind in timed.GroupBy(t => $"{t.Kind}, {(t.Over ? "overtopped" : "dry")}").OrderBy(g => g.Key, StringComparer.Ordinal)) Print(kind.Key, [.. kind.Select(t => t.Us)]);
        Print("all", [.. timed.Select(t => t.Us)]);
        Print("all overtopped", [.. timed.Where(t => t.Over).Select(t => t.Us)]);

        var grouped = jobs.Take(culverts / 10).Select(j => (Site: new GroupedSite([j.Site.Barrels, Barrels(), Barrels()], j.Site.Tailwater, j.Site.Road), FlowM3PerS: 2.5 * j.FlowM3PerS)).ToArray();
        foreach (var g in grouped) BarrelGroups.Rate(g.Site, g.FlowM3PerS);
        Print("three groups of barrels", [.. grouped.Select(g => Best(() => BarrelGroups.Rate(g.Site, g.FlowM3PerS), out _))]);
    }

    private static double Best<T>(Func<T> work, out T result)
    {
        var best = double.PositiveInfinity;
        result = default!;
        for (var k = 0; k < Turns; k++)
        {
            var start = Stopwatch.GetTimestamp();
            result = work();
            best = Math.Min(best, Stopwatch.GetElapsedTime(start).TotalMicroseconds);
        }

        return best;
    }

    private static void Print(string name, double[] us)
    {
        Array.Sort(us);
        Console.WriteLine(us.Length == 0 ? $"| {name} | 0 | | | |" : FormattableString.Invariant($"| {name} | {us.Length} | {us.Average():0.0} | {us[us.Length / 2]:0.0} | {us[(int)(0.95 * (us.Length - 1))]:0.0} |"));
    }
}
