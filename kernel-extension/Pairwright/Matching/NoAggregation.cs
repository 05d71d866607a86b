namespace Pairwright.Matching;

/// <summary>Leaves costs as they are.</summary>
internal sealed class NoAggregation : Aggregation
{
    public override string Name => "none";
}
