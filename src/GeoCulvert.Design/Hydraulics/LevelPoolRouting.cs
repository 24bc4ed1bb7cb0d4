namespace GeoCulvert.Design.Hydraulics;

/// <summary>Total outflow at a headwater level.</summary>
/// <param name="LevelM">Headwater elevation, m.</param>
/// <param name="OutflowM3PerS">All that leaves, through the barrels and over the road, m3/s.</param>
public sealed record OutflowPoint(double LevelM, double OutflowM3PerS);

/// <summary>One moment of a routed flood.</summary>
/// <param name="TimeS">Time, s.</param>
/// <param name="InflowM3PerS">Inflow, m3/s.</param>
/// <param name="OutflowM3PerS">Outflow, m3/s.</param>
/// <param name="LevelM">Water level, m.</param>
/// <param name="StorageM3">Volume stored above the bed, m3.</param>
public sealed record RoutedPoint(double TimeS, double InflowM3PerS, double OutflowM3PerS, double LevelM, double StorageM3);

/// <summary>A flood routed through a pool.</summary>
/// <param name="Points">Every step.</param>
/// <param name="StepsPerInterval">Steps between two points of the inflow.</param>
/// <param name="IsConverged">Whether halving the step no longer changes the peak.</param>
/// <param name="InflowVolumeM3">Volume that came, m3.</param>
/// <param name="OutflowVolumeM3">Volume that left by the end of the inflow, m3, summed step by step with the weights of the method.</param>
public sealed record RoutedFlood(IReadOnlyList<RoutedPoint> Points, int StepsPerInterval, bool IsConverged, double InflowVolumeM3, double OutflowVolumeM3)
{
    /// <summary>The moment of the largest outflow; the first of several.</summary>
    public RoutedPoint Peak => Points.MaxBy(p => p.OutflowM3PerS)!;

    /// <summary>Largest inflow at a step, m3/s.</summary>
    public double PeakInflowM3PerS => Points.Max(p => p.InflowM3PerS);

    /// <summary>Highest level, m.</summary>
    public double HighestLevelM => Points.Max(p => p.LevelM);

    /// <summary>What came less what left and what was added to the storage, over what came.</summary>
    public double BalanceErrorShare =>
        InflowVolumeM3 > 0 ? (InflowVolumeM3 - OutflowVolumeM3 - (Points[^1].StorageM3 - Points[0].StorageM3)) / InflowVolumeM3 : 0;
}

/// <summary>
/// Level-pool routing by storage indication: dS/dt = I - O with storage and outflow both functions of one level.
/// <para>Notation: S storage (m3), I inflow, O outflow (m3/s), dt step (s), 1 and 2 its ends.</para>
/// <para>Storage indication: 2 S2/dt + O2 = I1 + I2 + 2 S1/dt - O1; its left side rises with the level, so that the level follows from it. It
/// swings where dt is above 2 (S2 - S1)/(O2 - O1), as in the first centimetres of a pool. Such a step is taken by the diagonally implicit
/// method of two stages and second order that follows the inflow where there is no storage (Alexander 1977; g = 1 - 1/sqrt 2), stage 1 at
/// g dt: Sa + g dt Oa = S1 + g dt Ia, then S2 + g dt O2 = S1 + (1 - g) dt (Ia - Oa) + g dt I2; and where that would leave the
/// span of old outflow and inflow or empty the pool below its bed, with the outflow of the end alone: S2 + dt O2 = S1 + dt (I1 + I2)/2. All three keep the balance.</para>
/// <para>Step: halved until the peak outflow changes by less than 1e-4 of itself twice in turn; where outflow catches up with a falling inflow, the step is cut there,
/// so that the crest is a step of its own.</para>
/// <para>Before the flood the pool stands where the outflow equals the first inflow: storage below the invert is full and attenuates nothing.</para>
/// </summary>
public sealed class LevelPoolRouting
{
    /// <summary>Largest change of the peak outflow on halving the step, share of it.</summary>
    public const double PeakToleranceShare = 1e-4;

    private const int LeastSteps = 256;
    private const int MostHalvings = 8;

    // The first stage's share of a stiff step.
    private static readonly double Early = 1 - Math.Sqrt(0.5);

