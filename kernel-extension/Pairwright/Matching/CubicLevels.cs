using Pairwright.Imaging;

namespace Pairwright.Matching;

/// <summary>Grey levels between pixels by cubic convolution (Keys 1981, a = −1/2), which reproduces quadratics; taps beyond the border repeat it.</summary>
internal readonly struct CubicLevels(Picture picture)
{
    /// <summary>Whether a position lies between pixels that may be used.</summary>
    public bool Holds(double u, double v)
    {
        var (width, height) = (picture.Size.Width, picture.Size.Height);
        if (!(u >= 0 && v >= 0 && u <= width - 1 && v <= height - 1))
        {
            return false;
        }

        var usable = picture.Usable;
        var (left, top) = ((int)u, (int)v);
        var (right, bottom) = (Math.Min(left + 1, width - 1), Math.Min(top + 1, height - 1));
        return usable is null || (usable[left, top] && usable[right, top] && usable[left, bottom] && usable[right, bottom]);
    }

    /// <summary>The level at a position that <see cref="Holds"/>.</summary>
    public float At(double u, double v)
    {
        var (width, height) = (picture.Size.Width, picture.Size.Height);
        var (left, top) = ((int)u, (int)v);
        Span<double> across = stackalloc double[4];
        Span<double> down = stackalloc double[4];
        Weights(u - left, across);
        Weights(v - top, down);
        var grey = picture.Grey;
        var level = 0.0;
        for (var j = 0; j < 4; j++)
        {
            var row = Math.Clamp(top + j - 1, 0, height - 1) * width;
            var sum = 0.0;
            for (var i = 0; i < 4; i++)
            {
                sum += across[i] * grey[row + Math.Clamp(left + i - 1, 0, width - 1)];
            }

            level += down[j] * sum;
        }

        return (float)level;
    }

    private static void Weights(double t, Span<double> weights)
    {
        var (t2, t3) = (t * t, t * t * t);
        weights[0] = (-t3 + 2 * t2 - t) / 2;
        weights[1] = (3 * t3 - 5 * t2 + 2) / 2;
        weights[2] = (-3 * t3 + 4 * t2 + t) / 2;
        weights[3] = (t3 - t2) / 2;
    }
}
