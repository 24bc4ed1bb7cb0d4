using System.Globalization;
using GeoCulvert.Design.Basis;
using GeoCulvert.Design.Terrain;

namespace GeoCulvert.Layers;

/// <summary>Which plane a terrain model is worked in, and what is said of one that is not true to size.</summary>
internal static class PlaneChoice
{
    /// <summary>The named system; else the model's own plane where it is true enough; else the UTM zone of its middle.</summary>
    /// <param name="source">The terrain model.</param>
    /// <param name="named">System that the project names, or null.</param>
    /// <param name="from">The model's own system, without a vertical part.</param>
    /// <param name="findings">What is to be said is added here.</param>
    public static Crs Of(RasterSource source, Crs? named, Crs from, List<Finding> findings)
    {
        if (named is not null) return named.Horizontal();
        if (from.IsProjected)
        {
            var scale = ScaleOfPlane.Over(Bounds(source, from.LinearUnitM), from);
            if (scale is not null && Worst(scale) <= ScaleOfPlane.LargestShare) return from.Horizontal(); // a copy: the source closes its own
            findings.Add(LayerFindings.PlaneLeft.With(
                $"{source.Path}: in {from.Label} {(scale is null ? "part of it has no place on the ellipsoid" : Errors(scale))}; it is worked in the UTM zone of its middle instead",
                scale is null ? null : Worst(scale),
                ScaleOfPlane.LargestShare));
        }

        return Utm(source, from);
    }

    /// <summary>The scale of the plane over a terrain; a plane that is far from true is refused, one that is somewhat off is said.</summary>
    /// <exception cref="InputException">No study is made in this plane.</exception>
    public static PlaneScale Judge(GridFrame frame, Crs plane, string path, bool isNamed, List<Finding> findings)
    {
        var scale = ScaleOfPlane.Over(frame, plane);
        if (scale is null || Worst(scale) > ScaleOfPlane.LargestShare)
        {
            throw new InputException(
                isNamed ? "[terrain] working_crs" : path,
                $"{plane.Label}, where {(scale is null ? "part of the terrain has no place on the ellipsoid" : Errors(scale))}",
                string.Create(CultureInfo.InvariantCulture, $"a projected system within {ScaleOfPlane.LargestShare * 100:0.#} % of true size over the whole terrain, or a smaller terrain model"));
        }

        if (Worst(scale) > ScaleOfPlane.DoubtfulShare)
            findings.Add(LayerFindings.PlaneOff.With($"in {plane.Label} {Errors(scale)}", Worst(scale), ScaleOfPlane.DoubtfulShare));
        return Worst(scale) <= ScaleOfPlane.SmallShare ? PlaneScale.None : scale;
    }

    private static double Worst(PlaneScale scale) => Math.Max(scale.LargestAreaErrorShare, scale.LargestLengthErrorShare);

    private static string Errors(PlaneScale scale) => string.Create(
        CultureInfo.InvariantCulture, $"areas are off by up to {scale.LargestAreaErrorShare * 100:0.###} % and lengths by up to {scale.LargestLengthErrorShare * 100:0.###} %");

    private static GridFrame Bounds(RasterSource source, double unit)
    {
        var g = source.GeoTransform;
        var corners = new[] { (0, 0), (source.Columns, 0), (0, source.Rows), (source.Columns, source.Rows) }
            .Select(p => (X: (g[0] + (g[1] * p.Item1) + (g[2] * p.Item2)) * unit, Y: (g[3] + (g[4] * p.Item1) + (g[5] * p.Item2)) * unit)).ToArray();
        double west = corners.Min(c => c.X), north = corners.Max(c => c.Y);
        return new GridFrame(1, 1, west, north, corners.Max(c => c.X) - west, north - corners.Min(c => c.Y));
    }

    private static Crs Utm(RasterSource source, Crs crs)
    {
        var g = source.GeoTransform;
        double[] x = [g[0] + (g[1] * source.Columns / 2) + (g[2] * source.Rows / 2)], y = [g[3] + (g[4] * source.Columns / 2) + (g[5] * source.Rows / 2)];
        using var wgs84 = Crs.Parse("EPSG:4326");
        try
        {
            using var transform = new CrsTransform(crs, wgs84);
            transform.Apply(x, y);
        }
        catch (GdalException e)
        {
            throw new InputException(source.Path, $"a middle that has no longitude and latitude ({e.Message})", $"a place that {crs.Label} reaches; if the file's coordinate system is wrong, mend it there");
        }

        return Crs.UtmFor(x[0], y[0]);
    }
}
