using GeoCulvert.Design.Terrain;
using NetTopologySuite.Geometries;

namespace GeoCulvert.Design.Watersheds;

/// <summary>Where a rising pool first leaves its own land.</summary>
/// <param name="LevelM">The lowest pass, m: above this level water leaves.</param>
/// <param name="Cell">The first cell beyond the divide.</param>
/// <param name="Toward">Outlet that the land beyond drains to; -1 for none.</param>
public sealed record PoolSpill(double LevelM, int Cell, int Toward);

/// <summary>A pool at one level.</summary>
/// <param name="LevelM">Water level, m.</param>
/// <param name="AreaM2">Cells below the level and joined to the inlet, times the area of one, m2.</param>
/// <param name="VolumeM3">Sum of their depths times the area of one, m3.</param>
/// <param name="GreatestDepthM">Largest depth, m; 0 for an empty pool.</param>
/// <param name="Cells">Number of cells.</param>
/// <param name="TouchesEdge">Whether a cell has no terrain beside it (grid edge or nodata), corners included.</param>
/// <param name="Spill">Where water leaves over a divide at this level; null when it does not.</param>
public sealed record PoolAtLevel(double LevelM, double AreaM2, double VolumeM3, double GreatestDepthM, int Cells, bool TouchesEdge, PoolSpill? Spill);

/// <summary>
/// All pools that can stand on the untouched terrain upstream of a crossing, up to a stated level, from one flood.
/// <para>Notation: z ground of a cell; w its wetting level, the least over all ways from the seeds of the highest ground on the way, both ends
/// included. Ways step to the eight neighbours and cross no wall. The pool of level H is the cells with w below H; n(H) of them, volume
/// a (n H - sum z), a the area of a cell. Cells come out of the flood by rising w, so that running sums of z give every level.</para>
/// <para>Ground that lies low behind a lip is wetted only when the lip is; there area and volume rise by a jump. Ground beyond a divide is not
/// part of any pool: what reaches it is a spill. Above the spill the pool is the one that would stand if nothing left.</para>
/// </summary>
public sealed class PondedArea
{
    private readonly GridFrame _frame;
    private readonly int[] _cells;
    private readonly float[] _wetted;

    // Sums over the first k cells: of z less the datum, and the lowest z.
    private readonly double[] _sum;
    private readonly float[] _lowest;
    private readonly double _datum;
    private readonly double _cellAreaM2;
    private readonly double _edgeLevelM;

    private PondedArea(Grid<float> elevation, int[] cells, float[] wetted, double edgeLevelM, PoolSpill? spill, double highestLevelM, double areaRatio)
    {
        (_frame, _cells, _wetted, _edgeLevelM) = (elevation.Frame, cells, wetted, edgeLevelM);
        (LowestPass, HighestLevelM, _cellAreaM2) = (spill, highestLevelM, elevation.Frame.CellAreaM2 * areaRatio);
        _sum = new double[cells.Length + 1];
        _lowest = new float[cells.Length + 1];
        _lowest[0] = float.PositiveInfinity;
        _datum = cells.Length > 0 ? elevation.Cells[cells[0]] : 0;
        for (var k = 0; k < cells.Length; k++)
        {
            var z = elevation.Cells[cells[k]];
            _sum[k + 1] = _sum[k] + (z - _datum);
            _lowest[k + 1] = Math.Min(_lowest[k], z);
        }
    }

    /// <summary>The level up to which the flood went, m; no pool above it is known.</summary>
    public double HighestLevelM { get; }

    /// <summary>The lowest pass over a divide below the highest level; null when there is none.</summary>
    public PoolSpill? LowestPass { get; }

    /// <summary>Level above which the pool touches the end of the terrain, m; null when it does not below the highest level.</summary>
    public double? EdgeLevelM => double.IsFinite(_edgeLevelM) ? _edgeLevelM : null;

    /// <summary>Lowest ground from which a pool rises, m; null when all seeds lie above the highest level.</summary>
    public double? BedM => _cells.Length > 0 ? _wetted[0] : null;

    /// <summary>Cells of the pool at the highest level, by rising wetting level.</summary>
    public IReadOnlyList<int> Cells => _cells;

