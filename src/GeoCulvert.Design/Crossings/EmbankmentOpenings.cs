using GeoCulvert.Design.Basis;
using GeoCulvert.Design.Terrain;
using NetTopologySuite.Geometries;

namespace GeoCulvert.Design.Crossings;

/// <summary>A drained terrain with its embankments opened.</summary>
/// <param name="Terrain">Drained with the openings; its elevations are the untouched ones.</param>
/// <param name="Untouched">Directions of the untouched terrain; null when nothing was opened.</param>
/// <param name="Openings">The openings, by road and station.</param>
/// <param name="Findings">Dams left shut, known culverts not used.</param>
public sealed record OpenedTerrain(
    DrainedTerrain Terrain, Grid<byte>? Untouched, IReadOnlyList<EmbankmentOpening> Openings, IReadOnlyList<Finding> Findings);

/// <summary>
/// Opens embankments where roads dam the terrain model: at known culverts and given crossings, then, round by round, where a search along the roads finds water stopped.
/// After every round the whole terrain is solved again, because an opening upstream sends more water to the next road. Every opening is an object; the
/// untouched elevations come back when all is done.
/// </summary>
public static class EmbankmentOpenings
{
    /// <summary>Drains a terrain and opens what dams it.</summary>
    /// <param name="elevation">Untouched elevations, m. Changed while this works, the same again afterwards.</param>
    /// <param name="roads">Roads.</param>
    /// <param name="culverts">Known culverts.</param>
    /// <param name="points">Given crossings.</param>
    /// <param name="settings">Settings.</param>
    /// <param name="solve">Drains a terrain, with the paths that water is made to take.</param>
    /// <param name="cancel">Stops the work.</param>
    public static OpenedTerrain Solve(
        Grid<float> elevation,
        IReadOnlyList<RoadAlignment> roads,
        IReadOnlyList<KnownCulvert> culverts,
        IReadOnlyList<GivenPoint> points,
        OpeningSettings settings,
        Func<Grid<float>, IReadOnlyList<int[]>, DrainedTerrain> solve,
        CancellationToken cancel = default)
    {
        ArgumentNullException.ThrowIfNull(elevation);
        ArgumentNullException.ThrowIfNull(roads);
        ArgumentNullException.ThrowIfNull(settings);
        ArgumentNullException.ThrowIfNull(solve);
        var solved = solve(elevation, []);
        if (settings.Scope == OpeningScope.None || roads.Count == 0) return new(solved, null, [], []);
        var work = new Work(elevation, roads, settings);
        try
        {
            var untouched = (solved.Direction, solved.Accumulation);
            work.OpenKnown(culverts, solved);
            work.OpenGiven(points, solved);
            var unfinished = false;
            for (var round = 1; ; round++)
            {
                cancel.ThrowIfCancellationRequested();
                if (settings.Scope == OpeningScope.Search) work.OpenDams(solved, round);
                if (!work.TakeNew())
                {
                    if (settings.Scope == OpeningScope.Known) work.SayDams(solved);
                    break;
                }

                solved = solve(elevation, work.Paths);
                unfinished = round + 1 >= settings.MostRounds;
                if (unfinished) break;
            }

            work.OpenReliefs(solved);
            if (work.TakeNew()) solved = solve(elevation, work.Paths);
            if (unfinished) work.Findings.Add(OpeningFindings.Unfinished.With($"{settings.MostRounds} rounds", settings.MostRounds, settings.MostRounds));
            if (work.Openings.Count == 0) return new(solved, null, [], work.Findings);
            var area = elevation.Frame.CellAreaM2;
            var openings = work.Openings.Select(o => o with
            {
                AreaBeforeM2 = untouched.Accumulation.Cells[o.Cells[^1]] * area,
                AreaAfterM2 = solved.Accumulation.Cells[o.Cells[^1]] * area,
            });
            var inOrder = openings.OrderBy(o => IndexOf(roads, o.Road)).ThenBy(o => o.StationM).ThenBy(o => o.Cells[0]);
            return new(solved, untouched.Direction, [.. inOrder], work.Findings);
        }
        finally
        {
            work.Restore();
        }
    }

