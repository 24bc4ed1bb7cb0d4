using GeoCulvert.Design.Basis;
using GeoCulvert.Design.Study;

namespace GeoCulvert.Report.Schedule;

/// <summary>A column of the schedule: its heading without unit, what it measures, and how a crossing gets its value in output units.</summary>
/// <param name="Name">snake_case heading; the unit suffix of the system is added.</param>
/// <param name="Kind">What it measures.</param>
/// <param name="Value">A text, a number or null.</param>
public sealed record ScheduleColumn(string Name, QuantityKind Kind, Func<ScheduleRow, object?> Value)
{
    /// <summary>The columns, in order.</summary>
    public static IReadOnlyList<ScheduleColumn> All { get; } =
    [
        Text("road"),
        new("station", QuantityKind.None, r => r.Sheet?.Station ?? ""),
        Number("station", QuantityKind.Length),
        Text("crossing_id"),
        Text("status"),
        Text("culvert"),
        Number("barrels", QuantityKind.None),
        Text("shape"),
        Number("span", QuantityKind.Length),
        Number("rise", QuantityKind.Length),
        Number("length", QuantityKind.Length),
        Number("inlet_elevation", QuantityKind.Length),
        Number("outlet_elevation", QuantityKind.Length),
        new("slope", QuantityKind.Slope, r =>
            (r.Number("inlet_elevation", QuantityKind.Length) - r.Number("outlet_elevation", QuantityKind.Length)) / r.Number("length", QuantityKind.Length)),
        Number("watershed_area", QuantityKind.Area),
        Number("design_return_period", QuantityKind.Years),
        Number("design_flow", QuantityKind.Flow),
        Number("check_flow", QuantityKind.Flow),
        Number("headwater_elevation", QuantityKind.Length),
        new("headwater_limit_elevation", QuantityKind.Length, r => r.HeadwaterLimit),
        new("hw_over_d", QuantityKind.None, r => r.Number("hw_over_d", QuantityKind.None)),
        Number("outlet_velocity", QuantityKind.Velocity),
        Text("control"),
        new("findings", QuantityKind.None, r => (double)r.Findings.Count),
        new("first_finding", QuantityKind.None, r => r.Findings.Count > 0 ? r.Findings[0].Code + ": " + r.Findings[0].Text : ""),
        new("remarks", QuantityKind.None, _ => ReportCaution.Short),
    ];

    /// <summary>Heading with the unit suffix of the system, as in the layers.</summary>
    public string Heading(UnitSystem units) => Name + DisplayUnits.FieldSuffix(Kind, units);

    /// <summary>A figure as printed: rounded as the trade does, "" when there is none; HW/D to 0.01.</summary>
    public string Print(double? value) => value is not { } v || !double.IsFinite(v) ? "" : Name is "hw_over_d" ? FigureText.Decimals(v, 2) : FigureText.Round(v, Kind);

    private static ScheduleColumn Text(string name) => new(name, QuantityKind.None, r => r.Text(name));

    private static ScheduleColumn Number(string name, QuantityKind kind) => new(name, kind, r => r.Number(name, kind));
}
