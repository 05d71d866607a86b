using System.Buffers.Binary;

namespace Pairwright.Imaging;

/// <summary>The marker segments of a JPEG file (ITU-T T.81, annex B).</summary>
internal static class JpegHeader
{
    /// <summary>The header, or nothing where the content is no JPEG.</summary>
    public static PictureHeader? Read(ReadOnlySpan<byte> content)
    {
        if (!content.StartsWith((ReadOnlySpan<byte>)[0xFF, 0xD8, 0xFF]))
        {
            return null;
        }

        PictureHeader? header = null;
        var at = 2;
        while (true)
        {
            // Find the next marker: after a scan's start this walks over its coded data, in which FF00 is a data byte and FFD0 to FFD7 restart it.
            while (at + 1 < content.Length && !(content[at] == 0xFF && content[at + 1] is not (0 or 0xFF or (>= 0xD0 and <= 0xD7))))
            {
                at++;
            }

            if (at + 1 >= content.Length)
            {
                const string reason = "the end marker of the JPEG is missing";
                return header is null
                    ? throw new ArgumentOutOfRangeException(nameof(content), reason)
                    : header with { CutShort = reason };
            }

            var marker = content[at + 1];
            if (marker == 0xD9)
            {
                return header ?? throw new ArgumentOutOfRangeException(nameof(content), "a JPEG without a frame");
            }

            var length = BinaryPrimitives.ReadUInt16BigEndian(content[(at + 2)..]);
            if (marker is >= 0xC0 and <= 0xCF and not (0xC4 or 0xC8 or 0xCC))
            {
                var frame = content.Slice(at + 4, 6);
                header = new(PictureFormat.Jpeg, BinaryPrimitives.ReadUInt16BigEndian(frame[3..]), BinaryPrimitives.ReadUInt16BigEndian(frame[1..]), frame[0], frame[5]);
            }

            at += 2 + length;
        }
    }
}
