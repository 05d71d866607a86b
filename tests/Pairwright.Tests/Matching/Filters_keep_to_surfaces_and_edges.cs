using Pairwright.Imaging;
using Pairwright.Matching;
using Pairwright.Simulation;
using Pairwright.Trials;
using Xunit;

namespace Pairwright.Tests.Matching;

public class Filters_keep_to_surfaces_and_edges
{
    private const DisparityLabel M = DisparityLabel.Measured;

    [Fact]
    public void The_weighted_median_takes_the_side_of_the_edge_that_a_pixel_is_on()
    {
        // Dark left of column 10, bright right of it; the disparity's edge was matched a column too far to the left.
        var map = Map(20, 15, (u, _) => u < 10 ? 50 : 200, (u, _) => u < 9 ? 3 : 9);
        Filter.WeightedMedian(9, 12).Apply(map, default);
        for (var v = 0; v < 15; v++)
        {
            Assert.Equal([3, 3, 9, 9], new[] { 8, 9, 10, 11 }.Select(u => map.Disparity[v * 20 + u]));
        }
    }

    [Fact]
    public void The_weighted_median_of_one_grey_is_the_median_that_a_sort_gives()
    {
        var random = new Random(6);
        for (var trial = 0; trial < 300; trial++)
        {
            var count = random.Next(1, 40);
            var values = Enumerable.Range(0, count).Select(_ => (float)random.Next(12)).ToArray();
            var weights = Enumerable.Range(0, count).Select(_ => (float)random.Next(1, 9)).ToArray();
            var sum = 0f;
            var expected = values.Zip(weights).OrderBy(pair => pair.First).First(pair => 2 * (sum += pair.Second) >= weights.Sum()).First;
            Assert.Equal(expected, WeightedSelection.Median(values.ToArray(), weights.ToArray()));
        }

        Assert.True(float.IsNaN(WeightedSelection.Median([], [])));
    }

    [Fact]
    public void Neither_median_touches_what_was_not_measured()
    {
        var map = Map(12, 9, (_, _) => 90, (u, v) => (u + v) % 3 == 0 ? float.NaN : u);
        var labels = map.Labels.ToArray();
        Filter.WeightedMedian(5).Apply(map, default);
        Filter.Median.Apply(map, default);
        Assert.Equal(labels, map.Labels.ToArray());
        Assert.All(Enumerable.Range(0, labels.Length), i => Assert.Equal(labels[i] == M, !float.IsNaN(map.Disparity[i])));
    }

    [Fact]
    public void Plain_texture_is_told_from_noise()
    {
        // Noise of three levels everywhere; from column 60 on a texture of twelve.
        var (noise, texture) = (new NormalNumbers(1), new Random(2));
        var map = Map(120, 60, (u, _) => (int)Math.Round(120 + 3 * noise.Next() + (u >= 60 ? 40 * (texture.NextDouble() - 0.5) : 0)), (_, _) => 5);
        Filter.PlainTexture(9, 1.5).Apply(map, default);
        double Share(int first, int end) => Enumerable.Range(0, 60).SelectMany(v => Enumerable.Range(first, end - first).Select(u => v * 120 + u))
            .Average(i => map.LabelArray[i] == M ? 1.0 : 0);
        Assert.InRange(Share(0, 54), 0, 0.02);
        Assert.InRange(Share(66, 120), 0.98, 1);
        Assert.All(Enumerable.Range(0, 120 * 60), i => Assert.Equal(map.LabelArray[i] == M, !float.IsNaN(map.DisparityArray[i])));
    }

