using Pairwright.Imaging;
using Pairwright.Matching;

namespace Pairwright.Tests.Matching;

/// <summary>A cost written down number by number, as an engineer would write one in a cell; what cannot be compared is infinite.</summary>
internal sealed class GivenCost(double unrelated, Func<int, int, int, float> cost) : Cost
{
    public override double Unrelated => unrelated;

    public override ICostRows Prepare(RectifiedPair pair) => new Rows(pair.Size.Width, cost);

    private sealed class Rows(int width, Func<int, int, int, float> cost) : ICostRows
    {
        public void Row(int v, DisparityRange range, Span<float> costs)
        {
            for (var i = 0; i < costs.Length; i++)
            {
                var (u, d) = (i / range.Count, range.Least + i % range.Count);
                costs[i] = u - d >= 0 && u - d < width ? cost(u, v, d) : float.PositiveInfinity;
            }
        }
    }
}