    // One table of level, storage and outflow, straight between the points; storage + outflow rises strictly from each to the next.
    private readonly double[] _level, _storage, _outflow;

    /// <summary>Joins storage and rating to one table.</summary>
    /// <param name="storage">Volume against level.</param>
    /// <param name="rating">Outflow against level, both rising; the first without outflow. Straight between.</param>
    /// <exception cref="ArgumentException">The rating has fewer than two points, does not rise, or begins with an outflow; or lies wholly above the storage table.</exception>
    public LevelPoolRouting(StageStorage storage, IReadOnlyList<OutflowPoint> rating)
    {
        ArgumentNullException.ThrowIfNull(storage);
        ArgumentNullException.ThrowIfNull(rating);
        if (rating.Count < 2 || rating[0].OutflowM3PerS != 0) throw new ArgumentException("two points or more, the first without outflow", nameof(rating));
        for (var k = 1; k < rating.Count; k++)
            if (!(rating[k].LevelM > rating[k - 1].LevelM) || !(rating[k].OutflowM3PerS > rating[k - 1].OutflowM3PerS))
                throw new ArgumentException($"point {k} does not rise above point {k - 1}", nameof(rating));

        // The level without outflow is where everything begins; what lies below it never moves.
        double start = rating[0].LevelM, top = Math.Min(storage.HighestM, rating[^1].LevelM);
        if (!(top > start)) throw new ArgumentException("the rating begins above the storage table", nameof(rating));
        _level = [.. rating.Select(p => p.LevelM).Concat(storage.Points.Select(p => p.LevelM)).Append(top).Where(h => h >= start && h <= top).Distinct().Order()];
        _storage = [.. _level.Select(storage.VolumeM3)];
        _outflow = new double[_level.Length];
        for (int i = 0, k = 1; i < _level.Length; i++)
        {
            while (rating[k].LevelM < _level[i]) k++;
            var (a, b) = (rating[k - 1], rating[k]);
            _outflow[i] = a.OutflowM3PerS + ((_level[i] - a.LevelM) / (b.LevelM - a.LevelM) * (b.OutflowM3PerS - a.OutflowM3PerS));
        }
    }

    /// <summary>Routes a flood.</summary>
    /// <param name="timesS">Times, s, rising.</param>
    /// <param name="inflowsM3PerS">Inflow at each, m3/s, not negative; straight between.</param>
    /// <returns>The flood; null when the water rises above the tables.</returns>
    public RoutedFlood? Route(IReadOnlyList<double> timesS, IReadOnlyList<double> inflowsM3PerS)
    {
        ArgumentNullException.ThrowIfNull(timesS);
        ArgumentNullException.ThrowIfNull(inflowsM3PerS);
        if (timesS.Count != inflowsM3PerS.Count || timesS.Count < 2) throw new ArgumentException("as many inflows as times, two or more", nameof(inflowsM3PerS));
        for (var k = 0; k < timesS.Count; k++)
            if (!(inflowsM3PerS[k] >= 0) || (k > 0 && !(timesS[k] > timesS[k - 1]))) throw new ArgumentException($"point {k}: times rise and inflows are not negative", nameof(timesS));

        // Agreement of two coarse routings may be chance: a few hundred steps at least, and three that agree.
        var steps = Math.Max(1, LeastSteps / (timesS.Count - 1));
        var coarse = Route(timesS, inflowsM3PerS, steps);
        for (var (agreed, halvings) = (0, 0); coarse is not null && halvings < MostHalvings; halvings++)
        {
            if (Route(timesS, inflowsM3PerS, steps *= 2) is not { } fine) return null;
            agreed = Math.Abs(fine.Peak.OutflowM3PerS - coarse.Peak.OutflowM3PerS) <= PeakToleranceShare * fine.Peak.OutflowM3PerS ? agreed + 1 : 0;
            coarse = fine with { IsConverged = agreed > 1 };
            if (coarse.IsConverged) break;
        }

        return coarse;
    }

