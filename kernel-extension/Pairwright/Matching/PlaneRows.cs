using Pairwright.Imaging;

namespace Pairwright.Matching;

/// <summary>The costs of rows for a method that compares a few numbers per pixel, such as a level and its gradient.</summary>
/// <param name="pair">The pair.</param>
/// <param name="left">One array per kind of number, each row after row.</param>
/// <param name="right">The same of the right picture.</param>
internal abstract class PlaneRows(RectifiedPair pair, float[][] left, float[][] right) : ICostRows
{
    public void Row(int v, DisparityRange range, Span<float> costs)
    {
        var width = pair.Size.Width;
        var rightRows = new RightRow[right.Length];
        for (var plane = 0; plane < right.Length; plane++)
        {
            rightRows[plane] = new(width, range);
            rightRows[plane].Set(right[plane].AsSpan(v * width, width));
        }

        Span<float> here = stackalloc float[left.Length];
        for (var u = 0; u < width; u++)
        {
            for (var plane = 0; plane < left.Length; plane++)
            {
                here[plane] = left[plane][v * width + u];
            }

            Compare(here, rightRows, u, costs.Slice(u * range.Count, range.Count));
        }

        ComparableCosts.Close(pair, v, range, costs);
    }

    /// <summary>Compares one left pixel with all that the disparities put under it.</summary>
    /// <param name="here">The left pixel's numbers.</param>
    /// <param name="right">The right row, one per kind of number.</param>
    /// <param name="u">The left pixel's column.</param>
    /// <param name="costs">One cost per disparity to fill.</param>
    protected abstract void Compare(ReadOnlySpan<float> here, RightRow[] right, int u, Span<float> costs);
}
