namespace Pairwright.Matching;

/// <summary>Removal of small patches; see <see cref="Filter.Speckle"/>.</summary>
internal sealed class SpeckleFilter : Filter
{
    private readonly int smallest;
    private readonly double step;

    public SpeckleFilter(int smallest, double step)
    {
        if (smallest < 1 || !(step > 0) || !double.IsFinite(step))
        {
            throw new UserErrorException($"A speckle filter of {smallest} px and a step of {step} px is not one; give a size and a step above zero.");
        }

        (this.smallest, this.step) = (smallest, step);
    }

    public override string Name => "speckle";

    public override IReadOnlyList<StageSetting> Settings => [Setting("smallest px", smallest), Setting("step px", step)];

    public override void Apply(WorkingMap map, CancellationToken stop)
    {
        var (width, height) = (map.Size.Width, map.Size.Height);
        var disparity = map.Disparity;
        var labels = map.Labels;
        var parents = new int[disparity.Length];
        var limit = (float)step;

        // Union of runs: every pixel points at the first of its patch (Tarjan 1975), patches joined to the left and upwards.
        for (var v = 0; v < height; v++)
        {
            stop.ThrowIfCancellationRequested();
            for (var u = 0; u < width; u++)
            {
                var i = v * width + u;
                parents[i] = i;

                // A comparison with NaN is false, so gaps join nothing.
                if (u > 0 && Math.Abs(disparity[i] - disparity[i - 1]) <= limit)
                {
                    parents[i] = Root(parents, i - 1);
                }

                if (v > 0 && Math.Abs(disparity[i] - disparity[i - width]) <= limit)
                {
                    var (here, above) = (Root(parents, i), Root(parents, i - width));
                    parents[Math.Max(here, above)] = Math.Min(here, above);
                }
            }
        }

        var sizes = new int[disparity.Length];
        for (var i = 0; i < parents.Length; i++)
        {
            parents[i] = Root(parents, i);
            sizes[parents[i]]++;
        }

        for (var i = 0; i < parents.Length; i++)
        {
            if (labels[i] == DisparityLabel.Measured && sizes[parents[i]] < smallest)
            {
                (disparity[i], labels[i]) = (float.NaN, DisparityLabel.Speckle);
            }
        }
    }

    private static int Root(int[] parents, int i)
    {
        while (parents[i] != i)
        {
            parents[i] = parents[parents[i]];
            i = parents[i];
        }

        return i;
    }
}