    private RoutedFlood? Route(IReadOnlyList<double> times, IReadOnlyList<double> inflows, int steps)
    {
        if (At(inflows[0], 0, 1) is not { } now) return null;
        var points = new List<RoutedPoint>(((times.Count - 1) * steps) + 1) { new(times[0], inflows[0], now.Outflow, now.Level, now.Storage) };
        double came = 0, left = 0;
        for (var k = 1; k < times.Count; k++)
        {
            var dt = (times[k] - times[k - 1]) / steps;
            for (var s = 1; s <= steps; s++)
            {
                double i1 = points[^1].InflowM3PerS, i2 = s == steps ? inflows[k] : inflows[k - 1] + ((inflows[k] - inflows[k - 1]) * s / steps);
                double t1 = points[^1].TimeS, t2 = s == steps ? times[k] : times[k - 1] + (dt * s);
                if (Crest(now, i1, i2, dt) is < 1 and var share)
                {
                    var crest = i1 + (share * (i2 - i1));
                    if (!Go(t1 + (share * dt), share * dt, i1, crest) || !Go(t2, (1 - share) * dt, crest, i2)) return null;
                }
                else if (!Go(t2, dt, i1, i2)) return null;
            }
        }

        return new(points, steps, false, came, left);

        bool Go(double time, double dt, double i1, double i2)
        {
            if (Step(now, i1, i2, dt) is not { } step) return false;
            came += dt * (i1 + i2) / 2;
            left += step.LeftM3;
            now = step.Then;
            points.Add(new(time, i2, now.Outflow, now.Level, now.Storage));
            return true;
        }
    }

    /// <summary>Share of a step after which outflow has caught up with inflow, where it does so within the step: the crest, between two steps; 1 for none.</summary>
    private double Crest(PoolState now, double i1, double i2, double dt)
    {
        double Short(double share) => Step(now, i1, i1 + (share * (i2 - i1)), share * dt) is { } step ? step.Then.Outflow - (i1 + (share * (i2 - i1))) : double.NegativeInfinity;
        if (!(now.Outflow < i1 && i2 < i1) || !(Short(1) > 0)) return 1;
        double low = 0, high = 1;
        while (high - low > 1e-6)
        {
            var middle = (low + high) / 2;
            if (Short(middle) > 0) high = middle;
            else low = middle;
        }

        return high;
    }

    /// <summary>One step and the volume that leaves in it; null where the water rises above the table.</summary>
    private (PoolState Then, double LeftM3)? Step(PoolState now, double i1, double i2, double dt)
    {
        // Outflow stays between what it was and what comes; a step that breaks this jumped over a bend of the tables.
        double least = Math.Min(now.Outflow, Math.Min(i1, i2)), most = Math.Max(now.Outflow, Math.Max(i1, i2));
        bool Holds(PoolState at) => at.Outflow >= least - (1e-9 * most) && at.Outflow <= most * (1 + 1e-9);
        if (At(i1 + i2 + (2 * now.Storage / dt) - now.Outflow, 2 / dt, 1) is { } then && Holds(then) && dt * Math.Abs(then.Outflow - now.Outflow) <= 2 * Math.Abs(then.Storage - now.Storage))
            return (then, dt * (now.Outflow + then.Outflow) / 2);
        var ia = i1 + (Early * (i2 - i1));
        if (At(now.Storage + (Early * dt * ia), 1, Early * dt) is { } early
            && At(now.Storage + ((1 - Early) * dt * (ia - early.Outflow)) + (Early * dt * i2), 1, Early * dt) is { } late && Holds(late))
            return (late, dt * (((1 - Early) * early.Outflow) + (Early * late.Outflow)));
        return At(now.Storage + (dt * (i1 + i2) / 2), 1, dt) is { } end ? (end, dt * end.Outflow) : null;
    }

    /// <summary>Where a S + b O has a value. Null below or above the table.</summary>
    private PoolState? At(double value, double a, double b)
    {
        double Of(int k) => (a * _storage[k]) + (b * _outflow[k]);
        if (!(value >= Of(0)) || value > Of(_level.Length - 1)) return null;
        int low = 0, high = _level.Length - 1;
        while (high - low > 1)
        {
            var mid = (low + high) / 2;
            if (Of(mid) <= value) low = mid;
            else high = mid;
        }

        var t = (value - Of(low)) / (Of(high) - Of(low));
        double Between(double[] of) => of[low] + (t * (of[high] - of[low]));
        return new(Between(_level), Between(_storage), Between(_outflow));
    }

    private readonly record struct PoolState(double Level, double Storage, double Outflow);
}
