using GeoCulvert.Design.Basis;
using GeoCulvert.Design.Hydraulics;
using GeoCulvert.Design.Sizing;
using GeoCulvert.Design.Study;

namespace GeoCulvert.Design.Tests.Sizing;

/// <summary>What people write into inventories; lengths by definition of the foot (0.3048 m) and the inch (0.0254 m).</summary>
public class InventoryTextTests
{
    [Theory]
    [InlineData("36 in", null, 36 * 0.0254)]
    [InlineData("36\"", null, 36 * 0.0254)]
    [InlineData("36''", null, 36 * 0.0254)]
    [InlineData("  36 IN. ", null, 36 * 0.0254)]
    [InlineData("3'", null, 3 * 0.3048)]
    [InlineData("3'-6\"", null, 3.5 * 0.3048)]
    [InlineData("3' 6 1/2\"", null, (3 * 0.3048) + (6.5 * 0.0254))]
    [InlineData("3 ft 6 in", null, 3.5 * 0.3048)]
    [InlineData("4 1/2 ft", null, 4.5 * 0.3048)]
    [InlineData("1/2 m", null, 0.5)]
    [InlineData("900", "mm", 0.9)]
    [InlineData("900.0", "mm", 0.9)]
    [InlineData("48", "in", 48 * 0.0254)]
    [InlineData("1.2m", "in", 1.2)]
    [InlineData("600 mm", null, 0.6)]
    public void ALengthIsRead(string text, string? unit, double expectedM)
    {
        Assert.Equal(expectedM, InventoryText.LengthM(text, unit, out var trouble)!.Value, 9);
        Assert.Equal("", trouble);
    }

    [Theory]
    [InlineData("36", null)] // no unit, none stated
    [InlineData("-12 in", null)]
    [InlineData("0 mm", null)]
    [InlineData("large", "in")]
    [InlineData("36 furlong", "in")]
    [InlineData("36 gal", "in")]
    [InlineData("1/0 ft", null)]
    [InlineData("1e400 m", null)]
    public void WhatCannotBeReadIsSaid(string text, string? unit)
    {
        Assert.Null(InventoryText.LengthM(text, unit, out var trouble));
        Assert.Contains(text, trouble, StringComparison.Ordinal);
    }

    [Theory]
    [InlineData("")]
    [InlineData("  ")]
    [InlineData("N/A")]
    [InlineData("unknown")]
    [InlineData("-")]
    public void NothingIsNothing(string text)
    {
        Assert.Null(InventoryText.LengthM(text, "in", out var trouble));
        Assert.Equal("", trouble);
    }

    [Theory]
    [InlineData("RCP", "circle")]
    [InlineData("Round pipe", "circle")]
    [InlineData("CIRC", "circle")]
    [InlineData("RCB", "box")]
    [InlineData("Box culvert", "box")]
    [InlineData("Pipe-Arch", "pipe-arch")]
    [InlineData("CMPA", null)] // no word of a shape in it that can be told from a material
    [InlineData("elliptical", "ellipse")]
    [InlineData("Arch", "arch")]
    public void AShapeIsRead(string text, string? expected) => Assert.Equal(expected ?? "circle", InventoryText.Shape(text, out _));

    [Fact]
    public void NoTextMakesItFall()
    {
        var random = new Random(11);
        const string letters = "0123456789./-'\" xX@()ftinmRCPbox\u2019\u00d7\t,;eE+";
        for (var i = 0; i < 20000; i++)
        {
            var text = new string([.. Enumerable.Range(0, random.Next(12)).Select(_ => letters[random.Next(letters.Length)])]);
            var row = new Dictionary<string, object?> { ["size"] = text, ["n"] = text, ["shape"] = text, ["len"] = text, ["inv"] = text, ["inlet"] = text };
            var read = Inventory.Read("x", row, new InventoryFields { Size = "size", Barrels = "n", Shape = "shape", Length = "len", InletElevation = "inv", Inlet = "inlet", SizeUnit = i % 2 == 0 ? "in" : null });
            Assert.True(read.Choice is null || (read.Choice.Section.RiseM > 0 && double.IsFinite(read.Choice.Section.RiseM)), text);
            Assert.True(read.Choice is not null || read.Findings.Any(f => f.Severity == Severity.Error), $"'{text}' is dropped without a word");
            Assert.InRange(read.Barrels, 1, 99);
        }
    }

