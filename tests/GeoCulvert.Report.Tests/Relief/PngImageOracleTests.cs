using System.Buffers.Binary;
using System.IO.Compression;
using System.Text;
using GeoCulvert.Report.Relief;

namespace GeoCulvert.Report.Tests.Relief;

/// <summary>
/// The PNG writer against a reader written here from the PNG Specification (W3C), and its check sum against published vectors.
/// </summary>
public sealed class PngImageOracleTests
{
    // "123456789" -> CBF43926: the check value of CRC-32/ISO-HDLC in the catalogue of parametrised CRC algorithms (G. Cook);
    // an empty IEND chunk ends in AE 42 60 82: PNG Specification, third edition, the end chunk of every PNG file.
    [Theory]
    [InlineData("123456789", 0xCBF43926u)]
    [InlineData("IEND", 0xAE426082u)]
    [InlineData("", 0u)]
    public void CheckSumAgreesWithPublishedVectors(string text, uint expected) => Assert.Equal(expected, PngImage.Crc32(Encoding.ASCII.GetBytes(text)));

    [Fact]
    public void CheckSumGoesOnFromAPart() =>
        Assert.Equal(0xCBF43926u, PngImage.Crc32("6789"u8, PngImage.Crc32("12345"u8)));

    [Theory]
    [InlineData(1, 1)]
    [InlineData(7, 3)]
    [InlineData(64, 33)]
    public void PicturesReadBack(int width, int height)
    {
        var random = new Random(11);
        var indices = new byte[width * height];
        for (var i = 0; i < indices.Length; i++) indices[i] = (byte)(random.Next(4) == 0 ? random.Next(5) : (i % width * 4 / width));
        byte[] palette = [9, 8, 7, 10, 20, 30, 40, 50, 60, 70, 80, 90, 255, 254, 253];
        using var stream = new MemoryStream();
        PngImage.WriteIndexed(stream, width, height, indices, palette, 2);
        var png = PngReader.Read(stream.ToArray());
        Assert.Equal((width, height), (png.Width, png.Height));
        Assert.Equal(indices, png.Indices);
        Assert.Equal(palette, png.Palette);
        Assert.Equal<byte>([255, 255, 0], png.Alpha);
    }

    [Fact]
    public void WrongSizesThrow()
    {
        using var stream = new MemoryStream();
        Assert.Throws<ArgumentException>(() => PngImage.WriteIndexed(stream, 2, 2, new byte[3], new byte[3]));
        Assert.Throws<ArgumentException>(() => PngImage.WriteIndexed(stream, 2, 2, new byte[4], new byte[4]));
    }
}

/// <summary>Reads 8-bit paletted PNGs with filters 0 to 2; checks every chunk's sum with a bitwise CRC of its own.</summary>
internal sealed record PngReader(int Width, int Height, byte[] Indices, byte[] Palette, byte[] Alpha)
{
    public static PngReader Read(byte[] file)
    {
        Assert.Equal<byte>([0x89, 0x50, 0x4E, 0x47, 0x0D, 0x0A, 0x1A, 0x0A], file[..8]);
        var chunks = new Dictionary<string, byte[]>(StringComparer.Ordinal);
        var order = new List<string>();
        for (var at = 8; at < file.Length;)
        {
            var length = BinaryPrimitives.ReadInt32BigEndian(file.AsSpan(at));
            var type = Encoding.ASCII.GetString(file, at + 4, 4);
            Assert.Equal(BitwiseCrc(file.AsSpan(at + 4, length + 4)), BinaryPrimitives.ReadUInt32BigEndian(file.AsSpan(at + 8 + length)));
            chunks.Add(type, file[(at + 8)..(at + 8 + length)]);
            order.Add(type);
            at += 12 + length;
        }
        Assert.Equal(["IHDR", "PLTE", "tRNS", "IDAT", "IEND"], order);
        var head = chunks["IHDR"];
        Assert.Equal<byte>([8, 3, 0, 0, 0], head[8..]);
        var (width, height) = (BinaryPrimitives.ReadInt32BigEndian(head), BinaryPrimitives.ReadInt32BigEndian(head.AsSpan(4)));
        using var zlib = new ZLibStream(new MemoryStream(chunks["IDAT"]), CompressionMode.Decompress);
        using var raw = new MemoryStream();
        zlib.CopyTo(raw);
        var bytes = raw.ToArray();
        Assert.Equal((width + 1) * height, bytes.Length);
        var pixels = new byte[width * height];
        for (var r = 0; r < height; r++)
        {
            for (var c = 0; c < width; c++)
            {
                var before = bytes[r * (width + 1)] switch
                {
                    0 => 0,
                    1 => c == 0 ? 0 : pixels[(r * width) + c - 1],
                    2 => r == 0 ? 0 : pixels[((r - 1) * width) + c],
                    var other => throw new InvalidOperationException($"filter {other}"),
                };
                pixels[(r * width) + c] = (byte)(bytes[(r * (width + 1)) + 1 + c] + before);
            }
        }
        return new PngReader(width, height, pixels, chunks["PLTE"], chunks["tRNS"]);
    }

    private static uint BitwiseCrc(ReadOnlySpan<byte> bytes)
    {
        var crc = uint.MaxValue;
        foreach (var b in bytes)
        {
            for (var bit = 0; bit < 8; bit++)
            {
                var carry = ((crc ^ (uint)(b >> bit)) & 1) != 0;
                crc >>= 1;
                if (carry) crc ^= 0xEDB88320u;
            }
        }
        return ~crc;
    }
}
