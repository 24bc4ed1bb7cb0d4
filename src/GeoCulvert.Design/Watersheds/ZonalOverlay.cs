using System.Runtime.InteropServices;
using GeoCulvert.Design.Terrain;

namespace GeoCulvert.Design.Watersheds;

/// <summary>Cells of each class in a watershed; where another grid's cells overlap a cell in part, the part is counted.</summary>
/// <param name="CellsByClass">Cells by class code, by rising code.</param>
/// <param name="MissingCellCount">Cells without a class.</param>
public sealed record ClassCells(IReadOnlyDictionary<int, double> CellsByClass, double MissingCellCount)
{
    /// <summary>All cells.</summary>
    public double CellCount => CellsByClass.Values.Sum() + MissingCellCount;

    /// <summary>Share of the cells without a class, 0-1.</summary>
    public double MissingShare => CellCount > 0 ? MissingCellCount / CellCount : 0;

    /// <summary>The cells of both.</summary>
    public static ClassCells Add(ClassCells a, ClassCells b)
    {
        ArgumentNullException.ThrowIfNull(a);
        ArgumentNullException.ThrowIfNull(b);
        var sum = new SortedDictionary<int, double>();
        foreach (var (code, cells) in a.CellsByClass) sum[code] = cells;
        foreach (var (code, cells) in b.CellsByClass) sum[code] = sum.GetValueOrDefault(code) + cells;
        return new(sum, a.MissingCellCount + b.MissingCellCount);
    }
}

/// <summary>The area-weighted mean of a raster over a watershed.</summary>
/// <param name="CellCount">Cells of the watershed.</param>
/// <param name="ValueCellCount">Cells where the raster has a value, parts counted.</param>
/// <param name="Sum">Sum of value times cells.</param>
public readonly record struct ZoneMean(double CellCount, double ValueCellCount, double Sum)
{
    /// <summary>Mean over the part with a value; null when there is none.</summary>
    public double? MeanOrNull => ValueCellCount > 0 ? Sum / ValueCellCount : null;

    /// <summary>Share of the watershed without a value, 0-1.</summary>
    public double MissingShare => CellCount > 0 ? Math.Max(0, 1 - (ValueCellCount / CellCount)) : 0;

    /// <summary>The sums over both.</summary>
    public static ZoneMean Add(ZoneMean a, ZoneMean b) => new(a.CellCount + b.CellCount, a.ValueCellCount + b.ValueCellCount, a.Sum + b.Sum);
}

/// <summary>
/// Classes and means over all watersheds from rasters on grids of their own, coarser or finer than the labels', in the same plane. One sweep over
/// the pieces that the grids have in common gives the local watersheds, one over the tree of outlets the totals.
/// </summary>
public static class ZonalOverlay
{
    /// <summary>Code of a place without a class.</summary>
    public const int NoClass = int.MinValue;

    /// <summary>Cells of each class of one grid of codes; <see cref="NoClass"/> marks a cell without one.</summary>
    public static ByOutlet<ClassCells> Classes(Grid<int> labels, OutletTree tree, Grid<int> classes)
    {
        ArgumentNullException.ThrowIfNull(classes);
        return Classes(labels, tree, classes.Frame, null, (_, cell, _) => cell < 0 ? NoClass : classes.Cells[cell]);
    }

    /// <summary>Cells of each class, a class being made of what two grids (and the labels' own cells) say of a place.</summary>
    /// <param name="labels">0 for none, k + 1 for outlet k.</param>
    /// <param name="tree">The outlets' tree.</param>
    /// <param name="first">Frame of the first grid.</param>
    /// <param name="second">Frame of the second grid; null for none.</param>
    /// <param name="classOf">Class of a piece from its cells (row-major index) in the labels' grid, the first and the second; -1 where a grid does not reach.</param>
    public static ByOutlet<ClassCells> Classes(Grid<int> labels, OutletTree tree, GridFrame first, GridFrame? second, Func<int, int, int, int> classOf)
    {
        ArgumentNullException.ThrowIfNull(tree);
        ArgumentNullException.ThrowIfNull(classOf);
        var counts = new Dictionary<int, double>[tree.Count];
        for (var k = 0; k < counts.Length; k++) counts[k] = [];

        // Pieces of one label and class follow each other: they are summed before they are looked up.
        int lastLabel = 0, lastClass = 0;
        var sum = 0.0;
        Sweep(labels, first, second, (cell, label, a, b, part) =>
        {
            var code = classOf(cell, a, b);
            if (label != lastLabel || code != lastClass)
            {
                Put();
                (lastLabel, lastClass, sum) = (label, code, 0);
            }

            sum += part;
        });
        Put();
        var local = counts.Select(c => new ClassCells(
            new SortedDictionary<int, double>(c.Where(p => p.Key != NoClass).ToDictionary()), c.GetValueOrDefault(NoClass))).ToArray();
        return new(local, tree.Accumulate(local, ClassCells.Add));

        void Put()
        {
            if (lastLabel > 0) CollectionsMarshal.GetValueRefOrAddDefault(counts[lastLabel - 1], lastClass, out _) += sum;
        }
    }

    /// <summary>Area-weighted means of a raster; NaN counts as missing.</summary>
    public static ByOutlet<ZoneMean> Means(Grid<int> labels, OutletTree tree, Grid<float> values)
    {
        ArgumentNullException.ThrowIfNull(tree);
        ArgumentNullException.ThrowIfNull(values);
        var local = new ZoneMean[tree.Count];
        Sweep(labels, values.Frame, null, (_, label, cell, _, part) =>
        {
            ref var zone = ref local[label - 1];
            var value = cell < 0 ? double.NaN : values.Cells[cell];
            zone = double.IsNaN(value) ? zone with { CellCount = zone.CellCount + part } : new(zone.CellCount + part, zone.ValueCellCount + part, zone.Sum + (part * value));
        });
        return new(local, tree.Accumulate(local, ZoneMean.Add));
    }

    private delegate void Piece(int cell, int label, int first, int second, double cells);

    private static void Sweep(Grid<int> labels, in GridFrame first, GridFrame? second, Piece piece)
    {
        ArgumentNullException.ThrowIfNull(labels);
        var overlay = new CellOverlay(labels.Frame, first, second);
        int across = labels.Frame.Columns, acrossFirst = first.Columns, acrossSecond = second?.Columns ?? 0;
        Stretch[] columns = [.. overlay.Columns];
        foreach (var row in overlay.Rows)
            foreach (ref readonly var column in columns.AsSpan())
            {
                var cell = (row.Label * across) + column.Label;
                var label = labels.Cells[cell];
                if (label <= 0) continue;
                piece(
                    cell, label,
                    row.First < 0 || column.First < 0 ? -1 : (row.First * acrossFirst) + column.First,
                    row.Second < 0 || column.Second < 0 ? -1 : (row.Second * acrossSecond) + column.Second,
                    row.Length * column.Length);
            }
    }
}
