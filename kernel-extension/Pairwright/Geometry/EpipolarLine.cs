namespace Pairwright.Geometry;

/// <summary>A line in one view's ideal pixels on which the match of a point of the other view must lie: A·u + B·v + C = 0 with A² + B² = 1.</summary>
/// <remarks>
/// Immutable; equal when view, coefficients and picture size are. A·u + B·v + C is a signed distance in pixels. In a raw picture the line is a curve:
/// <see cref="Rig.RawCurveOf(EpipolarLine, double)"/>.
/// </remarks>
public sealed record EpipolarLine
{
    /// <summary>Makes a line from coefficients of any scale above zero; the sign is kept.</summary>
    /// <param name="a">Factor of the column.</param>
    /// <param name="b">Factor of the row.</param>
    /// <param name="c">Constant.</param>
    /// <param name="view">The view in which the line lies.</param>
    /// <param name="size">The size of that view's picture, where it is known.</param>
    /// <exception cref="UserErrorException">A and B are both zero, or a coefficient is not finite.</exception>
    public EpipolarLine(double a, double b, double c, View view, PictureSize? size = null)
    {
        var length = Math.Sqrt(a * a + b * b);
        if (!(length > 0) || !double.IsFinite(length) || !double.IsFinite(c))
        {
            throw new UserErrorException(
                $"The coefficients ({a}, {b}, {c}) are no line in the {view.Name()} view; give finite ones of which the first two are not both zero.");
        }

        (A, B, C, View, Size) = (a / length, b / length, c / length, view, size);
    }

    /// <summary>Factor of the column.</summary>
    public double A { get; }

    /// <summary>Factor of the row.</summary>
    public double B { get; }

    /// <summary>Constant, in pixels.</summary>
    public double C { get; }

    /// <summary>The view in which the line lies.</summary>
    public View View { get; }

    /// <summary>The size of the picture of that view, where it is known, as for the lines of a rig.</summary>
    public PictureSize? Size { get; }

    /// <summary>The unit vector along the line that has no component to the left (straight down where the line is a column).</summary>
    public (double U, double V) Direction => B < 0 || (B == 0 && A > 0) ? (-B, A) : (B, -A);

    /// <summary>The distance of a pixel from the line, in pixels; its sign says on which side.</summary>
    public double SignedDistance(IdealPixel pixel) => A * pixel.U + B * pixel.V + C;

    /// <summary>The point of the line nearest to a pixel.</summary>
    public IdealPixel Nearest(IdealPixel pixel)
    {
        var distance = SignedDistance(pixel);
        return new(pixel.U - distance * A, pixel.V - distance * B);
    }

    /// <summary>The two ends of the part on a picture, its outer half pixel included, in the order of <see cref="Direction"/>; nothing where the line misses it.</summary>
    /// <param name="size">The picture's size, in pixels.</param>
    public (IdealPixel From, IdealPixel To)? ClippedTo(PictureSize size) =>
        ClippedTo(-0.5, -0.5, size.Width - 0.5, size.Height - 0.5);

    /// <summary>The equation, for people.</summary>
    public override string ToString() =>
        FormattableString.Invariant($"{A:0.######}·u {Signed(B, "0.######")}·v {Signed(C, "0.###")} = 0 ({View.Name()} view, px)");

    // Liang & Barsky (1984): the line's parameter is narrowed by one border after another.
    internal (IdealPixel From, IdealPixel To)? ClippedTo(double left, double top, double right, double bottom)
    {
        var foot = Nearest(new((left + right) / 2, (top + bottom) / 2));
        var (directionU, directionV) = Direction;
        var (low, high) = (double.NegativeInfinity, double.PositiveInfinity);
        Narrow(foot.U, directionU, left, right);
        Narrow(foot.V, directionV, top, bottom);
        return low < high
            ? (new(foot.U + low * directionU, foot.V + low * directionV), new(foot.U + high * directionU, foot.V + high * directionV))
            : null;

        void Narrow(double start, double slope, double least, double most)
        {
            if (slope == 0)
            {
                if (start < least || start > most)
                {
                    high = double.NegativeInfinity;
                }

                return;
            }

            var (first, second) = ((least - start) / slope, (most - start) / slope);
            low = Math.Max(low, Math.Min(first, second));
            high = Math.Min(high, Math.Max(first, second));
        }
    }

    private static string Signed(double value, string format) =>
        (value < 0 ? "− " : "+ ") + Math.Abs(value).ToString(format, System.Globalization.CultureInfo.InvariantCulture);
}
