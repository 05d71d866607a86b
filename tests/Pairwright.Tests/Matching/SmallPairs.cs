using Pairwright.Geometry;
using Pairwright.Imaging;

namespace Pairwright.Tests.Matching;

/// <summary>Small rectified pairs whose match is plain to see.</summary>
internal static class SmallPairs
{
    /// <summary>A pair made of the levels of two functions of column and row.</summary>
    public static RectifiedPair Of(int width, int height, Func<int, int, int> left, Func<int, int, int> right, int bits = 8) =>
        new(Picture(width, height, left, bits), Picture(width, height, right, bits));

    /// <summary>Random dots that stand at one disparity everywhere; what comes into the picture from outside is random too.</summary>
    public static RectifiedPair Dots(int width, int height, int disparity, int bits = 8, int seed = 5)
    {
        var reach = Math.Abs(disparity);
        var random = new Random(seed);
        var levels = Enumerable.Range(0, (width + 2 * reach) * height).Select(_ => random.Next(1 << bits)).ToArray();
        return Of(
            width,
            height,
            (u, v) => levels[v * (width + 2 * reach) + reach + u],
            (u, v) => levels[v * (width + 2 * reach) + reach + u + disparity],
            bits);
    }

    public static Picture Picture(int width, int height, Func<int, int, int> level, int bits = 8)
    {
        var grey = new ushort[width * height];
        for (var i = 0; i < grey.Length; i++)
        {
            grey[i] = (ushort)level(i % width, i / width);
        }

        return new(new PictureSize(width, height), grey, bits);
    }
}
