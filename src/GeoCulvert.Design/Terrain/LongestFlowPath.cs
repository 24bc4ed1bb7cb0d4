namespace GeoCulvert.Design.Terrain;

/// <summary>
/// Longest flow paths by true distance, over total watersheds. Each cell is met once: the search climbs from every outlet over its local
/// watershed, and the tree of outlets joins the results, so nothing of the size of the grid is kept but one bit a cell.
/// </summary>
public static class LongestFlowPath
{
    /// <summary>Cells of the longest path from the divide to each outlet, the outlet last. Of equally long ones that with the smallest first cell.</summary>
    /// <param name="direction">Directions without circles.</param>
    /// <param name="outletCells">Cells of the outlets, in any order, nested or on the same cell.</param>
    public static IReadOnlyList<int[]> Trace(Grid<byte> direction, IReadOnlyList<int> outletCells)
    {
        ArgumentNullException.ThrowIfNull(direction);
        ArgumentNullException.ThrowIfNull(outletCells);
        var frame = direction.Frame;
        var outletAt = new Dictionary<int, int>();
        var isOutlet = new ulong[(direction.Cells.Length + 63) / 64];
        for (var k = 0; k < outletCells.Count; k++)
        {
            var cell = outletCells[k];
            outletAt.TryAdd(cell, k);
            isOutlet[cell >> 6] |= 1UL << cell;
        }

        var climb = new Climb(direction, isOutlet, outletAt);
        var parent = new int[outletCells.Count];
        var below = new Way[outletCells.Count];
        var farthest = new Way[outletCells.Count];
        Array.Fill(parent, -1);
        foreach (var (cell, k) in outletAt) farthest[k] = climb.From(cell, k, parent, below);
        foreach (var k in WatershedLabels.UpstreamFirst(parent))
        {
            if (parent[k] < 0) continue;
            var through = farthest[k].Above(below[k]);
            if (through.IsLonger(frame, farthest[parent[k]])) farthest[parent[k]] = through;
        }

        return [.. outletCells.Select(cell => Descend(direction, farthest[outletAt[cell]].Cell, cell))];
    }

    private static int[] Descend(Grid<byte> direction, int from, int to)
    {
        var path = new List<int> { from };
        for (var cell = from; cell != to;)
        {
            cell = FlowAccumulation.Downstream(direction.Frame, cell, direction.Cells[cell]);
            path.Add(cell);
        }

        return [.. path];
    }

    /// <summary>A cell and the steps of each kind down to an outlet. Counts are exact, so equal ways have equal lengths in whatever order they are walked.</summary>
    private readonly record struct Way(int Cell, int NorthSouth, int EastWest, int Diagonal)
    {
        public Way Up(int cell, int code) => (code & 3) switch
        {
            1 => new(cell, NorthSouth + 1, EastWest, Diagonal),
            3 => new(cell, NorthSouth, EastWest + 1, Diagonal),
            _ => new(cell, NorthSouth, EastWest, Diagonal + 1),
        };

        public Way Above(Way below) => new(Cell, NorthSouth + below.NorthSouth, EastWest + below.EastWest, Diagonal + below.Diagonal);

        public bool IsLonger(in GridFrame frame, Way other)
        {
            double here = LengthM(frame), there = other.LengthM(frame);
            return here > there || (here == there && Cell < other.Cell);
        }

        private double LengthM(in GridFrame frame) => frame.CellWidthM == frame.CellHeightM
            ? ((double)(NorthSouth + EastWest) * frame.CellWidthM) + (Diagonal * D8.StepLengthM(frame, 2))
            : (NorthSouth * frame.CellHeightM) + (EastWest * frame.CellWidthM) + (Diagonal * D8.StepLengthM(frame, 2));
    }

    private sealed class Climb(Grid<byte> direction, ulong[] isOutlet, Dictionary<int, int> outletAt)
    {
        private readonly Stack<Way> _open = new();

        /// <summary>The farthest cell of the local watershed; notes the way down from the outlets that bound it above.</summary>
        public Way From(int outlet, int k, int[] parent, Way[] below)
        {
            var frame = direction.Frame;
            var d = direction.Cells;
            var farthest = new Way(outlet, 0, 0, 0);
            _open.Push(farthest);
            while (_open.TryPop(out var way))
            {
                int row = way.Cell / frame.Columns, column = way.Cell - (row * frame.Columns);
                var isSource = true;
                for (byte code = 1; code <= 8; code++)
                {
                    int r = row + D8.RowStep[code], c = column + D8.ColumnStep[code];
                    if (!frame.Contains(r, c)) continue;
                    var n = (r * frame.Columns) + c;
                    if (d[n] != D8.Opposite(code)) continue;
                    isSource = false;
                    var up = way.Up(n, code);
                    if ((isOutlet[n >> 6] >> n & 1) == 0)
                    {
                        _open.Push(up);
                        continue;
                    }

                    var nested = outletAt[n];
                    (parent[nested], below[nested]) = (k, up);
                }

                // Only a source can be farthest.
                if (isSource && way.IsLonger(frame, farthest)) farthest = way;
            }

            return farthest;
        }
    }
}
