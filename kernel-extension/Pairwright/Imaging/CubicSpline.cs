using System.Runtime.CompilerServices;
using System.Runtime.InteropServices;
using System.Runtime.Intrinsics;
using Pairwright.Geometry;

namespace Pairwright.Imaging;

/// <summary>A channel of a picture as a cubic B-spline surface that passes through every pixel (Unser, Aldroubi, Eden 1993; Unser 1999).</summary>
/// <remarks>
/// Chosen because an interpolation that shifts texture adds the shift to every disparity. A wave of 6 px period is shifted by at most 0.001 px
/// here, by 0.019 px with cubic convolution (Keys 1981), which takes as many taps; and general remapping routines round positions to 1/32 px,
/// 0.009 px (1 σ) in each picture. Beyond the outermost pixels' centres the picture goes on as its mirror image.
/// </remarks>
internal sealed class CubicSpline
{
    // Coefficients reach two pixels over each edge, so that no position of a picture needs a case of its own.
    private const int Margin = 2;

    // The pole of the filter that turns levels into coefficients; its powers fall below double precision after thirty terms.
    private const int PoleTerms = 30;
    private const int Lanes = 32;
    private static readonly double Pole = Math.Sqrt(3) - 2;

    private readonly PictureSize size;
    private readonly int stride;
    private readonly float[] coefficients;

    private CubicSpline(PictureSize size, float[] coefficients) => (this.size, stride, this.coefficients) = (size, size.Width + 2 * Margin, coefficients);

    /// <summary>The spline through one channel's levels.</summary>
    /// <param name="levels">Levels, <paramref name="channels"/> by turns, row after row.</param>
    /// <param name="size">The picture's size.</param>
    /// <param name="channels">The number of channels.</param>
    /// <param name="channel">The channel wanted, from 0.</param>
    public static CubicSpline Through(ReadOnlyMemory<ushort> levels, PictureSize size, int channels = 1, int channel = 0)
    {
        var stride = size.Width + 2 * Margin;
        var field = new float[(long)stride * (size.Height + 2 * Margin)];
        Parallel.For(0, size.Height, v =>
        {
            var row = levels.Span.Slice(v * size.Width * channels, size.Width * channels);
            var line = new double[size.Width];
            for (var u = 0; u < line.Length; u++)
            {
                line[u] = row[u * channels + channel];
            }

            Filter(line, lanes: 1);
            for (var u = -Margin; u < size.Width + Margin; u++)
            {
                field[(v + Margin) * stride + u + Margin] = (float)line[Mirrored(u, size.Width)];
            }
        });
        Parallel.For(0, (stride + Lanes - 1) / Lanes, strip =>
        {
            var (first, lanes) = (strip * Lanes, Math.Min(Lanes, stride - strip * Lanes));
            var lines = new double[size.Height * lanes];
            for (var i = 0; i < lines.Length; i++)
            {
                lines[i] = field[(i / lanes + Margin) * stride + first + i % lanes];
            }

            Filter(lines, lanes);
            for (var v = -Margin; v < size.Height + Margin; v++)
            {
                var from = lines.AsSpan(Mirrored(v, size.Height) * lanes, lanes);
                var to = field.AsSpan((v + Margin) * stride + first, lanes);
                for (var lane = 0; lane < lanes; lane++)
                {
                    to[lane] = (float)from[lane];
                }
            }
        });
        return new(size, field);
    }

    /// <summary>Whether the surface has a height at a position: the picture and half a pixel around it.</summary>
    public bool Covers(float u, float v) => size.Contains(u, v);

    /// <summary>The height at a position that the surface covers, tap by tap: the plain twin of <see cref="AtByVectors"/>, with the same order of additions.</summary>
    public float At(float u, float v)
    {
        var (column, row) = (MathF.Floor(u), MathF.Floor(v));
        Span<float> across = stackalloc float[4];
        Span<float> down = stackalloc float[4];
        Weights(u - column).CopyTo(across);
        Weights(v - row).CopyTo(down);
        Span<float> sums = stackalloc float[4];
        for (var y = 0; y < 4; y++)
        {
            for (var x = 0; x < 4; x++)
            {
                sums[x] += down[y] * coefficients[((int)row - 1 + y + Margin) * stride + (int)column - 1 + x + Margin];
            }
        }

        return (across[0] * sums[0] + across[1] * sums[1]) + (across[2] * sums[2] + across[3] * sums[3]);
    }

