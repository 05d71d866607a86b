using Pairwright.Imaging;

namespace Pairwright.Matching;

/// <summary>What happens to a row once its winners are known: labels, sub-pixel, checks, and its entry into the map.</summary>
internal static class RowFinish
{
    public static void Apply(RowMatches row, Recipe recipe, WorkingMap map, CancellationToken stop)
    {
        StageGuard.Run(recipe.SubPixel, stop, () => Label(row, recipe.SubPixel));
        foreach (var check in recipe.Checks)
        {
            StageGuard.Run(check, stop, () => check.Apply(row));
        }

        var width = map.Size.Width;
        var start = row.V * width;
        for (var u = 0; u < width; u++)
        {
            map.LabelArray[start + u] = row.Labels[u];
            map.DisparityArray[start + u] = row.Labels[u] == DisparityLabel.Measured ? row.Disparity[u] : float.NaN;
            map.ConfidenceArray[start + u] = Confidence(row.Lowest[u], row.SecondLowest[u]);
        }
    }

    private static void Label(RowMatches row, SubPixel subPixel)
    {
        var usable = row.Pair.Left.Usable;
        for (var u = 0; u < row.Winner.Length; u++)
        {
            row.Labels[u] =
                usable?[u, row.V] == false ? DisparityLabel.Unusable
                : row.Winner[u] == RowMatches.None ? DisparityLabel.NoMatch
                : float.IsNaN(row.Before[u]) || float.IsNaN(row.After[u]) ? DisparityLabel.RangeEnd
                : DisparityLabel.Measured;
            row.Disparity[u] = row.Labels[u] == DisparityLabel.Measured
                ? row.Winner[u] + Offset(subPixel, row.Before[u], row.Lowest[u], row.After[u])
                : float.NaN;
        }
    }

    private static float Offset(SubPixel subPixel, float before, float lowest, float after)
    {
        var offset = subPixel.Offset(before, lowest, after);

        // A whole pixel leaves room for rounding; more is a mistake of whoever wrote the stage.
        return Math.Abs(offset) <= 1
            ? offset
            : throw new UserErrorException(
                $"The sub-pixel stage '{subPixel.Name}' gave an offset of {offset} px for the totals {before}, {lowest}, {after}; an offset lies between -0.5 and 0.5 px.");
    }

    // Two equal totals, zeros included, say nothing; NaN stays NaN.
    private static float Confidence(float lowest, float second) => second == lowest ? 0 : float.IsPositiveInfinity(second) ? 1 : 1 - lowest / second;
}
