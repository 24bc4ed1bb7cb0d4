namespace GeoCulvert.Report.Plots;

/// <summary>Tick marks of an axis at round numbers: steps of 1, 2 or 5 times a power of ten.</summary>
/// <param name="First">First tick, at or below the smallest value.</param>
/// <param name="Step">Distance of ticks.</param>
/// <param name="Count">Number of ticks.</param>
public sealed record AxisTicks(double First, double Step, int Count)
{
    /// <summary>Last tick, at or above the largest value.</summary>
    public double Last => First + ((Count - 1) * Step);

    /// <summary>Ticks that enclose a range with at most about so many steps.</summary>
    public static AxisTicks Enclosing(double low, double high, int steps)
    {
        if (!double.IsFinite(low) || !double.IsFinite(high)) (low, high) = (0, 1);
        if (high - low < 1e-9 * Math.Max(1, Math.Abs(high))) (low, high) = (low - 0.5, high + 0.5);
        var step = RoundUp((high - low) / steps);
        var (first, last) = (Math.Floor((low / step) + 1e-9), Math.Ceiling((high / step) - 1e-9));
        return new AxisTicks(first * step, step, (int)(last - first) + 1);
    }

    /// <summary>The smallest 1, 2 or 5 times a power of ten that is not below a value.</summary>
    public static double RoundUp(double value)
    {
        var power = Math.Pow(10, Math.Floor(Math.Log10(value)));
        var lead = value / power;
        return power * (lead <= 1.000001 ? 1 : lead <= 2.000001 ? 2 : lead <= 5.000001 ? 5 : 10);
    }

    /// <summary>The largest 1, 2 or 5 times a power of ten that is not above a value.</summary>
    public static double RoundDown(double value)
    {
        var power = Math.Pow(10, Math.Floor(Math.Log10(value)));
        var lead = value / power;
        return power * (lead >= 4.999999 ? 5 : lead >= 1.999999 ? 2 : 1);
    }

    /// <summary>Value of a tick.</summary>
    public double At(int index) => First + (index * Step);

    /// <summary>Text of a tick with as many decimals as the step needs.</summary>
    public string Label(int index) => FigureText.Decimals(At(index), Math.Clamp((int)Math.Ceiling(-Math.Log10(Step) - 1e-6), 0, 9));
}
