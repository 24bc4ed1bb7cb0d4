using GeoCulvert.Design.Basis;
using NetTopologySuite.Geometries;

namespace GeoCulvert.Design.Terrain;

/// <summary>A stream from a map.</summary>
/// <param name="Name">Its name.</param>
/// <param name="Line">Its course in the plane of the grid.</param>
public sealed record MappedCourse(string Name, LineString Line);

/// <summary>How mapped streams are enforced.</summary>
public sealed record StreamSettings
{
    /// <summary>Whether every line is known to be drawn downstream; else the terrain decides line by line.</summary>
    public bool DrawnDownstream { get; init; }

    /// <summary>What all stream cells are lowered by besides, m.</summary>
    public double DropM { get; init; }

    /// <summary>Cells from which the terrain model's own drainage counts as a stream.</summary>
    public long ThresholdCells { get; init; } = 1000;

    /// <summary>Distance from the terrain model's own streams, in cells, beyond which a mapped one disagrees with them.</summary>
    public int ToleranceCells { get; init; } = 3;

    /// <summary>Share of a stream's length in disagreement from which this is a finding (a choice of this program).</summary>
    public double DisagreeingShare { get; init; } = 0.25;
}

/// <summary>What became of one mapped stream.</summary>
/// <param name="Name">Its name.</param>
/// <param name="Runs">Its chains of cells, downstream; several where the terrain model has gaps, none where the line is of no use.</param>
/// <param name="Turned">Whether it runs against the drawing.</param>
/// <param name="AsDrawnCutM3">What making the line fall as drawn takes by itself, m3.</param>
/// <param name="TurnedCutM3">What making it fall the other way takes, m3.</param>
/// <param name="LengthM">Length along its cells, m.</param>
/// <param name="MaxCutM">Deepest cut, m, other streams' demands and the drop included.</param>
/// <param name="MaxCutCell">Where that is; -1 where nothing is cut.</param>
/// <param name="CutVolumeM3">Earth taken along it, m3; cells of several streams count for each.</param>
/// <param name="DisagreeingShare">Share of its length away from the terrain model's own streams; null where their accumulation is not given.</param>
/// <param name="Findings">What to look at.</param>
public sealed record EnforcedCourse(
    string Name, IReadOnlyList<int[]> Runs, bool Turned, double AsDrawnCutM3, double TurnedCutM3, double LengthM, double MaxCutM, int MaxCutCell,
    double CutVolumeM3, double? DisagreeingShare, IReadOnlyList<Finding> Findings);

/// <summary>Elevations in which mapped streams fall all along.</summary>
/// <param name="Surface">The changed copy, m; the very same grid where nothing was cut.</param>
/// <param name="Streams">The streams, as given.</param>
/// <param name="CutCells">Cells lowered.</param>
/// <param name="VolumeM3">Earth taken, m3, each cell once.</param>
public sealed record EnforcedStreams(Grid<float> Surface, IReadOnlyList<EnforcedCourse> Streams, long CutCells, double VolumeM3);

/// <summary>
/// Makes elevations fall along mapped streams by cutting, never by raising: each cell gets the least elevation found upstream of it along the streams, so
/// no later cell is above an earlier one, and streams that meet agree. Only elevations change, so water cannot be led in a circle: streams drawn in
/// one become level.
/// </summary>
public static class StreamEnforcement
{
    /// <summary>Of the cuts either way, the smaller as a share of the larger from which the direction is in doubt.</summary>
    private const double DoubtfulShare = 0.5;

    /// <summary>Cuts a copy; the input is not changed.</summary>
    /// <param name="elevation">Elevations, m; NaN is nodata.</param>
    /// <param name="streams">Mapped streams.</param>
    /// <param name="settings">How.</param>
    /// <param name="accumulation">Cells drained by each cell of the untouched terrain model; null leaves the comparison out.</param>
    public static EnforcedStreams Enforce(
        Grid<float> elevation, IReadOnlyList<MappedCourse> streams, StreamSettings settings, Grid<int>? accumulation = null)
    {
        ArgumentNullException.ThrowIfNull(elevation);
        ArgumentNullException.ThrowIfNull(streams);
        ArgumentNullException.ThrowIfNull(settings);
        if (!(settings.DropM >= 0) || double.IsInfinity(settings.DropM)) throw new ArgumentException("The drop is a number from 0 up.", nameof(settings));
        if (accumulation is not null && accumulation.Frame != elevation.Frame)
            throw new ArgumentException("The accumulation has another frame.", nameof(accumulation));
        var laid = streams.Select(s => Course.Lay(s, elevation, settings.DrawnDownstream)).ToList();
        var surface = new Grid<float>(elevation.Frame, (float[])elevation.Cells.Clone());
        LowerTo(surface, StreamLinks.Downstream(elevation, [.. laid.Select(c => c.Runs)]));
        var all = laid.SelectMany(c => c.Runs).SelectMany(r => r).Distinct().ToList();
        foreach (var cell in all) surface.Cells[cell] = (float)(surface.Cells[cell] - settings.DropM);

        var cut = all.Where(c => surface.Cells[c] < elevation.Cells[c]).ToList();
        var volume = cut.Sum(c => (double)elevation.Cells[c] - surface.Cells[c]) * elevation.Frame.CellAreaM2;
        return new EnforcedStreams(
            cut.Count == 0 ? elevation : surface, [.. laid.Select(c => Measure(c, elevation, surface, settings, accumulation))], cut.Count, volume);
    }

