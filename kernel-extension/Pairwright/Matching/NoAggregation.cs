using Pairwright.Imaging;

namespace Pairwright.Matching;

/// <summary>Leaves costs as they are.</summary>
internal sealed class NoAggregation : Aggregation
{
    public override string Name => "none";

    public override int? ReachPx => 0;

    public override IAggregator Prepare(RectifiedPair pair) => new Untouched();

    private sealed class Untouched : IAggregator
    {
        public void Apply(CostVolume costs, CancellationToken stop)
        {
        }
    }
}
