namespace Pairwright.Matching;

/// <summary>The weighted median of a few numbers, without sorting them all (Hoare 1961).</summary>
internal static class WeightedSelection
{
    /// <summary>The least value such that it and those below have half of the weight; both spans are shuffled.</summary>
    /// <returns>NaN where there is no value.</returns>
    public static float Median(Span<float> values, Span<float> weights)
    {
        var total = 0f;
        foreach (var weight in weights)
        {
            total += weight;
        }

        var (first, end, below) = (0, values.Length, 0f);
        while (end - first > 1)
        {
            // Three ways: less than the pivot, equal, more.
            var pivot = MiddleOf(values[first], values[(first + end) / 2], values[end - 1]);
            var (less, i, more, lessWeight, equalWeight) = (first, first, end, 0f, 0f);
            while (i < more)
            {
                if (values[i] < pivot)
                {
                    lessWeight += weights[i];
                    Swap(values, weights, i++, less++);
                }
                else if (values[i] > pivot)
                {
                    Swap(values, weights, i, --more);
                }
                else
                {
                    equalWeight += weights[i++];
                }
            }

            if (2 * (below + lessWeight) >= total && less > first)
            {
                end = less;
            }
            else if (2 * (below + lessWeight + equalWeight) >= total || more == end)
            {
                return pivot;
            }
            else
            {
                (first, below) = (more, below + lessWeight + equalWeight);
            }
        }

        return end > first ? values[first] : float.NaN;
    }

    private static float MiddleOf(float a, float b, float c) => Math.Max(Math.Min(a, b), Math.Min(Math.Max(a, b), c));

    private static void Swap(Span<float> values, Span<float> weights, int i, int j)
    {
        (values[i], values[j]) = (values[j], values[i]);
        (weights[i], weights[j]) = (weights[j], weights[i]);
    }
}
