namespace Pairwright.Geometry;

/// <summary>Real roots of polynomials, given by their coefficients from the constant up.</summary>
internal static class RealPolynomial
{
    public static double Value(double[] coefficients, double x)
    {
        var value = 0.0;
        for (var power = coefficients.Length - 1; power >= 0; power--)
        {
            value = value * x + coefficients[power];
        }

        return value;
    }

    public static double[] Product(double[] a, double[] b)
    {
        var product = new double[a.Length + b.Length - 1];
        for (var i = 0; i < a.Length; i++)
        {
            for (var j = 0; j < b.Length; j++)
            {
                product[i + j] += a[i] * b[j];
            }
        }

        return product;
    }

    /// <summary>The roots between two numbers, rising, at which the sign changes.</summary>
    /// <remarks>Between neighbouring roots of the derivative a polynomial runs one way, so that halving finds the one root there may be.</remarks>
    public static List<double> Roots(double[] coefficients, double low, double high)
    {
        var roots = new List<double>();
        var degree = Array.FindLastIndex(coefficients, coefficient => coefficient != 0);
        if (degree < 1)
        {
            return roots;
        }

        var slope = new double[degree];
        for (var power = 1; power <= degree; power++)
        {
            slope[power - 1] = power * coefficients[power];
        }

        List<double> stops = [low, .. Roots(slope, low, high), high];
        for (var i = 1; i < stops.Count; i++)
        {
            var (from, to) = (stops[i - 1], stops[i]);
            var rises = Value(coefficients, to) > 0;
            if (Value(coefficients, from) > 0 == rises)
            {
                continue;
            }

            for (var middle = (from + to) / 2; middle > from && middle < to; middle = (from + to) / 2)
            {
                (from, to) = Value(coefficients, middle) > 0 == rises ? (from, middle) : (middle, to);
            }

            roots.Add(from);
        }

        return roots;
    }
}
