using OpenCvSharp;
using Pairwright.Geometry;
using Pairwright.Imaging;
using Xunit;

namespace Pairwright.Tests.Imaging;

public class Levels_between_pixels
{
    private static readonly PictureSize Size = new(96, 80);

    // Keys (1981): the kernel with a = −1/2 reproduces polynomials of second degree. The levels are chosen whole at pixels and in between.
    [Fact]
    public void A_parabola_is_followed_exactly()
    {
        double Parabola(double u, double v) => 2000 + u * u - 25 * u + 2 * u * v + v * v - 10 * v;
        var levels = Sampled(Parabola);
        for (var v = 2.0; v < Size.Height - 3; v += 0.5)
        {
            for (var u = 2.0; u < Size.Width - 3; u += 0.25)
            {
                Assert.Equal(Parabola(u, v), CubicConvolution.Level(levels, Size, 1, 0, (float)u, (float)v), 0.02);
            }
        }
    }

    // Twelve bits and a period of 12 px: as fine a texture as a lens passes. OpenCV's remapping, the reference, rounds positions to 1/32 px.
    [Fact]
    public void A_smooth_picture_is_followed_within_a_third_of_a_grey_level_and_better_than_by_OpenCVs_remapping()
    {
        static double Wave(double u, double v) => 2048 + 900 * Math.Sin(u * Math.Tau / 12 + 0.3) * Math.Cos(v * Math.Tau / 14);
        var levels = Sampled(Wave);
        var random = new Random(11);
        var (columns, rows) = (new float[4000], new float[4000]);
        for (var i = 0; i < columns.Length; i++)
        {
            (columns[i], rows[i]) = ((float)(3 + random.NextDouble() * (Size.Width - 7)), (float)(3 + random.NextDouble() * (Size.Height - 7)));
        }

        var own = CubicConvolution.Resample(levels, Size, 1, 4095, columns, rows, 100);
        using var source = Mat.FromPixelData(Size.Height, Size.Width, MatType.CV_16UC1, levels);
        using var across = Mat.FromPixelData(40, 100, MatType.CV_32FC1, columns);
        using var down = Mat.FromPixelData(40, 100, MatType.CV_32FC1, rows);
        using var reference = new Mat();
        Cv2.Remap(source, reference, across, down, InterpolationFlags.Cubic, BorderTypes.Replicate);

        double Rms(ReadOnlySpan<ushort> sampled)
        {
            double squares = 0;
            for (var i = 0; i < sampled.Length; i++)
            {
                squares += Math.Pow(sampled[i] - Wave(columns[i], rows[i]), 2);
            }

            return Math.Sqrt(squares / sampled.Length);
        }

        const int perGreyLevelOfEightBits = 16;
        Assert.InRange(Rms(own) / perGreyLevelOfEightBits, 0, 0.33);
        Assert.True(Rms(own) < 0.5 * Rms(reference.AsSpan<ushort>()), $"own {Rms(own):0.00}, OpenCV {Rms(reference.AsSpan<ushort>()):0.00} of 4095");
    }

    // Source: OpenCV's cubic remapping with whole and half positions, which its 1/32 px grid holds; its kernel has a = −0.75, so that only
    // pixel centres are compared exactly.
    [Fact]
    public void At_pixel_centres_the_levels_are_those_of_the_source_and_of_OpenCV()
    {
        var levels = Patterns.Levels((int)Size.Area, 65536, seed: 2);
        var columns = new float[Size.Area];
        var rows = new float[Size.Area];
        for (var i = 0; i < columns.Length; i++)
        {
            (columns[i], rows[i]) = (Size.Width - 1 - i % Size.Width, Size.Height - 1 - i / Size.Width);
        }

        var own = CubicConvolution.Resample(levels, Size, 1, 65535, columns, rows, Size.Width);
        using var source = Mat.FromPixelData(Size.Height, Size.Width, MatType.CV_16UC1, levels);
        using var across = Mat.FromPixelData(Size.Height, Size.Width, MatType.CV_32FC1, columns);
        using var down = Mat.FromPixelData(Size.Height, Size.Width, MatType.CV_32FC1, rows);
        using var reference = new Mat();
        Cv2.Remap(source, reference, across, down, InterpolationFlags.Cubic, BorderTypes.Replicate);

        Assert.Equal(levels.Reverse().ToArray(), own);
        Assert.Equal(reference.AsSpan<ushort>().ToArray(), own);
    }

    [Theory]
    [InlineData(1)]
    [InlineData(3)]
    public void Four_taps_at_a_time_equal_one_at_a_time_to_the_bit(int channels)
    {
        var levels = Patterns.Levels((int)Size.Area * channels, 4096, seed: 3);
        var random = new Random(4);
        var columns = new float[5000];
        var rows = new float[5000];
        for (var i = 0; i < columns.Length; i++)
        {
            (columns[i], rows[i]) = ((float)(random.NextDouble() * 110 - 7), (float)(random.NextDouble() * 94 - 7));
        }

        columns[17] = float.NaN;
        Assert.Equal(
            CubicConvolution.Resample(levels, Size, channels, 4095, columns, rows, 50, vectors: false),
            CubicConvolution.Resample(levels, Size, channels, 4095, columns, rows, 50, vectors: true));
    }

    [Fact]
    public void Overshoot_beside_a_sharp_edge_stays_within_the_levels()
    {
        var levels = Sampled((u, _) => u < 40 ? 0 : 1023);
        var columns = Enumerable.Range(0, 80).Select(i => 38 + i * 0.05f).ToArray();
        var sampled = CubicConvolution.Resample(levels, Size, 1, 1023, columns, new float[80], 80);

        Assert.All(sampled, level => Assert.InRange(level, 0, 1023));
    }

    [Fact]
    public void A_pixel_is_seen_only_where_every_neighbour_that_counts_is_usable()
    {
        var mask = Mask.From(new(4, 4), (u, v) => (u, v) != (2, 1));
        float[] columns = [0, 2, 1.5f, 1, 2.5f, -0.4f, 3.4f, -0.6f, float.NaN, 2];
        float[] rows = [0, 1, 1, 1, 0.5f, 0, 3, 0, 0, 1.001f];

        Assert.Equal([true, false, false, true, false, true, true, false, false, false], CubicConvolution.Seen(new(4, 4), mask, columns, rows));
    }

    private static ushort[] Sampled(Func<double, double, double> level) =>
        [.. Enumerable.Range(0, (int)Size.Area).Select(i => checked((ushort)Math.Round(level(i % Size.Width, i / Size.Width))))];
}
