using System.Runtime.CompilerServices;

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

    /// <summary>An estimate written as a function of the totals below, at and above the winner.</summary>
    /// <param name="offset">Gives the offset from the winner, −0.5 to 0.5 px. It is called from several threads at once.</param>
    /// <param name="code">The text of <paramref name="offset"/>, which the compiler fills in; it tells recipes apart.</param>
    public static SubPixel FromTotals(Func<float, float, float, float> offset, [CallerArgumentExpression(nameof(offset))] string code = "")
    {
        ArgumentNullException.ThrowIfNull(offset);
        return new CodeSubPixel(offset, code);
    }

    /// <summary>
    /// The standard uncertainty, in pixels, of the pull that is left: an error that repeats with every whole pixel of disparity. 1/√12, a
    /// rectangular distribution over a pixel (JCGM 100:2008, 4.3.7), where a stage does not say better.
    /// </summary>
    public virtual double PullSigmaPx => 1 / Math.Sqrt(12);

    /// <summary>The offset of the lowest point from the whole disparity, −0.5 to 0.5 px.</summary>
    /// <param name="before">The total at the disparity below.</param>
    /// <param name="lowest">The total at the winner, not above the others.</param>
    /// <param name="after">The total at the disparity above.</param>
    public abstract float Offset(float before, float lowest, float after);

    /// <summary>The offsets of a row; anything where a neighbour is NaN.</summary>
    internal virtual void Offsets(ReadOnlySpan<float> before, ReadOnlySpan<float> lowest, ReadOnlySpan<float> after, Span<float> offsets)
    {
        for (var u = 0; u < offsets.Length; u++)
        {
            if (float.IsNaN(before[u]) || float.IsNaN(after[u]))
            {
                continue;
            }

            // A whole pixel leaves room for rounding; more is a mistake of whoever wrote the stage.
            offsets[u] = Offset(before[u], lowest[u], after[u]);
            if (!(Math.Abs(offsets[u]) <= 1))
            {
                throw new UserErrorException(
                    $"The sub-pixel stage '{Name}' gave an offset of {offsets[u]} px for the totals {before[u]}, {lowest[u]}, {after[u]}; an offset lies between -0.5 and 0.5 px.");
            }
        }
    }
}
