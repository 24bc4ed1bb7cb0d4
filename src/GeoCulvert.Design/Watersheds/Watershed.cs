using GeoCulvert.Design.Basis;
using NetTopologySuite.Geometries;

namespace GeoCulvert.Design.Watersheds;

/// <summary>What is known of the land above a crossing, or of its local part. No smoothing: figures are those of the cells.</summary>
/// <param name="AreaM2">Sum over the cells of their true areas, m2: cells times the area of a cell where the plane is taken as true.</param>
/// <param name="Cells">Number of cells.</param>
/// <param name="Outline">Polygon in the plane; perimeter and edge contact, true lengths.</param>
public sealed record WatershedCharacteristics(double AreaM2, long Cells, WatershedOutline Outline)
{
    /// <summary>Mean of the cells' centres; null without cells. May lie outside a bent watershed.</summary>
    public Coordinate? Centroid { get; init; }

    /// <summary>Longest flow path; null where it was not asked for or the watershed has no cell.</summary>
    public FlowPath? LongestFlowPath { get; init; }

    /// <summary>Mean elevation of the untouched terrain, m.</summary>
    public double? MeanElevationM { get; init; }

    /// <summary>Least elevation, m.</summary>
    public double? LeastElevationM { get; init; }

    /// <summary>Largest elevation, m.</summary>
    public double? LargestElevationM { get; init; }

    /// <summary>Largest less least elevation, m.</summary>
    public double? ReliefM => LargestElevationM - LeastElevationM;

    /// <summary>Mean over the cells of the slope of the ground (see <see cref="GroundSlope"/>), m/m.</summary>
    public double? MeanBasinSlopeMPerM { get; init; }

    /// <summary>Square of the longest flow path by the area, no unit; null without a path. 1 is compact, 10 is long and narrow.</summary>
    public double? ShapeFactor => LongestFlowPath is { LengthM: > 0 } path && AreaM2 > 0 ? path.LengthM * path.LengthM / AreaM2 : null;

    /// <summary>Share of the cells that conditioning raised, 0-1: closed depressions, real or not; null when not known.</summary>
    public double? FilledShare { get; init; }

    /// <summary>Cells with a diagonal neighbour in the grid that has no terrain. Corners have no length: where sides have no contact, this is the only sign of it.</summary>
    public long CornerContactCount { get; init; }

    /// <summary>Share of the perimeter beyond which there is no terrain, 0-1.</summary>
    public double EdgeContactShare => Outline.EdgeContactShare;
}

/// <summary>The watershed of one outlet.</summary>
/// <param name="Outlet">Index of the outlet.</param>
/// <param name="ParentOutlet">The next outlet downstream; -1 for none.</param>
/// <param name="Local">Between this outlet and those upstream.</param>
/// <param name="Total">All land above the outlet.</param>
/// <param name="Findings">Doubts, not yet tied to a crossing.</param>
public sealed record Watershed(int Outlet, int ParentOutlet, WatershedCharacteristics Local, WatershedCharacteristics Total, IReadOnlyList<Finding> Findings);
