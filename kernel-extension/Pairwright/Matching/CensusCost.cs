using Pairwright.Imaging;

namespace Pairwright.Matching;

/// <summary>The census transform over a window, compared by Hamming distance; see <see cref="Cost.Census"/>.</summary>
/// <remarks>
/// Zabih and Woodfill, Non-parametric local transforms for computing visual correspondence, ECCV 1994. One bit per neighbour says whether it
/// is darker than the middle pixel, so gain and offset do not matter. Beyond the border stands the nearest pixel of the picture; a
/// neighbour that is not usable counts as not darker.
/// </remarks>
internal sealed class CensusCost : WindowCost
{
    public CensusCost(int width, int height)
        : base(width, height)
    {
        if (width * height > 65)
        {
            throw new UserErrorException($"A census window of {width} × {height} px has more than 64 neighbours; give at most 65 pixels, such as 9 × 7.");
        }
    }

    public override string Name => "census";

    public override IReadOnlyList<StageSetting> Settings => [Setting("width", Window.Width), Setting("height", Window.Height)];

    /// <summary>How many neighbours are compared.</summary>
    public int Bits => Window.Width * Window.Height - 1;

    /// <summary>Half of the bits: each agrees by chance every other time.</summary>
    public override double Unrelated => Bits / 2;

    public override double Compare(ReadOnlySpan<float> left, ReadOnlySpan<float> right)
    {
        var middle = left.Length / 2;
        var differing = 0;
        for (var i = 0; i < left.Length; i++)
        {
            differing += (left[i] < left[middle]) != (right[i] < right[middle]) ? 1 : 0;
        }

        return differing;
    }

    public override ICostRows Prepare(RectifiedPair pair)
    {
        pair.MustHold(Window);
        return new HammingRows(pair, CensusTransform.Of(pair.Left, Window), CensusTransform.Of(pair.Right, Window));
    }
}
