namespace Pairwright.Matching;

/// <summary>The agreement of both directions; see <see cref="Confidence.LeftRight"/>.</summary>
internal sealed class LeftRightConfidence : Confidence
{
    public override string Name => "left-right";

    public override void Fill(RowMatches row, Span<float> confidence)
    {
        for (var u = 0; u < confidence.Length; u++)
        {
            confidence[u] = row.Winner[u] == RowMatches.None ? float.NaN : 1f / (1 + Math.Abs(row.RightWinner[u - row.Winner[u]] - row.Winner[u]));
        }
    }
}
