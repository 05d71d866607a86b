using Pairwright.Geometry;
using Pairwright.Imaging;

namespace Pairwright.Matching;

/// <summary>A cost that compares two windows of grey levels; it also serves a search along a curve in raw pictures.</summary>
public abstract class WindowCost : Cost
{
    /// <summary>Makes the base of a cost.</summary>
    /// <param name="width">The window's columns, odd.</param>
    /// <param name="height">The window's rows, odd.</param>
    /// <exception cref="UserErrorException">A side is even or below three.</exception>
    protected WindowCost(int width, int height)
    {
        if (width < 3 || height < 3 || width % 2 == 0 || height % 2 == 0)
        {
            throw new UserErrorException($"A window of {width} × {height} px has no middle pixel or no neighbours; give odd sides of at least 3.");
        }

        Window = new(width, height);
    }

    /// <summary>The window's size.</summary>
    public PictureSize Window { get; }

    /// <inheritdoc/>
    public override int SupportPx => Math.Max(Window.Width, Window.Height);

    /// <inheritdoc/>
    /// <remarks>Compares every window with every other unless it is overridden; beyond the border stands the nearest pixel.</remarks>
    /// <exception cref="UserErrorException">The pictures are smaller than the window.</exception>
    public override ICostRows Prepare(RectifiedPair pair)
    {
        ArgumentNullException.ThrowIfNull(pair);
        pair.MustHold(Window);
        return new WindowCostRows(this, pair);
    }

    /// <summary>The cost of two windows; NaN where they cannot be compared, for which <see cref="Cost.Unrelated"/> must then stand in.</summary>
    /// <param name="left">Grey levels of the left window on the 8-bit scale (a level of 12 bits is a multiple of 1/16), row after row.</param>
    /// <param name="right">Grey levels of the right window, likewise.</param>
    public abstract double Compare(ReadOnlySpan<float> left, ReadOnlySpan<float> right);
}
