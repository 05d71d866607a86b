using Pairwright.Imaging;

namespace Pairwright.Matching;

/// <summary>The rows that the windows around one row of pixels cover, with as many columns beyond the borders; the nearest pixel stands in there.</summary>
internal static class WindowRows
{
    /// <summary>One row with the columns beyond either border.</summary>
    public static void Fill(Picture picture, int v, int border, Span<float> levels)
    {
        var (width, height) = (picture.Size.Width, picture.Size.Height);
        GreyLevels.Row(picture, Math.Clamp(v, 0, height - 1), levels.Slice(border, width));
        levels[..border].Fill(levels[border]);
        levels[(border + width)..].Fill(levels[border + width - 1]);
    }
}
