using System.Buffers.Binary;

namespace Pairwright.Imaging;

/// <summary>The first directory of a TIFF file (TIFF revision 6.0, 1992, and its form with 64-bit offsets).</summary>
internal static class TiffHeader
{
    private const int WidthTag = 256;
    private const int HeightTag = 257;
    private const int BitsTag = 258;
    private const int PhotometricTag = 262;
    private const int StripOffsetsTag = 273;
    private const int SamplesTag = 277;
    private const int StripLengthsTag = 279;
    private const int TileOffsetsTag = 324;
    private const int TileLengthsTag = 325;
    private const int SampleFormatTag = 339;
    private const int FloatSamples = 3;
    private const int WhiteIsZero = 0;
    private const int FilterMosaic = 32803;

    /// <summary>The header, or nothing where the content is no TIFF.</summary>
    public static PictureHeader? Read(ReadOnlySpan<byte> content)
    {
        var little = content.StartsWith("II"u8);
        if (!little && !content.StartsWith("MM"u8) || content.Length < 8)
        {
            return null;
        }

        var version = Number(content, 2, 2, little);
        if (version is not (42 or 43))
        {
            return null;
        }

        var wide = version == 43;
        var directory = wide ? Number(content, 8, 8, little) : Number(content, 4, 4, little);
        var (countLength, entryLength, wordLength) = wide ? (8, 20, 8) : (2, 12, 4);
        var count = Number(content, directory, countLength, little);
        var tags = new Dictionary<long, long[]>();
        for (long entry = 0; entry < count; entry++)
        {
            var at = directory + countLength + entry * entryLength;
            var tag = Number(content, at, 2, little);
            var valueLength = Number(content, at + 2, 2, little) switch { 1 or 2 or 6 or 7 => 1, 3 or 8 => 2, 4 or 9 or 11 => 4, _ => 8 };
            var values = Number(content, at + 4, wordLength, little);
            // Values that do not fit into the entry stand elsewhere.
            var place = at + 4 + wordLength;
            var start = values * valueLength <= wordLength ? place : Number(content, place, wordLength, little);
            if (values < 0 || values > content.Length || start < 0 || start > content.Length || start + values * valueLength > content.Length)
            {
                throw new ArgumentOutOfRangeException(nameof(content), "a TIFF entry points past the file");
            }

            if (tag is not (WidthTag or HeightTag or BitsTag or PhotometricTag or StripOffsetsTag or SamplesTag or StripLengthsTag or TileOffsetsTag or TileLengthsTag or SampleFormatTag))
            {
                continue;
            }

            var list = new long[values];
            for (var i = 0; i < values; i++)
            {
                list[i] = Number(content, start + i * valueLength, valueLength, little);
            }

            tags[tag] = list;
        }

        // The place of the next directory ends this one; it is there even where no other follows.
        Number(content, directory + countLength + count * entryLength, wordLength, little);
        long First(int tag, long otherwise) => tags.TryGetValue(tag, out var list) && list.Length > 0 ? list[0] : otherwise;
        // The decoder brings samples of 9 to 15 bits up to 16, and turns white-is-zero round in 8 bits only.
        var bits = (int)First(BitsTag, 1);
        var photometric = First(PhotometricTag, 1);
        var header = new PictureHeader(
            PictureFormat.Tiff,
            First(WidthTag, 0),
            First(HeightTag, 0),
            bits,
            (int)First(SamplesTag, 1),
            StatedBits: bits is > 8 and < 16 ? bits : null,
            IsFloat: First(SampleFormatTag, 1) == FloatSamples,
            Unsupported: photometric == FilterMosaic ? "holds a camera maker's raw data"
                : photometric == WhiteIsZero && bits > 8 ? "stores white as zero in more than 8 bits"
                : null);

        var offsets = tags.GetValueOrDefault(StripOffsetsTag) ?? tags.GetValueOrDefault(TileOffsetsTag);
        var lengths = tags.GetValueOrDefault(StripLengthsTag) ?? tags.GetValueOrDefault(TileLengthsTag);
        if (offsets is null || lengths is null || offsets.Length != lengths.Length)
        {
            return header with { CutShort = "the TIFF does not say where its pixels are" };
        }

        for (var i = 0; i < offsets.Length; i++)
        {
            if (offsets[i] < 0 || lengths[i] < 0 || offsets[i] + lengths[i] > content.Length)
            {
                return header with { CutShort = $"part {i + 1} of {offsets.Length} of the TIFF's pixels ends beyond the file" };
            }
        }

        return header;
    }

    private static long Number(ReadOnlySpan<byte> content, long at, int length, bool little)
    {
        if (at < 0 || at > content.Length - length)
        {
            throw new ArgumentOutOfRangeException(nameof(content), "the TIFF points past the file");
        }

        var bytes = content.Slice((int)at, length);
        return length switch
        {
            1 => bytes[0],
            2 => little ? BinaryPrimitives.ReadUInt16LittleEndian(bytes) : BinaryPrimitives.ReadUInt16BigEndian(bytes),
            4 => little ? BinaryPrimitives.ReadUInt32LittleEndian(bytes) : BinaryPrimitives.ReadUInt32BigEndian(bytes),
            _ => little ? BinaryPrimitives.ReadInt64LittleEndian(bytes) : BinaryPrimitives.ReadInt64BigEndian(bytes),
        };
    }
}
