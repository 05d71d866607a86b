using Pairwright.Matching;
using Xunit;
using Xunit.Abstractions;

namespace Pairwright.Tests.Matching;

public class Ambiguous_scenes_are_refused(ITestOutputHelper output)
{
    [Fact]
    public void A_constant_picture_has_no_match()
    {
        var map = TestPairs.Pair(100, 60, (_, _) => 90, (_, _) => 90).Match(Recipe.For(new DisparityRange(0, 23)));
        Assert.Equal(0, map.MatchedShare);
    }

    [Theory]
    [InlineData(0)]
    public void A_repeating_grid_has_no_match(int shift)
    {
        static int Grid(int u, int v) => (u + 800) % 8 < 2 || v % 8 < 2 ? 30 : 200;
        var map = TestPairs.Pair(200, 80, Grid, (u, v) => Grid(u + shift, v)).Match(Recipe.For(new DisparityRange(0, 31)));
        output.WriteLine($"{map.MatchedShare:0.0%} matched");
        Assert.Equal(0, map.MatchedShare);
    }

    [Fact]
    public void A_plain_wall_between_textures_is_refused_and_the_textures_are_matched()
    {
        // Random dots left and right of a plain stripe wider than the range; the stripe's middle shows nothing to compare.
        var dots = TestPairs.RandomDots(200, 60, (_, _) => 6, seed: 9);
        int Left(int u, int v) => u is >= 70 and < 150 ? 128 : dots.Left[u, v];
        int Right(int u, int v) => u is >= 64 and < 144 ? 128 : dots.Right[u, v];
        var map = TestPairs.Pair(200, 60, Left, Right).Match(Recipe.For(new DisparityRange(0, 15)) with { Optimisation = Optimisation.SemiGlobal() });
        var (plain, textured) = (0, 0);
        for (var v = 0; v < 60; v++)
        {
            plain += Enumerable.Range(90, 40).Count(u => map.Labels[u, v] == DisparityLabel.Measured && Math.Abs(map.Disparity[u, v] - 6) > 1);
            textured += Enumerable.Range(10, 56).Concat(Enumerable.Range(155, 40)).Count(u => Math.Abs(map.Disparity[u, v] - 6) <= 0.5);
        }

        output.WriteLine($"{plain} wrong of 2400 on the wall, {textured} of 5760 right on the texture");
        Assert.Equal(0, plain);
        Assert.InRange(textured, 5700, 5760);
    }
}
