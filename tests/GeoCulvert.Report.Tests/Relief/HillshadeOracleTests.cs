using System.Globalization;
using GeoCulvert.Design.Basis;
using GeoCulvert.Design.Terrain;
using GeoCulvert.Report.Relief;

namespace GeoCulvert.Report.Tests.Relief;

/// <summary>Shade of a real gully against a general-purpose library: <c>gdaldem hillshade</c> (see the source column of the file).</summary>
public sealed class HillshadeOracleTests
{
    [Theory]
    [InlineData(1, 3)]
    [InlineData(3, 4)]
    public void AgreesWithTheGeneralPurposeLibrary(double exaggeration, int column)
    {
        using var reader = new StreamReader(typeof(HillshadeOracleTests).Assembly.GetManifestResourceStream("hillshade_gdaldem.csv")!);
        var rows = CsvText.Read(reader.ReadToEnd()).Skip(1).ToList();
        var grid = new Grid<float>(new GridFrame(24, 20, 0, 60, 3, 3));
        for (var i = 0; i < rows.Count; i++)
            grid.Cells[i] = rows[i].Fields[2].Length == 0 ? float.NaN : float.Parse(rows[i].Fields[2], CultureInfo.InvariantCulture);
        var shade = Hillshade.Shade(grid, exaggeration);
        var compared = 0;
        for (var i = 0; i < rows.Count; i++)
        {
            // The library gives no value (0) where a neighbour is missing; its greys are whole numbers.
            var expected = int.Parse(rows[i].Fields[column], CultureInfo.InvariantCulture);
            if (expected == 0) continue;
            Assert.Equal(expected, 1 + (254.0 * shade[i]), 0.75);
            compared++;
        }
        Assert.True(compared > 200, $"{compared} cells compared");
    }
}
