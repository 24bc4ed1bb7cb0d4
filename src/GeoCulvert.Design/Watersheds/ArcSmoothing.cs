namespace GeoCulvert.Design.Watersheds;

/// <summary>
/// Smooths an arc for drawing (own rule): it is led through the middles of its cell edges and every bend is then cut at a quarter of the way
/// to its neighbours (Chaikin 1974, An algorithm for high-speed curve generation). Ends stay, so arcs still meet at their nodes.
/// <para>
/// Arcs cannot cross or touch afterwards. Between two middles an arc stays in the corner triangle (corner, middle, middle) of the corner
/// between them; no other arc turns there, because a corner of two arcs is a node, and triangles of different corners have at most a middle in
/// common, which one arc owns. Cutting a bend at a middle stays within an eighth of a cell of its own edge, where no other arc comes.
/// </para>
/// A turn moves an eighth of a cell from one side to the other, so a closed line loses about half a cell in all, whatever its length.
/// </summary>
internal static class ArcSmoothing
{
    /// <summary>Arcs between nodes of fewer edges stay along the cells.</summary>
    public const int ShortestArc = 8;

    /// <summary>Closed arcs of fewer edges stay along the cells: half a cell would be much of what is in them.</summary>
    public const int ShortestRing = 20;

    public static (double Column, double Row)[] Smooth(ReadOnlySpan<(int Column, int Row)> corners, bool isClosed)
    {
        var middles = Middles(corners);
        var cut = new List<(double Column, double Row)>((2 * middles.Count) + 2);
        if (!isClosed) cut.Add(corners[0]);
        for (var i = 0; i < middles.Count; i++)
        {
            var at = middles[i];
            var before = i > 0 ? middles[i - 1] : isClosed ? middles[^1] : corners[0];
            var after = i < middles.Count - 1 ? middles[i + 1] : isClosed ? middles[0] : corners[^1];
            if (IsStraight(before, at, after))
            {
                continue;
            }

            cut.Add(Between(at, before));
            cut.Add(Between(at, after));
        }

        cut.Add(isClosed ? cut[0] : corners[^1]);
        return [.. cut];
    }

    private static List<(double Column, double Row)> Middles(ReadOnlySpan<(int Column, int Row)> corners)
    {
        var middles = new List<(double Column, double Row)>();
        for (var i = 1; i < corners.Length; i++)
        {
            var (column, row) = corners[i - 1];
            int across = Math.Sign(corners[i].Column - column), down = Math.Sign(corners[i].Row - row);
            for (; (column, row) != corners[i]; column += across, row += down) middles.Add((column + (across / 2.0), row + (down / 2.0)));
        }

        return middles;
    }

    // Middles lie on half cells: the products are exact.
    private static bool IsStraight((double Column, double Row) a, (double Column, double Row) b, (double Column, double Row) c) =>
        (b.Column - a.Column) * (c.Row - b.Row) == (b.Row - a.Row) * (c.Column - b.Column);

    private static (double Column, double Row) Between((double Column, double Row) at, (double Column, double Row) to) =>
        ((0.75 * at.Column) + (0.25 * to.Column), (0.75 * at.Row) + (0.25 * to.Row));
}
