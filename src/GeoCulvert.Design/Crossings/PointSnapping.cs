using GeoCulvert.Design.Basis;
using GeoCulvert.Design.Terrain;
using NetTopologySuite.Geometries;

namespace GeoCulvert.Design.Crossings;

/// <summary>A given crossing point.</summary>
/// <param name="Id">Its id, unique in a run.</param>
/// <param name="Point">Where it lies, m.</param>
/// <param name="StatedAreaM2">Drainage area it is known to have, m2; null when not known. Enters the ranking.</param>
public sealed record GivenPoint(string Id, Coordinate Point, double? StatedAreaM2 = null);

/// <summary>Settings of snapping given points to streams.</summary>
public sealed record SnapSettings
{
    /// <summary>Largest distance from the point to the centre of the stream cell, m.</summary>
    public double SnapM { get; init; } = 60;

    /// <summary>A cell is a stream from this accumulation on.</summary>
    public long StreamThresholdCells { get; init; } = 100;

    /// <summary>Move above which a finding is raised, m; null for half the snap distance, at least one cell's diagonal.</summary>
    public double? MoveLimitM { get; init; }

    /// <summary>Ratio of areas above which another stream in reach is a jump. Default 2 (own rule).</summary>
    public double JumpRatio { get; init; } = 2;

    /// <summary>Difference from a stated area above which a finding is raised, share of the stated area. Default 0.25 (own rule).</summary>
    public double StatedAreaLimitShare { get; init; } = 0.25;
}

/// <summary>A snapped point.</summary>
/// <param name="Given">The given point.</param>
/// <param name="Cell">The chosen cell; -1 off the terrain.</param>
/// <param name="MovedM">Distance from the point to the cell's centre, m.</param>
/// <param name="AccumulationCells">Cells drained by the chosen cell.</param>
/// <param name="Findings">Doubts.</param>
public sealed record SnappedPoint(GivenPoint Given, int Cell, double MovedM, long AccumulationCells, IReadOnlyList<Finding> Findings);

/// <summary>
/// Moves given points to the stream. Each stream cell within reach is ranked by
/// <c>score = ln A - k (d / snap)^2 - ((ln A - ln As) / 0.25)^2 / 2</c>: A area drained, d distance, As the stated area (last term only when stated),
/// k = ln 1000. That is a normal law for the point's error (standard deviation snap/3.7) times a preference for the larger stream, so the
/// largest accumulation wins near the point and a big river at the end of the reach does not. Own rule.
/// </summary>
public static class PointSnapping
{
    private const double DistanceWeight = 6.907755278982137;
    private const double StatedAreaSpread = 0.25;

    /// <summary>Snaps points to streams.</summary>
    /// <param name="points">Given points, in the frame of the grids.</param>
    /// <param name="direction">D8 directions.</param>
    /// <param name="accumulation">Cells drained, each cell included; 0 or less on nodata.</param>
    /// <param name="settings">Settings; null for the defaults.</param>
    public static IReadOnlyList<SnappedPoint> Snap(
        IReadOnlyList<GivenPoint> points, Grid<byte> direction, Grid<int> accumulation, SnapSettings? settings = null)
    {
        ArgumentNullException.ThrowIfNull(points);
        ArgumentNullException.ThrowIfNull(direction);
        ArgumentNullException.ThrowIfNull(accumulation);
        settings ??= new();
        return [.. points.Select(p => Snap(p, direction, accumulation, settings))];
    }

