using Pairwright.Imaging;
using Pairwright.Matching;
using Pairwright.Simulation;
using Pairwright.Tests.Matching;
using Pairwright.Trials;
using Xunit;

namespace Pairwright.Tests.Trials;

public class Maps_are_judged_without_a_truth
{
    private static readonly Recipe Recipe = Pairwright.Matching.Recipe.For(new DisparityRange(0, 20)) with { Cost = Cost.Census(5, 5) };

    [Fact]
    public void Both_ways_agree_on_dots_and_disagree_on_noise()
    {
        var dots = LeftRightAgreement.Of(TestPairs.RandomDots(120, 60, (u, _) => u is > 60 and < 90 ? 12 : 5), Recipe);
        Assert.InRange(dots.ShareWithin(0.5), 0.97, 1);
        Assert.InRange(dots.MedianPx, 0, 0.1);

        var random = new Random(3);
        var noise = TestPairs.Pair(120, 60, (_, _) => random.Next(256), (_, _) => random.Next(256));
        Assert.InRange(LeftRightAgreement.Of(noise, Recipe with { Checks = [], Filters = [] }).ShareWithin(0.5), 0, 0.6);
    }

    [Fact]
    public void A_mirrored_match_sees_masks_and_negative_disparities_where_they_are()
    {
        var pair = TestPairs.RandomDots(80, 30, (_, _) => -4);
        var mask = Mask.From(pair.Size, (u, v) => u > 9);
        var agreement = LeftRightAgreement.Of(new(pair.Left.WithUsable(mask), pair.Right), Recipe with { Range = new(-9, 3) });
        Assert.InRange(agreement.ShareWithin(0.5), 0.95, 1);
        Assert.InRange(agreement.Matched, 50 * 30, 70 * 30);
    }

    [Fact]
    public void Repeats_show_the_noise_that_was_put_in()
    {
        // Normal noise of 0.05 px over five repeats; the pooled deviation of 4 · 2400 degrees of freedom lies within 3 % with all but certainty.
        var noise = new NormalNumbers(12);
        var pair = TestPairs.RandomDots(60, 40, (_, _) => 0);
        var maps = Enumerable.Range(0, 5)
            .Select(repeat => DisparityMap.FromValues(
                pair, ScalarMap.From(pair.Size, (u, v) => u == 7 && repeat == 3 || u == 8 ? float.NaN : (float)(10 + 0.1 * u + 0.05 * noise.Next())), "test"))
            .ToArray();
        var agreement = RepeatAgreement.Of(maps);
        Assert.Equal((5, 58 * 40, 40), (agreement.Repeats, agreement.AlwaysMeasured, agreement.SometimesMeasured));
        Assert.InRange(agreement.PooledDeviationPx, 0.97 * 0.05, 1.03 * 0.05);

        // The median of χ over four degrees of freedom, √(3.357 / 4) = 0.916, from tables of χ².
        Assert.InRange(agreement.MedianDeviationPx, 0.95 * 0.916 * 0.05, 1.05 * 0.916 * 0.05);
        Assert.True(float.IsNaN(agreement.DeviationPx[7, 5]));
        Assert.Contains("at least two", Assert.Throws<UserErrorException>(() => RepeatAgreement.Of([maps[0]])).Message);
    }

    [Fact]
    public void The_photometric_residual_of_the_truth_is_the_noise_and_takes_gain_and_offset_out()
    {
        var (pair, truth) = Plane();
        var right = DisparityMap.FromValues(pair, truth, "truth");
        var residual = PhotometricResidual.Of(right);
        Assert.Equal(1 / 0.9, residual.Gain, 0.02);

        // A texture several pixels wide leaves nothing to aliasing. EMVA 1288: shot and dark noise of both pictures at the mean exposure; interpolation takes some of the right one's away.
        var sensor = Sensor;
        double Variance(double level) => sensor.SystemGain * sensor.SystemGain * (sensor.DarkNoiseElectrons * sensor.DarkNoiseElectrons + level / sensor.SystemGain) + 1 / 12.0;
        var most = Math.Sqrt(Variance(pair.Left.MeanLevel) + residual.Gain * residual.Gain * Variance(pair.Right.MeanLevel));
        var least = Math.Sqrt(Variance(pair.Left.MeanLevel));
        Assert.InRange(residual.RmsLevels, least, 1.1 * most);

        // A pixel off leaves much more.
        var wrong = PhotometricResidual.Of(DisparityMap.FromValues(pair, truth.Select(d => d + 1), "a pixel off"));
        Assert.True(wrong.RmsLevels > 2 * residual.RmsLevels);
    }

    [Theory]
    [InlineData(0)]
    [InlineData(1)]
    [InlineData(-1)]
    public void The_row_residual_finds_how_many_rows_a_picture_was_moved(int rows)
    {
        var (pair, truth) = Plane();
        var height = pair.Size.Height;
        var moved = TestPairs.Picture(pair.Size.Width, height, (u, v) => pair.Right[u, Math.Clamp(v - rows, 0, height - 1)]);
        var residual = RowResidual.Of(DisparityMap.FromValues(new(pair.Left, moved), truth, "truth"));
        Assert.True(residual.Count > 200);
        Assert.Equal(rows, residual.MedianPx, 0.02);
        Assert.InRange(residual.SpreadPx, 0, 0.1);
    }

    [Fact]
    public void A_plain_picture_shows_no_row_residual()
    {
        var plain = TestPairs.Pair(60, 50, (u, _) => 3 * u, (u, _) => 3 * u);
        var residual = RowResidual.Of(DisparityMap.FromValues(plain, ScalarMap.From(plain.Size, (_, _) => 0), "test"));
        Assert.Equal(0, residual.Count);
        Assert.True(double.IsNaN(residual.MedianPx) && double.IsNaN(residual.SpreadPx));
    }

    private static Sensor Sensor { get; } = new(8, 10_000, 10);

    private static ShootingConditions Conditions { get; } = new() { LeftExposure = 0.9, RightExposure = 0.81, Sensor = Sensor };

    private static (RectifiedPair Pair, ScalarMap Truth) Plane()
    {
        var rig = SimulatedRig.SideBySide(new(240, 180), 300, 60);
        var capture = Scene.SlantedPlane(1000, yawDegrees: 20, texture: Texture.Speckle(25)).Shoot(rig, 3, Conditions);
        var rectification = SimulatedRig.Unturned(rig);
        return (capture.Pair.Rectify(rectification), capture.Truth(rectification).Disparity);
    }
}
