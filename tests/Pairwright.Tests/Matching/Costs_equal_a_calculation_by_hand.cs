using Pairwright.Imaging;
using Pairwright.Matching;
using Xunit;

namespace Pairwright.Tests.Matching;

/// <summary>Outside reference: the definitions of the papers, worked with pencil on pictures of a few pixels.</summary>
public class Costs_equal_a_calculation_by_hand
{
    // Neighbours darker than the middle 50: 10, 20, 30, 40 on the left; 20, 30, 40 and the last 10 on the right. The first and the last differ.
    private static readonly int[] Left = [10, 20, 30, 40, 50, 60, 70, 80, 90];
    private static readonly int[] Right = [90, 20, 30, 40, 50, 60, 70, 80, 10];

    private static RectifiedPair Pair => TestPairs.Pair(3, 3, (u, v) => Left[3 * v + u], (u, v) => Right[3 * v + u]);

    [Fact]
    public void Census_counts_the_neighbours_whose_comparison_with_the_middle_differs()
    {
        var costs = Row(Cost.Census(3, 3), Pair, 1, new(0, 0));
        Assert.Equal(2, costs[1]);
    }

    [Fact]
    public void Census_repeats_the_border_beyond_it()
    {
        // Around the left 10 nothing is darker. Around the right 90 stand 90 90 20 / 90 [90] 20 / 40 40 50: five are darker.
        var costs = Row(Cost.Census(3, 3), Pair, 0, new(0, 0));
        Assert.Equal(5, costs[0]);
    }

    [Fact]
    public void Census_at_a_disparity_compares_with_the_pixel_that_many_columns_to_the_left()
    {
        // Left middle: 10, 20, 30, 40 darker, bits 1111 0000. One column to the left on the right picture the window is 90 90 20 / 40 [40] 50 /
        // 70 70 80: only the third is darker, bits 0010 0000. Three differ.
        var costs = Row(Cost.Census(3, 3), Pair, 1, new(-1, 1));
        Assert.Equal(3, costs[3 * 1 + 2]);
        Assert.Equal(2, costs[3 * 1 + 1]);

        // The right picture has no column −1, and none at 3.
        Assert.True(float.IsPositiveInfinity(costs[3 * 0 + 2]));
        Assert.True(float.IsPositiveInfinity(costs[3 * 2 + 0]));
    }

    [Fact]
    public void Census_does_not_see_gain_and_offset()
    {
        var random = new Random(3);
        var levels = Enumerable.Range(0, 20 * 12).Select(_ => random.Next(1000)).ToArray();
        var pair = TestPairs.Pair(20, 12, (u, v) => levels[20 * v + u], (u, v) => 3 * levels[20 * v + u] + 777, bits: 12);
        Assert.All(Row(Cost.Census(9, 7), pair, 5, new(0, 0)), cost => Assert.Equal(0, cost));
    }

    [Fact]
    public void A_census_neighbour_that_is_not_usable_counts_as_not_darker_and_its_own_pixel_is_not_compared()
    {
        var usable = Mask.From(new(3, 3), (u, v) => (u, v) != (0, 0));
        var pair = new RectifiedPair(TestPairs.Picture(3, 3, (u, v) => Left[3 * v + u], usable: usable), TestPairs.Picture(3, 3, (u, v) => Right[3 * v + u]));

        // The left 10 no longer counts as darker, and neither does the right 90: only the last neighbour differs.
        Assert.Equal(1, Row(Cost.Census(3, 3), pair, 1, new(0, 0))[1]);
        Assert.True(float.IsPositiveInfinity(Row(Cost.Census(3, 3), pair, 0, new(0, 0))[0]));
    }

    [Fact]
    public void Zncc_is_zero_for_gain_and_offset_two_for_opposites_and_one_minus_the_correlation_between()
    {
        var cost = Assert.IsAssignableFrom<WindowCost>(Cost.Zncc(3));
        float[] window = [1, 2, 3, 4, 5, 6, 7, 8, 9];
        Assert.Equal(0, cost.Compare(window, Array.ConvertAll(window, x => 3 * x + 10)), 1e-9);
        Assert.Equal(2, cost.Compare(window, Array.ConvertAll(window, x => -x)), 1e-9);

        // Deviations −4 … 4 against a single 9 at the end, mean 1, deviations −1 (eight times) and 8: products sum to 36, squares to 60 and 72.
        Assert.Equal(1 - 36 / Math.Sqrt(60 * 72), cost.Compare(window, [0, 0, 0, 0, 0, 0, 0, 0, 9]), 1e-9);
        Assert.True(double.IsNaN(cost.Compare(window, new float[9])));
    }

    private static float[] Row(Cost cost, RectifiedPair pair, int v, DisparityRange range)
    {
        var costs = new float[pair.Size.Width * range.Count];
        cost.Prepare(pair).Row(v, range, costs);
        return costs;
    }
}
