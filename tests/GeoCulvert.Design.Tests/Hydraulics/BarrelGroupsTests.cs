using CsCheck;
using GeoCulvert.Design.Hydraulics;

namespace GeoCulvert.Design.Tests.Hydraulics;

/// <summary>Several groups of barrels and the road under one headwater.</summary>
public class BarrelGroupsTests
{
    private static readonly Gen<CulvertBarrels> Group =
        from which in Gen.Int[0, InletCatalogue.All.Count - 1]
        let inlet = InletCatalogue.All[which]
        from rise in Gen.Double[0.4, 2.5]
        from ratio in Gen.Double[0.6, 2]
        from count in Gen.Int[1, 3]
        from n in Gen.Double[0.01, 0.03]
        from length in Gen.Double[8, 120]
        from slope in Gen.OneOf(Gen.Double[-0.01, 0.06], Gen.Const(0.0))
        from invert in Gen.Double[99.5, 101]
        select new CulvertBarrels(
            inlet.Shape == "circle" ? new CircleSection(rise) : new BoxSection(rise * ratio, rise), count, inlet, n, inlet.EntranceLossCoefficient, length, invert, invert - (slope * length));

    private static readonly Gen<GroupedSite> Site =
        from groups in Group.Array[2, 3]
        from tailwater in Gen.Double[98, 103]
        from road in Gen.OneOf(Gen.Const(double.NaN), Gen.Double[101.5, 105])
        select new GroupedSite(groups, new FixedTailwater(tailwater), double.IsNaN(road) ? null : new RoadCrest([(0, road + 1), (30, road), (55, road + 0.4)], 9, RoadSurface.Paved));

    [Fact]
    public void OneGroupIsTheRatingOfItsBarrels() => Gen.Select(Group, Gen.Double[0.05, 4]).Sample(
        (group, x) =>
        {
            var flow = x * group.AreaM2 * Math.Sqrt(group.Section.RiseM);
            var road = RoadCrest.Level(103, 40, 9, RoadSurface.Gravel);
            var (grouped, single) = (BarrelGroups.Rate(new([group], new FixedTailwater(100), road), flow), CulvertHydraulics.Rate(new(group, new FixedTailwater(100), road), flow));
            return Math.Abs(grouped.HeadwaterElevationM - single.HeadwaterElevationM) < 1e-9 && Math.Abs(grouped.RoadFlowM3PerS - single.RoadFlowM3PerS) < 1e-9 * flow;
        },
        iter: 200);

    [Fact]
    public void EqualGroupsAreOneGroupOfAllTheirBarrels() => Gen.Select(Group, Gen.Double[0.05, 4]).Sample(
        (group, x) =>
        {
            var flow = x * 3 * group.AreaM2 * Math.Sqrt(group.Section.RiseM);
            var tailwater = new FixedTailwater(100.2);
            var three = BarrelGroups.Rate(new([group, group, group], tailwater, null), flow);
            var one = CulvertHydraulics.Rate(new(group with { Count = 3 * group.Count }, tailwater, null), flow);
            return Math.Abs(three.HeadwaterElevationM - one.HeadwaterElevationM) < 1e-6
                && three.Groups.All(g => Math.Abs(g.BarrelFlowM3PerS - (flow / 3)) < 1e-6 * flow || g.IsBetweenFreeAndFull);
        },
        iter: 200);

