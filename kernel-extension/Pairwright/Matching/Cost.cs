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

    /// <summary>How much of a pixel's neighbourhood a cost looks at: the window's larger side, in pixels; 1 for a single pixel.</summary>
    public virtual int SupportPx => 1;

    /// <summary>The cost that two unrelated pixels typically have; it scales penalties and stands in where nothing can be compared.</summary>
    public abstract double Unrelated { get; }

    /// <summary>Looks at a pair once, so that the costs of its rows can be asked for.</summary>
    /// <param name="pair">The pair.</param>
    public abstract ICostRows Prepare(RectifiedPair pair);
}
