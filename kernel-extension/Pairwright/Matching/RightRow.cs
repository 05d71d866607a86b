namespace Pairwright.Matching;

/// <summary>A row of the right picture turned round, so that the pixels which growing disparities put under one left pixel stand side by side.</summary>
internal sealed class RightRow
{
    private readonly int width;
    private readonly int least;
    private readonly int most;
    private readonly int lead;
    private readonly float[] reversed;

    /// <summary>Makes an empty row.</summary>
    /// <param name="width">Columns.</param>
    /// <param name="range">The disparities that will be asked for.</param>
    /// <param name="border">How many columns beyond either border are known too, for windows.</param>
    public RightRow(int width, DisparityRange range, int border = 0)
    {
        // Room for every disparity at every column; what no picture reaches stays zero and is closed off afterwards.
        (this.width, least, most) = (width, range.Least, range.Most);
        lead = border + Math.Max(-least, 0);
        reversed = new float[lead + width + border + Math.Max(most, 0)];
    }

    /// <summary>Sets the levels, from the first known column before the left border to the last behind the right one.</summary>
    public void Set(ReadOnlySpan<float> levels)
    {
        var border = (levels.Length - width) / 2;
        for (var x = 0; x < levels.Length; x++)
        {
            reversed[lead + width - 1 + border - x] = levels[x];
        }
    }

    /// <summary>What stands under a left column at each disparity, from the least to the greatest.</summary>
    public ReadOnlySpan<float> Under(int u) => reversed.AsSpan(lead + width - 1 - u + least, most - least + 1);
}
