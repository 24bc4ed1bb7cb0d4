using CsCheck;
using GeoCulvert.Design.Basis;
using GeoCulvert.Design.Hydraulics;
using GeoCulvert.Design.Tests.Conventions;
using MathNet.Numerics.OdeSolvers;

namespace GeoCulvert.Design.Tests.Hydraulics;

/// <summary>Level-pool routing against SciPy, MathNet, closed forms and its own balance.</summary>
public sealed class LevelPoolRoutingTests
{
    private static readonly PublishedTable Oracle = PublishedTable.Parse(
        "level_pool_routing.csv", File.ReadAllText(Repository.Path("tests", "GeoCulvert.Design.Tests", "Hydraulics", "Oracles", "level_pool_routing.csv")));

    public static TheoryData<string> Cases() => [.. Oracle.Rows.Select(r => r.Text("case"))];

    private static StageStorage Storage(double bed, double depth, int n, Func<double, double> volume, Func<double, double> area) =>
        new([.. Enumerable.Range(0, n + 1).Select(k => depth * k / n).Select(h => new StoragePoint(bed + h, area(h), volume(h)))]);

    private static OutflowPoint[] Rating(double invert, double depth, int n, Func<double, double> outflow) =>
        [.. Enumerable.Range(0, n + 1).Select(k => depth * k / n).Select(h => new OutflowPoint(invert + h, outflow(h)))];

    /// <summary>SciPy's LSODA on the smooth functions (make_routing_oracles.py); 2000 points in each table leave 1e-3 for the straight pieces.</summary>
    [Theory]
    [MemberData(nameof(Cases))]
    public void Routed_floods_agree_with_SciPy(string id)
    {
        var row = Oracle.Rows.Single(r => r.Text("case") == id);
        double N(string column) => row.Number(column);
        double bed = N("bed_m"), invert = N("invert_m"), c = N("c"), p = N("p"), k = N("k"), q = N("q");
        var storage = Storage(bed, 5, 2000, h => c * Math.Pow(h, p), h => c * p * Math.Pow(h, p - 1));
        var flood = new LevelPoolRouting(storage, Rating(invert, 5, 2000, h => k * Math.Pow(h, q))).Route([0, N("rise_s"), N("base_s")], [0, N("peak_m3_s"), 0])!;
        Assert.True(flood.IsConverged);
        Assert.Equal(N("peak_outflow_m3_s"), flood.Peak.OutflowM3PerS, 1e-3 * N("peak_outflow_m3_s"));
        Assert.Equal(N("highest_level_m"), flood.HighestLevelM, 2e-3);
        Assert.Equal(N("peak_time_s"), flood.Peak.TimeS, 0.01 * N("base_s"));
        Assert.Equal(N("last_storage_m3"), flood.Points[^1].StorageM3, (1e-3 * flood.Points.Max(x => x.StorageM3)) + 0.01);
        Assert.InRange(Math.Abs(flood.BalanceErrorShare), 0, 1e-6);
    }

    /// <summary>
    /// Linear reservoir, S = K O, under a flow that rises as m t: O = m (t - K (1 - exp(-t/K))), by hand from K dO/dt + O = m t. K = 1800 s, m = 1e-3
    /// m3/s2, at 3600 s: O = 3.6 - 1.8 (1 - e^-2) = 2.043604.
    /// </summary>
    [Fact]
    public void Linear_reservoir_follows_its_closed_form()
    {
        var storage = new StageStorage([new(0, 900, 0), new(10, 900, 9000)]);
        var flood = new LevelPoolRouting(storage, [new(0, 0), new(10, 5)]).Route([0, 3600], [0, 3.6])!;
        Assert.Equal(2.043604, flood.Points[^1].OutflowM3PerS, 2e-4 * 2.043604);
        foreach (var point in flood.Points)
            Assert.Equal(1e-3 * (point.TimeS - (1800 * (1 - Math.Exp(-point.TimeS / 1800)))), point.OutflowM3PerS, 1e-3);
    }

    /// <summary>MathNet's Runge-Kutta of dS/dt = I - O(S) on tables of few, uneven points, read by a search of its own.</summary>
    [Fact]
    public void Uneven_tables_agree_with_a_Runge_Kutta_integration()
    {
        (double H, double S)[] s = [(100, 0), (100.4, 60), (101, 400), (101.1, 900), (103, 5000)];
        (double H, double O)[] o = [(100, 0), (100.3, 0.2), (101.2, 1.5), (102, 2.0), (104, 9)];
        double[] t = [0, 600, 1200, 2400, 6000], i = [0, 1, 4, 2.5, 0];
        var flood = new LevelPoolRouting(new([.. s.Select(x => new StoragePoint(x.H, x.S, x.S))]), [.. o.Select(x => new OutflowPoint(x.H, x.O))]).Route(t, i)!;

        const int n = 60001;
        var y = RungeKutta.FourthOrder(
            0, 0, 6000, n, (time, stored) => Read([.. t.Zip(i)], time) - Read([.. o.Select(x => (x.H, x.O))], Read([.. s.Select(x => (x.S, x.H))], stored)));
        var peak = y.Max(stored => Read([.. o.Select(x => (x.H, x.O))], Read([.. s.Select(x => (x.S, x.H))], stored)));
        Assert.Equal(peak, flood.Peak.OutflowM3PerS, 3e-4 * peak);
        foreach (var point in flood.Points)
            Assert.Equal(y[(int)Math.Round(point.TimeS * (n - 1) / 6000)], point.StorageM3, 1e-3 * y.Max());

        static double Read((double X, double Y)[] table, double x)
        {
            for (var k = 1; k < table.Length; k++)
                if (x <= table[k].X || (k == table.Length - 1 && x < table[k].X + 1e-6)) return table[k - 1].Y + ((x - table[k - 1].X) / (table[k].X - table[k - 1].X) * (table[k].Y - table[k - 1].Y));
            throw new InvalidOperationException($"{x}");
        }
    }

