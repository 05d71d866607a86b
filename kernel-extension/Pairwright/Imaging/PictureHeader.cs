using System.Text;
using Pairwright.Geometry;

namespace Pairwright.Imaging;

/// <summary>What a picture file says of itself before anything is decoded.</summary>
/// <param name="Format">The format, told by its first bytes; a file's name decides nothing.</param>
/// <param name="Width">Columns.</param>
/// <param name="Height">Rows.</param>
/// <param name="BitsPerSample">The stored bits of one sample.</param>
/// <param name="SamplesPerPixel">1 for grey, 3 for colours, one more with opacity.</param>
/// <param name="LargestLevel">The largest level that the file states (netpbm's maxval); nothing where it states none.</param>
/// <param name="StatedBits">The significant bits that the file states for levels scaled up to its full range (PNG's sBIT chunk, TIFF's 9 to 15 bits a sample); nothing where it states none.</param>
/// <param name="IsFloat">Whether the samples are floating-point numbers.</param>
/// <param name="Unsupported">What the file uses that is not read; nothing where all is.</param>
/// <param name="CutShort">How one sees that the file is not complete; nothing where it is.</param>
internal sealed record PictureHeader(
    PictureFormat Format,
    long Width,
    long Height,
    int BitsPerSample,
    int SamplesPerPixel,
    int? LargestLevel = null,
    int? StatedBits = null,
    bool IsFloat = false,
    string? Unsupported = null,
    string? CutShort = null)
{
    /// <summary>The largest picture that is read: 200 million pixels, well above the largest camera sensors in common use.</summary>
    public const long MostPixels = 200_000_000;

    /// <summary>The size.</summary>
    public PictureSize Size => new((int)Width, (int)Height);

    /// <summary>Reads and checks the header of a whole file's content.</summary>
    /// <param name="content">The file.</param>
    /// <param name="path">The file's name, for the sentences.</param>
    /// <exception cref="UserErrorException">It is no picture, too large, or cut short.</exception>
    public static PictureHeader Of(ReadOnlySpan<byte> content, string path)
    {
        PictureHeader? header;
        try
        {
            header = PngHeader.Read(content) ?? JpegHeader.Read(content) ?? TiffHeader.Read(content) ?? BmpHeader.Read(content) ?? NetpbmHeader.Read(content)?.Header;
        }
        catch (ArgumentOutOfRangeException fault)
        {
            // A span was sliced beyond its end: the header points past the file.
            throw new UserErrorException($"'{path}' is cut short: its header is not complete; copy or export it again.", fault);
        }

        if (header is null)
        {
            throw new UserErrorException(
                $"'{path}' is {(content.IsEmpty ? "empty" : LooksLikeText(content) ? "a text file" : "of an unknown kind")} and not a picture; give a PNG, TIFF, JPEG, BMP, PGM or PPM file.");
        }

        if (header.Width <= 0 || header.Height <= 0)
        {
            throw new UserErrorException($"'{path}' says that it is {header.Width} × {header.Height} px, which is no picture; export it again.");
        }

        RequireWithinLimit(header.Width, header.Height, path);
        if (header.Unsupported is { } unsupported)
        {
            throw new UserErrorException($"'{path}' {unsupported}, which is not supported; export it as a PNG or a plain TIFF.");
        }

        return header.CutShort is { } reason
            ? throw new UserErrorException($"'{path}' is cut short or damaged: {reason}; copy or export it again.")
            : header;
    }

    /// <summary>Refuses a size above the limit.</summary>
    /// <exception cref="UserErrorException">It is above the limit.</exception>
    public static void RequireWithinLimit(long width, long height, string path)
    {
        // Each side is looked at first: their product may not fit into 64 bits.
        if (width > MostPixels || height > MostPixels || width * height > MostPixels)
        {
            throw new UserErrorException(
                $"'{path}' says that it is {width} × {height} px, above the limit of {MostPixels / 1_000_000} million pixels; crop or bin it before reading.");
        }
    }

    private static bool LooksLikeText(ReadOnlySpan<byte> content)
    {
        foreach (var character in Encoding.Latin1.GetString(content[..Math.Min(content.Length, 512)]))
        {
            if (char.IsControl(character) && character is not ('\r' or '\n' or '\t' or '\f'))
            {
                return false;
            }
        }

        return true;
    }
}
