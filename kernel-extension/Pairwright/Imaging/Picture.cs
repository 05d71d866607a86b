using System.Collections.Immutable;
using Pairwright.Geometry;

namespace Pairwright.Imaging;

/// <summary>A picture of 8 to 16 significant bits: one grey channel for matching, the colours kept for display where there were any.</summary>
/// <remarks>Immutable by convention: the maker hands its arrays over and keeps no other reference to them.</remarks>
public sealed partial class Picture
{
    private readonly ushort[] grey;
    private readonly ushort[]? colour;

    /// <summary>Makes a picture.</summary>
    /// <param name="size">The size.</param>
    /// <param name="grey">Grey levels, row after row, handed over.</param>
    /// <param name="significantBits">How many bits carry the picture, 8 to 16; a level reaches at most 2^bits − 1.</param>
    /// <param name="saturationLevel">The level at and above which a pixel counts as saturated; the largest level when left out.</param>
    /// <param name="colour">Red, green, blue by turns, row after row, on the same scale as the grey; nothing for a grey picture.</param>
    /// <param name="usable">Which pixels may be used; nothing where all may.</param>
    /// <param name="capturedAt">When it was taken, where that is known.</param>
    /// <param name="provenance">Where it came from.</param>
    /// <param name="warnings">What its maker noticed and a user should know, one sentence each.</param>
    /// <exception cref="UserErrorException">The size, bits, levels, saturation level or mask do not fit.</exception>
    public Picture(
        PictureSize size,
        ushort[] grey,
        int significantBits = 8,
        int? saturationLevel = null,
        ushort[]? colour = null,
        Mask? usable = null,
        DateTimeOffset? capturedAt = null,
        Provenance? provenance = null,
        IEnumerable<string>? warnings = null)
    {
        ArgumentNullException.ThrowIfNull(grey);
        if (size.Width <= 0 || size.Height <= 0 || grey.LongLength != size.Area || (colour is not null && colour.LongLength != 3 * size.Area))
        {
            throw new UserErrorException($"A picture of {size} px does not fit {grey.LongLength} grey values; give one per pixel, and three for colour.");
        }

        if (significantBits is < 8 or > 16)
        {
            throw new UserErrorException($"A picture of {significantBits} significant bits is not supported; give 8 to 16.");
        }

        var largest = (1 << significantBits) - 1;
        int most = Math.Max(grey.Max(), colour?.Max() ?? 0);
        if (most > largest || saturationLevel < 1 || saturationLevel > largest)
        {
            throw new UserErrorException(
                $"A level of {Math.Max(most, saturationLevel ?? 0)} does not fit a picture of {significantBits} significant bits (1 to {largest}); state the bits that the camera delivers.");
        }

        if (usable is not null && usable.Size != size)
        {
            throw new UserErrorException($"A mask of {usable.Size} px does not fit a picture of {size} px; give a mask of the picture's own size.");
        }

        (Size, this.grey, SignificantBits, this.colour, Usable, CapturedAt) = (size, grey, significantBits, colour, usable, capturedAt);
        SaturationLevel = saturationLevel ?? largest;
        Provenance = provenance ?? Provenance.None;
        ReadingWarnings = [.. warnings ?? []];
    }

    /// <summary>The size.</summary>
    public PictureSize Size { get; }

    /// <summary>How many bits carry the picture, 8 to 16.</summary>
    public int SignificantBits { get; }

    /// <summary>The level at and above which a pixel counts as saturated.</summary>
    public int SaturationLevel { get; }

    /// <summary>Grey levels, row after row.</summary>
    public ReadOnlySpan<ushort> Grey => grey;

    /// <summary>Grey levels, row after row, for code that runs on several threads.</summary>
    public ReadOnlyMemory<ushort> GreyMemory => grey;

    /// <summary>Whether the picture keeps colours.</summary>
    public bool HasColour => colour is not null;

    /// <summary>Red, green, blue by turns, row after row; empty for a grey picture.</summary>
    public ReadOnlySpan<ushort> Colour => colour;

    /// <summary>Which pixels may be used; nothing where all may.</summary>
    public Mask? Usable { get; }

    /// <summary>When it was taken, where that is known.</summary>
    public DateTimeOffset? CapturedAt { get; }

    /// <summary>Where it came from.</summary>
    public Provenance Provenance { get; }

