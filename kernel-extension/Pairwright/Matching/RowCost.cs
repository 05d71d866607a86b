using Pairwright.Imaging;

namespace Pairwright.Matching;

/// <summary>A cost written as a comparison of two stretches of rows; see <see cref="Cost.FromRows"/>.</summary>
internal sealed class RowCost(RowComparison comparison, string code) : Cost
{
    public override string Name => "rows";

    public override IReadOnlyList<StageSetting> Settings => [Setting("code", code)];

    private protected override Delegate Code => comparison;

    public override ICostRows Prepare(RectifiedPair pair) => new Rows(pair, comparison);

    private sealed class Rows(RectifiedPair pair, RowComparison comparison) : ICostRows
    {
        public void Row(int v, DisparityRange range, Span<float> costs)
        {
            var width = pair.Size.Width;
            var left = new float[width];
            var right = new float[width];
            var compared = new float[width];
            GreyLevels.Row(pair.Left, v, left);
            GreyLevels.Row(pair.Right, v, right);
            costs.Fill(float.PositiveInfinity);
            for (var i = 0; i < range.Count; i++)
            {
                var d = range.Least + i;
                var length = width - Math.Abs(d);
                if (length <= 0)
                {
                    continue;
                }

                var first = Math.Max(d, 0);
                var row = compared.AsSpan(0, length);
                comparison(left.AsSpan(first, length), right.AsSpan(first - d, length), row);
                for (var k = 0; k < length; k++)
                {
                    if (pair.CanCompare(first + k, v, d))
                    {
                        costs[(first + k) * range.Count + i] = row[k];
                    }
                }
            }
        }
    }
}
