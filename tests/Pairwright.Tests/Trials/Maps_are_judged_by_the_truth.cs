using Pairwright.Geometry;
using Pairwright.Imaging;
using Pairwright.Matching;
using Pairwright.Simulation;
using Pairwright.Tests.Imaging;
using Pairwright.Tests.Matching;
using Pairwright.Trials;
using Xunit;

namespace Pairwright.Tests.Trials;

public class Maps_are_judged_by_the_truth
{
    private const float None = float.NaN;

    [Fact]
    public void Shares_means_and_quantiles_by_hand()
    {
        // Errors 0, 0.5, −1, 1.5, 3 and one missing; one pixel has no truth.
        var accuracy = Judge([10, 10.5f, 9, 11.5f, 13, None, 42], [10, 10, 10, 10, 10, 10, None]);
        var all = accuracy[TruthRegion.All];
        Assert.Equal((6, 5), (all.Pixels, all.Matched));
        Assert.Equal(5 / 6.0, all.MatchedShare, 12);
        Assert.Equal(4 / 5.0, all.MeanPx, 6);
        Assert.Equal(6 / 5.0, all.MeanAbsolutePx, 6);
        Assert.Equal(Math.Sqrt((0.25 + 1 + 2.25 + 9) / 5), all.RmsPx, 6);
        Assert.Equal([3 / 5.0, 2 / 5.0, 1 / 5.0, 0], new[] { 0.5, 1, 2, 4 }.Select(all.ShareBeyond));
        Assert.Equal([4 / 6.0, 3 / 6.0, 2 / 6.0, 1 / 6.0], new[] { 0.5, 1, 2, 4 }.Select(all.ShareBeyondOrMissing));
        Assert.Equal([0, 1, 3], new[] { 0, 0.5, 1 }.Select(all.Quantile));
    }

    [Fact]
    public void Whole_truth_judges_nothing_below_a_pixel()
    {
        var pair = Pair(3);
        var map = DisparityMap.FromValues(pair, Row(10, 11, 12.5f), "test");
        var truth = new DisparityTruth(Row(10, 10, 10), resolutionPx: 1);
        var all = DisparityAccuracy.Of(map, truth)[TruthRegion.All];
        Assert.True(double.IsNaN(all.ShareBeyond(0.5)) && double.IsNaN(all.ShareBeyondOrMissing(0.99)));
        Assert.Equal(1 / 3.0, all.ShareBeyond(1), 12);
        Assert.Contains("steps of 1 px", Refusal(() => DisparityAccuracy.Of(map, truth).DensityCurve(0.5)));
    }

    [Fact]
    public void What_is_hidden_behind_something_nearer_or_beside_the_right_picture_is_occluded()
    {
        // A bar of disparity 6 at columns 10 to 13 on ground of 2: it covers right columns 4 to 7, where ground columns 6 to 9 would be.
        // The ground's columns 0 and 1 lie beside the right picture.
        var truth = new DisparityTruth(ScalarMap.From(new(20, 1), (u, _) => u is >= 10 and <= 13 ? 6 : 2));
        Assert.Equal([0, 1, 6, 7, 8, 9], Enumerable.Range(0, 20).Where(u => truth.Occluded[u, 0]));

        // A jump lies between 9 and 10 and between 13 and 14; four pixels either way are near it.
        Assert.Equal(Enumerable.Range(5, 14), Enumerable.Range(0, 20).Where(u => truth.NearDepthEdges[u, 0]));
    }

    [Fact]
    public void Occlusions_told_from_the_truth_alone_are_those_of_the_ray_caster()
    {
        var rig = SimulatedRig.SideBySide(new(320, 240), 400, 90);
        var scene = Scene.BoxAndBall(1000);
        var exact = scene.Truth(SimulatedRig.Unturned(rig));
        var told = new DisparityTruth(exact.Disparity).Occluded;
        var cast = DisparityTruth.Of(exact).Occluded;
        var (both, either) = (0, 0);
        for (var i = 0; i < told.Usable.Length; i++)
        {
            both += told.Usable[i] && cast.Usable[i] ? 1 : 0;
            either += told.Usable[i] || cast.Usable[i] ? 1 : 0;
        }

        // They differ only along the edges, by less than a pixel.
        Assert.True(either > 2000);
        Assert.InRange(both / (double)either, 0.9, 1);
    }

