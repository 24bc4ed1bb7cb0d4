using CsCheck;
using GeoCulvert.Design.Basis;
using GeoCulvert.Design.Terrain;
using GeoCulvert.Design.Tests.Conventions;
using GeoCulvert.Design.Watersheds;
using NetTopologySuite.Geometries;

namespace GeoCulvert.Design.Tests.Watersheds;

/// <summary>Overlay with grids that do not line up, against NetTopologySuite's intersections of envelopes, by hand, and against numpy.</summary>
public class ZonalOverlayTests
{
    private const int Outlets = 3;

    private static readonly Gen<GridFrame> Other =
        from columns in Gen.Int[1, 7]
        from rows in Gen.Int[1, 7]
        from west in Gen.OneOf(Gen.Double[-20, 20], Gen.Int[-3, 3].Select(i => 4.0 * i))
        from north in Gen.OneOf(Gen.Double[-20, 30], Gen.Int[-3, 6].Select(i => 3.0 * i))
        from width in Gen.OneOf(Gen.Double[0.7, 15], Gen.Const(4.0), Gen.Const(2.0), Gen.Const(12.0))
        from height in Gen.OneOf(Gen.Double[0.7, 15], Gen.Const(3.0), Gen.Const(1.5))
        select new GridFrame(columns, rows, west, north, width, height);

    [Fact]
    public void OverlapsAreThoseOfTheRectangles() => (
        from columns in Gen.Int[1, 6]
        from rows in Gen.Int[1, 6]
        from labels in Gen.Int[0, Outlets].Array[columns * rows]
        from first in Other
        from second in Other
        from values in Gen.Int[-1, 3].Array[49]
        from codes in Gen.Int[0, 4].Array[49]
        select (Labels: new Grid<int>(new GridFrame(columns, rows, 0, 18, 4, 3), labels), first, second, values, codes)).Sample(s =>
    {
        var tree = new OutletTree([1, -1, 1]);
        var value = new Grid<float>(s.first, [.. s.values.Take((int)s.first.Count).Select(v => v < 0 ? float.NaN : v)]);
        var means = ZonalOverlay.Means(s.Labels, tree, value);
        var classes = ZonalOverlay.Classes(s.Labels, tree, s.first, s.second, (_, a, b) => a < 0 || b < 0 ? ZonalOverlay.NoClass : s.codes[b]);
        for (var k = 0; k < Outlets; k++)
        {
            double valued = 0, sum = 0, cells = 0;
            var byCode = new double[5];
            for (var i = 0; i < s.Labels.Cells.Length; i++)
            {
                if (s.Labels.Cells[i] == 0 || !(s.Labels.Cells[i] == k + 1 || k == 1)) continue;
                var here = Cell(s.Labels.Frame, i);
                cells++;
                for (var a = 0; a < s.first.Count; a++)
                {
                    var common = here.Intersection(Cell(s.first, a));
                    if (!float.IsNaN(value.Cells[a])) (valued, sum) = (valued + (common.Area / 12), sum + (common.Area / 12 * value.Cells[a]));
                    for (var b = 0; b < s.second.Count; b++) byCode[s.codes[b]] += common.Intersection(Cell(s.second, b)).Area / 12;
                }
            }

            Assert.Equal(cells, means.Total[k].CellCount, 1e-9);
            Assert.Equal(valued, means.Total[k].ValueCellCount, 1e-5);
            Assert.Equal(sum, means.Total[k].Sum, 1e-5);
            for (var c = 0; c < 5; c++) Assert.Equal(byCode[c], classes.Total[k].CellsByClass.GetValueOrDefault(c), 1e-5);
            Assert.Equal(cells, classes.Total[k].CellCount, 1e-9);
        }
    }, iter: 1000);

    [Fact]
    public void PartsOfCellsByHand()
    {
        // One watershed of 2 x 1 cells of 10 m. A raster of cells of 15 m from x = -5: the first covers x -5 to 10, the second 10 to 25,
        // and only the upper 5 m of the row: 10 m of the first cell with 6, 10 m of the second with 12; half is missing.
        var labels = new Grid<int>(new GridFrame(2, 1, 0, 10, 10, 10), [1, 1]);
        var mean = ZonalOverlay.Means(labels, new OutletTree([-1]), new Grid<float>(new GridFrame(2, 1, -5, 20, 15, 15), [6, 12])).Total[0];
        Assert.Equal(9, mean.MeanOrNull!.Value, 12);
        Assert.Equal(0.5, mean.MissingShare, 12);
        // From x = 0 in cells of 8 m: 8 m of 6, 8 m of 12, 4 m of 30, all of the row: (48 + 96 + 120) / 20.
        mean = ZonalOverlay.Means(labels, new OutletTree([-1]), new Grid<float>(new GridFrame(3, 1, 0, 10, 8, 10), [6, 12, 30])).Total[0];
        Assert.Equal(13.2, mean.MeanOrNull!.Value, 12);
        Assert.Equal(0, mean.MissingShare, 12);
    }

    [Fact]
    public void AnAlignedGridCountsWholeCells()
    {
        // A frame far from the origin, in fractions of metres that no double holds: cells still count as one.
        var frame = new GridFrame(300, 200, 512345.1, 4512345.7, 26.477018215008, 26.477018215008);
        var labels = new Grid<int>(frame, [.. Enumerable.Repeat(1, 60000)]);
        var classes = ZonalOverlay.Classes(labels, new OutletTree([-1]), new Grid<int>(frame, [.. Enumerable.Range(0, 60000).Select(i => i % 7)])).Total[0];
        Assert.Equal([8572.0, 8572, 8572, 8571, 8571, 8571, 8571], classes.CellsByClass.Values);
    }

    [Fact]
    public void MeansOfARealTerrainAgreeWithNumpy()
    {
        // Oracles/make_zonal_means.py: overlap fractions as two matrices, one a side, with numpy.
        var expected = PublishedTable.Parse("zonal_means.csv", File.ReadAllText(Repository.Path("tests", "GeoCulvert.Design.Tests", "Watersheds", "Oracles", "zonal_means.csv")));
        var labels = new Grid<int>(new GridFrame(120, 90, 1000, 9000, 10, 10));
        for (var i = 0; i < labels.Cells.Length; i++) labels.Cells[i] = (((i % 120 * 7) + (i / 120 * 3)) / 97) % 4;
        Assert.Equal(6, expected.Rows.Count);
        foreach (var row in expected.Rows)
        {
            var frame = new GridFrame((int)row.Number("columns"), (int)row.Number("rows"), row.Number("west"), row.Number("north"), row.Number("cell_width"), row.Number("cell_height"));
            var values = new Grid<float>(frame);
            for (var i = 0; i < values.Cells.Length; i++)
            {
                int r = i / frame.Columns, c = i % frame.Columns;
                values.Cells[i] = (r + (2 * c)) % 11 == 0 ? float.NaN : ((r * 13) + (c * 29)) % 101;
            }

            var zone = ZonalOverlay.Means(labels, new OutletTree([-1, -1, -1]), values).Local[(int)row.Number("label") - 1];
            Assert.Equal(row.Number("mean"), zone.MeanOrNull!.Value, 1e-6);
            Assert.Equal(row.Number("missing_share"), zone.MissingShare, 1e-9);
        }
    }

    private static Envelope Cell(GridFrame f, int i)
    {
        double x = f.West + (i % f.Columns * f.CellWidthM), y = f.North - (i / f.Columns * f.CellHeightM);
        return new Envelope(x, x + f.CellWidthM, y - f.CellHeightM, y);
    }
}