    /// <summary>What an opening makes doubtful.</summary>
    /// <param name="opening">The opening.</param>
    /// <param name="settings">Settings.</param>
    public static IReadOnlyList<Finding> FindingsOf(EmbankmentOpening opening, OpeningSettings settings)
    {
        ArgumentNullException.ThrowIfNull(opening);
        ArgumentNullException.ThrowIfNull(settings);
        var kind = opening.Reason == OpeningReason.DitchRelief ? OpeningFindings.Relief : opening.KnownId is null ? OpeningFindings.OpenedBySearch : OpeningFindings.OpenedAtKnown;
        var where = $"{opening.Road.IdAt(opening.StationM)}: {opening.LengthM:0.0} m long, {opening.DepthM:0.0} m deep; {opening.ReasonText}";
        var findings = new List<Finding> { kind.With(where, opening.DepthM) };
        var taken = opening.AreaAfterM2 - opening.AreaBeforeM2;
        if (taken > settings.LargeAreaM2)
            findings.Add(OpeningFindings.TakesLargeArea.With($"{opening.AreaAfterM2 / 1e6:0.###} km2 with it, {opening.AreaBeforeM2 / 1e6:0.###} km2 without", taken, settings.LargeAreaM2));
        if (opening.IsLake) findings.Add(OpeningFindings.Lake.With($"water surface at {opening.BedM[0]:0.00} m", opening.BedM[0]));
        return findings;
    }

    private static int IndexOf(IReadOnlyList<RoadAlignment> roads, RoadAlignment road)
    {
        for (var i = 0; i < roads.Count; i++)
            if (ReferenceEquals(roads[i], road)) return i;
        return roads.Count;
    }

    /// <summary>The openings of one run and the elevations they replaced.</summary>
    private sealed class Work
    {
        private readonly Grid<float> _elevation;
        private readonly IReadOnlyList<RoadAlignment> _roads;
        private readonly OpeningSettings _settings;
        private readonly RoadBand _band;
        private readonly OpeningPath _path;
        private readonly DamSearch _search;
        private readonly List<(int Cell, float Elevation)> _replaced = [];
        private readonly HashSet<int> _opened = [];
        private readonly HashSet<int> _refused = [];
        private bool _isNew;

        public Work(Grid<float> elevation, IReadOnlyList<RoadAlignment> roads, OpeningSettings settings)
        {
            (_elevation, _roads, _settings) = (elevation, roads, settings);
            var cellM = Math.Max(elevation.Frame.CellWidthM, elevation.Frame.CellHeightM);
            // The toe of the highest embankment that may be opened, and a few cells of ditch beyond.
            _band = new(roads, elevation.Frame, r => (r.WidthM / 2) + Math.Min(r.SideSlope * settings.DeepestM, settings.LongestM / 2) + (3 * cellM));
            _path = new(new RoadIndex(roads), settings);
            _search = new(roads, _band, settings);
        }

        public List<EmbankmentOpening> Openings { get; } = [];

        public List<int[]> Paths { get; } = [];

        public List<Finding> Findings { get; } = [];

        /// <summary>Whether something was opened since this was last asked.</summary>
        public bool TakeNew()
        {
            var was = _isNew;
            _isNew = false;
            return was;
        }

        public void Restore()
        {
            for (var i = _replaced.Count - 1; i >= 0; i--) _elevation.Cells[_replaced[i].Cell] = _replaced[i].Elevation;
        }

        public void OpenKnown(IReadOnlyList<KnownCulvert> culverts, DrainedTerrain solved)
        {
            foreach (var culvert in culverts)
            {
                int a = LowestNear(culvert.From, 2), b = LowestNear(culvert.To, 2);
                var way = a < 0 || b < 0 || a == b ? null
                    : _elevation.Cells[a] >= _elevation.Cells[b] ? _path.Between(_elevation, a, b) : _path.Between(_elevation, b, a);
                if (way is null) Findings.Add(OpeningFindings.KnownNotUsed.With($"{culvert.Id}: {(a < 0 || b < 0 ? "an end lies off the terrain" : "no road lies over it")}"));
                else Open(way, OpeningReason.KnownCulvert, culvert.Id, solved, false, culvert);
            }
        }

        /// <summary>At a given crossing: from the lowest ground beside it on the higher side to lower ground beyond, where the terrain shows an embankment.</summary>
        public void OpenGiven(IReadOnlyList<GivenPoint> points, DrainedTerrain solved)
        {
            foreach (var point in points)
            {
                int left = -1, right = -1;
                foreach (var (cell, place) in Around(point))
                {
                    ref var side = ref place.OffsetM > 0 ? ref right : ref left;
                    if (side < 0 || _elevation.Cells[cell] < _elevation.Cells[side]) side = cell;
                }

                if (left < 0 || right < 0) continue;
                var from = _elevation.Cells[left] > _elevation.Cells[right] ? left : right;
                if (_opened.Contains(from) || _path.Find(_elevation, _band, from, out _) is not { } way || way.DepthM < _settings.SmallestPondM) continue;
                Open(way, OpeningReason.GivenCrossing, point.Id, solved, false);
            }
        }

