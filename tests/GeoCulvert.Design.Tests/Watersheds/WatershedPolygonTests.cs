using CsCheck;
using GeoCulvert.Design.Terrain;
using GeoCulvert.Design.Watersheds;
using NetTopologySuite.Geometries;
using NetTopologySuite.Operation.Union;

namespace GeoCulvert.Design.Tests.Watersheds;

/// <summary>
/// Traced outlines against the union of the cells' rectangles as NetTopologySuite makes it, on random labels: any labels, so also with
/// islands, holes and cells touching at corners.
/// </summary>
public class WatershedPolygonTests
{
    private const int Outlets = 4;

    private static readonly Gen<(Grid<int> Labels, int[] Parent)> Scene =
        from rows in Gen.Int[1, 9]
        from columns in Gen.Int[1, 9]
        from cells in Gen.Int[0, Outlets].Array[rows * columns]
        from parent in Gen.Int[-1, Outlets - 1].Array[Outlets]
        // A parent always has the higher index: no circles.
        select (new Grid<int>(new GridFrame(columns, rows, 1000, 5000, 4, 3), cells), parent.Select((p, k) => p > k ? p : -1).ToArray());

    [Fact]
    public void OutlinesAreTheUnionOfTheCells() => Scene.Sample((labels, parent) =>
    {
        var tree = new OutletTree(parent);
        var outlines = WatershedPolygons.Trace(labels, tree);
        for (var k = 0; k < Outlets; k++)
        {
            Same(outlines.Local[k], labels, l => l == k);
            Same(outlines.Total[k], labels, l => Below(l, k, parent));
        }
    }, iter: 2000);

    [Fact]
    public void NeighboursShareTheirVertices() => Scene.Sample((labels, parent) =>
    {
        // Every segment of a local outline lies in a neighbour's outline as the same segment, or touches no neighbour.
        var local = WatershedPolygons.Trace(labels, new OutletTree(parent)).Local;
        for (var a = 0; a < Outlets; a++)
            for (var b = a + 1; b < Outlets; b++)
            {
                var mine = Segments(local[a].Polygon);
                var common = mine.Where(Segments(local[b].Polygon).Contains).Sum(s => Math.Abs(s.X1 - s.X2) + Math.Abs(s.Y1 - s.Y2));
                Assert.Equal(local[a].Polygon.Boundary.Intersection(local[b].Polygon.Boundary).Length, common, 6);
            }
    }, iter: 500);

    [Fact]
    public void CornersAndHoles()
    {
        // By hand: label 1 rings a hole and touches itself at a corner; cells 1 x 1.
        var labels = new Grid<int>(new GridFrame(4, 4, 0, 4, 1, 1),
        [
            1, 1, 1, 0,
            1, 0, 1, 0,
            1, 1, 0, 0,
            0, 0, 0, 1,
        ]);
        var outline = WatershedPolygons.Trace(labels, new OutletTree([-1])).Local[0];
        var parts = Assert.IsType<MultiPolygon>(outline.Polygon);
        Assert.Equal([8.0 - 1, 1.0], parts.Geometries.Select(g => g.Area));
        Assert.Equal(1, ((Polygon)parts[0]).NumInteriorRings);
        Assert.True(outline.Polygon.IsValid);
        // Outer 12, hole 4, single cell 4. Beyond the grid: top 3, left 3, and two sides of the corner cell.
        Assert.Equal(20, outline.PerimeterM);
        Assert.Equal(8, outline.EdgeContactM);
    }

    [Fact]
    public void CellsWithoutTerrainAreEdges()
    {
        var labels = new Grid<int>(new GridFrame(3, 3, 0, 3, 1, 1), [0, 0, 0, 0, 1, 0, 0, 0, 0]);
        // No terrain in the whole western column: one side of four.
        var outline = WatershedPolygons.Trace(labels, new OutletTree([-1]), cell => cell % 3 != 0).Total[0];
        Assert.Equal(0.25, outline.EdgeContactShare);
    }

