using Pairwright.Imaging;
using Pairwright.Matching;
using Xunit;

namespace Pairwright.Tests.Matching;

/// <summary>
/// The reference is the general path, which works the published equations out on a stored cost volume, one number at a time. Every disparity,
/// confidence and label must have the same bits.
/// </summary>
public class The_fused_path_equals_the_plain_one
{
    private static readonly (int Width, int Height)[] Windows = [(3, 3), (5, 5), (7, 7), (9, 7), (7, 9)];

    [Fact]
    public void On_two_hundred_random_sizes_ranges_and_penalties()
    {
        var (random, fused) = (new Random(11), 0);
        for (var i = 0; i < 210; i++)
        {
            var window = Windows[random.Next(Windows.Length)];
            var (width, height) = (window.Width + random.Next(70), window.Height + random.Next(20));
            var count = 1 + random.Next(width);
            var least = random.Next(-width + 1, width) is var start && start + count - 1 <= -width ? -width + 2 - count : start;
            var large = random.Next(128);
            var recipe = Recipe.For(new DisparityRange(least, least + count - 1)) with
            {
                Cost = random.Next(4) switch
                {
                    0 => Cost.CentreSymmetricCensus(window.Width, window.Height),
                    1 => Cost.AbsoluteDifference(limit: 20 + random.Next(60)),
                    _ => Cost.Census(window.Width, window.Height),
                },
                Optimisation = i % 5 == 0
                    ? Optimisation.SemiGlobal(smallPenalty: 3)
                    : Optimisation.SemiGlobal(random.Next(large + 1), large, random.Next(3) == 0 ? 4 : 8, random.Next(3) == 0 ? 1 + random.Next(60) : null),
                Filters = [],
            };
            var settings = new MatcherSettings
            {
                Threads = 1 + random.Next(3),
                VectorBits = new[] { 0, 8, 256, 512 }[i % 4],
                StripRows = random.Next(3) == 0 ? 1 + random.Next(height) : null,
            };
            var pair = Pair(random, width, height, masked: random.Next(3) == 0, random.Next(2) == 0 && recipe.Cost is WindowCost ? 4 : 256);
            fused += FusedCost.Of(pair, recipe) is null ? 0 : 1;
            Same(Match(pair, recipe, new() { PlainOnly = true }), Match(pair, recipe, settings), $"case {i}: {width} × {height}, {recipe}, {settings}");
        }

        // A range that compares next to nothing may leave absolute differences with a typical cost that is no whole number.
        Assert.InRange(fused, 200, 210);
    }

    [Fact]
    public void Over_threads_strips_and_vector_widths()
    {
        var random = new Random(12);
        var pair = Pair(random, 131, 61, masked: false, 256);
        foreach (var recipe in new[]
        {
            Recipe.For(new DisparityRange(-3, 69)), Recipe.For(new DisparityRange(0, 63)) with { Cost = Cost.Census(5, 5), Optimisation = Optimisation.SemiGlobal(7, 100) },
        })
        {
            var expected = Match(pair, recipe, new() { PlainOnly = true });
            foreach (var (threads, bits, strip) in new[] { (1, 256, 61), (2, 256, 61), (4, 256, 61), (2, 512, 61), (2, 8, 61), (2, 256, 1), (1, 256, 7), (2, 512, 30) })
            {
                var settings = new MatcherSettings { Threads = threads, VectorBits = bits, StripRows = strip };
                Same(expected, Match(pair, recipe, settings), settings.ToString());
            }
        }
    }

    // Few levels and plain stretches, so that many totals are equal; a disparity that varies, so that there are matches.
    private static RectifiedPair Pair(Random random, int width, int height, bool masked, int levels)
    {
        var shift = random.Next(-width / 2, width / 2 + 1);
        var scene = new int[3 * width, height];
        for (var v = 0; v < height; v++)
        {
            for (var u = 0; u < 3 * width; u++)
            {
                scene[u, v] = random.Next(6) == 0 && u > 0 ? scene[u - 1, v] : random.Next(levels);
            }
        }

        Mask? Mask() => masked ? Pairwright.Imaging.Mask.From(new(width, height), (_, _) => random.Next(8) > 0) : null;
        return new(
            TestPairs.Picture(width, height, (u, v) => scene[width + u - shift * (v % 5) / 4, v], usable: Mask()),
            TestPairs.Picture(width, height, (u, v) => scene[width + u, v], usable: Mask()));
    }

    private static DisparityMap Match(RectifiedPair pair, Recipe recipe, MatcherSettings settings) => Matcher.Match(pair, recipe, settings, default, null);

    private static void Same(DisparityMap expected, DisparityMap found, string what)
    {
        for (var i = 0; i < expected.Size.Area; i++)
        {
            var (u, v) = (i % expected.Size.Width, i / expected.Size.Width);
            Assert.True(
                expected.Labels[u, v] == found.Labels[u, v]
                && BitConverter.SingleToInt32Bits(expected.Disparity[u, v]) == BitConverter.SingleToInt32Bits(found.Disparity[u, v])
                && BitConverter.SingleToInt32Bits(expected.Confidence[u, v]) == BitConverter.SingleToInt32Bits(found.Confidence[u, v]),
                $"{what}: at ({u}, {v}) {expected.Labels[u, v]} {expected.Disparity[u, v]} {expected.Confidence[u, v]}, but {found.Labels[u, v]} {found.Disparity[u, v]} {found.Confidence[u, v]}");
        }
    }
}
