using GeoCulvert.Design.Basis;
using GeoCulvert.Design.Terrain;

namespace GeoCulvert.Layers.Tests;

/// <summary>Terrain models that are not as they should be, by hand: each works exactly, is said to be doubtful, or is refused with a word.</summary>
public class OddTerrainTests
{
    private const string Nine = "101 102 103\n104 105 106\n107 108 109";
    private readonly string _folder = Files.NewFolder();

    [Fact]
    public void CellsNeedNotBeSquare()
    {
        var model = Read(Edited(Nine, "EPSG:26912", "0, -10", "0, -25"));
        Assert.Equal((10, 25), (model.Elevation.Frame.CellWidthM, model.Elevation.Frame.CellHeightM));
        Assert.Equal(4514030 - 75, model.Elevation.Frame.South, 1e-9);
        Assert.Equal(107, model.Elevation[2, 0]);
    }

    [Theory]
    [InlineData("EPSG:26912", 10, 430000, 4514000, -9999)]
    [InlineData("EPSG:26912", 10, 430000, 4514000, -32768)]
    [InlineData("EPSG:4326", 0.0001, -111, 40, -9999)] // projected: asked before it bleeds into its neighbours
    public void AValueThatStandsForNodataIsAskedAbout(string crs, double cell, double x, double y, int value)
    {
        var path = Files.Raster(_folder, "a", $"101 102 103\n104 {value} 106\n107 108 109", crs, cell, x, y);
        var problem = Assert.Single(Assert.Throws<InputException>(() => Read(path)).Problems);
        Assert.Equal(path, problem.Place);
        Assert.Contains($"1 cells of {value}", problem.Found, StringComparison.Ordinal);
        Assert.Contains($"nodata = {value}", problem.Expected, StringComparison.Ordinal);
        var model = Read(path, new ElevationOptions(NoData: value, VerticalUnitM: 1));
        Assert.True(float.IsNaN(model.Elevation[1, 1]));
        Assert.All(model.Elevation.Cells, z => Assert.True(float.IsNaN(z) || z is >= 101 and <= 109));
    }

    [Fact]
    public void AFarLowestValueIsDoubted()
    {
        // west_bijou_gully_3m.asc without its nodata line: 2739 cells of 0 under ground from 1680.8 to 1725.4 m (numpy.unique of the file).
        var path = Path.Combine(_folder, "untagged.asc");
        File.WriteAllLines(path, File.ReadLines(Files.Data("west_bijou_gully_3m.asc")).Where(l => !l.StartsWith("NODATA", StringComparison.Ordinal)));
        using var crs = Crs.Parse("EPSG:26913");
        using var source = RasterSource.Open(path);
        var finding = Assert.Single(ElevationReader.Read(source, new ElevationOptions(crs, VerticalUnitM: 1)).Findings, f => f.Code == "nodata-doubtful");
        Assert.Contains("2739 of", finding.Text, StringComparison.Ordinal);
        Assert.Equal(0, finding.Value);
        Assert.DoesNotContain(ElevationReader.Read(source, new ElevationOptions(crs, NoData: 0, VerticalUnitM: 1)).Findings, f => f.Code == "nodata-doubtful");
    }

    [Theory]
    [InlineData("EPSG:26912", 0.0001, -111, 40, "look like degrees")]
    [InlineData("EPSG:4326", 10, 430000, 4514000, "no degrees")]
    public void CoordinatesThatDoNotFitTheirSystemAreRefused(string crs, double cell, double x, double y, string says)
    {
        var path = Files.Raster(_folder, "a", Nine, crs, cell, x, y);
        var problem = Assert.Single(Assert.Throws<InputException>(() => Read(path)).Problems);
        Assert.Equal(path, problem.Place);
        Assert.Contains(says, problem.Found, StringComparison.Ordinal);
        Assert.Contains("coordinate system fits", problem.Expected, StringComparison.Ordinal);
    }

    [Fact]
    public void ATurnedRasterIsLaidNorthUp()
    {
        // z = column x 6 + row x 8 + 100, turned by a = 36.87 degrees (cos 0.8, sin 0.6) in cells of 10 m: column = (0.8 dx + 0.6 dy) / 10, row = (0.6 dx - 0.8 dy) / 10
        // with dx, dy from the corner. Bilinear keeps a plane, so z = 100 + 6 (column - 0.5) + 8 (row - 0.5) at every cell's centre.
        const int n = 40;
        var cells = string.Join('\n', Enumerable.Range(0, n).Select(r => string.Join(' ', Enumerable.Range(0, n).Select(c => 100 + (6 * c) + (8 * r)))));
        var path = Edited(cells, "EPSG:26912", "430000, 10, 0, 4514400, 0, -10", "430000, 8, 6, 4514400, 6, -8");
        var model = Read(path);
        var frame = model.Elevation.Frame;
        var seen = 0;
        for (var row = 0; row < frame.Rows; row++)
        {
            for (var column = 0; column < frame.Columns; column++)
            {
                double dx = frame.CentreX(column) - 430000, dy = frame.CentreY(row) - 4514400, c = ((0.8 * dx) + (0.6 * dy)) / 10, r = ((0.6 * dx) - (0.8 * dy)) / 10;
                if (c is < 1 or > n - 1 || r is < 1 or > n - 1) continue;
                Assert.Equal(100 + (6 * (c - 0.5)) + (8 * (r - 0.5)), model.Elevation[row, column], 0.01);
                seen++;
            }
        }

        Assert.True(seen > 1000, $"{seen}");
        Assert.Contains(model.Findings, f => f.Code == "terrain-projected");
    }

