using System.Runtime.CompilerServices;
using Pairwright.Imaging;

namespace Pairwright.Matching;

/// <summary>How unlike a pixel of the left picture and one of the right are: the first stage of a recipe.</summary>
/// <remarks>Derive from it in a cell to try a cost of your own.</remarks>
public abstract class Cost : Stage
{
    /// <summary>The census transform over a window, compared by Hamming distance (Zabih and Woodfill 1994).</summary>
    /// <param name="width">The window's columns, odd.</param>
    /// <param name="height">The window's rows, odd; the window holds at most 65 pixels.</param>
    /// <exception cref="UserErrorException">A side is even or below three, or the window is too large.</exception>
    public static Cost Census(int width = 9, int height = 7) => new CensusCost(width, height);

    /// <summary>One minus the zero-mean normalised cross-correlation of two square windows: 0 for windows equal up to gain and offset, 2 for opposite ones.</summary>
    /// <param name="window">The window's side in pixels, odd.</param>
    /// <exception cref="UserErrorException">The side is even or below three.</exception>
    public static Cost Zncc(int window = 11) => new ZnccCost(window);

    /// <summary>The centre-symmetric census transform over a window, compared by Hamming distance: half the bits of the plain one (Spangenberg et al. 2013).</summary>
    /// <param name="width">The window's columns, odd.</param>
    /// <param name="height">The window's rows, odd; the window holds at most 129 pixels.</param>
    /// <remarks>Gain and offset do not matter.</remarks>
    /// <exception cref="UserErrorException">A side is even or below three, or the window is too large.</exception>
    public static Cost CentreSymmetricCensus(int width = 9, int height = 7) => new CentreSymmetricCensusCost(width, height);

    /// <summary>The difference of two rank transforms: how many of a square window's pixels are darker than its middle (Zabih and Woodfill 1994).</summary>
    /// <param name="window">The window's side in pixels, odd.</param>
    /// <remarks>Gain and offset do not matter.</remarks>
    /// <exception cref="UserErrorException">The side is even or below three.</exception>
    public static Cost Rank(int window = 7) => new RankCost(window);

    /// <summary>The absolute difference of two grey levels, in levels of the 8-bit scale.</summary>
    /// <param name="limit">The greatest cost, in levels, so that a few bad pixels do not outweigh the rest; none when left out.</param>
    /// <exception cref="UserErrorException">The limit is not above zero.</exception>
    public static Cost AbsoluteDifference(double? limit = null) => new AbsoluteDifferenceCost(limit);

    /// <summary>The difference of two grey levels that does not mind where between two pixels an edge falls (Birchfield and Tomasi 1998), in levels of the 8-bit scale.</summary>
    /// <param name="limit">The greatest cost, in levels; none when left out.</param>
    /// <exception cref="UserErrorException">The limit is not above zero.</exception>
    public static Cost SamplingInsensitiveDifference(double? limit = null) => new SamplingInsensitiveCost(limit);

    /// <summary>The sum of absolute differences of two square windows less their means, divided by their area, in levels of the 8-bit scale.</summary>
    /// <param name="window">The window's side in pixels, odd.</param>
    /// <remarks>An offset does not matter.</remarks>
    /// <exception cref="UserErrorException">The side is even or below three.</exception>
    public static Cost ZeroMeanSad(int window = 7) => new ZeroMeanSadCost(window);

    /// <summary>The sum of squared differences of two square windows, divided by their area, in squared levels of the 8-bit scale.</summary>
    /// <param name="window">The window's side in pixels, odd.</param>
    /// <exception cref="UserErrorException">The side is even or below three.</exception>
    public static Cost Ssd(int window = 7) => new SsdCost(window);

    /// <summary>One minus the normalised cross-correlation of two square windows: 0 for windows equal up to gain, at most 1.</summary>
    /// <param name="window">The window's side in pixels, odd.</param>
    /// <exception cref="UserErrorException">The side is even or below three.</exception>
    public static Cost Ncc(int window = 11) => new NccCost(window);

