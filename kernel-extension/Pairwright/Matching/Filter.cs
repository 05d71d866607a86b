using System.Runtime.CompilerServices;

namespace Pairwright.Matching;

/// <summary>A pass over the whole map after all checks: the last stage of a recipe.</summary>
public abstract class Filter : Stage
{
    /// <summary>Removes patches of similar disparity that are too small to be believed.</summary>
    /// <param name="smallestPx">The least number of pixels that a patch must have.</param>
    /// <param name="stepPx">The largest difference between neighbours of one patch, in pixels.</param>
    /// <exception cref="UserErrorException">A number is not above zero.</exception>
    public static Filter Speckle(int smallestPx = 100, double stepPx = 1) => new SpeckleFilter(smallestPx, stepPx);

    /// <summary>The median of the measured disparities of each measured pixel's 3 × 3 neighbourhood; the lower one of an even number.</summary>
    public static Filter Median { get; } = new MedianFilter();

    /// <summary>
    /// Least squares between the two pictures over a window, to free disparities of the pull towards whole pixels, and the σ of each from the
    /// pictures' noise and slopes (Lucas and Kanade 1981; Ackermann 1984; Sabater, Morel and Almansa 2011). What the pictures do not confirm is no match.
    /// </summary>
    /// <param name="window">The window's side in pixels: 5, 9, 13, 17 and so on.</param>
    /// <exception cref="UserErrorException">The window is not one.</exception>
    public static Filter LeastSquares(int window = 13) => new LeastSquaresRefinement(window);

    /// <summary>A filter written as a function of the map.</summary>
    /// <param name="apply">Changes disparities and labels.</param>
    /// <param name="code">The text of <paramref name="apply"/>, which the compiler fills in; it tells recipes apart.</param>
    public static Filter FromMap(Action<WorkingMap> apply, [CallerArgumentExpression(nameof(apply))] string code = "")
    {
        ArgumentNullException.ThrowIfNull(apply);
        return new CodeFilter(apply, code);
    }

    /// <summary>
    /// For a filter that measures disparities anew: how far the errors of two of them are correlated afterwards, in pixels. Nothing for one that
    /// takes them as they are.
    /// </summary>
    public virtual int? CorrelationLengthPx => null;

    /// <summary>
    /// For a filter that measures disparities anew: the standard uncertainty of the pull that is left in them, as for
    /// <see cref="SubPixel.PullSigmaPx"/>. Nothing for one that takes them as they are.
    /// </summary>
    public virtual double? PullSigmaPx => null;

    /// <summary>Changes disparities and labels.</summary>
    /// <param name="map">The map.</param>
    /// <param name="stop">Asks to stop.</param>
    public abstract void Apply(WorkingMap map, CancellationToken stop);
}
