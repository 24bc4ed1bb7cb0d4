using GeoCulvert.Design.Basis;
using GeoCulvert.Design.Hydraulics;
using GeoCulvert.Design.Sizing;

namespace GeoCulvert.Design.Tests.Sizing;

/// <summary>The search against a plain scan written here, each criterion as the one that rejects, and the words that go with it.</summary>
public class CulvertSizingTests
{
    private const double Inlet = 100, Outlet = 99.6, Length = 30;
    private static readonly InletType Round = InletCatalogue.Find("hds5-1-1", "test");
    private static readonly InletType Square = InletCatalogue.Find("hds5-8-1", "test");

    private static SizingRequest Request(SizingCriteria criteria, double flow = 6, double? road = null, double check = 1.5, CulvertCatalogue? catalogue = null) => new(
        catalogue ?? CulvertCatalogue.Build([Round, Square], ["circle", "box"], 0.012, null, 3),
        criteria, flow, check * flow, Length, Inlet, Outlet, new FixedTailwater(Outlet + 0.4),
        road is { } level ? RoadCrest.Level(level, 50, 9, RoadSurface.Paved) : null);

    public static TheoryData<double, double, double> Jobs() => new()
    {
        // flow, HW/D limit, road level
        { 0.3, 1.5, 103 }, { 2, 1.2, 102.2 }, { 6, 1.5, 103 }, { 15, 1.0, 104 }, { 40, 1.5, 105 }, { 90, 1.2, 106 }, { 200, 1.5, 104 },
    };

    [Theory]
    [MemberData(nameof(Jobs))]
    public void TheChoiceIsThatOfAPlainScan(double flow, double ratio, double road)
    {
        var request = Request(new SizingCriteria { LargestHeadwaterRatio = ratio, SmallestRiseM = 0.45 }, flow, road);
        (double Area, int Count, int Index, string Size)? best = null;
        for (var i = 0; i < request.Catalogue.Barrels.Count; i++)
        {
            for (var count = 1; count <= 3; count++)
            {
                var b = request.Catalogue.Barrels[i];
                var r = CulvertHydraulics.Rate(
                    new CulvertSite(new CulvertBarrels(b.Section, count, b.Inlet, 0.012, b.EntranceLossCoefficient, Length, Inlet, Outlet), request.Tailwater, request.Road), flow);
                var fits = r.HeadwaterM <= ratio * b.Section.RiseM && r.HeadwaterElevationM <= road - 0.3 && r.RoadFlowM3PerS == 0
                    && b.Section.RiseM >= 0.45 && Inlet + b.Section.RiseM + 0.3 <= road;
                var mine = (Area: Math.Round(count * b.Section.FullAreaM2, 9), count, i, b.SizeText);
                if (fits && (best is null || (mine.Area, mine.count, mine.i).CompareTo((best.Value.Area, best.Value.Count, best.Value.Index)) < 0)) best = mine;
            }
        }

        var outcome = CulvertSizing.Choose(request);
        Assert.Equal(best?.Size, outcome.Chosen?.Choice.SizeText);
        Assert.Equal(best?.Count, outcome.Chosen?.Barrels.Count);
        // Everything that comes before the choice has its reason; nothing of it meets all.
        Assert.All(outcome.Options.TakeWhile(o => !ReferenceEquals(o, outcome.Chosen)), o => Assert.Contains(o.Criteria, c => !c.IsMet));
        Assert.Equal(outcome.Options.Select(o => o.Description), CulvertSizing.Choose(request).Options.Select(o => o.Description)); // the same order again
    }

    [Fact]
    public void EachCriterionRejectsByItself()
    {
        var plain = CulvertSizing.Choose(Request(new SizingCriteria { LargestHeadwaterRatio = 1.5 })).Chosen!;

        void Rejects(string name, SizingRequest request)
        {
            var outcome = CulvertSizing.Choose(request);
            var former = outcome.Options.Single(o => o.Description == plain.Description);
            Assert.Contains(former.Criteria, c => !c.IsMet && (c.Name == name || !former.IsRated));
            Assert.Equal([name], CulvertSizing.Rate(request, former.Choice, former.Barrels.Count).Criteria.Where(c => !c.IsMet).Select(c => c.Name));
            if (former.IsRated) Assert.Contains(name, outcome.Chosen is null ? former.Criteria.Single(c => !c.IsMet).Name : outcome.Reason(former), StringComparison.Ordinal);
            Assert.NotEqual(plain.Description, outcome.Chosen?.Description);
        }

        var ratio = plain.Design.HeadwaterOverRise;
        Rejects("HW/D", Request(new SizingCriteria { LargestHeadwaterRatio = ratio - 0.01 }));
        Rejects("rise", Request(new SizingCriteria { SmallestRiseM = plain.Barrels.Section.RiseM + 0.01 }));
        Rejects("headwater depth", Request(new SizingCriteria { LargestHeadwaterDepthM = plain.Design.HeadwaterM - 0.01 }));
        Rejects("headwater elevation", Request(new SizingCriteria { HighestHeadwaterElevationM = plain.Design.HeadwaterElevationM - 0.01 }));
        Rejects("outlet velocity", Request(new SizingCriteria { LargestOutletVelocityMPerS = plain.Design.OutletVelocityMPerS - 0.01 }));
        var high = plain.Design.HeadwaterElevationM;
        Rejects("freeboard", Request(new SizingCriteria { FreeboardM = 0.5, SmallestCoverM = -9 }, road: high + 0.49));
        Rejects("cover", Request(new SizingCriteria { FreeboardM = -9, SmallestCoverM = 2 }, road: Inlet + plain.Barrels.Section.RiseM + 1.9));
        Rejects("flow over the road", Request(new SizingCriteria { FreeboardM = -9, SmallestCoverM = -9 }, road: high - 0.05));
        Rejects("overtopping depth", Request(new SizingCriteria { FreeboardM = 0, SmallestCoverM = -9, LargestOvertoppingDepthM = 0.01 }, road: high + 0.02, check: 3));
    }

