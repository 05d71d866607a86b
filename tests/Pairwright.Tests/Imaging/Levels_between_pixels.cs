using OpenCvSharp;
using Pairwright.Geometry;
using Pairwright.Imaging;
using Xunit;

namespace Pairwright.Tests.Imaging;

public class Levels_between_pixels
{
    private static readonly PictureSize Size = new(96, 80);

    // Unser (1999): cubic splines reproduce polynomials of third degree; near the edges, where the picture is continued as its mirror
    // image, the deviation falls by √3 − 2 a pixel. The levels are whole at pixels, so that nothing is lost to rounding.
    [Fact]
    public void A_cubic_is_followed_exactly()
    {
        var size = new PictureSize(41, 37);
        static double Cubic(double u, double v) => 30000 + Math.Pow(u - 20, 3) + 2 * (u - 20) * (v - 18) + 3 * Math.Pow(v - 18, 2);
        var spline = CubicSpline.Through(Array.ConvertAll(Enumerable.Range(0, (int)size.Area).ToArray(), i => checked((ushort)Cubic(i % 41, i / 41))), size);

        for (var v = 12.0; v <= 24; v += 0.5)
        {
            for (var u = 12.0; u <= 28; u += 0.25)
            {
                Assert.Equal(Cubic(u, v), spline.At((float)u, (float)v), 0.02);
            }
        }
    }

    // The reason for splines: what an interpolation shifts, every disparity has wrong. The shift of a wave is read from its Fourier component.
    [Theory]
    [InlineData(4, 0.008)]
    [InlineData(6, 0.002)]
    [InlineData(12, 0.0005)]
    public void A_wave_is_not_shifted(int period, double largestShift)
    {
        var size = new PictureSize(10 * period + 60, 1);
        var levels = Enumerable.Range(0, size.Width).Select(u => (ushort)Math.Round(32768 + 30000 * Math.Cos(u * Math.Tau / period))).ToArray();
        var spline = CubicSpline.Through(levels, size);
        for (var shift = 0.0; shift < 1; shift += 0.125)
        {
            double inPhase = 0, quadrature = 0;
            for (var i = 0; i < 10 * period; i++)
            {
                var level = spline.At((float)(30 + i + shift), 0) - 32768;
                inPhase += level * Math.Cos((30 + i) * Math.Tau / period);
                quadrature += level * Math.Sin((30 + i) * Math.Tau / period);
            }

            Assert.InRange(-Math.Atan2(quadrature, inPhase) / Math.Tau * period - shift, -largestShift, largestShift);
        }
    }

    [Theory]
    [InlineData(1, 1)]
    [InlineData(2, 1)]
    [InlineData(1, 3)]
    [InlineData(2, 2)]
    [InlineData(5, 4)]
    public void The_smallest_pictures_pass_through_their_pixels_too(int width, int height)
    {
        var levels = Patterns.Levels(width * height, 65536, seed: width);
        var spline = CubicSpline.Through(levels, new(width, height));
        for (var i = 0; i < levels.Length; i++)
        {
            Assert.Equal(levels[i], spline.At(i % width, i / width), 0.1);
            Assert.Equal(spline.At(i % width + 0.4f, i / width - 0.3f), spline.AtByVectors(i % width + 0.4f, i / width - 0.3f));
        }
    }

    // Twelve bits and a period of 12 px: as fine a texture as a lens passes. OpenCV's remapping, the reference, rounds positions to 1/32 px.
    [Fact]
    public void A_smooth_picture_is_followed_within_a_twentyfifth_of_a_grey_level_and_far_better_than_by_OpenCVs_remapping()
    {
        static double Wave(double u, double v) => 2048 + 900 * Math.Sin(u * Math.Tau / 12 + 0.3) * Math.Cos(v * Math.Tau / 14);
        var levels = Sampled(Wave);
        var random = new Random(11);
        var (columns, rows) = (new float[4000], new float[4000]);
        for (var i = 0; i < columns.Length; i++)
        {
            (columns[i], rows[i]) = ((float)(3 + random.NextDouble() * (Size.Width - 7)), (float)(3 + random.NextDouble() * (Size.Height - 7)));
        }

        var own = Resampling.Levels(levels, Size, 1, 4095, columns, rows, 100);
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
        Assert.InRange(Rms(own) / perGreyLevelOfEightBits, 0, 0.04);
        Assert.True(Rms(own) < 0.05 * Rms(reference.AsSpan<ushort>()), $"own {Rms(own):0.00}, OpenCV {Rms(reference.AsSpan<ushort>()):0.00} of 4095");
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

        var own = Resampling.Levels(levels, Size, 1, 65535, columns, rows, Size.Width);
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
            Resampling.Levels(levels, Size, channels, 4095, columns, rows, 50, vectors: false),
            Resampling.Levels(levels, Size, channels, 4095, columns, rows, 50, vectors: true));
    }

    [Fact]
    public void Overshoot_beside_a_sharp_edge_stays_within_the_levels()
    {
        var levels = Sampled((u, _) => u < 40 ? 0 : 1023);
        var columns = Enumerable.Range(0, 80).Select(i => 38 + i * 0.05f).ToArray();
        var sampled = Resampling.Levels(levels, Size, 1, 1023, columns, new float[80], 80);

        Assert.All(sampled, level => Assert.InRange(level, 0, 1023));
    }

    [Fact]
    public void A_pixel_is_seen_only_where_every_neighbour_that_counts_is_usable()
    {
        var mask = Mask.From(new(4, 4), (u, v) => (u, v) != (2, 1));
        float[] columns = [0, 2, 1.5f, 1, 2.5f, -0.4f, 3.4f, -0.6f, float.NaN, 2];
        float[] rows = [0, 1, 1, 1, 0.5f, 0, 3, 0, 0, 1.001f];

        Assert.Equal([true, false, false, true, false, true, true, false, false, false], Resampling.Seen(new(4, 4), mask, columns, rows));
    }

    private static ushort[] Sampled(Func<double, double, double> level) =>
        [.. Enumerable.Range(0, (int)Size.Area).Select(i => checked((ushort)Math.Round(level(i % Size.Width, i / Size.Width))))];
}
