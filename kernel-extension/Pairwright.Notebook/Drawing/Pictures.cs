using Pairwright.Imaging;

namespace Pairwright.Notebook.Drawing;

/// <summary>Turns pictures and maps into small rasters for a page.</summary>
internal static class Pictures
{
    /// <summary>The picture scaled down to at most a width by area averaging; never enlarged.</summary>
    /// <param name="picture">The picture.</param>
    /// <param name="width">The largest width, in pixels.</param>
    /// <param name="white">The grey level that shows as white; the largest level of the picture's bits when left out.</param>
    public static Raster Reduced(Picture picture, int width = 520, double? white = null)
    {
        var gain = 255 / (white ?? (1 << picture.SignificantBits) - 1);
        return picture.HasColour
            ? Reduced(picture.Colour, picture.Size.Width, picture.Size.Height, 3, width, gain)
            : Reduced(picture.Grey, picture.Size.Width, picture.Size.Height, 1, width, gain);
    }

    /// <summary>The level at which a picture may be shown white: where it is dark, the level that one pixel in two hundred passes.</summary>
    public static double White(Picture picture)
    {
        var most = (1 << picture.SignificantBits) - 1;
        var counts = new int[most + 1];
        foreach (var level in picture.Grey)
        {
            counts[Math.Min((int)level, most)]++;
        }

        var above = 0L;
        for (var level = most; level > 0; level--)
        {
            above += counts[level];
            if (above > picture.Size.Area / 200)
            {
                return level > most / 2 ? most : Math.Max(level, 1);
            }
        }

        return most;
    }

    /// <summary>A square patch around a position, nearest pixels, with <paramref name="outside"/> beyond the picture.</summary>
    public static Raster Patch(Picture picture, double centreU, double centreV, int half, double white, byte outside = 128)
    {
        var side = 2 * half + 1;
        var levels = new byte[side * side];
        var (u0, v0) = ((int)Math.Round(centreU) - half, (int)Math.Round(centreV) - half);
        for (var v = 0; v < side; v++)
        {
            for (var u = 0; u < side; u++)
            {
                var inside = u0 + u >= 0 && v0 + v >= 0 && u0 + u < picture.Size.Width && v0 + v < picture.Size.Height;
                levels[v * side + u] = inside ? (byte)Math.Min(255, 255 * picture[u0 + u, v0 + v] / white) : outside;
            }
        }

        return new(side, side, 1, levels);
    }

    /// <summary>A map in colours; a pixel without a value is striped, so that it can be taken for no value.</summary>
    /// <remarks>Every pixel shown is one pixel of the map: averaging over an edge would invent values that nobody measured.</remarks>
    public static Raster Coloured(ScalarMap map, Ramp ramp, double least, double most, int width = 560)
    {
        var (w, h) = Fitted(map.Size.Width, map.Size.Height, width);
        return Raster.From(w, h, (u, v) =>
        {
            var value = map[(2 * u + 1) * map.Size.Width / (2 * w), (2 * v + 1) * map.Size.Height / (2 * h)];
            return float.IsNaN(value) ? ColourScale.NoValue(u, v) : ramp.At((value - least) / (most - least));
        });
    }

    /// <summary>The size of a picture scaled down to at most a width.</summary>
    public static (int Width, int Height) Fitted(int width, int height, int most) =>
        width <= most ? (width, height) : (most, Math.Max(1, (int)Math.Round(height * (double)most / width)));

    /// <summary>Area averaging: every level of the source has the same weight in the result.</summary>
    internal static Raster Reduced(ReadOnlySpan<ushort> source, int width, int height, int channels, int most, double gain)
    {
        var (w, h) = Fitted(width, height, most);
        var sums = new double[w * channels];
        var levels = new byte[w * h * channels];
        var columns = Spans(width, w);
        var rows = Spans(height, h);
        for (var y = 0; y < h; y++)
        {
            Array.Clear(sums);
            foreach (var (v, tall) in rows[y])
            {
                for (var x = 0; x < w; x++)
                {
                    foreach (var (u, wide) in columns[x])
                    {
                        for (var c = 0; c < channels; c++)
                        {
                            sums[x * channels + c] += tall * wide * source[(v * width + u) * channels + c];
                        }
                    }
                }
            }

            for (var i = 0; i < sums.Length; i++)
            {
                levels[y * sums.Length + i] = (byte)Math.Clamp(Math.Round(gain * sums[i]), 0, 255);
            }
        }

        return new(w, h, channels, levels);
    }

    // For each target cell the source cells beneath it and the share of the target that each covers.
    private static (int Source, double Share)[][] Spans(int source, int target)
    {
        var ratio = source / (double)target;
        return
        [
            .. Enumerable.Range(0, target).Select(cell =>
            {
                var (from, to) = (cell * ratio, (cell + 1) * ratio);
                var last = Math.Min(source - 1, (int)Math.Ceiling(to - 1e-9) - 1);
                return Enumerable.Range((int)from, last - (int)from + 1)
                    .Select(s => (s, (Math.Min(to, s + 1) - Math.Max(from, s)) / ratio))
                    .ToArray();
            }),
        ];
    }
}
