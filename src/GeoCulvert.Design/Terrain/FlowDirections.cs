namespace GeoCulvert.Design.Terrain;

/// <summary>
/// D8 flow directions on a filled surface: steepest descent by true distance; flats drain toward lower and away from higher ground
/// (Barnes, Lehman and Mulla 2014) without changing an elevation. Ties go to the first code clockwise from north.
/// </summary>
public static class FlowDirections
{
    /// <summary>Directions of every cell; 0 for nodata and for rim cells with nothing lower. On a surface that is not filled, pits keep 0 too.</summary>
    public static Grid<byte> Resolve(Grid<float> filled)
    {
        ArgumentNullException.ThrowIfNull(filled);
        return Resolve(filled, new int[filled.Cells.Length]);
    }

    /// <param name="filled">A surface without depressions.</param>
    /// <param name="scratch">A number for every cell, whatever it holds.</param>
    internal static Grid<byte> Resolve(Grid<float> filled, int[] scratch)
    {
        var direction = new Grid<byte>(filled.Frame);
        var code = direction.Cells;
        SteepestDescent.Compute(filled, code, 0, filled.Frame.Rows);
        new FlatDrainage(filled, code, scratch, 0, filled.Frame.Rows).Drain();
        foreach (ref var c in direction.Cells.AsSpan()) c &= 15;
        return direction;
    }
}
