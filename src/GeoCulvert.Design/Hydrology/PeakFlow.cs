using GeoCulvert.Design.Basis;

namespace GeoCulvert.Design.Hydrology;

/// <summary>What a flow method may use besides the catchment.</summary>
/// <param name="Rainfall">Rainfall; null when there is none.</param>
/// <param name="TimeOfConcentrationMin">The chosen time of concentration, min; null when there is none.</param>
/// <param name="GivenIntensityMmPerH">An intensity given outright, mm/h; goes before the rainfall table.</param>
public sealed record PeakFlowContext(IRainfall? Rainfall = null, double? TimeOfConcentrationMin = null, double? GivenIntensityMmPerH = null);

/// <summary>A peak flow with all it was made of.</summary>
/// <param name="Method">Name of the method.</param>
/// <param name="ReturnPeriodYr">Return period, years.</param>
/// <param name="FlowM3PerS">Peak flow, m3/s; null when it could not be computed (see the findings), never NaN and never negative.</param>
/// <param name="LowerM3PerS">Lower bound of the flow, m3/s; null when the method gives none.</param>
/// <param name="UpperM3PerS">Upper bound of the flow, m3/s; null when the method gives none.</param>
/// <param name="Steps">The calculation, line by line.</param>
/// <param name="Findings">Doubts.</param>
public sealed record PeakFlow(
    string Method, double ReturnPeriodYr, double? FlowM3PerS, double? LowerM3PerS, double? UpperM3PerS,
    IReadOnlyList<Step> Steps, IReadOnlyList<Finding> Findings)
{
    /// <summary>A method that could not be computed, and why.</summary>
    public static PeakFlow Missing(string method, double returnPeriodYr, string what) =>
        new(method, returnPeriodYr, null, null, null, [], [HydrologyFindings.InputMissing.With($"{method}: {what}")]);
}

/// <summary>A method for the peak flow of a catchment.</summary>
public interface IPeakFlowMethod
{
    /// <summary>Stable name, as in the project file: <c>rational</c>, <c>regression</c>, <c>given</c>.</summary>
    string Name { get; }

    /// <summary>Computes the peak flow; a missing figure is a finding, not an exception.</summary>
    PeakFlow Compute(Catchment catchment, double returnPeriodYr, PeakFlowContext context);
}
