using System.Numerics;
using Pairwright.Geometry;
using Pairwright.Imaging;

namespace Pairwright.Matching;

/// <summary>Census and absolute difference together, each bent towards one; see <see cref="Cost.AdCensus"/>.</summary>
/// <remarks>
/// Mei, Sun, Zhou, Jiao, Wang and Zhang, On building an accurate stereo matching system on graphics hardware, ICCV Workshops 2011, equations 2
/// and 3, on grey levels: C = ρ(C_census, λ_census) + ρ(C_AD, λ_AD), ρ(c, λ) = 1 − exp(−c / λ), census over 9 × 7 pixels.
/// </remarks>
internal sealed class AdCensusCost : Cost
{
    private static readonly PictureSize Window = new(9, 7);

    private readonly double censusScale;
    private readonly double differenceScale;

    public AdCensusCost(double censusScale, double differenceScale)
    {
        if (!(censusScale > 0 && differenceScale > 0) || !double.IsFinite(censusScale + differenceScale))
        {
            throw new UserErrorException($"Scales of {censusScale} bits and {differenceScale} levels do not fit AD-census; give finite numbers above zero.");
        }

        (this.censusScale, this.differenceScale) = (censusScale, differenceScale);
    }

    public override string Name => "ad-census";

    public override IReadOnlyList<StageSetting> Settings => [Setting("census scale", censusScale), Setting("difference scale", differenceScale)];

    public override int SupportPx => Window.Width;

    public override ICostRows Prepare(RectifiedPair pair)
    {
        pair.MustHold(Window);

        // Levels and bits are whole numbers, so every value of ρ fits into a table.
        var scale = GreyLevels.ScaleOf(pair.Left);
        return new Rows(
            pair,
            CensusTransform.Of(pair.Left, Window),
            CensusTransform.Of(pair.Right, Window),
            Table(Window.Width * Window.Height, 1, censusScale),
            Table(1 << pair.Left.SignificantBits, scale, differenceScale));
    }

    private static float[] Table(int length, double step, double scale) =>
        [.. Enumerable.Range(0, length).Select(i => (float)(1 - Math.Exp(-i * step / scale)))];

    private sealed class Rows(RectifiedPair pair, ulong[] left, ulong[] right, float[] census, float[] difference) : ICostRows
    {
        public void Row(int v, DisparityRange range, Span<float> costs)
        {
            var width = pair.Size.Width;
            var start = v * width;
            var leftGrey = pair.Left.Grey;
            var rightGrey = pair.Right.Grey;
            for (var u = 0; u < width; u++)
            {
                var (word, level) = (left[start + u], leftGrey[start + u]);
                var pixel = costs.Slice(u * range.Count, range.Count);
                var first = Math.Clamp(u - width + 1 - range.Least, 0, range.Count);
                var end = Math.Clamp(u - range.Least + 1, first, range.Count);
                for (var i = first; i < end; i++)
                {
                    var r = start + u - range.Least - i;
                    pixel[i] = census[BitOperations.PopCount(word ^ right[r])] + difference[Math.Abs(level - rightGrey[r])];
                }
            }

            ComparableCosts.Close(pair, v, range, costs);
        }
    }
}
