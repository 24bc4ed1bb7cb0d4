using GeoCulvert.Design.Basis;
using NetTopologySuite.Geometries;

namespace GeoCulvert.Design.Crossings;

/// <summary>How a crossing came to be.</summary>
public enum CrossingOrigin
{
    /// <summary>Found where the road meets a stream.</summary>
    Found,

    /// <summary>Given as a point.</summary>
    Given,

    /// <summary>Found where water is let through an embankment of the terrain model, with less area than a stream.</summary>
    Opening,

    /// <summary>Found at a low point of the road, with less area than a stream: a cross-drain.</summary>
    LowPoint,

    /// <summary>Placed to relieve a long ditch.</summary>
    DitchRelief,
}

/// <summary>A road over a culvert.</summary>
/// <param name="Road">The road.</param>
/// <param name="StationM">Its station, m.</param>
/// <param name="AlongM">Distance along the flow path from the crossing's point, m; negative upstream.</param>
/// <param name="Cell">The cell whose step downstream meets its centreline.</param>
public sealed record RoadOver(RoadAlignment Road, double StationM, double AlongM, int Cell);

/// <summary>A place where water crosses a road.</summary>
/// <param name="Id">"RD9 12+340", or the id of the given point; unique in a run.</param>
/// <param name="Origin">Found or given.</param>
/// <param name="Point">Where the flow path meets the centreline; the outlet cell's centre when there is no road in reach.</param>
/// <param name="OutletCell">Row-major index of the cell just upstream of the meeting: the watershed ends here.</param>
/// <param name="AccumulationCells">Cells drained by the outlet cell, itself included, and by those of other arms.</param>
public sealed record Crossing(string Id, CrossingOrigin Origin, Coordinate Point, int OutletCell, long AccumulationCells)
{
    /// <summary>The cells of all meetings of the stream with the road here; the outlet cell alone for most.</summary>
    public IReadOnlyList<int> MeetingCells { get; init; } = [OutletCell];

    /// <summary>Outlet cells of the other arms of a stream that passes this culvert in several; their land is part of the watershed. Empty for most.</summary>
    public IReadOnlyList<int> OtherArms { get; init; } = [];

    /// <summary>The cell whose step downstream meets the centreline at <see cref="Point"/>; the outlet cell lies further up where the culvert also passes under roads upstream.</summary>
    public int MeetingCell { get; init; } = OutletCell;

    /// <summary>All roads that this culvert passes under, from upstream, each with its distance along the flow path from <see cref="Point"/> (negative upstream), m.</summary>
    public IReadOnlyList<RoadOver> Over { get; init; } = [];

    /// <summary>The opening of the terrain model that the flow passes here; null where the terrain was open.</summary>
    public EmbankmentOpening? Opening { get; init; }

    /// <summary>The road; null for a given point without a road in reach.</summary>
    public RoadAlignment? Road { get; init; }

    /// <summary>Station along the road, m; null without a road.</summary>
    public double? StationM { get; init; }

    /// <summary>Direction of the flow through the crossing, degrees clockwise from grid north; null where the outlet cell drains nowhere.</summary>
    public double? FlowAzimuthDeg { get; init; }

    /// <summary>Angle between the flow and the perpendicular of the road, degrees, 0-90; null without a road or a flow direction.</summary>
    public double? SkewDeg { get; init; }

    /// <summary>Whether the flow path itself meets the centreline at <see cref="Point"/>; false where the nearest point of the road stands in.</summary>
    public bool MeetsRoad { get; init; }

    /// <summary>How often the stream meets this road here; more than one when it runs along the road or braids.</summary>
    public int MeetingCount { get; init; } = 1;

    /// <summary>The given point; null for a found crossing.</summary>
    public Coordinate? GivenPoint { get; init; }

    /// <summary>Distance from the given point to the outlet cell's centre, m; 0 for a found crossing.</summary>
    public double MovedM { get; init; }

    /// <summary>Doubts about this crossing.</summary>
    public IReadOnlyList<Finding> Findings { get; init; } = [];
}
