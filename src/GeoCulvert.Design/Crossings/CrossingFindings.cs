using GeoCulvert.Design.Basis;

namespace GeoCulvert.Design.Crossings;

/// <summary>The findings this room can raise; codes are stable.</summary>
public static class CrossingFindings
{
    /// <summary>A given point was moved to the stream.</summary>
    public static readonly FindingCode Moved = new(
        "crossing-moved", Severity.Warning,
        "The given point was moved to the stream by more than the limit.",
        "Check on the map that it is this stream the culvert carries.");

    /// <summary>No stream near a given point.</summary>
    public static readonly FindingCode NoStreamInReach = new(
        "no-stream-in-reach", Severity.Warning,
        "No stream lies within the snap distance of the given point; the cell with the largest drainage area in reach was taken.",
        "Check the point, the snap distance and the area at which a stream begins.");

    /// <summary>A given point lies off the terrain.</summary>
    public static readonly FindingCode OffTerrain = new(
        "crossing-off-terrain", Severity.Error,
        "The given point has no terrain within the snap distance, so nothing was computed for it.",
        "Check the point's coordinate system, or extend the terrain model.");

    /// <summary>Another stream within reach has a very different area.</summary>
    public static readonly FindingCode AreaJump = new(
        "snap-area-jump", Severity.Warning,
        "Another stream within the snap distance drains a very different area.",
        "Check on the map which stream the culvert carries; move the point or shorten the snap distance.");

    /// <summary>The area at the chosen cell differs from the stated one.</summary>
    public static readonly FindingCode StatedAreaDiffers = new(
        "stated-area-differs", Severity.Warning,
        "The drainage area at the crossing differs from the stated one by more than the limit.",
        "Check the point, the stated area and the terrain upstream.");

    /// <summary>Two crossings have one outlet cell.</summary>
    public static readonly FindingCode SharedCell = new(
        "two-crossings-on-one-cell", Severity.Warning,
        "Another crossing lies on the same stream cell, so both have the same watershed.",
        "Keep one of them, or use a finer terrain model.");

    /// <summary>The stream meets the road several times within a short way.</summary>
    public static readonly FindingCode RunsAlong = new(
        "stream-runs-along-road", Severity.Warning,
        "The stream meets the road several times within a short way; one crossing was kept, at the most downstream meeting.",
        "Check on the map where the stream really crosses, and whether it is to be diverted along the road.");

    /// <summary>The stream comes back to the side it came from.</summary>
    public static readonly FindingCode ReturnsToSide = new(
        "stream-returns-to-side", Severity.Warning,
        "The stream meets the road an even number of times and so ends on the side it came from.",
        "Check whether water crosses the road here at all.");

    /// <summary>The barrel would be very skewed.</summary>
    public static readonly FindingCode Skewed = new(
        "crossing-skewed", Severity.Warning,
        "The flow meets the road at a skew above the limit.",
        "Check the culvert's line and length on the map; consider realigning the channel.");

    /// <summary>The barrel is less skewed than the flow.</summary>
    public static readonly FindingCode SkewTurned = new(
        "barrel-turned", Severity.Warning,
        "The flow is more oblique than a barrel is laid; the barrel was turned towards the perpendicular.",
        "Lay out the channel at both ends, or give the skew and the length.");

    /// <summary>No road near a given point.</summary>
    public static readonly FindingCode NoRoadInReach = new(
        "no-road-in-reach", Severity.Warning,
        "No road lies within reach of the given point.",
        "Give the road's line, or the length, inverts and road level of this crossing.");

    /// <summary>The stream through a given point does not meet the road.</summary>
    public static readonly FindingCode StreamMissesRoad = new(
        "stream-misses-road", Severity.Warning,
        "The flow path through the given point does not meet the road within reach; the nearest point of the road stands in.",
        "Check the point against the stream and the road on the map.");

    /// <summary>The parts of a road do not touch.</summary>
    public static readonly FindingCode RoadGap = new(
        "road-gap", Severity.Warning,
        "The parts of the road do not touch; stations run on without counting the gaps.",
        "Join the line if the road is continuous.");

    /// <summary>Bed rises from inlet to outlet.</summary>
    public static readonly FindingCode AdverseBed = new(
        "adverse-bed", Severity.Warning,
        "The bed taken from the terrain does not fall from the inlet to the outlet of the barrel.",
        "Give surveyed inlet and outlet elevations.");

    /// <summary>Bed elevations cannot be measured.</summary>
    public static readonly FindingCode BedUnknown = new(
        "bed-unknown", Severity.Error,
        "The terrain has no elevation along the stream at the barrel's end.",
        "Give the inlet and outlet elevations.");

    /// <summary>Road level taken from the terrain model.</summary>
    public static readonly FindingCode RoadLevelFromDem = new(
        "road-level-from-dem", Severity.Note,
        "The road level was taken from the terrain model under the centreline.",
        "Give a road profile or a line with elevations; a coarse terrain model smooths the embankment away.");

    /// <summary>Road level is unknown.</summary>
    public static readonly FindingCode RoadLevelUnknown = new(
        "road-level-unknown", Severity.Error,
        "There is no road level near the crossing.",
        "Give a road profile, a line with elevations, or the road level of this crossing.");

    /// <summary>Cells wider than the road.</summary>
    public static readonly FindingCode TerrainCoarse = new(
        "terrain-coarse-at-road", Severity.Warning,
        "The cells of the terrain model are wider than the road, so that inverts, length or road level measured on it are rough.",
        "Give inlet, outlet, length and road level from survey or a finer terrain model.");

    /// <summary>No embankment above the bed.</summary>
    public static readonly FindingCode NoFill = new(
        "no-fill-height", Severity.Warning,
        "The road does not stand above the bed at the inlet, so there is no room for a culvert as the terrain shows it.",
        "Give the road level and the inlet elevation.");

    /// <summary>The terrain at the crossing was filled.</summary>
    public static readonly FindingCode FilledAtCrossing = new(
        "embankment-filled", Severity.Warning,
        "The terrain at the crossing was filled by more than the limit, as behind an embankment: flow directions there are made, not measured.",
        "Check the flow path on the map; open the embankment at this crossing.");
}
