using Pairwright.Imaging;
using Pairwright.Matching;
using Xunit;

namespace Pairwright.Tests.Matching;

/// <summary>The general path against the papers' equations, written down plainly pixel by pixel over the whole picture.</summary>
public class Paths_follow_their_equations
{
    private static readonly (int U, int V)[] Steps =
    [
        (1, 0), (-1, 0), (0, 1), (0, -1), (1, 1), (-1, -1), (-1, 1), (1, -1), (2, 1), (-2, -1), (-2, 1), (2, -1), (1, 2), (-1, -2), (-1, 2), (1, -2),
    ];

    [Theory]
    [InlineData(4, false, false)]
    [InlineData(8, false, false)]
    [InlineData(16, false, false)]
    [InlineData(8, false, true)]
    [InlineData(16, false, true)]
    [InlineData(4, true, false)]
    [InlineData(4, true, true)]
    public void Totals_are_the_sums_of_the_paths(int paths, bool twoParents, bool adapted)
    {
        var random = new Random(paths + (twoParents ? 100 : 0) + (adapted ? 1000 : 0));
        for (var trial = 0; trial < 6; trial++)
        {
            var (width, height) = (random.Next(12, 30), random.Next(1, 20));
            var least = random.Next(-6, 4);
            var range = new DisparityRange(least, least + random.Next(0, 11));
            var (small, large) = (random.Next(0, 5), random.Next(5, 15));
            double? flat = adapted ? random.Next(5, 40) : null;
            var numbers = Enumerable.Range(0, width * height * range.Count).Select(_ => (float)random.Next(0, 20)).ToArray();
            var cost = new GivenCost(9, (u, v, d) => numbers[(v * width + u) * range.Count + d - range.Least]);
            var pair = TestPairs.Pair(width, height, (u, v) => random.Next(256), (u, v) => 0);
            var expected = Totals(pair, range, cost, small, large, flat, Steps[..paths], twoParents);
            var recorder = new RowRecorder();
            var recipe = Recipe.For(range) with
            {
                Cost = cost,
                Optimisation = twoParents ? Optimisation.SemiGlobalWithTwoParents(small, large, flat) : Optimisation.SemiGlobal(small, large, paths, flat),
                Checks = [recorder],
                Filters = [],
            };
            Matcher.Match(pair, recipe, new() { StripRows = trial % 2 == 0 ? null : random.Next(1, 6) }, default, null);
            for (var v = 0; v < height; v++)
            {
                var found = recorder.Rows[v];
                for (var u = 0; u < width; u++)
                {
                    var total = Enumerable.Range(0, range.Count)
                        .Where(i => u - range.Least - i >= 0 && u - range.Least - i < width)
                        .Select(i => expected[u, v, i])
                        .DefaultIfEmpty(float.NaN)
                        .ToArray();

                    // Halves of halves do not stay exact in single precision; sums of whole numbers do.
                    var tolerance = twoParents ? 1e-3 : 0;
                    Assert.Equal(total.Min(), found.Lowest[u], tolerance);
                    if (found.Winner[u] != RowMatches.None)
                    {
                        Assert.Equal(total.Min(), expected[u, v, found.Winner[u] - range.Least], tolerance);
                    }
                }
            }
        }
    }

    [Fact]
    public void Maps_do_not_depend_on_threads_and_strips()
    {
        var pair = TestPairs.Smooth(90, 47, (u, v) => 4 + 0.05 * u + 0.03 * v);
        Optimisation[] all =
        [
            Optimisation.SemiGlobal(paths: 8), Optimisation.SemiGlobal(paths: 16, flatLevels: 8), Optimisation.SemiGlobalWithTwoParents(flatLevels: 10),
            Optimisation.WinnerTakesAll,
        ];
        Assert.All(all, optimisation =>
        {
            // Costs with fractions, so that another order of adding would show.
            var recipe = Recipe.For(new DisparityRange(0, 15)) with { Cost = Cost.AdCensus(), Optimisation = optimisation };
            var one = Matcher.Match(pair, recipe, new() { Threads = 1 }, default, null);
            foreach (var (threads, rows) in new (int, int?)[] { (2, null), (4, 7), (3, 1), (1, 46) })
            {
                var other = Matcher.Match(pair, recipe, new() { Threads = threads, StripRows = rows }, default, null);
                Assert.Equal(one.Disparity.Values.ToArray(), other.Disparity.Values.ToArray());
                Assert.Equal(one.Confidence.Values.ToArray(), other.Confidence.Values.ToArray());
                Assert.Equal(one.Labels.Labels.ToArray(), other.Labels.Labels.ToArray());
            }
        });
    }

    [Fact]
    public void The_winner_takes_all_without_paths()
    {
        var random = new Random(5);
        var numbers = Enumerable.Range(0, 20 * 9 * 7).Select(_ => (float)random.NextDouble()).ToArray();
        var pair = TestPairs.RandomDots(20, 9, (_, _) => 2);
        var recorder = new RowRecorder();
        pair.Match(Recipe.For(new DisparityRange(0, 6)) with
        {
            Cost = new GivenCost(1, (u, v, d) => numbers[(v * 20 + u) * 7 + d]), Optimisation = Optimisation.WinnerTakesAll, Checks = [recorder], Filters = [],
        });
        for (var v = 0; v < 9; v++)
        {
            for (var u = 6; u < 20; u++)
            {
                var costs = numbers.AsSpan((v * 20 + u) * 7, 7).ToArray();
                Assert.Equal(Array.IndexOf(costs, costs.Min()), recorder.Rows[v].Winner[u]);
                Assert.Equal(costs.Min(), recorder.Rows[v].Lowest[u]);
            }
        }
    }

