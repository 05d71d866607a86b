using System.Numerics;
using Pairwright.Imaging;

namespace Pairwright.Matching;

/// <summary>A blend of the truncated differences of levels and gradients; see <see cref="Cost.DifferenceAndGradient"/>.</summary>
/// <remarks>
/// Rhemann, Hosni, Bleyer, Rother and Gelautz, Fast cost-volume filtering for visual correspondence and beyond, CVPR 2011, equation 5, on grey
/// levels: C = (1 − α)·min(|ΔI|, τ₁) + α·min(|Δ∇ₓI|, τ₂). Bleyer, Rhemann and Rother 2011 use the same blend.
/// </remarks>
internal sealed class DifferenceAndGradientCost : Cost
{
    private readonly double gradientShare;
    private readonly double differenceLimit;
    private readonly double gradientLimit;

    public DifferenceAndGradientCost(double gradientShare, double differenceLimit, double gradientLimit)
    {
        if (!(gradientShare is >= 0 and <= 1))
        {
            throw new UserErrorException($"A gradient's share of {gradientShare} is not one; give a number from 0 to 1.");
        }

        (this.gradientShare, this.differenceLimit, this.gradientLimit) =
            (gradientShare, CostLimit.Checked(differenceLimit)!.Value, CostLimit.Checked(gradientLimit)!.Value);
    }

    public override string Name => "difference and gradient";

    public override IReadOnlyList<StageSetting> Settings =>
        [Setting("gradient share", gradientShare), Setting("difference limit", differenceLimit), Setting("gradient limit", gradientLimit)];

    public override int SupportPx => 3;

    public override ICostRows Prepare(RectifiedPair pair) => new Rows(
        pair,
        Planes(pair.Left),
        Planes(pair.Right),
        (float)(1 - gradientShare),
        (float)differenceLimit,
        (float)gradientShare,
        (float)gradientLimit);

    private static float[][] Planes(Picture picture)
    {
        var levels = GreyLevels.Of(picture);
        return [levels, LevelGradients.Across(levels, picture.Size.Width)];
    }

    private sealed class Rows(RectifiedPair pair, float[][] left, float[][] right, float levelShare, float levelLimit, float gradientShare, float gradientLimit)
        : PlaneRows(pair, left, right)
    {
        protected override void Compare(ReadOnlySpan<float> here, RightRow[] right, int u, Span<float> costs)
        {
            var levels = right[0].Under(u);
            var gradients = right[1].Under(u);
            var (level, gradient) = (new Vector<float>(here[0]), new Vector<float>(here[1]));
            var (levelMost, gradientMost) = (new Vector<float>(levelLimit), new Vector<float>(gradientLimit));
            var i = 0;
            for (; i <= costs.Length - Vector<float>.Count; i += Vector<float>.Count)
            {
                var first = Vector.Min(Vector.Abs(level - new Vector<float>(levels[i..])), levelMost);
                var second = Vector.Min(Vector.Abs(gradient - new Vector<float>(gradients[i..])), gradientMost);
                (levelShare * first + gradientShare * second).CopyTo(costs[i..]);
            }

            for (; i < costs.Length; i++)
            {
                costs[i] = levelShare * Math.Min(Math.Abs(here[0] - levels[i]), levelLimit)
                    + gradientShare * Math.Min(Math.Abs(here[1] - gradients[i]), gradientLimit);
            }
        }
    }
}
