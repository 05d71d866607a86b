using OpenCvSharp;
using Pairwright.Geometry;
using Pairwright.Imaging;
using Xunit;

namespace Pairwright.Tests.Imaging;

public class Pictures_and_maps_are_shown_alike_every_time
{
    [Fact]
    public void Encoding_twice_gives_the_same_bytes()
    {
        var picture = Patterns.Picture(40, 30, 12, colour: true);
        Assert.Equal(PictureCodec.EncodePng(picture), PictureCodec.EncodePng(picture));
    }

    // Source: OpenCV's decoder.
    [Fact]
    public void Grey_and_colours_come_out_in_eight_bits_at_their_places()
    {
        using var grey = Cv2.ImDecode(PictureCodec.EncodePng(new Picture(new(3, 1), [0, 2048, 4095], 12)), ImreadModes.Unchanged);
        using var colour = Cv2.ImDecode(PictureCodec.EncodePngRgb(new(2, 1), [1, 2, 3, 4, 5, 6]), ImreadModes.Unchanged);

        Assert.Equal([0, 128, 255], grey.AsSpan<byte>().ToArray().Select(level => (int)level));
        Assert.Equal([3, 2, 1, 6, 5, 4], colour.AsSpan<byte>().ToArray().Select(level => (int)level));
    }

    // Source: lightness L* of CIE 15 (2004), from sRGB after IEC 61966-2-1, both from memory.
    [Fact]
    public void Every_step_of_the_colour_scale_is_lighter_than_the_one_before_and_steps_are_even()
    {
        var lightness = Enumerable.Range(0, 65).Select(i => Lightness(ColourScale.Colour(i / 64.0))).ToArray();
        var steps = lightness.Skip(1).Zip(lightness, (next, here) => next - here).ToArray();

        Assert.All(steps, step => Assert.InRange(step, 0.5, 2.0));
        Assert.InRange(lightness[^1] - lightness[0], 70, 95);
    }

    [Fact]
    public void A_pixel_without_a_value_has_a_colour_that_no_value_has()
    {
        for (var i = 0; i < 8; i++)
        {
            var none = ColourScale.NoValue(i, 0);
            for (var share = 0.0; share <= 1; share += 1 / 512.0)
            {
                var some = ColourScale.Colour(share);
                var distance = Math.Abs(none.Red - some.Red) + Math.Abs(none.Green - some.Green) + Math.Abs(none.Blue - some.Blue);
                Assert.True(distance > 60, $"share {share} is only {distance} from no value");
            }
        }
    }

    [Fact]
    public void Painting_places_low_high_and_none()
    {
        var rgb = ColourScale.Paint(new(new(4, 1), [10, 20, float.NaN, 30]), low: 10, high: 20);
        (byte, byte, byte) At(int i) => (rgb[3 * i], rgb[3 * i + 1], rgb[3 * i + 2]);

        Assert.Equal(ColourScale.Colour(0), At(0));
        Assert.Equal(ColourScale.Colour(1), At(1));
        Assert.Equal(ColourScale.NoValue(2, 0), At(2));
        Assert.Equal(ColourScale.Colour(1), At(3));
    }

    [Fact]
    public void Quantiles_leave_outliers_and_holes_out()
    {
        var map = ScalarMap.From(new(101, 1), (u, _) => u == 0 ? 1e9f : u == 1 ? float.NaN : u);

        Assert.Equal((2.0, 100.0), map.Quantiles(0, 0.99));
        Assert.True(double.IsNaN(map.Select(_ => float.NaN).Quantiles().Low));
    }

    private static double Lightness((byte Red, byte Green, byte Blue) colour)
    {
        static double Linear(byte level) => level / 255.0 <= 0.04045 ? level / 255.0 / 12.92 : Math.Pow((level / 255.0 + 0.055) / 1.055, 2.4);
        var y = 0.2126 * Linear(colour.Red) + 0.7152 * Linear(colour.Green) + 0.0722 * Linear(colour.Blue);
        return y > 216 / 24389.0 ? 116 * Math.Cbrt(y) - 16 : y * 24389 / 27;
    }
}
