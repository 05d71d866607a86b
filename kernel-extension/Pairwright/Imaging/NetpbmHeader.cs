namespace Pairwright.Imaging;

/// <summary>The header of a PGM or PPM file (the netpbm formats' own manual pages), and where its samples begin.</summary>
/// <param name="Header">The header.</param>
/// <param name="IsText">Whether the samples are decimal numbers.</param>
/// <param name="SamplesAt">The position of the first sample.</param>
internal sealed record NetpbmHeader(PictureHeader Header, bool IsText, int SamplesAt)
{
    /// <summary>The header, or nothing where the content is neither PGM nor PPM.</summary>
    public static NetpbmHeader? Read(ReadOnlySpan<byte> content)
    {
        if (content.Length < 3 || content[0] != 'P' || content[1] is not ((byte)'2' or (byte)'3' or (byte)'5' or (byte)'6') || !IsSpace(content[2]) && content[2] != '#')
        {
            return null;
        }

        var at = 2;
        var width = Number(content, ref at);
        var height = Number(content, ref at);
        var largest = Number(content, ref at);
        if (largest is < 1 or > 65535)
        {
            throw new ArgumentOutOfRangeException(nameof(content), "maxval out of range");
        }

        // One white-space character, and no more, parts the header from binary samples.
        at++;
        var isText = content[1] is (byte)'2' or (byte)'3';
        var samples = content[1] is (byte)'3' or (byte)'6' ? 3 : 1;
        var bytes = largest > 255 ? 2 : 1;

        // As text a sample takes a digit and a space at least. A size beyond the limit, which is refused later, must not overflow here.
        var count = Math.Min(width, PictureHeader.MostPixels) * Math.Min(height, PictureHeader.MostPixels) * samples;
        var needed = isText ? at + 2 * count - 1 : at + count * bytes;
        var cut = needed > content.Length ? $"its samples need {needed} bytes and the file has {content.Length}" : null;
        return new(new(PictureFormat.Netpbm, width, height, 8 * bytes, samples, LargestLevel: (int)largest, CutShort: cut), isText, at);
    }

    /// <summary>The samples in the order of the file, or nothing where text samples end too early, are no numbers or exceed the largest level.</summary>
    public ushort[]? Samples(ReadOnlySpan<byte> content)
    {
        var samples = new ushort[Header.Width * Header.Height * Header.SamplesPerPixel];
        var at = SamplesAt;
        for (var i = 0; i < samples.Length; i++)
        {
            long value;
            if (!IsText)
            {
                value = Header.BitsPerSample == 8 ? content[at++] : (content[at++] << 8) | content[at++];
            }
            else
            {
                value = at < content.Length ? Number(content, ref at) : -1;
            }

            if (value < 0 || value > Header.LargestLevel)
            {
                return null;
            }

            samples[i] = (ushort)value;
        }

        return samples;
    }

    // The next decimal number; −1 where there is none. Comments run from a hash to the line's end.
    private static long Number(ReadOnlySpan<byte> content, ref int at)
    {
        while (at < content.Length && (IsSpace(content[at]) || content[at] == '#'))
        {
            if (content[at] == '#')
            {
                while (at < content.Length && content[at] != '\n')
                {
                    at++;
                }
            }
            else
            {
                at++;
            }
        }

        long number = -1;
        while (at < content.Length && char.IsAsciiDigit((char)content[at]) && number < 10_000_000)
        {
            number = Math.Max(number, 0) * 10 + (content[at++] - '0');
        }

        return number;
    }

    private static bool IsSpace(byte character) => character is (byte)' ' or (byte)'\t' or (byte)'\n' or (byte)'\r' or 0x0B or 0x0C;
}
