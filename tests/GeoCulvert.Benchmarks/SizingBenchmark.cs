using System.Diagnostics;
using GeoCulvert.Design.Hydraulics;
using GeoCulvert.Design.Sizing;

namespace GeoCulvert.Benchmarks;

/// <summary>Sizing of many random crossings over the full catalogue, each then rated at five floods, beside a plain scan of every option on some of them.</summary>
internal static class SizingBenchmark
{
    private const int PlainJobs = 200, Floods = 5;

    /// <summary>Prints the times and their ratio.</summary>
    /// <param name="jobs">Crossings.</param>
    public static void Run(int jobs)
    {
        InletType[] inlets = [InletCatalogue.Find("hds5-1-1", "benchmark"), InletCatalogue.Find("hds5-1-3", "benchmark"), InletCatalogue.Find("hds5-8-1", "benchmark")];
        var catalogue = CulvertCatalogue.Build(inlets, ["circle", "box"], 0.012, null, 4);
        var random = new Random(7);
        double Between(double low, double high) => low + ((high - low) * random.NextDouble());
        var requests = Enumerable.Range(0, jobs).Select(_ =>
        {
            var flow = Math.Exp(Between(Math.Log(0.1), Math.Log(60)));
            return new SizingRequest(
                catalogue, new SizingCriteria(), flow, 1.4 * flow, Between(10, 60), 100, 100 - Between(0.05, 2), new FixedTailwater(98.5 + Between(0, 1.5)), RoadCrest.Level(100 + Between(1.5, 6), 60, 9, RoadSurface.Paved));
        }).ToArray();
        foreach (var request in requests.Take(100)) CulvertSizing.Choose(request);

        var clock = Stopwatch.StartNew();
        var outcomes = requests.Select(CulvertSizing.Choose).ToArray();
        var searchS = clock.Elapsed.TotalSeconds;
        clock.Restart();
        long ratings = 0;
        foreach (var chosen in outcomes.Select(o => o.Chosen).OfType<SizingOption>())
            for (var k = 0; k < Floods; k++, ratings++) CulvertHydraulics.Rate(chosen.Design.Site, chosen.Design.FlowM3PerS * (0.4 + (0.25 * k)));
        var floodsS = clock.Elapsed.TotalSeconds;
        clock.Restart();
        var wrong = 0;
        for (var i = 0; i < Math.Min(PlainJobs, jobs); i++)
        {
            SizingOption? best = null;
            foreach (var (choice, count) in catalogue.ByArea)
            {
                var option = CulvertSizing.Rate(requests[i], choice, count);
                if (best is null && option.MeetsAll) best = option;
            }

            if (best?.Description != outcomes[i].Chosen?.Description) wrong++;
        }

        var plainS = clock.Elapsed.TotalSeconds * jobs / Math.Min(PlainJobs, jobs);
        var rated = outcomes.Sum(o => o.Options.Count(x => x.IsRated));
        Console.WriteLine(FormattableString.Invariant($"sizing {jobs} crossings, {catalogue.ByArea.Count} options each: search {1e6 * searchS / jobs:0} us a crossing ({(double)rated / jobs:0.0} options rated), plain scan {1e6 * plainS / jobs:0} us (from {Math.Min(PlainJobs, jobs)}), ratio {searchS / plainS:0.000}"));
        Console.WriteLine(FormattableString.Invariant($"  {Floods} floods each: {1e6 * floodsS / Math.Max(ratings, 1):0.0} us a rating; whole job {(searchS + floodsS) / (plainS + floodsS):0.000} of the plain scan; {wrong} answers differ; {outcomes.Count(o => o.Chosen is null)} without a fitting size"));
    }
}
