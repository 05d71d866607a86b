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
        return squaresLeft > 0 && squaresRight > 0 ? 1 - products / Math.Sqrt(squaresLeft * squaresRight) : double.NaN;
    }

    public override ICostRows Prepare(RectifiedPair pair)
    {
        pair.MustHold(Window);
        return new WindowCostRows(this, pair);
    }
}