    [Fact]
    public void A_pool_without_room_lets_the_flood_through_unchanged()
    {
        var storage = new StageStorage([new(0, 0, 0), new(10, 0, 0)]);
        var flood = new LevelPoolRouting(storage, [new(0, 0), new(1, 1), new(10, 40)]).Route([0, 500, 1500], [0, 30, 0])!;
        Assert.All(flood.Points, p => Assert.Equal(p.InflowM3PerS, p.OutflowM3PerS, 9));
        Assert.Equal(30, flood.Peak.OutflowM3PerS, 9);
    }

    [Fact]
    public void Storage_below_the_invert_attenuates_nothing()
    {
        // The same pool with 1000 m3 more below the invert: the same flood leaves.
        OutflowPoint[] rating = [new(5, 0), new(6, 2), new(9, 12)];
        var without = new LevelPoolRouting(new([new(5, 300, 0), new(9, 300, 1200)]), rating).Route([0, 600, 2400], [0, 5, 0])!;
        var with = new LevelPoolRouting(new([new(3, 0, 0), new(5, 300, 1000), new(9, 300, 2200)]), rating).Route([0, 600, 2400], [0, 5, 0])!;
        Assert.Equal(without.Peak.OutflowM3PerS, with.Peak.OutflowM3PerS, 9);
        Assert.Equal(1000, with.Points[0].StorageM3, 9);
    }

    [Fact]
    public void Water_above_the_tables_gives_no_flood()
    {
        var routing = new LevelPoolRouting(new([new(0, 10, 0), new(1, 10, 10)]), [new(0, 0), new(5, 1)]);
        Assert.Null(routing.Route([0, 1000, 2000], [0, 3, 0]));
    }

    [Fact]
    public void Tables_that_do_not_rise_are_refused()
    {
        StageStorage storage = new([new(0, 10, 0), new(1, 10, 10)]);
        Assert.Throws<ArgumentException>(() => new LevelPoolRouting(storage, [new(0, 0), new(1, 2), new(2, 2)]));
        Assert.Throws<ArgumentException>(() => new LevelPoolRouting(storage, [new(0, 0.1), new(1, 2)]));
        Assert.Throws<ArgumentException>(() => new LevelPoolRouting(storage, [new(3, 0), new(4, 2)]));
        Assert.Throws<ArgumentException>(() => new StageStorage([new(0, 10, 0), new(1, 10, 10), new(2, 10, 9)]));
        Assert.Throws<ArgumentOutOfRangeException>(() => storage.VolumeM3(1.5));
    }

    /// <summary>For any tables and flood: the balance closes, the peak is not raised, nothing goes below empty, more room never lets more through.</summary>
    [Fact]
    public void Routing_keeps_water_and_lowers_the_peak()
    {
        var step = Gen.Double[0.01, 3];
        Gen.Select(Gen.Select(step, Gen.Double[0, 2000]).Array[2, 12], Gen.Select(step, step).Array[2, 12], Gen.Select(Gen.Double[30, 2000], Gen.Double[0, 8]).Array[2, 12]).Sample((s, o, f) =>
        {
            double level = 0, volume = 0, flow = 0, time = 0;
            var storage = new List<StoragePoint> { new(0, 1, 0) };
            foreach (var (dh, dv) in s) storage.Add(new(level += dh, 1, volume += dv));
            storage.Add(new(level + 200, 1, volume + 2000));
            level = 0;
            var rating = new List<OutflowPoint> { new(0, 0) };
            foreach (var (dh, dq) in o) rating.Add(new(level += dh, flow += dq));
            rating.Add(new(level + 60, flow + 60));
            var times = new List<double> { 0 };
            var flows = new List<double> { 0 };
            foreach (var (dt, q) in f)
            {
                times.Add(time += dt);
                flows.Add(q);
            }

            var routed = new LevelPoolRouting(new(storage), rating).Route(times, flows)!;
            var bigger = new LevelPoolRouting(new([.. storage.Select(p => p with { VolumeM3 = 2 * p.VolumeM3 })]), rating).Route(times, flows)!;
            Assert.InRange(Math.Abs(routed.BalanceErrorShare), 0, 1e-6);
            Assert.InRange(routed.Peak.OutflowM3PerS, 0, flows.Max() * (1 + 1e-6));
            Assert.All(routed.Points, p => Assert.True(p.OutflowM3PerS >= 0 && p.StorageM3 >= 0));
            Assert.True(routed.Peak.OutflowM3PerS >= bigger.Peak.OutflowM3PerS - (2e-3 * flows.Max()), $"{routed.Peak} {bigger.Peak} {routed.IsConverged} {bigger.IsConverged}");
        });
    }
}
