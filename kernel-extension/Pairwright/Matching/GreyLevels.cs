using Pairwright.Imaging;

namespace Pairwright.Matching;

/// <summary>Grey levels on the 8-bit scale, so that costs and penalties mean the same at any depth.</summary>
/// <remarks>Levels of more bits are divided by a power of two, which loses nothing: a level of 12 bits becomes a multiple of 1/16.</remarks>
internal static class GreyLevels
{
    /// <summary>How many levels of the 8-bit scale one level of the picture is.</summary>
    public static float ScaleOf(Picture picture) => 1f / (1 << (picture.SignificantBits - 8));

    /// <summary>Fills the levels of one row.</summary>
    public static void Row(Picture picture, int v, Span<float> levels)
    {
        var width = picture.Size.Width;
        var grey = picture.Grey.Slice(v * width, width);
        var scale = ScaleOf(picture);
        for (var u = 0; u < width; u++)
        {
            levels[u] = grey[u] * scale;
        }
    }

    /// <summary>All levels, row after row.</summary>
    public static float[] Of(Picture picture)
    {
        var levels = new float[picture.Size.Area];
        for (var v = 0; v < picture.Size.Height; v++)
        {
            Row(picture, v, levels.AsSpan(v * picture.Size.Width, picture.Size.Width));
        }

        return levels;
    }
}
