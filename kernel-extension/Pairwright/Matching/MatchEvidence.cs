using Pairwright.Geometry;

namespace Pairwright.Matching;

/// <summary>What the optimisation left of each pixel's totals, kept over the whole picture for filters that weigh it.</summary>
/// <remarks>Row after row, one number per pixel; NaN where nothing could be compared.</remarks>
internal sealed class MatchEvidence(PictureSize size)
{
    /// <summary>The disparity as the optimisation and the sub-pixel stage had it, whether a check refused it or not.</summary>
    public float[] Disparity { get; } = new float[size.Area];

    /// <summary>The lowest total.</summary>
    public float[] Lowest { get; } = new float[size.Area];

    /// <summary>The lowest total farther than a pixel from the winner; infinite where there is none.</summary>
    public float[] SecondLowest { get; } = new float[size.Area];

    /// <summary>The mean of the totals beside the lowest; NaN where one could not be compared.</summary>
    public float[] Beside { get; } = new float[size.Area];

    /// <summary>How far the match from right to left is from the one from left to right, in whole pixels: right less left.</summary>
    public float[] RightLessLeft { get; } = new float[size.Area];

    /// <summary>Takes over a row.</summary>
    public void Take(RowMatches row)
    {
        var start = row.V * size.Width;
        for (var u = 0; u < size.Width; u++)
        {
            var (i, winner) = (start + u, row.Winner[u]);
            var known = winner != RowMatches.None;
            Disparity[i] = known ? float.IsNaN(row.Disparity[u]) ? winner : row.Disparity[u] : float.NaN;
            (Lowest[i], SecondLowest[i], Beside[i]) = (row.Lowest[u], row.SecondLowest[u], (row.Before[u] + row.After[u]) / 2);
            RightLessLeft[i] = known ? row.RightWinner[u - winner] - winner : float.NaN;
        }
    }
}
