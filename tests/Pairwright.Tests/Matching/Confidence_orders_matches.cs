using Pairwright.Imaging;
using Pairwright.Matching;
using Pairwright.Simulation;
using Pairwright.Trials;
using Xunit;

namespace Pairwright.Tests.Matching;

public class Confidence_orders_matches
{
    // One pixel with the totals of a winner-take-all: 8, 2, 5, 4, 9 at disparities 0 to 4.
    private static readonly Recipe Recipe = Pairwright.Matching.Recipe.For(new DisparityRange(0, 4)) with
    {
        Cost = new GivenCost(9, (_, _, d) => new float[] { 8, 2, 5, 4, 9 }[d]), Optimisation = Optimisation.WinnerTakesAll, Checks = [], Filters = [],
    };

    private static readonly RectifiedPair Pair = TestPairs.RandomDots(20, 3, (_, _) => 1);

    [Fact]
    public void Peak_ratio_and_curvature_by_hand()
    {
        // Lowest 2, and 4 two disparities away; beside it 8 and 5.
        Assert.Equal(1 - 2 / 4f, Match(Confidence.PeakRatio)[10, 1]);
        Assert.Equal((8 + 5 - 2 * 2) / (8 + 5f), Match(Confidence.Curvature)[10, 1]);
    }

    [Fact]
    public void Left_right_by_hand()
    {
        // Right pixel 9 is matched by left 10 at disparity 1, at a cost of 2 as everywhere. A single left pixel 12 that costs 1 at disparity 3 draws it away.
        var drawn = Recipe with { Cost = new GivenCost(9, (u, _, d) => u == 12 && d == 3 ? 1 : new float[] { 8, 2, 5, 4, 9 }[d]), Confidence = Confidence.LeftRight };
        var confidence = Pair.Match(drawn).Confidence;
        Assert.Equal(1, confidence[11, 1]);
        Assert.Equal(1, confidence[12, 1]);
        Assert.Equal(1 / (1 + 2f), confidence[10, 1]);
    }

    [Fact]
    public void A_confidence_of_ones_own()
    {
        var confidence = Match(Confidence.FromRow((row, fill) =>
        {
            for (var u = 0; u < fill.Length; u++)
            {
                fill[u] = row.Lowest[u] / 8;
            }
        }));
        Assert.Equal(2 / 8f, confidence[10, 1]);
        Assert.Contains(
            "The confidence 'row' failed", Assert.Throws<UserErrorException>(() => Match(Confidence.FromRow((row, fill) => throw new InvalidOperationException()))).Message);
    }

    [Fact]
    public void Nothing_to_compare_has_no_confidence()
    {
        var masked = new RectifiedPair(Pair.Left.WithUsable(Mask.From(Pair.Size, (u, _) => u != 10)), Pair.Right);
        Confidence[] all = [Confidence.PeakRatio, Confidence.Curvature, Confidence.LeftRight];
        Assert.All(all, each => Assert.True(float.IsNaN(masked.Match(Recipe with { Confidence = each }).Confidence[10, 1])));
    }

    // Hu and Mordohai 2012: a confidence is worth something when the area under error against density is smaller than that of no order at all.
    [Fact]
    public void Every_confidence_puts_right_matches_first()
    {
        var rig = SimulatedRig.SideBySide(new(240, 180), 300, 90);
        var rectification = SimulatedRig.Unturned(rig);
        var capture = Scene.BoxAndBall(1000).Shoot(rig, 4, new() { Sensor = new(8, 2000, 20) });
        var truth = DisparityTruth.Of(capture.Truth(rectification));
        var pair = capture.Pair.Rectify(rectification);
        var recipe = Pairwright.Matching.Recipe.For(rectification.Geometry, 600, 1600) with { Cost = Cost.Census(5, 5), Checks = [], Filters = [] };
        Assert.All([Confidence.PeakRatio, Confidence.Curvature, Confidence.LeftRight], confidence =>
        {
            var curve = DisparityAccuracy.Of(pair.Match(recipe with { Confidence = confidence }), truth).DensityCurve(1);
            Assert.InRange(curve.WrongShareAt(1), 0.1, 0.5);
            Assert.True(curve.Area < 0.75 * curve.WrongShareAt(1), $"{confidence}: {curve}");
        });
    }

    private static ScalarMap Match(Confidence confidence) => Pair.Match(Recipe with { Confidence = confidence }).Confidence;
}
