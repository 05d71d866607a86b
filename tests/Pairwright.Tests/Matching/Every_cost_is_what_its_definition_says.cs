using OpenCvSharp;
using Pairwright.Imaging;
using Pairwright.Matching;
using Xunit;

namespace Pairwright.Tests.Matching;

/// <summary>
/// Outside references: OpenCV's template matching for what compares windows by products, the papers' equations worked with pencil on a few
/// pixels for the rest.
/// </summary>
public class Every_cost_is_what_its_definition_says
{
    private const int Width = 37;
    private const int Height = 21;

    private static readonly DisparityRange Range = new(-5, 13);

    public static TheoryData<string, int, int> Correlations => new()
    {
        { "ssd", 5, 8 }, { "ncc", 5, 8 }, { "zncc", 5, 8 }, { "ssd", 7, 16 }, { "ncc", 7, 16 }, { "zncc", 7, 12 },
    };

    [Theory]
    [MemberData(nameof(Correlations))]
    public void Window_products_agree_with_OpenCVs_template_matching(string name, int window, int bits)
    {
        var (cost, mode) = name switch
        {
            "ssd" => (Cost.Ssd(window), TemplateMatchModes.SqDiff),
            "ncc" => (Cost.Ncc(window), TemplateMatchModes.CCorrNormed),
            _ => (Cost.Zncc(window), TemplateMatchModes.CCoeffNormed),
        };
        var pair = Noise(bits, seed: window);
        using var left = Mat(pair.Left);
        using var right = Mat(pair.Right);
        var half = window / 2;
        for (var v = half; v < Height - half; v += 4)
        {
            var costs = Row(cost, pair, v, Range);
            for (var u = half; u < Width - half; u += 3)
            {
                using var template = new Mat(left, new Rect(u - half, v - half, window, window));
                using var strip = new Mat(right, new Rect(0, v - half, Width, window));
                using var scores = new Mat();
                Cv2.MatchTemplate(strip, template, scores, mode);
                for (var d = Range.Least; d <= Range.Most; d++)
                {
                    if (u - d < half || u - d >= Width - half)
                    {
                        continue;
                    }

                    var score = scores.At<float>(0, u - d - half);
                    var expected = name == "ssd" ? score / (window * window) : 1 - score;
                    Assert.Equal(expected, costs[u * Range.Count + d - Range.Least], name == "ssd" ? 1e-3 * expected + 0.05 : 2e-4);
                }
            }
        }
    }

    // Every cost that compares windows, by its own comparison of two windows, at the borders and beyond too.
    [Fact]
    public void Rows_of_windows_are_the_windows_compared_one_by_one()
    {
        var pair = Noise(10, seed: 3);
        Cost[] costs =
        [
            Cost.Census(9, 7), Cost.Census(3, 5), Cost.CentreSymmetricCensus(9, 7), Cost.CentreSymmetricCensus(5, 3), Cost.Rank(5), Cost.Ssd(3), Cost.Ncc(5), Cost.Zncc(7),
            Cost.ZeroMeanSad(5),
        ];
        Assert.All(costs.Cast<WindowCost>(), cost =>
        {
            foreach (var v in new[] { 0, 1, Height / 2, Height - 1 })
            {
                var plain = new float[Width * Range.Count];
                new WindowCostRows(cost, pair).Row(v, Range, plain);
                var row = Row(cost, pair, v, Range);
                for (var i = 0; i < row.Length; i++)
                {
                    Assert.True(plain[i] == row[i] || Math.Abs(plain[i] - row[i]) < 1e-5 * (1 + Math.Abs(plain[i])), $"{cost}, row {v}, entry {i}: {row[i]} is not {plain[i]}");
                }
            }
        });
    }

    [Fact]
    public void Absolute_difference_and_its_limit()
    {
        var pair = TestPairs.Pair(3, 1, (u, _) => new[] { 10, 50, 200 }[u], (u, _) => new[] { 13, 40, 100 }[u]);
        Assert.Equal([3, 10, 100], Row(Cost.AbsoluteDifference(), pair, 0, new(0, 0)));
        Assert.Equal([3, 10, 25], Row(Cost.AbsoluteDifference(25), pair, 0, new(0, 0)));
        Assert.Equal([float.PositiveInfinity, 37, 160], Row(Cost.AbsoluteDifference(), pair, 0, new(1, 1)));
        Assert.Equal([30, 50, float.PositiveInfinity], Row(Cost.AbsoluteDifference(), pair, 0, new(-1, -1)));
    }

