using GeoCulvert.Design.Basis;

namespace GeoCulvert.Design.Hydraulics;

/// <summary>How a flow divides under one headwater.</summary>
/// <param name="LevelM">Headwater elevation, m.</param>
/// <param name="FlowsM3PerS">Flow of each group of barrels, m3/s.</param>
/// <param name="RoadFlowM3PerS">Flow over the road, m3/s.</param>
internal readonly record struct FlowSplit(double LevelM, double[] FlowsM3PerS, double RoadFlowM3PerS);

/// <summary>
/// The one headwater under which the flows of all groups of barrels and the flow over the road add up to the total:
/// <code>q1(z) + q2(z) + ... + W(z) = Q        qi the inverse of the group's own headwater hi(q), W the weir</code>
/// Where a barrel passes from free to full flow hi jumps upward; between the two levels the group keeps its flow.
/// </summary>
internal static class SharedHeadwater
{
    /// <summary>A group that carries less than this share of the flow is taken as empty.</summary>
    public const double LeastShare = 1e-9;

    // Share of the flow within which the parts add up before what is left of the search is settled.
    private const double Conserved = 1e-8;

    /// <summary>Level at which a group begins to carry water, m: inlet invert, outlet invert of a rising barrel, tailwater.</summary>
    public static double StillM(CulvertBarrels barrels, double tailwaterM) => Math.Max(Math.Max(barrels.InletElevationM, barrels.OutletElevationM), tailwaterM);

    /// <summary>Divides a flow.</summary>
    public static FlowSplit Divide(IReadOnlyList<CulvertBarrels> groups, RoadCrest? road, double flowM3PerS, double tailwaterM)
    {
        if (flowM3PerS <= 0) return new FlowSplit(groups.Min(g => Math.Max(g.InletElevationM, tailwaterM)), new double[groups.Count], 0);
        return groups.Count == 1 ? One(groups[0], road, flowM3PerS, tailwaterM) : Several(groups, road, flowM3PerS, tailwaterM);
    }

    /// <summary>Flow of a group at a headwater level, m3/s: the inverse of its rating.</summary>
    public static double FlowM3PerS(CulvertBarrels barrels, double levelM, double tailwaterM)
    {
        if (levelM <= StillM(barrels, tailwaterM)) return 0;
        var high = barrels.AreaM2 * Math.Sqrt(barrels.Section.RiseM);
        while (HeadwaterM(barrels, high, tailwaterM) < levelM) high *= 4;
        return new GroupInverse(barrels, tailwaterM, high).At(levelM);
    }

    private static FlowSplit One(CulvertBarrels group, RoadCrest? road, double flow, double tailwater)
    {
        var all = HeadwaterM(group, flow, tailwater);
        if (road is null || all <= Math.Max(road.LowestM, tailwater)) return new FlowSplit(all, [flow], 0);

        // The level of the barrels against the level of the road, as flow over the road to the power 2/3, in which both are nearly straight;
        // below the road the level goes on as a line.
        double least = LeastShare * flow, lowest = Math.Max(road.LowestM, tailwater);
        var slope = Power(RoadOvertopping.FlowM3PerS(road, all, tailwater)) / (all - lowest);
        double Excess(double through)
        {
            var level = HeadwaterM(group, through, tailwater);
            var over = level > lowest ? Power(RoadOvertopping.FlowM3PerS(road, level, tailwater)) : slope * (level - lowest);
            return over - Power(Math.Max(0, flow - through));
        }

        // Barrels mostly carry a fair share: come down to it by quarters, so that the search begins close.
        double high = flow, low = flow / 4;
        while (low > least && Excess(low) >= 0) (high, low) = (low, low / 4);
        var barrel = low > least || Excess(low = least) < 0 ? RootFinding.Bracketed(Excess, low, high) : 0;
        if (barrel > 0)
        {
            // The road's share by the very level that is reported; the barrels keep theirs within the width of the search.
            var level = HeadwaterM(group, barrel, tailwater);
            var over = level > tailwater ? RoadOvertopping.FlowM3PerS(road, level, tailwater) : 0;
            if (Math.Abs(over + barrel - flow) <= Conserved * flow) return new FlowSplit(level, [flow - over], over);
        }

        // The barrels' own headwater jumps, or they are empty, or the road is drowned: the road alone sets the level.
        return new FlowSplit(RoadOvertopping.LevelM(road, flow - barrel, tailwater), [barrel], flow - barrel);
    }

    private static FlowSplit Several(IReadOnlyList<CulvertBarrels> groups, RoadCrest? road, double flow, double tailwater)
    {
        var inverses = groups.Select(g => new GroupInverse(g, tailwater, flow)).ToArray();
        // Heights above the lowest level at which anything flows, so that the search is as fine at any elevation.
        var datum = groups.Min(g => StillM(g, tailwater));
        if (road is not null) datum = Math.Min(datum, Math.Max(road.LowestM, tailwater));
        var high = inverses.Min(i => i.LevelOfAllM) - datum;
        double Road(double level) => road is null || level <= tailwater ? 0 : RoadOvertopping.FlowM3PerS(road, level, tailwater);
        double Surplus(double above) => inverses.Sum(i => i.At(datum + above)) + Road(datum + above) - flow;
        var level = datum + (high <= 0 || Surplus(high) <= 0 ? high : RootFinding.Bracketed(Surplus, Math.Min(0, high / 2), high));
        var flows = inverses.Select(i => i.At(level)).ToArray();
        var left = flow - flows.Sum();
        // The road takes what the barrels leave, so that no flow is lost to the width of the search.
        if (left > 0 && Road(level) > 0) return new FlowSplit(level, flows, left);
        // What is left of the search goes to the group that carries most.
        flows[Array.IndexOf(flows, flows.Max())] += left;
        return new FlowSplit(level, flows, 0);
    }

    private static double HeadwaterM(CulvertBarrels barrels, double flow, double tailwater) => CulvertHydraulics.HeadwaterElevationM(barrels, flow, tailwater);

    private static double Power(double flow) => Math.Cbrt(flow * flow);

    /// <summary>The inverse of a group's rating up to a flow, which remembers what it has answered.</summary>
    private sealed class GroupInverse(CulvertBarrels barrels, double tailwaterM, double largestM3PerS)
    {
        private readonly double _least = LeastShare * largestM3PerS;
        private readonly List<(double LevelM, double FlowM3PerS)> _answers = [];

        public double LevelOfAllM { get; } = HeadwaterM(barrels, largestM3PerS, tailwaterM);

        public double At(double level)
        {
            if (level >= LevelOfAllM) return largestM3PerS;
            if (level <= StillM(barrels, tailwaterM)) return 0;
            // Answers so far bracket this one; where their rounding does not, search the whole range.
            double low = _least, high = largestM3PerS;
            foreach (var (at, flow) in _answers)
            {
                if (at <= level) low = Math.Max(low, flow);
                if (at >= level) high = Math.Min(high, flow);
            }

            if (Excess(low) >= 0 && (low == _least || Excess(low = _least) >= 0)) return 0;
            if (Excess(high) <= 0) high = largestM3PerS;
            var answer = RootFinding.Bracketed(Excess, low, high);
            _answers.Add((level, answer));
            return answer;

            double Excess(double q) => HeadwaterM(barrels, q, tailwaterM) - level;
        }
    }
}
