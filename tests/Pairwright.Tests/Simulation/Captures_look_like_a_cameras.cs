using Pairwright.Geometry;
using Pairwright.Imaging;
using Pairwright.Simulation;
using Xunit;

namespace Pairwright.Tests.Simulation;

public class Captures_look_like_a_cameras
{
    /// <summary>
    /// Outside reference: EMVA Standard 1288, the photon transfer method: over exposures the variance of a flat field grows by the system gain K
    /// for each digital number of mean, from a dark variance of K²·σ_d² + 1/12.
    /// </summary>
    [Fact]
    public void The_variance_of_a_flat_field_follows_the_photon_transfer_line()
    {
        var sensor = new Sensor(bits: 12, fullWellElectrons: 10_000, darkNoiseElectrons: 12, blackLevel: 64);
        var flat = new Scene([new("wall", new Plate(1e5, 1e5), Texture.Plain(0.5), new(Matrix3x3.Identity, new(0, 0, 1000)))], [new(new(0, 0, -1), 0.7)], 0.3);
        foreach (var exposure in new[] { 0.02, 0.1, 0.5, 1.0, 1.6 })
        {
            var picture = flat.Shoot(Scenes.Parallel, 5, new() { RaysAcrossPixel = 1, LeftExposure = exposure, Sensor = sensor }).Pair.Left;
            var levels = picture.Grey.ToArray().Select(level => (double)level).ToArray();
            var mean = levels.Average();
            var variance = levels.Sum(level => (level - mean) * (level - mean)) / (levels.Length - 1);
            var electrons = exposure * 0.5 * sensor.FullWellElectrons;
            var k = sensor.SystemGain;
            var expected = k * k * (sensor.DarkNoiseElectrons * sensor.DarkNoiseElectrons + electrons) + 1.0 / 12;

            // Four standard deviations of a mean and of a variance of n normal numbers: one false alarm in some 1,600 of these ten checks.
            Assert.Equal(sensor.BlackLevel + k * electrons, mean, 4 * Math.Sqrt(expected / levels.Length));
            Assert.Equal(1, variance / expected, 4 * Math.Sqrt(2.0 / levels.Length));
        }
    }

    [Fact]
    public void Both_cameras_see_the_same_texture_at_the_same_surface_point()
    {
        var rectification = SimulatedRig.Unturned(Scenes.Parallel);
        var scene = Scene.SlantedPlane(1000, 15, -10, Texture.Speckle(25));
        var capture = scene.Shoot(Scenes.Parallel, 1, new() { RaysAcrossPixel = 3, BlurSigmaPx = 1, Sensor = new(bits: 16, fullWellElectrons: 1e7, darkNoiseElectrons: 0) });
        var truth = capture.Truth(rectification);
        var (left, right) = (capture.Pair.Left, capture.Pair.Right);
        var differences = new List<double>();
        for (var v = 5; v < 145; v++)
        {
            for (var u = 5; u < 195; u++)
            {
                var column = u - truth.Disparity[u, v];
                if (truth.VisibleInBoth[u, v] && column is > 2 and < 196)
                {
                    var share = column - (int)column;
                    differences.Add(left[u, v] - ((1 - share) * right[(int)column, v] + share * right[(int)column + 1, v]));
                }
            }
        }

        // What is left is the foreshortening of a slant and linear interpolation, small against the contrast.
        var rms = Math.Sqrt(differences.Sum(d => d * d) / differences.Count);
        Assert.True(differences.Count > 10_000);
        Assert.True(rms < 0.1 * left.Contrast, $"the pictures differ by {rms:0} levels RMS with a contrast of {left.Contrast:0}");
    }

    [Fact]
    public void A_capture_is_the_same_on_any_number_of_threads()
    {
        var one = Scenes.Planks.Shoot(Scenes.Verged, 3, new() { Threads = 1 }).Pair;
        var three = Scenes.Planks.Shoot(Scenes.Verged, 3, new() { Threads = 3 }).Pair;

        Assert.True(one.Left.Grey.SequenceEqual(three.Left.Grey));
        Assert.True(one.Right.Grey.SequenceEqual(three.Right.Grey));
        Assert.False(one.Left.Grey.SequenceEqual(Scenes.Planks.Shoot(Scenes.Verged, 4).Pair.Left.Grey), "another seed must give other noise");
    }

    [Fact]
    public void A_darker_right_camera_is_warned_of()
    {
        var pair = Scenes.BoxAndBall.Shoot(Scenes.Parallel, 1, new() { RightExposure = 0.5 }).Pair;

        Assert.Contains(pair.Warnings, warning => warning.Contains("exposure", StringComparison.OrdinalIgnoreCase) || warning.Contains("bright", StringComparison.OrdinalIgnoreCase));
    }
}
