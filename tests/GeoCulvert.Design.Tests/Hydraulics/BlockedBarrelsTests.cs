using CsCheck;
using GeoCulvert.Design.Hydraulics;

namespace GeoCulvert.Design.Tests.Hydraulics;

/// <summary>Barrels blocked in part, and the filled section, by geometry done by hand.</summary>
public class BlockedBarrelsTests
{
    [Fact]
    public void AHalfFilledCircleIsAHalfCircle()
    {
        // D = 1 m: fill 0.5 m, area pi/8, perimeter pi/2 + 1, centroid of the half circle below its crown 0.5 - 4 x 0.5/(3 pi) = 0.28779 m.
        var half = new SiltedSection(new CircleSection(1), 0.5);
        Assert.Equal(0.5, half.FillM, 1e-9);
        Assert.Equal(Math.PI / 8, half.FullAreaM2, 1e-9);
        Assert.Equal((Math.PI / 2) + 1, half.FullPerimeterM, 1e-8);
        Assert.Equal(0.28779, half.CentroidDepthM(0.5), 1e-5);
        Assert.Equal(1, half.TopWidthM(0), 1e-9);
        Assert.Equal(0, half.AreaM2(0), 1e-12);
    }

    [Fact]
    public void AFilledBoxIsALowerBox() => Gen.Select(Gen.Double[0.5, 3], Gen.Double[0.5, 2], Gen.Double[0.05, 0.9], Gen.Double[0.05, 0.95]).Sample(
        (width, height, share, at) =>
        {
            var (filled, box) = (new SiltedSection(new BoxSection(width, height), share), new BoxSection(width, height * (1 - share)));
            var y = at * box.HeightM;
            return Math.Abs(filled.AreaM2(y) - box.AreaM2(y)) < 1e-8 && Math.Abs(filled.WettedPerimeterM(y) - box.WettedPerimeterM(y)) < 1e-8
                && Math.Abs(filled.CentroidDepthM(y) - box.CentroidDepthM(y)) < 1e-7 && Math.Abs(filled.FullPerimeterM - box.FullPerimeterM) < 1e-8
                && Math.Abs(filled.PeakConveyanceDepthM - box.HeightM) < 1e-6;
        });

    [Fact]
    public void BlockageNeverLowersTheHeadwaterAndMoreOfItRaisesIt() => Gen.Select(Gen.Bool, Gen.Double[0.5, 2], Gen.Double[0.1, 2.5], Gen.Double[-0.005, 0.04], Gen.Double[98, 101.5]).Sample(
        (isBox, rise, x, slope, tailwater) =>
        {
            ISection section = isBox ? new BoxSection(1.4 * rise, rise) : new CircleSection(rise);
            var inlet = InletCatalogue.Find(isBox ? "hds5-8-1" : "hds5-1-1", "test");
            var site = new CulvertSite(new(section, 2, inlet, 0.013, 0.5, 30, 100, 100 - (30 * slope)), new FixedTailwater(tailwater), RoadCrest.Level(103, 40, 9, RoadSurface.Paved));
            var flow = x * site.Barrels.AreaM2 * Math.Sqrt(rise);
            var last = double.NegativeInfinity;
            foreach (var share in new[] { 0, 0.1, 0.25, 0.5, 0.8 })
            {
                var r = BlockedBarrels.Rate(site, flow, share);
                if (r.HeadwaterElevationM < r.Clean.HeadwaterElevationM || r.HeadwaterElevationM < last - 0.002 || !double.IsFinite(r.HeadwaterElevationM)) return false;
                if (share > 0 && !r.Findings.Any(f => f.Code == "barrel-blocked-case")) return false;
                last = r.HeadwaterElevationM;
            }

            return true;
        },
        iter: 200);

    [Fact]
    public void ABlockedShareOutsideItsRangeIsRefused()
    {
        var site = new CulvertSite(new(new CircleSection(1), 1, InletCatalogue.Find("hds5-1-1", "test"), 0.013, 0.5, 30, 100, 99.7), new FixedTailwater(99), null);
        Assert.Throws<ArgumentOutOfRangeException>(() => BlockedBarrels.Rate(site, 1, 0.99));
        Assert.Throws<ArgumentOutOfRangeException>(() => BlockedBarrels.Rate(site, 1, -0.1));
    }
}