    /// <summary>What was noticed when the picture was read, one sentence each; empty where nothing was.</summary>
    public ImmutableArray<string> ReadingWarnings { get; }

    /// <summary>The grey level at column <paramref name="u"/> of row <paramref name="v"/>.</summary>
    public ushort this[int u, int v] => grey[(long)v * Size.Width + u];

    /// <summary>Reads a PNG, TIFF, JPEG, BMP, PGM or PPM file of 8 to 16 bits.</summary>
    /// <remarks>
    /// The format is told by the content, not by the name. The significant bits are those stated in <paramref name="reading"/>, else those
    /// that the file states (netpbm's maxval, PNG's sBIT chunk), else 8 in 8-bit files and 16 in 16-bit files; they are never guessed from
    /// the levels. Colours become grey by ITU-R BT.601 and are kept for display. Pixels stay as stored: an orientation tag is not obeyed,
    /// because a rig's calibration belongs to the sensor's rows and columns.
    /// </remarks>
    /// <param name="path">The file.</param>
    /// <param name="reading">What the file does not say about itself; nothing by default.</param>
    /// <exception cref="UserErrorException">
    /// The file is missing, no picture, cut short, above 200 million pixels, or does not hold what <paramref name="reading"/> says.
    /// </exception>
    public static Picture Read(string path, PictureReading? reading = null) => PictureFile.Read(path, reading ?? PictureReading.Default);

    /// <summary>Writes the picture as a PNG file that <see cref="Read"/> reads back with equal levels and significant bits.</summary>
    /// <remarks>Colours are written where there are any. Mask, time and a saturation level below the largest are not kept.</remarks>
    /// <param name="path">The file, replaced only when the new one is whole.</param>
    /// <exception cref="UserErrorException">The file cannot be written.</exception>
    public void WritePng(string path)
    {
        var content = PictureCodec.EncodeWhole(this);
        AtomicFile.Write(path, stream => stream.Write(content));
    }

    /// <summary>The same picture with other marks of use; arrays are shared, not copied.</summary>
    /// <param name="usable">Which pixels may be used; nothing where all may.</param>
    public Picture WithUsable(Mask? usable) => With(usable, CapturedAt);

    /// <summary>The same picture with its levels scaled up to more significant bits.</summary>
    /// <param name="bits">The bits wanted, at least <see cref="SignificantBits"/> and at most 16.</param>
    internal Picture WithBits(int bits)
    {
        ArgumentOutOfRangeException.ThrowIfLessThan(bits, SignificantBits);
        var shift = bits - SignificantBits;
        ushort[] Scaled(ushort[] levels) => shift == 0 ? levels : Array.ConvertAll(levels, level => (ushort)(level << shift));
        return new(
            Size, Scaled(grey), bits, SaturationLevel << shift, colour is null ? null : Scaled(colour), Usable, CapturedAt, Provenance, ReadingWarnings);
    }

    internal Picture With(Mask? usable, DateTimeOffset? capturedAt) =>
        new(Size, grey, SignificantBits, SaturationLevel, colour, usable, capturedAt, Provenance, ReadingWarnings);

    /// <summary>A part of the picture as a picture of its own.</summary>
    /// <param name="region">A region inside the picture.</param>
    /// <exception cref="UserErrorException">The region is empty or reaches over the picture's edge.</exception>
    public Picture Cropped(PixelRegion region)
    {
        region.Require(Size);
        T[] Part<T>(ReadOnlySpan<T> all, int perPixel)
        {
            var part = new T[(long)region.Width * region.Height * perPixel];
            for (var v = 0; v < region.Height; v++)
            {
                all.Slice(((region.V + v) * Size.Width + region.U) * perPixel, region.Width * perPixel).CopyTo(part.AsSpan(v * region.Width * perPixel));
            }

            return part;
        }

        var size = new PictureSize(region.Width, region.Height);
        return new(
            size,
            Part<ushort>(grey, 1),
            SignificantBits,
            SaturationLevel,
            colour is null ? null : Part<ushort>(colour, 3),
            Usable is null ? null : new Mask(size, Part(Usable.Usable, 1)),
            CapturedAt,
            Provenance.Then("crop", region.ToString()),
            ReadingWarnings);
    }

    /// <summary>Size, bits and kind in a line.</summary>
    public override string ToString() => $"{Size} px, {SignificantBits} bits, {(HasColour ? "colour" : "grey")}";
}
