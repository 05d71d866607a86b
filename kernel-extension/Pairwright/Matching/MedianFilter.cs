namespace Pairwright.Matching;

/// <summary>The median of a 3 × 3 neighbourhood; see <see cref="Filter.Median"/>.</summary>
internal sealed class MedianFilter : Filter
{
    public override string Name => "median";

    public override void Apply(WorkingMap map, CancellationToken stop)
    {
        var (width, height) = (map.Size.Width, map.Size.Height);
        var source = map.DisparityArray.AsSpan().ToArray();
        Parallel.For(0, height, new ParallelOptions { CancellationToken = stop }, v =>
        {
            Span<float> around = stackalloc float[9];
            for (var u = 0; u < width; u++)
            {
                if (map.LabelArray[v * width + u] != DisparityLabel.Measured)
                {
                    continue;
                }

                var count = 0;
                for (var row = Math.Max(v - 1, 0); row <= Math.Min(v + 1, height - 1); row++)
                {
                    for (var column = Math.Max(u - 1, 0); column <= Math.Min(u + 1, width - 1); column++)
                    {
                        if (map.LabelArray[row * width + column] == DisparityLabel.Measured)
                        {
                            around[count++] = source[row * width + column];
                        }
                    }
                }

                around[..count].Sort();
                map.DisparityArray[v * width + u] = around[(count - 1) / 2];
            }
        });
    }
}
