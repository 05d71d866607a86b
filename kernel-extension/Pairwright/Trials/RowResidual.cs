using System.Globalization;
using Pairwright.Imaging;
using Pairwright.Matching;

namespace Pairwright.Trials;

/// <summary>How far matches lie off their row: a figure of the rectification that needs no truth.</summary>
/// <remarks>
/// <para>
/// Around measured pixels with enough gradient down the picture, the vertical shift between the left window and the right one brought over by
/// the disparities is found by least squares with gain and offset (Lucas and Kanade 1981). A median off zero says that the cameras
/// have moved against each other since they were calibrated; it says nothing about an error along the row.
/// </para>
/// <para>Immutable.</para>
/// </remarks>
public sealed class RowResidual
{
    private const int Half = 4;
    private const int StepPx = 8;
    private const int Rounds = 4;

    // A shift farther than this is a wrong match, not a row off its place.
    private const double FarthestPx = 2;

    // Least standard uncertainty of a shift that counts, from the window's gradients and what is left between the windows.
    private const double LargestSigmaPx = 0.2;

    private readonly double[] sorted;

    private RowResidual(List<double> shifts)
    {
        sorted = [.. shifts.Order()];
        Count = sorted.Length;
        MedianPx = Quantile(0.5);

        // Half the distance between the quantiles at one standard deviation of a normal distribution.
        SpreadPx = (Quantile(0.8413) - Quantile(0.1587)) / 2;
    }

    /// <summary>How many places were looked at.</summary>
    public int Count { get; }

    /// <summary>The median of v_right − v_left, in pixels; NaN where there was no place to look at.</summary>
    public double MedianPx { get; }

    /// <summary>Half the distance between the quantiles at 16 % and 84 %, in pixels: one standard deviation where the shifts are normal, hardly moved by wrong matches.</summary>
    public double SpreadPx { get; }

    /// <summary>The shift that a share of the places do not exceed, in pixels; NaN where there was none.</summary>
    /// <param name="share">0 to 1.</param>
    public double Quantile(double share) => Count == 0 ? double.NaN : sorted[(int)Math.Round(Math.Clamp(share, 0, 1) * (Count - 1))];

    /// <summary>Looks at places 8 pixels apart.</summary>
    /// <param name="map">The map; only what it measured is looked at.</param>
    public static RowResidual Of(DisparityMap map)
    {
        ArgumentNullException.ThrowIfNull(map);
        var right = new CubicLevels(map.Pair.Right);
        var shifts = new List<double>();
        for (var v = Half + 3; v < map.Size.Height - Half - 3; v += StepPx)
        {
            for (var u = Half; u < map.Size.Width - Half; u += StepPx)
            {
                if (Shift(map, right, u, v) is { } shift)
                {
                    shifts.Add(shift);
                }
            }
        }

        return new(shifts);
    }

    /// <summary>The main figures in a line.</summary>
    public override string ToString() => string.Create(
        CultureInfo.InvariantCulture, $"Row residual: median {MedianPx:0.000} px, spread {SpreadPx:0.000} px over {Count} places");

    private static double? Shift(DisparityMap map, CubicLevels right, int u0, int v0)
    {
        for (var v = v0 - Half; v <= v0 + Half; v++)
        {
            for (var u = u0 - Half; u <= u0 + Half; u++)
            {
                if (map.Labels[u, v] != DisparityLabel.Measured)
                {
                    return null;
                }
            }
        }

        var shift = 0.0;
        for (var round = 0; round < Rounds; round++)
        {
            if (!Step(map, right, u0, v0, shift, out var step, out var sigma) || sigma > LargestSigmaPx)
            {
                return null;
            }

            shift += step;
            if (!(Math.Abs(shift) <= FarthestPx))
            {
                return null;
            }
        }

        return shift;
    }

    // One step of least squares: left = gain · right(v + shift) + offset, linear in gain, offset and the step of the shift.
    private static bool Step(DisparityMap map, CubicLevels right, int u0, int v0, double shift, out double step, out double sigma)
    {
        const int count = (2 * Half + 1) * (2 * Half + 1);
        Span<double> levels = stackalloc double[count];
        Span<double> gradients = stackalloc double[count];
        Span<double> wanted = stackalloc double[count];
        (step, sigma) = (0, double.PositiveInfinity);
        var n = 0;
        for (var v = v0 - Half; v <= v0 + Half; v++)
        {
            for (var u = u0 - Half; u <= u0 + Half; u++)
            {
                var (x, y) = (u - map.Disparity[u, v], v + shift);
                if (!right.Holds(x, y - 0.5) || !right.Holds(x, y + 0.5))
                {
                    return false;
                }

                levels[n] = right.At(x, y);
                gradients[n] = right.At(x, y + 0.5) - right.At(x, y - 0.5);
                wanted[n++] = map.Pair.Left[u, v];
            }
        }

        Centre(levels);
        Centre(gradients);
        Centre(wanted);
        var (rr, rg, gg) = (Dot(levels, levels), Dot(levels, gradients), Dot(gradients, gradients));
        var (rw, gw) = (Dot(levels, wanted), Dot(gradients, wanted));
        var determinant = rr * gg - rg * rg;
        if (!(determinant > 1e-9 * rr * gg))
        {
            return false;
        }

        var gain = (gg * rw - rg * gw) / determinant;
        var slope = (rr * gw - rg * rw) / determinant;
        if (!(gain > 0.2))
        {
            return false;
        }

        var left = Math.Max(Dot(wanted, wanted) - gain * rw - slope * gw, 0) / (count - 4);
        step = slope / gain;
        sigma = Math.Sqrt(left * rr / determinant) / gain;
        return true;
    }

    private static void Centre(Span<double> values)
    {
        var sum = 0.0;
        foreach (var value in values)
        {
            sum += value;
        }

        foreach (ref var value in values)
        {
            value -= sum / values.Length;
        }
    }

    private static double Dot(ReadOnlySpan<double> a, ReadOnlySpan<double> b)
    {
        var sum = 0.0;
        for (var i = 0; i < a.Length; i++)
        {
            sum += a[i] * b[i];
        }

        return sum;
    }
}
