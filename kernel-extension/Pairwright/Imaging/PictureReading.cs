namespace Pairwright.Imaging;

/// <summary>What a picture file does not say about itself and its reader has to be told. Immutable; the default says nothing.</summary>
public sealed record PictureReading
{
    /// <summary>A reading that tells nothing: 8 bits in 8-bit files, 16 in 16-bit files unless the file states fewer, no mosaic, every pixel usable.</summary>
    public static PictureReading Default { get; } = new();

    /// <summary>How many bits carry the picture, 8 to 16; nothing to believe the file.</summary>
    public int? SignificantBits { get; init; }

    /// <summary>The level at and above which a pixel counts as saturated; the largest possible level when left out.</summary>
    public int? SaturationLevel { get; init; }

    /// <summary>The filter mosaic of a raw single-channel file; nothing where the file is grey or has colours.</summary>
    public BayerPattern? Bayer { get; init; }

    /// <summary>The part of the picture that may be used; all of it when left out.</summary>
    public PixelRegion? Region { get; init; }

    /// <summary>Which pixels may be used; all when left out. A mask picture is read by <see cref="Imaging.Mask.Read"/>.</summary>
    public Mask? Mask { get; init; }

    /// <summary>When the picture was taken, where that is known.</summary>
    public DateTimeOffset? CapturedAt { get; init; }
}
