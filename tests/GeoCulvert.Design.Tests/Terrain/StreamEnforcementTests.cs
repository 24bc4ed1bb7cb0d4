using CsCheck;
using GeoCulvert.Design.Terrain;
using NetTopologySuite.Geometries;

namespace GeoCulvert.Design.Tests.Terrain;

/// <summary>Mapped streams cut into elevations.</summary>
public class StreamEnforcementTests
{
    private static readonly GridFrame Frame = new(7, 5, 0, 5, 1, 1);

    /// <summary>
    /// Row 2 from west to east falls 6, 5, 7, 4, 3, 5, 2. Falling east needs 2 m at the 7 and 2 m at the 5: 4 m3. Falling west needs, against the 2 at the start,
    /// 3 + 1 + 2 + 5 + 3 + 4 = 18 m3. So it runs east however it is drawn.
    /// </summary>
    [Theory]
    [InlineData(false)]
    [InlineData(true)]
    public void TheTerrainTellsTheDirection(bool drawnUpstream)
    {
        var z = Row2(6, 5, 7, 4, 3, 5, 2);
        Coordinate[] points = [new(0.5, 2.5), new(6.5, 2.5)];
        if (drawnUpstream) Array.Reverse(points);
        var before = z.Cells.ToArray();
        var result = StreamEnforcement.Enforce(z, [new MappedCourse("Beck", new LineString(points))], new StreamSettings());
        var stream = Assert.Single(result.Streams);
        Assert.Equal([14, 15, 16, 17, 18, 19, 20], Assert.Single(stream.Runs));
        Assert.Equal([6, 5, 5, 4, 3, 3, 2], Cells(result.Surface, 14, 7));
        Assert.Equal((drawnUpstream, 6, 2, 16, 4), (stream.Turned, stream.LengthM, stream.MaxCutM, stream.MaxCutCell, stream.CutVolumeM3));
        Assert.Equal((2L, 4), (result.CutCells, result.VolumeM3));
        Assert.Equal(drawnUpstream ? (18, 4) : (4, 18), (stream.AsDrawnCutM3, stream.TurnedCutM3));
        Assert.Equal(drawnUpstream ? ["mapped-stream-turned"] : [], stream.Findings.Select(f => f.Code));
        Assert.Null(stream.DisagreeingShare);
        Assert.Equal(before, z.Cells);
    }

    /// <summary>The same line, stated to be drawn downstream, drawn west: all is cut to the 2 of its start, 18 m3, and doubted.</summary>
    [Fact]
    public void AStatedDirectionIsKeptAndDoubted()
    {
        var result = StreamEnforcement.Enforce(
            Row2(6, 5, 7, 4, 3, 5, 2), [Beck(6.5, 2.5, 0.5, 2.5)], new StreamSettings { DrawnDownstream = true });
        Assert.Equal([2, 2, 2, 2, 2, 2, 2], Cells(result.Surface, 14, 7));
        Assert.Equal("mapped-stream-direction-doubtful", Assert.Single(result.Streams[0].Findings).Code);
        Assert.Equal(18, result.VolumeM3);
    }

    /// <summary>A level line tells nothing: as drawn, with a doubt. A drop of 0.5 m lowers all seven cells.</summary>
    [Fact]
    public void LevelGroundIsDoubtfulAndTheDropIsConstant()
    {
        var result = StreamEnforcement.Enforce(Row2(3, 3, 3, 3, 3, 3, 3), [Beck(6.5, 2.5, 0.5, 2.5)], new StreamSettings { DropM = 0.5 });
        Assert.Equal([2.5f, 2.5f, 2.5f, 2.5f, 2.5f, 2.5f, 2.5f], Cells(result.Surface, 14, 7));
        Assert.False(result.Streams[0].Turned);
        Assert.Equal("mapped-stream-direction-doubtful", Assert.Single(result.Streams[0].Findings).Code);
        Assert.Equal((7L, 3.5), (result.CutCells, result.VolumeM3));
    }

