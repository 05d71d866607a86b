namespace Pairwright.Matching;

/// <summary>A check written as a function of a row; see <see cref="Check.FromRow"/>.</summary>
internal sealed class CodeCheck(Action<RowMatches> apply, string code) : Check
{
    public override string Name => "row";

    public override IReadOnlyList<StageSetting> Settings => [Setting("code", code)];

    private protected override Delegate Code => apply;

    public override void Apply(RowMatches row) => apply(row);
}
