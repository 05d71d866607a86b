using Pairwright.Imaging;

namespace Pairwright.Matching;

/// <summary>The sum of squared differences of two square windows, per pixel; see <see cref="Cost.Ssd"/>.</summary>
internal sealed class SsdCost(int window) : WindowCost(window, window)
{
    public override string Name => "ssd";

    public override IReadOnlyList<StageSetting> Settings => [Setting("window", Window.Width)];

    public override double Compare(ReadOnlySpan<float> left, ReadOnlySpan<float> right)
    {
        var sum = 0.0;
        for (var i = 0; i < left.Length; i++)
        {
            var difference = (double)left[i] - right[i];
            sum += difference * difference;
        }

        return sum / left.Length;
    }

    public override ICostRows Prepare(RectifiedPair pair)
    {
        pair.MustHold(Window);
        return new Rows(pair, Window.Width);
    }

    private sealed class Rows(RectifiedPair pair, int window) : ProductRows(pair, window / 2, window / 2)
    {
        protected override float Cost(double left, double leftSquares, double right, double rightSquares, double products) =>
            (float)((leftSquares + rightSquares - 2 * products) / (window * window));
    }
}