    [Fact]
    public void What_is_hidden_is_filled_from_behind_and_a_hole_in_a_surface_from_that_surface()
    {
        // A bright bar of disparity 12 from column 30 to 45 before a dark ground of 4. The ground's eight columns left of the bar are hidden;
        // in the bar and in the ground there is a hole each.
        bool Bar(int u) => u is >= 30 and < 46;
        var map = Map(70, 30, (u, _) => Bar(u) ? 200 : 60, (u, _) => Bar(u) ? 12 : 4);
        for (var v = 0; v < 30; v++)
        {
            for (var u = 22; u < 30; u++)
            {
                Gap(map, u, v, DisparityLabel.Occluded);
            }
        }

        foreach (var (u, v) in from u in new[] { 36, 37, 38, 55, 56, 57 } from v in new[] { 10, 11, 12 } select (u, v))
        {
            Gap(map, u, v, DisparityLabel.NoMatch);
        }

        var before = map.Labels.ToArray();
        Filter.Fill.Apply(map, default);
        for (var i = 0; i < before.Length; i++)
        {
            Assert.Equal(before[i] == M ? M : DisparityLabel.Filled, map.LabelArray[i]);
            Assert.Equal(Bar(i % 70) ? 12 : 4, map.DisparityArray[i]);
        }
    }

    [Fact]
    public void Filling_leaves_alone_what_is_not_usable_and_a_map_without_any_match()
    {
        var map = Map(10, 8, (_, _) => 90, (u, _) => u < 5 ? 3 : float.NaN);
        map.LabelArray[79] = DisparityLabel.Unusable;
        Filter.Fill.Apply(map, default);
        Assert.Equal(DisparityLabel.Unusable, map.LabelArray[79]);
        Assert.Equal(3, map.DisparityArray[78]);

        var empty = Map(10, 8, (_, _) => 90, (_, _) => float.NaN);
        Filter.Fill.Apply(empty, default);
        Assert.All(empty.LabelArray, label => Assert.Equal(DisparityLabel.NoMatch, label));
    }

    [Fact]
    public void Filled_disparities_of_a_simulated_scene_are_mostly_right_and_measured_ones_are_untouched()
    {
        var rig = SimulatedRig.SideBySide(new(320, 240), 400, 90);
        var rectification = SimulatedRig.Unturned(rig);
        var capture = Scene.BoxAndBall(1000).Shoot(rig, 1);
        var truth = DisparityTruth.Of(capture.Truth(rectification));
        var pair = capture.Pair.Rectify(rectification);
        var recipe = Recipe.For(rectification.Geometry, 600, 1600) with { Filters = [Filter.Speckle(), Filter.Median] };
        var gappy = pair.Match(recipe);
        var filled = pair.Match(recipe with { Filters = [Filter.Speckle(), Filter.Median, Filter.Fill] });
        var (right, count) = (0, 0);
        for (var i = 0; i < gappy.Labels.Labels.Length; i++)
        {
            if (gappy.Labels.Labels[i] == M)
            {
                Assert.Equal((gappy.Disparity.Values[i], M), (filled.Disparity.Values[i], filled.Labels.Labels[i]));
            }
            else
            {
                count++;
                right += Math.Abs(filled.Disparity.Values[i] - truth.Disparity.Values[i]) <= 1 ? 1 : 0;
            }
        }

        Assert.True(count > 3000);
        Assert.InRange(right / (double)count, 0.75, 1);
        Assert.Equal(gappy.MatchedShare, filled.MatchedShare);
    }

    [Fact]
    public void Filters_that_are_none_are_refused()
    {
        Action[] wrong =
        [
            () => Filter.WeightedMedian(4), () => Filter.WeightedMedian(65), () => Filter.WeightedMedian(9, 0), () => Filter.PlainTexture(2), () => Filter.PlainTexture(9, double.NaN),
        ];
        Assert.All(wrong, action => Assert.Contains("; give ", Assert.Throws<UserErrorException>(action).Message));
    }

    private static WorkingMap Map(int width, int height, Func<int, int, int> level, Func<int, int, float> disparity)
    {
        var map = new WorkingMap(TestPairs.Pair(width, height, level, level), new(0, 20));
        for (var i = 0; i < map.LabelArray.Length; i++)
        {
            map.DisparityArray[i] = disparity(i % width, i / width);
            map.LabelArray[i] = float.IsNaN(map.DisparityArray[i]) ? DisparityLabel.NoMatch : M;
        }

        return map;
    }

    private static void Gap(WorkingMap map, int u, int v, DisparityLabel label) =>
        (map.LabelArray[v * map.Size.Width + u], map.DisparityArray[v * map.Size.Width + u]) = (label, float.NaN);
}
