using GeoCulvert.Design.Terrain;
using NetTopologySuite.Geometries;

namespace GeoCulvert.Design.Crossings;

/// <summary>Where a cell lies beside the nearest road.</summary>
/// <param name="Road">Index of the road.</param>
/// <param name="StationM">Station of the foot point, m.</param>
/// <param name="OffsetM">Distance from the centreline, m; positive to the right.</param>
internal readonly record struct BandCell(int Road, float StationM, float OffsetM);

/// <summary>The cells within a distance of the roads, each with its nearest road; the size grows with the roads, not with the terrain.</summary>
internal sealed class RoadBand
{
    private readonly Dictionary<int, BandCell> _cells = [];

    /// <param name="roads">The roads.</param>
    /// <param name="frame">The terrain's frame.</param>
    /// <param name="reachM">Distance from the centreline for each road, m.</param>
    public RoadBand(IReadOnlyList<RoadAlignment> roads, GridFrame frame, Func<RoadAlignment, double> reachM)
    {
        Frame = frame;
        for (var k = 0; k < roads.Count; k++)
        {
            var reach = reachM(roads[k]);
            foreach (var segment in roads[k].Segments()) Add(k, segment, reach);
        }

        Ordered = [.. _cells.Keys.Order()];
    }

    public GridFrame Frame { get; }

    /// <summary>Cells of the band, ascending.</summary>
    public int[] Ordered { get; }

    public bool TryGet(int cell, out BandCell place) => _cells.TryGetValue(cell, out place);

    private void Add(int road, RoadSegment s, double reach)
    {
        // A long oblique segment is searched in pieces, so that its box stays narrow.
        var pieces = Math.Max(1, (int)Math.Ceiling((s.ToStationM - s.FromStationM) / Math.Max(reach, 8 * Frame.CellWidthM)));
        for (var i = 0; i < pieces; i++)
        {
            Coordinate a = s.At((double)i / pieces), b = s.At((double)(i + 1) / pieces);
            int top = Math.Max(Frame.RowAt(Math.Max(a.Y, b.Y) + reach), 0), bottom = Math.Min(Frame.RowAt(Math.Min(a.Y, b.Y) - reach), Frame.Rows - 1);
            int left = Math.Max(Frame.ColumnAt(Math.Min(a.X, b.X) - reach), 0), right = Math.Min(Frame.ColumnAt(Math.Max(a.X, b.X) + reach), Frame.Columns - 1);
            for (var row = top; row <= bottom; row++)
                for (var column = left; column <= right; column++)
                {
                    var p = new Coordinate(Frame.CentreX(column), Frame.CentreY(row));
                    var t = s.Nearest(p);
                    var distance = s.At(t).Distance(p);
                    if (distance > reach) continue;
                    var cell = (row * Frame.Columns) + column;
                    // A bend shows the same cell from two segments: the nearer one counts, the first on a tie.
                    if (_cells.TryGetValue(cell, out var known) && Math.Abs(known.OffsetM) <= (float)distance) continue;
                    var side = ((s.To.X - s.From.X) * (p.Y - s.From.Y)) - ((s.To.Y - s.From.Y) * (p.X - s.From.X));
                    _cells[cell] = new(road, (float)s.StationAt(t), (float)(side > 0 ? -distance : distance));
                }
        }
    }
}
