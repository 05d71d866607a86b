using System.Numerics;
using Pairwright.Imaging;

namespace Pairwright.Matching;

/// <summary>The difference that does not mind where between two samples an edge falls; see <see cref="Cost.SamplingInsensitiveDifference"/>.</summary>
/// <remarks>
/// Birchfield and Tomasi, A pixel dissimilarity measure that is insensitive to image sampling, PAMI 1998, equations 1 to 3: the level of one
/// picture is compared with the interval that the other one's line through neighbouring samples passes within half a pixel, both ways, and the
/// smaller distance counts.
/// </remarks>
internal sealed class SamplingInsensitiveCost(double? limit) : Cost
{
    private readonly double? limit = CostLimit.Checked(limit);

    public override string Name => "sampling-insensitive difference";

    public override IReadOnlyList<StageSetting> Settings => limit is { } most ? [Setting("limit", most)] : [];

    public override int SupportPx => 3;

    public override ICostRows Prepare(RectifiedPair pair) => new Rows(pair, Planes(pair.Left), Planes(pair.Right), (float)(limit ?? double.PositiveInfinity));

    // Level, and the least and greatest that the line through the samples reaches within half a pixel.
    private static float[][] Planes(Picture picture)
    {
        var level = GreyLevels.Of(picture);
        var (width, height) = (picture.Size.Width, picture.Size.Height);
        var (least, most) = (new float[level.Length], new float[level.Length]);
        for (var v = 0; v < height; v++)
        {
            for (var u = 0; u < width; u++)
            {
                var i = v * width + u;
                var before = (level[i] + level[v * width + Math.Max(u - 1, 0)]) / 2;
                var after = (level[i] + level[v * width + Math.Min(u + 1, width - 1)]) / 2;
                least[i] = Math.Min(level[i], Math.Min(before, after));
                most[i] = Math.Max(level[i], Math.Max(before, after));
            }
        }

        return [level, least, most];
    }

    private sealed class Rows(RectifiedPair pair, float[][] left, float[][] right, float limit) : PlaneRows(pair, left, right)
    {
        protected override void Compare(ReadOnlySpan<float> here, RightRow[] right, int u, Span<float> costs)
        {
            var levels = right[0].Under(u);
            var leasts = right[1].Under(u);
            var mosts = right[2].Under(u);
            var (level, least, most) = (new Vector<float>(here[0]), new Vector<float>(here[1]), new Vector<float>(here[2]));
            var limits = new Vector<float>(limit);
            var i = 0;
            for (; i <= costs.Length - Vector<float>.Count; i += Vector<float>.Count)
            {
                var other = new Vector<float>(levels[i..]);
                var leftToRight = Vector.Max(level - new Vector<float>(mosts[i..]), new Vector<float>(leasts[i..]) - level);
                var rightToLeft = Vector.Max(other - most, least - other);
                var distance = Vector.Max(Vector.Min(leftToRight, rightToLeft), Vector<float>.Zero);
                Vector.Min(distance, limits).CopyTo(costs[i..]);
            }

            for (; i < costs.Length; i++)
            {
                var leftToRight = Math.Max(here[0] - mosts[i], leasts[i] - here[0]);
                var rightToLeft = Math.Max(levels[i] - here[2], here[1] - levels[i]);
                costs[i] = Math.Min(Math.Max(Math.Min(leftToRight, rightToLeft), 0), limit);
            }
        }
    }
}
