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
    /// The median of the measured disparities around each measured pixel, weighted by how near their grey levels and places are, so that edges of
    /// the picture stay edges of the map (Ma et al. 2013).
    /// </summary>
    /// <param name="window">The window's side in pixels, odd, 3 to 63.</param>
    /// <param name="levels">The difference of grey level, on the 8-bit scale, at which a weight has fallen to 37 %.</param>
    /// <exception cref="UserErrorException">A number does not fit.</exception>
    public static Filter WeightedMedian(int window = 9, double levels = 12) => new WeightedMedianFilter(window, levels);

    /// <summary>Removes what has too little texture along the row to be matched: what is left is noise's choice.</summary>
    /// <param name="window">The side, in pixels and odd, of the window over which texture is looked for.</param>
    /// <param name="timesNoise">How many times the noise of the left picture, estimated from itself, the root mean square of the gradient must be.</param>
    /// <exception cref="UserErrorException">A number does not fit.</exception>
    public static Filter PlainTexture(int window = 9, double timesNoise = 1.5) => new PlainTextureFilter(window, timesNoise);

    /// <summary>
    /// Fills every gap from its surroundings, along rather than across the picture's edges, and what is hidden from the right camera from behind
    /// what hides it. Filled values are labelled so and never count as measured.
    /// </summary>
    public static Filter Fill { get; } = new FillFilter();

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

    /// <summary>Whether the filter weighs what the optimisation left of the totals, so that it must be kept.</summary>
    internal virtual bool NeedsEvidence => false;

    /// <summary>Changes disparities and labels.</summary>
    /// <param name="map">The map.</param>
    /// <param name="stop">Asks to stop.</param>
    public abstract void Apply(WorkingMap map, CancellationToken stop);
}