    /// <summary>The height at a position that the surface covers, four taps at a time.</summary>
    /// <remarks>
    /// Implementation note: four neighbouring coefficients of a row are the four lanes. Each row, times its weight, is added to the lanes' sums; at
    /// the end the lanes are weighed across and added in pairs. No fused multiply-add: it would round otherwise than the plain twin.
    /// </remarks>
    public float AtByVectors(float u, float v)
    {
        var (column, row) = (MathF.Floor(u), MathF.Floor(v));
        var start = ((int)row - 1 + Margin) * stride + (int)column - 1 + Margin;
        ArgumentOutOfRangeException.ThrowIfGreaterThan((uint)start, (uint)(coefficients.Length - 3 * stride - 4), nameof(u));
        ref var taps = ref MemoryMarshal.GetArrayDataReference(coefficients);
        var down = Weights(v - row);
        var sums = down[0] * Vector128.LoadUnsafe(ref taps, (nuint)start);
        sums += down[1] * Vector128.LoadUnsafe(ref taps, (nuint)(start + stride));
        sums += down[2] * Vector128.LoadUnsafe(ref taps, (nuint)(start + 2 * stride));
        sums += down[3] * Vector128.LoadUnsafe(ref taps, (nuint)(start + 3 * stride));
        var weighed = Weights(u - column) * sums;
        return (weighed[0] + weighed[1]) + (weighed[2] + weighed[3]);
    }

    // The cubic B-spline at distances 1 + t, t, 1 − t and 2 − t.
    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    private static Vector128<float> Weights(float t)
    {
        var s = 1 - t;
        const float sixth = 1 / 6f;
        return Vector128.Create(
            sixth * (s * s * s),
            sixth * (4 + t * t * (3 * t - 6)),
            sixth * (4 + s * s * (3 * s - 6)),
            sixth * (t * t * t));
    }

    // Levels of parallel lines to coefficients, in place: one recursion up and one down, started as for lines that go on as their mirror images.
    // The lines lie beside each other, so that columns of a picture are filtered along its rows.
    private static void Filter(double[] lines, int lanes)
    {
        var length = lines.Length / lanes;
        if (length == 1)
        {
            return;
        }

        var start = new double[lanes];
        var power = 1.0;
        for (var k = 0; k < PoleTerms; k++, power *= Pole)
        {
            Add(lines.AsSpan(Mirrored(k, length) * lanes, lanes), power, start);
        }

        start.CopyTo(lines, 0);
        for (var k = 1; k < length; k++)
        {
            Add(lines.AsSpan((k - 1) * lanes, lanes), Pole, lines.AsSpan(k * lanes, lanes));
        }

        const int gain = 6;
        var last = lines.AsSpan((length - 1) * lanes, lanes);
        var next = start;
        for (var lane = 0; lane < lanes; lane++)
        {
            next[lane] = Pole / (Pole * Pole - 1) * (last[lane] + Pole * lines[(length - 2) * lanes + lane]);
            last[lane] = gain * next[lane];
        }

        for (var k = length - 2; k >= 0; k--)
        {
            var here = lines.AsSpan(k * lanes, lanes);
            for (var lane = 0; lane < here.Length; lane++)
            {
                next[lane] = Pole * (next[lane] - here[lane]);
                here[lane] = gain * next[lane];
            }
        }
    }

    private static void Add(ReadOnlySpan<double> from, double factor, Span<double> to)
    {
        for (var i = 0; i < to.Length; i++)
        {
            to[i] += factor * from[i];
        }
    }

    // The place in a line of a position beyond its ends, mirrored at the outermost pixels' centres as often as it takes.
    private static int Mirrored(int position, int length)
    {
        if (length == 1)
        {
            return 0;
        }

        var period = 2 * (length - 1);
        var folded = ((position % period) + period) % period;
        return folded < length ? folded : period - folded;
    }
}
