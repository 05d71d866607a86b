using Pairwright.Geometry;
using Pairwright.Imaging;
using Pairwright.Simulation;
using Pairwright.Tests.Matching;
using Xunit;

namespace Pairwright.Tests.Imaging;

public class Noise_is_found_in_one_picture
{
    // Right within 8 %, as it says; the mean over the quietest tenth of 300 blocks scatters by about 1 %.
    [Theory]
    [InlineData(1.0)]
    [InlineData(3.0)]
    [InlineData(8.0)]
    public void White_noise_on_a_slope_with_straight_edges(double sigma)
    {
        var noise = new NormalNumbers(5);
        var picture = TestPairs.Picture(
            320, 256, (u, v) => (int)Math.Round(1500 + 2 * u + 3 * v + (u > 150 ? 400 : 0) + sigma * noise.Next()), bits: 12);
        var rounded = Math.Sqrt(sigma * sigma + 1 / 12.0);
        Assert.InRange(PictureNoise.Of(picture).SigmaLevels, 0.9 * rounded, 1.1 * rounded);
    }

    [Fact]
    public void The_sensors_noise_where_a_part_of_the_scene_is_calm()
    {
        // A speckled ground with a plain box before it: EMVA 1288 tells the variance at the box's level.
        var rig = SimulatedRig.SideBySide(new(320, 240), 400, 60);
        var sensor = new Sensor(8, 5000, 12);
        var box = new SceneObject("box", new Box(260, 180, 40), Texture.Plain(0.5), new(Matrix3x3.Identity, new(0, 0, 900)));
        var scene = new Scene([.. Scene.SlantedPlane(1000).Objects, box]);
        var left = scene.Shoot(rig, 2, new() { Sensor = sensor }).Pair.Left;
        var level = Enumerable.Range(150, 20).Average(u => (double)left[u, 120]);
        var expected = Math.Sqrt(
            sensor.SystemGain * sensor.SystemGain * (sensor.DarkNoiseElectrons * sensor.DarkNoiseElectrons + (level - sensor.BlackLevel) / sensor.SystemGain) + 1 / 12.0);
        Assert.InRange(PictureNoise.Of(left).SigmaLevels, 0.88 * expected, 1.12 * expected);
    }

    [Fact]
    public void A_picture_without_noise_has_that_of_rounding() =>
        Assert.Equal(1 / Math.Sqrt(12), PictureNoise.Of(TestPairs.Picture(100, 80, (u, v) => 100)).SigmaLevels, 12);

    [Fact]
    public void A_small_picture_is_taken_whole_and_what_is_not_usable_left_out()
    {
        var noise = new NormalNumbers(3);
        var picture = TestPairs.Picture(60, 40, (u, v) => (int)Math.Round(900 + 5 * noise.Next()), bits: 12);
        Assert.InRange(PictureNoise.Of(picture).SigmaLevels, 4.3, 5.7);
        Assert.Equal(1 / Math.Sqrt(12), PictureNoise.Of(picture.WithUsable(Mask.From(picture.Size, (_, _) => false))).SigmaLevels, 12);
    }
}
