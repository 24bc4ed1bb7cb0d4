using GeoCulvert.Design.Terrain;
using NetTopologySuite.Geometries;
using NetTopologySuite.Geometries.Implementation;

namespace GeoCulvert.Design.Watersheds;

/// <summary>The points of every arc in the plane, made once, and rings put together from them.</summary>
internal sealed class ArcShapes
{
    private static readonly GeometryFactory Factory = new(PackedCoordinateSequenceFactory.DoubleFactory);
    private readonly double[][] _xy;

    private ArcShapes(double[][] xy) => _xy = xy;

    /// <summary>Arcs as they run along the cell edges.</summary>
    public static ArcShapes AlongCells(BoundaryArcs boundary, GridFrame frame) => Of(boundary, frame, arc => Corners(boundary.Points(arc)));

    /// <summary>Arcs smoothed for drawing, see <see cref="ArcSmoothing"/>; short ones stay as they run.</summary>
    public static ArcShapes Smoothed(BoundaryArcs boundary, GridFrame frame) => Of(boundary, frame, arc =>
        arc.EastWest + arc.NorthSouth < (arc.IsClosed ? ArcSmoothing.ShortestRing : ArcSmoothing.ShortestArc)
            ? Corners(boundary.Points(arc))
            : ArcSmoothing.Smooth(boundary.Points(arc), arc.IsClosed));

    private static ArcShapes Of(BoundaryArcs boundary, GridFrame frame, Func<BoundaryArc, (double Column, double Row)[]> shape)
    {
        var xy = new double[boundary.Arcs.Length][];
        for (var a = 0; a < xy.Length; a++)
        {
            var points = shape(boundary.Arcs[a]);
            var own = xy[a] = new double[2 * points.Length];
            for (var i = 0; i < points.Length; i++)
                (own[2 * i], own[(2 * i) + 1]) = (frame.West + (points[i].Column * frame.CellWidthM), frame.North - (points[i].Row * frame.CellHeightM));
        }

        return new(xy);
    }

    private static (double Column, double Row)[] Corners(ReadOnlySpan<(int Column, int Row)> points)
    {
        var corners = new (double Column, double Row)[points.Length];
        for (var i = 0; i < corners.Length; i++) corners[i] = points[i];
        return corners;
    }

    /// <summary>A closed line of arcs (arc * 2, + 1 when walked backward) that follow each other.</summary>
    public LinearRing Ring(ReadOnlySpan<int> ways)
    {
        var length = 2;
        foreach (var way in ways) length += _xy[way >> 1].Length - 2;
        var ring = new double[length];
        var at = 0;
        foreach (var way in ways)
        {
            var arc = _xy[way >> 1];
            var used = arc.Length - 2; // the last point is the next arc's first
            if ((way & 1) == 0) arc.AsSpan(0, used).CopyTo(ring.AsSpan(at));
            else
            {
                for (var i = 0; i < used; i += 2)
                    (ring[at + i], ring[at + i + 1]) = (arc[arc.Length - 2 - i], arc[arc.Length - 1 - i]);
            }

            at += used;
        }

        (ring[at], ring[at + 1]) = (ring[0], ring[1]);
        return Factory.CreateLinearRing(new PackedDoubleCoordinateSequence(ring, 2, 0));
    }
}