    [Fact]
    public void Two_parents_bridge_noise_that_breaks_single_paths()
    {
        // A plane without texture but for noise on the right third of the pixels: what is known must come from all around.
        var pair = TestPairs.Smooth(120, 80, (_, _) => 6, seed: 4);
        var random = new Random(2);
        var noisy = new RectifiedPair(
            TestPairs.Picture(120, 80, (u, v) => Math.Clamp(pair.Left[u, v] + random.Next(-60, 61), 0, 255)),
            TestPairs.Picture(120, 80, (u, v) => Math.Clamp(pair.Right[u, v] + random.Next(-60, 61), 0, 255)));
        var recipe = Recipe.For(new DisparityRange(0, 20)) with { Cost = Cost.Census(5, 5), Checks = [], Filters = [] };
        double Wrong(Optimisation optimisation)
        {
            var map = noisy.Match(recipe with { Optimisation = optimisation });
            return map.Disparity.Values.ToArray().Count(d => !(Math.Abs(d - 6) <= 1)) / (120.0 * 80);
        }

        Assert.True(Wrong(Optimisation.SemiGlobalWithTwoParents()) < Wrong(Optimisation.SemiGlobal(paths: 4)));
        Assert.True(Wrong(Optimisation.SemiGlobal(paths: 8)) < Wrong(Optimisation.WinnerTakesAll));
    }

    [Theory]
    [InlineData(5, null)]
    [InlineData(8, 0.0)]
    [InlineData(8, double.NaN)]
    public void Paths_that_are_none_are_refused(int paths, double? flat) =>
        Assert.Contains("; give ", Assert.Throws<UserErrorException>(() => Optimisation.SemiGlobal(paths: paths, flatLevels: flat)).Message);

    [Fact]
    public void A_memory_limit_that_is_too_small_says_what_is_needed()
    {
        var pair = TestPairs.RandomDots(100, 50, (_, _) => 3);
        Recipe[] recipes =
        [
            Recipe.For(new DisparityRange(0, 31)) with { Cost = Cost.Rank(5) },
            Recipe.For(new DisparityRange(0, 31)) with { Cost = Cost.Rank(5), Optimisation = Optimisation.WinnerTakesAll },
        ];
        Assert.All(recipes, recipe => Assert.Matches(
            "needs [0-9]+ MB for its costs, but only 0 MB", Assert.Throws<UserErrorException>(() => Matcher.Match(pair, recipe, new() { MemoryBytes = 1000 }, default, null)).Message));
    }

    private static float[,,] Totals(
        RectifiedPair pair, DisparityRange range, Cost cost, float small, float large, double? flat, (int U, int V)[] steps, bool twoParents)
    {
        var (width, height, count) = (pair.Size.Width, pair.Size.Height, range.Count);
        var costs = new float[width, height, count];
        var row = new float[width * count];
        for (var v = 0; v < height; v++)
        {
            cost.Prepare(pair).Row(v, range, row);
            for (var i = 0; i < row.Length; i++)
            {
                costs[i / count, v, i % count] = float.IsInfinity(row[i]) ? (float)cost.Unrelated : row[i];
            }
        }

        var totals = new float[width, height, count];
        foreach (var step in steps)
        {
            // At right angles, on the side that a pass in this order has been over already.
            (int U, int V) second = step switch { (1, 0) => (0, 1), (-1, 0) => (0, -1), (0, 1) => (-1, 0), _ => (1, 0) };
            var path = new float?[width, height, count];
            float Of(int u, int v, int d)
            {
                if (path[u, v, d] is { } known)
                {
                    return known;
                }

                var parents = new[] { step, second }.Take(twoParents ? 2 : 1)
                    .Where(way => u - way.U >= 0 && u - way.U < width && v - way.V >= 0 && v - way.V < height)
                    .Select(way => Arriving(u, v, u - way.U, v - way.V, d))
                    .ToArray();
                path[u, v, d] = costs[u, v, d] + parents.DefaultIfEmpty(0).Average();
                return path[u, v, d]!.Value;
            }

            float Arriving(int u, int v, int x, int y, int d)
            {
                var before = Enumerable.Range(0, count).Select(i => Of(x, y, i)).ToArray();
                var difference = Math.Abs(pair.Left[u, v] - pair.Left[x, y]);
                var jump = flat is { } levels && difference > levels ? MathF.Max(MathF.Floor(large * (float)levels / difference), small) : large;
                var candidates = new List<float> { before[d], before.Min() + jump };
                candidates.AddRange(new[] { d - 1, d + 1 }.Where(i => i >= 0 && i < count).Select(i => before[i] + small));
                return candidates.Min() - before.Min();
            }

            // Rows and columns in the order in which a pass goes, so that the recursion stays shallow.
            for (var j = 0; j < height; j++)
            {
                for (var k = 0; k < width; k++)
                {
                    var v = step.V < 0 || (twoParents && second.V < 0) ? height - 1 - j : j;
                    var u = step.U < 0 || (twoParents && second.U < 0) ? width - 1 - k : k;
                    for (var d = 0; d < count; d++)
                    {
                        totals[u, v, d] += Of(u, v, d);
                    }
                }
            }
        }

        return totals;
    }
}
