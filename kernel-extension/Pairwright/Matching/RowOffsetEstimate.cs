using MathNet.Numerics.LinearAlgebra;
using Pairwright.Geometry;
using Pairwright.Imaging;

namespace Pairwright.Matching;

/// <summary>Estimates the <see cref="RowOffset"/> of a pair from its pictures and a disparity map that is right to a fraction of a pixel.</summary>
/// <remarks>
/// Each window of a grid solves for a step across the rows beside its step along them, gain and offset (Lucas and Kanade 1981); the slopes of the left picture ask the equations and
/// those of the right one stand in them, so that noise does not pull (instrumental variables; Durbin 1954). A field of second order is fitted to the steps, weighted, wrong windows
/// left out.
/// </remarks>
internal static class RowOffsetEstimate
{
    private const int Side = 17;
    private const double LeastShare = 0.8;
    private const double LargestSigmaPx = 0.3;

    // Windows are not trusted beyond this: texture differs a little between two views.
    private const double FinestSigmaPx = 0.01;

    private const int LeastWindows = 20;
    private const int WindowsPerTerm = 12;

    /// <summary>The field that is left when the right picture is looked up at the offset so far.</summary>
    /// <param name="pair">The pair.</param>
    /// <param name="left">The left picture.</param>
    /// <param name="right">The right picture.</param>
    /// <param name="disparity">Disparities; NaN where there is none.</param>
    /// <param name="soFar">What is known of the offset.</param>
    /// <param name="options">How to share the work.</param>
    /// <returns>The whole offset: what was known and what was found beyond it.</returns>
    public static RowOffset Of(RectifiedPair pair, CubicSpline left, CubicSpline right, float[] disparity, RowOffset soFar, ParallelOptions options)
    {
        var size = pair.Size;
        var (across, down) = (size.Width / Side, size.Height / Side);
        var windows = new (double U, double V, double Offset, double Sigma)?[across * down];
        Parallel.For(0, down, options, row =>
        {
            for (var column = 0; column < across; column++)
            {
                var (u, v) = (column * Side, row * Side);
                windows[row * across + column] = Step(pair, left, right, disparity, soFar, u, v) is var (step, sigma)
                    ? (u + Side / 2, v + Side / 2, soFar.At(u + Side / 2, v + Side / 2) + step, sigma)
                    : null;
            }
        });
        return Fit(size, [.. windows.OfType<(double U, double V, double Offset, double Sigma)>()]);
    }

    private static (double Step, double Sigma)? Step(
        RectifiedPair pair, CubicSpline left, CubicSpline right, float[] disparity, RowOffset soFar, int u0, int v0)
    {
        var (width, height) = (pair.Size.Width, pair.Size.Height);
        var offset = (float)soFar.At(u0 + Side / 2, v0 + Side / 2);
        Span<double> sums = stackalloc double[Moments.Count];
        var moments = new Moments(sums);
        for (var v = Math.Max(v0, 1); v < Math.Min(v0 + Side, height - 1); v++)
        {
            for (var u = Math.Max(u0, 1); u < Math.Min(u0 + Side, width - 1); u++)
            {
                var (place, row) = (u - disparity[v * width + u], v + offset);
                if (!(place >= 1 && place <= width - 2) || !(row >= 1 && row <= height - 2) || pair.Left.Usable is { } l && !l[u, v]
                    || pair.Right.Usable is { } r && !r[(int)Math.Round(place), v])
                {
                    continue;
                }

                var (level, seen) = (left.AtByVectors(u, v), right.AtByVectors(place, row));
                moments.Add(
                    left.AtByVectors(u + 0.5f, v) - left.AtByVectors(u - 0.5f, v),
                    left.AtByVectors(u, v + 0.5f) - left.AtByVectors(u, v - 0.5f),
                    right.AtByVectors(place + 0.5f, row) - right.AtByVectors(place - 0.5f, row),
                    right.AtByVectors(place, row + 0.5f) - right.AtByVectors(place, row - 0.5f),
                    level,
                    seen - level);
            }
        }

        return moments.N >= LeastShare * Side * Side && moments.Solve() is var (step, sigma) && sigma <= LargestSigmaPx && Math.Abs(step) <= 1 ? (step, sigma) : null;
    }