    [Fact]
    public void FlowIsConservedEveryGroupStandsAtTheSharedLevelAndHeadwaterRisesWithFlow()
    {
        int roads = 0, dry = 0;
        Gen.Select(Site, Gen.Double[0.1, 4]).Sample(
            (site, x) =>
            {
                var largest = x * site.Groups.Sum(g => g.AreaM2 * Math.Sqrt(g.Section.RiseM));
                var last = double.NegativeInfinity;
                foreach (var share in new[] { 0, 0.1, 0.4, 0.7, 1 })
                {
                    var flow = share * largest;
                    var r = BarrelGroups.Rate(site, flow);
                    if (Math.Abs(r.BarrelFlowM3PerS + r.RoadFlowM3PerS - flow) > 1e-9 * Math.Max(1, flow)) return false;
                    if (r.HeadwaterElevationM < last - 1e-6 || r.HeadwaterElevationM < r.TailwaterElevationM) return false;
                    // Every group rated alone at its flow, by the rating of single culverts, stands at the shared level.
                    foreach (var g in r.Groups.Where(g => g.BarrelFlowM3PerS > 1e-6 * flow && !g.IsBetweenFreeAndFull))
                    {
                        var alone = CulvertHydraulics.Rate(g.Site, g.BarrelFlowM3PerS).HeadwaterElevationM;
                        if (Math.Abs(alone - r.HeadwaterElevationM) > 1e-5) return false;
                    }

                    if (r.RoadFlowM3PerS > 0) Interlocked.Increment(ref roads);
                    if (flow > 0 && r.Groups.Any(g => g.BarrelFlowM3PerS == 0)) Interlocked.Increment(ref dry);
                    last = r.HeadwaterElevationM;
                }

                return true;
            },
            iter: 300);
        Assert.True(roads > 100 && dry > 20, $"{roads} overtopped, {dry} with a dry group");
    }

    [Fact]
    public void HeadwaterGivesTheFlowBack() => Gen.Select(Site, Gen.Double[0.05, 3]).Sample(
        (site, x) =>
        {
            var rising = site with { Tailwater = new RatingTailwater([(0, 99), (100, 102)]) };
            var flow = x * site.Groups.Sum(g => g.AreaM2 * Math.Sqrt(g.Section.RiseM));
            var r = BarrelGroups.Rate(rising, flow);
            // In a jump a hair of level is a share of the flow; elsewhere either gives the other.
            return r.Groups.Any(g => g.IsBetweenFreeAndFull) || r.HeadwaterElevationM - r.TailwaterElevationM < 1e-4
                || Math.Abs(BarrelGroups.FlowM3PerS(rising, r.HeadwaterElevationM) - flow) < 1e-5 * flow;
        },
        iter: 200);

    [Fact]
    public void MoreHeadwaterNeverPassesLess() => Gen.Select(Site, Gen.Double[99, 104], Gen.Double[0, 1]).Sample(
        (site, level, more) => BarrelGroups.FlowM3PerS(site, level + more) >= BarrelGroups.FlowM3PerS(site, level) * (1 - 1e-6),
        iter: 300);

    [Fact]
    public void AHigherReliefBarrelStaysDryUntilTheWaterIsThere()
    {
        var main = new CulvertBarrels(new BoxSection(2, 1.5), 1, InletCatalogue.Find("hds5-8-1", "test"), 0.013, 0.4, 20, 100, 99.9);
        var relief = main with { Section = new CircleSection(1.2), Inlet = InletCatalogue.Find("hds5-1-1", "test"), InletElevationM = 101, OutletElevationM = 100.9 };
        var site = new GroupedSite([main, relief], new FixedTailwater(99), null);
        var low = BarrelGroups.Rate(site, 2);
        Assert.Equal(0, low.Groups[1].BarrelFlowM3PerS);
        Assert.Contains(low.Findings, f => f.Code == "barrel-group-dry");
        // At the level of the relief barrel's invert the main barrel alone carries everything: its own rating there.
        var alone = CulvertHydraulics.Rate(new(main, site.Tailwater, null), 2);
        Assert.Equal(alone.HeadwaterElevationM, low.HeadwaterElevationM, 1e-7);
        Assert.True(low.HeadwaterElevationM < 101);
        var high = BarrelGroups.Rate(site, 8);
        Assert.True(high.Groups[1].BarrelFlowM3PerS > 0.5 && high.HeadwaterElevationM > 101);
        Assert.True(high.HeadwaterElevationM < CulvertHydraulics.Rate(new(main, site.Tailwater, null), 8).HeadwaterElevationM);
    }
}
