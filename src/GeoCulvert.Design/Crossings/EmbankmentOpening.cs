using GeoCulvert.Design.Basis;
using NetTopologySuite.Geometries;

namespace GeoCulvert.Design.Crossings;

/// <summary>Why an embankment was opened.</summary>
public enum OpeningReason
{
    /// <summary>A culvert is known there: an inventoried line.</summary>
    KnownCulvert,

    /// <summary>A crossing is given there.</summary>
    GivenCrossing,

    /// <summary>Water ponds behind the embankment in the terrain model.</summary>
    Ponding,

    /// <summary>A stream is turned along the embankment in the terrain model.</summary>
    Diversion,

    /// <summary>A long ditch is relieved by a rule of spacing.</summary>
    DitchRelief,
}

/// <summary>Which embankments may be opened.</summary>
public enum OpeningScope
{
    /// <summary>At known culverts, given crossings, and where a search along the roads finds a dam.</summary>
    Search,

    /// <summary>At known culverts and given crossings only.</summary>
    Known,

    /// <summary>Nowhere.</summary>
    None,
}

/// <summary>A culvert that is known to be there.</summary>
/// <param name="Id">Its name.</param>
/// <param name="From">One end, m.</param>
/// <param name="To">The other end, m; which one is upstream is taken from the terrain. An end with z carries the invert.</param>
public sealed record KnownCulvert(string Id, Coordinate From, Coordinate To)
{
    /// <summary>Both ends, the one nearer to a place upstream first.</summary>
    public (Coordinate Inlet, Coordinate Outlet) Ends(Coordinate upstream)
    {
        ArgumentNullException.ThrowIfNull(upstream);
        return From.Distance(upstream) <= To.Distance(upstream) ? (From, To) : (To, From);
    }
}

/// <summary>Settings of opening embankments. All defaults are own rules.</summary>
public sealed record OpeningSettings
{
    /// <summary>Which embankments may be opened.</summary>
    public OpeningScope Scope { get; init; } = OpeningScope.Search;

    /// <summary>Longest opening, m, between the ends in plan.</summary>
    public double LongestM { get; init; } = 80;

    /// <summary>Deepest opening below the terrain model, m.</summary>
    public double DeepestM { get; init; } = 12;

    /// <summary>Smallest depth of water behind an embankment for which it counts as a dam, m.</summary>
    public double SmallestPondM { get; init; } = 0.3;

    /// <summary>Drainage area from which water ponded behind an embankment is let through, m2.</summary>
    public double PondAreaM2 { get; init; } = 1e4;

    /// <summary>Drainage area from which a stream turned along an embankment is let through, m2.</summary>
    public double StreamAreaM2 { get; init; } = 1e5;

    /// <summary>Roads whose centrelines follow each other within this distance plus half their widths are one way under, m.</summary>
    public double TogetherM { get; init; } = 30;

    /// <summary>Level ground of this area counts as a water surface, m2: a lake with a way out is not opened.</summary>
    public double LakeAreaM2 { get; init; } = 1000;

    /// <summary>Area taken in by one opening above which a finding is raised, m2.</summary>
    public double LargeAreaM2 { get; init; } = 1e6;

    /// <summary>Distance along the road from which a stream that follows it counts as turned, m; null for the larger of 30 m and three road widths.</summary>
    public double? TurnedM { get; init; }

    /// <summary>Longest stretch of road without a way under, m; where it is longer a ditch relief is placed. Null for none.</summary>
    public double? ReliefSpacingM { get; init; }

    /// <summary>Solves of the whole terrain at most, the first included.</summary>
    public int MostRounds { get; init; } = 6;
}

/// <summary>One opening of an embankment in the terrain model.</summary>
/// <param name="Line">From the upstream to the downstream end, with the bed's elevation, m.</param>
/// <param name="Cells">Row-major cells of the terrain, upstream end first.</param>
/// <param name="BedM">Elevation given to each of the cells, m.</param>
/// <param name="Reason">Why.</param>
/// <param name="Road">The first road over it.</param>
public sealed record EmbankmentOpening(LineString Line, int[] Cells, float[] BedM, OpeningReason Reason, RoadAlignment Road)
{
    /// <summary>Name of the known culvert or given crossing; null when found by search.</summary>
    public string? KnownId { get; init; }

