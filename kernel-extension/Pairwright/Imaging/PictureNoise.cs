using System.Globalization;

namespace Pairwright.Imaging;

/// <summary>The noise of a picture: the standard deviation of one pixel's level, and how it was found.</summary>
/// <param name="SigmaLevels">The standard deviation, in grey levels of the picture; where it depends on the level, at the mean one.</param>
/// <param name="Source">How it was found, in a few words.</param>
public sealed record PictureNoise(double SigmaLevels, string Source)
{
    /// <summary>The variance that rounding to whole levels adds: 1/12.</summary>
    private const double RoundingVariance = 1 / 12.0;

    // Structure has no part in the quietest tenth of blocks, nor in what saturates.
    private const int BlockPx = 16;
    private const double QuietShare = 0.1;

    /// <summary>Estimates the noise from one picture.</summary>
    /// <remarks>
    /// <para>
    /// Immerkær, Fast noise variance estimation, CVIU 1996: the difference of two Laplacians, which sees no plane and no straight edge along the
    /// axes, has the variance 36·σ² for white noise; σ follows from its mean magnitude, √(π/2)·E|·|/6.
    /// </para>
    /// <para>
    /// Fine texture would pass for noise, so the mean is taken over blocks of 16 × 16 pixels and the quietest tenth of them counts, corrected for
    /// having been chosen as the quietest: right within 8 % where at least a tenth of the picture is calm. One that is textured everywhere shows too
    /// much; noise that resampling or a file format has smoothed shows too little. It is never taken below the rounding to whole levels, 1/√12.
    /// </para>
    /// </remarks>
    /// <param name="picture">A picture of at least 3 × 3 pixels.</param>
    public static PictureNoise Of(Picture picture)
    {
        ArgumentNullException.ThrowIfNull(picture);
        var (width, height) = (picture.Size.Width, picture.Size.Height);
        var blocks = new List<double>();
        for (var top = 1; top + BlockPx < height; top += BlockPx)
        {
            for (var left = 1; left + BlockPx < width; left += BlockPx)
            {
                if (MeanMagnitude(picture, left, top, left + BlockPx, top + BlockPx) is { } mean)
                {
                    blocks.Add(mean);
                }
            }
        }

        double magnitude;
        if (blocks.Count >= 20)
        {
            blocks.Sort();
            var count = Math.Max((int)(QuietShare * blocks.Count), 2);
            magnitude = blocks.Take(count).Average() / QuietestTenth;
        }
        else
        {
            magnitude = MeanMagnitude(picture, 1, 1, width - 1, height - 1) ?? 0;
        }

        var sigma = Math.Sqrt(Math.PI / 2) * magnitude / 6;
        return new(Math.Max(sigma, Math.Sqrt(RoundingVariance)), "from one picture");
    }

    /// <summary>The figure in a line.</summary>
    public override string ToString() => string.Create(CultureInfo.InvariantCulture, $"Noise {SigmaLevels:0.00} grey levels ({Source})");

    // The mean magnitude of the quietest tenth of blocks over that of the noise: 0.856 where all blocks are calm, simulated with 16,000 of them,
    // and 1 where no more than a tenth is. The middle is off by 8 % at most.
    private const double QuietestTenth = 0.925;

    // The mean magnitude of the mask 1 −2 1 / −2 4 −2 / 1 −2 1 over a block; nothing where a pixel is saturated, black or not usable.
    private static double? MeanMagnitude(Picture picture, int left, int top, int right, int bottom)
    {
        var (sum, count) = (0L, 0);
        for (var v = top; v < bottom; v++)
        {
            for (var u = left; u < right; u++)
            {
                if (picture[u, v] >= picture.SaturationLevel || picture[u, v] == 0 || picture.Usable?[u, v] == false)
                {
                    return null;
                }

                var above = picture[u - 1, v - 1] - 2 * picture[u, v - 1] + picture[u + 1, v - 1];
                var here = picture[u - 1, v] - 2 * picture[u, v] + picture[u + 1, v];
                var below = picture[u - 1, v + 1] - 2 * picture[u, v + 1] + picture[u + 1, v + 1];
                (sum, count) = (sum + Math.Abs(above - 2 * here + below), count + 1);
            }
        }

        return count == 0 ? null : (double)sum / count;
    }
}
