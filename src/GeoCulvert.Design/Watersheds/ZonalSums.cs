using GeoCulvert.Design.Terrain;

namespace GeoCulvert.Design.Watersheds;

/// <summary>Sums of a value over the cells of a watershed.</summary>
/// <param name="Cells">Cells of the watershed.</param>
/// <param name="ValueCells">Cells that have a value.</param>
/// <param name="Sum">Sum of the values.</param>
/// <param name="Least">Smallest value; positive infinity when none.</param>
/// <param name="Most">Largest value; negative infinity when none.</param>
public readonly record struct ZoneSum(long Cells, long ValueCells, double Sum, double Least, double Most)
{
    /// <summary>No cells.</summary>
    public static ZoneSum Empty { get; } = new(0, 0, 0, double.PositiveInfinity, double.NegativeInfinity);

    /// <summary>Mean over the cells with a value; null when there is none.</summary>
    public double? MeanOrNull => ValueCells > 0 ? Sum / ValueCells : null;

    /// <summary>Share of the cells without a value, 0-1.</summary>
    public double MissingShare => Cells > 0 ? 1 - ((double)ValueCells / Cells) : 0;

    /// <summary>The sum over both.</summary>
    public static ZoneSum Add(ZoneSum a, ZoneSum b) =>
        new(a.Cells + b.Cells, a.ValueCells + b.ValueCells, a.Sum + b.Sum, Math.Min(a.Least, b.Least), Math.Max(a.Most, b.Most));
}

/// <summary>A value per outlet, local and total.</summary>
/// <typeparam name="T">What is known of a watershed.</typeparam>
public sealed record ByOutlet<T>(IReadOnlyList<T> Local, IReadOnlyList<T> Total);

/// <summary>Sums over the cells of every watershed: one pass over the grid for the local ones, one pass over the tree for the totals.</summary>
public static class ZonalSums
{
    /// <summary>Sums, least and largest values of an aligned grid; NaN cells count as missing.</summary>
    /// <exception cref="ArgumentException">The grids do not have the same rows and columns.</exception>
    public static ByOutlet<ZoneSum> Of(Grid<int> labels, OutletTree tree, Grid<float> values)
    {
        ArgumentNullException.ThrowIfNull(values);
        Aligned(labels, values.Frame);
        return Of(labels, tree, cell => values.Cells[cell]);
    }

    /// <summary>Sums, least and largest values of a figure of each cell (row-major index); NaN counts as missing.</summary>
    public static ByOutlet<ZoneSum> Of(Grid<int> labels, OutletTree tree, Func<int, double> value)
    {
        ArgumentNullException.ThrowIfNull(labels);
        ArgumentNullException.ThrowIfNull(tree);
        ArgumentNullException.ThrowIfNull(value);
        var n = tree.Count;
        long[] cells = new long[n], valued = new long[n];
        double[] sum = new double[n], least = new double[n], most = new double[n];
        Array.Fill(least, double.PositiveInfinity);
        Array.Fill(most, double.NegativeInfinity);
        for (var i = 0; i < labels.Cells.Length; i++)
        {
            var k = labels.Cells[i] - 1;
            if (k < 0) continue;
            cells[k]++;
            var v = value(i);
            if (double.IsNaN(v)) continue;
            valued[k]++;
            sum[k] += v;
            if (v < least[k]) least[k] = v;
            if (v > most[k]) most[k] = v;
        }

        var local = new ZoneSum[n];
        for (var k = 0; k < n; k++) local[k] = new(cells[k], valued[k], sum[k], least[k], most[k]);
        return new(local, tree.Accumulate(local, ZoneSum.Add));
    }

    private static void Aligned(Grid<int> labels, GridFrame other)
    {
        ArgumentNullException.ThrowIfNull(labels);
        if (labels.Frame.Rows != other.Rows || labels.Frame.Columns != other.Columns)
            throw new ArgumentException($"A grid of {other.Rows} x {other.Columns} for labels of {labels.Frame.Rows} x {labels.Frame.Columns}.", nameof(other));
    }
}
