using System.Runtime.InteropServices;
using OpenCvSharp;
using Pairwright.Geometry;

namespace Pairwright.Imaging;

/// <summary>Colours from a filter mosaic by linear interpolation between the nearest pixels of each colour.</summary>
internal static class BayerMosaic
{
    /// <summary>Red, green, blue by turns.</summary>
    /// <param name="size">The size.</param>
    /// <param name="mosaic">One level per pixel.</param>
    /// <param name="pattern">The mosaic's top-left block.</param>
    /// <param name="path">The file's name, for the sentence.</param>
    /// <exception cref="UserErrorException">The picture is too small for a mosaic.</exception>
    public static ushort[] ToRgb(PictureSize size, ushort[] mosaic, BayerPattern pattern, string path)
    {
        if (size.Width < 4 || size.Height < 4)
        {
            throw new UserErrorException($"'{path}' is {size} px, too small for a filter mosaic; leave the Bayer pattern out of the reading.");
        }

        // OpenCV names a mosaic by its second row's second and third pixel, in the order of its output.
        var code = pattern switch
        {
            BayerPattern.Rggb => ColorConversionCodes.BayerBG2RGB,
            BayerPattern.Grbg => ColorConversionCodes.BayerGB2RGB,
            BayerPattern.Gbrg => ColorConversionCodes.BayerGR2RGB,
            _ => ColorConversionCodes.BayerRG2RGB,
        };
        OpenCvLibrary.Require();
        using var source = Mat.FromPixelData(size.Height, size.Width, MatType.CV_16UC1, mosaic);
        using var colours = new Mat();
        Cv2.CvtColor(source, colours, code);
        return MemoryMarshal.Cast<Vec3w, ushort>(colours.AsSpan<Vec3w>()).ToArray();
    }
}
