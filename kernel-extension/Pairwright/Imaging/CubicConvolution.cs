using System.Runtime.CompilerServices;
using System.Runtime.InteropServices;
using System.Runtime.Intrinsics;
using Pairwright.Geometry;

namespace Pairwright.Imaging;

/// <summary>Looks levels up between pixels by cubic convolution with a = −1/2 (Keys 1981), whose error falls with the cube of the pixel pitch.</summary>
/// <remarks>
/// Positions are used as given. General remapping routines round them to 1/32 px, which alone would be an error of 0.009 px (1 σ) in
/// each picture, 0.013 px in a disparity: not small beside what a good matcher attains. Beyond the edge the outermost pixels repeat.
/// </remarks>
internal static class CubicConvolution
{
    /// <summary>Fills a picture from positions in another.</summary>
    /// <param name="source">Levels, <paramref name="channels"/> by turns, row after row.</param>
    /// <param name="size">The source's size.</param>
    /// <param name="channels">1 or 3.</param>
    /// <param name="largest">The largest level that the result may hold.</param>
    /// <param name="columns">Where to look: columns of the source; NaN gives level 0.</param>
    /// <param name="rows">Where to look: rows of the source.</param>
    /// <param name="width">The result's width; strips of its rows run on several threads.</param>
    /// <param name="vectors">Whether to take four taps at a time; the result is the same to the bit.</param>
    public static ushort[] Resample(
        ReadOnlyMemory<ushort> source, PictureSize size, int channels, int largest, ReadOnlyMemory<float> columns, ReadOnlyMemory<float> rows, int width, bool vectors = true)
    {
        var target = new ushort[columns.Length * channels];
        Parallel.For(0, columns.Length / width, v =>
        {
            var from = source.Span;
            var us = columns.Span.Slice(v * width, width);
            var vs = rows.Span.Slice(v * width, width);
            var to = target.AsSpan(v * width * channels, width * channels);
            for (var i = 0; i < width; i++)
            {
                if (float.IsNaN(us[i]) || float.IsNaN(vs[i]))
                {
                    continue;
                }

                for (var channel = 0; channel < channels; channel++)
                {
                    var level = vectors
                        ? LevelByVectors(from, size, channels, channel, us[i], vs[i])
                        : Level(from, size, channels, channel, us[i], vs[i]);
                    to[i * channels + channel] = (ushort)(Math.Clamp(level, 0, largest) + 0.5f);
                }
            }
        });
        return target;
    }

    /// <summary>Which positions lie on usable pixels: each neighbour that a straight line between pixels would weigh has to be one.</summary>
    /// <param name="size">The source's size.</param>
    /// <param name="usable">Its usable pixels; nothing where all are.</param>
    /// <param name="columns">Columns of the source; NaN is nowhere.</param>
    /// <param name="rows">Rows of the source.</param>
    public static bool[] Seen(PictureSize size, Mask? usable, ReadOnlySpan<float> columns, ReadOnlySpan<float> rows)
    {
        var seen = new bool[columns.Length];
        for (var i = 0; i < seen.Length; i++)
        {
            var (u, v) = (columns[i], rows[i]);
            if (!size.Contains(u, v))
            {
                continue;
            }

            // In the outer half pixel the edge repeats.
            var (left, top) = ((int)Math.Max(u, 0), (int)Math.Max(v, 0));
            var (right, bottom) = (u > left ? Math.Min(left + 1, size.Width - 1) : left, v > top ? Math.Min(top + 1, size.Height - 1) : top);
            seen[i] = usable is null || (usable[left, top] && usable[right, top] && usable[left, bottom] && usable[right, bottom]);
        }

        return seen;
    }

    /// <summary>One level, tap by tap: the plain twin of <see cref="LevelByVectors"/>, with the same order of additions.</summary>
    internal static float Level(ReadOnlySpan<ushort> source, PictureSize size, int channels, int channel, float u, float v)
    {
        var (column, row) = (MathF.Floor(u), MathF.Floor(v));
        Span<float> across = stackalloc float[4];
        Span<float> down = stackalloc float[4];
        Weights(u - column, across);
        Weights(v - row, down);
        Span<float> sums = stackalloc float[4];
        for (var y = 0; y < 4; y++)
        {
            var start = (long)Math.Clamp((int)row - 1 + y, 0, size.Height - 1) * size.Width;
            for (var x = 0; x < 4; x++)
            {
                var at = (start + Math.Clamp((int)column - 1 + x, 0, size.Width - 1)) * channels + channel;
                sums[x] += down[y] * source[(int)at];
            }
        }

        return (across[0] * sums[0] + across[1] * sums[1]) + (across[2] * sums[2] + across[3] * sums[3]);
    }

    // Four neighbouring levels of a row are the four lanes. Each row, times its weight, is added to the lanes' sums; at the end the lanes are
    // weighed across and added in pairs. No fused multiply-add: it would round otherwise than the plain twin.
    private static float LevelByVectors(ReadOnlySpan<ushort> source, PictureSize size, int channels, int channel, float u, float v)
    {
        var (column, row) = (MathF.Floor(u), MathF.Floor(v));
        var (left, top) = ((int)column - 1, (int)row - 1);
        if (left < 0 || top < 0 || left + 3 >= size.Width || top + 3 >= size.Height)
        {
            return Level(source, size, channels, channel, u, v);
        }

        var down = Weights(v - row);
        ref var tap = ref Unsafe.Add(ref MemoryMarshal.GetReference(source), (nint)(((long)top * size.Width + left) * channels + channel));
        var stride = (nint)size.Width * channels;
        var sums = down[0] * FourLevels(ref tap, channels);
        tap = ref Unsafe.Add(ref tap, stride);
        sums += down[1] * FourLevels(ref tap, channels);
        tap = ref Unsafe.Add(ref tap, stride);
        sums += down[2] * FourLevels(ref tap, channels);
        tap = ref Unsafe.Add(ref tap, stride);
        sums += down[3] * FourLevels(ref tap, channels);
        var weighed = Weights(u - column) * sums;
        return (weighed[0] + weighed[1]) + (weighed[2] + weighed[3]);
    }

    // A single channel's four levels are one 64-bit load, widened; of three channels every third level is taken.
    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    private static Vector128<float> FourLevels(ref ushort first, int channels) =>
        channels == 1
            ? Vector128.ConvertToSingle(Vector128.WidenLower(
                Vector128.CreateScalarUnsafe(Unsafe.ReadUnaligned<ulong>(ref Unsafe.As<ushort, byte>(ref first))).AsUInt16()).AsInt32())
            : Vector128.Create((float)first, Unsafe.Add(ref first, 3), Unsafe.Add(ref first, 6), Unsafe.Add(ref first, 9));

    // Keys's kernel at distances 1 + t, t, 1 − t and 2 − t.
    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    private static Vector128<float> Weights(float t) =>
        Vector128.Create(
            t * (-0.5f + t * (1f - 0.5f * t)),
            1f + t * t * (-2.5f + 1.5f * t),
            t * (0.5f + t * (2f - 1.5f * t)),
            t * t * (-0.5f + 0.5f * t));

    private static void Weights(float t, Span<float> weights) => Weights(t).CopyTo(weights);
}
