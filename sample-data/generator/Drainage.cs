namespace GeoCulvert.SampleData;

/// <summary>
/// Where water goes on a surface under construction: a plain priority flood from the outlets (Barnes and others 2014) that keeps the
/// order in which cells were reached. It serves the generator only and shares nothing with the program it makes data for.
/// </summary>
public sealed class Drainage
{
    private static readonly int[] StepRow = [-1, -1, -1, 0, 0, 1, 1, 1];
    private static readonly int[] StepCol = [-1, 0, 1, -1, 1, -1, 0, 1];

    private Drainage(int[] order, int[] receiver, double[] filled) => (Order, Receiver, Filled) = (order, receiver, filled);

    /// <summary>Cells from the outlets up: a cell stands after the one it drains to.</summary>
    public int[] Order { get; }

    /// <summary>The cell each cell drains to; an outlet drains to itself.</summary>
    public int[] Receiver { get; }

    /// <summary>Elevation after filling, in the unit of the surface.</summary>
    public double[] Filled { get; }

    /// <summary>Drains a surface of <paramref name="rows"/> x <paramref name="cols"/> cells, row by row, to its outlets.</summary>
    public static Drainage Of(double[] surface, int rows, int cols, Func<int, int, bool> isOutlet)
    {
        ArgumentNullException.ThrowIfNull(surface);
        ArgumentNullException.ThrowIfNull(isOutlet);
        var n = rows * cols;
        var (filled, receiver, order) = (new double[n], new int[n], new int[n]);
        Array.Fill(receiver, -1);
        var front = new Frontier(filled);
        for (var i = 0; i < n; i++)
        {
            var (r, c) = (i / cols, i % cols);
            if ((r == 0 || c == 0 || r == rows - 1 || c == cols - 1) && isOutlet(r, c))
            {
                (filled[i], receiver[i]) = (surface[i], i);
                front.Add(i);
            }
        }

        var done = 0;
        while (front.TryTake(out var i))
        {
            order[done++] = i;
            var (r, c) = (i / cols, i % cols);
            for (var k = 0; k < 8; k++)
            {
                var (rr, cc) = (r + StepRow[k], c + StepCol[k]);
                if ((uint)rr >= (uint)rows || (uint)cc >= (uint)cols) continue;
                var j = rr * cols + cc;
                if (receiver[j] >= 0) continue;
                (filled[j], receiver[j]) = (Math.Max(surface[j], filled[i]), i);
                front.Add(j);
            }
        }

        TurnToSteepest(filled, receiver, rows, cols);
        return new(order, receiver, filled);
    }

    /// <summary>Area above each cell, itself included, in the unit of <paramref name="cellArea"/>.</summary>
    public double[] Areas(double cellArea)
    {
        var area = new double[Order.Length];
        Array.Fill(area, cellArea);
        for (var k = Order.Length - 1; k >= 0; k--)
        {
            var i = Order[k];
            if (Receiver[i] != i) area[Receiver[i]] += area[i];
        }

        return area;
    }

    private static void TurnToSteepest(double[] filled, int[] receiver, int rows, int cols)
    {
        for (var i = 0; i < filled.Length; i++)
        {
            if (receiver[i] == i) continue;
            var (r, c) = (i / cols, i % cols);
            double best = 0;
            for (var k = 0; k < 8; k++)
            {
                var (rr, cc) = (r + StepRow[k], c + StepCol[k]);
                if ((uint)rr >= (uint)rows || (uint)cc >= (uint)cols) continue;
                var j = rr * cols + cc;
                var fall = (filled[i] - filled[j]) * (StepRow[k] != 0 && StepCol[k] != 0 ? 0.70710678118654757 : 1);
                if (fall > best) (best, receiver[i]) = (fall, j);
            }
        }
    }

    /// <summary>A binary heap by elevation, then by cell number, so that ties fall the same way everywhere.</summary>
    private sealed class Frontier(double[] level)
    {
        private int[] _heap = new int[1024];
        private int _count;

        public void Add(int cell)
        {
            if (_count == _heap.Length) Array.Resize(ref _heap, _count * 2);
            var k = _count++;
            while (k > 0 && Before(cell, _heap[(k - 1) / 2]))
            {
                _heap[k] = _heap[(k - 1) / 2];
                k = (k - 1) / 2;
            }

            _heap[k] = cell;
        }

        public bool TryTake(out int cell)
        {
            cell = -1;
            if (_count == 0) return false;
            cell = _heap[0];
            var last = _heap[--_count];
            var k = 0;
            while (2 * k + 1 < _count)
            {
                var child = 2 * k + 1;
                if (child + 1 < _count && Before(_heap[child + 1], _heap[child])) child++;
                if (!Before(_heap[child], last)) break;
                _heap[k] = _heap[child];
                k = child;
            }

            _heap[k] = last;
            return true;
        }

        private bool Before(int a, int b) => level[a] < level[b] || (level[a] == level[b] && a < b);
    }
}
