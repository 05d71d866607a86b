using Pairwright.Imaging;

namespace Pairwright.Notebook.Drawing;

/// <summary>A small picture for a page: eight bits a channel, one channel (grey) or three (red, green, blue).</summary>
internal sealed class Raster
{
    private byte[]? png;

    public Raster(int width, int height, int channels, byte[] levels)
    {
        ArgumentOutOfRangeException.ThrowIfNotEqual(levels.Length, width * height * channels);
        (Width, Height, Channels, Levels) = (width, height, channels, levels);
    }

    public int Width { get; }

    public int Height { get; }

    public int Channels { get; }

    /// <summary>Row after row, channels by turns.</summary>
    public byte[] Levels { get; }

    /// <summary>A raster made pixel by pixel.</summary>
    public static Raster From(int width, int height, Func<int, int, (byte Red, byte Green, byte Blue)> colour)
    {
        var levels = new byte[width * height * 3];
        for (var (v, at) = (0, 0); v < height; v++)
        {
            for (var u = 0; u < width; u++)
            {
                (levels[at++], levels[at++], levels[at++]) = colour(u, v);
            }
        }

        return new(width, height, 3, levels);
    }

    public byte[] ToPng() => png ??= Channels == 1
        ? PictureCodec.EncodePng(new(Width, Height), Levels)
        : PictureCodec.EncodePngRgb(new(Width, Height), Levels);

    public string DataUri() => "data:image/png;base64," + Convert.ToBase64String(ToPng());
}