    /// <summary>The difference of two gradients, across plus down, in levels of the 8-bit scale per pixel.</summary>
    /// <param name="limit">The greatest cost; none when left out.</param>
    /// <remarks>An offset does not matter.</remarks>
    /// <exception cref="UserErrorException">The limit is not above zero.</exception>
    public static Cost Gradient(double? limit = null) => new GradientCost(limit);

    /// <summary>A blend of the truncated differences of levels and of gradients along the row (Rhemann et al. 2011; Bleyer et al. 2011).</summary>
    /// <param name="gradientShare">The gradients' share, 0 to 1.</param>
    /// <param name="differenceLimit">The greatest difference of levels that counts, on the 8-bit scale.</param>
    /// <param name="gradientLimit">The greatest difference of gradients that counts, on the 8-bit scale per pixel.</param>
    /// <exception cref="UserErrorException">The share is not from 0 to 1, or a limit not above zero.</exception>
    public static Cost DifferenceAndGradient(double gradientShare = 0.9, double differenceLimit = 10, double gradientLimit = 2) =>
        new DifferenceAndGradientCost(gradientShare, differenceLimit, gradientLimit);

    /// <summary>Census over 9 × 7 pixels and absolute difference, each bent towards one and added (Mei et al. 2011).</summary>
    /// <param name="censusScale">How many differing bits count as many.</param>
    /// <param name="differenceScale">How many levels of difference, on the 8-bit scale, count as many.</param>
    /// <exception cref="UserErrorException">A scale is not above zero.</exception>
    public static Cost AdCensus(double censusScale = 30, double differenceScale = 10) => new AdCensusCost(censusScale, differenceScale);

    /// <summary>A cost written as a function of two grey levels, such as <c>Cost.FromPixels((l, r) => Math.Abs(l - r))</c>.</summary>
    /// <param name="difference">
    /// The levels of a left and a right pixel on the 8-bit scale (a level of 12 bits is a multiple of 1/16) to a cost: the lower the better, not
    /// below zero, infinite where the two cannot be compared. It is called from several threads at once.
    /// </param>
    /// <param name="code">The text of <paramref name="difference"/>, which the compiler fills in; it tells recipes apart.</param>
    /// <remarks>A first try: a call per pixel and disparity. <see cref="FromRows"/> and a class derived from <see cref="Cost"/> are faster.</remarks>
    public static Cost FromPixels(Func<double, double, double> difference, [CallerArgumentExpression(nameof(difference))] string code = "")
    {
        ArgumentNullException.ThrowIfNull(difference);
        return new PixelCost(difference, code);
    }

    /// <summary>A cost written as a comparison of two stretches of rows.</summary>
    /// <param name="comparison">Fills the costs of a stretch of the left row against that of the right one. It is called from several threads at once.</param>
    /// <param name="code">The text of <paramref name="comparison"/>, which the compiler fills in; it tells recipes apart.</param>
    public static Cost FromRows(RowComparison comparison, [CallerArgumentExpression(nameof(comparison))] string code = "")
    {
        ArgumentNullException.ThrowIfNull(comparison);
        return new RowCost(comparison, code);
    }

    /// <summary>How much of a pixel's neighbourhood a cost looks at: the window's larger side, in pixels; 1 for a single pixel.</summary>
    public virtual int SupportPx => 1;

    /// <summary>
    /// The cost that two unrelated pixels typically have; it scales penalties and stands in where nothing can be compared. NaN, as it is where it
    /// is not overridden, when it depends on the pictures: then it is the mean over the pair's own costs.
    /// </summary>
    public virtual double Unrelated => double.NaN;

    /// <summary>Looks at a pair once, so that the costs of its rows can be asked for.</summary>
    /// <param name="pair">The pair.</param>
    public abstract ICostRows Prepare(RectifiedPair pair);
}
