using System.Buffers.Binary;

namespace Pairwright.Imaging;

/// <summary>The chunks of a PNG file (W3C, Portable Network Graphics, third edition).</summary>
internal static class PngHeader
{
    private static ReadOnlySpan<byte> Signature => [0x89, (byte)'P', (byte)'N', (byte)'G', 0x0D, 0x0A, 0x1A, 0x0A];

    /// <summary>The header, or nothing where the content is no PNG.</summary>
    public static PictureHeader? Read(ReadOnlySpan<byte> content)
    {
        if (!content.StartsWith(Signature))
        {
            return null;
        }

        var fields = content.Slice(16, 13);
        var colourType = fields[9];
        var header = new PictureHeader(
            PictureFormat.Png,
            BinaryPrimitives.ReadUInt32BigEndian(fields),
            BinaryPrimitives.ReadUInt32BigEndian(fields[4..]),
            colourType == 3 ? 8 : fields[8],
            colourType switch { 0 => 1, 4 => 2, 6 => 4, _ => 3 });

        for (long at = Signature.Length; ;)
        {
            if (at + 12 > content.Length)
            {
                return header with { CutShort = "the end of the PNG (its IEND chunk) is missing" };
            }

            var length = BinaryPrimitives.ReadUInt32BigEndian(content[(int)at..]);
            if (at + 12 + length > content.Length)
            {
                return header with { CutShort = "a chunk of the PNG ends beyond the file" };
            }

            var typeAndData = content.Slice((int)at + 4, (int)length + 4);
            if (PngChecksum.Of(typeAndData) != BinaryPrimitives.ReadUInt32BigEndian(content[(int)(at + 8 + length)..]))
            {
                return header with { CutShort = "the check sum of a chunk of the PNG is wrong" };
            }

            if (typeAndData.StartsWith("IEND"u8))
            {
                return header;
            }

            // sBIT holds one byte per channel; the widest channel decides.
            if (typeAndData.StartsWith("sBIT"u8) && colourType != 3)
            {
                var widest = 0;
                foreach (var bits in typeAndData.Slice(4, Math.Min(typeAndData.Length - 4, colourType is 0 or 4 ? 1 : 3)))
                {
                    widest = Math.Max(widest, bits);
                }

                header = header with { StatedBits = widest > 0 && widest < header.BitsPerSample ? widest : null };
            }

            at += 12 + length;
        }
    }
}
