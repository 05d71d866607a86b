using Pairwright.Imaging;

namespace Pairwright.Matching;

/// <summary>Removal of what has no texture to match by; see <see cref="Filter.PlainTexture"/>.</summary>
internal sealed class PlainTextureFilter : Filter
{
    private readonly int window;
    private readonly double timesNoise;

    public PlainTextureFilter(int window, double timesNoise)
    {
        if (window < 3 || window % 2 == 0 || !(timesNoise > 0) || !double.IsFinite(timesNoise))
        {
            throw new UserErrorException(
                $"A window of {window} px and {timesNoise} times the noise do not tell plain texture; give an odd side of at least 3 and a factor above zero.");
        }

        (this.window, this.timesNoise) = (window, timesNoise);
    }

    public override string Name => "plain texture";

    public override IReadOnlyList<StageSetting> Settings => [Setting("window", window), Setting("times noise", timesNoise)];

    public override void Apply(WorkingMap map, CancellationToken stop)
    {
        var (width, height, half) = (map.Size.Width, map.Size.Height, window / 2);
        var levels = GreyLevels.Of(map.Pair.Left);
        var gradients = LevelGradients.Across(levels, width);

        // A central difference halves the difference of two pixels: noise of variance σ² leaves σ²/2.
        var noise = PictureNoise.Of(map.Pair.Left).SigmaLevels * GreyLevels.ScaleOf(map.Pair.Left);
        var least = timesNoise * timesNoise * noise * noise / 2;
        RowWork.ForEach(0, height, Environment.ProcessorCount, stop, () => new double[width], (v, columns) =>
        {
            var (first, last) = (Math.Max(v - half, 0), Math.Min(v + half, height - 1));
            columns.AsSpan().Clear();
            for (var row = first; row <= last; row++)
            {
                for (var u = 0; u < width; u++)
                {
                    columns[u] += gradients[row * width + u] * gradients[row * width + u];
                }
            }

            for (var u = 0; u < width; u++)
            {
                var i = v * width + u;
                if (map.LabelArray[i] != DisparityLabel.Measured)
                {
                    continue;
                }

                var (left, right, sum) = (Math.Max(u - half, 0), Math.Min(u + half, width - 1), 0.0);
                for (var x = left; x <= right; x++)
                {
                    sum += columns[x];
                }

                if (sum <= least * (right - left + 1) * (last - first + 1))
                {
                    (map.LabelArray[i], map.DisparityArray[i]) = (DisparityLabel.NoMatch, float.NaN);
                }
            }
        });
    }
}