    /// <summary>The known culvert; null without one.</summary>
    public KnownCulvert? Known { get; init; }

    /// <summary>All roads over it, in order from the upstream end.</summary>
    public required IReadOnlyList<RoadAlignment> Roads { get; init; }

    /// <summary>Station of the first road, m.</summary>
    public required double StationM { get; init; }

    /// <summary>Length between the ends in plan, m.</summary>
    public double LengthM => Line.Length;

    /// <summary>Largest depth below the terrain model, m.</summary>
    public required double DepthM { get; init; }

    /// <summary>Volume taken out of the terrain model, m3.</summary>
    public required double VolumeM3 { get; init; }

    /// <summary>Angle between the opening and the perpendicular of the first road, degrees.</summary>
    public required double SkewDeg { get; init; }

    /// <summary>Depth of the water behind the embankment in the untouched terrain model at the upstream end, m.</summary>
    public double PondDepthM { get; init; }

    /// <summary>Whether the upstream end is a water surface.</summary>
    public bool IsLake { get; init; }

    /// <summary>Area that drains to the downstream end in the untouched terrain model, m2.</summary>
    public double AreaBeforeM2 { get; init; }

    /// <summary>Area that drains to the downstream end with all openings, m2.</summary>
    public double AreaAfterM2 { get; init; }

    /// <summary>Reason in words.</summary>
    public string ReasonText => Reason switch
    {
        OpeningReason.KnownCulvert => $"known culvert {KnownId}",
        OpeningReason.GivenCrossing => $"given crossing {KnownId}",
        OpeningReason.Ponding => $"water ponds {PondDepthM:0.0} m deep behind the embankment",
        OpeningReason.DitchRelief => "relief of a long ditch by the rule of spacing",
        _ => "a stream is turned along the embankment",
    };
}

/// <summary>Codes of opening embankments.</summary>
public static class OpeningFindings
{
    /// <summary>Opened at a known place.</summary>
    public static readonly FindingCode OpenedAtKnown = new(
        "embankment-opened", Severity.Note,
        "The road dams the terrain model; it was opened at a known culvert or given crossing.",
        "Check length and depth of the opening against the culvert.");

    /// <summary>Opened by search.</summary>
    public static readonly FindingCode OpenedBySearch = new(
        "embankment-opened-by-search", Severity.Warning,
        "The road dams the terrain model; it was opened here, and no known culvert explains it.",
        "Check on site or in the inventory that water passes here; else leave it shut ([terrain] openings = \"known\").");

    /// <summary>An opening takes in a large area.</summary>
    public static readonly FindingCode TakesLargeArea = new(
        "opening-takes-large-area", Severity.Warning,
        "The opening of the embankment leads a large area through that went elsewhere in the untouched terrain model.",
        "Look at both watersheds (layers watersheds and untouched_watersheds) before relying on the area.");

    /// <summary>The water behind is a lake.</summary>
    public static readonly FindingCode Lake = new(
        "opening-at-lake", Severity.Warning,
        "The embankment was opened at a water surface that has no other way out in the terrain model.",
        "Check the lake's real outlet; the bed of a culvert lies below the water surface that the terrain model shows.");

    /// <summary>A dam was left shut.</summary>
    public static readonly FindingCode NotOpened = new(
        "dam-not-opened", Severity.Warning,
        "Water is stopped behind the road in the terrain model, and the embankment was not opened.",
        "Give the culvert there ([terrain] culverts), or widen the limits of openings.");

    /// <summary>A known culvert could not be used.</summary>
    public static readonly FindingCode KnownNotUsed = new(
        "known-culvert-not-used", Severity.Warning,
        "A known culvert opens nothing in the terrain model.",
        "Check its ends against the terrain and the road on the map.");

    /// <summary>A ditch relief was placed.</summary>
    public static readonly FindingCode Relief = new(
        "ditch-relief-placed", Severity.Note,
        "The stretch of road without a way under was longer than the spacing asked for, so a ditch relief was placed.",
        "Move it to a fitting place, or change [crossings] relief_spacing.");

    /// <summary>Search stopped at the limit of rounds.</summary>
    public static readonly FindingCode Unfinished = new(
        "openings-unfinished", Severity.Warning,
        "Openings were still being found when the limit of rounds was reached.",
        "Raise the limit of rounds, or give the known culverts.");
}
