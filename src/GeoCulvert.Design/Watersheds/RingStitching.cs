using GeoCulvert.Design.Terrain;
using NetTopologySuite.Geometries;

namespace GeoCulvert.Design.Watersheds;

/// <summary>
/// Joins the edges of one watershed to rings. Where four edges meet (cells touching at a corner) the way turns left, which stays with the
/// same cell; a ring that comes back to a corner is cut there. So rings are simple, shells run anticlockwise and holes clockwise.
/// A corner is kept where the ring turns, or where three or more labels meet, so that neighbours share their vertices.
/// </summary>
internal static class RingStitching
{
    /// <summary>Polygon of sorted edge codes.</summary>
    public static Geometry Polygon(ReadOnlySpan<long> edges, Grid<int> labels)
    {
        var shells = new List<Ring>();
        var holes = new List<Ring>();
        var used = new bool[edges.Length];
        for (var first = 0; first < edges.Length; first++)
        {
            if (used[first]) continue;
            foreach (var corners in Rings(edges, used, first, labels.Frame.Columns + 1))
            {
                var ring = new Ring(corners, labels);
                (ring.AreaCells > 0 ? shells : holes).Add(ring);
            }
        }

        var polygons = shells.Select(s => new Polygon(s.Line, [.. HolesOf(s, shells, holes).Select(h => h.Line)])).ToArray();
        return polygons.Length == 1 ? polygons[0] : new MultiPolygon(polygons);
    }

    /// <summary>Follows edges from one of them until back at it; cuts off each part that closes on the way.</summary>
    private static List<List<long>> Rings(ReadOnlySpan<long> edges, bool[] used, int first, long across)
    {
        var rings = new List<List<long>>();
        var way = new List<long>();
        var placeOf = new Dictionary<long, int>();
        var i = first;
        while (true)
        {
            used[i] = true;
            long corner = edges[i] >> 2;
            // Only a corner with two ways out can come twice; the codes of one corner lie side by side.
            if ((i > 0 && edges[i - 1] >> 2 == corner) || (i + 1 < edges.Length && edges[i + 1] >> 2 == corner))
            {
                if (placeOf.TryGetValue(corner, out var place))
                {
                    rings.Add(way.GetRange(place, way.Count - place));
                    for (var k = place; k < way.Count; k++) placeOf.Remove(way[k]);
                    way.RemoveRange(place, way.Count - place);
                }

                placeOf[corner] = way.Count;
            }

            way.Add(corner);
            var direction = (int)(edges[i] & 3);
            var next = corner + direction switch { 0 => 1, 1 => -across, 2 => -1, _ => across };
            i = Outgoing(edges, used, next, direction);
            if (i < 0) break;
        }

        rings.Add(way);
        return rings;
    }

    /// <summary>The unused edge out of a corner, the leftmost first; -1 when the way is closed.</summary>
    private static int Outgoing(ReadOnlySpan<long> edges, bool[] used, long corner, int direction)
    {
        foreach (var turn in (ReadOnlySpan<int>)[1, 0, 3])
        {
            var i = edges.BinarySearch((corner << 2) + ((direction + turn) & 3));
            if (i >= 0 && !used[i]) return i;
        }

        return -1;
    }

    private static IEnumerable<Ring> HolesOf(Ring shell, List<Ring> shells, List<Ring> holes)
    {
        if (shells.Count == 1) return holes;
        return holes.Where(h => ReferenceEquals(shell, shells.Where(s => s.Contains(h)).MinBy(s => s.AreaCells)));
    }

    private sealed class Ring
    {
        private readonly List<long> _corners;
        private readonly long _across;

        public Ring(List<long> corners, Grid<int> labels)
        {
            (_corners, _across) = (corners, labels.Frame.Columns + 1L);
            var area = 0L;
            for (int i = 0, j = corners.Count - 1; i < corners.Count; j = i++)
                area += (X(j) * Y(i)) - (X(i) * Y(j));
            AreaCells = area / 2;
            Line = new LinearRing(Coordinates(labels));
        }

        /// <summary>Area in cells; negative for a hole.</summary>
        public long AreaCells { get; }

        public LinearRing Line { get; }

        private long X(int i) => _corners[i] % _across;

        // North is up: rows count downward.
        private long Y(int i) => -(_corners[i] / _across);

        /// <summary>
        /// Whether a hole lies in this shell: tested at the centre of a cell just inside the watershed along the hole's first edge,
        /// which is in one shell only even where rings touch.
        /// </summary>
        public bool Contains(Ring hole)
        {
            double dx = hole.X(1) - hole.X(0), dy = hole.Y(1) - hole.Y(0);
            double px = hole.X(0) + (dx / 2) - (dy / 2), py = hole.Y(0) + (dy / 2) + (dx / 2);
            var inside = false;
            for (int i = 0, j = _corners.Count - 1; i < _corners.Count; j = i++)
                if (X(i) == X(j) && Y(i) > py != Y(j) > py && X(i) > px) inside = !inside;
            return inside;
        }

        private Coordinate[] Coordinates(Grid<int> labels)
        {
            var frame = labels.Frame;
            var kept = new List<Coordinate>();
            var n = _corners.Count;
            for (var i = 0; i < n; i++)
            {
                var straight = _corners[i] - _corners[(i + n - 1) % n] == _corners[(i + 1) % n] - _corners[i];
                int row = (int)(_corners[i] / _across), column = (int)(_corners[i] % _across);
                if (!straight || LabelsMeeting(labels, row, column) >= 3)
                    kept.Add(new Coordinate(frame.West + (column * frame.CellWidthM), frame.North - (row * frame.CellHeightM)));
            }

            kept.Add(kept[0].Copy());
            return [.. kept];
        }

        private static int LabelsMeeting(Grid<int> labels, int row, int column)
        {
            int At(int r, int c) => labels.Frame.Contains(r, c) ? labels[r, c] : -1;
            int a = At(row - 1, column - 1), b = At(row - 1, column), c = At(row, column - 1), d = At(row, column);
            return 1 + (b != a ? 1 : 0) + (c != a && c != b ? 1 : 0) + (d != a && d != b && d != c ? 1 : 0);
        }
    }
}
