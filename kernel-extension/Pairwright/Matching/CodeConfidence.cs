namespace Pairwright.Matching;

/// <summary>A confidence written as a function of a row; see <see cref="Confidence.FromRow"/>.</summary>
internal sealed class CodeConfidence(RowConfidence fill, string code) : Confidence
{
    public override string Name => "row";

    public override IReadOnlyList<StageSetting> Settings => [Setting("code", code)];

    private protected override Delegate Code => fill;

    public override void Fill(RowMatches row, Span<float> confidence) => fill(row, confidence);
}
