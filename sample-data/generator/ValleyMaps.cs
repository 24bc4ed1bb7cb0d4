using System.Globalization;
using System.Runtime.InteropServices;
using System.Text;

namespace GeoCulvert.SampleData;

/// <summary>Writes the valley as raw rasters with a VRT beside each, GeoJSON roads and a rainfall table.</summary>
public static class ValleyMaps
{
    private const string Crs = "EPSG:26912";
    private const double CoverCellM = 20;

    /// <summary>Writes every map into a folder.</summary>
    public static void Write(WexmarrowVale.Valley valley, string folder)
    {
        ArgumentNullException.ThrowIfNull(valley);
        var land = valley.Land;
        Raster(folder, "dem", MemoryMarshal.AsBytes<float>(land.ElevationM), "Float32", land.Rows, land.Cols, land.CellM, (WexmarrowVale.WestM, WexmarrowVale.NorthM), "-9999", "m");
        var (cover, soil, rows, cols, west, north) = ValleyCover.Make(valley, CoverCellM);
        Raster(folder, "landcover", cover, "Byte", rows, cols, CoverCellM, (west, north), "0", null);
        Raster(folder, "soils", soil, "Byte", rows, cols, CoverCellM, (west, north), "0", null);
        File.WriteAllText(Path.Combine(folder, "roads.geojson"), Roads(valley));
        File.WriteAllText(Path.Combine(folder, "rainfall.csv"), Rainfall());
    }

    private static void Raster(
        string folder, string name, ReadOnlySpan<byte> cells, string type, int rows, int cols, double cellM, (double West, double North) corner, string nodata, string? unit)
    {
        File.WriteAllBytes(Path.Combine(folder, name + ".raw"), cells);
        var size = type == "Float32" ? 4 : 1;
        File.WriteAllText(Path.Combine(folder, name + ".vrt"), string.Create(CultureInfo.InvariantCulture, $"""
            <VRTDataset rasterXSize="{cols}" rasterYSize="{rows}">
              <SRS>{Crs}</SRS>
              <GeoTransform>{corner.West}, {cellM}, 0, {corner.North}, 0, {-cellM}</GeoTransform>
              <Metadata><MDI key="AREA_OR_POINT">Area</MDI></Metadata>
              <VRTRasterBand dataType="{type}" band="1" subClass="VRTRawRasterBand">
                <NoDataValue>{nodata}</NoDataValue>
                {(unit is null ? "" : $"<UnitType>{unit}</UnitType>")}
                <SourceFilename relativetoVRT="1">{name}.raw</SourceFilename>
                <ImageOffset>0</ImageOffset>
                <PixelOffset>{size}</PixelOffset>
                <LineOffset>{size * cols}</LineOffset>
                <ByteOrder>LSB</ByteOrder>
              </VRTRasterBand>
            </VRTDataset>

            """));
    }

    /// <summary>GeoJSON in the coordinates of the terrain, named in the <c>crs</c> member of the 2008 format.</summary>
    private static string Roads(WexmarrowVale.Valley valley)
    {
        var text = new StringBuilder();
        text.Append("{\n\"type\": \"FeatureCollection\",\n\"name\": \"roads\",\n");
        text.Append("\"crs\": { \"type\": \"name\", \"properties\": { \"name\": \"urn:ogc:def:crs:EPSG::26912\" } },\n\"features\": [\n");
        for (var n = 0; n < valley.Roads.Count; n++)
        {
            var road = valley.Roads[n];
            var p = road.Plan;
            text.Append(CultureInfo.InvariantCulture, $"{{ \"type\": \"Feature\", \"properties\": {{ \"name\": \"{p.Name}\", \"class\": \"{p.Class}\", \"width\": {p.WidthM}, \"surface\": \"{p.Surface}\" }},\n");
            text.Append("  \"geometry\": { \"type\": \"LineString\", \"coordinates\": [");
            for (var k = 0; k < road.Line.Count; k++)
            {
                if (k % 3 != 0 && k != road.Line.Count - 1) continue;
                var (row, col) = road.Line[k];
                var (x, y) = (WexmarrowVale.WestM + (col + 0.5) * valley.Land.CellM, WexmarrowVale.NorthM - (row + 0.5) * valley.Land.CellM);
                text.Append(k == 0 ? "\n" : ",\n").Append(CultureInfo.InvariantCulture, $"    [{x:F2}, {y:F2}");
                if (road.Streams.Count > 0) text.Append(CultureInfo.InvariantCulture, $", {road.LevelM[k]:F2}");
                text.Append(']');
            }

            text.Append(n == valley.Roads.Count - 1 ? "\n  ] } }\n" : "\n  ] } },\n");
        }

        return text.Append("]\n}\n").ToString();
    }

    /// <summary>An invented law, i = 960 T^0.2 / (t + 9)^0.8 with t in minutes and i in mm/h, rounded to a tenth.</summary>
    private static string Rainfall()
    {
        int[] years = [2, 5, 10, 25, 50, 100];
        var text = new StringBuilder();
        text.Append("# Invented rainfall of an invented valley: i = 960 T^0.2 / (t + 9)^0.8, T in years, t in minutes. No real place has this table.\n");
        text.Append("# series: partial duration\n");
        text.Append("duration_min\\intensity_mm_per_h,").AppendJoin(',', years).Append('\n');
        foreach (var t in (int[])[5, 10, 15, 30, 60, 120, 180, 360, 720, 1440])
        {
            text.Append(CultureInfo.InvariantCulture, $"{t}");
            foreach (var yr in years) text.Append(CultureInfo.InvariantCulture, $",{960 * Math.Pow(yr, 0.2) / Math.Pow(t + 9, 0.8):F1}");
            text.Append('\n');
        }

        return text.ToString();
    }
}
