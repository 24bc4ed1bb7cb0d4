using GeoCulvert.Design.Terrain;

namespace GeoCulvert.Report.Relief;

/// <summary>A shaded relief as a small PNG in light greys, over which a map stays legible; nodata is transparent.</summary>
public static class HillshadePng
{
    private const int Tones = 96;
    private const int Darkest = 118;

    /// <summary>Writes the relief of a terrain.</summary>
    /// <param name="terrain">Elevations in m on a metric north-up frame; NaN is nodata.</param>
    /// <param name="output">Receives the PNG; stays open.</param>
    /// <param name="longestSide">Most pixels along the longer side.</param>
    /// <param name="verticalExaggeration">Factor on the elevations; null chooses one that shows the relief.</param>
    /// <returns>The frame of the picture (its cells are the pixels) and the exaggeration used.</returns>
    public static (GridFrame Frame, double VerticalExaggeration) Write(
        Grid<float> terrain, Stream output, int longestSide = 1600, double? verticalExaggeration = null)
    {
        var coarse = Hillshade.Coarsen(terrain, longestSide);
        var factor = verticalExaggeration ?? Hillshade.ReadableExaggeration(coarse);
        var shade = Hillshade.Shade(coarse, factor);
        var indices = new byte[shade.Length];
        for (var i = 0; i < shade.Length; i++) indices[i] = float.IsNaN(shade[i]) ? (byte)0 : (byte)(1 + (int)Math.Round(shade[i] * (Tones - 1)));
        PngImage.WriteIndexed(output, coarse.Frame.Columns, coarse.Frame.Rows, indices, Palette(), 0);
        return (coarse.Frame, factor);
    }

    private static byte[] Palette()
    {
        var palette = new byte[3 * (Tones + 1)];
        for (var t = 0; t < Tones; t++)
        {
            var grey = (byte)(Darkest + (t * (255 - Darkest) / (Tones - 1)));
            palette.AsSpan(3 * (t + 1), 3).Fill(grey);
        }
        return palette;
    }
}
