using Pairwright.Geometry;
using Pairwright.Imaging;

namespace Pairwright.Tests.Matching;

/// <summary>Rectified pairs whose disparity is known because they are made from it.</summary>
internal static class TestPairs
{
    public static Picture Picture(int width, int height, Func<int, int, int> level, int bits = 8, Mask? usable = null)
    {
        var grey = new ushort[width * height];
        for (var v = 0; v < height; v++)
        {
            for (var u = 0; u < width; u++)
            {
                grey[v * width + u] = (ushort)level(u, v);
            }
        }

        return new(new(width, height), grey, bits, usable: usable);
    }

    /// <summary>A pair of one row from the levels of its pixels.</summary>
    public static RectifiedPair Pair(int width, int height, Func<int, int, int> left, Func<int, int, int> right, int bits = 8) =>
        new(Picture(width, height, left, bits), Picture(width, height, right, bits));

    /// <summary>
    /// Random dots (Julesz 1960) with a whole disparity per left pixel: every surface point carries its own level; where two points fall on one
    /// right pixel the nearer one hides the other, and where none falls there are fresh dots.
    /// </summary>
    public static RectifiedPair RandomDots(int width, int height, Func<int, int, int> disparity, int seed = 1, int bits = 8)
    {
        var random = new Random(seed);
        var left = new int[width, height];
        var right = new int[width, height];
        for (var v = 0; v < height; v++)
        {
            var nearest = Enumerable.Repeat(int.MinValue, width).ToArray();
            for (var u = 0; u < width; u++)
            {
                (left[u, v], right[u, v]) = (random.Next(1 << bits), random.Next(1 << bits));
            }

            for (var u = 0; u < width; u++)
            {
                var d = disparity(u, v);
                if (u - d >= 0 && u - d < width && d > nearest[u - d])
                {
                    (right[u - d, v], nearest[u - d]) = (left[u, v], d);
                }
            }
        }

        return Pair(width, height, (u, v) => left[u, v], (u, v) => right[u, v], bits);
    }

    /// <summary>Whether no nearer point of its row hides a left pixel from the right camera, and it falls on the right picture.</summary>
    public static bool SeenByBoth(int width, Func<int, int, int> disparity, int u, int v) =>
        u - disparity(u, v) is var right && right >= 0 && right < width
        && Enumerable.Range(0, width).All(other => other - disparity(other, v) != right || disparity(other, v) <= disparity(u, v));

    /// <summary>
    /// A band-limited pattern seen through a smooth disparity: the right picture is the pattern itself, the left one is the pattern at u − d(u, v).
    /// </summary>
    public static RectifiedPair Smooth(int width, int height, Func<double, int, double> disparity, int seed = 1)
    {
        var random = new Random(seed);
        var waves = Enumerable.Range(0, 60)
            .Select(_ => (U: 0.1 + 1.0 * random.NextDouble(), V: 1.6 * (random.NextDouble() - 0.5), Phase: 2 * Math.PI * random.NextDouble()))
            .ToArray();
        int Level(double u, int v) => (int)Math.Round(Math.Clamp(128 + 14 * waves.Sum(wave => Math.Sin(wave.U * u + wave.V * v + wave.Phase)), 0, 255));
        return Pair(width, height, (u, v) => Level(u - disparity(u, v), v), (u, v) => Level(u, v));
    }

    public static Mask All(PictureSize size) => Mask.From(size, (_, _) => true);
}