    /// <summary>
    /// A brook comes from the north down column 3 and ends in row 1, one cell short of the stream in row 2 (cells 16, 17 and 18 are beside its end; 18 at 3 is the lowest).
    /// The brook falls 9, 1: at its end it is below the stream, so the stream is lowered to 1 from cell 18 on, not above it.
    /// </summary>
    [Fact]
    public void AStreamThatEndsBesideAnotherJoinsIt()
    {
        var z = Row2(6, 5, 5, 4, 3, 2, 2);
        (z.Cells[3], z.Cells[10]) = (9, 1);
        var result = StreamEnforcement.Enforce(z, [Beck(0.5, 2.5, 6.5, 2.5), new("Brook", Line(3.5, 4.5, 3.5, 3.5))], new StreamSettings());
        Assert.Equal([6, 5, 5, 4, 1, 1, 1], Cells(result.Surface, 14, 7));
        Assert.Equal(1, result.Surface.Cells[10]);
        Assert.Equal((0, 4), (result.Streams[1].CutVolumeM3, result.Streams[0].CutVolumeM3));
    }

    /// <summary>
    /// Lines that leave the grid, cross a gap, are points, rings or no numbers. The line to x = 20 keeps row 2; the gap at column 3 leaves columns 0-2 and 4-6.
    /// </summary>
    [Fact]
    public void OddLinesAreUsedAsFarAsTheyGo()
    {
        var z = Row2(6, 5, 5, 4, 3, 2, 2);
        z.Cells[17] = float.NaN;
        MappedCourse[] streams =
        [
            Beck(-30, 2.5, 20, 2.5), Beck(3.2, 0.5, 3.2, 0.5), Beck(0.2, 0.2, 0.4, 0.4), Beck(1, double.NaN, 2, 2), Beck(1, 1, 1e300, 1), Beck(-5, -5, -1, 9),
            new("Ring", new LineString([new(1.5, 1.5), new(4.5, 1.5), new(4.5, 0.5), new(1.5, 1.5)])), new("Empty", new LineString([])), Beck(7, 2.4, 0, 2.6),
        ];
        var result = StreamEnforcement.Enforce(z, streams, new StreamSettings());
        Assert.Equal([[14, 15, 16], [18, 19, 20]], result.Streams[0].Runs);
        Assert.Equal("mapped-stream-partly-outside", Assert.Single(result.Streams[0].Findings).Code);
        Assert.All(result.Streams.Skip(1).Take(7), s =>
        {
            Assert.Empty(s.Runs);
            Assert.Equal((0, 0, -1), (s.LengthM, s.CutVolumeM3, s.MaxCutCell));
            Assert.Equal("mapped-stream-not-used", Assert.Single(s.Findings).Code);
        });
        Assert.Equal([[14, 15, 16], [18, 19, 20]], result.Streams[8].Runs);
        Assert.Contains(result.Streams[8].Findings, f => f.Code == "mapped-stream-turned");
    }

    /// <summary>A kept sink on a stream breaks it in two: neither part is drawn down to minus infinity, the sink is untouched.</summary>
    [Fact]
    public void AKeptSinkBreaksAStream()
    {
        var z = Row2(6, 5, 7, 4, 3, 5, 2);
        z.Cells[17] = float.NegativeInfinity;
        var result = StreamEnforcement.Enforce(z, [Beck(0.5, 2.5, 6.5, 2.5)], new StreamSettings());
        Assert.Equal([6, 5, 5, float.NegativeInfinity, 3, 3, 2], Cells(result.Surface, 14, 7));
        Assert.Equal((2, 4), (result.Streams[0].Runs.Count, result.VolumeM3));
    }

