using System.Runtime.CompilerServices;

namespace Pairwright.Matching;

/// <summary>A test that each match of a row must pass: the fifth stage of a recipe.</summary>
public abstract class Check : Stage
{
    /// <summary>The match from right to left must agree with that from left to right; what fails is told apart into hidden and mismatched (Hirschmüller 2008, section 2.5).</summary>
    /// <param name="tolerancePx">The largest difference of the two whole disparities that passes, in pixels.</param>
    /// <exception cref="UserErrorException">The tolerance is negative.</exception>
    public static Check LeftRight(int tolerancePx = 1) => new LeftRightCheck(tolerancePx);

    /// <summary>The second-lowest total, away from the lowest one's neighbours, must exceed the lowest by a share; repeating and plain surfaces fail.</summary>
    /// <param name="margin">The share, at least 0.</param>
    /// <exception cref="UserErrorException">The margin is negative or not finite.</exception>
    public static Check Uniqueness(double margin = 0.05) => new UniquenessCheck(margin);

    /// <summary>A check written as a function of a row.</summary>
    /// <param name="apply">Changes the labels of what fails. It is called from several threads at once.</param>
    /// <param name="code">The text of <paramref name="apply"/>, which the compiler fills in; it tells recipes apart.</param>
    public static Check FromRow(Action<RowMatches> apply, [CallerArgumentExpression(nameof(apply))] string code = "")
    {
        ArgumentNullException.ThrowIfNull(apply);
        return new CodeCheck(apply, code);
    }

    /// <summary>Looks at a row and changes the label of what fails; labels other than <see cref="DisparityLabel.Measured"/> stay as they are.</summary>
    /// <param name="row">The row.</param>
    public abstract void Apply(RowMatches row);
}
