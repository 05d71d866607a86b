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
                costs[u * range.Count + i] = double.IsNaN(value) ? (float)cost.Unrelated : (float)value;
            }
        }
    }

    // The windows around the pixels of one row, one after the other.
    private float[] Windows(Picture picture, int v)
    {
        var (width, height) = (picture.Size.Width, picture.Size.Height);
        var (halfWidth, halfHeight) = (cost.Window.Width / 2, cost.Window.Height / 2);
        var windows = new float[width * cost.Window.Area];
        var grey = picture.Grey;
        var next = 0;
        for (var u = 0; u < width; u++)
        {
            for (var dv = -halfHeight; dv <= halfHeight; dv++)
            {
                var row = Math.Clamp(v + dv, 0, height - 1) * width;
                for (var du = -halfWidth; du <= halfWidth; du++)
                {
                    windows[next++] = grey[row + Math.Clamp(u + du, 0, width - 1)];
                }
            }
        }

        return windows;
    }
}