    [Fact]
    public void Plain_pixels_have_no_gradient_along_the_row()
    {
        // No gradient along the row up to column 8; from column 9 on there is one of ten levels at every pixel. Column 8 has one beside it.
        var left = TestPairs.Picture(20, 5, (u, v) => u < 10 ? 100 + 20 * v : u / 2 % 2 == 0 ? 100 : 120);
        var pair = new RectifiedPair(left, left);
        var truth = new DisparityTruth(ScalarMap.From(new(20, 5), (_, _) => 1), Mask.From(new(20, 5), (u, v) => u == 3));
        var plain = truth.Region(TruthRegion.Plain, pair.Left);
        Assert.Equal(Enumerable.Range(0, 8).Where(u => u != 3), Enumerable.Range(0, 20).Where(u => plain[u, 2]));
    }

    [Fact]
    public void Regions_are_parts_of_the_whole()
    {
        var accuracy = Judge([.. Enumerable.Repeat(2f, 30)], [.. Enumerable.Range(0, 30).Select(u => u is >= 10 and < 15 ? 8f : 2f)]);
        var (all, seen) = (accuracy[TruthRegion.All], accuracy[TruthRegion.Unoccluded]);
        Assert.Equal(30, all.Pixels);
        // Beside the right picture lie two columns; the bar of five covers five of the ground.
        Assert.Equal(30 - 2 - 5, seen.Pixels);
        Assert.Equal(5, (int)Math.Round(all.ShareBeyond(1) * 30));
        Assert.True(accuracy[TruthRegion.NearDepthEdges].Pixels < seen.Pixels);
        Assert.True(accuracy[TruthRegion.NearDepthEdges].ShareBeyond(1) > seen.ShareBeyond(1));
    }

    [Fact]
    public void Filled_values_count_only_when_asked_for()
    {
        var pair = TestPairs.RandomDots(40, 20, (_, _) => 3);
        var map = pair.Match(Recipe.For(new DisparityRange(0, 8)) with
        {
            Checks = [],
            Filters = [Filter.FromMap(map =>
            {
                map.Labels[..400].Fill(DisparityLabel.Filled);
                map.Disparity[..400].Fill(77);
            })],
        });
        var truth = new DisparityTruth(ScalarMap.From(pair.Size, (_, _) => 3));
        var measured = DisparityAccuracy.Of(map, truth)[TruthRegion.All];
        var filled = DisparityAccuracy.Of(map, truth, withFilled: true)[TruthRegion.All];
        Assert.True(measured.MatchedShare <= 0.5);
        Assert.Equal(measured.Matched + 400, filled.Matched);
        Assert.Equal(400, (int)Math.Round(filled.ShareBeyond(10) * filled.Matched));
    }

    [Fact]
    public void Error_against_density_by_hand()
    {
        // Confidence falls from pixel to pixel; the second and the fourth are wrong, the fifth is missing.
        var accuracy = Judge([10, 15, 10, 15, None], [10, 10, 10, 10, 10], [0.9f, 0.8f, 0.7f, 0.6f, None]);
        var curve = accuracy.DensityCurve(1);
        Assert.Equal([0, 1 / 2.0, 1 / 3.0, 2 / 4.0, 3 / 5.0], new[] { 0.2, 0.4, 0.6, 0.8, 1 }.Select(curve.WrongShareAt), (a, b) => Math.Abs(a - b) < 1e-9);
        Assert.Equal(0.8, curve.MatchedShare, 12);

        // Between two pixels the count of wrong ones grows in proportion: half of the second one at 0.3.
        Assert.Equal(0.5 / 1.5, curve.WrongShareAt(0.3), 9);

        // The area piece by piece: within a right pixel the share is w·0.2/x, within a wrong one 1 − (k − w)·0.2/x.
        var area = 0.0
            + (0.2 - 0.2 * Math.Log(2))
            + 0.2 * Math.Log(1.5)
            + (0.2 - 0.4 * Math.Log(4 / 3.0))
            + (0.2 - 0.4 * Math.Log(5 / 4.0));
        Assert.Equal(area, curve.Area, 9);
        Assert.Equal(0.6 + 0.4 * Math.Log(0.4), curve.OptimalArea, 9);
        Assert.True(curve.OptimalArea < curve.Area);
    }

