using Pairwright.Imaging;

namespace Pairwright.Matching;

/// <summary>The costs of rows by comparing every window with every other, as the definition says; the nearest pixel stands in beyond the border.</summary>
internal sealed class WindowCostRows(WindowCost cost, RectifiedPair pair) : ICostRows
{
    public void Row(int v, DisparityRange range, Span<float> costs)
    {
        var (width, area) = (pair.Size.Width, (int)cost.Window.Area);
        var left = Windows(pair.Left, v);
        var right = Windows(pair.Right, v);
        for (var u = 0; u < width; u++)
        {
            for (var i = 0; i < range.Count; i++)
            {
                var d = range.Least + i;
                var value = pair.CanCompare(u, v, d)
                    ? cost.Compare(left.AsSpan(u * area, area), right.AsSpan((u - d) * area, area))
                    : double.PositiveInfinity;
                costs[u * range.Count + i] = double.IsNaN(value) && !double.IsNaN(cost.Unrelated) ? (float)cost.Unrelated : (float)value;
            }
        }
    }

    // The windows around the pixels of one row, one after the other.
    private float[] Windows(Picture picture, int v)
    {
        var (width, half) = (picture.Size.Width, cost.Window.Width / 2);
        var windows = new float[width * cost.Window.Area];
        var row = new float[width + 2 * half];
        for (var j = 0; j < cost.Window.Height; j++)
        {
            WindowRows.Fill(picture, v + j - cost.Window.Height / 2, half, row);
            for (var u = 0; u < width; u++)
            {
                row.AsSpan(u, cost.Window.Width).CopyTo(windows.AsSpan((int)(u * cost.Window.Area) + j * cost.Window.Width));
            }
        }

        return windows;
    }
}
