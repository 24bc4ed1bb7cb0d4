using GeoCulvert.Design.Terrain;
using NetTopologySuite.Geometries;

namespace GeoCulvert.Design.Watersheds;

/// <summary>
/// Joins the arcs of one watershed to rings, its inside on the left. Where two ways go on (cells touching at a corner) the way turns left,
/// which stays with the same cell; a ring that comes back to a node is cut there. So rings are simple, shells run anticlockwise and holes
/// clockwise. Not for use by several threads at once.
/// </summary>
internal sealed class RingStitching
{
    private readonly BoundaryArcs _boundary;
    private readonly ArcShapes _shapes;

    // The arcs that leave a node in the watershed at hand: two at most, each arc * 2 + (1 when it is walked backward); -1 for none.
    private readonly int[] _firstOut;
    private readonly int[] _secondOut;
    private readonly int[] _placeInWay;

    public RingStitching(BoundaryArcs boundary, ArcShapes shapes)
    {
        (_boundary, _shapes) = (boundary, shapes);
        (_firstOut, _secondOut, _placeInWay) = (new int[boundary.NodeCount], new int[boundary.NodeCount], new int[boundary.NodeCount]);
        Array.Fill(_firstOut, -1);
        Array.Fill(_secondOut, -1);
        Array.Fill(_placeInWay, -1);
    }

    /// <summary>Polygon of directed arcs; of several parts the largest first.</summary>
    public Geometry Polygon(ReadOnlySpan<int> ways)
    {
        var rings = new List<Ring>();
        foreach (var way in ways)
        {
            if (Arc(way).IsClosed)
            {
                rings.Add(new Ring([way], this));
                continue;
            }

            var node = StartNode(way);
            if (_firstOut[node] < 0) _firstOut[node] = way;
            else _secondOut[node] = way;
        }

        foreach (var way in ways)
            if (!Arc(way).IsClosed && (_firstOut[StartNode(way)] == way || _secondOut[StartNode(way)] == way)) Follow(way, rings);

        List<Ring> shells = [.. rings.Where(r => r.TwiceArea > 0).OrderByDescending(r => r.TwiceArea)], holes = [.. rings.Where(r => r.TwiceArea < 0)];
        // A hole lies in the smallest shell around it; shells are ordered, the largest first.
        var holesOf = holes.ToLookup(h => shells.Count == 1 ? shells[0] : shells.Last(s => s.Contains(h)), h => h.Line);
        var polygons = shells.Select(s => new Polygon(s.Line, [.. holesOf[s]])).ToArray();
        return polygons.Length == 1 ? polygons[0] : new MultiPolygon(polygons);
    }

    /// <summary>Follows arcs from one of them until back at it; cuts off each part that closes on the way.</summary>
    private void Follow(int first, List<Ring> rings)
    {
        var way = new List<int>();
        for (var next = first; next >= 0;)
        {
            var node = StartNode(next);
            if (_placeInWay[node] >= 0) CutOff(_placeInWay[node], way, rings);
            _placeInWay[node] = way.Count;
            way.Add(next);
            if (_firstOut[node] == next) _firstOut[node] = -1;
            else _secondOut[node] = -1;
            next = Onward(next);
        }

        CutOff(0, way, rings);
    }

    private void CutOff(int from, List<int> way, List<Ring> rings)
    {
        rings.Add(new Ring([.. way[from..]], this));
        for (var i = from; i < way.Count; i++) _placeInWay[StartNode(way[i])] = -1;
        way.RemoveRange(from, way.Count - from);
    }

    /// <summary>The arc that goes on from the end of one, the leftmost first; -1 when the way is closed.</summary>
    private int Onward(int way)
    {
        var node = EndNode(way);
        int a = _firstOut[node], b = _secondOut[node];
        if (a < 0 || b < 0) return Math.Max(a, b);
        var direction = EndDirection(way);
        return Leftness(direction, StartDirection(a)) > Leftness(direction, StartDirection(b)) ? a : b;
    }

    // Left 2, straight 1, right 0: turns of 1, 0 and 3 quarters.
    private static int Leftness(int from, int to) => ((to - from) & 3) switch { 1 => 2, 0 => 1, _ => 0 };

    private ref readonly BoundaryArc Arc(int way) => ref _boundary.Arcs[way >> 1];

    private int StartNode(int way) => (way & 1) == 0 ? Arc(way).StartNode : Arc(way).EndNode;

    private int EndNode(int way) => (way & 1) == 0 ? Arc(way).EndNode : Arc(way).StartNode;

    private int StartDirection(int way) => (way & 1) == 0 ? Arc(way).StartDirection : (Arc(way).EndDirection + 2) & 3;

    private int EndDirection(int way) => (way & 1) == 0 ? Arc(way).EndDirection : (Arc(way).StartDirection + 2) & 3;

    private sealed class Ring
    {
        private readonly int[] _ways;
        private readonly RingStitching _of;
        private (int West, int East, int Top, int Bottom)? _extent;

        public Ring(int[] ways, RingStitching of)
        {
            (_ways, _of) = (ways, of);
            foreach (var way in ways)
                TwiceArea += (way & 1) == 0 ? of.Arc(way).TwiceArea : -of.Arc(way).TwiceArea;

            Line = of._shapes.Ring(ways);
        }

        /// <summary>Twice the area in cells, along the cell edges; negative for a hole.</summary>
        public long TwiceArea { get; }

        public LinearRing Line { get; }

        private (int West, int East, int Top, int Bottom) Extent => _extent ??= MakeExtent();

        /// <summary>
        /// Whether a hole lies in this shell: tested at the centre of the cell just inside the watershed along the hole's first edge, which is
        /// in one shell only even where rings touch.
        /// </summary>
        public bool Contains(Ring hole)
        {
            var (column, row) = hole.InnerCell();
            if (column < Extent.West || column >= Extent.East || row < Extent.Top || row >= Extent.Bottom) return false;
            var inside = false;
            foreach (var way in _ways)
            {
                var points = _of._boundary.Points(_of.Arc(way));
                for (var i = 1; i < points.Length; i++)
                {
                    // A side east of the cell's centre that passes its row.
                    if (points[i].Column != points[i - 1].Column || points[i].Column <= column) continue;
                    if (points[i].Row > row != points[i - 1].Row > row) inside = !inside;
                }
            }

            return inside;
        }

        private (int West, int East, int Top, int Bottom) MakeExtent()
        {
            var (west, east, top, bottom) = (int.MaxValue, int.MinValue, int.MaxValue, int.MinValue);
            foreach (var way in _ways)
                foreach (var (column, row) in _of._boundary.Points(_of.Arc(way)))
                {
                    (west, east) = (Math.Min(west, column), Math.Max(east, column));
                    (top, bottom) = (Math.Min(top, row), Math.Max(bottom, row));
                }

            return (west, east, top, bottom);
        }

        private (int Column, int Row) InnerCell()
        {
            var way = _ways[0];
            var points = _of._boundary.Points(_of.Arc(way));
            var (column, row) = (way & 1) == 0 ? points[0] : points[^1];
            return _of.StartDirection(way) switch
            {
                0 => (column, row - 1),
                1 => (column - 1, row - 1),
                2 => (column - 1, row),
                _ => (column, row),
            };
        }
    }
}
