using GeoCulvert.Design.Basis;

namespace GeoCulvert.Design.Hydrology;

/// <summary>What a method for time of concentration may use besides the catchment.</summary>
/// <param name="Rainfall">Rainfall; null when there is none.</param>
/// <param name="TwoYear24HourDepthMm">2-year 24-hour depth, mm; null to take it from <paramref name="Rainfall"/>.</param>
/// <param name="ReturnPeriodYr">Return period, for methods that use the storm's own intensity; null for the others.</param>
public sealed record TimeOfConcentrationContext(IRainfall? Rainfall = null, double? TwoYear24HourDepthMm = null, double? ReturnPeriodYr = null);

/// <summary>A piece of the flow path with its own travel time.</summary>
/// <param name="Kind">"sheet", "shallow" or "channel".</param>
/// <param name="FromM">Where it begins, m from the divide.</param>
/// <param name="ToM">Where it ends, m from the divide.</param>
/// <param name="SlopeMPerM">Slope that was used, m/m.</param>
/// <param name="Surface">Cover or section that was used.</param>
/// <param name="VelocityMPerS">Velocity, m/s.</param>
/// <param name="TimeMin">Travel time, min.</param>
/// <param name="Formula">The formula with the numbers put in.</param>
public sealed record TravelSegment(
    string Kind, double FromM, double ToM, double SlopeMPerM, string Surface, double VelocityMPerS, double TimeMin, string Formula);

/// <summary>One method's time of concentration with all it was made of.</summary>
/// <param name="Method">Name of the method.</param>
/// <param name="TimeMin">Time of concentration, min; null when the method could not be computed (see the findings).</param>
/// <param name="Segments">Pieces of the flow path; empty for methods without them.</param>
/// <param name="Steps">The calculation, line by line.</param>
/// <param name="Findings">Doubts.</param>
public sealed record TimeOfConcentration(
    string Method, double? TimeMin, IReadOnlyList<TravelSegment> Segments, IReadOnlyList<Step> Steps, IReadOnlyList<Finding> Findings)
{
    /// <summary>A method that could not be computed, and why.</summary>
    public static TimeOfConcentration Missing(string method, string what) =>
        new(method, null, [], [], [HydrologyFindings.InputMissing.With($"{method}: {what}")]);
}

/// <summary>A method for the time of concentration.</summary>
public interface ITimeOfConcentration
{
    /// <summary>Stable name, as in the project file: <c>kirpich</c>, <c>nrcs-velocity</c>.</summary>
    string Name { get; }

    /// <summary>Computes the time of concentration; a missing figure is a finding, not an exception.</summary>
    TimeOfConcentration Compute(Catchment catchment, TimeOfConcentrationContext context);
}
