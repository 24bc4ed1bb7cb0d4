using System.Globalization;
using GeoCulvert.Design.Basis;

namespace GeoCulvert.Layers;

/// <summary>What can be seen from a raster's head alone that speaks against its being a terrain model in the place it claims.</summary>
internal static class RasterDoubts
{
    private const int Palette = 2, Red = 3, Alpha = 6, ComplexFrom = 8, ComplexTo = 11;

    /// <summary>Everything that speaks against the raster; doubts that do not stop the work are added to the findings.</summary>
    public static IEnumerable<InputProblem> Of(RasterSource source, Crs? crs, List<Finding> findings)
    {
        if (source.ColourInterpretation is >= Palette and <= Alpha)
            yield return new InputProblem(source.Path, source.ColourInterpretation == Palette ? "cells that are numbers of colours" : "cells that are shares of a colour", "elevations; this raster is a picture");
        if (source.DataType is >= ComplexFrom and <= ComplexTo)
            yield return new InputProblem(source.Path, "cells that are complex numbers", "elevations");
        if (source.Bands > 1) findings.Add(LayerFindings.FirstBandUsed.With($"{source.Path} has {source.Bands} bands"));
        if (source.HasGeoTransform && crs is not null)
            foreach (var problem in Place(source, crs)) yield return problem;
    }

    private static IEnumerable<InputProblem> Place(RasterSource source, Crs crs)
    {
        var g = source.GeoTransform;
        if (!g.All(double.IsFinite) || (g[1] * g[5]) - (g[2] * g[4]) == 0)
        {
            yield return new InputProblem(source.Path, $"a geotransform without size ({string.Join(", ", g.Select(v => v.ToString("R", CultureInfo.InvariantCulture)))})", "cells with a width and a height");
            yield break;
        }

        double west = g[0], north = g[3], east = g[0] + (g[1] * source.Columns) + (g[2] * source.Rows), south = g[3] + (g[4] * source.Columns) + (g[5] * source.Rows);
        double farX = Math.Max(Math.Abs(west), Math.Abs(east)), farY = Math.Max(Math.Abs(north), Math.Abs(south));
        var corner = string.Create(CultureInfo.InvariantCulture, $"x {Math.Min(west, east):0.#####} to {Math.Max(west, east):0.#####}, y {Math.Min(south, north):0.#####} to {Math.Max(south, north):0.#####}");
        var where = source.Crs is null ? "[terrain] crs in the project file that" : "a file whose coordinate system";
        double cell = Math.Max(Math.Abs(g[1]), Math.Abs(g[2]));

        // Degrees lie within 360 and 90, and a terrain model's cells are small parts of one (own rule: 0.02 degrees are two kilometres).
        if (crs.IsProjected && farX <= 360 && farY <= 90 && cell <= 0.02)
            yield return new InputProblem(source.Path, $"{corner} in cells of {cell.ToString("0.########", CultureInfo.InvariantCulture)}, which look like degrees, under {crs.Label}, whose unit is the {crs.LinearUnitName}", $"{where} fits its coordinates, for example EPSG:4326 for degrees");
        if (crs.IsGeographic && (farX > 361 || farY > 91))
            yield return new InputProblem(source.Path, $"{corner}, which are no degrees, under {crs.Label}", $"{where} fits its coordinates: a projected one");
    }
}
