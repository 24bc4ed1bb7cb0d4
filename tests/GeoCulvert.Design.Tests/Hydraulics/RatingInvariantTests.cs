using CsCheck;
using GeoCulvert.Design.Basis;
using GeoCulvert.Design.Hydraulics;
using GeoCulvert.Design.Sizing;

namespace GeoCulvert.Design.Tests.Hydraulics;

/// <summary>What holds for every culvert, on random ones.</summary>
public class RatingInvariantTests
{
    private static readonly Gen<(ISection Section, InletType Inlet)> Barrel =
        from which in Gen.Int[0, InletCatalogue.All.Count - 1]
        let inlet = InletCatalogue.All[which]
        from rise in Gen.Double[0.3, 3.5]
        from ratio in Gen.Double[0.5, 3]
        select (inlet.Shape == "circle" ? (ISection)new CircleSection(rise) : new BoxSection(rise * ratio, rise), inlet);

    private static readonly Gen<CulvertSite> Site =
        from barrel in Barrel
        from count in Gen.Int[1, 4]
        from n in Gen.Double[0.009, 0.035]
        from length in Gen.Double[5, 200]
        from slope in Gen.OneOf(Gen.Double[-0.02, 0.1], Gen.Const(0.0))
        from tailwater in Gen.Double[0, 3]
        from road in Gen.OneOf(Gen.Const(double.NaN), Gen.Double[0.5, 4])
        select new CulvertSite(
            new CulvertBarrels(barrel.Section, count, barrel.Inlet, n, barrel.Inlet.EntranceLossCoefficient, length, 100, 100 - (slope * length)),
            new FixedTailwater(100 - (slope * length) + (tailwater * barrel.Section.RiseM)),
            double.IsNaN(road) ? null : RoadCrest.Level(100 + (road * barrel.Section.RiseM), 40, 9, RoadSurface.Paved));

    [Fact]
    public void HeadwaterRisesWithFlowAndFlowIsConserved() => Gen.Select(Site, Gen.Double[0.02, 6]).Sample(
        (site, x) =>
        {
            var flow = x * site.Barrels.AreaM2 * Math.Sqrt(site.Barrels.Section.RiseM) / InletControl.Ku;
            var last = double.NegativeInfinity;
            foreach (var share in new[] { 0, 0.2, 0.5, 0.8, 0.9, 1 })
            {
                var r = CulvertHydraulics.Rate(site, share * flow);
                if (!double.IsFinite(r.HeadwaterElevationM) || r.HeadwaterElevationM < last - 1e-6) return false;
                if (Math.Abs(r.BarrelFlowM3PerS + r.RoadFlowM3PerS - r.FlowM3PerS) > 1e-9 * Math.Max(1, flow)) return false;
                if (!double.IsFinite(r.OutletVelocityMPerS) || r.OutletVelocityMPerS < 0) return false;
                last = r.HeadwaterElevationM;
            }

            return true;
        },
        iter: 3000);

    [Fact]
    public void MoreBarrelsNeverRaiseHeadwater() => Gen.Select(Site, Gen.Double[0.1, 5]).Sample(
        (site, x) =>
        {
            var flow = x * site.Barrels.AreaM2 * Math.Sqrt(site.Barrels.Section.RiseM) / InletControl.Ku;
            var one = CulvertHydraulics.Rate(site, flow).HeadwaterElevationM;
            var two = CulvertHydraulics.Rate(site with { Barrels = site.Barrels with { Count = site.Barrels.Count + 1 } }, flow).HeadwaterElevationM;
            return two <= one + 1e-6;
        },
        iter: 2000);

    [Fact]
    public void InletControlIsMonotoneThroughTheJoin()
    {
        foreach (var inlet in InletCatalogue.All)
        {
            foreach (var slope in new[] { 0, 0.01, 0.05, 0.1 })
            {
                ISection section = inlet.Shape == "circle" ? new CircleSection(1) : new BoxSection(1.5, 1);
                var unit = section.FullAreaM2 / InletControl.Ku;
                var last = 0.0;
                for (var x = 0.02; x < 9; x += 0.01)
                {
                    var h = InletControl.Headwater(section, inlet, x * unit, slope).HeadwaterM;
                    Assert.True(h >= last - 1e-9, $"{inlet.Id} at X = {x:0.00}, slope {slope}: {h} after {last}");
                    last = h;
                }
            }
        }
    }

    [Fact]
    public void TheRoadTakesOnlyWhatIsAboveIt()
    {
        var crest = new RoadCrest([(0, 12), (20, 10), (40, 10), (60, 12)], 9, RoadSurface.Paved);
        Assert.Equal(0, RoadOvertopping.FlowM3PerS(crest, 10, 0));
        var last = 0.0;
        for (var z = 10.01; z < 13; z += 0.01)
        {
            var q = RoadOvertopping.FlowM3PerS(crest, z, 9);
            Assert.True(q > last);
            Assert.True(RoadOvertopping.FlowM3PerS(crest, z, z - 1e-4) < q);
            last = q;
        }
    }

    [Fact]
    public void TheChosenOptionMeetsEveryCriterionWhenRatedAgain() => Gen.Select(Gen.Double[0.2, 40], Gen.Double[-0.002, 0.05], Gen.Double[10, 80], Gen.Double[1, 8], Gen.Double[0.8, 2]).Sample(
        (flow, slope, length, road, ratio) =>
        {
            var request = new SizingRequest(
                CulvertCatalogue.Build([InletCatalogue.Find("hds5-1-1", "t"), InletCatalogue.Find("hds5-8-1", "t")], ["circle", "box"], 0.012, null, 3),
                new SizingCriteria { LargestHeadwaterRatio = ratio, SmallestRiseM = 0.6 },
                flow, 1.4 * flow, length, 50, 50 - (slope * length),
                new NormalDepthTailwater(new TrapezoidSection(3, 2), 0.04, 0.01, 50 - (slope * length)),
                RoadCrest.Level(50 + road, 60, 9, RoadSurface.Gravel));
            var outcome = CulvertSizing.Choose(request);
            if (outcome.Chosen is not { } chosen)
                return outcome.Closest is { } closest && !closest.MeetsAll && outcome.Options.All(o => !o.MeetsAll);
            var again = CulvertHydraulics.Rate(chosen.Design.Site, flow);
            return again.HeadwaterOverRise <= ratio + 1e-9
                && again.HeadwaterElevationM <= 50 + road - 0.3 + 1e-9
                && again.RoadFlowM3PerS == 0
                && chosen.Barrels.Section.RiseM >= 0.6 - 1e-9
                && 50 + chosen.Barrels.Section.RiseM + 0.3 <= 50 + road + 1e-9
                && outcome.Options.Where(o => o.MeetsAll).All(o => o.Barrels.AreaM2 >= chosen.Barrels.AreaM2 - 1e-9)
                && outcome.Options.All(o => ReferenceEquals(o, chosen) == (outcome.Reason(o) == "chosen"));
        },
        iter: 60);
}
