using Pairwright.Geometry;
using Pairwright.Imaging;

namespace Pairwright.Matching;

/// <summary>The census transform of a picture: one word of comparisons per pixel (Zabih and Woodfill 1994).</summary>
internal static class CensusTransform
{
    /// <summary>
    /// One word per pixel, row after row. Bit i is one where the i-th neighbour of the window, counted row after row without the middle, is
    /// darker than the middle pixel.
    /// </summary>
    public static ulong[] Of(Picture picture, PictureSize window)
    {
        var (width, height) = (picture.Size.Width, picture.Size.Height);
        var words = new ulong[picture.Size.Area];
        Parallel.For(0, height, v =>
        {
            var grey = picture.Grey;
            var usable = picture.Usable;
            for (var u = 0; u < width; u++)
            {
                ulong word = 0;
                var bit = 0;
                var middle = grey[v * width + u];
                for (var dv = -window.Height / 2; dv <= window.Height / 2; dv++)
                {
                    var row = Math.Clamp(v + dv, 0, height - 1);
                    for (var du = -window.Width / 2; du <= window.Width / 2; du++)
                    {
                        if (du == 0 && dv == 0)
                        {
                            continue;
                        }

                        var column = Math.Clamp(u + du, 0, width - 1);
                        if (grey[row * width + column] < middle && (usable is null || usable[column, row]))
                        {
                            word |= 1ul << bit;
                        }

                        bit++;
                    }
                }

                words[v * width + u] = word;
            }
        });
        return words;
    }
}
