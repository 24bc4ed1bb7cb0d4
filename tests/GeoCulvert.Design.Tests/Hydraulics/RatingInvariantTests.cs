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
    public void TheRoadFlowIsThatOfTheReportedLevel()
    {
        var overtopped = 0;
        Gen.Select(Site, Gen.Double[0.02, 6]).Sample(
            (site, x) =>
            {
                var r = CulvertHydraulics.Rate(site, x * site.Barrels.AreaM2 * Math.Sqrt(site.Barrels.Section.RiseM) / InletControl.Ku);
                // At the very level of the tailwater the weir is drowned and takes what is left.
                if (r.RoadFlowM3PerS <= 0 || r.HeadwaterElevationM - r.TailwaterElevationM < 1e-6) return true;
                Interlocked.Increment(ref overtopped);
                return Math.Abs(RoadOvertopping.FlowM3PerS(site.Road!, r.HeadwaterElevationM, r.TailwaterElevationM) - r.RoadFlowM3PerS) < 1e-7 * r.FlowM3PerS;
            },
            iter: 6000);
        Assert.True(overtopped > 500, $"{overtopped} overtopped");
    }

    [Fact]
    public void WhereTheHeadwaterJumpsTheRoadSetsTheLevelBetween()
    {
        // A long wide box on a fair slope: as it fills, the wetted crown takes away a part of its conveyance, so that its own headwater jumps by metres.
        var barrels = new CulvertBarrels(new BoxSection(2, 0.5), 1, InletCatalogue.Find("hds5-8-1", "test"), 0.03, 0.4, 150, 100, 97);
        var site = new CulvertSite(barrels, new FixedTailwater(97), RoadCrest.Level(101.2, 40, 9, RoadSurface.Paved));
        var between = Enumerable.Range(1, 300).Select(i => CulvertHydraulics.Rate(site, 0.02 * i)).Where(r => r.IsBetweenFreeAndFull).ToList();
        Assert.NotEmpty(between);
        foreach (var r in between)
        {
            var alone = site with { Road = null };
            Assert.InRange(
                r.HeadwaterElevationM,
                CulvertHydraulics.Rate(alone, r.BarrelFlowM3PerS * (1 - 1e-7)).HeadwaterElevationM - 1e-6,
                CulvertHydraulics.Rate(alone, r.BarrelFlowM3PerS * (1 + 1e-7)).HeadwaterElevationM + 1e-6);
            Assert.Equal(r.RoadFlowM3PerS, RoadOvertopping.FlowM3PerS(site.Road!, r.HeadwaterElevationM, 97), 1e-7);
            Assert.Contains(r.Findings, f => f.Code == "barrel-between-free-and-full");
        }
    }

    [Fact]
    public void TheFlowOverASlopingRoadIsTheIntegralOfItsHeads()
    {
        // Midpoint sum over 20 000 strips of the published equation, strip by strip.
        var crest = new RoadCrest([(0, 12), (25, 10), (40, 10.2), (70, 11.5)], 9, RoadSurface.Gravel);
        foreach (var (level, tailwater) in new[] { (10.15, 9.0), (10.8, 9.0), (11.2, 10.9), (12.6, 12.3) })
        {
            var sum = 0.0;
            for (var i = 0; i < 20000; i++)
            {
                var s = 70 * (i + 0.5) / 20000;
                var z = s < 25 ? 12 - (0.08 * s) : s < 40 ? 10 + (0.2 * (s - 25) / 15) : 10.2 + (1.3 * (s - 40) / 30);
                var head = level - z;
                if (head <= 0) continue;
                var kt = RoadOvertopping.SubmergenceFactor((tailwater - z) / head, RoadSurface.Gravel);
                sum += kt * 0.552 * RoadOvertopping.CoefficientUs(head, 9, RoadSurface.Gravel) * 70 / 20000 * Math.Pow(head, 1.5);
            }

            Assert.Equal(sum, RoadOvertopping.FlowM3PerS(crest, level, tailwater), 0.006 * sum);
        }
    }

    [Fact]
    public void TheLevelOverTheRoadIsTheInverseOfItsFlow() => Gen.Select(Gen.Double[-12, 2], Gen.Double[8, 11]).Sample(
        (exponent, tailwater) =>
        {
            var crest = new RoadCrest([(0, 12), (20, 10), (40, 10), (60, 12)], 9, RoadSurface.Paved);
            var flow = Math.Pow(10, exponent);
            var level = RoadOvertopping.LevelM(crest, flow, tailwater);
            return level >= Math.Max(10, tailwater) && Math.Abs(RoadOvertopping.FlowM3PerS(crest, level, tailwater) - flow) < 1e-7 + (1e-5 * flow); // just above a drowning tailwater a trickle hangs on the last digits of the level
        },
        iter: 500);

    [Fact]
    public void HeadwaterRisesThroughTheDrowningOfASteepInlet()
    {
        // Tailwater that reaches up to the inlet and slopes about and above the critical one: where depth at the inlet changes fastest with flow.
        var sites =
            from barrel in Barrel
            from n in Gen.Double[0.009, 0.02]
            from slope in Gen.Double[0.003, 0.05]
            from length in Gen.Double[10, 60]
            from over in Gen.Double[0.3, 1.2]
            select new CulvertSite(
                new CulvertBarrels(barrel.Section, 1, barrel.Inlet, n, barrel.Inlet.EntranceLossCoefficient, length, 100, 100 - (slope * length)),
                new FixedTailwater(100 + (over * barrel.Section.RiseM)), null);
        var drowned = 0;
        sites.Sample(
            site =>
            {
                var largest = 5 * site.Barrels.AreaM2 * Math.Sqrt(site.Barrels.Section.RiseM) / InletControl.Ku;
                var last = 0.0;
                for (var i = 1; i <= 120; i++)
                {
                    var r = CulvertHydraulics.Rate(site, largest * i / 120);
                    if (r.HeadwaterM < last - (1e-7 * site.Barrels.Section.RiseM)) return false;
                    last = r.HeadwaterM;
                    if (r.Profile.Name.StartsWith("S1", StringComparison.Ordinal)) Interlocked.Increment(ref drowned);
                }

                return true;
            },
            iter: 300);
        Assert.True(drowned > 1000, $"only {drowned} ratings with a drowned steep inlet");
    }

    [Fact]
    public void ADrownedRoadNeverLeavesHeadwaterBelowTailwater()
    {
        // The published submergence curve of gravel ends above 0, so the weir alone would pass the flow from below the tailwater.
        var barrels = new CulvertBarrels(new CircleSection(0.6), 1, InletCatalogue.Find("hds5-1-1", "test"), 0.012, 0.5, 20, 100, 99.8);
        var site = new CulvertSite(barrels, new FixedTailwater(103), RoadCrest.Level(101.5, 30, 8, RoadSurface.Gravel));
        foreach (var flow in new[] { 0.01, 0.1, 1, 5, 20, 60, 200 })
            Assert.True(CulvertHydraulics.Rate(site, flow).HeadwaterElevationM >= 103, $"{flow} m3/s: {CulvertHydraulics.Rate(site, flow).HeadwaterElevationM}");
    }

    [Fact]
    public void EqualBarrelsShareTheFlowAndAreNotOneWideBox()
    {
        var one = new CulvertBarrels(new BoxSection(2, 1.5), 1, InletCatalogue.Find("hds5-8-1", "test"), 0.015, 0.4, 60, 100, 100);
        var tailwater = new FixedTailwater(100.6);
        var single = CulvertHydraulics.Rate(new CulvertSite(one, tailwater, null), 4);
        var three = CulvertHydraulics.Rate(new CulvertSite(one with { Count = 3 }, tailwater, null), 12);
        Assert.Equal(single.HeadwaterM, three.HeadwaterM, 1e-9);
        Assert.Equal(single.OutletVelocityMPerS, three.OutletVelocityMPerS, 1e-9);
        var wide = CulvertHydraulics.Rate(new CulvertSite(one with { Section = new BoxSection(6, 1.5) }, tailwater, null), 12);
        Assert.True(wide.OutletControlHeadwaterM < three.OutletControlHeadwaterM - 0.005); // two inner walls less of friction
    }

    [Fact]
    public void FiguresGivenInFeetComeOutTheSame() => Gen.Select(Site, Gen.Double[0.05, 4]).Sample(
        (site, x) =>
        {
            // Every length in feet and the flow in cfs, as a file would hold them, and back by the units of the program: only rounding may differ.
            static double Ft(double m) => Units.Parse(FormattableString.Invariant($"{m / 0.3048:R} ft"), "length", "test");
            var b = site.Barrels;
            ISection section = b.Section is CircleSection c ? new CircleSection(Ft(c.DiameterM)) : new BoxSection(Ft(((BoxSection)b.Section).WidthM), Ft(((BoxSection)b.Section).HeightM));
            var us = new CulvertSite(
                b with { Section = section, LengthM = Ft(b.LengthM), InletElevationM = Ft(b.InletElevationM), OutletElevationM = Ft(b.OutletElevationM) },
                new FixedTailwater(Ft(site.Tailwater.ElevationM(0))),
                site.Road is null ? null : new RoadCrest([.. site.Road.Profile.Select(p => (Ft(p.StationM), Ft(p.ElevationM)))], Ft(site.Road.WidthM), site.Road.Surface));
            var flow = x * b.AreaM2 * Math.Sqrt(b.Section.RiseM) / InletControl.Ku;
            var (si, ft) = (CulvertHydraulics.Rate(site, flow), CulvertHydraulics.Rate(us, Units.Parse(FormattableString.Invariant($"{flow / 0.028316846592:R} cfs"), "flow", "test")));
            // In a jump of the headwater rounding alone may choose the side.
            return Math.Abs(si.HeadwaterElevationM - ft.HeadwaterElevationM) < 1e-6 || si.IsBetweenFreeAndFull || ft.IsBetweenFreeAndFull;
        },
        iter: 500);

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
