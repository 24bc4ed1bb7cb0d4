using GeoCulvert.Design.Basis;

namespace GeoCulvert.Report.Plots;

/// <summary>Elevation along the longest flow path, from the divide down to the crossing.</summary>
public static class FlowPathPlot
{
    /// <summary>Draws the profile with the line between its 10 and 85 per cent points, counted up from the crossing (common practice).</summary>
    /// <param name="profile">Distance from the divide and elevation, m.</param>
    /// <param name="units">System of the axes.</param>
    /// <param name="title">What the plot shows.</param>
    /// <returns>SVG text for the page.</returns>
    public static string Write(IReadOnlyList<(double DistanceM, double ElevationM)> profile, UnitSystem units, string title)
    {
        ArgumentNullException.ThrowIfNull(profile);
        double Out(double v) => DisplayUnits.FromSi(v, QuantityKind.Length, units);
        var unit = FigureText.Unit(QuantityKind.Length, units);
        var plot = new PlotSvg(title, $"Distance from the divide ({unit})", $"Elevation ({unit})");
        var shown = Thinned(profile, 300);
        plot.Line(shown.Select(p => (Out(p.DistanceM), Out(p.ElevationM))), "c1", "longest flow path");
        if (profile.Count > 1)
        {
            var (start, length) = (profile[0].DistanceM, profile[^1].DistanceM - profile[0].DistanceM);
            var (upper, lower) = (start + (0.15 * length), start + (0.90 * length));
            plot.Line([(Out(upper), Out(At(profile, upper))), (Out(lower), Out(At(profile, lower)))], "c2", "10\u201385 slope");
        }
        return plot.Render(isStandalone: false);
    }

    /// <summary>Elevation at a distance, linear between points.</summary>
    private static double At(IReadOnlyList<(double DistanceM, double ElevationM)> profile, double distance)
    {
        for (var i = 1; i < profile.Count; i++)
        {
            var (a, b) = (profile[i - 1], profile[i]);
            if (distance > b.DistanceM) continue;
            return b.DistanceM <= a.DistanceM ? b.ElevationM : a.ElevationM + ((b.ElevationM - a.ElevationM) * (distance - a.DistanceM) / (b.DistanceM - a.DistanceM));
        }
        return profile[^1].ElevationM;
    }

    private static List<(double DistanceM, double ElevationM)> Thinned(IReadOnlyList<(double DistanceM, double ElevationM)> points, int most)
    {
        if (points.Count <= most) return [.. points];
        return [.. Enumerable.Range(0, most).Select(i => points[(int)((long)i * (points.Count - 1) / (most - 1))])];
    }
}
