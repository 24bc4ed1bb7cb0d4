namespace GeoCulvert.Design.Terrain;

/// <summary>A place where water stops: connected cells of one level, none on the rim, without a lower neighbour.</summary>
/// <param name="LevelM">Elevation, m.</param>
/// <param name="First">Its smallest cell number.</param>
/// <param name="Flat">All its cells; null where it is the one cell.</param>
internal sealed record Pit(float LevelM, int First, int[]? Flat);

/// <summary>Finds the pits of a surface, each cell visited a fixed number of times.</summary>
internal static class PitCells
{
    /// <summary>Pits from the lowest up, of equal ones the smallest cell first. A cell at minus infinity is an outlet, no pit.</summary>
    public static List<Pit> Find(Grid<float> elevation, CancellationToken cancel)
    {
        var frame = elevation.Frame;
        int columns = frame.Columns, rows = frame.Rows;
        var z = elevation.Cells;
        var pits = new List<Pit>();
        bool[]? seen = null;
        var flat = new List<int>();
        for (var r = 1; r < rows - 1; r++)
        {
            if ((r & 0xFF) == 0) cancel.ThrowIfCancellationRequested();
            for (var i = (r * columns) + 1; i < ((r + 1) * columns) - 1; i++)
            {
                // Each comparison is false for a lower neighbour and for nodata: beside nodata a cell is an outlet.
                var h = z[i];
                if (!(z[i - 1] >= h) || !(z[i + 1] >= h) || !(z[i - columns] >= h) || !(z[i + columns] >= h)
                    || !(z[i - columns - 1] >= h) || !(z[i - columns + 1] >= h) || !(z[i + columns - 1] >= h) || !(z[i + columns + 1] >= h)) continue;
                if (float.IsNegativeInfinity(h)) continue;
                if (z[i - 1] != h && z[i + 1] != h && z[i - columns] != h && z[i + columns] != h
                    && z[i - columns - 1] != h && z[i - columns + 1] != h && z[i + columns - 1] != h && z[i + columns + 1] != h)
                {
                    pits.Add(new Pit(h, i, null));
                    continue;
                }

                seen ??= new bool[z.Length];
                if (!seen[i] && IsClosed(elevation, i, seen, flat)) pits.Add(new Pit(h, flat.Min(), [.. flat]));
            }
        }

        pits.Sort((a, b) => a.LevelM != b.LevelM ? a.LevelM.CompareTo(b.LevelM) : a.First.CompareTo(b.First));
        return pits;
    }

    /// <summary>Whether water still stops there after cells around it, or its own, were lowered.</summary>
    public static bool StillHolds(Grid<float> surface, Pit pit)
    {
        var z = surface.Cells;
        foreach (var cell in pit.Flat ?? [pit.First])
        {
            if (z[cell] != pit.LevelM || HasLower(z, surface.Frame.Columns, cell)) return false;
        }

        return true;
    }

    /// <summary>Marks the whole flat, so that it is looked at once, and tells whether it has no way out.</summary>
    private static bool IsClosed(Grid<float> elevation, int start, bool[] seen, List<int> flat)
    {
        var (z, columns) = (elevation.Cells, elevation.Frame.Columns);
        var closed = true;
        flat.Clear();
        flat.Add(start);
        seen[start] = true;
        for (var next = 0; next < flat.Count; next++)
        {
            var cell = flat[next];
            if (EdgeCells.IsEdge(elevation, cell / columns, cell % columns)) closed = false;
            else if (HasLower(z, columns, cell)) closed = false;
            for (var k = 1; k <= 8; k++)
            {
                int r = (cell / columns) + D8.RowStep[k], c = (cell % columns) + D8.ColumnStep[k];
                if (!elevation.Frame.Contains(r, c)) continue;
                var n = (r * columns) + c;
                if (seen[n] || z[n] != z[start]) continue;
                seen[n] = true;
                flat.Add(n);
            }
        }

        return closed;
    }

    private static bool HasLower(float[] z, int columns, int i)
    {
        var h = z[i];
        return z[i - 1] < h || z[i + 1] < h || z[i - columns] < h || z[i + columns] < h
            || z[i - columns - 1] < h || z[i - columns + 1] < h || z[i + columns - 1] < h || z[i + columns + 1] < h;
    }
}
