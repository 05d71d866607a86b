using Pairwright.Imaging;
using Pairwright.Notebook.Drawing;

namespace Pairwright.Notebook.Renderers;

/// <summary>Pictures of two pictures: beside one another, one over the other, and their difference.</summary>
internal static class PairPictures
{
    private const int Gap = 8;

    /// <summary>One common white for both pictures, so that an exposure difference stays visible.</summary>
    public static double White(Picture left, Picture right) => Math.Max(Pictures.White(left), Pictures.White(right));

    /// <summary>Both pictures beside one another, in grey or in colour.</summary>
    public static Raster Beside(Picture left, Picture right, int width = 480)
    {
        var white = White(left, right);
        var (a, b) = (Pictures.Reduced(left, width, white), Pictures.Reduced(right, width, white));
        return Raster.From(a.Width + Gap + b.Width, Math.Max(a.Height, b.Height), (u, v) =>
            u < a.Width ? At(a, u, v) : u < a.Width + Gap ? ((byte)255, (byte)255, (byte)255) : At(b, u - a.Width - Gap, v));
    }

    /// <summary>The left picture in red and the right one in green and blue: what coincides is grey.</summary>
    public static Raster RedCyan(Picture left, Picture right, int width = 440)
    {
        var white = White(left, right);
        var (a, b) = (Grey(left, width, white), Grey(right, width, white));
        return Raster.From(a.Width, a.Height, (u, v) => (a.Levels[v * a.Width + u], b.Levels[v * a.Width + u], b.Levels[v * a.Width + u]));
    }

    /// <summary>Left minus right around middle grey: what coincides is middle grey.</summary>
    public static Raster Difference(Picture left, Picture right, int width = 440)
    {
        var white = White(left, right);
        var (a, b) = (Grey(left, width, white), Grey(right, width, white));
        return new(a.Width, a.Height, 1, [.. a.Levels.Zip(b.Levels, (l, r) => (byte)Math.Clamp(128 + (l - r) / 2, 0, 255))]);
    }

    private static Raster Grey(Picture picture, int width, double white) =>
        Pictures.Reduced(picture.Grey, picture.Size.Width, picture.Size.Height, 1, width, 255 / white);

    private static (byte R, byte G, byte B) At(Raster raster, int u, int v)
    {
        if (v >= raster.Height)
        {
            return (255, 255, 255);
        }

        var at = (v * raster.Width + u) * raster.Channels;
        return raster.Channels == 1
            ? (raster.Levels[at], raster.Levels[at], raster.Levels[at])
            : (raster.Levels[at], raster.Levels[at + 1], raster.Levels[at + 2]);
    }
}