    [Theory]
    [InlineData("<SimpleSource>", "<ColorInterp>Palette</ColorInterp><SimpleSource>", "numbers of colours")]
    [InlineData("<SimpleSource>", "<ColorInterp>Red</ColorInterp><SimpleSource>", "shares of a colour")]
    [InlineData("Float32", "CFloat32", "complex")]
    [InlineData("430000, 10, 0", "430000, 0, 0", "without size")]
    public void WhatIsNoTerrainIsRefused(string here, string instead, string says)
    {
        var path = Edited(Nine, "EPSG:26912", here, instead);
        var problem = Assert.Single(Assert.Throws<InputException>(() => Read(path)).Problems);
        Assert.Equal(path, problem.Place);
        Assert.Contains(says, problem.Found, StringComparison.Ordinal);
    }

    [Fact]
    public void OfManyBandsTheFirstIsUsedAndSaid()
    {
        var path = Edited(Nine, "EPSG:26912", "</VRTDataset>", """<VRTRasterBand dataType="Float32" band="2"/></VRTDataset>""");
        var model = Read(path);
        Assert.Equal(105, model.Elevation[1, 1]);
        Assert.Contains("2 bands", Assert.Single(model.Findings, f => f.Code == "first-band-used").Text, StringComparison.Ordinal);
    }

    [Theory]
    [InlineData("EPSG:26912", 10, 430000, 4514000)]
    [InlineData("EPSG:4326", 0.0001, -111, 40)]
    public void DoublesBeyondFloatsAreNodata(string crs, double cell, double x, double y)
    {
        double[] cells = [101, 102, 103, 104, 1e300, 106, 107, double.MinValue, double.NaN];
        File.WriteAllBytes(Path.Combine(_folder, "raw.bin"), [.. cells.SelectMany(BitConverter.GetBytes)]);
        var path = Path.Combine(_folder, "raw.vrt");
        File.WriteAllText(path, FormattableString.Invariant($"""
            <VRTDataset rasterXSize="3" rasterYSize="3"><SRS>{crs}</SRS><GeoTransform>{x}, {cell}, 0, {y}, 0, -{cell}</GeoTransform>
            <VRTRasterBand dataType="Float64" band="1" subClass="VRTRawRasterBand"><NoDataValue>-1.7976931348623157e+308</NoDataValue><SourceFilename relativeToVRT="1">raw.bin</SourceFilename>
            <ByteOrder>LSB</ByteOrder><PixelOffset>8</PixelOffset><LineOffset>24</LineOffset></VRTRasterBand></VRTDataset>
            """));
        var cellsRead = Read(path).Elevation.Cells;
        Assert.All(cellsRead, z => Assert.True(float.IsNaN(z) || z is >= 101 and <= 107, $"{z}"));
        Assert.Contains(cellsRead, z => !float.IsNaN(z));
        if (crs == "EPSG:26912") Assert.Equal([101, 102, 103, 104, float.NaN, 106, 107, float.NaN, float.NaN], cellsRead);
    }

    [Theory]
    [InlineData("7")]
    [InlineData("7 7\n7 7")]
    public void TheSmallestRastersAreRead(string cells)
    {
        var size = cells.Split('\n').Length;
        Assert.Equal(Enumerable.Repeat(7f, size * size), Read(Files.Raster(_folder, "a", cells, "EPSG:26912")).Elevation.Cells);
        var projected = Read(Files.Raster(_folder, "b", cells, "EPSG:4326", 0.0001, -111, 40)).Elevation;
        Assert.Contains(7f, projected.Cells);
        Assert.All(projected.Cells, z => Assert.True(float.IsNaN(z) || z == 7));
    }

    [Fact]
    public void ARasterWithoutDataHasNoElevationAndNoDoubt()
    {
        var model = Read(Files.Raster(_folder, "a", "-9999 -9999\n-9999 -9999", "EPSG:26912", more: "NODATA_value -9999\n"));
        Assert.All(model.Elevation.Cells, z => Assert.True(float.IsNaN(z)));
        Assert.Empty(model.Findings);
    }

    [Theory]
    [InlineData("EPSG:4269", false)] // NAD83 to WGS 84: known to 4 m
    [InlineData("+proj=longlat +ellps=bessel +no_defs", true)] // a datum that nobody knows
    public void AnUnknownChangeOfDatumIsSaid(string crs, bool isSaid)
    {
        var model = Read(Files.Raster(_folder, "a", Nine, crs, 0.0001, -111, 40));
        Assert.Equal(isSaid, model.Findings.Any(f => f.Code == "datum-shift" && f.Text.Contains("no way is known", StringComparison.Ordinal)));
    }

    private string Edited(string cells, string crs, string here, string instead)
    {
        var path = Files.Raster(_folder, "edited", cells, crs);
        var text = File.ReadAllText(path);
        Assert.Contains(here, text, StringComparison.Ordinal);
        File.WriteAllText(path, text.Replace(here, instead, StringComparison.Ordinal));
        return path;
    }

    private static ElevationModel Read(string path, ElevationOptions? options = null)
    {
        using var source = RasterSource.Open(path);
        return ElevationReader.Read(source, options ?? new ElevationOptions(VerticalUnitM: 1));
    }
}
