using System.Runtime.Intrinsics;
using Pairwright.Imaging;

namespace Pairwright.Matching;

/// <summary>What happens to a row once its winners are known: labels, sub-pixel, checks, and its entry into the map.</summary>
/// <remarks>Eight columns at a time; the columns that are left over go one by one by the same formulas.</remarks>
internal static class RowFinish
{
    public static void Apply(RowMatches row, Recipe recipe, WorkingMap map, CancellationToken stop)
    {
        StageGuard.Run(recipe.SubPixel, stop, () => recipe.SubPixel.Offsets(row.Before, row.Lowest, row.After, row.Disparity));
        Label(row);
        foreach (var check in recipe.Checks)
        {
            StageGuard.Run(check, stop, () => check.Apply(row));
        }

        var width = map.Size.Width;
        var start = row.V * width;
        row.Labels.CopyTo(map.LabelArray.AsSpan(start));
        Measured(row, map.DisparityArray.AsSpan(start, width));
        StageGuard.Run(recipe.Confidence, stop, () => recipe.Confidence.Fill(row, map.ConfidenceArray.AsSpan(start, width)));
        map.Evidence?.Take(row);
    }

    // On entry the disparities are offsets from the winners.
    private static void Label(RowMatches row)
    {
        var winner = row.Winner;
        var before = row.Before;
        var after = row.After;
        var disparity = row.Disparity;
        var labels = row.Labels;
        var u = 0;
        for (; u <= winner.Length - LabelVectors.Step; u += LabelVectors.Step)
        {
            var (won, below, above) = (Vector256.Create<int>(winner[u..]), Vector256.Create<float>(before[u..]), Vector256.Create<float>(after[u..]));
            var none = Vector256.Equals(won, Vector256.Create(RowMatches.None));
            var inside = (Vector256.Equals(below, below) & Vector256.Equals(above, above)).AsInt32();
            var label = Vector256.ConditionalSelect(inside, Vector256.Create((int)DisparityLabel.Measured), Vector256.Create((int)DisparityLabel.RangeEnd));
            label = Vector256.ConditionalSelect(none, Vector256.Create((int)DisparityLabel.NoMatch), label);
            LabelVectors.Store(label, labels, u);
            var value = Vector256.ConvertToSingle(won) + Vector256.Create<float>(disparity[u..]);
            Vector256.ConditionalSelect((inside & ~none).AsSingle(), value, Vector256.Create(float.NaN)).CopyTo(disparity[u..]);
        }

        for (; u < winner.Length; u++)
        {
            labels[u] =
                winner[u] == RowMatches.None ? DisparityLabel.NoMatch
                : float.IsNaN(before[u]) || float.IsNaN(after[u]) ? DisparityLabel.RangeEnd
                : DisparityLabel.Measured;
            disparity[u] = labels[u] == DisparityLabel.Measured ? winner[u] + disparity[u] : float.NaN;
        }

        if (row.Pair.Left.Usable is { } usable)
        {
            for (u = 0; u < winner.Length; u++)
            {
                (labels[u], disparity[u]) = usable[u, row.V] ? (labels[u], disparity[u]) : (DisparityLabel.Unusable, float.NaN);
            }
        }
    }

    private static void Measured(RowMatches row, Span<float> map)
    {
        var disparity = row.Disparity;
        var labels = row.Labels;
        var u = 0;
        for (; u <= labels.Length - LabelVectors.Step; u += LabelVectors.Step)
        {
            var measured = LabelVectors.Are(LabelVectors.Load(labels, u), DisparityLabel.Measured);
            Vector256.ConditionalSelect(measured.AsSingle(), Vector256.Create<float>(disparity[u..]), Vector256.Create(float.NaN)).CopyTo(map[u..]);
        }

        for (; u < labels.Length; u++)
        {
            map[u] = labels[u] == DisparityLabel.Measured ? disparity[u] : float.NaN;
        }
    }
}
