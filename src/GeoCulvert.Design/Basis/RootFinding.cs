using MathNet.Numerics.RootFinding;

namespace GeoCulvert.Design.Basis;

/// <summary>Bracketed root search, the only way the program inverts a function.</summary>
public static class RootFinding
{
    /// <summary>Tolerance of every inverse: of the root itself when the bracket is positive, else of the bracket's larger end.</summary>
    public const double RelativeTolerance = 1e-10;

    // The library also stops when the function value itself is below the tolerance, in whatever unit that is; a function scaled up this far
    // never is, so that only the width of the bracket counts.
    private const double Scale = 1e60;

    /// <summary>Finds x in [low, high] with f(x) = 0 by Brent's method (Brent 1973).</summary>
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
        // A positive bracket of many magnitudes is first halved in logarithm, so that a small root is as exact as a large one.
        while (low > 0 && high > 4 * low)
        {
            var middle = Math.Sqrt(low * high);
            var atMiddle = f(middle);
            if (atMiddle == 0) return middle;
            if (Math.Sign(atMiddle) == Math.Sign(atLow)) (low, atLow) = (middle, atMiddle);
            else (high, atHigh) = (middle, atMiddle);
        }

        var scale = Scale / Math.Max(Math.Abs(atLow), Math.Abs(atHigh));
        var accuracy = RelativeTolerance * Math.Max(Math.Abs(low), Math.Abs(high));
        // The library asks for the ends again: they are known.
        double Scaled(double x) => scale * (x == low ? atLow : x == high ? atHigh : f(x));
        return Brent.TryFindRoot(Scaled, low, high, accuracy, 200, out var root)
            ? root
            : throw new InvalidOperationException($"Root search on [{low:R}, {high:R}] did not converge.");
    }
}
