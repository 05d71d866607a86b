using System.Globalization;
using OpenCvSharp;
using Pairwright.Geometry;

namespace Pairwright.Imaging;

/// <summary>Writes and reads maps; the ending of the name chooses the format.</summary>
/// <remarks>
/// <list type="bullet">
/// <item><c>.pfm</c>: 32-bit floating point, exact, no value is NaN. Both byte orders are read, the magnitude of the header's scale is not applied; infinite numbers, which some data sets write for no value, are read as NaN.</item>
/// <item><c>.tif</c>, <c>.tiff</c>: 32-bit floating point, exact, no value is NaN.</item>
/// <item><c>.png</c>: 16-bit levels, level = value × factor rounded, level 0 is no value. 8-bit levels are read too.</item>
/// </list>
/// </remarks>
public static class MapFile
{
    /// <summary>The factor of PNG maps unless another is stated: 256 levels per unit, so that 1/512 of a unit is the largest rounding error.</summary>
    public const double DefaultPngFactor = 256;

    /// <summary>Writes a map.</summary>
    /// <param name="map">The map.</param>
    /// <param name="path">A name that ends in .pfm, .tif, .tiff or .png.</param>
    /// <param name="pngFactor">Levels per unit in a PNG, above zero; other formats do without.</param>
    /// <exception cref="UserErrorException">The ending is another one, a value does not fit into a PNG, or the file cannot be written.</exception>
    public static void Write(ScalarMap map, string path, double pngFactor = DefaultPngFactor)
    {
        ArgumentNullException.ThrowIfNull(map);
        ArgumentNullException.ThrowIfNull(path);
        var content = Ending(path) switch
        {
            ".pfm" => PfmFormat.Encode(map),
            ".png" => EncodePng(map, path, Checked(pngFactor)),
            _ => EncodeTiff(map),
        };
        AtomicFile.Write(path, stream => stream.Write(content));
    }

    /// <summary>Reads a map.</summary>
    /// <param name="path">A name that ends in .pfm, .tif, .tiff or .png.</param>
    /// <param name="pngFactor">Levels per unit in a PNG, above zero; other formats do without.</param>
    /// <exception cref="UserErrorException">The file is missing, cut short, or not of the kind that its ending says.</exception>
    public static ScalarMap Read(string path, double pngFactor = DefaultPngFactor)
    {
        ArgumentNullException.ThrowIfNull(path);
        var content = PictureFile.ReadAll(path);
        return Ending(path) switch
        {
            ".pfm" => PfmFormat.Decode(content, path),
            ".png" => DecodePng(content, path, Checked(pngFactor)),
            _ => DecodeTiff(content, path),
        };
    }

    private static string Ending(string path)
    {
        var ending = Path.GetExtension(path).ToLowerInvariant();
        return ending is ".pfm" or ".png" or ".tif" or ".tiff"
            ? ending
            : throw new UserErrorException($"'{path}' names no format for a map; end it in .pfm, .tif or .png.");
    }

    private static double Checked(double factor) =>
        factor > 0 && double.IsFinite(factor)
            ? factor
            : throw new UserErrorException($"A PNG factor of {factor.ToString(CultureInfo.InvariantCulture)} levels per unit is not above zero; give one such as {DefaultPngFactor}.");

    private static byte[] EncodePng(ScalarMap map, string path, double factor)
    {
        var levels = new ushort[map.Size.Area];
        for (var i = 0; i < levels.Length; i++)
        {
            var value = map.Values[i];
            if (float.IsNaN(value))
            {
                continue;
            }

            var level = Math.Round(value * factor);
            if (!(level is >= 1 and <= ushort.MaxValue))
            {
                throw new UserErrorException(string.Create(
                    CultureInfo.InvariantCulture,
                    $"The value {value:0.###} at column {i % map.Size.Width} of row {i / map.Size.Width} does not fit into the 16-bit PNG '{path}' with {factor:0.###} levels per unit ({1 / factor:0.####} to {ushort.MaxValue / factor:0.###}); write .pfm or .tif instead."));
            }

            levels[i] = (ushort)level;
        }

        OpenCvLibrary.Require();
        using var mat = Mat.FromPixelData(map.Size.Height, map.Size.Width, MatType.CV_16UC1, levels);
        return mat.ImEncode(".png");
    }

    private static ScalarMap DecodePng(byte[] content, string path, double factor)
    {
        var header = PictureHeader.Of(content, path);
        if (header.SamplesPerPixel != 1)
        {
            throw new UserErrorException($"'{path}' has colours and is no map; give a PNG with one channel of 8 or 16 bits.");
        }

        var (levels, _) = PictureFile.Decode(content, header, path);
        return new(header.Size, Array.ConvertAll(levels, level => level == 0 ? float.NaN : (float)(level / factor)));
    }

    private static byte[] EncodeTiff(ScalarMap map)
    {
        OpenCvLibrary.Require();
        using var mat = Mat.FromPixelData(map.Size.Height, map.Size.Width, MatType.CV_32FC1, map.Values.ToArray());
        return mat.ImEncode(".tiff");
    }

    private static ScalarMap DecodeTiff(byte[] content, string path)
    {
        var header = PictureHeader.Of(content, path);
        if (!header.IsFloat || header.SamplesPerPixel != 1)
        {
            throw new UserErrorException($"'{path}' is no map of one floating-point number per pixel; a picture is read by Picture.Read.");
        }

        using var mat = PictureFile.DecodeMat(content, header, path);
        using var single = new Mat();
        mat.ConvertTo(single, MatType.CV_32FC1);
        return new(header.Size, single.AsSpan<float>().ToArray());
    }
}