    /// <summary>Floods the land upstream of a crossing.</summary>
    /// <param name="elevation">The untouched terrain, m; NaN where there is none.</param>
    /// <param name="seeds">Cells upstream of the road from which the pool rises; those without terrain or above the level are passed over.</param>
    /// <param name="highestLevelM">Highest level of interest, m.</param>
    /// <param name="wall">Roads that the pool does not cross; null for none.</param>
    /// <param name="beyond">The outlet that a cell drains to when that is not this crossing, -1 for one beyond all outlets, null for the crossing's own land; null when divides are of no interest.</param>
    /// <param name="areaRatio">True area over area in the plane at the crossing.</param>
    public static PondedArea Flood(
        Grid<float> elevation, IEnumerable<int> seeds, double highestLevelM, RoadWall? wall = null, Func<int, int?>? beyond = null, double areaRatio = 1)
    {
        ArgumentNullException.ThrowIfNull(elevation);
        ArgumentNullException.ThrowIfNull(seeds);
        if (!double.IsFinite(highestLevelM)) throw new ArgumentOutOfRangeException(nameof(highestLevelM));
        var frame = elevation.Frame;
        var ground = elevation.Cells;
        var seen = new HashSet<int>();
        // Equal heights leave the heap by cell number, so that a run repeats exactly.
        var heap = new PriorityQueue<int, (float Level, int Cell)>();
        var level = float.NegativeInfinity;
        // Cells no higher than the water need no heap.
        var below = new Queue<int>();
        foreach (var seed in seeds)
            if (ground[seed] < highestLevelM && seen.Add(seed)) heap.Enqueue(seed, (ground[seed], seed));

        var cells = new List<int>();
        var wetted = new List<float>();
        var edge = double.PositiveInfinity;
        PoolSpill? spill = null;
        while (below.Count > 0 || heap.Count > 0)
        {
            if (!below.TryDequeue(out var cell))
            {
                cell = heap.Dequeue();
                level = ground[cell];
            }

            if (beyond?.Invoke(cell) is { } toward)
            {
                spill ??= new(level, cell, toward);
                continue;
            }

            cells.Add(cell);
            wetted.Add(level);
            int row = cell / frame.Columns, column = cell % frame.Columns;
            for (var dr = -1; dr <= 1; dr++)
            {
                for (var dc = -1; dc <= 1; dc++)
                {
                    if (dr == 0 && dc == 0) continue;
                    int r = row + dr, c = column + dc;
                    if (wall is not null && wall.IsCut(row, column, dr, dc)) continue;
                    var next = (r * frame.Columns) + c;
                    if (!frame.Contains(r, c) || float.IsNaN(ground[next]))
                    {
                        edge = Math.Min(edge, level);
                        continue;
                    }

                    if (!(ground[next] < highestLevelM) || !seen.Add(next)) continue;
                    if (ground[next] <= level) below.Enqueue(next);
                    else heap.Enqueue(next, (ground[next], next));
                }
            }
        }

        return new PondedArea(elevation, [.. cells], [.. wetted], edge, spill, highestLevelM, areaRatio);
    }

    /// <summary>The pool at a level.</summary>
    /// <param name="levelM">Water level, m, up to the highest.</param>
    /// <exception cref="ArgumentOutOfRangeException">The flood did not go so high.</exception>
    public PoolAtLevel At(double levelM)
    {
        var n = CountBelow(levelM);
        return new(
            levelM,
            n * _cellAreaM2,
            Math.Max(0, (n * (levelM - _datum)) - _sum[n]) * _cellAreaM2,
            n > 0 ? levelM - _lowest[n] : 0,
            n,
            levelM > _edgeLevelM,
            LowestPass is { } pass && levelM > pass.LevelM ? pass : null);
    }

    /// <summary>Outline of the pool at a level: valid, along cell edges; a MultiPolygon where cells touch at corners only, empty for an empty pool.</summary>
    /// <param name="levelM">Water level, m, up to the highest.</param>
    public Geometry Outline(double levelM)
    {
        var n = CountBelow(levelM);
        if (n == 0) return Polygon.Empty;
        int top = int.MaxValue, left = int.MaxValue, bottom = 0, right = 0;
        foreach (var cell in _cells.AsSpan(0, n))
        {
            int row = cell / _frame.Columns, column = cell % _frame.Columns;
            (top, bottom) = (Math.Min(top, row), Math.Max(bottom, row));
            (left, right) = (Math.Min(left, column), Math.Max(right, column));
        }

        // Only the rectangle round the pool is traced.
        var window = new Grid<int>(new GridFrame(
            right - left + 1, bottom - top + 1, _frame.West + (left * _frame.CellWidthM), _frame.North - (top * _frame.CellHeightM), _frame.CellWidthM, _frame.CellHeightM));
        foreach (var cell in _cells.AsSpan(0, n)) window[(cell / _frame.Columns) - top, (cell % _frame.Columns) - left] = 1;
        return WatershedPolygons.Trace(window, new OutletTree([-1])).Total[0].Polygon;
    }

    /// <summary>Area and volume at rising levels from the bed to the highest, both ends included; empty when no pool can stand.</summary>
    /// <param name="steps">Number of equal steps, 1 or more.</param>
    public IReadOnlyList<PoolAtLevel> Table(int steps)
    {
        ArgumentOutOfRangeException.ThrowIfLessThan(steps, 1);
        if (BedM is not { } bed) return [];
        return [.. Enumerable.Range(0, steps + 1).Select(k => At(k == steps ? HighestLevelM : bed + ((HighestLevelM - bed) * k / steps)))];
    }

    private int CountBelow(double levelM)
    {
        if (!(levelM <= HighestLevelM)) throw new ArgumentOutOfRangeException(nameof(levelM), levelM, $"above {HighestLevelM}, where the flood ended");
        int low = 0, high = _wetted.Length;
        while (low < high)
        {
            var mid = (low + high) / 2;
            if (_wetted[mid] < levelM) low = mid + 1;
            else high = mid;
        }

        return low;
    }
}
