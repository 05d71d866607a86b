using Pairwright.Geometry;
using Pairwright.Imaging;
using Xunit;

namespace Pairwright.Tests.Imaging;

public class Pairs_say_what_may_be_wrong_with_them
{
    private static readonly PictureSize Size = new(64, 48);

    [Fact]
    public void Two_like_pictures_raise_no_warning()
    {
        Assert.Empty(new StereoPair(Wave(0.5, 1), Wave(0.5, 1)).Warnings);
    }

    [SkippableFact]
    public void Real_board_captures_are_like_each_other_but_for_a_little_glare()
    {
        Assert.All(
            StereoPair.ReadFolder(OpenData.Boards).SelectMany(pair => pair.Warnings),
            warning => Assert.Contains("saturated", warning));
    }

    [Fact]
    public void Different_exposures_are_told_with_their_ratio_whatever_the_bits()
    {
        var warning = Assert.Single(new StereoPair(Wave(0.6, 1), Wave(0.3, 0.5)).Warnings);

        Assert.Contains("60.0%", warning);
        Assert.Contains("30.0%", warning);
        Assert.Contains("2.00", warning);
    }

    [Fact]
    public void Saturated_pixels_are_told_with_their_share()
    {
        var warning = Assert.Single(new StereoPair(Wave(0.5, 1), Wave(0.5, 1, saturated: 0.05)).Warnings);

        Assert.Contains("right", warning);
        Assert.Contains("5.2%", warning); // 10 of 192 blocks
    }

    [Fact]
    public void A_blurred_picture_is_told_from_a_sharp_one_whatever_its_gain()
    {
        var sharp = Wave(0.5, 1, period: 6);
        var soft = Wave(0.5, 0.6, period: 12);

        var warning = Assert.Single(new StereoPair(sharp, soft).Warnings);

        Assert.Contains("right picture is the softer", warning);
    }

    // A sine of period p has a gradient of 2π/p over its own amplitude, by central differences sin(2π/p).
    [Fact]
    public void The_sharpness_of_a_sine_is_that_of_its_central_difference()
    {
        Assert.Equal(Math.Sin(Math.Tau / 8), Wave(0.5, 1, period: 8).Sharpness, 0.01); // the outermost pixels have no central difference
    }

    [Fact]
    public void Figures_are_those_of_the_usable_pixels()
    {
        ushort[] levels = [10, 20, 255, 30, 40, 255];
        var picture = new Picture(new(3, 2), levels, usable: new(new(3, 2), [true, true, false, true, true, false]));

        Assert.Equal(25, picture.MeanLevel);
        Assert.Equal(Math.Sqrt(125), picture.Contrast, 12);
        Assert.Equal(0, picture.SaturatedShare);
        Assert.Equal(1 / 3.0, picture.WithUsable(null).SaturatedShare, 12);
        Assert.True(double.IsNaN(picture.WithUsable(new(new(3, 2), new bool[6])).MeanLevel));
    }

    [Fact]
    public void What_was_noticed_on_reading_is_told_by_the_pair()
    {
        using var folder = new TestFolder();
        folder.Write("left_1.pgm", "P5\n2 1\n65535\n\0\u0001\0\u0002");
        folder.Write("right_1.pgm", "P5\n2 1\n65535\n\0\u0001\0\u0002");

        Assert.Equal(16, StereoPair.ReadFolder(folder.Root)[0].Left.SignificantBits);
        Assert.Empty(StereoPair.ReadFolder(folder.Root)[0].Left.ReadingWarnings); // the file states its largest level
    }

    private static Picture Wave(double mean, double gain, double period = 8, double saturated = 0)
    {
        var levels = new ushort[Size.Area];
        var blocks = (int)(saturated * 192 + 0.5);
        for (var i = 0; i < levels.Length; i++)
        {
            var (u, v) = (i % Size.Width, i / Size.Width);
            var inBlock = v / 4 * 16 + u / 4 < blocks;
            levels[i] = (ushort)(inBlock ? 4095 : Math.Round(4095 * mean + 800 * gain * Math.Sin((u + 0.25) * Math.Tau / period)));
        }

        return new(Size, levels, 12);
    }
}