        public void OpenDams(DrainedTerrain solved, int round)
        {
            foreach (var dam in _search.Find(_elevation, solved))
            {
                if (IsOpenedNear(dam.Cell) || _refused.Contains(dam.Cell)) continue;
                // Ground between carriageways gets its water from upstream only while the first is shut.
                if (round == 1 && _path.IsBetween(_elevation.Frame, dam.Cell, dam.Place)) continue;
                var way = _path.Find(_elevation, _band, dam.Cell, out var reason);
                if (way is not null && dam.Reason == OpeningReason.Diversion && PassesNear(dam.Cell, way.Cells, solved.Direction)) continue;
                if (way is not null)
                {
                    Open(way, dam.Reason, null, solved, dam.IsLake);
                    continue;
                }

                _refused.Add(dam.Cell);
                SayShut(dam, reason);
            }
        }

        /// <summary>Places ditch reliefs, evenly, where the stretch between two ways under (or an end of the road) is longer than the spacing, if there is lower ground beyond.</summary>
        public void OpenReliefs(DrainedTerrain solved)
        {
            if (_settings.ReliefSpacingM is not { } spacingM) return;
            var least = Math.Max(1, _settings.PondAreaM2 / _elevation.Frame.CellAreaM2);
            var cellM = Math.Max(_elevation.Frame.CellWidthM, _elevation.Frame.CellHeightM);
            for (var k = 0; k < _roads.Count; k++)
            {
                var road = _roads[k];
                var ways = RoadMeetings.Find(road, solved.Direction, c => solved.Accumulation.Cells[c] >= least).Select(m => m.StationM).Append(road.EndStationM);
                var from = road.StartStationM;
                foreach (var to in ways)
                {
                    var pieces = (int)Math.Ceiling((to - from) / spacingM);
                    for (var i = 1; i < pieces; i++)
                    {
                        // The wettest cell beside the road near the place is the ditch.
                        var station = from + ((to - from) * i / pieces);
                        var ditch = Beside(k, station, 2 * cellM).OrderByDescending(c => solved.Accumulation.Cells[c]).ThenBy(c => c).Cast<int?>().FirstOrDefault();
                        if (ditch is { } cell && !IsOpenedNear(cell) && _path.Find(_elevation, _band, cell, out _) is { } way) Open(way, OpeningReason.DitchRelief, null, solved, false);
                    }

                    from = to;
                }
            }
        }

        private IEnumerable<int> Beside(int road, double stationM, double alongM)
        {
            var frame = _elevation.Frame;
            var middle = _roads[road].PointAt(stationM);
            var reach = (_roads[road].WidthM / 2) + (_roads[road].SideSlope * 3) + alongM;
            for (var r = Math.Max(frame.RowAt(middle.Y + reach), 0); r <= Math.Min(frame.RowAt(middle.Y - reach), frame.Rows - 1); r++)
                for (var c = Math.Max(frame.ColumnAt(middle.X - reach), 0); c <= Math.Min(frame.ColumnAt(middle.X + reach), frame.Columns - 1); c++)
                {
                    var cell = (r * frame.Columns) + c;
                    if (_band.TryGet(cell, out var place) && place.Road == road && Math.Abs(place.StationM - stationM) <= alongM && Math.Abs(place.OffsetM) > _roads[road].WidthM / 2 && !float.IsNaN(_elevation.Cells[cell]))
                        yield return cell;
                }
        }

        /// <summary>Whether the water of a cell comes to the end of a way by itself, within three times its length: a stream that crosses very obliquely is not turned.</summary>
        private bool PassesNear(int cell, int[] way, Grid<byte> direction)
        {
            var frame = _elevation.Frame;
            Coordinate end = FlowSteps.Centre(frame, way[^1]), start = FlowSteps.Centre(frame, way[0]);
            var cellM = Math.Max(frame.CellWidthM, frame.CellHeightM);
            return FlowSteps.DownstreamPath(direction, cell, 3 * start.Distance(end)).Any(c => FlowSteps.Centre(frame, c).Distance(end) <= 3 * cellM);
        }

