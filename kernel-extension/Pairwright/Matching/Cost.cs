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
