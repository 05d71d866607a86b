using System.Numerics;
using Pairwright.Geometry;
using Pairwright.Imaging;

namespace Pairwright.Matching;

/// <summary>The difference of two rank transforms; see <see cref="Cost.Rank"/>.</summary>
/// <remarks>
/// Zabih and Woodfill, Non-parametric local transforms for computing visual correspondence, ECCV 1994: a pixel's rank is the number of its
/// window's pixels that are darker than it. Beyond the border stands the nearest pixel.
/// </remarks>
internal sealed class RankCost(int window) : WindowCost(window, window)
{
    public override string Name => "rank";

    public override IReadOnlyList<StageSetting> Settings => [Setting("window", Window.Width)];

    public override double Compare(ReadOnlySpan<float> left, ReadOnlySpan<float> right) => Math.Abs(Rank(left) - Rank(right));

    public override ICostRows Prepare(RectifiedPair pair)
    {
        pair.MustHold(Window);
        return new Rows(pair, Ranks(pair.Left, Window), Ranks(pair.Right, Window));
    }

    private static int Rank(ReadOnlySpan<float> window)
    {
        var (middle, rank) = (window[window.Length / 2], 0);
        foreach (var level in window)
        {
            rank += level < middle ? 1 : 0;
        }

        return rank;
    }

    private static float[] Ranks(Picture picture, PictureSize window)
    {
        var (width, height, half) = (picture.Size.Width, picture.Size.Height, window.Width / 2);
        var ranks = new float[picture.Size.Area];
        Parallel.For(0, height, v =>
        {
            var grey = picture.Grey;
            for (var u = 0; u < width; u++)
            {
                var (middle, rank) = (grey[v * width + u], 0);
                for (var dv = -half; dv <= half; dv++)
                {
                    var row = Math.Clamp(v + dv, 0, height - 1) * width;
                    for (var du = -half; du <= half; du++)
                    {
                        rank += grey[row + Math.Clamp(u + du, 0, width - 1)] < middle ? 1 : 0;
                    }
                }

                ranks[v * width + u] = rank;
            }
        });
        return ranks;
    }

    private sealed class Rows(RectifiedPair pair, float[] left, float[] right) : PlaneRows(pair, [left], [right])
    {
        protected override void Compare(ReadOnlySpan<float> here, RightRow[] right, int u, Span<float> costs)
        {
            var under = right[0].Under(u);
            var rank = new Vector<float>(here[0]);
            var i = 0;
            for (; i <= costs.Length - Vector<float>.Count; i += Vector<float>.Count)
            {
                Vector.Abs(rank - new Vector<float>(under[i..])).CopyTo(costs[i..]);
            }

            for (; i < costs.Length; i++)
            {
                costs[i] = Math.Abs(here[0] - under[i]);
            }
        }
    }
}
