namespace GeoCulvert.Design.Terrain;

/// <summary>How far mapped streams and the water of a terrain model agree. Each cell stands for half the steps on either side of it.</summary>
public static class StreamAgreement
{
    /// <summary>Share of the length whose cells have no cell of the terrain model's own streams within a distance.</summary>
    /// <param name="runs">Chains of neighbouring cells.</param>
    /// <param name="accumulation">Cells drained by each cell.</param>
    /// <param name="thresholdCells">Cells from which the terrain model's own drainage counts as a stream.</param>
    /// <param name="toleranceCells">The distance between cell centres, in cells along either axis.</param>
    public static double DisagreeingShare(IReadOnlyList<int[]> runs, Grid<int> accumulation, long thresholdCells, int toleranceCells)
    {
        ArgumentNullException.ThrowIfNull(runs);
        ArgumentNullException.ThrowIfNull(accumulation);
        double length = 0, away = 0;
        foreach (var run in runs)
        {
            for (var i = 0; i < run.Length; i++)
            {
                var half = 0.0;
                if (i > 0) half += CellWay.StepM(accumulation.Frame, run[i - 1], run[i]) / 2;
                if (i + 1 < run.Length) half += CellWay.StepM(accumulation.Frame, run[i], run[i + 1]) / 2;
                length += half;
                if (!HasNear(accumulation, run[i], thresholdCells, toleranceCells)) away += half;
            }
        }

        return length > 0 ? away / length : 0;
    }

    /// <summary>Share of the length on which water takes the step of the mapped stream.</summary>
    /// <param name="runs">Chains of neighbouring cells, downstream.</param>
    /// <param name="direction">Flow directions.</param>
    public static double FollowedShare(IReadOnlyList<int[]> runs, Grid<byte> direction)
    {
        ArgumentNullException.ThrowIfNull(runs);
        ArgumentNullException.ThrowIfNull(direction);
        double length = 0, followed = 0;
        foreach (var run in runs)
        {
            for (var i = 0; i + 1 < run.Length; i++)
            {
                var step = CellWay.StepM(direction.Frame, run[i], run[i + 1]);
                var code = direction.Cells[run[i]];
                length += step;
                if (code != D8.None && FlowAccumulation.Downstream(direction.Frame, run[i], code) == run[i + 1]) followed += step;
            }
        }

        return length > 0 ? followed / length : 0;
    }

    private static bool HasNear(Grid<int> accumulation, int cell, long threshold, int reach)
    {
        var frame = accumulation.Frame;
        int row = cell / frame.Columns, column = cell % frame.Columns;
        for (var dr = 0; dr <= reach; dr++)
        {
            for (var dc = 0; (dr * dr) + (dc * dc) <= reach * reach; dc++)
            {
                if (Is(row + dr, column + dc) || Is(row + dr, column - dc) || Is(row - dr, column + dc) || Is(row - dr, column - dc)) return true;
            }
        }

        return false;

        bool Is(int r, int c) => frame.Contains(r, c) && accumulation[r, c] >= threshold;
    }
}