    private static SnappedPoint Snap(GivenPoint given, Grid<byte> direction, Grid<int> accumulation, SnapSettings settings)
    {
        var frame = accumulation.Frame;
        var reach = Reach(given.Point, accumulation, settings.SnapM);
        if (reach.Count == 0)
            return new(given, -1, 0, 0, [CrossingFindings.OffTerrain.With($"({given.Point.X:0.##}, {given.Point.Y:0.##})").At(given.Id)]);
        var findings = new List<Finding>();
        var streams = reach.Where(c => accumulation.Cells[c.Cell] >= settings.StreamThresholdCells).ToList();
        Candidate chosen;
        if (streams.Count == 0)
        {
            chosen = reach.OrderByDescending(c => accumulation.Cells[c.Cell]).ThenBy(c => c.DistanceM).ThenBy(c => c.Cell).First();
            var area = accumulation.Cells[chosen.Cell] * frame.CellAreaM2;
            findings.Add(CrossingFindings.NoStreamInReach.With(
                $"within {settings.SnapM:0.#} m the largest drainage area is {area / 1e4:0.###} ha", area, settings.StreamThresholdCells * frame.CellAreaM2));
        }
        else
        {
            chosen = streams.OrderByDescending(Score).ThenBy(c => c.DistanceM).ThenBy(c => c.Cell).First();
            Jump(chosen, streams, direction, accumulation, settings, findings);
        }

        var limitM = settings.MoveLimitM ?? Math.Max(settings.SnapM / 2, Math.Sqrt((frame.CellWidthM * frame.CellWidthM) + (frame.CellHeightM * frame.CellHeightM)));
        if (chosen.DistanceM > limitM) findings.Add(CrossingFindings.Moved.With($"moved {chosen.DistanceM:0.#} m", chosen.DistanceM, limitM));
        if (given.StatedAreaM2 is { } stated && stated > 0)
        {
            var area = accumulation.Cells[chosen.Cell] * frame.CellAreaM2;
            if (Math.Abs(area - stated) > settings.StatedAreaLimitShare * stated)
                findings.Add(CrossingFindings.StatedAreaDiffers.With($"{area / 1e6:0.####} km2 here, {stated / 1e6:0.####} km2 stated", area, stated));
        }

        return new(given, chosen.Cell, chosen.DistanceM, accumulation.Cells[chosen.Cell], [.. findings.Select(f => f.At(given.Id))]);

        double Score(Candidate c)
        {
            var logArea = Math.Log(accumulation.Cells[c.Cell] * frame.CellAreaM2);
            var score = logArea - (DistanceWeight * Math.Pow(c.DistanceM / settings.SnapM, 2));
            if (given.StatedAreaM2 is { } stated && stated > 0) score -= Math.Pow((logArea - Math.Log(stated)) / StatedAreaSpread, 2) / 2;
            return score;
        }
    }

    private static List<Candidate> Reach(Coordinate p, Grid<int> accumulation, double snapM)
    {
        var frame = accumulation.Frame;
        var reach = new List<Candidate>();
        int top = Math.Max(frame.RowAt(p.Y + snapM), 0), bottom = Math.Min(frame.RowAt(p.Y - snapM), frame.Rows - 1);
        int left = Math.Max(frame.ColumnAt(p.X - snapM), 0), right = Math.Min(frame.ColumnAt(p.X + snapM), frame.Columns - 1);
        int ownRow = frame.RowAt(p.Y), ownColumn = frame.ColumnAt(p.X);
        for (var row = top; row <= bottom; row++)
            for (var column = left; column <= right; column++)
            {
                var cell = (row * frame.Columns) + column;
                if (accumulation.Cells[cell] <= 0) continue;
                var distance = p.Distance(FlowSteps.Centre(frame, cell));
                // The cell that holds the point is always in reach, however short the snap.
                if (distance <= snapM || (row == ownRow && column == ownColumn)) reach.Add(new(cell, distance));
            }

        return reach;
    }

    /// <summary>Another stream in reach, no neighbour of the chosen cell along the flow path without a jump between, whose area differs by more than the ratio.</summary>
    private static void Jump(
        Candidate chosen, List<Candidate> streams, Grid<byte> direction, Grid<int> accumulation, SnapSettings settings, List<Finding> findings)
    {
        var frame = accumulation.Frame;
        double Ratio(int cell) => Math.Max((double)accumulation.Cells[cell] / accumulation.Cells[chosen.Cell], (double)accumulation.Cells[chosen.Cell] / accumulation.Cells[cell]);
        var upstream = FlowSteps.UpstreamPath(direction, accumulation, chosen.Cell, 4 * settings.SnapM).ToHashSet();
        var others = streams.Where(c => Ratio(c.Cell) > settings.JumpRatio && !upstream.Contains(c.Cell))
            .OrderByDescending(c => accumulation.Cells[c.Cell]).ThenBy(c => c.DistanceM).ToList();
        if (others.Count == 0) return;
        var other = others[0];
        findings.Add(CrossingFindings.AreaJump.With(
            $"chosen {accumulation.Cells[chosen.Cell] * frame.CellAreaM2 / 1e6:0.####} km2 at {chosen.DistanceM:0.#} m; another stream drains {accumulation.Cells[other.Cell] * frame.CellAreaM2 / 1e6:0.####} km2 at {other.DistanceM:0.#} m",
            Ratio(other.Cell), settings.JumpRatio));
    }

    private readonly record struct Candidate(int Cell, double DistanceM);
}
