namespace Pairwright.Matching;

/// <summary>A filter written as a function of the map; see <see cref="Filter.FromMap"/>.</summary>
internal sealed class CodeFilter(Action<WorkingMap> apply, string code) : Filter
{
    public override string Name => "map";

    public override IReadOnlyList<StageSetting> Settings => [Setting("code", code)];

    private protected override Delegate Code => apply;

    public override void Apply(WorkingMap map, CancellationToken stop) => apply(map);
}
