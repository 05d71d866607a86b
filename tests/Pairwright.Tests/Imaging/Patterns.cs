using Pairwright.Geometry;
using Pairwright.Imaging;

namespace Pairwright.Tests.Imaging;

/// <summary>Pictures and files that tests of several kinds start from.</summary>
internal static class Patterns
{
    /// <summary>Random levels below a bound.</summary>
    public static ushort[] Levels(int count, int below, int seed)
    {
        var random = new Random(seed);
        return [.. Enumerable.Range(0, count).Select(_ => (ushort)random.Next(below))];
    }

    /// <summary>A picture of random levels.</summary>
    public static Picture Picture(int width, int height, int bits = 8, int seed = 1, bool colour = false)
    {
        var size = new PictureSize(width, height);
        return new(
            size,
            Levels(width * height, 1 << bits, seed),
            bits,
            colour: colour ? Levels(3 * width * height, 1 << bits, seed + 1) : null);
    }

    /// <summary>A single-channel TIFF of one strip, typed byte by byte after TIFF revision 6.0.</summary>
    public static byte[] Tiff(int width, int height, int bitsPerSample, byte[] samples, int photometric = 1, int compression = 1)
    {
        var file = new List<byte>();
        void Short(int value) => file.AddRange([(byte)value, (byte)(value >> 8)]);
        void Long(int value) => file.AddRange(BitConverter.GetBytes(value));
        (int Tag, int Type, int Value)[] entries =
        [
            (256, 4, width), (257, 4, height), (258, 3, bitsPerSample), (259, 3, compression), (262, 3, photometric),
            (273, 4, 8 + 2 + 9 * 12 + 4), (277, 3, 1), (278, 4, height), (279, 4, samples.Length),
        ];
        file.AddRange("II"u8.ToArray());
        Short(42);
        Long(8);
        Short(entries.Length);
        foreach (var (tag, type, value) in entries)
        {
            Short(tag);
            Short(type);
            Long(1);
            Long(value);
        }

        Long(0);
        file.AddRange(samples);
        return [.. file];
    }
}
