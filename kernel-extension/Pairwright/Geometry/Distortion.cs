namespace Pairwright.Geometry;

/// <summary>The lens distortion of Conrady (1919) and Brown (1971), with a rational radial factor.</summary>
/// <remarks>
/// On normalised directions, r² = x² + y², g = (1 + K1·r² + K2·r⁴ + K3·r⁶) / (1 + K4·r² + K5·r⁴ + K6·r⁶):
/// x′ = x·g + 2·P1·x·y + P2·(r² + 2x²), y′ = y·g + P1·(r² + 2y²) + 2·P2·x·y. All terms are without unit.
/// </remarks>
public sealed record Distortion
{
    // tan(88.9°): no lens of this model sees farther, nor maps farther out.
    private const double WidestRadius = 50;
    private readonly Lazy<Field> validField;

    /// <summary>Makes a distortion; a term left out is zero.</summary>
    public Distortion(
        double k1 = 0, double k2 = 0, double p1 = 0, double p2 = 0, double k3 = 0, double k4 = 0, double k5 = 0, double k6 = 0)
    {
        (K1, K2, P1, P2, K3, K4, K5, K6) = (k1, k2, p1, p2, k3, k4, k5, k6);
        IsNone = k1 == 0 && k2 == 0 && p1 == 0 && p2 == 0 && k3 == 0 && k4 == 0 && k5 == 0 && k6 == 0;
        validField = new(FindField);
    }

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
    public bool IsNone { get; }

    /// <summary>
    /// The radius of the model's valid field, of undistorted directions: the largest within which the map stretches in every direction, so
    /// that no two directions share a pixel. Beyond it the model means nothing. At most 50, as is the radius of its image.
    /// </summary>
    /// <remarks>
    /// The map's derivative is symmetric. Its radial part has the eigenvalues a = d(r·g)/dr and g, and its tangential part none below −6·p·r,
    /// where p² = P1² + P2². While a and g both exceed 6·p·r the derivative is therefore positive definite, and a map whose derivative is
    /// positive definite over a disc is one to one there.
    /// </remarks>
    public double ValidRadius => validField.Value.Radius;

    /// <summary>Whether two distortions have equal terms.</summary>
    public bool Equals(Distortion? other) =>
        other is not null && (K1, K2, P1, P2, K3, K4, K5, K6).Equals((other.K1, other.K2, other.P1, other.P2, other.K3, other.K4, other.K5, other.K6));

    /// <summary>Hashes the terms.</summary>
    public override int GetHashCode() => HashCode.Combine(K1, K2, P1, P2, K3, K4, K5, K6);

    /// <summary>The terms that are not zero.</summary>
    public override string ToString()
    {
        (string Name, double Value)[] terms =
            [("k1", K1), ("k2", K2), ("p1", P1), ("p2", P2), ("k3", K3), ("k4", K4), ("k5", K5), ("k6", K6)];
        return IsNone ? "no distortion" : string.Join(", ", terms.Where(term => term.Value != 0).Select(term => FormattableString.Invariant($"{term.Name} {term.Value:G6}")));
    }

    /// <summary>The distorted direction of an undistorted one (x, y, 1).</summary>
    public (double X, double Y) Distort(double x, double y)
    {
        var r2 = x * x + y * y;
        var g = RadialFactor(r2);
        return (x * g + 2 * P1 * x * y + P2 * (r2 + 2 * x * x), y * g + P1 * (r2 + 2 * y * y) + 2 * P2 * x * y);
    }

    /// <summary>The undistorted direction of a distorted one, or nothing where it lies outside the model's valid field.</summary>
    /// <remarks>
    /// Newton's method from the solution of the radial part alone, with steps halved while they leave the field or do not improve, until
    /// rounding ends the improvement. The remaining error, as a distorted direction, is at most 10⁻¹⁴·(1 + its length): 10⁻¹⁰ px at a focal
    /// length of 10,000 px.
    /// </remarks>
    public (double X, double Y)? Undistort(double x, double y)
    {
        if (IsNone)
        {
            return (x, y);
        }

        var valid = validField.Value;
        var distorted = Math.Sqrt(x * x + y * y);
        if (!(distorted <= valid.Reach))
        {
            return null;
        }

        var scale = distorted > 0 ? InvertRadial(Math.Min(distorted, valid.RadialReach), valid.Radius) / distorted : 1;
        var (a, b) = (x * scale, y * scale);
        var (errorX, errorY) = Error(a, b);
        var error = Math.Abs(errorX) + Math.Abs(errorY);
        var enough = 1e-16 * (1 + distorted);
        for (var (iteration, improved) = (0, true); iteration < 100 && improved && error > enough; iteration++)
        {
            var (xx, xy, yy) = Jacobian(a, b);
            var determinant = xx * yy - xy * xy;
            var (stepX, stepY) = ((yy * errorX - xy * errorY) / determinant, (xx * errorY - xy * errorX) / determinant);
            improved = false;
            for (var share = 1.0; !improved && share > 1e-6; share /= 2)
            {
                var (nextA, nextB) = (a - share * stepX, b - share * stepY);
                if (nextA * nextA + nextB * nextB > valid.Radius * valid.Radius * (1 + 1e-12))
                {
                    continue;
                }

                var (nextErrorX, nextErrorY) = Error(nextA, nextB);
                var nextError = Math.Abs(nextErrorX) + Math.Abs(nextErrorY);
                if (nextError < error)
                {
                    (a, b, errorX, errorY, error, improved) = (nextA, nextB, nextErrorX, nextErrorY, nextError, true);
                }
                else if (error < 1e-14 * (1 + distorted))
                {
                    break;
                }
            }
        }

        return error <= 1e-14 * (1 + distorted) ? (a, b) : null;

        (double X, double Y) Error(double atX, double atY)
        {
            var (toX, toY) = Distort(atX, atY);
            return (toX - x, toY - y);
        }
    }