    [Fact]
    public void The_sampling_insensitive_difference_measures_to_the_interval_of_half_a_pixel()
    {
        // Left 10 20 60, right 16 40 44. Middle: right interval 28 … 42 (half way to 16 and to 44), left interval 15 … 40. The left 20 is 8 below
        // the right interval; the right 40 lies in the left interval, so the smaller distance is 0.
        var pair = TestPairs.Pair(3, 1, (u, _) => new[] { 10, 20, 60 }[u], (u, _) => new[] { 16, 40, 44 }[u]);
        Assert.Equal(0, Row(Cost.SamplingInsensitiveDifference(), pair, 0, new(0, 0))[1]);

        // First: left 10 against the right interval 16 … 28 is 6; right 16 against the left interval 10 … 15 is 1.
        Assert.Equal(1, Row(Cost.SamplingInsensitiveDifference(), pair, 0, new(0, 0))[0]);

        // Last against last: left 60 against 42 … 44 is 16; right 44 against 40 … 60 is 0. Last against middle: 60 against 28 … 42 is 18, 40 against 40 … 60 is 0.
        // Middle against first: 20 against 16 … 28 is 0. Last against first: 60 against 16 … 28 is 32; 16 against 40 … 60 is 24.
        Assert.Equal([1, 0, 0], Row(Cost.SamplingInsensitiveDifference(), pair, 0, new(0, 0)));
        Assert.Equal([float.PositiveInfinity, 0, 0], Row(Cost.SamplingInsensitiveDifference(), pair, 0, new(1, 1)));
        Assert.Equal(24, Row(Cost.SamplingInsensitiveDifference(), pair, 0, new(2, 2))[2]);
        Assert.Equal(9, Row(Cost.SamplingInsensitiveDifference(9), pair, 0, new(2, 2))[2]);
    }

    // The property for which it was published: a picture sampled half a pixel off costs nothing where levels change linearly.
    [Fact]
    public void The_sampling_insensitive_difference_does_not_see_a_shift_of_half_a_pixel()
    {
        var pair = TestPairs.Pair(30, 4, (u, _) => 6 * u, (u, _) => 6 * u + 3);
        Assert.All(Row(Cost.SamplingInsensitiveDifference(), pair, 2, new(0, 0))[1..^1], cost => Assert.Equal(0, cost));
        Assert.All(Row(Cost.AbsoluteDifference(), pair, 2, new(0, 0)), cost => Assert.Equal(3, cost));
    }

    [Fact]
    public void Zero_mean_sad_by_hand()
    {
        // Left window 1 … 9, mean 5; right window 0 but for a 9 at the end, mean 1: |−4+1| + |−3+1| + |−2+1| + |−1+1| + 1 + 2 + 3 + 4 + |4−8| = 20.
        var cost = (WindowCost)Cost.ZeroMeanSad(3);
        Assert.Equal(20 / 9.0, cost.Compare([1, 2, 3, 4, 5, 6, 7, 8, 9], [0, 0, 0, 0, 0, 0, 0, 0, 9]), 1e-12);
    }

    [Fact]
    public void Rank_counts_the_darker_pixels_of_the_window()
    {
        // Five darker than the middle 50 on the left, two on the right.
        var cost = (WindowCost)Cost.Rank(3);
        Assert.Equal(3, cost.Compare([10, 20, 30, 40, 50, 49, 50, 80, 90], [90, 51, 52, 10, 50, 20, 60, 70, 80]));
    }

    [Fact]
    public void Centre_symmetric_census_compares_what_lies_opposite()
    {
        // Opposite pairs, first darker than second: left 1<9 yes, 2<8 yes, 3<7 yes, 4<6 yes; right 9<1 no, 2<8 yes, 3<7 yes, 6<4 no.
        var cost = (WindowCost)Cost.CentreSymmetricCensus(3, 3);
        Assert.Equal(2, cost.Compare([1, 2, 3, 4, 5, 6, 7, 8, 9], [9, 2, 3, 6, 5, 4, 7, 8, 1]));
    }

