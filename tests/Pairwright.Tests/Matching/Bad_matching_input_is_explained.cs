using Pairwright.Geometry;
using Pairwright.Imaging;
using Pairwright.Matching;
using Xunit;

namespace Pairwright.Tests.Matching;

public class Bad_matching_input_is_explained
{
    private static readonly RectifiedPair Small = TestPairs.RandomDots(40, 30, (_, _) => 3);

    [Fact]
    public void A_reversed_range() => Refused(() => new DisparityRange(10, 9), "10:9", "reversed or empty");

    [Fact]
    public void A_range_of_millions() => Refused(() => new DisparityRange(0, 2_000_000), "0:2000000", "16384");

    [Theory]
    [InlineData(0, 40)]
    [InlineData(40, 45)]
    [InlineData(-60, -40)]
    public void A_range_that_the_picture_cannot_hold(int least, int most) =>
        Refused(() => Small.Match(Recipe.For(new DisparityRange(least, most))), $"{least}:{most}", "40 px wide");

    [Theory]
    [InlineData(8, 30)]
    [InlineData(40, 6)]
    public void Pictures_smaller_than_the_window(int width, int height) =>
        Refused(() => TestPairs.RandomDots(width, height, (_, _) => 1).Match(Recipe.For(new DisparityRange(0, 3))), $"{width} × {height}", "9 × 7");

    [Fact]
    public void Pictures_of_two_sizes() =>
        Refused(() => new RectifiedPair(Small.Left, TestPairs.Picture(41, 30, (_, _) => 0)), "40 × 30", "41 × 30");

    [Fact]
    public void Pictures_of_two_depths() =>
        Refused(() => new RectifiedPair(Small.Left, TestPairs.Picture(40, 30, (_, _) => 0, bits: 12)), "8 significant bits", "12");

    [Fact]
    public void A_mask_of_another_size() =>
        Refused(() => TestPairs.Picture(40, 30, (_, _) => 0, usable: TestPairs.All(new(30, 40))), "30 × 40", "40 × 30");

    [Theory]
    [InlineData(4, 5)]
    [InlineData(5, 1)]
    [InlineData(11, 7)]
    public void A_census_window_that_is_none(int width, int height) => Refused(() => Cost.Census(width, height), $"{width} × {height}", "odd|at most 65");

    [Theory]
    [InlineData(-1.0, 5.0)]
    [InlineData(6.0, 5.0)]
    [InlineData(double.NaN, 5.0)]
    [InlineData(1.0, double.PositiveInfinity)]
    public void Penalties_that_are_none(double small, double large) => Refused(() => Optimisation.SemiGlobal(small, large), "Penalties", "finite");

    [Fact]
    public void Settings_of_checks_and_filters_that_are_none()
    {
        Refused(() => Check.LeftRight(-1), "-1", "0 or more");
        Refused(() => Check.Uniqueness(double.NaN), "NaN", "0 or more");
        Refused(() => Filter.Speckle(0), "0 px", "above zero");
        Refused(() => Filter.Speckle(10, double.NaN), "NaN", "above zero");
    }

    [Fact]
    public void Working_distances_out_of_order()
    {
        var geometry = new RectifiedGeometry(500, 100, 0, 320, 240, new(640, 480));
        Refused(() => Recipe.For(geometry, 2000, 900), "2000", "nearest");
        Refused(() => Recipe.For(geometry, 0, 900), "0 mm", "nearest");
        Refused(() => Recipe.For(geometry, 1e-9, 900), "larger");
    }

    [Theory]
    [InlineData(float.NaN)]
    [InlineData(float.NegativeInfinity)]
    [InlineData(-3f)]
    public void A_cost_that_gives_what_is_no_cost(float wrong)
    {
        var cost = new GivenCost(5, (u, v, d) => (u, v, d) == (20, 10, 2) ? wrong : 1);
        Refused(() => Small.Match(Recipe.For(new DisparityRange(0, 7)) with { Cost = cost }), nameof(GivenCost), "column 20", "row 10", "disparity 2");
    }

    [Fact]
    public void A_curve_search_without_what_it_needs()
    {
        var picture = TestPairs.Picture(40, 30, (_, _) => 0);
        var rig = Simulation.Scenes.Parallel;
        var grey = TestPairs.Picture(rig.Left.Size.Width, rig.Left.Size.Height, (_, _) => 0);
        var pair = new StereoPair(grey, grey, rig);
        Refused(() => new StereoPair(picture, picture).Search(new RawPixel(20, 15)), "no rig");
        Refused(() => pair.Search(new RawPixel(2, 2)), "(2, 2)", "smaller window");
        Refused(() => pair.Search(new RawPixel(double.NaN, 50)), "NaN");
        Refused(() => pair.Search(new RawPixel(100, 70), new GivenCost(1, (_, _, _) => 0)), "GivenCost", "window");
        Refused(() => pair.Search(new RawPixel(100, 70), nearestMm: 900, farthestMm: 500), "900", "500");
    }

    private static void Refused(Func<object> action, params string[] parts)
    {
        var message = Assert.Throws<UserErrorException>(action).Message;
        Assert.All(parts, part => Assert.Contains(part.Split('|'), text => message.Contains(text, StringComparison.Ordinal)));
        Assert.DoesNotContain('\n', message);
    }
}
