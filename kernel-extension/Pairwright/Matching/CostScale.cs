using Pairwright.Imaging;

namespace Pairwright.Matching;

/// <summary>What two unrelated pixels of a pair typically cost.</summary>
internal static class CostScale
{
    // Rows enough for a mean within a few percent; nearly all disparities of a pixel are wrong ones, so the mean over all stands for unrelated pixels.
    private const int Rows = 16;

    /// <summary>The cost's own figure, or the mean over rows spread evenly over the pair where it has none; 1 where nothing can be compared.</summary>
    public static double Of(Cost cost, ICostRows rows, RectifiedPair pair, DisparityRange range)
    {
        if (!double.IsNaN(cost.Unrelated))
        {
            return cost.Unrelated;
        }

        var costs = new float[pair.Size.Width * range.Count];
        var (sum, count) = (0.0, 0L);
        for (var i = 0; i < Rows; i++)
        {
            rows.Row((int)((i + 0.5) * pair.Size.Height / Rows), range, costs);
            foreach (var value in costs)
            {
                if (float.IsFinite(value))
                {
                    (sum, count) = (sum + value, count + 1);
                }
            }
        }

        // Whole where the scale allows it, as penalties are, so that costs of whole levels stay whole.
        var mean = sum > 0 ? sum / count : 1;
        return mean >= 4 ? Math.Round(mean) : mean;
    }
}
