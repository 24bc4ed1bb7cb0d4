namespace GeoCulvert.Design.Terrain;

/// <summary>Ways that water is made to take whatever the steepest descent says: through an opened embankment, along a given culvert.</summary>
public static class ForcedPaths
{
    /// <summary>
    /// Writes the directions along each path, all cells but its last. A path whose end drains back to one of its own cells is left to the terrain (a pond over both
    /// ends), and so is one with a step that is not to a neighbour.
    /// </summary>
    /// <param name="direction">D8 directions; changed along the paths.</param>
    /// <param name="filled">The filled surface; falls or stays level along every direction.</param>
    /// <param name="paths">Row-major cells of each path, upstream end first.</param>
    /// <returns>For each path whether it was written.</returns>
    public static bool[] Apply(Grid<byte> direction, Grid<float> filled, IReadOnlyList<int[]> paths)
    {
        ArgumentNullException.ThrowIfNull(direction);
        ArgumentNullException.ThrowIfNull(filled);
        ArgumentNullException.ThrowIfNull(paths);
        var written = new bool[paths.Count];
        for (var k = 0; k < paths.Count; k++)
        {
            var path = paths[k];
            var before = new byte[path.Length];
            for (var i = 0; i < path.Length; i++) before[i] = direction.Cells[path[i]];
            written[k] = Write(direction, filled, path) && !Returns(direction, filled, path);
            if (written[k]) continue;
            for (var i = 0; i < path.Length; i++) direction.Cells[path[i]] = before[i];
        }

        return written;
    }

    private static bool Write(Grid<byte> direction, Grid<float> filled, int[] path)
    {
        for (var i = 0; i + 1 < path.Length; i++)
        {
            var code = Code(direction.Frame, path[i], path[i + 1]);
            if (code == D8.None || filled.Cells[path[i + 1]] > filled.Cells[path[i]]) return false;
            direction.Cells[path[i]] = code;
        }

        return true;
    }

    /// <summary>Whether the water that leaves the end comes back; below the lowest level of the path it cannot, since no step rises.</summary>
    private static bool Returns(Grid<byte> direction, Grid<float> filled, int[] path)
    {
        var own = path.ToHashSet();
        var lowest = path.Min(c => filled.Cells[c]);
        var cell = path[^1];
        for (long steps = 0; steps <= direction.Frame.Count; steps++)
        {
            var code = direction.Cells[cell];
            if (code == D8.None) return false;
            cell = FlowAccumulation.Downstream(direction.Frame, cell, code);
            if (own.Contains(cell)) return true;
            if (filled.Cells[cell] < lowest) return false;
        }

        return true;
    }

    private static byte Code(in GridFrame frame, int from, int to)
    {
        int rows = (to / frame.Columns) - (from / frame.Columns), columns = (to % frame.Columns) - (from % frame.Columns);
        for (byte k = 1; k <= 8; k++)
            if (D8.RowStep[k] == rows && D8.ColumnStep[k] == columns) return k;
        return D8.None;
    }
}