        /// <summary>Says which dams stay shut where only known culverts are opened.</summary>
        public void SayDams(DrainedTerrain solved)
        {
            foreach (var dam in _search.Find(_elevation, solved).Where(d => !IsOpenedNear(d.Cell))) SayShut(dam, "only known culverts and given crossings are opened");
        }

        private void SayShut(Dam dam, string reason)
        {
            if (dam.Reason == OpeningReason.Ponding && dam.AreaM2 >= _settings.StreamAreaM2)
                Findings.Add(OpeningFindings.NotOpened.With(
                    $"{_roads[dam.Place.Road].IdAt(dam.Place.StationM)}: {dam.AreaM2 / 1e4:0.#} ha, {dam.PondDepthM:0.0} m deep; {reason}", dam.PondDepthM));
        }

        private void Open(OpeningPath.Way way, OpeningReason reason, string? knownId, DrainedTerrain solved, bool isLake, KnownCulvert? known = null)
        {
            var frame = _elevation.Frame;
            var first = way.Meetings[0];
            Coordinate a = FlowSteps.Centre(frame, way.Cells[0]), b = FlowSteps.Centre(frame, way.Cells[^1]);
            Openings.Add(new EmbankmentOpening(
                new LineString([new CoordinateZ(a.X, a.Y, way.BedM[0]), new CoordinateZ(b.X, b.Y, way.BedM[^1])]), way.Cells, way.BedM, reason, _roads[first.Road])
            {
                KnownId = knownId,
                Known = known,
                Roads = [.. way.Meetings.Select(m => _roads[m.Road]).Distinct()],
                StationM = first.StationM,
                DepthM = way.DepthM,
                VolumeM3 = way.VolumeM3,
                SkewDeg = Bearings.SkewDeg(Bearings.AzimuthDeg(a, b), first.AzimuthDeg),
                PondDepthM = solved.Filled.Surface.Cells[way.Cells[0]] - _elevation.Cells[way.Cells[0]],
                IsLake = isLake,
            });
            for (var i = 0; i < way.Cells.Length; i++)
            {
                _replaced.Add((way.Cells[i], _elevation.Cells[way.Cells[i]]));
                _elevation.Cells[way.Cells[i]] = way.BedM[i];
                _opened.Add(way.Cells[i]);
            }

            Paths.Add(way.Cells);
            _isNew = true;
        }

        /// <summary>Whether a cell or one of its neighbours is part of an opening.</summary>
        private bool IsOpenedNear(int cell)
        {
            if (_opened.Contains(cell)) return true;
            for (var d = 1; d <= 8; d++)
                if (_opened.Contains(FlowSteps.Neighbour(_elevation.Frame, cell, d))) return true;
            return false;
        }

        private int LowestNear(Coordinate p, int cells)
        {
            var frame = _elevation.Frame;
            int row = frame.RowAt(p.Y), column = frame.ColumnAt(p.X), best = -1;
            for (var r = row - cells; r <= row + cells; r++)
                for (var c = column - cells; c <= column + cells; c++)
                {
                    if (!frame.Contains(r, c) || float.IsNaN(_elevation[r, c])) continue;
                    var cell = (r * frame.Columns) + c;
                    if (best < 0 || _elevation.Cells[cell] < _elevation.Cells[best]) best = cell;
                }

            return best;
        }

        private IEnumerable<(int Cell, BandCell Place)> Around(GivenPoint point)
        {
            var frame = _elevation.Frame;
            var nearest = _roads.Select((r, i) => (Index: i, Place: r.StationOf(point.Point))).OrderBy(r => Math.Abs(r.Place.OffsetM)).First();
            var alongM = Math.Max(10, 3 * Math.Max(frame.CellWidthM, frame.CellHeightM));
            if (Math.Abs(nearest.Place.OffsetM) > _settings.LongestM) yield break;
            var middle = nearest.Place.Point;
            var reach = _settings.LongestM;
            for (var r = Math.Max(frame.RowAt(middle.Y + reach), 0); r <= Math.Min(frame.RowAt(middle.Y - reach), frame.Rows - 1); r++)
                for (var c = Math.Max(frame.ColumnAt(middle.X - reach), 0); c <= Math.Min(frame.ColumnAt(middle.X + reach), frame.Columns - 1); c++)
                {
                    var cell = (r * frame.Columns) + c;
                    if (!float.IsNaN(_elevation.Cells[cell]) && _band.TryGet(cell, out var place) && place.Road == nearest.Index && Math.Abs(place.StationM - nearest.Place.StationM) <= alongM)
                        yield return (cell, place);
                }
        }
    }
}
