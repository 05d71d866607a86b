using OpenCvSharp;
using Pairwright.Imaging;
using Pairwright.Notebook.Drawing;
using Xunit;

namespace Pairwright.Notebook.Tests.Drawing;

public sealed class PicturesTests
{
    [Fact]
    public void Scaling_down_averages_areas_as_OpenCV_does()
    {
        // OpenCV's resize with INTER_AREA is the reference; it rounds to whole levels as well.
        var random = new Random(3);
        var grey = Enumerable.Range(0, 97 * 61).Select(_ => (ushort)random.Next(256)).ToArray();
        var raster = Pictures.Reduced(new Picture(new(97, 61), grey), 40);

        using var source = Mat.FromPixelData(61, 97, MatType.CV_8UC1, Array.ConvertAll(grey, level => (byte)level));
        using var reduced = source.Resize(new Size(40, raster.Height), interpolation: InterpolationFlags.Area);
        Assert.Equal(25, raster.Height);
        for (var i = 0; i < raster.Levels.Length; i++)
        {
            Assert.InRange(raster.Levels[i] - reduced.At<byte>(i / 40, i % 40), -1, 1);
        }
    }

    [Fact]
    public void A_picture_is_never_enlarged()
    {
        var raster = Pictures.Reduced(new Picture(new(3, 2), [0, 50, 100, 150, 200, 255]), 500);

        Assert.Equal((3, 2), (raster.Width, raster.Height));
        Assert.Equal([0, 50, 100, 150, 200, 255], raster.Levels);
    }

    [Fact]
    public void Ten_significant_bits_are_shown_over_their_whole_range()
    {
        var raster = Pictures.Reduced(new Picture(new(2, 1), [0, 1023], significantBits: 10));

        Assert.Equal([0, 255], raster.Levels);
    }

    [Fact]
    public void A_dark_picture_is_shown_brighter_and_a_normal_one_as_it_is()
    {
        var dark = new Picture(new(100, 10), [.. Enumerable.Range(0, 1000).Select(i => (ushort)(i % 40))]);
        var normal = new Picture(new(100, 10), [.. Enumerable.Range(0, 1000).Select(i => (ushort)(i % 250))]);

        Assert.InRange(Pictures.White(dark), 38, 40);
        Assert.Equal(255, Pictures.White(normal));
    }

    [Fact]
    public void No_value_is_striped_in_colours_that_no_value_has()
    {
        var map = ScalarMap.From(new(64, 8), (u, v) => u < 32 ? u / 31f : float.NaN);
        var raster = Pictures.Coloured(map, Ramp.Values, 0, 1);

        var values = Colours(raster, 0, 32);
        var stripes = Colours(raster, 32, 64);
        Assert.Equal(2, stripes.Count);
        Assert.Empty(stripes.Intersect(values));
    }

    [Theory]
    [InlineData("values")]
    [InlineData("shares")]
    [InlineData("spreads")]
    public void The_order_of_colours_survives_grey_printing(string name)
    {
        var ramp = name switch { "values" => Ramp.Values, "shares" => Ramp.Shares, _ => Ramp.Spreads };
        var luminance = Enumerable.Range(0, 101).Select(i => Luminance(ramp.At(i / 100.0))).ToArray();

        var rising = luminance[^1] > luminance[0] ? 1 : -1;
        Assert.All(luminance.Zip(luminance.Skip(1)), pair => Assert.True(rising * (pair.Second - pair.First) >= -0.002));
        Assert.True(Math.Abs(luminance[^1] - luminance[0]) > 0.6);
    }

    // WCAG 2.1, success criterion 1.4.3 and its definition of contrast ratio: 4.5 : 1 for text.
    [Theory]
    [InlineData(Ink.Text)]
    [InlineData(Ink.Quiet)]
    [InlineData(Ink.Met)]
    [InlineData(Ink.NotMet)]
    [InlineData(Ink.Undecided)]
    [InlineData(Ink.Left)]
    [InlineData(Ink.Right)]
    public void Text_stands_out_from_the_paper(string ink)
    {
        var (text, paper) = (Luminance(Parse(ink)), Luminance(Parse(Ink.Paper)));

        Assert.True((paper + 0.05) / (text + 0.05) >= 4.5);
    }

    private static HashSet<(byte, byte, byte)> Colours(Raster raster, int start, int end) =>
        [.. from v in Enumerable.Range(0, raster.Height) from u in Enumerable.Range(start, end - start) let at = 3 * (v * raster.Width + u) select (raster.Levels[at], raster.Levels[at + 1], raster.Levels[at + 2])];

    private static (byte, byte, byte) Parse(string ink) =>
        (Convert.ToByte(ink[1..3], 16), Convert.ToByte(ink[3..5], 16), Convert.ToByte(ink[5..7], 16));

    // Relative luminance as WCAG 2.1 defines it.
    private static double Luminance((byte Red, byte Green, byte Blue) colour)
    {
        static double Linear(byte level) => level <= 10 ? level / 255.0 / 12.92 : Math.Pow((level / 255.0 + 0.055) / 1.055, 2.4);
        return 0.2126 * Linear(colour.Red) + 0.7152 * Linear(colour.Green) + 0.0722 * Linear(colour.Blue);
    }
}
