namespace Pairwright.Matching;

/// <summary>The rise of the totals beside the lowest; see <see cref="Confidence.Curvature"/>.</summary>
internal sealed class CurvatureConfidence : Confidence
{
    public override string Name => "curvature";

    public override void Fill(RowMatches row, Span<float> confidence)
    {
        for (var u = 0; u < confidence.Length; u++)
        {
            // At an end of what could be searched one side is not known, and so is the rise.
            var beside = row.Before[u] + row.After[u];
            confidence[u] = beside > 0 ? (beside - 2 * row.Lowest[u]) / beside : float.IsNaN(beside) ? float.NaN : 0;
        }
    }
}
