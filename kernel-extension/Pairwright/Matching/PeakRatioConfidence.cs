using System.Runtime.Intrinsics;

namespace Pairwright.Matching;

/// <summary>The lowest total against the second lowest; see <see cref="Confidence.PeakRatio"/>.</summary>
internal sealed class PeakRatioConfidence : Confidence
{
    public override string Name => "peak ratio";

    // Two equal totals, zeros included, say nothing; NaN stays NaN.
    public override void Fill(RowMatches row, Span<float> confidence)
    {
        ReadOnlySpan<float> lowest = row.Lowest;
        ReadOnlySpan<float> second = row.SecondLowest;
        var u = 0;
        for (; u <= lowest.Length - Vector256<float>.Count; u += Vector256<float>.Count)
        {
            var (low, next) = (Vector256.Create(lowest[u..]), Vector256.Create(second[u..]));
            var share = Vector256<float>.One - low / next;
            share = Vector256.ConditionalSelect(Vector256.Equals(next, Vector256.Create(float.PositiveInfinity)), Vector256<float>.One, share);
            Vector256.ConditionalSelect(Vector256.Equals(low, next), Vector256<float>.Zero, share).CopyTo(confidence[u..]);
        }

        for (; u < lowest.Length; u++)
        {
            confidence[u] = second[u] == lowest[u] ? 0 : float.IsPositiveInfinity(second[u]) ? 1 : 1 - lowest[u] / second[u];
        }
    }
}
