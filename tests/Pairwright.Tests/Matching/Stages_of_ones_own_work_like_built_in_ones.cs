using Pairwright.Imaging;
using Pairwright.Matching;
using Xunit;

namespace Pairwright.Tests.Matching;

public class Stages_of_ones_own_work_like_built_in_ones
{
    private const int Disparity = 4;

    private static readonly Recipe Recipe = Pairwright.Matching.Recipe.For(new DisparityRange(0, 9)) with { Checks = [], Filters = [] };

    [Fact]
    public void A_cost_on_a_pixel_on_a_row_and_as_a_class_give_one_map()
    {
        var pair = TestPairs.RandomDots(60, 20, (_, _) => Disparity, seed: 11);
        var pixel = pair.Match(Recipe with { Cost = Cost.FromPixels((l, r) => Math.Min(Math.Abs(l - r), 90)) });
        var row = pair.Match(Recipe with
        {
            Cost = Cost.FromRows((left, right, costs) =>
            {
                for (var i = 0; i < left.Length; i++)
                {
                    costs[i] = Math.Min(Math.Abs(left[i] - right[i]), 90);
                }
            }),
        });
        var own = pair.Match(Recipe with { Cost = new OwnCost(90) });

        Assert.Equal(pixel.Disparity.Values.ToArray(), row.Disparity.Values.ToArray());
        Assert.Equal(pixel.Disparity.Values.ToArray(), own.Disparity.Values.ToArray());
        Assert.Equal(pixel.Labels.Labels.ToArray(), own.Labels.Labels.ToArray());

        // Away from the left border, where half of the match lies outside, the dots stand where they were put.
        for (var v = 0; v < 20; v++)
        {
            for (var u = 10; u < 60; u++)
            {
                Assert.InRange(pixel.Disparity[u, v], Disparity - 0.5, Disparity + 0.5);
            }
        }
    }

    [Theory]
    [InlineData(-5)]
    [InlineData(0)]
    public void A_row_cost_sees_the_stretches_that_negative_disparities_put_together(int disparity)
    {
        var pair = TestPairs.RandomDots(40, 6, (_, _) => disparity);
        var map = pair.Match(Recipe with
        {
            Range = new(-8, 2),
            Cost = Cost.FromRows((left, right, costs) =>
            {
                Assert.Equal(left.Length, right.Length);
                Assert.Equal(left.Length, costs.Length);
                for (var i = 0; i < left.Length; i++)
                {
                    costs[i] = left[i] == right[i] ? 0 : 1;
                }
            }),
        });
        for (var u = 10; u < 30; u++)
        {
            Assert.Equal(disparity, map.Disparity[u, 3], 0.5);
        }
    }

    [Fact]
    public void Levels_of_a_cell_are_on_the_8_bit_scale_without_loss()
    {
        // 12 bits: a sixteenth of a level. Equal pictures, so the difference of a level with itself is seen only at disparity 0.
        var pair = TestPairs.Pair(8, 4, (u, v) => 16 * u + v, (u, v) => 16 * u + v, bits: 12);
        var seen = new System.Collections.Concurrent.ConcurrentBag<double>();
        pair.Match(Recipe with
        {
            Range = new(0, 2),
            Cost = Cost.FromPixels((l, r) =>
            {
                seen.Add(l);
                return Math.Abs(l - r);
            }),
        });
        Assert.Equal(
            Enumerable.Range(0, 8).SelectMany(u => Enumerable.Range(0, 4).Select(v => u + v / 16.0)).Order(),
            seen.Distinct().Order());
    }

    [Fact]
    public void A_sub_pixel_estimate_a_check_and_a_filter_may_be_code_too()
    {
        var pair = TestPairs.RandomDots(40, 12, (_, _) => Disparity);
        var map = pair.Match(Recipe with
        {
            SubPixel = SubPixel.FromTotals((before, lowest, after) => 0.25f),
            Checks = [Check.FromRow(row => row.Labels[..12].Fill(DisparityLabel.NoMatch))],
            Filters = [Filter.FromMap(map =>
            {
                for (var i = 0; i < map.Disparity.Length; i++)
                {
                    map.Disparity[i] += 100;
                }
            })],
        });
        Assert.Equal(Disparity + 100.25f, map.Disparity[20, 6]);
        Assert.Equal(DisparityLabel.NoMatch, map.Labels[11, 6]);
        Assert.NotEqual(DisparityLabel.NoMatch, map.Labels[20, 6]);
    }

    [Fact]
    public void Recipes_with_code_are_told_apart_by_the_code()
    {
        var first = Cost.FromPixels((l, r) => Math.Abs(l - r));
        var second = Cost.FromPixels((l, r) => (l - r) * (l - r));
        Assert.Equal("pixels (code (l, r) => Math.Abs(l - r))", first.ToString());
        Assert.NotEqual(first, second);
        Assert.NotEqual((Recipe with { Cost = first }).Id, (Recipe with { Cost = second }).Id);
        Assert.Equal(Recipe with { Cost = first }, Recipe with { Cost = first });
    }

