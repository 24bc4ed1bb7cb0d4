using GeoCulvert.Design.Basis;
using GeoCulvert.Design.Hydraulics;

namespace GeoCulvert.Design.Tests.Hydraulics;

/// <summary>Outlet figures, riprap apron and self-cleansing, against the handbook's equation and derivations by hand.</summary>
public class OutletTests
{
    private static readonly InletType Inlet = InletCatalogue.Find("hds5-1-1", "test");

    [Theory]
    // HEC-14 3rd ed. ch. 10 example: equation CROSS-CHECKED, numbers MEMORY; the third column is eq. 10.4 worked by hand with TW = 0.4 D:
    // 0.2 x 1.5 (2.33 / (3.1316 x 2.7557))^(4/3) / 0.4 = 0.1309; 0.2 x 5 (85 / (5.6722 x 55.902))^(4/3) / 0.4 = 0.4321 ft.
    [InlineData(1, 1.5, 2.33, 0.5, 0.13, 0.1309)]
    [InlineData(Units.Foot, 5, 85, 1.6, 0.43, 0.4321)]
    public void TheStoneSizeIsThatOfTheHandbook(double unit, double diameter, double flow, double tailwater, double published, double byHand)
    {
        // A flat barrel, so that the flow is not supercritical and D stays as it is.
        var barrels = new CulvertBarrels(new CircleSection(diameter * unit), 1, Inlet, 0.012, 0.5, 20, 100, 100);
        var rating = CulvertHydraulics.Rate(new(barrels, new FixedTailwater(100 + (tailwater * unit)), null), flow * Math.Pow(unit, 3));
        var apron = RiprapApron.For(rating)!;
        Assert.Equal(published, apron.RequiredD50M / unit, 0.02 * published);
        Assert.Equal(byHand, apron.RequiredD50M / unit, 0.001 * byHand);
        Assert.Equal(0.4 * diameter, apron.TailwaterM / unit, 1e-9);
    }

    [Fact]
    public void SupercriticalFlowTakesTheAdjustedDiameter()
    {
        var barrels = new CulvertBarrels(new CircleSection(1), 1, Inlet, 0.012, 0.5, 60, 100, 98.2);
        var rating = CulvertHydraulics.Rate(new(barrels, new FixedTailwater(98), null), 1);
        Assert.True(rating.OutletFroudeNumber > 1);
        var yn = OpenChannelFlow.NormalDepthM(barrels.Section, 1, 0.012, 0.03)!.Value;
        var apron = RiprapApron.For(rating)!;
        Assert.Equal((1 + yn) / 2, apron.DiameterM, 1e-9);
        Assert.Equal(0.4 * apron.DiameterM, apron.TailwaterM, 1e-12);
    }

    [Fact]
    public void TheApronIsThatOfTheSmallestClassThatHolds()
    {
        var barrels = new CulvertBarrels(new CircleSection(1.5), 2, Inlet, 0.012, 0.5, 20, 100, 100);
        var site = new CulvertSite(barrels, new FixedTailwater(100.5), null);
        // 2.33 m3/s a barrel asks for 131 mm: class 2 (150 mm): 4 D long, 3.3 D50 thick, 3 D + 1.5 D wide at the outlet, two thirds of the length more at the end.
        var apron = RiprapApron.For(CulvertHydraulics.Rate(site, 4.66))!;
        Assert.Equal("2", apron.Class!.Name);
        Assert.Equal(6, apron.LengthM!.Value, 1e-9);
        Assert.Equal(0.495, apron.ThicknessM!.Value, 1e-9);
        Assert.Equal(6.75, apron.WidthAtOutletM!.Value, 1e-9);
        Assert.Equal(10.75, apron.WidthAtEndM!.Value, 1e-9);
        // More than the largest class is never given an apron.
        var violent = RiprapApron.For(CulvertHydraulics.Rate(site, 40))!;
        Assert.True(violent.RequiredD50M > 0.55);
        Assert.Null(violent.Class);
        Assert.Null(violent.LengthM);
        Assert.Contains(violent.Findings, f => f.Code == "apron-beyond-classes");
        Assert.Null(RiprapApron.For(CulvertHydraulics.Rate(site, 0)));
    }

