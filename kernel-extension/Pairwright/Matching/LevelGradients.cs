namespace Pairwright.Matching;

/// <summary>Gradients of grey levels by central differences; at the border the nearest pixel stands in for the one beyond.</summary>
internal static class LevelGradients
{
    /// <summary>Half the difference of the two neighbours in a row, in levels of the 8-bit scale per pixel, row after row.</summary>
    public static float[] Across(float[] levels, int width)
    {
        var gradients = new float[levels.Length];
        for (var i = 0; i < levels.Length; i++)
        {
            var u = i % width;
            gradients[i] = (levels[u < width - 1 ? i + 1 : i] - levels[u > 0 ? i - 1 : i]) / 2;
        }

        return gradients;
    }

    /// <summary>Half the difference of the two neighbours in a column.</summary>
    public static float[] Down(float[] levels, int width)
    {
        var gradients = new float[levels.Length];
        for (var i = 0; i < levels.Length; i++)
        {
            gradients[i] = (levels[i + width < levels.Length ? i + width : i] - levels[i >= width ? i - width : i]) / 2;
        }

        return gradients;
    }
}