    private static RowOffset Fit(PictureSize size, (double U, double V, double Offset, double Sigma)[] windows)
    {
        if (windows.Length < LeastWindows)
        {
            return RowOffset.None(size);
        }

        var count = windows.Length >= WindowsPerTerm * RowOffset.Terms ? RowOffset.Terms : 1;
        var design = Matrix<double>.Build.Dense(windows.Length, count);
        var terms = new double[RowOffset.Terms];
        for (var i = 0; i < windows.Length; i++)
        {
            RowOffset.Fill(terms, size, windows[i].U, windows[i].V);
            for (var j = 0; j < count; j++)
            {
                design[i, j] = terms[j];
            }
        }

        var sigma = windows.Select(window => Math.Sqrt(window.Sigma * window.Sigma + FinestSigmaPx * FinestSigmaPx)).ToArray();
        var keep = Enumerable.Repeat(true, windows.Length).ToArray();
        var (coefficients, covariance, ratio) = (Vector<double>.Build.Dense(count), Matrix<double>.Build.Dense(count, count), 1.0);
        for (var round = 0; round < 4; round++)
        {
            var weights = Vector<double>.Build.Dense(windows.Length, i => keep[i] ? 1 / (sigma[i] * sigma[i]) : 0);
            var normal = Matrix<double>.Build.Dense(count, count);
            var sides = Vector<double>.Build.Dense(count);
            for (var i = 0; i < windows.Length; i++)
            {
                var row = design.Row(i);
                normal += weights[i] * row.OuterProduct(row);
                sides += weights[i] * windows[i].Offset * row;
            }

            covariance = normal.Inverse();
            coefficients = covariance * sides;
            var scores = windows.Select((window, i) => (window.Offset - design.Row(i) * coefficients) / sigma[i]).ToArray();
            ratio = 1.4826 * Median(scores.Select(Math.Abs));
            keep = [.. scores.Select(score => Math.Abs(score) <= 3.5 * Math.Max(1, ratio))];
        }

        var fitted = design * coefficients;
        var variance = Enumerable.Range(0, windows.Length).Average(i => design.Row(i) * covariance * design.Row(i)) * Math.Max(1, ratio * ratio);
        return new(size, [.. coefficients], fitted.Minimum(), fitted.Maximum(), Math.Sqrt(fitted.PointwiseMultiply(fitted).Average()), Math.Sqrt(variance), ratio, keep.Count(kept => kept));
    }

    private static double Median(IEnumerable<double> values)
    {
        var sorted = values.Order().ToArray();
        return (sorted[(sorted.Length - 1) / 2] + sorted[sorted.Length / 2]) / 2;
    }

    /// <summary>The sums of products of one window, and the step across the rows that they call for.</summary>
    private readonly ref struct Moments(Span<double> sums)
    {
        // 1; g, p, h, q, l, y: left slope along and across, right slope along and across (turned), level, difference; then their products.
        public const int Count = 28;
        private const int Values = 7;
        private readonly Span<double> sums = sums;

        public double N => sums[0];

        public void Add(double g, double p, double h, double q, double l, double y)
        {
            // The right picture looked up one row farther down loses its slope across: y ≈ along · h − step · q + gain · l + offset.
            Span<double> values = [1, g, -p, h, -q, l, y];
            var place = 0;
            for (var i = 0; i < Values; i++)
            {
                for (var j = i; j < Values; j++)
                {
                    sums[place++] += values[i] * values[j];
                }
            }
        }

        public (double Step, double Sigma)? Solve()
        {
            var n = N;
            var (g, p, h, q, l, y) = (1, 2, 3, 4, 5, 6);

            // With offset and gain taken out of everything by the level.
            var ll = Centred(l, l);
            if (!(ll > 0))
            {
                return null;
            }

            double Cleared(Span<double> from, int i, int j) => Product(from, i, j, n) - Product(from, i, l, n) * Product(from, j, l, n) / ll;
            var (gh, gq, gy) = (Cleared(sums, g, h), Cleared(sums, g, q), Cleared(sums, g, y));
            var (ph, pq, py) = (Cleared(sums, p, h), Cleared(sums, p, q), Cleared(sums, p, y));
            var determinant = gh * pq - gq * ph;
            if (!(gh > 0) || !(determinant > 1e-3 * gh * Math.Abs(pq)))
            {
                return null;
            }

            var step = (gh * py - ph * gy) / determinant;
            var along = (gy - gq * step) / gh;
            var residual = Cleared(sums, y, y) - 2 * (along * Cleared(sums, h, y) + step * Cleared(sums, q, y))
                + along * along * Cleared(sums, h, h) + 2 * along * step * Cleared(sums, h, q) + step * step * Cleared(sums, q, q);
            var variance = Math.Max(residual, 0) / (n - 4);
            return (step, Math.Sqrt(variance * gh / determinant));
        }

        private double Centred(int i, int j) => Product(sums, i, j, N);

        private static double Product(Span<double> sums, int i, int j, double n) => At(sums, i, j) - At(sums, 0, i) * At(sums, 0, j) / n;

        private static double At(Span<double> sums, int i, int j)
        {
            var (a, b) = (Math.Min(i, j), Math.Max(i, j));
            return sums[a * Values - a * (a - 1) / 2 + b - a];
        }
    }
}
