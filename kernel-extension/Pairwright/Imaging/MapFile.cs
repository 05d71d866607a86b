namespace Pairwright.Imaging;

/// <summary>Writes and reads maps; the ending of the name chooses the format.</summary>
public static class MapFile
{
    /// <summary>The factor of 16-bit PNG maps unless another is stated: 256 levels per unit.</summary>
    public const double DefaultPngFactor = 256;

    /// <summary>Writes a map.</summary>
    /// <param name="map">The map.</param>
    /// <param name="path">A name that ends in .pfm, .tif, .tiff or .png.</param>
    /// <param name="pngFactor">Levels per unit in a 16-bit PNG.</param>
    public static void Write(ScalarMap map, string path, double pngFactor = DefaultPngFactor) => throw new NotImplementedException();

    /// <summary>Reads a map.</summary>
    /// <param name="path">A PFM file, a float TIFF, or a PNG.</param>
    /// <param name="pngFactor">Levels per unit in a PNG.</param>
    public static ScalarMap Read(string path, double pngFactor = DefaultPngFactor) => throw new NotImplementedException();
}
