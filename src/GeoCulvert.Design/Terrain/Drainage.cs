using GeoCulvert.Design.Basis;

namespace GeoCulvert.Design.Terrain;

/// <summary>A terrain model that drains: every valid cell has a way to an outlet.</summary>
/// <param name="Elevation">The untouched elevations, m; NaN is nodata.</param>
/// <param name="Filled">The filled surface, m.</param>
/// <param name="Direction">Flow directions.</param>
/// <param name="Accumulation">Cells drained by each cell, itself included.</param>
/// <param name="Findings">What was changed, and doubts.</param>
public sealed record DrainedTerrain(
    Grid<float> Elevation, FilledSurface Filled, Grid<byte> Direction, Grid<int> Accumulation, IReadOnlyList<Finding> Findings);

/// <summary>Codes of the terrain room.</summary>
public static class TerrainFindings
{
    /// <summary>Nothing to work on.</summary>
    public static readonly FindingCode NoData = new(
        "terrain-without-values",
        Severity.Error,
        "The terrain model holds no elevation at all in the area of work.",
        "Check its coordinate system, extent and nodata value.");

    /// <summary>Depressions were filled.</summary>
    public static readonly FindingCode DepressionsFilled = new(
        "depressions-filled",
        Severity.Note,
        "Depressions of the terrain model were filled so that water leaves them.",
        "Compare the filled area and volume with lakes, closed basins and road embankments you know of.");

    /// <summary>Much was filled.</summary>
    public static readonly FindingCode MuchFilled = new(
        "depressions-large",
        Severity.Warning,
        "A large share of the terrain model lay in depressions and was filled.",
        "Look for embankments that dam the terrain model, closed basins or errors in it before relying on areas.");
}

/// <summary>The terrain leg as one step.</summary>
public static class Drainage
{
    /// <summary>Share of valid cells raised above which <see cref="TerrainFindings.MuchFilled"/> is raised (common practice).</summary>
    public const double MuchFilledShare = 0.05;

    /// <summary>Fills, resolves directions and counts.</summary>
    /// <param name="elevation">Elevations, m; NaN is nodata. Kept, not changed.</param>
    /// <param name="forced">Ways that water is made to take (<see cref="ForcedPaths"/>); null for none.</param>
    /// <param name="progress">Share done, 0-1.</param>
    /// <param name="cancel">Stops the work.</param>
    public static DrainedTerrain Solve(
        Grid<float> elevation, IReadOnlyList<int[]>? forced = null, IProgress<double>? progress = null, CancellationToken cancel = default)
    {
        ArgumentNullException.ThrowIfNull(elevation);

        // One array of 4 bytes a cell serves in turn as labels of pits, places of flat cells and the counts.
        var shared = new int[elevation.Cells.Length];
        var filled = DepressionFilling.Fill(elevation, shared, cancel);
        cancel.ThrowIfCancellationRequested();
        progress?.Report(0.5);
        var direction = FlowDirections.Resolve(filled.Surface, shared);
        if (forced is { Count: > 0 }) ForcedPaths.Apply(direction, filled.Surface, forced);
        cancel.ThrowIfCancellationRequested();
        progress?.Report(0.8);
        var accumulation = FlowAccumulation.Count(direction, elevation, shared);
        progress?.Report(1);
        return new DrainedTerrain(elevation, filled, direction, accumulation, Findings(elevation, filled));
    }

    private static List<Finding> Findings(Grid<float> elevation, FilledSurface filled)
    {
        long valid = 0;
        foreach (var z in elevation.Cells)
        {
            if (!float.IsNaN(z)) valid++;
        }

        if (valid == 0) return [TerrainFindings.NoData.With($"none of {elevation.Frame.Columns} x {elevation.Frame.Rows} cells has a value")];
        if (filled.RaisedCells == 0) return [];
        var share = (double)filled.RaisedCells / valid;
        var kind = share > MuchFilledShare ? TerrainFindings.MuchFilled : TerrainFindings.DepressionsFilled;
        return
        [
            kind.With(
                $"{filled.RaisedCells * elevation.Frame.CellAreaM2 / 1e4:0.0} ha ({100 * share:0.0} % of the terrain) raised by up to {filled.DeepestM:0.00} m, {filled.VolumeM3:0} m3",
                share, MuchFilledShare),
        ];
    }
}