    /// <summary>
    /// The terrain model's own stream runs along row 0; the mapped one goes along row 2 for 2 m, then down the diagonal to row 4. With a reach of 3 cells cells in
    /// rows 0-3 agree, the end in row 4 does not: half of the last step of sqrt 2 of 2 + 2 sqrt 2 m. With a reach of 1 nothing agrees.
    /// </summary>
    [Fact]
    public void DisagreementIsAShareOfLength()
    {
        var accumulation = new Grid<int>(Frame);
        for (var c = 0; c < 7; c++) accumulation.Cells[c] = 50;
        var streams = new[] { new MappedCourse("Beck", new LineString([new(0.5, 2.5), new(2.5, 2.5), new(4.5, 0.5)])) };
        var z = Row2(6, 5, 4, 9, 9, 9, 9);
        (z.Cells[24], z.Cells[32]) = (3, 2);
        double? Share(int reach, long threshold) => StreamEnforcement.Enforce(
            z, streams, new StreamSettings { ToleranceCells = reach, ThresholdCells = threshold }, accumulation).Streams[0].DisagreeingShare;
        Assert.Equal(Math.Sqrt(2) / 2 / (2 + (2 * Math.Sqrt(2))), Share(3, 50)!.Value, 1e-12);
        Assert.Equal(1, Share(1, 50)!.Value, 1e-12);
        Assert.Equal(1, Share(3, 51)!.Value, 1e-12);
        Assert.Equal(0, Share(4, 50)!.Value, 1e-12);
        Assert.Equal("mapped-stream-disagrees", Assert.Single(StreamEnforcement.Enforce(
            z, streams, new StreamSettings { ToleranceCells = 1, ThresholdCells = 50 }, accumulation).Streams[0].Findings).Code);
    }

    /// <summary>
    /// On any terrain with any lines, braids and circles among them: only stream cells change, none is raised, no step of any stream rises, and nothing is cut that no cell
    /// upstream along the streams asks for: each cell is the least of all from which it can be reached, by full passes.
    /// </summary>
    [Fact]
    public void EachCellIsTheLeastUpstreamOfIt() => RandomTerrain.Any.Select(Gen.Double[-3, 26].Array[2, 10].Array[1, 5], Gen.Bool).Sample(
        (elevation, draws, drawnDownstream) =>
        {
            var frame = elevation.Frame;
            MappedCourse[] streams = [.. draws.Select((d, k) => new MappedCourse($"{k}", new LineString([.. Enumerable.Range(0, Math.Max(2, d.Length / 2))
                .Select(i => new Coordinate(frame.West + (d[2 * i % d.Length] * frame.CellWidthM), frame.North - (d[((2 * i) + 1) % d.Length] * frame.CellHeightM)))])))];
            var result = StreamEnforcement.Enforce(elevation, streams, new StreamSettings { DrawnDownstream = drawnDownstream });
            var runs = result.Streams.SelectMany((s, k) => s.Runs.Select(r => (Stream: k, Cells: r))).ToList();
            Assert.All(runs, r =>
            {
                Assert.Equal(r.Cells.Length, r.Cells.Distinct().Count());
                Assert.All(r.Cells.Zip(r.Cells.Skip(1)), s => Assert.Contains(NaiveTerrain.Neighbours(frame, s.First), n => n.Cell == s.Second));
            });

            var links = runs.SelectMany(r => r.Cells.Zip(r.Cells.Skip(1))).Select(s => (s.First, s.Second)).ToList();
            foreach (var (stream, cells) in runs)
            {
                var others = runs.Where(r => r.Stream != stream).SelectMany(r => r.Cells).ToHashSet();
                if (others.Contains(cells[^1]) || NaiveTerrain.IsRim(elevation, cells[^1])) continue;
                var own = runs.Where(r => r.Stream == stream).SelectMany(r => r.Cells).ToHashSet();
                var beside = NaiveTerrain.Neighbours(frame, cells[^1]).Where(n => others.Contains(n.Cell) && !own.Contains(n.Cell)).ToList();
                if (beside.Count > 0) links.Add((cells[^1], beside.OrderBy(n => elevation.Cells[n.Cell]).ThenBy(n => n.Code).First().Cell));
            }

            var expected = elevation.Cells.ToArray();
            for (var moved = true; moved;)
            {
                moved = false;
                foreach (var (up, down) in links)
                {
                    if (!(expected[down] > expected[up])) continue;
                    expected[down] = expected[up];
                    moved = true;
                }
            }

            Assert.Equal(expected, result.Surface.Cells);
            Assert.Equal(expected.Where((w, i) => w < elevation.Cells[i]).Count(), result.CutCells);
        },
        iter: 3000, print: p => RandomTerrain.Text(p.Item1) + "\n" + string.Join(" | ", p.Item2.Select(d => string.Join(' ', d))));

