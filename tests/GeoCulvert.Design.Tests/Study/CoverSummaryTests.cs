using GeoCulvert.Design.Basis;
using GeoCulvert.Design.Crossings;
using GeoCulvert.Design.Hydrology;
using GeoCulvert.Design.Sizing;
using GeoCulvert.Design.Study;
using GeoCulvert.Design.Terrain;
using GeoCulvert.Design.Watersheds;
using NetTopologySuite.Geometries;

namespace GeoCulvert.Design.Tests.Study;

/// <summary>Shares of cover and soil on a gully of ten cells, by hand.</summary>
public class CoverSummaryTests
{
    private static readonly GridFrame Frame = new(3, 10, 0, 100, 10, 10);

    private static LandFigures Land(Grid<int>? cover, Grid<int>? soil, CoverClasses? classes = null)
    {
        // Walls of 50 either side; the two cells dug out are raised. The walls drain off the grid's sides or into the gully: only the gully's own
        // cells are labelled here, so that shares can be counted.
        float[] gully = [20, 19, 18, 5, 6, 15, 14, 13, 12, 11];
        var elevation = new Grid<float>(Frame, [.. gully.SelectMany(z => new[] { 50, z, 50 })]);
        var terrain = Drainage.Solve(elevation, cancel: TestContext.Current.CancellationToken);
        var labels = new Grid<int>(Frame);
        for (var row = 0; row < 10; row++) labels[row, 1] = 1;
        var survey = WatershedSurvey.Survey(labels, [-1], elevation);
        var inputs = new StudyInputs { Elevation = elevation, Roads = [], LandCover = cover, SoilGroup = soil, CoverClasses = classes ?? CoverClasses.Published };
        var stage = new CatchmentStage(inputs, null!, terrain, new CrossingWatersheds(labels, new OutletTree([-1]), survey));
        return stage.Land(survey[0]).Total;
    }

    // Cells of 30 x 20 m: five rows of cover, each over two cells of the gully.
    private static Grid<int> Coarse(params int[] codes) => new(new GridFrame(1, 5, 0, 100, 30, 20), codes);

    [Fact]
    public void SharesByHand()
    {
        // Rows: water, forest over the two... cells 0-1 water (11), 2-3 forest (41), 4-5 wetland (90), 6-7 low-density houses (22), 8-9 none.
        // Filled are cells 3 and 4: storage = cells 0, 1, 3, 4, 5 of ten.
        var land = Land(Coarse(11, 41, 90, 22, int.MinValue), Coarse(1, 2, 2, 7, 0));
        var cover = land.Cover!;
        Assert.Equal(0.2, cover.LakeShare!.Value, 12);
        Assert.Equal(0.2, cover.WetlandShare!.Value, 12);
        Assert.Equal(0.5, cover.StorageShare!.Value, 12);
        Assert.Equal(0.2, cover.CoverMissingShare!.Value, 12);
        Assert.Equal(0.2, cover.SoilMissingShare!.Value, 12);
        Assert.Equal((0.2, 0.4, 0.0, 0.2), (cover.SoilShare(g => g == "A")!.Value, cover.SoilShare(g => g == "B")!.Value, cover.SoilShare(g => g == "D")!.Value, cover.SoilShare(g => g == "C/D")!.Value));
        // land_cover.csv: water 100 %, houses 35 %, forest 0; woody wetlands 0. Over the eight cells with a cover: (2 x 1 + 2 x 0.35) / 8.
        Assert.Equal(0.3375, cover.ImperviousShare!.Value, 12);
        Assert.Equal(5, cover.Areas.Count);
        Assert.Equal(1000, cover.Areas.Sum(a => a.AreaM2), 9);
        Assert.Contains(cover.Areas, a => a is { Code: "41", Name: "Deciduous forest", SoilGroup: "B", AreaM2: 200, Share: 0.2 });
        Assert.Equal("11 Open water 20 %, 22 Developed low intensity 20 %, 41 Deciduous forest 20 %, 90 Woody wetlands 20 %", cover.LandCover);
    }

    [Fact]
    public void WhatIsNotGivenIsNotKnown()
    {
        Assert.Null(Land(null, null).Cover);
        var soilOnly = Land(null, Coarse(1, 1, 1, 4, 4)).Cover!;
        Assert.Equal((null, null, null, 0.0), (soilOnly.LakeShare, soilOnly.CoverMissingShare, soilOnly.ImperviousShare, soilOnly.SoilMissingShare));
        Assert.Equal(0.6, soilOnly.SoilShare(g => g == "A")!.Value, 12);
        Assert.Null(soilOnly.RunoffCoefficient);

        var own = CoverClasses.From(PublishedTable.Parse("own.csv", "cover_id,name,C_A,C_B,C_C,C_D\n11,Meadow,0.1,0.2,0.3,0.4\n"));
        var cover = Land(Coarse(11, 11, 11, 11, 11), null, own).Cover!;
        Assert.Equal((null, null, null, null), (cover.LakeShare, cover.StorageShare, cover.ImperviousShare, cover.SoilMissingShare));
        Assert.Equal("11 Meadow 100 %", cover.LandCover);
        Assert.Null(cover.SoilShare(_ => true));
    }

    [Fact]
    public void AnOwnTableMayNameLakes()
    {
        var own = CoverClasses.From(PublishedTable.Parse("own.csv", "cover_id,name,impervious_pct,storage\n1,Tarn,0,lake\n2,Bog,0,Wetland\n3,Yard,80,\n"));
        var cover = Land(Coarse(1, 2, 2, 3, 3), null, own).Cover!;
        Assert.Equal((0.2, 0.4, 0.32), (Math.Round(cover.LakeShare!.Value, 12), Math.Round(cover.WetlandShare!.Value, 12), Math.Round(cover.ImperviousShare!.Value, 12)));
        var wrong = Assert.Throws<InputException>(() => CoverClasses.From(PublishedTable.Parse("own.csv", "cover_id,name,impervious_pct,storage\n1,Tarn,120,sea\n")));
        Assert.Equal(2, wrong.Problems.Count);
    }
}
