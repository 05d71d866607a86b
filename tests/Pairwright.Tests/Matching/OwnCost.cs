using Pairwright.Imaging;
using Pairwright.Matching;

namespace Pairwright.Tests.Matching;

/// <summary>The absolute difference as an engineer would write it in a cell: a class of its own with a setting.</summary>
internal sealed class OwnCost(double limit) : Cost
{
    public override string Name => "own difference";

    public override IReadOnlyList<StageSetting> Settings => [new("limit", limit.ToString(System.Globalization.CultureInfo.InvariantCulture))];

    public override ICostRows Prepare(RectifiedPair pair) => new Rows(pair, limit);

    private sealed class Rows(RectifiedPair pair, double limit) : ICostRows
    {
        public void Row(int v, DisparityRange range, Span<float> costs)
        {
            for (var u = 0; u < pair.Size.Width; u++)
            {
                for (var d = range.Least; d <= range.Most; d++)
                {
                    costs[u * range.Count + d - range.Least] = u - d >= 0 && u - d < pair.Size.Width
                        ? (float)Math.Min(Math.Abs(pair.Left[u, v] - pair.Right[u - d, v]), limit)
                        : float.PositiveInfinity;
                }
            }
        }
    }
}
