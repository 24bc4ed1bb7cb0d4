using CsCheck;
using GeoCulvert.Design.Terrain;
using GeoCulvert.Design.Tests.Terrain;
using GeoCulvert.Design.Watersheds;
using NetTopologySuite.Geometries;
using NetTopologySuite.Operation.Union;

namespace GeoCulvert.Design.Tests.Watersheds;

/// <summary>What must hold of the watersheds of any terrain: small random ones by the thousand, and every real one of the terrain room.</summary>
public class WatershedInvariantTests
{
    public static TheoryData<string> Names => RealTerrain.Names;

    [Fact]
    public void OnRandomTerrain() => (
        from terrain in RandomTerrain.Any
        from places in Gen.Int[0, int.MaxValue - 1].Array[1, 6]
        from smooth in Gen.Bool
        select (terrain, places, smooth)).Sample(
        (terrain, places, smooth) =>
        {
            var valid = Enumerable.Range(0, terrain.Cells.Length).Where(i => !float.IsNaN(terrain.Cells[i])).ToList();
            if (valid.Count == 0) return;
            Hold(terrain, Drainage.Solve(terrain).Direction, [.. places.Select(p => valid[p % valid.Count]).Distinct()], smooth, int.MaxValue);
        },
        iter: 3000);

    [Theory]
    [MemberData(nameof(Names))]
    public void OnRealTerrain(string name)
    {
        var elevation = RealTerrain.Elevation(name);
        var terrain = Drainage.Solve(elevation, cancel: TestContext.Current.CancellationToken);
        var streams = Enumerable.Range(0, elevation.Cells.Length).Where(i => terrain.Accumulation.Cells[i] >= 30).ToList();
        var outlets = streams.Where((_, i) => i % Math.Max(1, streams.Count / 150) == 0).ToArray();
        Assert.True(outlets.Length > 50);
        Hold(elevation, terrain.Direction, outlets, smooth: false, unions: 20);
        Hold(elevation, terrain.Direction, outlets, smooth: true, unions: 20);
    }

    /// <summary>Asserts every invariant; unions of polygons, which are slow, only of the totals with the most parts.</summary>
    private static void Hold(Grid<float> elevation, Grid<byte> direction, int[] outlets, bool smooth, int unions)
    {
        var frame = elevation.Frame;
        var labelling = WatershedLabels.Label(direction, outlets);
        var tree = new OutletTree(labelling.Parent);
        var survey = WatershedSurvey.Survey(labelling.Labels, labelling.Parent, elevation, settings: new() { SmoothOutlines = smooth });
        var upstream = Enumerable.Range(0, outlets.Length).Select(k => Enumerable.Range(0, outlets.Length).Where(l => tree.Drains(k, l)).ToList()).ToList();
        for (var k = 0; k < outlets.Length; k++)
        {
            var (local, total) = (survey[k].Local, survey[k].Total);
            foreach (var (land, cells) in new[] { (local, labelling.LocalCells[k]), (total, labelling.TotalCells[k]) })
            {
                var polygon = land.Outline.Polygon;
                Assert.True(polygon.IsValid, polygon.AsText());
                Assert.Equal(cells, land.Cells);
                Assert.Equal(cells * frame.CellAreaM2, land.AreaM2, 1e-6 * frame.CellAreaM2);
                Assert.InRange(land.EdgeContactShare, 0, 1);
                if (!smooth)
                {
                    Assert.Equal(land.AreaM2, polygon.Area, 1e-6 * frame.CellAreaM2);
                    Assert.Equal(land.Outline.PerimeterM, polygon.Length, 1e-6 * frame.CellWidthM);
                    foreach (var part in Parts(polygon)) Assert.True(part.Area > 0.999 * frame.CellAreaM2);
                }
                else if (cells >= 300)
                {
                    Assert.Equal(1, polygon.Area / land.AreaM2, 0.02);
                }
            }

            // Local areas sum to the total, in figures and as drawn; drawn outlines share their edges, so nothing is drawn twice or left out.
            Assert.Equal(upstream[k].Sum(l => survey[l].Local.AreaM2), total.AreaM2, 1e-6 * total.AreaM2);
            Assert.Equal(upstream[k].Sum(l => survey[l].Local.Outline.Polygon.Area), total.Outline.Polygon.Area, 1e-7 * total.AreaM2);
        }

        foreach (var k in Enumerable.Range(0, outlets.Length).OrderByDescending(k => upstream[k].Count).Take(unions))
        {
            var union = UnaryUnionOp.Union(upstream[k].Select(l => survey[l].Local.Outline.Polygon));
            var total = survey[k].Total.Outline.Polygon;
            Assert.Equal(0, union.SymmetricDifference(total).Area, 1e-6 * frame.CellAreaM2);
        }

        SharedEdges(survey);
    }

    /// <summary>Where two local outlines run together, both have the very same segments: the length found segment by segment is that of twice the inner lines.</summary>
    private static void SharedEdges(IReadOnlyList<Watershed> survey)
    {
        var owners = new Dictionary<(double, double, double, double), int>();
        foreach (var watershed in survey)
            foreach (var part in Parts(watershed.Local.Outline.Polygon))
                foreach (var ring in part.InteriorRings.Prepend(part.ExteriorRing))
                    for (var i = 1; i < ring.NumPoints; i++)
                    {
                        Coordinate a = ring.GetCoordinateN(i - 1), b = ring.GetCoordinateN(i);
                        var key = a.CompareTo(b) < 0 ? (a.X, a.Y, b.X, b.Y) : (b.X, b.Y, a.X, a.Y);
                        owners[key] = owners.GetValueOrDefault(key) + 1;
                    }

        Assert.All(owners.Values, n => Assert.InRange(n, 1, 2));
        // What only one outline has bounds the whole: put together it is the outline of the union of all roots.
        var single = owners.Where(o => o.Value == 1).Sum(o => Math.Sqrt(Math.Pow(o.Key.Item1 - o.Key.Item3, 2) + Math.Pow(o.Key.Item2 - o.Key.Item4, 2)));
        var all = UnaryUnionOp.Union(survey.Where(w => w.ParentOutlet < 0).Select(w => w.Total.Outline.Polygon));
        Assert.Equal(all.Length, single, 1e-6 * all.Length);
    }

    private static IEnumerable<Polygon> Parts(Geometry geometry) => Enumerable.Range(0, geometry.NumGeometries).Select(geometry.GetGeometryN).OfType<Polygon>().Where(p => !p.IsEmpty);
}
