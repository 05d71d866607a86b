namespace Pairwright.Matching;

/// <summary>A sub-pixel estimate written as a function of three totals; see <see cref="SubPixel.FromTotals"/>.</summary>
internal sealed class CodeSubPixel(Func<float, float, float, float> offset, string code) : SubPixel
{
    public override string Name => "totals";

    public override IReadOnlyList<StageSetting> Settings => [Setting("code", code)];

    private protected override Delegate Code => offset;

    public override float Offset(float before, float lowest, float after) => offset(before, lowest, after);
}