    /// <summary>A chain runs from the line's first cell to its last, through cells that the line touches; a thousand points of the line lie in the chain or right beside it.</summary>
    [Fact]
    public void ChainsFollowTheirLines() => Gen.Double[0.01, 21.99].Array[4].Sample(
        d =>
        {
            var z = new Grid<float>(new GridFrame(22, 22, 0, 22, 1, 1));
            var runs = StreamEnforcement.Enforce(z, [Beck(d[0], d[1], d[2], d[3])], new StreamSettings { DrawnDownstream = true }).Streams[0].Runs;
            if (runs.Count == 0) return;
            var cells = Assert.Single(runs);
            Assert.Equal(((int)(22 - d[1]) * 22) + (int)d[0], cells[0]);
            Assert.Equal(((int)(22 - d[3]) * 22) + (int)d[2], cells[^1]);
            var line = Line(d[0], d[1], d[2], d[3]);
            Assert.All(cells, c => Assert.InRange(line.Distance(Cell(c)), 0, 1e-9));
            for (var t = 0.0; t <= 1; t += 1e-3)
            {
                var (row, column) = ((int)(22 - (d[1] + (t * (d[3] - d[1])))), (int)(d[0] + (t * (d[2] - d[0]))));
                Assert.Contains(cells, c => Math.Abs((c / 22) - row) + Math.Abs((c % 22) - column) <= 1);
            }
        },
        iter: 1000);

    /// <summary>Cut deep enough, water takes every step of the mapped stream, here straight across a slope.</summary>
    [Fact]
    public void WaterFollowsADeepCut()
    {
        var z = new Grid<float>(Frame, [.. Enumerable.Range(0, 35).Select(i => 20f - (i / 7) - (0.1f * (i % 7)))]);
        var cut = StreamEnforcement.Enforce(z, [Beck(0.5, 2.5, 6.5, 2.5)], new StreamSettings { DropM = 5 });
        var (before, after) = (Drainage.Solve(z, cancel: TestContext.Current.CancellationToken), Drainage.Solve(cut.Surface, cancel: TestContext.Current.CancellationToken));
        Assert.Equal(0, StreamAgreement.FollowedShare(cut.Streams[0].Runs, before.Direction));
        Assert.Equal(1, StreamAgreement.FollowedShare(cut.Streams[0].Runs, after.Direction));
    }

    private static Geometry Cell(int c) => new GeometryFactory().ToGeometry(new Envelope(c % 22, (c % 22) + 1, 21 - (c / 22), 22 - (c / 22)));

    private static MappedCourse Beck(double x0, double y0, double x1, double y1) => new("Beck", Line(x0, y0, x1, y1));

    private static LineString Line(double x0, double y0, double x1, double y1) => new([new Coordinate(x0, y0), new Coordinate(x1, y1)]);

    /// <summary>Ground of 9 with a given row in the middle.</summary>
    private static Grid<float> Row2(params float[] row)
    {
        var z = new Grid<float>(Frame);
        Array.Fill(z.Cells, 9);
        row.CopyTo(z.Cells, 14);
        return z;
    }

    private static float[] Cells(Grid<float> z, int from, int count) => z.Cells[from..(from + count)];
}