    [Fact]
    public void OtherShapesAreTheCircleOfTheirAreaAndSaySo()
    {
        var box = new CulvertBarrels(new BoxSection(Math.PI / 2, 0.5), 1, InletCatalogue.Find("hds5-8-1", "test"), 0.012, 0.4, 20, 100, 100);
        var apron = RiprapApron.For(CulvertHydraulics.Rate(new(box, new FixedTailwater(101), null), 1), isTailwaterKnown: false)!;
        Assert.Equal(1, apron.DiameterM, 1e-9); // pi/4 m2
        Assert.Equal(0.4, apron.TailwaterM, 1e-9);
        Assert.Contains(apron.Findings, f => f.Code == "apron-shape-assumed");
    }

    [Fact]
    public void ClassesOfAnAgencyAreRead()
    {
        const string heading = "class,d50_mm,length_in_diameters,thickness_in_d50,status,source,locator,note\n";
        var classes = RiprapClass.From(PublishedTable.Parse("own.csv", heading + "A,100,4,2,OWN,agency,t1,\nB,300,5,2,OWN,agency,t1,\n"));
        Assert.Equal(0.3, classes[1].D50M, 1e-12);
        Assert.Throws<InputException>(() => RiprapClass.From(PublishedTable.Parse("own.csv", heading + "A,300,4,2,OWN,agency,t1,\nB,100,5,2,OWN,agency,t1,\n")));
        Assert.Throws<InputException>(() => RiprapClass.From(PublishedTable.Parse("own.csv", heading + "A,0,4,2,OWN,agency,t1,\n")));
    }

    [Fact]
    public void ADrownedOutletHasTheVelocityOfTheFullBarrelAndLosesItsHead()
    {
        // Box 1.2 x 1.0 m, 3 m3/s, tailwater above the crown: V = 2.5 m/s, V^2/2g = 0.3187 m; with 1 m/s in the channel 0.3187 - 0.0510 = 0.2677 m.
        var barrels = new CulvertBarrels(new BoxSection(1.2, 1), 1, InletCatalogue.Find("hds5-8-1", "test"), 0.013, 0.5, 50, 100, 99.8);
        var rating = CulvertHydraulics.Rate(new(barrels, new FixedTailwater(101.4), null), 3);
        var outlet = OutletConditions.Of(rating)!;
        Assert.Equal(2.5, outlet.VelocityMPerS, 1e-9);
        Assert.Equal(0.3187, outlet.ExitLossM, 0.0001);
        Assert.Null(outlet.FroudeNumber);
        Assert.Equal(0.2677, OutletConditions.Of(rating, 1)!.ExitLossM, 0.0001);
        // rho g R Sf: R = 1.2 / 4.4 = 0.27273 m, Sf = (2.5 x 0.013 / 0.27273^(2/3))^2 = 0.005973; 1000 x 9.80665 x 0.27273 x 0.005973 = 15.97 Pa.
        Assert.Equal(15.97, outlet.ShearPa, 0.02);
    }

    [Fact]
    public void SelfCleansingIsJudgedWhereTheBarrelIsSlowest()
    {
        // Level box 1 m wide in still water 0.5 m deep at the outlet, 0.2 m3/s: never less than 0.5 m deep, so never above 0.4 m/s.
        var barrels = new CulvertBarrels(new BoxSection(1, 1), 1, InletCatalogue.Find("hds5-8-1", "test"), 0.013, 0.5, 20, 100, 100);
        var slow = SelfCleansing.Of(CulvertHydraulics.Rate(new(barrels, new FixedTailwater(100.5), null), 0.2), CleansingCriterion.Common)!;
        Assert.False(slow.IsMet);
        Assert.InRange(slow.VelocityMPerS, 0.35, 0.4);
        Assert.Contains(slow.Findings, f => f.Code == "barrel-not-self-cleansing" && f.Limit == 3 * Units.Foot);
        var steep = barrels with { OutletElevationM = 99.4 };
        var fast = SelfCleansing.Of(CulvertHydraulics.Rate(new(steep, new FixedTailwater(99), null), 0.4), new(CleansingMeasure.Shear, 3, "test"))!;
        Assert.True(fast.IsMet && fast.ShearPa > 3 && fast.Findings.Count == 0);
    }
}
