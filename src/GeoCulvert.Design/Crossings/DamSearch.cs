using GeoCulvert.Design.Terrain;

namespace GeoCulvert.Design.Crossings;

/// <summary>A place where a road stops water in the terrain model.</summary>
/// <param name="Cell">The cell from which to open.</param>
/// <param name="Place">Where it lies beside the road.</param>
/// <param name="Reason">Ponding or diversion.</param>
/// <param name="PondDepthM">Depth of the pond at the cell, m.</param>
/// <param name="AreaM2">Area that reaches the place, m2.</param>
/// <param name="IsLake">Whether the cell is part of a water surface.</param>
internal sealed record Dam(int Cell, BandCell Place, OpeningReason Reason, double PondDepthM, double AreaM2, bool IsLake);

/// <summary>
/// Looks along the roads for dams. (1) Ponds: depressions of the terrain that reach into the band beside a road; opened from their lowest cell on each side of each road.
/// (2) Diversions: a stream that comes to the road no more oblique than <see cref="MostObliqueDeg"/> and then follows it for some distance on the same side.
/// </summary>
internal sealed class DamSearch(IReadOnlyList<RoadAlignment> roads, RoadBand band, OpeningSettings settings)
{
    /// <summary>Angle from the perpendicular of the road above which a stream is taken to run along it, not to come to it (own rule).</summary>
    public const double MostObliqueDeg = 60;

    /// <summary>All dams of a drained terrain, by cell.</summary>
    public List<Dam> Find(Grid<float> elevation, DrainedTerrain solved)
    {
        var dams = new List<Dam>();
        Ponds(elevation, solved, dams);
        Diversions(elevation, solved, dams);
        return [.. dams.OrderBy(d => d.Reason).ThenByDescending(d => d.AreaM2).ThenBy(d => d.Cell)];
    }

    private void Ponds(Grid<float> elevation, DrainedTerrain solved, List<Dam> dams)
    {
        var (z, filled) = (elevation.Cells, solved.Filled.Surface.Cells);
        var seen = new HashSet<int>();
        var open = new Queue<int>();
        foreach (var start in band.Ordered)
        {
            if (!(filled[start] > z[start]) || !seen.Add(start)) continue;
            long cells = 0;
            var lowest = new SortedDictionary<(int Road, bool IsRight), int>();
            open.Enqueue(start);
            while (open.TryDequeue(out var cell))
            {
                // A pond may leave by several cells.
                var next = FlowSteps.Downstream(solved.Direction, cell);
                if (next < 0 || !(filled[next] > z[next])) cells += solved.Accumulation.Cells[cell];
                if (band.TryGet(cell, out var place))
                {
                    var side = (place.Road, place.OffsetM > 0);
                    if (!lowest.TryGetValue(side, out var known) || IsLower(z, cell, known)) lowest[side] = cell;
                }

                for (var d = 1; d <= 8; d++)
                {
                    var n = FlowSteps.Neighbour(elevation.Frame, cell, d);
                    if (n >= 0 && filled[n] > z[n] && seen.Add(n)) open.Enqueue(n);
                }
            }

            var areaM2 = cells * elevation.Frame.CellAreaM2;
            if (areaM2 < settings.PondAreaM2) continue;
            foreach (var cell in lowest.Values)
            {
                var depth = (double)filled[cell] - z[cell];
                if (depth < settings.SmallestPondM) continue;
                band.TryGet(cell, out var place);
                dams.Add(new(cell, place, OpeningReason.Ponding, depth, areaM2, IsLevel(elevation, cell)));
            }
        }
    }

    private bool IsLower(float[] z, int cell, int known)
    {
        if (z[cell] != z[known]) return z[cell] < z[known];
        band.TryGet(cell, out var a);
        band.TryGet(known, out var b);
        var nearer = Math.Abs(a.OffsetM) - Math.Abs(b.OffsetM);
        return nearer < 0 || (nearer == 0 && cell < known);
    }

