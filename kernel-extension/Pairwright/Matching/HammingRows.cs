using System.Numerics;
using Pairwright.Imaging;

namespace Pairwright.Matching;

/// <summary>The costs of rows by the Hamming distance of one word per pixel.</summary>
internal sealed class HammingRows(RectifiedPair pair, ulong[] left, ulong[] right) : ICostRows
{
    public void Row(int v, DisparityRange range, Span<float> costs)
    {
        var width = pair.Size.Width;
        var start = v * width;
        for (var u = 0; u < width; u++)
        {
            var word = left[start + u];
            var pixel = costs.Slice(u * range.Count, range.Count);
            var first = Math.Clamp(u - width + 1 - range.Least, 0, range.Count);
            var end = Math.Clamp(u - range.Least + 1, first, range.Count);
            for (var i = first; i < end; i++)
            {
                pixel[i] = BitOperations.PopCount(word ^ right[start + u - range.Least - i]);
            }
        }

        ComparableCosts.Close(pair, v, range, costs);
    }
}
