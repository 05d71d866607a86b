namespace Pairwright.Imaging;

/// <summary>Figures of a picture's usable pixels, taken in one pass.</summary>
/// <param name="Mean">The mean level.</param>
/// <param name="StandardDeviation">The standard deviation of the levels.</param>
/// <param name="SaturatedShare">The share of pixels at or above the saturation level.</param>
/// <param name="RmsGradient">The root mean square of the gradient's length, in levels per pixel, by central differences.</param>
internal sealed record PictureStatistics(double Mean, double StandardDeviation, double SaturatedShare, double RmsGradient)
{
    public static PictureStatistics Of(Picture picture)
    {
        var (width, height) = (picture.Size.Width, picture.Size.Height);
        var grey = picture.Grey;
        var usable = picture.Usable is null ? [] : picture.Usable.Usable;
        long count = 0, sum = 0, squares = 0, saturated = 0, gradients = 0, gradientSquares = 0;
        for (var v = 0; v < height; v++)
        {
            for (var u = 0; u < width; u++)
            {
                var at = v * width + u;
                if (!usable.IsEmpty && !usable[at])
                {
                    continue;
                }

                long level = grey[at];
                count++;
                sum += level;
                squares += level * level;
                saturated += level >= picture.SaturationLevel ? 1 : 0;
                if (u == 0 || v == 0 || u == width - 1 || v == height - 1
                    || (!usable.IsEmpty && !(usable[at - 1] && usable[at + 1] && usable[at - width] && usable[at + width])))
                {
                    continue;
                }

                long across = grey[at + 1] - grey[at - 1];
                long down = grey[at + width] - grey[at - width];
                gradients++;
                gradientSquares += across * across + down * down;
            }
        }

        if (count == 0)
        {
            return new(double.NaN, double.NaN, double.NaN, double.NaN);
        }

        // Integer sums do not depend on their order and stay below 2^63: 200 million pixels of 16 bits square to less than 2^60.
        var mean = sum / (double)count;
        var variance = Math.Max(0, squares / (double)count - mean * mean);
        return new(mean, Math.Sqrt(variance), saturated / (double)count, gradients == 0 ? double.NaN : Math.Sqrt(gradientSquares / (double)gradients) / 2);
    }
}
