using MathNet.Numerics.RootFinding;

namespace GeoCulvert.Design.Basis;

/// <summary>Bracketed root search, the only way the program inverts a function.</summary>
public static class RootFinding
{
    /// <summary>Relative tolerance of every inverse, of the larger end of the bracket.</summary>
    public const double RelativeTolerance = 1e-10;

    /// <summary>Finds x in [low, high] with f(x) = 0 by Brent's method (Brent 1973), to 1e-10 of the bracket's larger end.</summary>
    /// <param name="f">Continuous function with a change of sign on the bracket.</param>
    /// <param name="low">Lower end.</param>
    /// <param name="high">Upper end.</param>
    /// <returns>The root.</returns>
    /// <exception cref="InvalidOperationException">There is no change of sign, or the search did not converge (a programmer's error).</exception>
    public static double Bracketed(Func<double, double> f, double low, double high)
    {
        ArgumentNullException.ThrowIfNull(f);
        double atLow = f(low), atHigh = f(high);
        if (atLow == 0) return low;
        if (atHigh == 0) return high;
        if (double.IsNaN(atLow) || double.IsNaN(atHigh) || Math.Sign(atLow) == Math.Sign(atHigh))
            throw new InvalidOperationException($"No change of sign on [{low:R}, {high:R}]: {atLow:R} and {atHigh:R}.");
        var accuracy = RelativeTolerance * Math.Max(Math.Abs(low), Math.Abs(high));
        return Brent.TryFindRoot(f, low, high, accuracy, 200, out var root)
            ? root
            : throw new InvalidOperationException($"Root search on [{low:R}, {high:R}] did not converge.");
    }
}
