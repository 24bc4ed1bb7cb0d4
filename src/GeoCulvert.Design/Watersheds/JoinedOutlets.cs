using GeoCulvert.Design.Terrain;

namespace GeoCulvert.Design.Watersheds;

/// <summary>
/// Outlets that belong together: the arms of a stream that pass one culvert without meeting above it. They are labelled one by one and then made one label each.
/// </summary>
internal static class JoinedOutlets
{
    /// <summary>Gives every cell of an arm the label of its first outlet; the outlets left over lose all cells.</summary>
    /// <param name="labels">0 for none, k + 1 for outlet k; changed.</param>
    /// <param name="parent">The next outlet downstream of each; the joined outlets' is that of the first.</param>
    /// <param name="first">For each outlet the first one of its group, itself where it stands alone.</param>
    /// <returns>Parents after joining; outlets left over have their first outlet as parent.</returns>
    public static int[] Join(Grid<int> labels, IReadOnlyList<int> parent, IReadOnlyList<int> first)
    {
        if (Enumerable.Range(0, first.Count).All(k => first[k] == k)) return [.. parent];
        var of = new int[first.Count + 1];
        for (var k = 0; k < first.Count; k++) of[k + 1] = first[k] + 1;
        var cells = labels.Cells;
        for (var i = 0; i < cells.Length; i++) cells[i] = of[cells[i]];

        var joined = new int[parent.Count];
        for (var k = 0; k < joined.Length; k++)
        {
            if (first[k] != k)
            {
                joined[k] = first[k];
                continue;
            }

            // Down to the next outlet that is not one of the own arms.
            var next = parent[k];
            while (next >= 0 && first[next] == k) next = parent[next];
            joined[k] = next < 0 ? -1 : first[next];
        }

        return joined;
    }
}