    [Fact]
    public void WhenNothingFitsNothingIsChosenAndTheClosestIsNamed()
    {
        var outcome = CulvertSizing.Choose(Request(new SizingCriteria { HighestHeadwaterElevationM = 100.5 }, flow: 300));
        Assert.Null(outcome.Chosen);
        Assert.All(outcome.Options, o => Assert.False(o.MeetsAll));
        var closest = outcome.Closest!;
        Assert.Equal(outcome.Options.Max(o => o.Barrels.AreaM2), closest.Barrels.AreaM2, 1e-9); // here the largest is nearest
        Assert.All(outcome.Options, o => Assert.NotEqual("chosen", outcome.Reason(o)));
        Assert.Null(CulvertSizing.Choose(Request(new SizingCriteria(), catalogue: new CulvertCatalogue([], 3))).Closest);
    }

    [Fact]
    public void OfEqualAreasTheOneWithFewerBarrelsIsChosen()
    {
        // Two of 3 x 4 ft against one of 6 x 4 ft: the same area.
        var table = PublishedTable.Parse("boxes", "span_ft,rise_ft,status,source,locator,note\n3,4,MEMORY,test,,\n6,4,MEMORY,test,,\n");
        var outcome = CulvertSizing.Choose(Request(new SizingCriteria(), flow: 5, catalogue: CulvertCatalogue.Build([Square], ["box"], 0.012, null, 2, boxes: table)));
        Assert.Equal("6 x 4 ft box, hds5-8-1", outcome.Chosen!.Description);
        Assert.Equal("as large, with more barrels", outcome.Reason(outcome.Options.Single(o => o.Description == "2 x 3 x 4 ft box, hds5-8-1")));
        Assert.StartsWith("larger:", outcome.Reason(outcome.Options.Single(o => o.Description == "2 x 6 x 4 ft box, hds5-8-1")), StringComparison.Ordinal);
    }

    [Fact]
    public void AUsersTableReplacesTheSizes()
    {
        var circles = PublishedTable.Parse("mine", "diameter_mm,status,source,locator,note\n800,MEMORY,test,,\n1600,MEMORY,test,,\n");
        var catalogue = CulvertCatalogue.Build([Round, Square], ["circle"], 0.012, 0.3, 2, circles);
        Assert.Equal([0.8, 1.6], catalogue.Barrels.Select(b => b.Section.RiseM));
        Assert.Equal(["800 mm", "1600 mm"], catalogue.Barrels.Select(b => b.SizeText));
        Assert.All(catalogue.Barrels, b => Assert.Equal((0.3, Round.Id), (b.EntranceLossCoefficient, b.Inlet.Id)));
        var bad = PublishedTable.Parse("mine", "diameter_mm,status,source,locator,note\n-800,MEMORY,test,,\n");
        Assert.Contains("diameter_mm", Assert.Throws<InputException>(() => CulvertCatalogue.Build([Round], ["circle"], 0.012, null, 1, bad)).Message, StringComparison.Ordinal);
    }

    [Fact]
    public void TheShippedSizesAreTheTradesInMetres()
    {
        var all = CulvertCatalogue.Build([Round, Square], ["circle", "box"], 0.012, null, 1).Barrels;
        Assert.Equal(0.3048, all[0].Section.RiseM, 1e-12); // 12 in
        Assert.Equal(3.6576, all.Where(b => b.Shape == "circle").Max(b => b.Section.RiseM), 1e-12); // 144 in
        Assert.Equal(3.6576, all[^1].Section.SpanM, 1e-12); // 12 x 12 ft
        Assert.Equal(3.6576, all[^1].Section.RiseM, 1e-12);
    }

