using GeoCulvert.Design.Basis;

namespace GeoCulvert.Design.Hydrology;

/// <summary>
/// Design storm of alternating blocks (Chow, Maidment and Mays 1988, section 14.4): the depths of one return period for 1, 2, 3 ... blocks, their differences
/// sorted by size and set alternately after and before the largest, so that every stretch about the peak holds the depth of its own duration.
/// </summary>
/// <param name="DurationMin">Length of the storm, min (24 hours by default); a whole number of blocks.</param>
/// <param name="BlockMin">Length of a block, min (5 by default).</param>
/// <param name="PeakPositionShare">Share of the storm before its largest block, 0-1 (half by default).</param>
public sealed record NestedStorm(double DurationMin = 1440, double BlockMin = 5, double PeakPositionShare = 0.5) : IDesignStorm
{
    private const int MostBlocks = 20000;

    /// <inheritdoc/>
    public string Name => "nested";

    /// <inheritdoc/>
    public DesignStorm Build(double returnPeriodYr, PeakFlowContext context)
    {
        if (context.Rainfall is not { } rain) return DesignStorm.Missing(Name, "no rainfall table");
        if (!(BlockMin > 0) || !(DurationMin >= BlockMin) || !(DurationMin / BlockMin <= MostBlocks))
            return DesignStorm.Missing(Name, $"{DurationMin:G6} min in blocks of {BlockMin:G6} min; 1 to {MostBlocks} blocks are needed");
        if (!(PeakPositionShare is >= 0 and <= 1)) return DesignStorm.Missing(Name, $"a peak position of {PeakPositionShare:G4}, not between 0 and 1");
        var n = (int)Math.Round(DurationMin / BlockMin);
        if (Math.Abs(n * BlockMin - DurationMin) > 1e-6 * DurationMin)
            return DesignStorm.Missing(Name, $"{DurationMin:G6} min are no whole number of blocks of {BlockMin:G6} min");

        var findings = new List<Finding>();
        var blocks = new double[n];
        double before = 0;
        for (var k = 1; k <= n; k++)
        {
            var found = rain.Intensity(k * BlockMin, returnPeriodYr);
            findings.AddRange(found.Findings.Where(f => findings.All(g => g.Kind != f.Kind)));
            if (found.DepthMm is not { } depth) return DesignStorm.Missing(Name, $"no depth for {k * BlockMin:G6} min in {rain.Origin}", findings);
            // A table whose depth falls with duration has no storm; equal depths give an empty block.
            if (depth < before * (1 - 1e-9))
                return DesignStorm.Missing(Name, $"{rain.Origin} gives {depth:0.00} mm in {k * BlockMin:G6} min after {before:0.00} mm in {(k - 1) * BlockMin:G6} min", findings);
            blocks[k - 1] = Math.Max(0, depth - before);
            before = Math.Max(depth, before);
        }
        var order = Arrange(blocks);
        var times = new double[n + 1];
        var sum = new double[n + 1];
        for (var k = 0; k < n; k++)
        {
            times[k + 1] = (k + 1) * BlockMin;
            sum[k + 1] = sum[k] + order[k];
        }
        return new(Name, new(times, sum),
        [
            new("storm_duration_min", DurationMin, "min", "", "setting"),
            new("storm_block_min", BlockMin, "min", "", "setting"),
            new("storm_depth_mm", sum[n], "mm", $"depth of {DurationMin:G6} min", rain.Origin),
            new("largest_block_mm", blocks.Max(), "mm", $"depth of {BlockMin:G6} min", rain.Origin),
        ], findings);
    }

    private double[] Arrange(double[] blocks)
    {
        var sorted = blocks.OrderDescending().ToArray();
        int n = sorted.Length, peak = Math.Min(n - 1, (int)Math.Floor(PeakPositionShare * n));
        var result = new double[n];
        result[peak] = sorted[0];
        int left = peak - 1, right = peak + 1;
        for (var k = 1; k < n; k++)
            if (right < n && (k % 2 == 1 || left < 0)) result[right++] = sorted[k];
            else result[left--] = sorted[k];
        return result;
    }
}
