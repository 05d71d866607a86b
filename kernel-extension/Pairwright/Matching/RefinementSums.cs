namespace Pairwright.Matching;

/// <summary>Sums of products of slope, level and difference over the window of every pixel of a band of rows, for <see cref="LeastSquaresRefinement"/>.</summary>
/// <param name="width">The band's width, in pixels.</param>
/// <param name="rows">The band's rows.</param>
/// <param name="reach">Half the side of the box that, twice over, makes the window's weights.</param>
internal sealed class RefinementSums(int width, int rows, int reach)
{
    // One; slope, level, difference and right slope; then the products that the equations ask for.
    private const int Channels = 13;
    private readonly double[][] channels = [.. Enumerable.Range(0, Channels).Select(_ => new double[width * rows])];

    /// <summary>Enters a pixel.</summary>
    /// <param name="row">Its row in the band.</param>
    /// <param name="u">Its column.</param>
    /// <param name="g">The left picture's slope along the row, in levels a pixel.</param>
    /// <param name="h">The warped right picture's slope.</param>
    /// <param name="l">The left picture's level.</param>
    /// <param name="r">The warped right picture's level less the left one's.</param>
    public void Enter(int row, int u, double g, double h, double l, double r)
    {
        var i = row * width + u;
        (channels[0][i], channels[1][i], channels[2][i], channels[3][i], channels[4][i]) = (1, g, h, l, r);
        (channels[5][i], channels[6][i], channels[7][i], channels[8][i]) = (g * g, g * h, g * l, g * r);
        (channels[9][i], channels[10][i], channels[11][i], channels[12][i]) = (h * l, l * l, l * r, r * r);
    }

    /// <summary>A box of 2 · reach + 1 pixels twice along and twice down.</summary>
    public void Blur()
    {
        var line = new double[width];
        foreach (var channel in channels)
        {
            for (var row = 0; row < rows; row++)
            {
                Box(channel.AsSpan(row * width, width), line);
                Box(channel.AsSpan(row * width, width), line);
            }

            BoxDown(channel);
            BoxDown(channel);
        }
    }

    /// <summary>
    /// The step of the disparity that the window calls for, in pixels; the mean squared difference that gain and offset leave, in levels
    /// squared; and what the window knows: the squared slope, in levels squared per pixel squared, that the noise stands against. Nothing
    /// where the window holds too little.
    /// </summary>
    /// <param name="row">The row in the band.</param>
    /// <param name="u">The column.</param>
    /// <param name="leastWeight">The least sum of weights to say anything.</param>
    public (double Step, double Residual, double Knowledge)? Solve(int row, int u, double leastWeight)
    {
        var i = row * width + u;
        var n = channels[0][i];
        if (n < leastWeight)
        {
            return null;
        }

        var (g, h, l, r) = (channels[1][i] / n, channels[2][i] / n, channels[3][i] / n, channels[4][i] / n);
        var (gg, gh, gl, gr) = (channels[5][i] / n - g * g, channels[6][i] / n - g * h, channels[7][i] / n - g * l, channels[8][i] / n - g * r);
        var (hl, ll, lr, rr) = (channels[9][i] / n - h * l, channels[10][i] / n - l * l, channels[11][i] / n - l * r, channels[12][i] / n - r * r);

        // r ≈ step · h + gain · l + offset, asked of the instruments g, l and 1; the left slope beside the level is what remains of the noise's lever.
        var determinant = gh * ll - gl * hl;
        var lever = ll * (gg * ll - gl * gl);
        return determinant > 0 && lever > 1e-9 * gg * ll * ll
            ? ((gr * ll - lr * gl) / determinant, Math.Max(0, rr - lr * lr / ll), determinant * determinant / lever)
            : null;
    }

    private void Box(Span<double> values, double[] line)
    {
        values.CopyTo(line);
        var sum = 0.0;
        for (var i = 0; i < Math.Min(reach, line.Length); i++)
        {
            sum += line[i];
        }

        for (var i = 0; i < line.Length; i++)
        {
            sum += i + reach < line.Length ? line[i + reach] : 0;
            sum -= i - reach - 1 >= 0 ? line[i - reach - 1] : 0;
            values[i] = sum;
        }
    }

    // Column sums slide down row by row, so that memory is walked in order.
    private void BoxDown(double[] channel)
    {
        var copy = (double[])channel.Clone();
        var sum = new double[width];
        for (var row = -reach; row < rows; row++)
        {
            Add(copy, row + reach, 1, sum);
            Add(copy, row - reach - 1, -1, sum);
            if (row >= 0)
            {
                sum.CopyTo(channel.AsSpan(row * width));
            }
        }
    }

    private void Add(double[] from, int row, double sign, double[] sum)
    {
        if (row >= 0 && row < rows)
        {
            var line = from.AsSpan(row * width, width);
            for (var u = 0; u < line.Length; u++)
            {
                sum[u] += sign * line[u];
            }
        }
    }
}
