using Pairwright.Imaging;

namespace Pairwright.Matching;

/// <summary>The weighted median; see <see cref="Filter.WeightedMedian"/>.</summary>
internal sealed class WeightedMedianFilter : Filter
{
    private readonly int window;
    private readonly double levels;

    public WeightedMedianFilter(int window, double levels)
    {
        if (window < 3 || window % 2 == 0 || window > 63 || !(levels > 0) || !double.IsFinite(levels))
        {
            throw new UserErrorException(
                $"A weighted median over {window} px and {levels} grey levels is not one; give an odd side from 3 to 63 and a number of levels above zero.");
        }

        (this.window, this.levels) = (window, levels);
    }

    public override string Name => "weighted median";

    public override IReadOnlyList<StageSetting> Settings => [Setting("window", window), Setting("levels", levels)];

    public override void Apply(WorkingMap map, CancellationToken stop)
    {
        var source = map.DisparityArray.AsSpan().ToArray();
        var labels = map.LabelArray.AsSpan().ToArray();
        var median = new EdgeMedian(map.Pair.Left, window / 2, levels);
        RowWork.ForEach(0, map.Size.Height, Environment.ProcessorCount, stop, median.Buffer, (v, buffer) =>
        {
            for (var u = 0; u < map.Size.Width; u++)
            {
                var i = v * map.Size.Width + u;
                if (labels[i] == DisparityLabel.Measured)
                {
                    map.DisparityArray[i] = median.At(u, v, source, labels, buffer);
                }
            }
        });
    }
}
