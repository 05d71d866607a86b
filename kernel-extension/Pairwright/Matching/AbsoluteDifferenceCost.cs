using System.Numerics;
using Pairwright.Imaging;

namespace Pairwright.Matching;

/// <summary>The absolute difference of two grey levels; see <see cref="Cost.AbsoluteDifference"/>.</summary>
internal sealed class AbsoluteDifferenceCost(double? limit) : Cost
{
    private readonly double? limit = CostLimit.Checked(limit);

    public override string Name => "absolute difference";

    /// <summary>The greatest cost; nothing where there is none.</summary>
    public double? Limit => limit;

    public override IReadOnlyList<StageSetting> Settings => limit is { } most ? [Setting("limit", most)] : [];

    public override ICostRows Prepare(RectifiedPair pair) =>
        new Rows(pair, GreyLevels.Of(pair.Left), GreyLevels.Of(pair.Right), (float)(limit ?? double.PositiveInfinity));

    private sealed class Rows(RectifiedPair pair, float[] left, float[] right, float limit) : PlaneRows(pair, [left], [right])
    {
        protected override void Compare(ReadOnlySpan<float> here, RightRow[] right, int u, Span<float> costs)
        {
            var under = right[0].Under(u);
            var (level, most) = (new Vector<float>(here[0]), new Vector<float>(limit));
            var i = 0;
            for (; i <= costs.Length - Vector<float>.Count; i += Vector<float>.Count)
            {
                Vector.Min(Vector.Abs(level - new Vector<float>(under[i..])), most).CopyTo(costs[i..]);
            }

            for (; i < costs.Length; i++)
            {
                costs[i] = Math.Min(Math.Abs(here[0] - under[i]), limit);
            }
        }
    }
}