    [Fact]
    public void ContactByHand()
    {
        // Cells of 4 x 3 m. Label 1 above label 2 in a grid of 4 x 4; x has no terrain:
        //   1 1 . .      1 touches the northern rim with two sides (8 m), the western with two (6 m)
        //   1 1 x .      and x with one (3 m): 17 m of 2 (8 + 6) = 28 m.
        //   2 2 2 .      2 touches the western rim with two sides (6 m), the southern with three (12 m), and x from below with one (4 m): 22 m
        //   2 2 2 .      of 2 (12 + 6) = 36 m. Where the two meet (8 m) there is terrain.
        var labels = new Grid<int>(new GridFrame(4, 4, 0, 12, 4, 3), [1, 1, 0, 0, 1, 1, 0, 0, 2, 2, 2, 0, 2, 2, 2, 0]);
        var outlines = WatershedPolygons.Trace(labels, new OutletTree([1, -1]), cell => cell != 6);
        Assert.Equal((17.0, 28.0), (outlines.Local[0].EdgeContactM, outlines.Local[0].PerimeterM));
        Assert.Equal((22.0, 36.0), (outlines.Local[1].EdgeContactM, outlines.Local[1].PerimeterM));
        // Together: both contacts, and the outlines less the 8 m between them on either side.
        Assert.Equal((39.0, 48.0), (outlines.Total[1].EdgeContactM, outlines.Total[1].PerimeterM));
        Assert.Equal(39.0 / 48, outlines.Total[1].EdgeContactShare);
    }

    [Fact]
    public void AHoleWithoutTerrainIsContactAndOneWithTerrainIsNot()
    {
        // A ring of eight cells around one, away from the rim: outer 12 sides, inner 4.
        var labels = new Grid<int>(new GridFrame(5, 5, 0, 5, 1, 1), [0, 0, 0, 0, 0, 0, 1, 1, 1, 0, 0, 1, 0, 1, 0, 0, 1, 1, 1, 0, 0, 0, 0, 0, 0]);
        Assert.Equal(4.0 / 16, WatershedPolygons.Trace(labels, new OutletTree([-1]), cell => cell != 12).Total[0].EdgeContactShare);
        Assert.Equal(0, WatershedPolygons.Trace(labels, new OutletTree([-1])).Total[0].EdgeContactShare);
        // Nodata that touches with a corner only (row 0, column 0) has no length in common.
        Assert.Equal(0, WatershedPolygons.Trace(labels, new OutletTree([-1]), cell => cell != 0).Total[0].EdgeContactShare);
    }

    private static bool Below(int label, int outlet, int[] parent)
    {
        for (var k = label; k >= 0; k = parent[k])
            if (k == outlet) return true;
        return false;
    }

    private static void Same(WatershedOutline outline, Grid<int> labels, Func<int, bool> belongs)
    {
        var f = labels.Frame;
        var squares = new List<Geometry>();
        for (var i = 0; i < labels.Cells.Length; i++)
            if (belongs(labels.Cells[i] - 1))
            {
                double x = f.West + (i % f.Columns * f.CellWidthM), y = f.North - (i / f.Columns * f.CellHeightM);
                squares.Add(GeometryFactory.Default.ToGeometry(new Envelope(x, x + f.CellWidthM, y - f.CellHeightM, y)));
            }

        Assert.True(outline.Polygon.IsValid, outline.Polygon.AsText());
        Assert.Equal(squares.Count * f.CellAreaM2, outline.Polygon.Area, 6);
        Assert.Equal(squares.Count == 0, outline.Polygon.IsEmpty);
        if (squares.Count == 0) return;
        var union = UnaryUnionOp.Union(squares);
        Assert.Equal(union.Length, outline.PerimeterM, 6);
        Assert.True(union.EqualsTopologically(outline.Polygon), $"{union} against {outline.Polygon}");
    }

    private static HashSet<(double X1, double Y1, double X2, double Y2)> Segments(Geometry geometry)
    {
        var segments = new HashSet<(double, double, double, double)>();
        for (var i = 0; i < geometry.NumGeometries; i++)
        {
            if (geometry.GetGeometryN(i) is not Polygon { IsEmpty: false } polygon) continue;
            foreach (var ring in polygon.InteriorRings.Prepend(polygon.ExteriorRing))
                for (var k = 1; k < ring.NumPoints; k++)
                {
                    Coordinate a = ring.GetCoordinateN(k - 1), b = ring.GetCoordinateN(k);
                    segments.Add(a.CompareTo(b) < 0 ? (a.X, a.Y, b.X, b.Y) : (b.X, b.Y, a.X, a.Y));
                }
        }

        return segments;
    }
}
