using System.Buffers.Binary;
using System.IO.Compression;

namespace GeoCulvert.Report.Relief;

/// <summary>Writes 8-bit paletted PNG pictures (PNG Specification, third edition, W3C 2025; ISO/IEC 15948), the same bytes every time.</summary>
public static class PngImage
{
    private static readonly uint[] Table = MakeTable();

    /// <summary>Writes a picture of palette indices.</summary>
    /// <param name="output">Receives the bytes; stays open.</param>
    /// <param name="width">Columns.</param>
    /// <param name="height">Rows.</param>
    /// <param name="indices">Row-major palette indices, width x height of them.</param>
    /// <param name="palette">Colours as red, green, blue bytes, 1 to 256 of them.</param>
    /// <param name="transparentIndex">Index that is drawn transparent, or -1.</param>
    public static void WriteIndexed(
        Stream output, int width, int height, ReadOnlySpan<byte> indices, ReadOnlySpan<byte> palette, int transparentIndex = -1)
    {
        ArgumentNullException.ThrowIfNull(output);
        ArgumentOutOfRangeException.ThrowIfLessThan(width, 1);
        ArgumentOutOfRangeException.ThrowIfLessThan(height, 1);
        if (indices.Length != (long)width * height) throw new ArgumentException("Indices do not fill the picture.", nameof(indices));
        if (palette.Length is < 3 or > 768 || palette.Length % 3 != 0) throw new ArgumentException("Palette is not 1-256 colours.", nameof(palette));
        output.Write([0x89, (byte)'P', (byte)'N', (byte)'G', 0x0D, 0x0A, 0x1A, 0x0A]);
        Span<byte> head = stackalloc byte[13];
        BinaryPrimitives.WriteInt32BigEndian(head, width);
        BinaryPrimitives.WriteInt32BigEndian(head[4..], height);
        (head[8], head[9], head[10], head[11], head[12]) = (8, 3, 0, 0, 0);
        WriteChunk(output, "IHDR"u8, head);
        WriteChunk(output, "PLTE"u8, palette);
        if (transparentIndex >= 0)
        {
            var alpha = new byte[transparentIndex + 1];
            Array.Fill(alpha, (byte)255);
            alpha[transparentIndex] = 0;
            WriteChunk(output, "tRNS"u8, alpha);
        }
        WriteChunk(output, "IDAT"u8, Compress(width, height, indices));
        WriteChunk(output, "IEND"u8, []);
    }

    /// <summary>Cyclic redundancy check of a chunk (ISO 3309, polynomial 0xEDB88320 reflected).</summary>
    public static uint Crc32(ReadOnlySpan<byte> bytes, uint start = 0)
    {
        var crc = ~start;
        foreach (var b in bytes) crc = Table[(crc ^ b) & 0xFF] ^ (crc >> 8);
        return ~crc;
    }

    private static byte[] Compress(int width, int height, ReadOnlySpan<byte> indices)
    {
        using var packed = new MemoryStream();
        using (var zlib = new ZLibStream(packed, CompressionLevel.SmallestSize, leaveOpen: true))
        {
            byte[] left = [1, .. new byte[width]], up = [2, .. new byte[width]];
            for (var r = 0; r < height; r++)
            {
                var row = indices.Slice(r * width, width);
                var above = r == 0 ? default : indices.Slice((r - 1) * width, width);
                for (var c = 0; c < width; c++)
                {
                    left[c + 1] = (byte)(row[c] - (c == 0 ? 0 : row[c - 1]));
                    up[c + 1] = (byte)(row[c] - (r == 0 ? 0 : above[c]));
                }
                zlib.Write(Roughness(left) <= Roughness(up) ? left : up);
            }
        }
        return packed.ToArray();
    }

    private static long Roughness(byte[] filtered)
    {
        var sum = 0L;
        for (var i = 1; i < filtered.Length; i++) sum += Math.Abs((int)(sbyte)filtered[i]);
        return sum;
    }

    private static void WriteChunk(Stream output, ReadOnlySpan<byte> type, ReadOnlySpan<byte> data)
    {
        Span<byte> number = stackalloc byte[4];
        BinaryPrimitives.WriteInt32BigEndian(number, data.Length);
        output.Write(number);
        output.Write(type);
        output.Write(data);
        BinaryPrimitives.WriteUInt32BigEndian(number, Crc32(data, Crc32(type)));
        output.Write(number);
    }

    private static uint[] MakeTable()
    {
        var table = new uint[256];
        for (var n = 0u; n < 256; n++)
        {
            var c = n;
            for (var k = 0; k < 8; k++) c = (c & 1) != 0 ? 0xEDB88320u ^ (c >> 1) : c >> 1;
            table[n] = c;
        }
        return table;
    }
}
