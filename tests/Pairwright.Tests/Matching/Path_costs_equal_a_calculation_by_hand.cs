using Pairwright.Imaging;
using Pairwright.Matching;
using Xunit;

namespace Pairwright.Tests.Matching;

/// <summary>Outside reference: equations 13 and 14 of Hirschmüller 2008, worked with pencil.</summary>
public class Path_costs_equal_a_calculation_by_hand
{
    /// <summary>
    /// One row of four pixels, penalties 1 and 3; what cannot be compared stands in with the unrelated cost 5. Paths rightwards: 2 5 5, 4 2 8,
    /// 7 0 4, 2 4 3; leftwards: 3 5 6, 5 1 6, 6 1 4, 1 4 2. The six other directions begin at every pixel and add its cost each.
    /// </summary>
    [Fact]
    public void Along_a_row()
    {
        float[,] costs = { { 2, 0, 0 }, { 4, 1, 0 }, { 6, 0, 3 }, { 1, 4, 2 } };
        var found = Match(4, 1, new(0, 2), new GivenCost(5, (u, _, d) => costs[u, d]), 1, 3)[0];
        var infinity = float.PositiveInfinity;
        Assert.Equal([0, 1, 1, 0], found.Winner);
        Assert.Equal([17, 9, 1, 9], found.Lowest);
        Assert.Equal([float.NaN, 33, 49, float.NaN], found.Before);
        Assert.Equal([float.NaN, float.NaN, 26, 32], found.After);
        Assert.Equal([infinity, infinity, infinity, 17], found.SecondLowest);

        // Right pixel 0 is compared by left 0, 1 and 2 with totals 17, 9 and 26, and so on.
        Assert.Equal([1, 1, 1, 0], found.RightWinner);
    }

    /// <summary>
    /// Two by two pixels, penalties 1 and 2, unrelated cost 4: each pixel has one neighbour across, one down and one on the diagonal, whose path
    /// is its own cost. What a neighbour adds above its minimum: 0 1 from the first, 1 0 from the second, 0 1 from the third and the fourth; and
    /// every pixel's own cost counts eight times.
    /// </summary>
    [Fact]
    public void Across_down_and_on_both_diagonals()
    {
        float[,,] costs = { { { 1, 0 }, { 2, 0 } }, { { 3, 0 }, { 0, 5 } } };
        var rows = Match(2, 2, new(0, 1), new GivenCost(4, (u, v, d) => costs[u, v, d]), 1, 2);
        Assert.Equal([0, 1], rows[0].Winner);
        Assert.Equal([9, 3], rows[0].Lowest);
        Assert.Equal([float.NaN, 24], rows[0].Before);
        Assert.Equal([0, 0], rows[1].Winner);
        Assert.Equal([17, 1], rows[1].Lowest);
        Assert.Equal([float.NaN, 42], rows[1].After);
    }

    [Fact]
    public void Of_equal_totals_the_least_disparity_wins_from_both_sides()
    {
        var found = Match(5, 1, new(-1, 1), new GivenCost(1, (_, _, _) => 1), 1, 2)[0];
        Assert.Equal([-1, -1, -1, -1, 0], found.Winner);
        Assert.Equal([0, -1, -1, -1, -1], found.RightWinner);
    }

    private static Dictionary<int, RowRecorder.Found> Match(int width, int height, DisparityRange range, Cost cost, double small, double large)
    {
        var recorder = new RowRecorder();
        var pair = TestPairs.Pair(width, height, (_, _) => 0, (_, _) => 0);
        pair.Match(Recipe.For(range) with { Cost = cost, Optimisation = Optimisation.SemiGlobal(small, large), Checks = [recorder], Filters = [] });
        return new(recorder.Rows);
    }
}
