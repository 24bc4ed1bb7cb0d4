using System.IO.Compression;
using System.Text;

namespace GeoCulvert.Report.Page;

/// <summary>
/// Sheets of a large study, packed: zlib (RFC 1950) in base64 inside a data block that the page's script opens when a sheet is asked for,
/// so that thousands of sheets neither make the file large nor slow its opening.
/// </summary>
internal static class SheetPack
{
    /// <summary>Up to so many crossings the sheets stand in the page as they are, and can be read without scripting.</summary>
    public const int LargestPlainStudy = 120;

    /// <summary>Sheets in one pack.</summary>
    public const int SheetsPerPack = 25;

    /// <summary>Writes one pack.</summary>
    /// <param name="writer">The page.</param>
    /// <param name="first">Index of its first crossing.</param>
    /// <param name="count">Number of crossings.</param>
    /// <param name="html">The sheets.</param>
    public static void Write(TextWriter writer, int first, int count, string html)
    {
        using var packed = new MemoryStream();
        using (var zlib = new ZLibStream(packed, CompressionLevel.Optimal, leaveOpen: true)) zlib.Write(Encoding.UTF8.GetBytes(html));
        writer.Write($"<script type=\"application/zlib\" data-first=\"{first}\" data-count=\"{count}\">");
        writer.Write(Convert.ToBase64String(packed.GetBuffer(), 0, (int)packed.Length));
        writer.Write("</script>\n");
    }
}
