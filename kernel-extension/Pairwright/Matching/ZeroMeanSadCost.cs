using System.Numerics;
using Pairwright.Imaging;

namespace Pairwright.Matching;

/// <summary>The sum of absolute differences of two square windows less their means, per pixel; see <see cref="Cost.ZeroMeanSad"/>.</summary>
internal sealed class ZeroMeanSadCost(int window) : WindowCost(window, window)
{
    public override string Name => "zero-mean sad";

    public override IReadOnlyList<StageSetting> Settings => [Setting("window", Window.Width)];

    public override double Compare(ReadOnlySpan<float> left, ReadOnlySpan<float> right)
    {
        double sumLeft = 0, sumRight = 0;
        for (var i = 0; i < left.Length; i++)
        {
            sumLeft += left[i];
            sumRight += right[i];
        }

        var (shift, sum) = ((sumLeft - sumRight) / left.Length, 0.0);
        for (var i = 0; i < left.Length; i++)
        {
            sum += Math.Abs(left[i] - right[i] - shift);
        }

        return sum / left.Length;
    }

    public override ICostRows Prepare(RectifiedPair pair)
    {
        pair.MustHold(Window);
        return new Rows(pair, Window.Width / 2);
    }

    private sealed class Rows(RectifiedPair pair, int half) : ICostRows
    {
        public void Row(int v, DisparityRange range, Span<float> costs)
        {
            var (width, count, side) = (pair.Size.Width, range.Count, 2 * half + 1);
            var (padded, area) = (width + 2 * half, (float)(side * side));
            var left = new float[side][];
            var right = new RightRow[side];
            var levels = new float[padded];
            var (leftSums, rightSums) = (new WindowSums(padded, half), new WindowSums(padded, half));
            for (var j = 0; j < side; j++)
            {
                left[j] = new float[padded];
                WindowRows.Fill(pair.Left, v + j - half, half, left[j]);
                WindowRows.Fill(pair.Right, v + j - half, half, levels);
                right[j] = new(width, range, half);
                right[j].Set(levels);
                leftSums.Add(left[j]);
                rightSums.Add(levels);
            }

            leftSums.Close();
            rightSums.Close();
            var rightMeans = new RightRow(width, range);
            rightMeans.Set(Array.ConvertAll(rightSums.Levels, sum => (float)(sum / area)));
            for (var u = 0; u < width; u++)
            {
                var pixel = costs.Slice(u * count, count);
                var means = rightMeans.Under(u);
                var mean = (float)(leftSums.Levels[u] / area);
                pixel.Clear();
                for (var j = 0; j < side; j++)
                {
                    for (var x = u - half; x <= u + half; x++)
                    {
                        Add(left[j][x + half] - mean, right[j].Under(x), means, pixel);
                    }
                }

                foreach (ref var cost in pixel)
                {
                    cost /= area;
                }
            }

            ComparableCosts.Close(pair, v, range, costs);
        }

        private static void Add(float level, ReadOnlySpan<float> under, ReadOnlySpan<float> means, Span<float> costs)
        {
            var levels = new Vector<float>(level);
            var i = 0;
            for (; i <= costs.Length - Vector<float>.Count; i += Vector<float>.Count)
            {
                var difference = levels - (new Vector<float>(under[i..]) - new Vector<float>(means[i..]));
                (new Vector<float>(costs[i..]) + Vector.Abs(difference)).CopyTo(costs[i..]);
            }

            for (; i < costs.Length; i++)
            {
                costs[i] += Math.Abs(level - (under[i] - means[i]));
            }
        }
    }
}
