using GeoCulvert.Design.Terrain;

namespace GeoCulvert.Design.Tests.Terrain;

/// <summary>The same things the slow and plain way, straight from their definitions.</summary>
internal static class NaiveTerrain
{
    /// <summary>Lowers a full surface until nothing moves: each inner cell is the larger of its own height and its lowest neighbour.</summary>
    public static float[] Fill(Grid<float> elevation)
    {
        var frame = elevation.Frame;
        var z = elevation.Cells;
        var filled = new float[z.Length];
        for (var i = 0; i < z.Length; i++) filled[i] = float.IsNaN(z[i]) || IsRim(elevation, i) ? z[i] : float.PositiveInfinity;
        for (var moved = true; moved;)
        {
            moved = false;
            for (var i = 0; i < z.Length; i++)
            {
                if (float.IsNaN(z[i]) || IsRim(elevation, i)) continue;
                var lowest = Neighbours(frame, i).Min(n => filled[n.Cell]);
                var level = lowest > z[i] ? lowest : z[i];
                if (level == filled[i]) continue;
                filled[i] = level;
                moved = true;
            }
        }

        return filled;
    }

    public static bool IsRim(Grid<float> elevation, int cell) =>
        Neighbours(elevation.Frame, cell).Count(n => !float.IsNaN(elevation.Cells[n.Cell])) < 8;

    public static IEnumerable<(byte Code, int Cell)> Neighbours(GridFrame frame, int cell)
    {
        for (byte k = 1; k <= 8; k++)
        {
            int r = (cell / frame.Columns) + D8.RowStep[k], c = (cell % frame.Columns) + D8.ColumnStep[k];
            if (frame.Contains(r, c)) yield return (k, (r * frame.Columns) + c);
        }
    }

    /// <summary>The way down from a cell, itself first.</summary>
    public static List<int> WayDown(Grid<byte> direction, int cell)
    {
        List<int> way = [cell];
        while (direction.Cells[cell] != 0)
        {
            var code = direction.Cells[cell];
            var next = Neighbours(direction.Frame, cell).Single(n => n.Code == code).Cell;
            Assert.True(way.Count <= direction.Cells.Length, "the directions hold a circle");
            way.Add(next);
            cell = next;
        }

        return way;
    }

    /// <summary>Directions on flats after Barnes, Lehman and Mulla (2014): each flat by itself, with full passes instead of queues.</summary>
    public static byte[] Directions(Grid<float> filled)
    {
        var frame = filled.Frame;
        var z = filled.Cells;
        var d = new byte[z.Length];
        for (var i = 0; i < z.Length; i++)
        {
            // Of the neighbours along one kind of step the lowest; of these the steepest; of equals the first clockwise.
            d[i] = Neighbours(frame, i).Where(n => z[n.Cell] < z[i])
                .GroupBy(n => n.Code % 4 == 1 ? "north-south" : n.Code % 4 == 3 ? "east-west" : "diagonal")
                .Select(g => g.MinBy(n => z[n.Cell]))
                .OrderByDescending(n => ((double)z[i] - z[n.Cell]) / D8.StepLengthM(frame, n.Code)).ThenBy(n => n.Code)
                .FirstOrDefault().Code;
        }

        bool Flat(int i) => d[i] == 0 && !float.IsNaN(z[i]) && !IsRim(filled, i);
        var flat = Enumerable.Range(0, z.Length).Where(Flat).ToHashSet();
        var toward = Steps(frame, z, flat, i => Neighbours(frame, i).Any(n => z[n.Cell] == z[i] && !flat.Contains(n.Cell)));
        var away = Steps(frame, z, flat, i => Neighbours(frame, i).Any(n => z[n.Cell] > z[i]));
        foreach (var i in flat)
        {
            var farthest = Connected(frame, z, flat, i).Max(j => away.GetValueOrDefault(j));
            int Mask(int j) => !flat.Contains(j) ? -1 : (2 * toward[j]) + (away.TryGetValue(j, out var a) ? farthest - a : 0);
            d[i] = Neighbours(frame, i).Where(n => z[n.Cell] == z[i]).MinBy(n => Mask(n.Cell)).Code;
        }

        return d;
    }

    private static Dictionary<int, int> Steps(GridFrame frame, float[] z, HashSet<int> flat, Func<int, bool> first)
    {
        var steps = flat.Where(first).ToDictionary(i => i, _ => 1);
        for (var step = 2; ; step++)
        {
            var next = flat.Where(i => !steps.ContainsKey(i)
                && Neighbours(frame, i).Any(n => z[n.Cell] == z[i] && steps.GetValueOrDefault(n.Cell) == step - 1)).ToList();
            if (next.Count == 0) return steps;
            next.ForEach(i => steps[i] = step);
        }
    }

    private static HashSet<int> Connected(GridFrame frame, float[] z, HashSet<int> flat, int cell)
    {
        HashSet<int> seen = [cell];
        var open = new Stack<int>(seen);
        while (open.TryPop(out var i))
        {
            foreach (var n in Neighbours(frame, i).Where(n => z[n.Cell] == z[i] && flat.Contains(n.Cell) && seen.Add(n.Cell))) open.Push(n.Cell);
        }

        return seen;
    }
}
