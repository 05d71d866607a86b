namespace Pairwright.Imaging;

/// <summary>The colours of a sensor's filter mosaic (Bayer 1976), named by its top-left block of two by two pixels, row after row.</summary>
public enum BayerPattern
{
    /// <summary>Red, green; green, blue.</summary>
    Rggb,

    /// <summary>Green, red; blue, green.</summary>
    Grbg,

    /// <summary>Green, blue; red, green.</summary>
    Gbrg,

    /// <summary>Blue, green; green, red.</summary>
    Bggr,
}