    [Fact]
    public void TheSearchFindsWhatAPlainScanFindsOnRandomJobs()
    {
        var catalogue = CulvertCatalogue.Build([Round, InletCatalogue.Find("hds5-1-3", "test"), Square], ["circle", "box"], 0.013, null, 4);
        var random = new Random(20261201);
        double Between(double low, double high) => low + ((high - low) * random.NextDouble());
        var prices = UnitPrices.Example;
        int fits = 0, rated = 0, seen = 0;
        for (var i = 0; i < 600; i++)
        {
            var flow = Math.Exp(Between(Math.Log(0.05), Math.Log(150)));
            var criteria = new SizingCriteria
            {
                LargestHeadwaterRatio = Between(0.8, 2), FreeboardM = Between(0, 0.6), SmallestRiseM = Between(0.3, 0.7), SmallestCoverM = Between(0, 0.5),
                LargestOutletVelocityMPerS = random.Next(3) == 0 ? Between(2, 6) : null,
                LargestOvertoppingDepthM = random.Next(3) == 0 ? Between(0, 0.3) : null,
                HighestHeadwaterElevationM = random.Next(4) == 0 ? 100 + Between(0.5, 3) : null,
            };
            var request = new SizingRequest(
                catalogue, criteria, flow, flow * Between(1, 2), Between(8, 90), 100, 100 - Between(-0.1, 2.5), new FixedTailwater(98 + Between(0, 3)),
                random.Next(5) == 0 ? null : RoadCrest.Level(100 + Between(0.6, 6), Between(20, 100), 9, RoadSurface.Paved))
            {
                Prices = i % 2 == 0 ? prices : null,
            };
            var all = catalogue.Barrels.SelectMany((b, k) => Enumerable.Range(1, 4).Select(n => (Option: CulvertSizing.Rate(request, b, n), Index: k)));
            var plain = all.Where(o => o.Option.MeetsAll && (request.Prices is null || o.Option.Cost is not null))
                .OrderBy(o => request.Prices is null ? 0 : o.Option.Cost).ThenBy(o => Math.Round(o.Option.Barrels.AreaM2, 9)).ThenBy(o => o.Option.Barrels.Count).ThenBy(o => o.Index)
                .Select(o => o.Option.Description).FirstOrDefault();
            var outcome = CulvertSizing.Choose(request);
            Assert.True(plain == outcome.Chosen?.Description, $"job {i}: {plain} by the scan, {outcome.Chosen?.Description} by the search");
            if (plain is null) continue;
            fits++;
            rated += outcome.Options.Count(o => o.IsRated);
            seen += outcome.Options.Count;
            // What the search says of the choice holds when it is rated again from the record alone.
            var again = CulvertHydraulics.Rate(new CulvertSite(outcome.Chosen!.Barrels, request.Tailwater, request.Road), flow);
            Assert.True(again.HeadwaterOverRise <= criteria.LargestHeadwaterRatio + 1e-9);
        }

        Assert.True(fits > 150, $"{fits} jobs with an answer");
        Assert.True(rated < seen, "the screen spares nothing");
    }

    [Fact]
    public void CostIsBarrelsTimesLengthAndTwoEndsEach()
    {
        var table = PublishedTable.Parse("prices", "shape,size,price_per_m,price_per_end\ncircle,48 in,300,1000\ncircle, 24 IN ,100,400\n");
        var prices = UnitPrices.Read(table);
        var catalogue = CulvertCatalogue.Build([Round], ["circle"], 0.012, null, 3);
        var four = catalogue.Barrels.First(b => b.SizeText == "48 in");
        Assert.Equal(2 * ((300 * 30) + 2000), prices.Of(four, 2, 30)!.Value, 9);
        Assert.Equal((100 * 30) + 800, prices.Of(catalogue.Barrels.First(b => b.SizeText == "24 in"), 1, 30)!.Value, 9);
        Assert.Null(prices.Of(catalogue.Barrels.First(b => b.SizeText == "36 in"), 1, 30));

        // Prices decide: a dear single pipe loses to two cheap ones.
        var dear = UnitPrices.Read(PublishedTable.Parse("p", "shape,size,price_per_m,price_per_end\ncircle,48 in,5000,0\ncircle,36 in,100,0\n"));
        var outcome = CulvertSizing.Choose(Request(new SizingCriteria(), flow: 2, catalogue: catalogue) with { Prices = dear });
        Assert.Equal("2 x 36 in circle, hds5-1-1", outcome.Chosen!.Description);
        Assert.Contains("3 problems", string.Concat(Assert.Throws<InputException>(() => UnitPrices.Read(PublishedTable.Parse("p", "shape,size,price_per_m,price_per_end\ncircle,48 in,-1,0\ncircle,36 in,1,0\ncircle,36 in,2,0\ncircle,30 in,x,0\n"))).Problems.Count, " problems"), StringComparison.Ordinal);
    }
}
