namespace GeoCulvert.Design.Hydrology;

/// <summary>Flow against time, straight between its points, zero before the first and after the last.</summary>
/// <param name="TimesMin">Times, min, rising from 0.</param>
/// <param name="FlowsM3PerS">Flow at each time, m3/s.</param>
public sealed record RunoffHydrograph(IReadOnlyList<double> TimesMin, IReadOnlyList<double> FlowsM3PerS)
{
    /// <summary>Largest flow, m3/s.</summary>
    public double PeakM3PerS => FlowsM3PerS.Max();

    /// <summary>Time of the largest flow, min; the first of several.</summary>
    public double TimeToPeakMin
    {
        get
        {
            var peak = PeakM3PerS;
            for (var k = 0; k < FlowsM3PerS.Count; k++)
                if (FlowsM3PerS[k] == peak) return TimesMin[k];
            return 0;
        }
    }

    /// <summary>Volume under the hydrograph, m3.</summary>
    public double VolumeM3
    {
        get
        {
            double sum = 0;
            for (var k = 1; k < TimesMin.Count; k++) sum += (TimesMin[k] - TimesMin[k - 1]) * (FlowsM3PerS[k] + FlowsM3PerS[k - 1]) / 2;
            return 60 * sum;
        }
    }
}
