using GeoCulvert.Design.Basis;

namespace GeoCulvert.Design.Hydrology;

/// <summary>Length and slope of the flow path for the equations, and their range checks.</summary>
internal static class TimeInputs
{
    public const double AcreM2 = 43560 * Units.Foot * Units.Foot, SquareMileM2 = 5280 * Units.Foot * 5280 * Units.Foot;

    /// <summary>Length and slope of the longest flow path, or what is missing.</summary>
    public static (double LengthM, double SlopeMPerM, string? Missing) Path(Catchment catchment, FlowPathSlope which)
    {
        var slope = which == FlowPathSlope.EndToEnd ? catchment.FlowPathEndToEndSlopeMPerM : catchment.FlowPathSlope1085MPerM;
        if (catchment.LongestFlowPathM is not { } length || !(length > 0) || !double.IsFinite(length)) return (0, 0, "no length of the longest flow path");
        if (slope is not { } s || !(s > 0) || !double.IsFinite(s)) return (0, 0, $"no slope of the longest flow path above zero ({slope?.ToString("G4") ?? "none"})");
        return (length, s, null);
    }

    /// <summary>How a slope was taken, for the sheet.</summary>
    public static string Origin(FlowPathSlope which) => which == FlowPathSlope.EndToEnd ? "fall over length" : "between 10 % and 85 % of the length";

    /// <summary>Adds a finding when a figure lies outside its range.</summary>
    public static void Range(List<Finding> findings, string method, string what, double value, double least, double most, double unitSize, string unit)
    {
        if (value >= least && value <= most) return;
        var range = double.IsPositiveInfinity(most) ? $"at least {least / unitSize:G4}" : least <= 0 ? $"at most {most / unitSize:G4}" : $"{least / unitSize:G4} to {most / unitSize:G4}";
        findings.Add(TimeFindings.OutsideRange.With($"{method}: {what} {value / unitSize:G4} {unit} against {range} {unit}".TrimEnd(), value, value < least ? least : most));
    }
}
