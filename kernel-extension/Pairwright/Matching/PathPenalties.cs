using Pairwright.Imaging;

namespace Pairwright.Matching;

/// <summary>What changes of disparity cost on paths over a picture.</summary>
internal sealed class PathPenalties
{
    private readonly float large;
    private readonly float flatLevels;
    private readonly bool whole;
    private readonly float[]? levels;
    private readonly int width;

    public PathPenalties(SemiGlobal how, double unrelated, Picture left)
    {
        (Small, large) = ((float)how.SmallPenalty(unrelated), (float)how.LargePenalty(unrelated));
        whole = Small == MathF.Floor(Small) && large == MathF.Floor(large);
        (levels, width) = (how.FlatLevels is null ? null : GreyLevels.Of(left), left.Size.Width);
        flatLevels = (float)(how.FlatLevels ?? 0);
    }

    /// <summary>What a change by one costs.</summary>
    public float Small { get; }

    /// <summary>What a larger change costs on the step to a pixel.</summary>
    /// <param name="u">The pixel's column.</param>
    /// <param name="v">The pixel's row.</param>
    /// <param name="du">Columns that the step leads.</param>
    /// <param name="dv">Rows that the step leads.</param>
    /// <remarks>
    /// Where it is adapted, P2 is divided by the difference of the two pixels' grey levels (Hirschmüller 2008, after equation 12), in units of the
    /// difference up to which a surface counts as flat, and never falls below P1. Whole penalties stay whole.
    /// </remarks>
    public float Large(int u, int v, int du, int dv)
    {
        if (levels is null)
        {
            return large;
        }

        return LargeAt(Math.Abs(levels[v * width + u] - levels[(v - dv) * width + u - du]));
    }

    /// <summary>What a larger change costs between two pixels whose grey levels differ by so much, on the 8-bit scale.</summary>
    public float LargeAt(float difference)
    {
        var adapted = levels is not null && difference > flatLevels ? large * flatLevels / difference : large;
        return Math.Max(whole ? MathF.Floor(adapted) : adapted, Small);
    }
}
