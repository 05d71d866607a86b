using Pairwright.Imaging;

namespace Pairwright.Matching;

/// <summary>A cost written as a function of two grey levels; see <see cref="Cost.FromPixels"/>.</summary>
internal sealed class PixelCost(Func<double, double, double> difference, string code) : Cost
{
    public override string Name => "pixels";

    public override IReadOnlyList<StageSetting> Settings => [Setting("code", code)];

    private protected override Delegate Code => difference;

    public override ICostRows Prepare(RectifiedPair pair) => new Rows(pair, difference);

    private sealed class Rows(RectifiedPair pair, Func<double, double, double> difference) : ICostRows
    {
        public void Row(int v, DisparityRange range, Span<float> costs)
        {
            var width = pair.Size.Width;
            var left = new float[width];
            var right = new float[width];
            GreyLevels.Row(pair.Left, v, left);
            GreyLevels.Row(pair.Right, v, right);
            for (var u = 0; u < width; u++)
            {
                for (var i = 0; i < range.Count; i++)
                {
                    var d = range.Least + i;
                    costs[u * range.Count + i] = pair.CanCompare(u, v, d) ? (float)difference(left[u], right[u - d]) : float.PositiveInfinity;
                }
            }
        }
    }
}