    [Theory]
    [InlineData(double.NaN, "NaN")]
    [InlineData(-1, "-1")]
    public void A_cost_that_is_no_cost_is_named_with_its_place(double wrong, string shown)
    {
        var pair = TestPairs.Pair(12, 5, (u, v) => u == 7 && v == 3 ? 200 : u, (u, _) => u);
        var sentence = Assert.Throws<UserErrorException>(
            () => pair.Match(Recipe with { Range = new(0, 3), Cost = Cost.FromPixels((l, r) => l == 200 && r == 5 ? wrong : 1) })).Message;
        Assert.Contains($"The cost 'pixels' gave {shown} at column 7 of row 3 for disparity 2", sentence);
    }

    [Fact]
    public void A_stage_that_throws_is_named()
    {
        var pair = TestPairs.RandomDots(20, 8, (_, _) => 1);
        Recipe[] faulty =
        [
            Recipe with { Cost = Cost.FromPixels((l, r) => throw new InvalidOperationException("no such level")) },
            Recipe with { Cost = Cost.FromRows((l, r, c) => c[l.Length] = 0) },
            Recipe with { SubPixel = SubPixel.FromTotals((a, b, c) => throw new DivideByZeroException()) },
            Recipe with { SubPixel = SubPixel.FromTotals((a, b, c) => float.NaN) },
            Recipe with { Checks = [Check.FromRow(row => throw new InvalidOperationException("no check"))] },
            Recipe with { Filters = [Filter.FromMap(map => throw new InvalidOperationException("no filter"))] },
        ];
        string[] reasons =
        [
            "The cost 'pixels' failed with InvalidOperationException (no such level)", "The cost 'rows' failed with IndexOutOfRangeException",
            "The sub-pixel 'totals' failed with DivideByZeroException", "gave an offset of NaN px", "The check 'row' failed", "The filter 'map' failed",
        ];
        Assert.All(faulty.Zip(reasons), pairing =>
        {
            var sentence = Assert.Throws<UserErrorException>(() => pair.Match(pairing.First with { Range = new(0, 3) })).Message;
            Assert.Contains(pairing.Second, sentence);
            Assert.DoesNotContain('\n', sentence);
        });
    }

    [Fact]
    public void An_aggregation_and_an_optimisation_of_ones_own_see_the_costs()
    {
        // Noise on the dots; the mean over a row's neighbours brings the match out, and the optimisation forbids one disparity.
        var random = new Random(1);
        var dots = TestPairs.RandomDots(80, 20, (_, _) => Disparity);
        var pair = new RectifiedPair(TestPairs.Picture(80, 20, (u, v) => (dots.Left[u, v] + random.Next(150)) / 2), dots.Right);
        var plain = Recipe with { Cost = Cost.AbsoluteDifference(), Optimisation = Optimisation.WinnerTakesAll, SubPixel = SubPixel.None };
        double Right(DisparityMap map, int disparity) => map.Disparity.Values.ToArray().Count(d => d == disparity) / (80.0 * 20);
        var alone = Right(pair.Match(plain), Disparity);
        var together = Right(pair.Match(plain with { Aggregation = new RowMean() }), Disparity);
        Assert.True(together > 1.5 * alone, $"{together} is not well above {alone}");
        Assert.Equal(0, Right(pair.Match(plain with { Aggregation = new RowMean(), Optimisation = new Without(Disparity) }), Disparity));
        Assert.True(Right(pair.Match(plain with { Aggregation = new RowMean(), Optimisation = new Without(7) }), Disparity) >= together);
    }

    [Fact]
    public void What_an_aggregation_or_an_optimisation_does_wrong_is_named()
    {
        var pair = TestPairs.RandomDots(20, 8, (_, _) => 1);
        Assert.Contains("The aggregation 'RowMean' failed", Refusal(Recipe with { Aggregation = new RowMean(at: 400) }));
        Assert.Contains("The optimisation 'Without' failed", Refusal(Recipe with { Optimisation = new Without(400) }));
        Assert.Contains("The optimisation 'Without' left a total of NaN", Refusal(Recipe with { Optimisation = new Without(2, float.NaN) }));
        string Refusal(Recipe recipe) => Assert.Throws<UserErrorException>(() => pair.Match(recipe)).Message;
    }

    private sealed class RowMean(int at = 0) : Aggregation
    {
        public override int? ReachPx => 0;

        public override IAggregator Prepare(RectifiedPair pair) => new Mean(at);

        private sealed class Mean(int at) : IAggregator
        {
            public void Apply(CostVolume costs, CancellationToken stop) => costs.ForEachRow(stop, v =>
            {
                var before = costs.Row(v).ToArray();
                var (width, count) = (costs.Size.Width, costs.Range.Count);
                for (var u = 2; u < width - 2; u++)
                {
                    for (var i = 0; i < count; i++)
                    {
                        costs.At(u + at, v)[i] = Enumerable.Range(-2, 5).Average(k => before[(u + k) * count + i]);
                    }
                }
            });
        }
    }

    private sealed class Without(int disparity, float instead = 1e6f) : Optimisation
    {
        public override void Apply(CostVolume costs, CancellationToken stop) => costs.ForEachRow(stop, v =>
        {
            for (var u = 0; u < costs.Size.Width; u++)
            {
                costs.At(u, v)[disparity - costs.Range.Least] = instead;
            }
        });
    }
}
