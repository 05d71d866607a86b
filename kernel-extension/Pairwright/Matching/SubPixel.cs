namespace Pairwright.Matching;

/// <summary>Where between whole disparities the lowest total lies: the fourth stage of a recipe.</summary>
public abstract class SubPixel : Stage
{
    /// <summary>Whole disparities only.</summary>
    public static SubPixel None { get; } = new WholeDisparity();

    /// <summary>The vertex of the parabola through three totals; right for costs that are round at their lowest.</summary>
    public static SubPixel Parabola { get; } = new ParabolaVertex();

    /// <summary>The meeting point of two lines of equal and opposite slope through three totals; right for costs that fall to a point (Shimizu and Okutomi 2001).</summary>
    public static SubPixel Equiangular { get; } = new EquiangularLines();

    /// <summary>The offset of the lowest point from the whole disparity, −0.5 to 0.5 px.</summary>
    /// <param name="before">The total at the disparity below.</param>
    /// <param name="lowest">The total at the winner, not above the others.</param>
    /// <param name="after">The total at the disparity above.</param>
    public abstract float Offset(float before, float lowest, float after);
}
