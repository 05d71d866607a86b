namespace Pairwright.Matching;

/// <summary>What the right camera sees at each of its pixels: the nearest of the measured surfaces that fall on it.</summary>
internal sealed class RightVisibility
{
    private readonly int width;
    private readonly float[] nearest;

    public RightVisibility(WorkingMap map)
    {
        width = map.Size.Width;
        nearest = new float[map.Size.Area];
        nearest.AsSpan().Fill(float.NegativeInfinity);
        for (var i = 0; i < nearest.Length; i++)
        {
            if (map.LabelArray[i] == DisparityLabel.Measured)
            {
                var (u, row) = (i % width, i / width * width);
                var first = (int)MathF.Floor(u - map.DisparityArray[i]);
                for (var x = Math.Max(first, 0); x <= Math.Min(first + 1, width - 1); x++)
                {
                    nearest[row + x] = Math.Max(nearest[row + x], map.DisparityArray[i]);
                }
            }
        }
    }

    /// <summary>Whether a left pixel at a disparity would be hidden from the right camera, or lie beside its picture.</summary>
    public bool Hides(int i, float disparity)
    {
        var x = (int)MathF.Round(i % width - disparity);
        return x < 0 || x >= width || nearest[i / width * width + x] > disparity + 1;
    }
}