    /// <summary>Whether a cell belongs to level ground as large as a lake: water surfaces are level in terrain models.</summary>
    private bool IsLevel(Grid<float> elevation, int cell)
    {
        var wanted = settings.LakeAreaM2 / elevation.Frame.CellAreaM2;
        var level = elevation.Cells[cell];
        var seen = new HashSet<int> { cell };
        var open = new Queue<int>([cell]);
        while (open.TryDequeue(out var c))
        {
            if (seen.Count >= wanted && seen.Count > 8) return true;
            for (var d = 1; d <= 8; d++)
            {
                var n = FlowSteps.Neighbour(elevation.Frame, c, d);
                if (n >= 0 && elevation.Cells[n] == level && seen.Add(n)) open.Enqueue(n);
            }
        }

        return false;
    }

    private void Diversions(Grid<float> elevation, DrainedTerrain solved, List<Dam> dams)
    {
        var (direction, accumulation) = (solved.Direction, solved.Accumulation);
        var streamCells = Math.Max(1, settings.StreamAreaM2 / elevation.Frame.CellAreaM2);
        foreach (var entry in band.Ordered)
        {
            if (accumulation.Cells[entry] < streamCells) continue;
            var above = FlowSteps.UpstreamMain(direction, accumulation, entry);
            if (above < 0 || band.TryGet(above, out _)) continue;
            if (Turned(entry, elevation, solved) is { } dam) dams.Add(dam);
        }
    }

    /// <summary>Follows a stream that enters the band; a dam where it comes nearest to the road and then runs along it.</summary>
    private Dam? Turned(int entry, Grid<float> elevation, DrainedTerrain solved)
    {
        var frame = elevation.Frame;
        band.TryGet(entry, out var first);
        var road = roads[first.Road];
        var turnedM = settings.TurnedM ?? Math.Max(30, 3 * road.WidthM);
        var path = new List<(int Cell, BandCell Place)>();
        double walkedM = 0, limitM = turnedM + (4 * Math.Abs(first.OffsetM)) + 50;
        for (var cell = entry; cell >= 0 && walkedM <= limitM; cell = FlowSteps.Downstream(solved.Direction, cell))
        {
            if (!band.TryGet(cell, out var place) || place.Road != first.Road) break;
            if (place.OffsetM > 0 != first.OffsetM > 0) break;
            if (solved.Filled.Surface.Cells[cell] - elevation.Cells[cell] >= settings.SmallestPondM) return null; // a pond: looked at as such
            if (path.Count > 0) walkedM += FlowSteps.Centre(frame, path[^1].Cell).Distance(FlowSteps.Centre(frame, cell));
            path.Add((cell, place));
        }

        if (path.Count < 2) return null;
        var turn = path[Turn(path, Math.Max(frame.CellWidthM, frame.CellHeightM), frame)];
        var alongM = Math.Abs(path[^1].Place.StationM - turn.Place.StationM);
        if (alongM < turnedM) return null; // crosses here, or only passes by
        var come = FlowSteps.UpstreamPath(solved.Direction, solved.Accumulation, turn.Cell, Math.Max(20, 5 * frame.CellWidthM))[^1];
        var skew = Bearings.SkewDeg(Bearings.AzimuthDeg(FlowSteps.Centre(frame, come), FlowSteps.Centre(frame, turn.Cell)), road.AzimuthAt(turn.Place.StationM));
        if (skew > MostObliqueDeg || IsLevel(elevation, turn.Cell)) return null;
        return new(turn.Cell, turn.Place, OpeningReason.Diversion, 0, solved.Accumulation.Cells[turn.Cell] * frame.CellAreaM2, false);
    }

    /// <summary>The first cell of a path, not far from where it is nearest to the road, from which it comes less than half as fast nearer as it goes on.</summary>
    private static int Turn(List<(int Cell, BandCell Place)> path, double cellM, GridFrame frame)
    {
        const int Ahead = 5;
        var near = path.Min(p => Math.Abs(p.Place.OffsetM)) + (Ahead * cellM);
        for (var i = 0; i + 1 < path.Count; i++)
        {
            if (Math.Abs(path[i].Place.OffsetM) > near) continue;
            var j = Math.Min(i + Ahead, path.Count - 1);
            var wentM = FlowSteps.Centre(frame, path[i].Cell).Distance(FlowSteps.Centre(frame, path[j].Cell));
            if (Math.Abs(path[i].Place.OffsetM) - Math.Abs(path[j].Place.OffsetM) < wentM / 2) return i;
        }

        return path.Count - 1;
    }
}