    [Fact]
    public void Gradient_adds_the_differences_across_and_down()
    {
        // Left at the middle: across (60 − 40) / 2 = 10, down (80 − 20) / 2 = 30. Right: across (70 − 10) / 2 = 30, down (50 − 30) / 2 = 10.
        int[] left = [0, 20, 0, 40, 99, 60, 0, 80, 0];
        int[] right = [0, 30, 0, 10, 7, 70, 0, 50, 0];
        var pair = TestPairs.Pair(3, 3, (u, v) => left[3 * v + u], (u, v) => right[3 * v + u]);
        Assert.Equal(20 + 20, Row(Cost.Gradient(), pair, 1, new(0, 0))[1]);
        Assert.Equal(15, Row(Cost.Gradient(15), pair, 1, new(0, 0))[1]);

        // Rhemann et al.: 0.25 · min(|99 − 7|, 8) + 0.75 · min(|10 − 30|, 12).
        Assert.Equal(0.25f * 8 + 0.75f * 12, Row(Cost.DifferenceAndGradient(0.75, 8, 12), pair, 1, new(0, 0))[1]);
    }

    [Fact]
    public void Ad_census_adds_two_bent_costs()
    {
        var pair = Noise(8, seed: 9);
        var census = Row(Cost.Census(9, 7), pair, 6, Range);
        var difference = Row(Cost.AbsoluteDifference(), pair, 6, Range);
        var both = Row(Cost.AdCensus(censusScale: 30, differenceScale: 10), pair, 6, Range);

        // Mei et al. 2011, equations 2 and 3.
        var expected = census.Zip(difference, (c, a) => float.IsFinite(c) ? (float)(2 - Math.Exp(-c / 30) - Math.Exp(-a / 10)) : float.PositiveInfinity);
        Assert.All(expected.Zip(both), pairing => Assert.True(pairing.First == pairing.Second || Math.Abs(pairing.First - pairing.Second) < 1e-6));
    }

    [Theory]
    [InlineData(8)]
    [InlineData(12)]
    [InlineData(16)]
    public void The_lowest_bit_of_a_level_counts(int bits)
    {
        var step = 1f / (1 << (bits - 8));
        var top = (1 << bits) - 1;
        var pair = TestPairs.Pair(12, 9, (u, v) => top, (u, v) => top - 1, bits);
        Assert.Equal(step, Row(Cost.AbsoluteDifference(), pair, 4, new(0, 0))[6]);
        Assert.Equal(step * step, Row(Cost.Ssd(5), pair, 4, new(0, 0))[6]);
        Assert.Equal((float)(1 - Math.Exp(-step / 10)), Row(Cost.AdCensus(), pair, 4, new(0, 0))[6]);

        var bump = TestPairs.Pair(12, 9, (u, v) => top - (u % 2), (u, v) => top - (v % 2), bits);
        Assert.Equal(step, Row(Cost.Gradient(), TestPairs.Pair(12, 9, (u, v) => top - (u > 5 ? 2 : u > 4 ? 1 : 0), (u, v) => top, bits), 4, new(0, 0))[5]);
        Assert.True(Row(Cost.Zncc(5), bump, 4, new(0, 0))[6] > 0.5);
        Assert.True(Row(Cost.ZeroMeanSad(5), bump, 4, new(0, 0))[6] > 0.4 * step);
        Assert.Equal(10, Row(Cost.Rank(5), TestPairs.Pair(12, 9, (u, v) => top - (u % 2), (u, v) => top, bits), 4, new(0, 0))[6]);
        Assert.True(Row(Cost.CentreSymmetricCensus(5, 5), TestPairs.Pair(12, 9, (u, v) => top - (u > 6 ? 1 : 0), (u, v) => top, bits), 4, new(0, 0))[6] > 0);
    }

    [Fact]
    public void Costs_do_not_see_what_they_are_made_not_to_see()
    {
        var levels = new Random(4).GetItems(Enumerable.Range(0, 1000).ToArray(), Width * Height);
        RectifiedPair Changed(int gain, int offset) => TestPairs.Pair(
            Width, Height, (u, v) => levels[v * Width + u], (u, v) => gain * levels[v * Width + u] + offset, bits: 12);
        var (gain, offset, both) = (Changed(3, 0), Changed(1, 500), Changed(3, 700));
        Cost[] blindToBoth = [Cost.Census(5, 5), Cost.Census(9, 7), Cost.CentreSymmetricCensus(), Cost.Rank(), Cost.Zncc()];
        Cost[] blindToGain = [.. blindToBoth, Cost.Ncc()];
        Cost[] blindToOffset = [.. blindToBoth, Cost.ZeroMeanSad(), Cost.Gradient()];
        Cost[] seeing = [Cost.AbsoluteDifference(), Cost.SamplingInsensitiveDifference(), Cost.Ssd(), Cost.AdCensus(), Cost.DifferenceAndGradient()];

        static float Worst(Cost cost, RectifiedPair pair) => Row(cost, pair, Height / 2, new(0, 0)).Max();
        Assert.All(blindToBoth, cost => Assert.Equal(0, Worst(cost, both), 1e-4));
        Assert.All(blindToGain, cost => Assert.Equal(0, Worst(cost, gain), 1e-4));
        Assert.All(blindToOffset, cost => Assert.Equal(0, Worst(cost, offset), 1e-4));

        // The test of the test: the others do see it.
        Assert.All(seeing, cost => Assert.True(Worst(cost, both) > 0.1));
        Assert.True(Worst(Cost.Ncc(), offset) > 1e-3);
        Assert.All([Cost.ZeroMeanSad(), Cost.Gradient()], cost => Assert.True(Worst(cost, gain) > 0.1));
    }

