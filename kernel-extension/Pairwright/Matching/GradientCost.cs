using System.Numerics;
using Pairwright.Imaging;

namespace Pairwright.Matching;

/// <summary>The difference of two gradients; see <see cref="Cost.Gradient"/>.</summary>
internal sealed class GradientCost(double? limit) : Cost
{
    private readonly double? limit = CostLimit.Checked(limit);

    public override string Name => "gradient";

    public override IReadOnlyList<StageSetting> Settings => limit is { } most ? [Setting("limit", most)] : [];

    public override int SupportPx => 3;

    public override ICostRows Prepare(RectifiedPair pair) => new Rows(pair, Planes(pair.Left), Planes(pair.Right), (float)(limit ?? double.PositiveInfinity));

    private static float[][] Planes(Picture picture)
    {
        var levels = GreyLevels.Of(picture);
        return [LevelGradients.Across(levels, picture.Size.Width), LevelGradients.Down(levels, picture.Size.Width)];
    }

    private sealed class Rows(RectifiedPair pair, float[][] left, float[][] right, float limit) : PlaneRows(pair, left, right)
    {
        protected override void Compare(ReadOnlySpan<float> here, RightRow[] right, int u, Span<float> costs)
        {
            var across = right[0].Under(u);
            var down = right[1].Under(u);
            var (hereAcross, hereDown, most) = (new Vector<float>(here[0]), new Vector<float>(here[1]), new Vector<float>(limit));
            var i = 0;
            for (; i <= costs.Length - Vector<float>.Count; i += Vector<float>.Count)
            {
                var sum = Vector.Abs(hereAcross - new Vector<float>(across[i..])) + Vector.Abs(hereDown - new Vector<float>(down[i..]));
                Vector.Min(sum, most).CopyTo(costs[i..]);
            }

            for (; i < costs.Length; i++)
            {
                costs[i] = Math.Min(Math.Abs(here[0] - across[i]) + Math.Abs(here[1] - down[i]), limit);
            }
        }
    }
}
