namespace GeoCulvert.Design.Watersheds;

/// <summary>The tree of outlets: each outlet's next outlet downstream. Answers "is one above the other" at once and sums leaves to root in one pass.</summary>
public sealed class OutletTree
{
    private readonly int[] _parent;
    private readonly int[] _enter;
    private readonly int[] _leave;
    private readonly int[] _upstreamFirst;

    /// <summary>Makes the tree.</summary>
    /// <param name="parent">For each outlet the index of the next outlet downstream; negative for none.</param>
    /// <exception cref="ArgumentException">The parents go round in a circle or name no outlet.</exception>
    public OutletTree(IReadOnlyList<int> parent)
    {
        ArgumentNullException.ThrowIfNull(parent);
        _parent = [.. parent.Select(p => p < 0 ? -1 : p)];
        if (_parent.Any(p => p >= _parent.Length)) throw new ArgumentException("A parent names no outlet.", nameof(parent));
        int n = _parent.Length, clock = 0;
        var children = new List<int>[n];
        for (var k = 0; k < n; k++) children[k] = [];
        for (var k = 0; k < n; k++)
            if (_parent[k] >= 0) children[_parent[k]].Add(k);
        (_enter, _leave) = (new int[n], new int[n]);
        var finished = new List<int>(n);
        var stack = new Stack<(int Outlet, int Child)>();
        for (var root = 0; root < n; root++)
        {
            if (_parent[root] >= 0) continue;
            _enter[root] = clock++;
            stack.Push((root, 0));
            while (stack.Count > 0)
            {
                var (outlet, child) = stack.Pop();
                if (child < children[outlet].Count)
                {
                    stack.Push((outlet, child + 1));
                    var next = children[outlet][child];
                    _enter[next] = clock++;
                    stack.Push((next, 0));
                }
                else
                {
                    _leave[outlet] = clock;
                    finished.Add(outlet);
                }
            }
        }

        if (finished.Count < n) throw new ArgumentException("The outlets' parents go round in a circle.", nameof(parent));
        _upstreamFirst = [.. finished];
    }

    /// <summary>Number of outlets.</summary>
    public int Count => _parent.Length;

    /// <summary>Outlets ordered so that each comes after all above it.</summary>
    public IReadOnlyList<int> UpstreamFirst => _upstreamFirst;

    /// <summary>The next outlet downstream; -1 for none.</summary>
    public int Parent(int outlet) => _parent[outlet];

    /// <summary>Whether <paramref name="outlet"/> is <paramref name="other"/> or lies downstream of it.</summary>
    public bool Drains(int outlet, int other) => _enter[outlet] <= _enter[other] && _enter[other] < _leave[outlet];

    /// <summary>Totals from local values: each outlet's own with those of all outlets above it, one addition an outlet.</summary>
    public T[] Accumulate<T>(IReadOnlyList<T> local, Func<T, T, T> add)
    {
        ArgumentNullException.ThrowIfNull(local);
        ArgumentNullException.ThrowIfNull(add);
        var total = local.ToArray();
        foreach (var k in _upstreamFirst)
            if (_parent[k] >= 0) total[_parent[k]] = add(total[_parent[k]], total[k]);
        return total;
    }
}
