using GeoCulvert.Design.Basis;

namespace GeoCulvert.Design.Terrain;

/// <summary>Codes of what is done to a terrain model before water is routed over it.</summary>
public static class ConditioningFindings
{
    /// <summary>Cuts were made.</summary>
    public static readonly FindingCode DepressionsBreached = new(
        "depressions-breached",
        Severity.Note,
        "Depressions of the terrain model were opened by cuts so that water leaves them.",
        "Compare the longest and deepest cuts with culverts, ditches and embankments you know of.");

    /// <summary>Some depressions kept no cut.</summary>
    public static readonly FindingCode BreachingLeft = new(
        "depressions-not-breached",
        Severity.Note,
        "No cut within the stated limits opens some depressions; they are left to filling.",
        "Raise the limits of length and depth where you know a way out, or name closed basins that hold their water.");

    /// <summary>A basin holds its water.</summary>
    public static readonly FindingCode BasinKept = new(
        "closed-basin-kept",
        Severity.Note,
        "A closed basin is kept as it is: what drains into it reaches no crossing.",
        "Check that the basin holds a design flood without spilling; otherwise let it be filled.");

    /// <summary>A named point is in no depression.</summary>
    public static readonly FindingCode BasinPointOutside = new(
        "closed-basin-point-outside",
        Severity.Warning,
        "A point given for a closed basin lies in no depression of the terrain model, so no basin is kept there.",
        "Move the point to the low ground of the basin, or remove it.");

    /// <summary>Two points name one depression.</summary>
    public static readonly FindingCode BasinPointRepeated = new(
        "closed-basin-point-repeated",
        Severity.Note,
        "Several points lie in one depression, which is kept once under the first name.",
        "Nothing is to be done where the basins are one when full; otherwise delineate them apart.");

    /// <summary>A mapped stream was turned.</summary>
    public static readonly FindingCode StreamTurned = new(
        "mapped-stream-turned",
        Severity.Note,
        "A mapped stream is drawn against the terrain and was taken the other way.",
        "Draw the line downstream if this is right; state that lines are drawn downstream if it is not.");

    /// <summary>The direction is not plain.</summary>
    public static readonly FindingCode StreamDirectionDoubtful = new(
        "mapped-stream-direction-doubtful",
        Severity.Warning,
        "The terrain does not tell plainly which way a mapped stream flows, or tells the opposite of what was stated.",
        "Check the direction of the line.");

    /// <summary>The map and the terrain model disagree.</summary>
    public static readonly FindingCode StreamDisagrees = new(
        "mapped-stream-disagrees",
        Severity.Warning,
        "A mapped stream lies away from the drainage of the terrain model along much of its length.",
        "Decide which of the two is right: the map may be old or coarse, the terrain model may hold a pipe's embankment.");

    /// <summary>Part of a line is of no use.</summary>
    public static readonly FindingCode StreamPartly = new(
        "mapped-stream-partly-outside",
        Severity.Note,
        "A mapped stream leaves the terrain model or crosses a gap in it and was used in parts.",
        "Extend the terrain model if the stream matters there.");

    /// <summary>A line is of no use.</summary>
    public static readonly FindingCode StreamNotUsed = new(
        "mapped-stream-not-used",
        Severity.Warning,
        "A mapped stream could not be used.",
        "Correct the line or remove it.");
}
