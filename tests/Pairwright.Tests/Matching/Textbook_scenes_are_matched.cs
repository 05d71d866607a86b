using Pairwright.Imaging;
using Pairwright.Matching;
using Xunit;
using Xunit.Abstractions;

namespace Pairwright.Tests.Matching;

/// <summary>Truth by construction: the pictures are made from the disparity.</summary>
public class Textbook_scenes_are_matched(ITestOutputHelper output)
{
    [Fact]
    public void A_raised_square_stands_out_of_random_dots()
    {
        static int Disparity(int u, int v) => u is >= 60 and < 110 && v is >= 25 and < 65 ? 13 : 5;
        var map = TestPairs.RandomDots(160, 90, Disparity).Match(Recipe.For(new DisparityRange(0, 23)));
        var (seen, right, wrong, hidden, hiddenMatched) = (0, 0, 0, 0, 0);
        for (var v = 0; v < 90; v++)
        {
            for (var u = 0; u < 160; u++)
            {
                var measured = map.Labels[u, v] == DisparityLabel.Measured;
                if (!TestPairs.SeenByBoth(160, Disparity, u, v))
                {
                    (hidden, hiddenMatched) = (hidden + 1, hiddenMatched + (measured ? 1 : 0));
                    continue;
                }

                seen++;
                right += measured && Math.Abs(map.Disparity[u, v] - Disparity(u, v)) <= 0.5 ? 1 : 0;
                wrong += measured && Math.Abs(map.Disparity[u, v] - Disparity(u, v)) > 0.5 ? 1 : 0;
            }
        }

        output.WriteLine($"{seen} seen by both, {right} right, {wrong} wrong; {hidden} hidden, {hiddenMatched} of them matched");
        Assert.True(right > 0.98 * seen, $"only {right} of {seen} pixels are right");
        Assert.True(wrong < 0.01 * seen, $"{wrong} of {seen} pixels are wrong");
        Assert.True(hiddenMatched < 0.25 * hidden, $"{hiddenMatched} of {hidden} hidden pixels were given a match");
        Assert.Equal(DisparityLabel.Occluded, map.Labels[56, 45]);
    }

    [Fact]
    public void A_depth_step_lies_where_it_is()
    {
        static int Disparity(int u, int v) => u < 70 ? 4 : 12;
        var map = TestPairs.RandomDots(140, 40, Disparity, seed: 2).Match(Recipe.For(new DisparityRange(0, 19)));
        for (var v = 4; v < 36; v++)
        {
            // From the far side the strip of eight hidden columns, then the near side.
            var first = Enumerable.Range(0, 140).First(u => map.Disparity[u, v] > 8);
            var last = Enumerable.Range(0, 140).Last(u => map.Disparity[u, v] < 8);
            Assert.InRange(first, 68, 72);
            Assert.InRange(last, 57, 64);
        }
    }

    [Fact]
    public void A_ramp_is_followed_to_a_fraction_of_a_pixel()
    {
        var map = TestPairs.Smooth(240, 40, (u, _) => 3 + 0.05 * u).Match(Recipe.For(new DisparityRange(0, 20)));
        var errors = (from v in Enumerable.Range(0, 40) from u in Enumerable.Range(20, 200) where !float.IsNaN(map.Disparity[u, v]) select map.Disparity[u, v] - (3 + 0.05 * u)).ToArray();
        var rms = Math.Sqrt(errors.Average(error => error * error));
        output.WriteLine($"{errors.Length} of 8000 measured, mean {errors.Average():0.000} px, RMS {rms:0.000} px");
        Assert.InRange(errors.Length, 7600, 8000);
        Assert.InRange(rms, 0, 0.15);
        Assert.InRange(errors.Average(), -0.02, 0.02);
    }

    [Theory]
    [InlineData(-9, -14, -2)]
    [InlineData(-2, -6, 6)]
    [InlineData(3, -6, 6)]
    [InlineData(0, -3, 3)]
    [InlineData(40, 30, 45)]
    public void Disparities_of_either_sign_are_found(int disparity, int least, int most)
    {
        var map = TestPairs.RandomDots(120, 30, (_, _) => disparity, seed: 4).Match(Recipe.For(new DisparityRange(least, most)));
        for (var v = 0; v < 30; v++)
        {
            // Where all of the window falls on the right picture.
            for (var u = Math.Max(4, disparity + 4); u < Math.Min(116, 116 + disparity); u++)
            {
                Assert.Equal(disparity, map.Disparity[u, v], 0.5f);
            }
        }
    }

    [Fact]
    public void A_disparity_outside_the_range_is_not_measured()
    {
        var map = TestPairs.RandomDots(120, 40, (_, _) => 20, seed: 5).Match(Recipe.For(new DisparityRange(0, 12)));
        Assert.InRange(map.MatchedShare, 0, 0.03);
    }

    [Fact]
    public void Pixels_that_are_not_usable_are_never_measured()
    {
        var pair = TestPairs.RandomDots(80, 40, (_, _) => 5);
        var usable = Mask.From(pair.Size, (u, v) => u < 30 || v < 20);
        var left = TestPairs.Picture(80, 40, (u, v) => pair.Left[u, v], usable: usable);
        var map = new RectifiedPair(left, pair.Right).Match(Recipe.For(new DisparityRange(0, 12)));
        for (var v = 0; v < 40; v++)
        {
            for (var u = 7; u < 79; u++)
            {
                Assert.Equal(usable[u, v] ? DisparityLabel.Measured : DisparityLabel.Unusable, map.Labels[u, v]);
            }
        }
    }
}
