using GeoCulvert.Design.Basis;

namespace GeoCulvert.Design.Hydraulics;

/// <summary>
/// A tailwater rating read from a CSV file: a column of flow (<c>flow_m3_s</c> or <c>flow_cfs</c>) and one of elevation (<c>elevation_m</c>, <c>elevation_ft</c>) or of depth above
/// the outlet invert (<c>depth_m</c>, <c>depth_ft</c>).
/// </summary>
/// <param name="Name">File.</param>
/// <param name="IsDepth">Whether levels are depths above the outlet invert.</param>
/// <param name="Points">Flow, m3/s, and elevation or depth, m.</param>
public sealed record TailwaterRatingTable(string Name, bool IsDepth, IReadOnlyList<(double FlowM3PerS, double LevelM)> Points)
{
    private static readonly (string Column, string Unit)[] FlowColumns = [("flow_m3_s", "m3/s"), ("flow_cfs", "cfs")];
    private static readonly (string Column, string Unit)[] LevelColumns = [("elevation_m", "m"), ("elevation_ft", "ft"), ("depth_m", "m"), ("depth_ft", "ft")];

    /// <summary>Largest flow of the table, m3/s; beyond it the last level is held.</summary>
    public double LargestFlowM3PerS => Points[^1].FlowM3PerS;

    /// <summary>Reads the table.</summary>
    /// <exception cref="InputException">A column is missing or there twice, there are fewer than two rows, or flow or level do not rise.</exception>
    public static TailwaterRatingTable Read(string name, string text)
    {
        var table = PublishedTable.Parse(name, text);
        (string Column, string Unit) One((string Column, string Unit)[] columns) => columns.Where(c => table.Has(c.Column)).ToArray() is [var only] ? only
            : throw new InputException($"{name} line 1", $"the columns {string.Join(", ", table.Columns)}", $"one of {string.Join(", ", columns.Select(c => c.Column))}");
        var (flow, level) = (One(FlowColumns), One(LevelColumns));
        var points = new List<(double FlowM3PerS, double LevelM)>();
        foreach (var row in table.Rows)
        {
            var (q, z) = (Units.ToSi(row.Number(flow.Column), flow.Unit), Units.ToSi(row.Number(level.Column), level.Unit));
            if (q < 0) throw new InputException($"{name} line {row.Line}, column {flow.Column}", row.Text(flow.Column), "a flow of 0 or more");
            if (points.Count > 0 && q <= points[^1].FlowM3PerS) throw new InputException($"{name} line {row.Line}, column {flow.Column}", row.Text(flow.Column), "a flow above that of the line before");
            if (points.Count > 0 && z < points[^1].LevelM) throw new InputException($"{name} line {row.Line}, column {level.Column}", row.Text(level.Column), "a level not below that of the line before");
            points.Add((q, z));
        }

        return points.Count >= 2 ? new(name, level.Column.StartsWith("depth", StringComparison.Ordinal), points)
            : throw new InputException(name, $"{points.Count} row(s)", "two rows or more of flow and level");
    }

    /// <summary>The tailwater at an outlet.</summary>
    /// <param name="outletElevationM">Outlet invert, m, from which depths count.</param>
    public RatingTailwater At(double outletElevationM) => IsDepth ? new([.. Points.Select(p => (p.FlowM3PerS, outletElevationM + p.LevelM))]) : new(Points);
}
