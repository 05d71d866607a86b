using Pairwright.Geometry;

namespace Pairwright.Imaging;

/// <summary>Fills a picture from positions in another one.</summary>
internal static class Resampling
{
    /// <summary>The levels at positions, rounded to whole levels; 0 where the position is NaN or not on the source.</summary>
    /// <param name="source">Levels, <paramref name="channels"/> by turns, row after row.</param>
    /// <param name="size">The source's size.</param>
    /// <param name="channels">1 or 3.</param>
    /// <param name="largest">The largest level that the result may hold.</param>
    /// <param name="columns">Where to look: columns of the source.</param>
    /// <param name="rows">Where to look: rows of the source.</param>
    /// <param name="width">The result's width; strips of its rows run on several threads.</param>
    /// <param name="vectors">Whether to take four taps at a time; the result is the same to the bit.</param>
    public static ushort[] Levels(
        ReadOnlyMemory<ushort> source, PictureSize size, int channels, int largest, ReadOnlyMemory<float> columns, ReadOnlyMemory<float> rows, int width, bool vectors = true)
    {
        var target = new ushort[(long)columns.Length * channels];
        for (var each = 0; each < channels; each++)
        {
            var channel = each;
            var spline = CubicSpline.Through(source, size, channels, channel);
            Parallel.For(0, columns.Length / width, v =>
            {
                var us = columns.Span.Slice(v * width, width);
                var vs = rows.Span.Slice(v * width, width);
                var to = target.AsSpan(v * width * channels, width * channels);
                for (var i = 0; i < width; i++)
                {
                    if (spline.Covers(us[i], vs[i]))
                    {
                        var level = vectors ? spline.AtByVectors(us[i], vs[i]) : spline.At(us[i], vs[i]);
                        to[i * channels + channel] = (ushort)(Math.Clamp(level, 0, largest) + 0.5f);
                    }
                }
            });
        }

        return target;
    }

    /// <summary>Which positions lie on usable pixels: each neighbour that a straight line between pixels would weigh has to be one.</summary>
    /// <param name="size">The source's size.</param>
    /// <param name="usable">Its usable pixels; nothing where all are.</param>
    /// <param name="columns">Columns of the source; NaN is nowhere.</param>
    /// <param name="rows">Rows of the source.</param>
    public static bool[] Seen(PictureSize size, Mask? usable, ReadOnlySpan<float> columns, ReadOnlySpan<float> rows)
    {
        var seen = new bool[columns.Length];
        for (var i = 0; i < seen.Length; i++)
        {
            var (u, v) = (columns[i], rows[i]);
            if (!size.Contains(u, v))
            {
                continue;
            }

            // In the outer half pixel there is a neighbour on one side only.
            var (left, top) = ((int)Math.Max(u, 0), (int)Math.Max(v, 0));
            var (right, bottom) = (u > left ? Math.Min(left + 1, size.Width - 1) : left, v > top ? Math.Min(top + 1, size.Height - 1) : top);
            seen[i] = usable is null || (usable[left, top] && usable[right, top] && usable[left, bottom] && usable[right, bottom]);
        }

        return seen;
    }
}
