using GeoCulvert.Design.Basis;
using GeoCulvert.Design.Study;
using GeoCulvert.Report.Page;

namespace GeoCulvert.Report.Schedule;

/// <summary>One crossing of the schedule: what its columns read.</summary>
public sealed class ScheduleRow
{
    private readonly LayerTable crossings;
    private readonly CrossingEntry entry;

    private ScheduleRow(LayerTable crossings, CrossingEntry entry) => (this.crossings, this.entry) = (crossings, entry);

    /// <summary>The sheet of the crossing, or null.</summary>
    public CrossingSheet? Sheet => entry.Sheet;

    /// <summary>Findings on it, worst first.</summary>
    public IReadOnlyList<Finding> Findings => entry.Findings;

    /// <summary>Highest headwater allowed at the design flood, output units, or null.</summary>
    public double? HeadwaterLimit => entry.Headwater.Limit;

    /// <summary>All crossings in order of road and station.</summary>
    public static IReadOnlyList<ScheduleRow> All(StudyReport report)
    {
        var table = LayerTable.Open(report, "crossings");
        return [.. CrossingEntry.All(report, table).Select(e => new ScheduleRow(table, e))];
    }

    /// <summary>A figure of the layer in output units, or null.</summary>
    public double? Number(string name, QuantityKind kind) => entry.Row is null ? null : crossings.Number(entry.Row, name, kind);

    /// <summary>A text of the layer; the sheet's where the layer has no row.</summary>
    public string Text(string name) => entry.Row is not null ? crossings.Text(entry.Row, name) : name switch
    {
        "road" => entry.Sheet?.Road ?? "",
        "crossing_id" => entry.Id,
        "status" => entry.Status,
        "culvert" => entry.Culvert,
        _ => "",
    };
}
