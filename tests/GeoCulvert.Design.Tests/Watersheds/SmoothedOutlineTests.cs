using CsCheck;
using GeoCulvert.Design.Terrain;
using GeoCulvert.Design.Watersheds;
using NetTopologySuite.Geometries;
using NetTopologySuite.Operation.Union;

namespace GeoCulvert.Design.Tests.Watersheds;

public class SmoothedOutlineTests
{
    private const int Outlets = 4;

    // Blocks of cells as well as single ones: long lines are smoothed, short ones are not, and both meet.
    private static readonly Gen<(Grid<int> Labels, int[] Parent)> Scene =
        from rows in Gen.Int[4, 24]
        from columns in Gen.Int[4, 24]
        from block in Gen.Int[1, 6]
        from coarse in Gen.Int[0, Outlets].Array[24 * 24]
        from noise in Gen.Int[0, 9].Array[24 * 24]
        from parent in Gen.Int[-1, Outlets - 1].Array[Outlets]
        select (
            new Grid<int>(new GridFrame(columns, rows, 1000, 5000, 4, 3), [.. Enumerable.Range(0, rows * columns).Select(i =>
                noise[i] == 0 ? coarse[i] : coarse[(i / columns / block * 24) + (i % columns / block)])]),
            parent.Select((p, k) => p > k ? p : -1).ToArray());

    [Fact]
    public void SmoothedOutlinesAreValidAndFitTogether() => Scene.Sample((labels, parent) =>
    {
        var tree = new OutletTree(parent);
        var drawn = WatershedPolygons.Trace(labels, tree, smooth: true);
        var cells = WatershedPolygons.Trace(labels, tree);
        for (var k = 0; k < Outlets; k++)
        {
            Assert.True(drawn.Local[k].Polygon.IsValid, drawn.Local[k].Polygon.AsText());
            Assert.True(drawn.Total[k].Polygon.IsValid, drawn.Total[k].Polygon.AsText());
            Assert.Equal((cells.Total[k].PerimeterM, cells.Total[k].EdgeContactM), (drawn.Total[k].PerimeterM, drawn.Total[k].EdgeContactM));
            Assert.Equal(cells.Total[k].Polygon.NumGeometries, drawn.Total[k].Polygon.NumGeometries);
            var parts = Enumerable.Range(0, Outlets).Where(l => tree.Drains(k, l)).Select(l => drawn.Local[l].Polygon).Where(p => !p.IsEmpty).ToList();
            Assert.Equal(parts.Sum(p => p.Area), drawn.Total[k].Polygon.Area, 1e-6);
            if (parts.Count > 0) Assert.Equal(0, UnaryUnionOp.Union(parts).SymmetricDifference(drawn.Total[k].Polygon).Area, 1e-6);
        }
    }, iter: 2000);

    [Fact]
    public void ASquareByHand()
    {
        // Six by six cells of 10 m alone: each corner's triangle of half a cell by half a cell is 1/8 of a cell. Cutting the two bends beside
        // it (a bend of 135 degrees between sides of 1 and 0.7071 cells, at a quarter: 1/2 x 0.25 x 0.1768 x sin 135 = 1/64 of a cell) takes 2/64 more.
        // In all 4 x (1/8 + 1/32) = 5/8 of a cell of 100 m2.
        var labels = new Grid<int>(new GridFrame(8, 8, 0, 80, 10, 10));
        for (var row = 1; row < 7; row++)
            for (var column = 1; column < 7; column++) labels[row, column] = 1;
        var outline = WatershedPolygons.Trace(labels, new OutletTree([-1]), smooth: true).Local[0];
        Assert.Equal(3600 - 62.5, outline.Polygon.Area, 9);
        Assert.Equal(240, outline.PerimeterM);
        Assert.Equal(17, outline.Polygon.NumPoints); // two bends a corner, two points a bend, and the closing point
    }

    [Fact]
    public void AStairOfSingleStepsBecomesAStraightLine()
    {
        // Two watersheds share a diagonal stair from the north-east to the south-west corner: its middles lie on one line.
        var labels = new Grid<int>(new GridFrame(12, 12, 0, 12, 1, 1));
        for (var i = 0; i < 144; i++) labels.Cells[i] = (i / 12) + (i % 12) < 12 ? 1 : 2;
        var outlines = WatershedPolygons.Trace(labels, new OutletTree([-1, -1]), smooth: true).Local;
        Assert.Equal(144, outlines[0].Polygon.Area + outlines[1].Polygon.Area, 1.0);
        var common = outlines[0].Polygon.Intersection(outlines[1].Polygon);
        Assert.Equal(0, common.Area, 1e-9);
        // 11 stairs of sqrt(2), and half a cell at either end that leads to the node on the rim.
        Assert.InRange(common.Length, 11 * Math.Sqrt(2), (11 * Math.Sqrt(2)) + 1);
    }

    [Fact]
    public void SmallOnesStayAsTheyAre()
    {
        var labels = new Grid<int>(new GridFrame(4, 4, 0, 4, 1, 1), [0, 0, 0, 0, 0, 1, 1, 0, 0, 1, 1, 0, 0, 0, 0, 0]);
        Assert.Equal(4, WatershedPolygons.Trace(labels, new OutletTree([-1]), smooth: true).Local[0].Polygon.Area);
    }
}
