using Pairwright.Imaging;

namespace Pairwright.Matching;

/// <summary>
/// The median of the disparities around a pixel, each weighted by how near its grey level and place are: surroundings across an edge of the
/// picture hardly count.
/// </summary>
/// <remarks>Ma, He, Wei, Sun and Wu, Constant time weighted median filtering for stereo matching and beyond, ICCV 2013, with bilateral weights.</remarks>
internal sealed class EdgeMedian
{
    private readonly Picture picture;
    private readonly int half;
    private readonly float[] byPlace;
    private readonly float[] byLevel;

    public EdgeMedian(Picture picture, int half, double levels)
    {
        (this.picture, this.half) = (picture, half);
        byPlace = new float[(2 * half + 1) * (2 * half + 1)];
        for (var i = 0; i < byPlace.Length; i++)
        {
            var (u, v) = (i % (2 * half + 1) - half, i / (2 * half + 1) - half);
            byPlace[i] = (float)Math.Exp(-(u * u + v * v) / (2.0 * Math.Max(half * half / 4.0, 1)));
        }

        // Levels are whole numbers, so every weight fits into a table.
        var scale = GreyLevels.ScaleOf(picture);
        byLevel = [.. Enumerable.Range(0, 1 << picture.SignificantBits).Select(i => (float)Math.Exp(-i * scale / levels))];
    }

    /// <summary>Room for one thread's work.</summary>
    public (float[] Values, float[] Weights) Buffer() => (new float[byPlace.Length], new float[byPlace.Length]);

    /// <summary>The weighted median of the measured and filled disparities around a pixel; NaN where there is none.</summary>
    public float At(int u, int v, float[] disparity, DisparityLabel[] labels, (float[] Values, float[] Weights) buffer)
    {
        var (width, height) = (picture.Size.Width, picture.Size.Height);
        var grey = picture.Grey;
        var middle = grey[v * width + u];
        var count = 0;
        for (var row = Math.Max(v - half, 0); row <= Math.Min(v + half, height - 1); row++)
        {
            for (var column = Math.Max(u - half, 0); column <= Math.Min(u + half, width - 1); column++)
            {
                var i = row * width + column;
                if (labels[i] is DisparityLabel.Measured or DisparityLabel.Filled)
                {
                    buffer.Values[count] = disparity[i];
                    buffer.Weights[count++] = byPlace[(row - v + half) * (2 * half + 1) + column - u + half] * byLevel[Math.Abs(grey[i] - middle)];
                }
            }
        }

        return WeightedSelection.Median(buffer.Values.AsSpan(0, count), buffer.Weights.AsSpan(0, count));
    }
}