    [Fact]
    public void No_cost_compares_what_is_masked_or_outside()
    {
        var noise = Noise(8, seed: 2);
        var mask = Mask.From(new(Width, Height), (u, v) => (u, v) != (10, 6));
        var pair = new RectifiedPair(noise.Left.WithUsable(mask), noise.Right.WithUsable(mask));
        Cost[] costs =
        [
            Cost.AbsoluteDifference(), Cost.SamplingInsensitiveDifference(), Cost.ZeroMeanSad(), Cost.Ssd(), Cost.Ncc(), Cost.Zncc(), Cost.Census(), Cost.CentreSymmetricCensus(),
            Cost.Rank(), Cost.Gradient(), Cost.DifferenceAndGradient(), Cost.AdCensus(), Cost.FromPixels((l, r) => 1), Cost.FromRows((l, r, c) => c.Fill(1)),
        ];
        Assert.All(costs, cost =>
        {
            var row = Row(cost, pair, 6, Range);
            for (var i = 0; i < row.Length; i++)
            {
                var (u, r) = (i / Range.Count, i / Range.Count - Range.Least - i % Range.Count);
                Assert.Equal(r < 0 || r >= Width || u == 10 || r == 10, float.IsPositiveInfinity(row[i]));
            }
        });
    }

    [Fact]
    public void Settings_that_fit_no_cost_are_refused()
    {
        Action[] wrong =
        [
            () => Cost.AbsoluteDifference(0), () => Cost.Gradient(double.NaN), () => Cost.SamplingInsensitiveDifference(-1), () => Cost.Ssd(4), () => Cost.Ncc(1),
            () => Cost.Rank(2), () => Cost.ZeroMeanSad(-3), () => Cost.CentreSymmetricCensus(13, 11), () => Cost.AdCensus(0, 10), () => Cost.AdCensus(30, double.NaN),
            () => Cost.DifferenceAndGradient(1.5), () => Cost.DifferenceAndGradient(0.5, 0), () => Cost.DifferenceAndGradient(0.5, 5, double.PositiveInfinity),
        ];
        Assert.All(wrong, action => Assert.Contains("; give ", Assert.Throws<UserErrorException>(action).Message));

        var small = Noise(8, seed: 1, width: 20, height: 6);
        Cost[] larger = [Cost.Ssd(7), Cost.Ncc(7), Cost.Zncc(7), Cost.ZeroMeanSad(7), Cost.Rank(7), Cost.CentreSymmetricCensus(9, 7), Cost.AdCensus()];
        Assert.All(larger, cost => Assert.Contains("smaller than the cost's window", Assert.Throws<UserErrorException>(() => cost.Prepare(small)).Message));
    }

    private static RectifiedPair Noise(int bits, int seed, int width = Width, int height = Height)
    {
        var random = new Random(seed);
        return TestPairs.Pair(width, height, (_, _) => random.Next(1 << bits), (_, _) => random.Next(1 << bits), bits);
    }

    // On the 8-bit scale, as all costs see levels.
    private static Mat Mat(Picture picture)
    {
        var mat = new Mat(picture.Size.Height, picture.Size.Width, MatType.CV_32FC1);
        mat.SetArray(Array.ConvertAll(picture.Grey.ToArray(), level => level / (float)(1 << (picture.SignificantBits - 8))));
        return mat;
    }

    private static float[] Row(Cost cost, RectifiedPair pair, int v, DisparityRange range)
    {
        var costs = new float[pair.Size.Width * range.Count];
        cost.Prepare(pair).Row(v, range, costs);
        return costs;
    }
}
