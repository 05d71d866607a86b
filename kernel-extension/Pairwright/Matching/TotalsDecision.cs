using Pairwright.Imaging;

namespace Pairwright.Matching;

/// <summary>Chooses the winners of rows from their totals, seen from the left and from the right picture.</summary>
/// <remarks>One for each thread.</remarks>
internal sealed class TotalsDecision(RectifiedPair pair, DisparityRange range)
{
    private readonly float[] rightLowest = new float[pair.Size.Width];

    /// <summary>The row that winners are entered into.</summary>
    public RowMatches Row { get; } = new(pair, range);

    /// <summary>Chooses the winners of a row; what cannot be compared becomes infinite in the totals.</summary>
    public void Decide(int v, Span<float> totals)
    {
        var (width, count) = (pair.Size.Width, range.Count);
        ComparableCosts.Close(pair, v, range, totals);
        Row.V = v;
        Row.RightWinner.Fill(RowMatches.None);
        rightLowest.AsSpan().Fill(float.PositiveInfinity);
        for (var u = 0; u < width; u++)
        {
            Choose(u, totals.Slice(u * count, count));
        }
    }

    private void Choose(int u, ReadOnlySpan<float> total)
    {
        var lowest = PathStep.Lowest(total);
        if (float.IsPositiveInfinity(lowest))
        {
            (Row.Winner[u], Row.Lowest[u], Row.Before[u], Row.After[u], Row.SecondLowest[u]) = (RowMatches.None, float.NaN, float.NaN, float.NaN, float.NaN);
            return;
        }

        var winner = total.IndexOf(lowest);
        Row.Winner[u] = range.Least + winner;
        Row.Lowest[u] = lowest;
        Row.Before[u] = winner > 0 && float.IsFinite(total[winner - 1]) ? total[winner - 1] : float.NaN;
        Row.After[u] = winner < total.Length - 1 && float.IsFinite(total[winner + 1]) ? total[winner + 1] : float.NaN;
        Row.SecondLowest[u] = Math.Min(PathStep.Lowest(total[..Math.Max(winner - 1, 0)]), PathStep.Lowest(total[Math.Min(winner + 2, total.Length)..]));

        // Disparities grow with the columns that a right pixel could match, so the first of equal totals is the smallest.
        var first = Math.Max(u - pair.Size.Width + 1 - range.Least, 0);
        var end = Math.Min(u - range.Least + 1, total.Length);
        var rightWinner = Row.RightWinner;
        for (var i = first; i < end; i++)
        {
            var right = u - range.Least - i;
            if (total[i] < rightLowest[right])
            {
                (rightLowest[right], rightWinner[right]) = (total[i], range.Least + i);
            }
        }
    }
}
