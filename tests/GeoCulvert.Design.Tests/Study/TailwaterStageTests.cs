using GeoCulvert.Design.Basis;
using GeoCulvert.Design.Crossings;
using GeoCulvert.Design.Hydraulics;
using GeoCulvert.Design.Study;
using GeoCulvert.Design.Terrain;
using NetTopologySuite.Geometries;

namespace GeoCulvert.Design.Tests.Study;

/// <summary>The tailwater of a run: a valley falling south at 1 %, its cross-section known by hand.</summary>
public class TailwaterStageTests
{
    private const double Slope = 0.01;

    // Bed 100 + 0.01 y along the middle column, a V of 1 in 2 on both sides; a road across at y = 300.
    private static (Crossing Crossing, CulvertLine Line, DrainedTerrain Terrain) Valley(double cell = 1, double sideSlope = 0.5, double flatFromM = 1000, double flatToM = 1000, double widthM = 81)
    {
        int columns = (int)(widthM / cell) | 1, rows = (int)(600 / cell);
        var frame = new GridFrame(columns, rows, 0, rows * cell, cell, cell);
        var elevation = new Grid<float>(frame);
        var middle = frame.CentreX(columns / 2);
        for (var row = 0; row < rows; row++)
            for (var column = 0; column < columns; column++)
                elevation[row, column] = (float)(100 + (Slope * frame.CentreY(row)) + (sideSlope * Away(Math.Abs(frame.CentreX(column) - middle))));
        var terrain = Drainage.Solve(elevation);
        var road = new RoadAlignment("R", [new LineString([new CoordinateZ(frame.West, 300, 106), new CoordinateZ(frame.East, 300, 106)])]) { WidthM = 8, SideSlope = 2 };
        var crossing = CrossingFinder.Find([road], terrain.Direction, terrain.Accumulation, (long)(5000 / (cell * cell))).Crossings.OrderByDescending(c => c.AccumulationCells).First();
        var line = CulvertLineSurvey.Measure(crossing, terrain.Direction, terrain.Accumulation, terrain.Elevation);
        return (crossing, line, terrain);

        // Level ground between two distances from the stream.
        double Away(double x) => Math.Min(x, flatFromM) + Math.Max(0, x - flatToM);
    }

    private static ITailwater For(TailwaterSettings settings, List<Finding> findings, double cell = 1, double sideSlope = 0.5, double? given = null, double flow = 5)
    {
        var (crossing, line, terrain) = Valley(cell, sideSlope);
        return TailwaterStage.For(crossing, line, terrain, 4e5, flow, settings, given, findings);
    }

    [Fact]
    public void ACrossSectionOfTheValleyCarriesTheFlowAtNormalDepth()
    {
        var findings = new List<Finding>();
        // One roughness: a triangle with z = 2. Q = (1/n) z y^2 (z y / (2 (1 + z^2)^0.5))^(2/3) S^0.5, solved for y by hand:
        // y^(8/3) = Q n / (S^0.5 z (z / (2 (1 + z^2)^0.5))^(2/3)) = 5 x 0.04 / (0.1 x 2 x 0.44721^(2/3)) = 1.7100, y = 1.2228 m (banks counted as channel).
        var tailwater = Assert.IsType<CrossSectionTailwater>(For(new() { BottomWidthM = 30, RoughnessN = 0.04, OverbankRoughnessN = 0.04 }, findings));
        Assert.Empty(findings);
        Assert.Equal(Slope, tailwater.SlopeMPerM, 0.0001);
        Assert.Equal(20, tailwater.DistanceM);
        Assert.Equal(1.2228, tailwater.LevelAtSectionM(5) - tailwater.Section.BedM, 0.012);
        // Carried up to the outlet it stands as deep above the bed there.
        var (_, line, _) = Valley();
        Assert.Equal(line.OutletElevation!.Value + 1.2228, tailwater.ElevationM(5), 0.03);
    }

    [Fact]
    public void ATerrainTooCoarseFallsBackToATrapezoidAndSaysSo()
    {
        var findings = new List<Finding>();
        Assert.IsType<NormalDepthTailwater>(For(new(), findings, cell: 5));
        Assert.Contains(findings, f => f.Code == "tailwater-no-section" && f.Text.Contains("cells of 5 m", StringComparison.Ordinal));
        Assert.Contains(findings, f => f.Code == "tailwater-channel-assumed");
    }

    [Fact]
    public void ALandWithoutBanksFallsBackToATrapezoid()
    {
        var findings = new List<Finding>();
        Assert.IsType<NormalDepthTailwater>(For(new() { BottomWidthM = 4 }, findings, sideSlope: 0.005));
        Assert.Contains(findings, f => f.Code == "tailwater-no-section" && f.Text.Contains("no banks", StringComparison.Ordinal));
    }

