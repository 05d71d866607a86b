namespace Pairwright.Simulation;

/// <summary>Band-limited noise over the plane: gradient noise (Perlin 1985, with the fifth-degree blend of Perlin 2002) on an integer-hashed lattice.</summary>
internal static class LatticeNoise
{
    // Sixteen directions, so that no axis is favoured; length √2 makes the noise reach about ±1.
    private static readonly double[] DirectionX = [.. Enumerable.Range(0, 16).Select(i => Math.Sqrt(2) * Math.Cos(Math.PI * (2 * i + 1) / 16))];
    private static readonly double[] DirectionY = [.. Enumerable.Range(0, 16).Select(i => Math.Sqrt(2) * Math.Sin(Math.PI * (2 * i + 1) / 16))];

    /// <summary>Gradient noise with lattice spacing one: mean zero, within about ±1, standard deviation about 0.35.</summary>
    public static double Gradient(double x, double y, ulong seed)
    {
        var (floorX, floorY) = (Math.Floor(x), Math.Floor(y));
        var (i, j) = ((long)floorX, (long)floorY);
        var (fx, fy) = (x - floorX, y - floorY);
        var (blendX, blendY) = (Blend(fx), Blend(fy));
        var upper = Corner(i, j, fx, fy, seed);
        upper += blendX * (Corner(i + 1, j, fx - 1, fy, seed) - upper);
        var lower = Corner(i, j + 1, fx, fy - 1, seed);
        lower += blendX * (Corner(i + 1, j + 1, fx - 1, fy - 1, seed) - lower);
        return upper + blendY * (lower - upper);
    }

    /// <summary>Octaves of gradient noise, each half as large and half as strong as the one before.</summary>
    public static double Octaves(double x, double y, int count, ulong seed)
    {
        var (sum, strength) = (0.0, 1.0);
        for (var octave = 0; octave < count; octave++)
        {
            sum += strength * Gradient(x, y, seed + (ulong)octave);
            (x, y, strength) = (2 * x + 0.37, 2 * y + 0.71, strength / 2);
        }

        return sum;
    }

    /// <summary>Zero below <paramref name="from"/>, one above <paramref name="to"/>, smooth between.</summary>
    public static double Rise(double from, double to, double value)
    {
        var t = Math.Clamp((value - from) / (to - from), 0, 1);
        return t * t * (3 - 2 * t);
    }

    private static double Corner(long i, long j, double dx, double dy, ulong seed)
    {
        var direction = (int)(IntegerHash.At(i, j, seed) >> 60);
        return DirectionX[direction] * dx + DirectionY[direction] * dy;
    }

    private static double Blend(double t) => t * t * t * (t * (6 * t - 15) + 10);
}
