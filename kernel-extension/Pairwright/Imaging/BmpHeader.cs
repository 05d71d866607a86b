using System.Buffers.Binary;

namespace Pairwright.Imaging;

/// <summary>The header of a Windows bitmap.</summary>
internal static class BmpHeader
{
    /// <summary>The header, or nothing where the content is no bitmap.</summary>
    public static PictureHeader? Read(ReadOnlySpan<byte> content)
    {
        if (!content.StartsWith("BM"u8))
        {
            return null;
        }

        var pixels = BinaryPrimitives.ReadUInt32LittleEndian(content[10..]);
        var infoLength = BinaryPrimitives.ReadUInt32LittleEndian(content[14..]);
        if (infoLength is not (12 or (>= 40 and <= 256)))
        {
            return null;
        }

        // The oldest header has 16-bit sizes. A negative height means rows from the top down.
        var old = infoLength == 12;
        long width = old ? BinaryPrimitives.ReadUInt16LittleEndian(content[18..]) : BinaryPrimitives.ReadInt32LittleEndian(content[18..]);
        var height = Math.Abs((long)(old ? BinaryPrimitives.ReadUInt16LittleEndian(content[20..]) : BinaryPrimitives.ReadInt32LittleEndian(content[22..])));
        var bits = BinaryPrimitives.ReadUInt16LittleEndian(content[(old ? 24 : 28)..]);
        var compression = old ? 0 : BinaryPrimitives.ReadUInt32LittleEndian(content[30..]);

        // Uncompressed rows are padded to four bytes; a compressed bitmap states the length of its pixels.
        var needed = compression is 0 or 3 ? (width * bits + 31) / 32 * 4 * height : BinaryPrimitives.ReadUInt32LittleEndian(content[34..]);
        var cut = pixels + needed > content.Length ? $"the bitmap needs {pixels + needed} bytes and the file has {content.Length}" : null;
        return new(PictureFormat.Bmp, width, height, 8, 3, CutShort: cut);
    }
}
