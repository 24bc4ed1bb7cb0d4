namespace GeoCulvert.Design.Terrain;

/// <summary>
/// The memory of a search that stays local: a heap of open cells and a table of reached ones whose size follows the cells reached, not the
/// grid. Used again and again; beginning anew costs nothing.
/// </summary>
internal sealed class OpenCells
{
    private Reached[] _table = new Reached[1024];
    private (long Cost, long Length, int Cell)[] _heap = new (long, long, int)[256];
    private int _turn;
    private int _reached;

    /// <summary>Cells waiting, some perhaps more than once.</summary>
    public int Waiting { get; private set; }

    /// <summary>Forgets everything.</summary>
    public void Begin()
    {
        if (++_turn == int.MaxValue) (_table, _turn) = (new Reached[1024], 1);
        _reached = 0;
        Waiting = 0;
    }

    /// <summary>
    /// Reaches a cell: kept when it is new, cheaper, equally cheap and shorter, or equal in both and from a smaller cell. Kept labels of the first
    /// three kinds wait their turn.
    /// </summary>
    public void Reach(int cell, long cost, long length, int from)
    {
        ref var at = ref Slot(cell);
        if (at.Turn == _turn)
        {
            if (at.Cost < cost || (at.Cost == cost && at.Length < length)) return;
            if (at.Cost == cost && at.Length == length)
            {
                if (from < at.From) at.From = from;
                return;
            }
        }
        else
        {
            _reached++;
        }

        at = new Reached { Turn = _turn, Cell = cell, From = from, Cost = cost, Length = length };
        Push((cost, length, cell));
        if (_reached * 2 > _table.Length) Grow();
    }

    /// <summary>Marks a cell, for searches that come to each once.</summary>
    /// <param name="cell">The cell.</param>
    /// <param name="cost">Its cost.</param>
    /// <param name="waits">Whether it waits its turn.</param>
    /// <returns>False when it was reached before.</returns>
    public bool TryMark(int cell, long cost, bool waits)
    {
        ref var at = ref Slot(cell);
        if (at.Turn == _turn) return false;
        at = new Reached { Turn = _turn, Cell = cell, From = -1, Cost = cost };
        if (waits) Push((cost, 0, cell));
        if (++_reached * 2 > _table.Length) Grow();
        return true;
    }

    /// <summary>The cell before a reached cell; -1 for a start.</summary>
    public int From(int cell) => Slot(cell).From;

    /// <summary>Takes the cheapest cell, of equal ones the nearest, then the smallest; labels that were bettered are passed over.</summary>
    public bool TryTake(out int cell, out long cost, out long length)
    {
        while (Waiting > 0)
        {
            (cost, length, cell) = Pop();
            ref var at = ref Slot(cell);
            if (at.Cost == cost && at.Length == length) return true;
        }

        (cell, cost, length) = (-1, 0, 0);
        return false;
    }

    private ref Reached Slot(int cell)
    {
        var mask = _table.Length - 1;
        var i = (int)((uint)cell * 2654435769u >> 7) & mask;
        while (_table[i].Turn == _turn && _table[i].Cell != cell) i = (i + 1) & mask;
        return ref _table[i];
    }

    private void Grow()
    {
        var old = _table;
        _table = new Reached[old.Length * 2];
        foreach (var item in old)
        {
            if (item.Turn == _turn) Slot(item.Cell) = item;
        }
    }

    private void Push((long Cost, long Length, int Cell) item)
    {
        if (Waiting == _heap.Length) Array.Resize(ref _heap, Waiting * 2);
        var i = Waiting++;
        while (i > 0)
        {
            var parent = (i - 1) >> 1;
            if (!Before(item, _heap[parent])) break;
            _heap[i] = _heap[parent];
            i = parent;
        }

        _heap[i] = item;
    }

    private (long Cost, long Length, int Cell) Pop()
    {
        var top = _heap[0];
        var last = _heap[--Waiting];
        var i = 0;
        while (true)
        {
            var child = (2 * i) + 1;
            if (child >= Waiting) break;
            if (child + 1 < Waiting && Before(_heap[child + 1], _heap[child])) child++;
            if (!Before(_heap[child], last)) break;
            _heap[i] = _heap[child];
            i = child;
        }

        _heap[i] = last;
        return top;
    }

    private static bool Before(in (long Cost, long Length, int Cell) a, in (long Cost, long Length, int Cell) b) =>
        a.Cost != b.Cost ? a.Cost < b.Cost : a.Length != b.Length ? a.Length < b.Length : a.Cell < b.Cell;

    private struct Reached
    {
        public int Turn;
        public int Cell;
        public int From;
        public long Cost;
        public long Length;
    }
}