    private double RadialFactor(double r2) =>
        (1 + r2 * (K1 + r2 * (K2 + r2 * K3))) / (1 + r2 * (K4 + r2 * (K5 + r2 * K6)));

    private double RadialFactorSlope(double r2)
    {
        var numerator = 1 + r2 * (K1 + r2 * (K2 + r2 * K3));
        var denominator = 1 + r2 * (K4 + r2 * (K5 + r2 * K6));
        return ((K1 + r2 * (2 * K2 + 3 * K3 * r2)) * denominator - numerator * (K4 + r2 * (2 * K5 + 3 * K6 * r2))) / (denominator * denominator);
    }

    private (double XX, double XY, double YY) Jacobian(double x, double y)
    {
        var r2 = x * x + y * y;
        var g = RadialFactor(r2);
        var slope = 2 * RadialFactorSlope(r2);
        return (
            g + x * x * slope + 2 * P1 * y + 6 * P2 * x,
            x * y * slope + 2 * P1 * x + 2 * P2 * y,
            g + y * y * slope + 6 * P1 * y + 2 * P2 * x);
    }

    // The radius whose image under r·g(r) is given: Newton's steps, kept between bounds that halving would keep.
    private double InvertRadial(double distorted, double validRadius)
    {
        var (low, high) = (0.0, validRadius);
        var r = Math.Min(distorted, validRadius);
        for (var iteration = 0; iteration < 100; iteration++)
        {
            var g = RadialFactor(r * r);
            var error = r * g - distorted;
            (low, high) = error > 0 ? (low, r) : (r, high);
            var next = r - error / (g + 2 * r * r * RadialFactorSlope(r * r));
            next = next >= low && next <= high ? next : (low + high) / 2;
            if (Math.Abs(next - r) <= 1e-13 * r)
            {
                return next;
            }

            r = next;
        }

        return r;
    }

    private Field FindField()
    {
        // With s = r², g = N(s)/D(s): a·D² = N·D + 2s·(N′·D − N·D′). The bounds of ValidRadius become signs of polynomials in r.
        double[] n = [1, K1, K2, K3], d = [1, K4, K5, K6];
        double[] sn = [0, K1, 2 * K2, 3 * K3], sd = [0, K4, 2 * K5, 3 * K6];
        var p = Math.Sqrt(P1 * P1 + P2 * P2);
        var dd = RealPolynomial.Product(d, d);
        var stretch = RealPolynomial.Product(n, d);
        var (first, second) = (RealPolynomial.Product(sn, d), RealPolynomial.Product(n, sd));
        for (var i = 0; i < stretch.Length; i++)
        {
            stretch[i] += 2 * (first[i] - second[i]);
        }

        var bounds = new[] { InRadius(stretch, 6 * p, dd), InRadius(n, 6 * p, d), InRadius(d, 0, d), InRadius(d, 1 / WidestRadius, n) };
        var radius = bounds.SelectMany(bound => RealPolynomial.Roots(bound, 0, WidestRadius)).Append(WidestRadius).Min();
        var radialReach = radius * RadialFactor(radius * radius);
        return new(radius, radialReach, radialReach + 3 * p * radius * radius);

        // a(r²) − factor·r·b(r²).
        double[] InRadius(double[] a, double factor, double[] b)
        {
            var coefficients = new double[Math.Max(2 * a.Length - 1, 2 * b.Length)];
            for (var i = 0; i < a.Length; i++)
            {
                coefficients[2 * i] += a[i];
            }

            for (var i = 0; i < b.Length; i++)
            {
                coefficients[2 * i + 1] -= factor * b[i];
            }

            return coefficients;
        }
    }

    // The valid radius, its image under the radial part, and the farthest image that the tangential part can add to it.
    private sealed record Field(double Radius, double RadialReach, double Reach);
}
