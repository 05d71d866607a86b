using Pairwright.Imaging;

namespace Pairwright.Matching;

/// <summary>What happens to a row once its winners are known: labels, sub-pixel, checks, and its entry into the map.</summary>
internal static class RowFinish
{
    public static void Apply(RowMatches row, Recipe recipe, WorkingMap map)
    {
        var width = map.Size.Width;
        var usable = row.Pair.Left.Usable;
        for (var u = 0; u < width; u++)
        {
            row.Labels[u] =
                usable?[u, row.V] == false ? DisparityLabel.Unusable
                : row.Winner[u] == RowMatches.None ? DisparityLabel.NoMatch
                : float.IsNaN(row.Before[u]) || float.IsNaN(row.After[u]) ? DisparityLabel.RangeEnd
                : DisparityLabel.Measured;
            row.Disparity[u] = row.Labels[u] == DisparityLabel.Measured
                ? row.Winner[u] + recipe.SubPixel.Offset(row.Before[u], row.Lowest[u], row.After[u])
                : float.NaN;
        }

        foreach (var check in recipe.Checks)
        {
            check.Apply(row);
        }

        var start = row.V * width;
        for (var u = 0; u < width; u++)
        {
            map.LabelArray[start + u] = row.Labels[u];
            map.DisparityArray[start + u] = row.Labels[u] == DisparityLabel.Measured ? row.Disparity[u] : float.NaN;
            map.ConfidenceArray[start + u] = Confidence(row.Lowest[u], row.SecondLowest[u]);
        }
    }

    // Two equal totals, zeros included, say nothing; NaN stays NaN.
    private static float Confidence(float lowest, float second) => second == lowest ? 0 : float.IsPositiveInfinity(second) ? 1 : 1 - lowest / second;
}