    private static ExistingBarrels Read(params (string Field, object? Value)[] row) => Inventory.Read(
        "c", row.ToDictionary(r => r.Field, r => r.Value), new InventoryFields { Shape = "shape", Size = "size", Span = "span", Rise = "rise", Barrels = "barrels", Material = "material", SizeUnit = "in" });

    [Fact]
    public void RowsBecomeBarrels()
    {
        var pipe = Read(("size", "2x48"), ("material", "CMP"), ("shape", "pipe"));
        Assert.Equal((2, 1.2192, 0.024), (pipe.Barrels, Math.Round(pipe.Choice!.Section.RiseM, 9), pipe.Choice.RoughnessN));
        var box = Read(("size", "8 x 6 ft"), ("shape", "RCB"), ("barrels", "twin"));
        Assert.Equal((2, 2.4384, 1.8288), (box.Barrels, Math.Round(box.Choice!.Section.SpanM, 9), Math.Round(box.Choice.Section.RiseM, 9)));
        var number = Read(("size", 36.0), ("barrels", 3L));
        Assert.Equal((3, 0.9144), (number.Barrels, Math.Round(number.Choice!.Section.RiseM, 9)));
        Assert.Contains(number.Findings, f => f.Code == "inventory-value-assumed");
        var two = Read(("span", "72"), ("rise", "48"), ("shape", null));
        Assert.Equal("box", two.Choice!.Shape);
        var none = Read(("size", "?"), ("shape", "pipe"));
        Assert.Null(none.Choice);
        Assert.Contains(none.Findings, f => f.Code == "inventory-size-missing");
        var arch = Read(("span", "60"), ("rise", "40"), ("shape", "pipe arch"));
        Assert.Contains(arch.Findings, f => f.Code == "inventory-shape-not-rated");
    }
}

/// <summary>Capacities against the rating they invert.</summary>
public class ExistingCulvertTests
{
    [Fact]
    public void TheCapacityAtALevelIsTheFlowThatReachesIt()
    {
        var inlet = InletCatalogue.Find("hds5-1-1", "test");
        var site = new CulvertSite(new CulvertBarrels(new CircleSection(1.2), 2, inlet, 0.012, 0.5, 30, 100, 99.7), new FixedTailwater(99.9), RoadCrest.Level(103, 40, 8, RoadSurface.Paved));
        foreach (var flow in new[] { 0.5, 2.0, 4.5, 7 })
        {
            var level = CulvertHydraulics.Rate(site, flow).HeadwaterElevationM;
            var found = ExistingCulvert.Assess(site, new SizingCriteria { HighestHeadwaterElevationM = level }, [(2, 1), (10, 3), (100, 9)]).Capacities.Single(c => c.Name == "headwater elevation");
            Assert.Equal(flow, found.FlowM3PerS!.Value, flow * 1e-6);
            Assert.Equal(flow < 1 ? 2 : flow < 3 ? 10 : 100, found.FailsAtYr);
        }
    }

    [Fact]
    public void TheFirstFailureIsThatOfTheSmallestCapacity()
    {
        var inlet = InletCatalogue.Find("hds5-1-1", "test");
        var site = new CulvertSite(new CulvertBarrels(new CircleSection(1), 1, inlet, 0.012, 0.5, 20, 100, 99.8), new FixedTailwater(99.8), RoadCrest.Level(101.6, 40, 8, RoadSurface.Paved));
        var all = ExistingCulvert.Assess(site, new SizingCriteria { FreeboardM = 0.3, LargestHeadwaterRatio = 1.5 }, [(2, 0.5), (10, 1.2), (25, 1.7), (100, 2.6)]);
        Assert.Equal("freeboard", all.First!.Name); // 101.3 m lies below 1.5 D = 101.5 m and the road at 101.6 m
        Assert.Equal(["freeboard", "HW/D", "overtopping"], all.Capacities.Select(c => c.Name));
        Assert.Equal(4, all.Floods.Count);
        // At 10 years: HW by the rating itself decides.
        var failing = all.Floods.First(f => f.Rating.HeadwaterElevationM > 101.3).ReturnPeriodYr;
        Assert.Equal(failing, all.First.FailsAtYr);

        // A tailwater above the limit: broken with no flow at all.
        var drowned = site with { Tailwater = new FixedTailwater(101.4) };
        Assert.Equal(0, ExistingCulvert.Assess(drowned, new SizingCriteria { FreeboardM = 0.3 }, [(2, 0.5)]).Capacities.Single(c => c.Name == "freeboard").FlowM3PerS);
    }
}
