using GeoCulvert.Design.Basis;

namespace GeoCulvert.Design.Watersheds;

/// <summary>The findings this room can raise; codes are stable.</summary>
public static class WatershedFindings
{
    /// <summary>The watershed touches the end of the terrain.</summary>
    public static readonly FindingCode EdgeContact = new(
        "watershed-edge-contact", Severity.Warning,
        "The watershed touches the edge of the terrain model or a part of it without values, so its area is a lower bound.",
        "Extend the terrain model beyond the divide, or confirm that no land beyond it drains here.");

    /// <summary>The watershed touches nodata, but at corners of cells only.</summary>
    public static readonly FindingCode CornerContact = new(
        "watershed-corner-contact", Severity.Warning,
        "The watershed touches a part of the terrain model without values, though only at corners of cells; water may enter there diagonally.",
        "Look at the place on the map; fill the gap in the terrain model, or confirm that no land there drains here.");

    /// <summary>Only a few cells.</summary>
    public static readonly FindingCode Tiny = new(
        "watershed-tiny", Severity.Warning,
        "The watershed has so few cells that its area and slope are uncertain.",
        "Check that the crossing lies on the stream, or use a finer terrain model.");

    /// <summary>Ponds and closed depressions hold back water.</summary>
    public static readonly FindingCode Storage = new(
        "watershed-storage", Severity.Note,
        "Part of the watershed drains only through depressions that were filled or opened; peak flows may be lower than computed.",
        "Check on the map whether these depressions are real, and whether a method that allows for storage applies.");

    /// <summary>Part of the path has no fall.</summary>
    public static readonly FindingCode FlowPathAdverse = new(
        "flow-path-not-falling", Severity.Warning,
        "The longest flow path does not fall between 10 and 85 % of its length on the untouched terrain.",
        "Check the terrain and the flow path; give the slope or the time of concentration.");
}
