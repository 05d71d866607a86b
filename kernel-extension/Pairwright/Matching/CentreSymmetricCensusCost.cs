using Pairwright.Imaging;

namespace Pairwright.Matching;

/// <summary>The centre-symmetric census transform over a window, compared by Hamming distance; see <see cref="Cost.CentreSymmetricCensus"/>.</summary>
/// <remarks>
/// Spangenberg, Langner and Rojas, Weighted semi-global matching and center-symmetric census transform for robust driver assistance, CAIP 2013.
/// One bit for each two pixels that lie opposite each other says whether the first, in reading order, is darker than the second. Beyond the
/// border stands the nearest pixel of the picture.
/// </remarks>
internal sealed class CentreSymmetricCensusCost : WindowCost
{
    public CentreSymmetricCensusCost(int width, int height)
        : base(width, height)
    {
        if (width * height > 129)
        {
            throw new UserErrorException($"A centre-symmetric census window of {width} × {height} px has more than 64 pairs; give at most 129 pixels, such as 9 × 7.");
        }
    }

    public override string Name => "centre-symmetric census";

    public override IReadOnlyList<StageSetting> Settings => [Setting("width", Window.Width), Setting("height", Window.Height)];

    /// <summary>How many pairs are compared.</summary>
    public int Bits => Window.Width * Window.Height / 2;

    /// <summary>Half of the bits, without a fraction: each agrees by chance every other time.</summary>
    public override double Unrelated => Bits / 2;

    public override double Compare(ReadOnlySpan<float> left, ReadOnlySpan<float> right)
    {
        var differing = 0;
        for (var i = 0; i < left.Length / 2; i++)
        {
            differing += (left[i] < left[^(i + 1)]) != (right[i] < right[^(i + 1)]) ? 1 : 0;
        }

        return differing;
    }

    public override ICostRows Prepare(RectifiedPair pair)
    {
        pair.MustHold(Window);
        return new HammingRows(pair, Words(pair.Left), Words(pair.Right));
    }

    private ulong[] Words(Picture picture)
    {
        var (width, height) = (picture.Size.Width, picture.Size.Height);
        var offsets = Enumerable.Range(0, Window.Width * Window.Height / 2)
            .Select(i => (U: i % Window.Width - Window.Width / 2, V: i / Window.Width - Window.Height / 2))
            .ToArray();
        var words = new ulong[picture.Size.Area];
        Parallel.For(0, height, v =>
        {
            for (var u = 0; u < width; u++)
            {
                var word = 0ul;
                for (var bit = 0; bit < offsets.Length; bit++)
                {
                    var (du, dv) = offsets[bit];
                    word |= At(picture, u + du, v + dv) < At(picture, u - du, v - dv) ? 1ul << bit : 0;
                }

                words[v * width + u] = word;
            }
        });
        return words;
    }

    private static ushort At(Picture picture, int u, int v) => picture[Math.Clamp(u, 0, picture.Size.Width - 1), Math.Clamp(v, 0, picture.Size.Height - 1)];
}