    /// <summary>From the lowest cell up, each hands its level down: the first that comes is the least, as nothing later is lower.</summary>
    private static void LowerTo(Grid<float> surface, Dictionary<int, List<int>> downstream)
    {
        var z = surface.Cells;
        var open = new PriorityQueue<int, float>(downstream.Keys.Select(c => (c, z[c])));
        while (open.TryDequeue(out var cell, out var level))
        {
            if (z[cell] < level) continue;
            foreach (var next in downstream.GetValueOrDefault(cell, []))
            {
                if (z[next] <= z[cell]) continue;
                z[next] = z[cell];
                open.Enqueue(next, z[next]);
            }
        }
    }

    private static EnforcedCourse Measure(
        Course course, Grid<float> elevation, Grid<float> surface, StreamSettings settings, Grid<int>? accumulation)
    {
        var frame = elevation.Frame;
        double deepest = 0, depths = 0;
        var at = -1;
        foreach (var cell in course.Runs.SelectMany(r => r).Distinct())
        {
            var depth = (double)elevation.Cells[cell] - surface.Cells[cell];
            depths += depth;
            if (depth > deepest) (deepest, at) = (depth, cell);
        }

        var findings = course.Findings.ToList();
        double? away = accumulation is null || course.Runs.Count == 0
            ? null : StreamAgreement.DisagreeingShare(course.Runs, accumulation, settings.ThresholdCells, settings.ToleranceCells);
        if (away >= settings.DisagreeingShare && away > 0)
        {
            findings.Add(ConditioningFindings.StreamDisagrees.With(
                $"{course.Name}, {100 * away:0} % of its length lies more than {settings.ToleranceCells} cells from where the terrain model gathers {settings.ThresholdCells} cells",
                away, settings.DisagreeingShare));
        }

        return new EnforcedCourse(
            course.Name, course.Runs, course.Turned, course.AsDrawnM3, course.TurnedM3, course.Runs.Sum(r => CellWay.LengthM(frame, r)), deepest, at,
            depths * frame.CellAreaM2, away, findings);
    }

    /// <summary>A stream on the grid, its direction decided.</summary>
    private sealed record Course(string Name, IReadOnlyList<int[]> Runs, bool Turned, double AsDrawnM3, double TurnedM3, IReadOnlyList<Finding> Findings)
    {
        public static Course Lay(MappedCourse stream, Grid<float> elevation, bool drawnDownstream)
        {
            var cells = StreamCells.Of(stream.Line, elevation);
            if (cells.Runs.Count == 0)
            {
                var why = !cells.IsPlace ? "a coordinate is no number or far away" : cells.Broken ? "no two of its cells lie together in the terrain model"
                    : "it is shorter than two cells or comes back to its start";
                return new Course(stream.Name, [], false, 0, 0, [ConditioningFindings.StreamNotUsed.With($"{stream.Name}, {why}")]);
            }

            var findings = new List<Finding>();
            if (cells.Broken) findings.Add(ConditioningFindings.StreamPartly.With($"{stream.Name}, in {cells.Runs.Count} parts", cells.Runs.Count));
            List<int[]> back = [.. cells.Runs.Reverse().Select(r => r.Reverse().ToArray())];
            var (forth, against) = (FallM3(elevation, cells.Runs), FallM3(elevation, back));
            var turned = !drawnDownstream && against < forth;
            var text = $"{stream.Name}, {forth:0.#} m3 to cut as drawn, {against:0.#} m3 the other way";
            var (chosen, other) = turned ? (against, forth) : (forth, against);
            if (turned) findings.Add(ConditioningFindings.StreamTurned.With(text));
            if (drawnDownstream ? other < DoubtfulShare * chosen : chosen >= DoubtfulShare * other)
                findings.Add(ConditioningFindings.StreamDirectionDoubtful.With(text));
            return new Course(stream.Name, turned ? back : cells.Runs, turned, forth, against, findings);
        }

        /// <summary>What a line takes by itself to fall all along.</summary>
        private static double FallM3(Grid<float> elevation, IReadOnlyList<int[]> runs)
        {
            double depths = 0;
            foreach (var run in runs)
            {
                var level = float.PositiveInfinity;
                foreach (var cell in run)
                {
                    level = Math.Min(level, elevation.Cells[cell]);
                    depths += (double)elevation.Cells[cell] - level;
                }
            }

            return depths * elevation.Frame.CellAreaM2;
        }
    }
}
