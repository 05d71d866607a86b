using System.Globalization;
using OpenCvSharp;

namespace Pairwright.Imaging;

/// <summary>Reads picture files: looks at the header first, decodes second, and says in one sentence what is wrong.</summary>
internal static class PictureFile
{
    /// <summary>Reads a picture.</summary>
    /// <param name="path">The file.</param>
    /// <param name="reading">What the file does not say about itself.</param>
    /// <exception cref="UserErrorException">The file is missing, no picture, cut short, too large, or does not hold what <paramref name="reading"/> says.</exception>
    public static Picture Read(string path, PictureReading reading)
    {
        var content = ReadAll(path);
        var header = PictureHeader.Of(content, path);
        if (header.IsFloat || header.BitsPerSample is not (> 0 and <= 16))
        {
            throw new UserErrorException(
                $"'{path}' holds samples of {header.BitsPerSample} {(header.IsFloat ? "bits in floating point" : "bits")}, not 8 to 16 bits; export it with 8 or 16 bits (a float map is read by MapFile.Read).");
        }

        var warnings = new List<string>();
        var (samples, channels) = Decode(content, header, path);
        var (bits, saturation) = PictureLevels.Settle(samples, header, reading, path, warnings);
        var size = header.Size;
        if (reading.Bayer is { } pattern)
        {
            if (channels != 1)
            {
                throw new UserErrorException($"'{path}' has colours already and no filter mosaic; leave the Bayer pattern out of the reading.");
            }

            (samples, channels) = (BayerMosaic.ToRgb(size, samples, pattern, path), 3);
        }

        var whole = new Picture(
            size,
            channels == 3 ? Luma.OfRgb(samples) : samples,
            bits,
            saturation,
            channels == 3 ? samples : null,
            null,
            reading.CapturedAt,
            Provenance.OfContent(path, content) is var origin && Settings(reading) is { Length: > 0 } settings ? origin.Then("read", settings) : origin,
            warnings);
        return Restricted(whole, reading, path);
    }

    /// <summary>The picture with the region, the mask and the time of a reading.</summary>
    /// <exception cref="UserErrorException">The region or the mask does not fit.</exception>
    internal static Picture Restricted(Picture whole, PictureReading reading, string path)
    {
        var usable = reading.Region?.ToMask(whole.Size);
        if (reading.Mask is { } mask)
        {
            if (mask.Size != whole.Size)
            {
                throw new UserErrorException($"The mask is {mask.Size} px, but '{path}' is {whole.Size} px; give a mask of the picture's own size.");
            }

            usable = usable?.And(mask) ?? mask;
        }

        return whole.With(usable, reading.CapturedAt);
    }

    // What the caller told, for the provenance; a mask is told by its share, because it has no name.
    private static string Settings(PictureReading reading) => string.Join(", ", new[]
    {
        reading.SignificantBits is { } bits ? $"{bits} significant bits" : "",
        reading.SaturationLevel is { } level ? $"saturated at {level}" : "",
        reading.Bayer is { } pattern ? $"mosaic {pattern.ToString().ToUpperInvariant()}" : "",
        reading.Region is { } region ? region.ToString() : "",
        reading.Mask is { } mask ? string.Create(CultureInfo.InvariantCulture, $"mask of {mask.Share:0.####}") : "",
    }.Where(part => part.Length > 0));

    /// <summary>All bytes of a file.</summary>
    /// <exception cref="UserErrorException">It is missing, cannot be read, or is too large.</exception>
    public static byte[] ReadAll(string path)
    {
        ArgumentNullException.ThrowIfNull(path);
        if (Directory.Exists(path))
        {
            throw new UserErrorException($"'{path}' is a folder; name a file in it.");
        }

        if (!File.Exists(path))
        {
            throw new UserErrorException($"'{path}' does not exist; check the name and the folder it is looked for in ({Directory.GetCurrentDirectory()}).");
        }

        try
        {
            return File.ReadAllBytes(path);
        }
        catch (Exception fault) when (fault is IOException or UnauthorizedAccessException)
        {
            throw new UserErrorException($"'{path}' cannot be read ({fault.Message.TrimEnd('.')}); check that you may read it and that it is below 2 GB.", fault);
        }
    }

    /// <summary>Decodes a file's samples, 1 (grey) or 3 (red, green, blue) per pixel; opacity is dropped.</summary>
    internal static (ushort[] Samples, int Channels) Decode(byte[] content, PictureHeader header, string path)
    {
        if (header.Format == PictureFormat.Netpbm)
        {
            return (NetpbmHeader.Read(content)!.Samples(content) ?? throw Undecodable(path), header.SamplesPerPixel);
        }

        using var mat = DecodeMat(content, header, path);
        return (ToRgb(mat, path), mat.Channels() == 1 ? 1 : 3);
    }

    /// <summary>Decodes what OpenCV decodes, with its own channel order and depth.</summary>
    internal static Mat DecodeMat(byte[] content, PictureHeader header, string path)
    {
        if (header.Format == PictureFormat.Tiff && !TiffParts.AreWhole(content))
        {
            throw Undecodable(path);
        }

        OpenCvLibrary.Require();
        Mat mat;
        try
        {
            mat = Cv2.ImDecode(content, ImreadModes.Unchanged);
        }
        catch (OpenCVException fault)
        {
            throw Undecodable(path, fault);
        }

        if (mat.Empty() || mat.Width != header.Width || mat.Height != header.Height)
        {
            mat.Dispose();
            throw Undecodable(path);
        }

        return mat;
    }

    internal static UserErrorException Undecodable(string path, Exception? fault = null) =>
        new($"'{path}' cannot be decoded: it is damaged or uses a compression that is not supported; export it again as PNG or TIFF.", fault!);

    private static ushort[] ToRgb(Mat mat, string path)
    {
        var channels = mat.Channels();
        ushort[] samples = mat.Depth() switch
        {
            MatType.CV_8U => Array.ConvertAll(mat.AsSpan<byte>().ToArray(), level => (ushort)level),
            MatType.CV_16U => mat.AsSpan<ushort>().ToArray(),
            _ => throw new UserErrorException($"'{path}' does not hold 8-bit or 16-bit levels; export it with 8 or 16 bits."),
        };
        if (channels == 1)
        {
            return samples;
        }

        // OpenCV's order is blue, green, red, and opacity where there is any; two channels are grey and opacity.
        var pixels = samples.Length / channels;
        var rgb = new ushort[3 * pixels];
        for (var i = 0; i < pixels; i++)
        {
            (rgb[3 * i], rgb[3 * i + 1], rgb[3 * i + 2]) = channels == 2
                ? (samples[2 * i], samples[2 * i], samples[2 * i])
                : (samples[channels * i + 2], samples[channels * i + 1], samples[channels * i]);
        }

        return rgb;
    }
}
