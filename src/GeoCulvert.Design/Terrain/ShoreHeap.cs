using System.Runtime.CompilerServices;

namespace GeoCulvert.Design.Terrain;

/// <summary>
/// The shore of a pool: a binary heap of cells by elevation, equal elevations by cell. Elevation and cell are one 64-bit key, so that one
/// comparison orders both.
/// </summary>
internal sealed class ShoreHeap
{
    private ulong[] _keys = new ulong[32];

    /// <summary>Cells on the shore.</summary>
    public int Count { get; private set; }

    /// <summary>The lowest cell.</summary>
    public int Lowest => (int)(uint)_keys[0];

    /// <summary>Forgets every cell.</summary>
    public void Clear() => Count = 0;

    /// <summary>A key that sorts as the elevation does; -0 just below 0.</summary>
    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    private static ulong Key(float z, int cell)
    {
        var bits = BitConverter.SingleToInt32Bits(z);
        return ((ulong)(uint)(bits ^ ((bits >> 31) | int.MinValue)) << 32) | (uint)cell;
    }

    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    public void Push(float z, int cell) => Push(Key(z, cell));

    private void Push(ulong key)
    {
        if (Count == _keys.Length) Array.Resize(ref _keys, Count * 2);
        var keys = _keys;
        var i = Count++;
        while (i > 0)
        {
            var parent = (i - 1) >> 1;
            if (keys[parent] <= key) break;
            keys[i] = keys[parent];
            i = parent;
        }

        keys[i] = key;
    }

    /// <summary>Takes the lowest cell away.</summary>
    public void Drop()
    {
        var keys = _keys;
        var count = --Count;
        var key = keys[count];
        var i = 0;
        while (true)
        {
            var child = (2 * i) + 1;
            if (child >= count) break;
            if (child + 1 < count && keys[child + 1] < keys[child]) child++;
            if (keys[child] >= key) break;
            keys[i] = keys[child];
            i = child;
        }

        keys[i] = key;
    }

    /// <summary>Takes over every cell of another shore.</summary>
    public void Absorb(ShoreHeap other)
    {
        for (var i = 0; i < other.Count; i++) Push(other._keys[i]);
        other.Count = 0;
    }
}
