using GeoCulvert.Design.Basis;
using GeoCulvert.Design.Terrain;

namespace GeoCulvert.Design.Tests.Terrain;

/// <summary>Cell for cell against scikit-image, NumPy and SciPy on real terrain; made by Oracles/make_oracles.py.</summary>
public class TerrainOracleTests
{
    public static TheoryData<string> Names => RealTerrain.Names;

    [Theory]
    [MemberData(nameof(Names))]
    public void FilledSurfaceIsTheMorphologicalReconstruction(string name)
    {
        var elevation = RealTerrain.Elevation(name);
        var before = elevation.Cells.ToArray();
        var expected = elevation.Cells.ToArray();
        var raised = RealTerrain.Read<int>(name, "raised_cells");
        var level = RealTerrain.Read<float>(name, "raised_to");
        double depth = 0, deepest = 0;
        for (var k = 0; k < raised.Length; k++)
        {
            depth += (double)level[k] - expected[raised[k]];
            deepest = Math.Max(deepest, (double)level[k] - expected[raised[k]]);
            expected[raised[k]] = level[k];
        }

        var filled = DepressionFilling.Fill(elevation, TestContext.Current.CancellationToken);
        Assert.Equal(Bits(expected), Bits(filled.Surface.Cells));
        Assert.Equal(raised.Length, filled.RaisedCells);
        Assert.Equal(deepest, filled.DeepestM);
        Assert.Equal(depth * elevation.Frame.CellAreaM2, filled.VolumeM3, 1e-9 * Math.Max(1, filled.VolumeM3));
        Assert.Equal(Bits(before), Bits(elevation.Cells));
    }

    [Theory]
    [MemberData(nameof(Names))]
    public void DirectionIsTheSteepestFallWhereverSomethingIsLower(string name)
    {
        const byte Even = 254, NothingLower = 255;
        var expected = RealTerrain.Grid<byte>(name, "steepest").Cells;
        var direction = FlowDirections.Resolve(Filled(name)).Cells;
        var compared = 0;
        for (var i = 0; i < expected.Length; i++)
        {
            if (expected[i] is Even or NothingLower) continue;
            compared++;
            if (expected[i] != direction[i]) Assert.Fail($"{name}: cell {i} is {direction[i]}, NumPy says {expected[i]}");
        }

        Assert.True(compared > expected.Length / 2, $"only {compared} of {expected.Length} cells could be compared");
    }

    /// <summary>The stored directions are those of today; otherwise the expected accumulation says nothing about the whole chain.</summary>
    [Theory]
    [MemberData(nameof(Names))]
    public void StoredDirectionsAreStillTheProgramsOwn(string name)
    {
        var direction = FlowDirections.Resolve(Filled(name));
        if (Environment.GetEnvironmentVariable("GEOCULVERT_WRITE_ORACLE_INPUT") == "1") RealTerrain.Write(name, "direction", direction.Cells);
        Assert.True(
            direction.Cells.AsSpan().SequenceEqual(RealTerrain.Direction(name).Cells),
            "The directions changed: run this test with GEOCULVERT_WRITE_ORACLE_INPUT=1, then Oracles/make_oracles.py, and look at what changed.");
    }

    [Theory]
    [MemberData(nameof(Names))]
    public void AccumulationIsTheSumOfMatrixPowers(string name) => Assert.Equal(
        RealTerrain.Read<int>(name, "accumulation"),
        FlowAccumulation.Count(RealTerrain.Direction(name), RealTerrain.Elevation(name)).Cells);

    [Theory]
    [MemberData(nameof(Names))]
    public void LabelsAreTheConnectedComponentsOfTheCutTree(string name)
    {
        var rows = Outlets(name);
        var labelled = WatershedLabels.Label(RealTerrain.Direction(name), [.. rows.Select(r => (int)r.Number("outlet_cell"))]);
        Assert.Equal(RealTerrain.Read<int>(name, "labels"), labelled.Labels.Cells);
        Assert.Equal(rows.Select(r => (long)r.Number("local_cells")), labelled.LocalCells);
        Assert.Equal(rows.Select(r => (long)r.Number("total_cells")), labelled.TotalCells);
    }

    [Theory]
    [MemberData(nameof(Names))]
    public void LongestPathIsTheFarthestCellOfTheShortestPathTree(string name)
    {
        var rows = Outlets(name);
        var direction = RealTerrain.Direction(name);
        int[] outlets = [.. rows.Select(r => (int)r.Number("outlet_cell"))];
        var paths = LongestFlowPath.Trace(direction, outlets);
        for (var k = 0; k < rows.Length; k++)
        {
            var path = paths[k];
            Assert.Equal(outlets[k], path[^1]);
            double length = 0;
            for (var i = 0; i + 1 < path.Length; i++)
            {
                var code = direction.Cells[path[i]];
                Assert.Equal(path[i + 1], FlowAccumulation.Downstream(direction.Frame, path[i], code));
                length += D8.StepLengthM(direction.Frame, code);
            }

            var expected = rows[k].Number("expected");
            Assert.Equal(expected, length, rows[k].Number("tolerance") * Math.Max(1, expected));
        }
    }

    private static Grid<float> Filled(string name) =>
        DepressionFilling.Fill(RealTerrain.Elevation(name), TestContext.Current.CancellationToken).Surface;

    private static TableRow[] Outlets(string name)
    {
        TableRow[] rows = [.. PublishedTable.Parse("outlets.csv", File.ReadAllText(RealTerrain.PathOf("outlets.csv"))).Rows.Where(r => r.Text("terrain") == name)];
        Assert.NotEmpty(rows);
        return rows;
    }

    private static int[] Bits(float[] values) => [.. values.Select(v => float.IsNaN(v) ? int.MaxValue : BitConverter.SingleToInt32Bits(v))];
}
