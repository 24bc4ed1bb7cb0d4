namespace GeoCulvert.Design.Terrain;

/// <summary>
/// The eight flow directions (O'Callaghan and Mark 1984): 0 = none (nodata, or an outlet), 1-8 clockwise from north.
/// </summary>
public static class D8
{
    /// <summary>No direction: nodata, or an outlet.</summary>
    public const byte None = 0;

    /// <summary>Row step of each code; index 0 is unused.</summary>
    public static ReadOnlySpan<int> RowStep => [0, -1, -1, 0, 1, 1, 1, 0, -1];

    /// <summary>Column step of each code; index 0 is unused.</summary>
    public static ReadOnlySpan<int> ColumnStep => [0, 0, 1, 1, 1, 0, -1, -1, -1];

    /// <summary>The opposite code.</summary>
    public static byte Opposite(byte code) => (byte)(((code + 3) & 7) + 1);

    /// <summary>Azimuth from grid north, degrees; 0 is also "none", as in the written raster 360 stands for north.</summary>
    public static int AzimuthDeg(byte code) => code == 0 ? 0 : code == 1 ? 360 : (code - 1) * 45;

    /// <summary>True length of a step, m.</summary>
    public static double StepLengthM(in GridFrame frame, byte code) => code switch
    {
        1 or 5 => frame.CellHeightM,
        3 or 7 => frame.CellWidthM,
        _ => Math.Sqrt((frame.CellWidthM * frame.CellWidthM) + (frame.CellHeightM * frame.CellHeightM)),
    };
}
