using Pairwright.Imaging;

namespace Pairwright.Matching;

/// <summary>Closes off the costs of what cannot be compared.</summary>
internal static class ComparableCosts
{
    /// <summary>Sets the costs of one row to infinity where the right pixel is outside or either is not usable.</summary>
    public static void Close(RectifiedPair pair, int v, DisparityRange range, Span<float> costs)
    {
        var (width, count) = (pair.Size.Width, range.Count);
        var masked = pair.Left.Usable is not null || pair.Right.Usable is not null;
        for (var u = 0; u < width; u++)
        {
            // u − d lies on the picture for d from u − width + 1 to u.
            var pixel = costs.Slice(u * count, count);
            var first = Math.Clamp(u - width + 1 - range.Least, 0, count);
            var end = Math.Clamp(u - range.Least + 1, first, count);
            pixel[..first].Fill(float.PositiveInfinity);
            pixel[end..].Fill(float.PositiveInfinity);
            for (var i = first; masked && i < end; i++)
            {
                if (!pair.CanCompare(u, v, range.Least + i))
                {
                    pixel[i] = float.PositiveInfinity;
                }
            }
        }
    }
}