    [Fact]
    public void ASectionIsCutWiderUntilItHoldsTheFlow()
    {
        // Banks 1 m high, then a plain to 45 m on each side and slopes of 1 in 2 beyond: 60 m3/s stands above the banks.
        var findings = new List<Finding>();
        var (crossing, line, terrain) = Valley(1, 0.5, 2, 45, 161);
        var tailwater = Assert.IsType<CrossSectionTailwater>(TailwaterStage.For(crossing, line, terrain, 4e5, 60, new() { BottomWidthM = 4 }, null, findings));
        Assert.Empty(findings);
        Assert.True(tailwater.Section.Points[^1].StationM - tailwater.Section.Points[0].StationM > 100);
        Assert.InRange(tailwater.LevelAtSectionM(60), tailwater.Section.BedM + 1, tailwater.Section.LowerEndM);
    }

    [Fact]
    public void EachMethodGivesItsKind()
    {
        var findings = new List<Finding>();
        Assert.IsType<NormalDepthTailwater>(For(new() { Method = TailwaterMethod.NormalDepth, BottomWidthM = 3 }, findings));
        Assert.Equal(104, For(new() { Method = TailwaterMethod.Fixed, FixedElevationM = 104 }, findings).ElevationM(7));
        Assert.Equal(103, For(new(), findings, given: 103).ElevationM(7));
        Assert.Empty(findings);
        var table = TailwaterRatingTable.Read("tw.csv", "flow_m3_s,depth_m\n0,0\n4,1\n");
        var (_, line, _) = Valley();
        Assert.Equal(line.OutletElevation!.Value + 0.5, For(new() { Method = TailwaterMethod.Rating, Rating = table }, findings).ElevationM(2), 1e-9);
        Assert.Equal(["tailwater-rating-exceeded"], findings.Select(f => f.Code)); // asked for 5 m3/s, the table ends at 4
    }

    [Fact]
    public void AFlowAboveTheSectionSaysSo()
    {
        var findings = new List<Finding>();
        For(new() { BottomWidthM = 4 }, findings, flow: 20000);
        Assert.Contains(findings, f => f.Code == "tailwater-section-overflows" && f.Value > f.Limit);
    }

    [Fact]
    public void APoolDownstreamCountsOnlyWhereItReachesTheOutlet()
    {
        var findings = new List<Finding>();
        var channel = new FixedTailwater(101);
        Assert.Same(channel, TailwaterStage.WithPool(channel, null, 100, 5, 8, findings));
        Assert.Same(channel, TailwaterStage.WithPool(channel, new("B", 96, 98, 99), 100, 5, 8, findings));
        Assert.Empty(findings);
        var raised = TailwaterStage.WithPool(channel, new("B", 99, 102, 103.5), 100, 5, 8, findings);
        Assert.Equal([101, 102, 103.5], new[] { 0.5, 5, 8.0 }.Select(q => Math.Round(raised.ElevationM(q), 9)));
        Assert.Equal(["tailwater-from-pool"], findings.Select(f => f.Code));
    }

    [Theory]
    [InlineData("flow_m3_s,elevation_m\n1,10\n", "two rows")]
    [InlineData("flow_m3_s,elevation_m\n1,10\n1,11\n", "above that of the line before")]
    [InlineData("flow_m3_s,elevation_m\n1,10\n2,9\n", "not below that of the line before")]
    [InlineData("flow_m3_s,elevation_m\n-1,10\n2,11\n", "0 or more")]
    [InlineData("flow,elevation_m\n1,10\n2,11\n", "flow_m3_s")]
    [InlineData("flow_m3_s,elevation_m,depth_m\n1,10,1\n2,11,2\n", "one of elevation_m")]
    public void ABadRatingIsRefusedWithItsPlace(string text, string expected)
    {
        var error = Assert.Throws<InputException>(() => TailwaterRatingTable.Read("tw.csv", text));
        Assert.Contains(expected, error.Message, StringComparison.Ordinal);
        Assert.Contains("tw.csv", error.Message, StringComparison.Ordinal);
    }

    [Fact]
    public void ARatingInUsUnitsIsTheSame()
    {
        // 35.314666721 cfs = 1 m3/s and 10 ft = 3.048 m (NIST SP 811).
        var table = TailwaterRatingTable.Read("tw.csv", "flow_cfs,elevation_ft\n0,0\n35.314666721,10\n");
        Assert.Equal(1, table.LargestFlowM3PerS, 1e-9);
        Assert.Equal(1.524, table.At(50).ElevationM(0.5), 1e-9);
    }
}
