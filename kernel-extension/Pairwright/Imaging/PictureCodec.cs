using OpenCvSharp;
using Pairwright.Geometry;

namespace Pairwright.Imaging;

/// <summary>Pictures for showing, as PNG bytes that are the same on every run.</summary>
public static class PictureCodec
{
    private static readonly ImageEncodingParam[] Smallest = [new(ImwriteFlags.PngCompression, 9)];

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

    private static byte[] Encode(PictureSize size, ReadOnlySpan<byte> samples, int channels)
    {
        if (samples.Length != size.Area * channels)
        {
            throw new ArgumentException($"A picture of {size} px takes {size.Area * channels} bytes, not {samples.Length}.", nameof(samples));
        }

        OpenCvLibrary.Require();
        using var mat = new Mat(size.Height, size.Width, MatType.CV_8UC(channels));
        samples.CopyTo(mat.AsSpan<byte>());
        return mat.ImEncode(".png", Smallest);
    }
}
