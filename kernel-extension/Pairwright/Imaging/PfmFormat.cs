using System.Buffers.Binary;
using System.Globalization;
using System.Text;
using Pairwright.Geometry;

namespace Pairwright.Imaging;

/// <summary>The portable float map: a text header of three lines, then 32-bit numbers, the lowest row first.</summary>
/// <remarks>
/// The third line is a scale whose sign tells the byte order, negative for little-endian. Readers disagree whether its magnitude multiplies,
/// divides or only describes the numbers; they are taken as stored, as published true disparities with a magnitude other than one mean them
/// (common practice), and written with the magnitude one, on which all agree.
/// </remarks>
internal static class PfmFormat
{
    /// <summary>The content of a file with one channel.</summary>
    public static byte[] Encode(ScalarMap map, bool littleEndian = true)
    {
        var header = Encoding.ASCII.GetBytes($"Pf\n{map.Size.Width} {map.Size.Height}\n{(littleEndian ? "-1.0" : "1.0")}\n");
        var content = new byte[header.Length + 4 * map.Size.Area];
        header.CopyTo(content, 0);
        var at = header.Length;
        for (var v = map.Size.Height - 1; v >= 0; v--)
        {
            foreach (var value in map.Row(v))
            {
                var place = content.AsSpan(at, 4);
                if (littleEndian)
                {
                    BinaryPrimitives.WriteSingleLittleEndian(place, value);
                }
                else
                {
                    BinaryPrimitives.WriteSingleBigEndian(place, value);
                }

                at += 4;
            }
        }

        return content;
    }

    /// <summary>The map of a file's content; an infinite number, which some data sets write for no value, becomes NaN.</summary>
    /// <exception cref="UserErrorException">The content is no float map, has three channels, or is cut short.</exception>
    public static ScalarMap Decode(ReadOnlySpan<byte> content, string path)
    {
        if (content.StartsWith("PF"u8))
        {
            throw new UserErrorException($"'{path}' is a float map with three channels; export it with one channel (Pf).");
        }

        var at = 2;
        if (!content.StartsWith("Pf"u8)
            || !int.TryParse(Word(content, ref at), NumberStyles.None, CultureInfo.InvariantCulture, out var width)
            || !int.TryParse(Word(content, ref at), NumberStyles.None, CultureInfo.InvariantCulture, out var height)
            || !float.TryParse(Word(content, ref at), NumberStyles.Float, CultureInfo.InvariantCulture, out var scale)
            || width <= 0 || height <= 0 || scale == 0 || !float.IsFinite(scale))
        {
            throw new UserErrorException($"'{path}' is no PFM file: its header is not Pf, width, height and a scale that is not zero; export it again.");
        }

        var size = new PictureSize(width, height);
        PictureHeader.RequireWithinLimit(width, height, path);
        at++;
        if (content.Length < at + 4 * size.Area)
        {
            throw new UserErrorException($"'{path}' is cut short or damaged: its {size} numbers need {at + 4 * size.Area} bytes and the file has {content.Length}; copy or export it again.");
        }

        var values = new float[size.Area];
        for (var v = height - 1; v >= 0; v--)
        {
            for (var u = 0; u < width; u++, at += 4)
            {
                var place = content.Slice(at, 4);
                var value = scale < 0 ? BinaryPrimitives.ReadSingleLittleEndian(place) : BinaryPrimitives.ReadSingleBigEndian(place);
                values[v * width + u] = float.IsFinite(value) ? value : float.NaN;
            }
        }

        return new(size, values);
    }

    private static string Word(ReadOnlySpan<byte> content, ref int at)
    {
        while (at < content.Length && char.IsWhiteSpace((char)content[at]))
        {
            at++;
        }

        var start = at;
        while (at < content.Length && at - start < 64 && !char.IsWhiteSpace((char)content[at]))
        {
            at++;
        }

        return Encoding.ASCII.GetString(content[start..at]);
    }
}