    [Fact]
    public void A_confidence_that_knows_the_errors_reaches_the_optimal_area_and_one_that_says_nothing_the_mean()
    {
        var random = new Random(8);
        var values = Enumerable.Range(0, 5000).Select(_ => random.NextDouble() < 0.2 ? 15f : 10f).ToArray();
        var truth = Enumerable.Repeat(10f, 5000).ToArray();
        var knowing = Judge(values, truth, Array.ConvertAll(values, value => value == 10 ? 1 - 1e-6f * random.Next(1000) : 1e-6f * random.Next(1000))).DensityCurve(1);
        var silent = Judge(values, truth, Array.ConvertAll(values, _ => 0.5f)).DensityCurve(1);
        Assert.Equal(knowing.OptimalArea, knowing.Area, 3);
        Assert.Equal(silent.WrongShareAt(1), silent.Area, 9);
        Assert.Equal(silent.WrongShareAt(1), silent.WrongShareAt(0.1), 9);
    }

    [Theory]
    [InlineData("truth.pfm")]
    [InlineData("truth.tif")]
    [InlineData("truth.png")]
    public void Truth_is_read_from_the_usual_files(string name)
    {
        using var folder = new TestFolder();
        var map = ScalarMap.From(new(9, 4), (u, v) => u == 2 ? None : 5 + u + v / 4f);
        MapFile.Write(map, folder.Path(name));
        var truth = DisparityTruth.Read(folder.Path(name));
        Assert.Equal(map.Values.ToArray(), truth.Disparity.Values.ToArray());
        Assert.Equal(name.EndsWith("png") ? 1 / 256.0 : 0, truth.ResolutionPx);
        Assert.Single(truth.Provenance.Inputs);
    }

    [Fact]
    public void Truth_in_8_bits_needs_its_scale()
    {
        using var folder = new TestFolder();
        var path = folder.Path("truth.png");
        TestPairs.Picture(9, 4, (u, v) => u == 2 ? 0 : 4 * (5 + u)).WritePng(path);
        Assert.Contains("how many levels make one pixel", Refusal(() => DisparityTruth.Read(path)));
        var truth = DisparityTruth.Read(path, levelsPerPixel: 4);
        Assert.Equal(5 + 7, truth.Disparity[7, 1]);
        Assert.True(float.IsNaN(truth.Disparity[2, 1]));
        Assert.Equal(0.25, truth.ResolutionPx);
    }

    [SkippableFact]
    public void OpenCVs_match_of_a_real_pair_is_judged_as_when_it_was_measured_elsewhere()
    {
        // A stripe of Aloe, counted plainly: pixels with truth, matched, and those off by more than one pixel.
        var aloe = AloePair.Read(first: 500, count: 60);
        var values = aloe.OpenCv(240);
        var map = DisparityMap.FromValues(aloe.Pair, new ScalarMap(aloe.Pair.Size, values), "OpenCV");
        var truth = new DisparityTruth(new ScalarMap(aloe.Pair.Size, Array.ConvertAll(aloe.Truth, d => d == 0 ? None : d)), resolutionPx: 1);
        var all = DisparityAccuracy.Of(map, truth)[TruthRegion.All];
        var shares = aloe.SharesOf(values);
        Assert.Equal(shares.NoMatch, 100 * (1 - all.MatchedShare), 6);
        Assert.Equal(shares.MatchedBeyondOne, 100 * all.ShareBeyond(1), 6);
        Assert.Equal(shares.AllBeyondTwo, 100 * all.ShareBeyondOrMissing(2), 6);
    }

    [Fact]
    public void What_does_not_fit_is_refused()
    {
        Assert.Contains("fit", Refusal(() => new DisparityTruth(Row(1, 2), Mask.From(new(3, 1), (_, _) => true))));
        Assert.Contains("No pixel", Refusal(() => new DisparityTruth(Row(None, None))));
        Assert.Contains("resolution", Refusal(() => new DisparityTruth(Row(1, 2), resolutionPx: -1)));
        Assert.Contains("do not fit", Refusal(() => DisparityAccuracy.Of(DisparityMap.FromValues(Pair(3), Row(1, 2, 3), "test"), new DisparityTruth(Row(1, 2)))));
    }

    private static DisparityAccuracy Judge(float[] values, float[] truth, float[]? confidence = null)
    {
        var pair = Pair(values.Length);
        var map = DisparityMap.FromValues(pair, Row(values), "test", confidence is null ? null : Row(confidence));
        return DisparityAccuracy.Of(map, new DisparityTruth(Row(truth)));
    }

    private static RectifiedPair Pair(int width) => TestPairs.Pair(width, 1, (u, _) => 50 * u % 251, (u, _) => 50 * u % 251);

    private static ScalarMap Row(params float[] values) => new(new(values.Length, 1), values);

    private static string Refusal(Func<object> action) => Assert.Throws<UserErrorException>(action).Message;
}
