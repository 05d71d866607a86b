using Pairwright.Imaging;

namespace Pairwright.Matching;

/// <summary>One minus the normalised cross-correlation of two square windows; see <see cref="Cost.Ncc"/>.</summary>
internal sealed class NccCost(int window) : WindowCost(window, window)
{
    public override string Name => "ncc";

    public override IReadOnlyList<StageSetting> Settings => [Setting("window", Window.Width)];

    public override double Compare(ReadOnlySpan<float> left, ReadOnlySpan<float> right)
    {
        double squaresLeft = 0, squaresRight = 0, products = 0;
        for (var i = 0; i < left.Length; i++)
        {
            squaresLeft += (double)left[i] * left[i];
            squaresRight += (double)right[i] * right[i];
            products += (double)left[i] * right[i];
        }

        return Correlation(squaresLeft, squaresRight, products);
    }

    public override ICostRows Prepare(RectifiedPair pair)
    {
        pair.MustHold(Window);
        return new Rows(pair, Window.Width / 2);
    }

    // Levels are not negative, so a black window alone correlates with nothing; it is as far from every other as can be.
    private static double Correlation(double squaresLeft, double squaresRight, double products) =>
        squaresLeft > 0 && squaresRight > 0 ? Math.Max(1 - products / Math.Sqrt(squaresLeft * squaresRight), 0) : 1;

    private sealed class Rows(RectifiedPair pair, int half) : ProductRows(pair, half, half)
    {
        protected override float Cost(double left, double leftSquares, double right, double rightSquares, double products) =>
            (float)Correlation(leftSquares, rightSquares, products);
    }
}
