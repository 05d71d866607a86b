using Pairwright.Imaging;

namespace Pairwright.Matching;

/// <summary>One minus the zero-mean normalised cross-correlation of two square windows; see <see cref="Cost.Zncc"/>.</summary>
internal sealed class ZnccCost(int window) : WindowCost(window, window)
{
    public override string Name => "zncc";

    public override IReadOnlyList<StageSetting> Settings => [Setting("window", Window.Width)];

    public override double Unrelated => 1;

    public override double Compare(ReadOnlySpan<float> left, ReadOnlySpan<float> right)
    {
        double sumLeft = 0, sumRight = 0;
        for (var i = 0; i < left.Length; i++)
        {
            sumLeft += left[i];
            sumRight += right[i];
        }

        var (meanLeft, meanRight) = (sumLeft / left.Length, sumRight / left.Length);
        double squaresLeft = 0, squaresRight = 0, products = 0;
        for (var i = 0; i < left.Length; i++)
        {
            var (l, r) = (left[i] - meanLeft, right[i] - meanRight);
            squaresLeft += l * l;
            squaresRight += r * r;
            products += l * r;
        }

        // A window without any contrast correlates with nothing.
        return squaresLeft > 0 && squaresRight > 0 ? Math.Max(1 - products / Math.Sqrt(squaresLeft * squaresRight), 0) : double.NaN;
    }

    public override ICostRows Prepare(RectifiedPair pair)
    {
        pair.MustHold(Window);
        return new Rows(pair, Window.Width / 2);
    }

    private sealed class Rows(RectifiedPair pair, int half) : ProductRows(pair, half, half)
    {
        private readonly double area = (2 * half + 1) * (2 * half + 1);

        protected override float Cost(double left, double leftSquares, double right, double rightSquares, double products)
        {
            var squaresLeft = area * leftSquares - left * left;
            var squaresRight = area * rightSquares - right * right;
            return squaresLeft > 0 && squaresRight > 0
                ? (float)Math.Max(1 - (area * products - left * right) / Math.Sqrt(squaresLeft * squaresRight), 0)
                : 1;
        }
    }
}
