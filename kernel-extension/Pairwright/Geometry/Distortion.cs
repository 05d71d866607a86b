namespace Pairwright.Geometry;

/// <summary>The lens distortion of Conrady (1919) and Brown (1971), with a rational radial factor.</summary>
/// <remarks>
/// On normalised directions, r² = x² + y², g = (1 + K1·r² + K2·r⁴ + K3·r⁶) / (1 + K4·r² + K5·r⁴ + K6·r⁶):
/// x′ = x·g + 2·P1·x·y + P2·(r² + 2x²), y′ = y·g + P1·(r² + 2y²) + 2·P2·x·y. All terms are without unit.
/// </remarks>
public sealed record Distortion
{
    // tan(88.9°): no lens of this model sees farther.
    private const double WidestRadius = 50;
    private double? validRadius;

    /// <summary>Makes a distortion; a term left out is zero.</summary>
    public Distortion(
        double k1 = 0, double k2 = 0, double p1 = 0, double p2 = 0, double k3 = 0, double k4 = 0, double k5 = 0, double k6 = 0) =>
        (K1, K2, P1, P2, K3, K4, K5, K6) = (k1, k2, p1, p2, k3, k4, k5, k6);

    /// <summary>Radial term of r².</summary>
    public double K1 { get; }

    /// <summary>Radial term of r⁴.</summary>
    public double K2 { get; }

    /// <summary>First tangential term.</summary>
    public double P1 { get; }

    /// <summary>Second tangential term.</summary>
    public double P2 { get; }

    /// <summary>Radial term of r⁶.</summary>
    public double K3 { get; }

    /// <summary>Denominator's term of r².</summary>
    public double K4 { get; }

    /// <summary>Denominator's term of r⁴.</summary>
    public double K5 { get; }

    /// <summary>Denominator's term of r⁶.</summary>
    public double K6 { get; }

    /// <summary>No distortion.</summary>
    public static Distortion None { get; } = new();

    /// <summary>Whether every term is zero.</summary>
    public bool IsNone => this == None;

    /// <summary>
    /// The largest radius r of an undistorted direction up to which the radial map r·g(r) grows; beyond it two directions share a pixel
    /// and the model means nothing. At most 50.
    /// </summary>
    public double ValidRadius => validRadius ??= FindValidRadius();

    /// <summary>Whether two distortions have equal terms.</summary>
    public bool Equals(Distortion? other) =>
        other is not null && (K1, K2, P1, P2, K3, K4, K5, K6).Equals((other.K1, other.K2, other.P1, other.P2, other.K3, other.K4, other.K5, other.K6));

    /// <summary>Hashes the terms.</summary>
    public override int GetHashCode() => HashCode.Combine(K1, K2, P1, P2, K3, K4, K5, K6);

    /// <summary>The distorted direction of an undistorted one (x, y, 1).</summary>
    public (double X, double Y) Distort(double x, double y)
    {
        var r2 = x * x + y * y;
        var g = RadialFactor(r2);
        return (x * g + 2 * P1 * x * y + P2 * (r2 + 2 * x * x), y * g + P1 * (r2 + 2 * y * y) + 2 * P2 * x * y);
    }

    /// <summary>The undistorted direction of a distorted one, or nothing where the pixel lies outside the model's valid field.</summary>
    /// <remarks>Newton's method from the solution of the radial part alone; it ends when a step is below 1e-14.</remarks>
    public (double X, double Y)? Undistort(double x, double y)
    {
        if (IsNone)
        {
            return (x, y);
        }

        if (InvertRadial(Math.Sqrt(x * x + y * y)) is not { } scale)
        {
            return null;
        }

        var (a, b) = (x * scale, y * scale);
        for (var iteration = 0; iteration < 50; iteration++)
        {
            var (distortedX, distortedY) = Distort(a, b);
            var (xx, xy, yx, yy) = Jacobian(a, b);
            var determinant = xx * yy - xy * yx;
            if (!(determinant > 0))
            {
                return null;
            }

            var (errorX, errorY) = (distortedX - x, distortedY - y);
            var (stepX, stepY) = ((yy * errorX - xy * errorY) / determinant, (xx * errorY - yx * errorX) / determinant);
            (a, b) = (a - stepX, b - stepY);
            if (Math.Abs(stepX) + Math.Abs(stepY) <= 1e-14 * (1 + Math.Abs(a) + Math.Abs(b)))
            {
                return a * a + b * b <= ValidRadius * ValidRadius ? (a, b) : null;
            }
        }

        return null;
    }

    private double RadialFactor(double r2) =>
        (1 + r2 * (K1 + r2 * (K2 + r2 * K3))) / (1 + r2 * (K4 + r2 * (K5 + r2 * K6)));

    private double RadialFactorSlope(double r2)
    {
        var numerator = 1 + r2 * (K1 + r2 * (K2 + r2 * K3));
        var denominator = 1 + r2 * (K4 + r2 * (K5 + r2 * K6));
        return ((K1 + r2 * (2 * K2 + 3 * K3 * r2)) * denominator - numerator * (K4 + r2 * (2 * K5 + 3 * K6 * r2))) / (denominator * denominator);
    }

    private (double XX, double XY, double YX, double YY) Jacobian(double x, double y)
    {
        var r2 = x * x + y * y;
        var g = RadialFactor(r2);
        var slope = 2 * RadialFactorSlope(r2);
        var cross = x * y * slope + 2 * P1 * x + 2 * P2 * y;
        return (g + x * x * slope + 2 * P1 * y + 6 * P2 * x, cross, cross, g + y * y * slope + 6 * P1 * y + 2 * P2 * x);
    }

    // r·g(r) and its derivative g + 2r²·g′(r²), at an undistorted radius.
    private (double Value, double Slope) Radial(double r)
    {
        var g = RadialFactor(r * r);
        return (r * g, g + 2 * r * r * RadialFactorSlope(r * r));
    }

    // Undistorted radius over distorted radius, by bisection kept safe around Newton's steps; nothing beyond the valid field.
    private double? InvertRadial(double distorted)
    {
        if (distorted == 0)
        {
            return 1;
        }

        // Tangential terms move a point a little past the radial limit; the full Newton step decides there.
        var (low, high) = (0.0, ValidRadius);
        if (Radial(high).Value < distorted)
        {
            return Radial(high).Value * 1.05 > distorted ? high / distorted : null;
        }

        var r = Math.Min(distorted, high);
        for (var iteration = 0; iteration < 200; iteration++)
        {
            var (value, slope) = Radial(r);
            var error = value - distorted;
            (low, high) = error > 0 ? (low, r) : (r, high);
            var next = r - error / slope;
            next = next > low && next < high ? next : (low + high) / 2;
            if (Math.Abs(next - r) < 1e-12 * (1 + r))
            {
                return next / distorted;
            }

            r = next;
        }

        return r / distorted;
    }

    private double FindValidRadius()
    {
        const double step = 0.005;
        bool Grows(double r) => 1 + r * r * (K4 + r * r * (K5 + r * r * K6)) > 0 && Radial(r).Slope > 0;

        var low = 0.0;
        for (var r = step; r <= WidestRadius; r += step)
        {
            if (!Grows(r))
            {
                var high = r;
                for (var iteration = 0; iteration < 60; iteration++)
                {
                    var middle = (low + high) / 2;
                    (low, high) = Grows(middle) ? (middle, high) : (low, middle);
                }

                return low;
            }

            low = r;
        }

        return WidestRadius;
    }
}
