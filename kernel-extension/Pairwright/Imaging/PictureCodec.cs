using System.Buffers.Binary;
using OpenCvSharp;
using Pairwright.Geometry;

namespace Pairwright.Imaging;

/// <summary>Pictures for showing, as PNG bytes that are the same on every run.</summary>
public static class PictureCodec
{
    // Higher levels take several times as long and save little on camera pictures.
    private static readonly ImageEncodingParam[] Compression = [new(ImwriteFlags.PngCompression, 4)];

    /// <summary>Encodes 8-bit grey levels.</summary>
    /// <param name="size">The size.</param>
    /// <param name="grey">One byte per pixel, row after row.</param>
    /// <returns>The content of a PNG file.</returns>
    /// <exception cref="ArgumentException">The number of bytes is not the size's area.</exception>
    public static byte[] EncodePng(PictureSize size, ReadOnlySpan<byte> grey) => Encode(size, grey, 1);

    /// <summary>Encodes 8-bit colours.</summary>
    /// <param name="size">The size.</param>
    /// <param name="rgb">Red, green, blue by turns, row after row.</param>
    /// <returns>The content of a PNG file.</returns>
    /// <exception cref="ArgumentException">The number of bytes is not three times the size's area.</exception>
    public static byte[] EncodePngRgb(PictureSize size, ReadOnlySpan<byte> rgb)
    {
        var bgr = new byte[rgb.Length];
        for (var i = 0; i + 2 < rgb.Length; i += 3)
        {
            (bgr[i], bgr[i + 1], bgr[i + 2]) = (rgb[i + 2], rgb[i + 1], rgb[i]);
        }

        return Encode(size, bgr, 3);
    }

    /// <summary>Encodes a picture for showing: 8 bits, in colours where it has any.</summary>
    /// <param name="picture">The picture; its full scale becomes 255.</param>
    /// <returns>The content of a PNG file.</returns>
    public static byte[] EncodePng(Picture picture)
    {
        ArgumentNullException.ThrowIfNull(picture);
        return picture.HasColour
            ? EncodePngRgb(picture.Size, EightBits(picture.Colour, picture.SignificantBits))
            : EncodePng(picture.Size, EightBits(picture.Grey, picture.SignificantBits));
    }

    /// <summary>Encodes a map for showing, in the colours of <see cref="ColourScale"/>.</summary>
    /// <param name="map">The map.</param>
    /// <param name="low">The number of the lowest colour.</param>
    /// <param name="high">The number of the highest colour.</param>
    /// <returns>The content of a PNG file.</returns>
    public static byte[] EncodePng(ScalarMap map, double low, double high)
    {
        ArgumentNullException.ThrowIfNull(map);
        return EncodePngRgb(map.Size, ColourScale.Paint(map, low, high));
    }

    /// <summary>Levels of more than 8 bits brought to 8, rounded.</summary>
    /// <param name="levels">The levels.</param>
    /// <param name="significantBits">Their significant bits.</param>
    public static byte[] EightBits(ReadOnlySpan<ushort> levels, int significantBits)
    {
        var most = (1 << significantBits) - 1;
        var bytes = new byte[levels.Length];
        for (var i = 0; i < bytes.Length; i++)
        {
            bytes[i] = (byte)((Math.Min((int)levels[i], most) * 255 + most / 2) / most);
        }

        return bytes;
    }

    /// <summary>The whole of a picture as a PNG file: 8 bits, or 16 with the significant bits in an sBIT chunk, so that reading gives the same levels.</summary>
    internal static byte[] EncodeWhole(Picture picture)
    {
        if (picture.SignificantBits == 8)
        {
            return EncodePng(picture);
        }

        // The PNG specification (W3C, third edition, 13.12) scales samples up to the full range by repeating their upper bits below.
        var spare = 16 - picture.SignificantBits;
        var levels = picture.HasColour ? picture.Colour : picture.Grey;
        var channels = picture.HasColour ? 3 : 1;
        var samples = new ushort[levels.Length];
        for (var i = 0; i < samples.Length; i++)
        {
            var from = channels == 1 ? i : i - i % 3 + 2 - i % 3;
            samples[i] = (ushort)((levels[from] << spare) | (levels[from] >> (picture.SignificantBits - spare)));
        }

        OpenCvLibrary.Require();
        using var mat = Mat.FromPixelData(picture.Size.Height, picture.Size.Width, MatType.CV_16UC(channels), samples);
        var content = mat.ImEncode(".png", Compression);
        if (spare == 0)
        {
            return content;
        }

        // sBIT stands right after IHDR, which ends at byte 33 of every PNG.
        const int afterHeader = 33;
        byte[] typeAndData = [.. "sBIT"u8, .. Enumerable.Repeat((byte)picture.SignificantBits, channels)];
        var length = new byte[4];
        var sum = new byte[4];
        BinaryPrimitives.WriteInt32BigEndian(length, channels);
        BinaryPrimitives.WriteUInt32BigEndian(sum, PngChecksum.Of(typeAndData));
        return [.. content[..afterHeader], .. length, .. typeAndData, .. sum, .. content[afterHeader..]];
    }

    private static byte[] Encode(PictureSize size, ReadOnlySpan<byte> samples, int channels)
    {
        if (samples.Length != size.Area * channels)
        {
            throw new ArgumentException($"A picture of {size} px takes {size.Area * channels} bytes, not {samples.Length}.", nameof(samples));
        }

        OpenCvLibrary.Require();
        using var mat = new Mat(size.Height, size.Width, MatType.CV_8UC(channels));
        samples.CopyTo(mat.AsSpan<byte>());
        return mat.ImEncode(".png", Compression);
    }
}
