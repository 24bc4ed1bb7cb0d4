using GeoCulvert.Design.Terrain;
using NetTopologySuite.Geometries;

namespace GeoCulvert.Design.Watersheds;

/// <summary>The outline of one watershed.</summary>
/// <param name="Polygon">Polygon, or MultiPolygon where cells touch at corners only; valid, along cell edges; empty when it has no cell.</param>
/// <param name="PerimeterM">Length of all its edges, holes included, m: along the cell edges, so longer than a smooth divide.</param>
/// <param name="EdgeContactM">Length of the edges beyond which there is no terrain (grid edge or nodata), m.</param>
public sealed record WatershedOutline(Geometry Polygon, double PerimeterM, double EdgeContactM)
{
    /// <summary>Share of the perimeter beyond which there is no terrain, 0-1.</summary>
    public double EdgeContactShare => PerimeterM > 0 ? EdgeContactM / PerimeterM : 0;
}

/// <summary>Outlines of all watersheds of a run, by outlet.</summary>
/// <param name="Local">Between an outlet and the outlets upstream of it.</param>
/// <param name="Total">All land above an outlet.</param>
public sealed record WatershedOutlines(IReadOnlyList<WatershedOutline> Local, IReadOnlyList<WatershedOutline> Total);

/// <summary>
/// Traces the outlines of all labels in one pass over the grid. Every edge between two cells of different label is found once and handed to the
/// watersheds that it bounds: for labels a and b these are the outlets from a down to where the two ways join, and from b likewise. The work
/// is that of the pass and of the outlines themselves, however many there are and however deeply nested.
/// </summary>
public static class WatershedPolygons
{
    /// <summary>Traces local and total outlines.</summary>
    /// <param name="labels">0 for none, k + 1 for outlet k.</param>
    /// <param name="tree">The outlets' tree.</param>
    /// <param name="hasTerrain">Whether a cell (row-major index) has terrain; null when all have. Cells beyond the grid never have.</param>
    /// <exception cref="ArgumentException">A label names no outlet of the tree.</exception>
    public static WatershedOutlines Trace(Grid<int> labels, OutletTree tree, Func<int, bool>? hasTerrain = null)
    {
        ArgumentNullException.ThrowIfNull(labels);
        ArgumentNullException.ThrowIfNull(tree);
        var edges = LabelEdges.Collect(labels, tree.Count, hasTerrain);
        var local = Outlines(labels, tree, edges, total: false, null);
        return new(local, Outlines(labels, tree, edges, total: true, local));
    }

    private static WatershedOutline[] Outlines(Grid<int> labels, OutletTree tree, LabelEdges edges, bool total, WatershedOutline[]? local)
    {
        var frame = labels.Frame;
        var n = tree.Count;
        var hasUpstream = new bool[n];
        for (var k = 0; k < n; k++)
            if (tree.Parent(k) >= 0) hasUpstream[tree.Parent(k)] = true;
        bool Reuse(int k) => local is not null && !hasUpstream[k];

        // Counted first, so that each watershed's edges lie together in one array.
        var start = new long[n + 1];
        for (var i = 0; i < edges.Count; i++)
            for (var k = edges.Inside(i); Bounds(k, edges.Outside(i)); k = total ? tree.Parent(k) : -1)
                if (!Reuse(k)) start[k + 1]++;
        for (var k = 0; k < n; k++) start[k + 1] += start[k];
        var codes = new long[start[n]];
        var fill = start.AsSpan(0, n).ToArray();
        double[] perimeter = new double[n], contact = new double[n];
        for (var i = 0; i < edges.Count; i++)
        {
            var code = edges.Code(i);
            var lengthM = (code & 1) == 0 ? frame.CellWidthM : frame.CellHeightM;
            for (var k = edges.Inside(i); Bounds(k, edges.Outside(i)); k = total ? tree.Parent(k) : -1)
            {
                if (Reuse(k)) continue;
                codes[fill[k]++] = code;
                perimeter[k] += lengthM;
                if (edges.Contact(i)) contact[k] += lengthM;
            }
        }

        var outlines = new WatershedOutline[n];
        for (var k = 0; k < n; k++)
        {
            if (Reuse(k)) { outlines[k] = local![k]; continue; }
            var own = codes.AsSpan((int)start[k], (int)(start[k + 1] - start[k]));
            own.Sort();
            outlines[k] = new(RingStitching.Polygon(own, labels), perimeter[k], contact[k]);
        }

        return outlines;

        bool Bounds(int k, int outside) => k >= 0 && (!total || outside < 0 || !tree.Drains(k, outside));
    }
}
