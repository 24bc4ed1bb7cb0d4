using GeoCulvert.Design.Terrain;
using NetTopologySuite.Geometries;

namespace GeoCulvert.Design.Watersheds;

/// <summary>The outline of one watershed.</summary>
/// <param name="Polygon">Polygon, or MultiPolygon where cells touch at corners only; valid; along cell edges, or smoothed for drawing; empty when it has no cell.</param>
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
/// Traces the outlines of all labels in one pass over the grid. Every line between two labels is found once and handed to the watersheds
/// that it bounds: for labels a and b these are the outlets from a down to where the two ways join, and from b likewise. The work is that of
/// the pass and of the outlines themselves, however many there are and however deeply nested.
/// </summary>
public static class WatershedPolygons
{
    /// <summary>Traces local and total outlines.</summary>
    /// <param name="labels">0 for none, k + 1 for outlet k.</param>
    /// <param name="tree">The outlets' tree.</param>
    /// <param name="hasTerrain">Whether a cell (row-major index) has terrain; null when all have. Cells beyond the grid never have.</param>
    /// <param name="smooth">Whether polygons are smoothed for drawing; perimeter and contact stay those of the cell edges.</param>
    /// <exception cref="ArgumentException">A label names no outlet of the tree.</exception>
    public static WatershedOutlines Trace(Grid<int> labels, OutletTree tree, Func<int, bool>? hasTerrain = null, bool smooth = false)
    {
        ArgumentNullException.ThrowIfNull(labels);
        ArgumentNullException.ThrowIfNull(tree);
        var boundary = BoundaryArcs.Collect(labels, tree.Count, hasTerrain);
        var stitching = new RingStitching(boundary, smooth ? ArcShapes.Smoothed(boundary, labels.Frame) : ArcShapes.AlongCells(boundary, labels.Frame));
        var local = Outlines(labels.Frame, tree, boundary, stitching, null);
        return new(local, Outlines(labels.Frame, tree, boundary, stitching, local));
    }

    /// <summary>Local outlines, or total ones when the local ones are given: where nothing is upstream the two are the same.</summary>
    private static WatershedOutline[] Outlines(in GridFrame frame, OutletTree tree, BoundaryArcs boundary, RingStitching stitching, WatershedOutline[]? local)
    {
        var n = tree.Count;
        var isSame = new bool[n];
        if (local is not null)
        {
            Array.Fill(isSame, true);
            for (var k = 0; k < n; k++)
                if (tree.Parent(k) >= 0) isSame[tree.Parent(k)] = false;
        }

        // Counted first, so that each watershed's arcs lie together in one array.
        var arcs = boundary.Arcs;
        var start = new long[n + 1];
        foreach (ref readonly var arc in arcs)
        {
            for (var k = First(arc.Left, arc.Right); k >= 0; k = Next(k, arc.Right)) start[k + 1]++;
            for (var k = First(arc.Right, arc.Left); k >= 0; k = Next(k, arc.Left)) start[k + 1]++;
        }

        for (var k = 0; k < n; k++) start[k + 1] += start[k];
        var ways = new int[start[n]];
        var fill = start.AsSpan(0, n).ToArray();
        for (var a = 0; a < arcs.Length; a++)
        {
            for (var k = First(arcs[a].Left, arcs[a].Right); k >= 0; k = Next(k, arcs[a].Right)) ways[fill[k]++] = a * 2;
            for (var k = First(arcs[a].Right, arcs[a].Left); k >= 0; k = Next(k, arcs[a].Left)) ways[fill[k]++] = (a * 2) + 1;
        }

        var outlines = new WatershedOutline[n];
        for (var k = 0; k < n; k++)
        {
            if (isSame[k])
            {
                outlines[k] = local![k];
                continue;
            }

            var own = ways.AsSpan((int)start[k], (int)(start[k + 1] - start[k]));
            long eastWest = 0, northSouth = 0, eastWestContact = 0, northSouthContact = 0;
            foreach (var way in own)
            {
                ref readonly var arc = ref arcs[way >> 1];
                (eastWest, northSouth) = (eastWest + arc.EastWest, northSouth + arc.NorthSouth);
                (eastWestContact, northSouthContact) = (eastWestContact + arc.EastWestContact, northSouthContact + arc.NorthSouthContact);
            }

            outlines[k] = new(
                stitching.Polygon(own),
                (eastWest * frame.CellWidthM) + (northSouth * frame.CellHeightM),
                (eastWestContact * frame.CellWidthM) + (northSouthContact * frame.CellHeightM));
        }

        return outlines;

        // The watersheds with an arc's inner side in them and its outer side not: only the label's own, or all down to where the ways join.
        int First(int inner, int outer) => Bounds(inner, outer);

        int Next(int k, int outer) => local is null ? -1 : Bounds(tree.Parent(k), outer);

        int Bounds(int k, int outer)
        {
            if (local is not null && outer >= 0 && k >= 0 && tree.Drains(k, outer)) return -1;
            return k >= 0 && isSame[k] ? Next(k, outer) : k;
        }
    }
}
