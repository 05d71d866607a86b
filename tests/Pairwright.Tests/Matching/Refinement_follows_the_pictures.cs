using Pairwright.Geometry;
using Pairwright.Imaging;
using Pairwright.Matching;
using Pairwright.Simulation;
using Xunit;

namespace Pairwright.Tests.Matching;

public class Refinement_follows_the_pictures
{
    [Theory]
    [InlineData(20, 10)]
    [InlineData(-12, -15)]
    public void Slanted_planes_are_freed_of_the_pull_towards_whole_pixels(double yaw, double pitch)
    {
        var plane = SlantedPlane.Of(Texture.Speckle(8, 3, 0.15, 0.75), yaw, pitch);
        var before = plane.Pairs[0].Match(plane.Recipe with { Filters = [Filter.Speckle(), Filter.Median] });
        var after = plane.Pairs[0].Match(plane.Recipe);

        Assert.True(plane.Pull(before).Max(Math.Abs) > 0.05, "the parabola alone is pulled, or there is nothing to show");
        Assert.All(plane.Pull(after), pull => Assert.InRange(pull, -0.01, 0.01));
        Assert.InRange(Rms(plane.Errors(after).Select(pixel => pixel.Error)), 0, 0.05);
        Assert.True(after.MatchedShare > before.MatchedShare - 0.01);
    }

    [Theory]
    [InlineData("speckle", 10_000)]
    [InlineData("speckle", 2_000)]
    [InlineData("concrete", 10_000)]
    public void Sigma_is_that_of_the_errors(string surface, double fullWell)
    {
        // 68 % of a normal distribution lie within one standard deviation and 95 % within two; the errors are correlated over windows, of which
        // there are some 200 in the picture, so that a share is known to about 3 points.
        var texture = surface == "speckle" ? Texture.Speckle(8, 4, 0.15, 0.75) : Texture.Concrete(3);
        var plane = SlantedPlane.Of(texture, conditions: SlantedPlane.Conditions with { Sensor = new(8, fullWell, 10) });
        var errors = plane.Errors(Refine(plane.Pairs[0], plane.Pulled)).ToArray();

        Assert.InRange(errors.Count(pixel => Math.Abs(pixel.Error) < pixel.Sigma) / (double)errors.Length, 0.62, 0.76);
        Assert.InRange(errors.Count(pixel => Math.Abs(pixel.Error) < 2 * pixel.Sigma) / (double)errors.Length, 0.92, 0.98);
    }

    [Fact]
    public void The_error_is_that_which_noise_and_slopes_allow()
    {
        // Sabater, Morel and Almansa 2011: the variance of a disparity is that of the noise, σ²_left + σ²_right, times Σφ²g²/(Σφg²)² over the
        // window φ with the noise-free slopes g; φ is the pyramid here. The sensor's variance is that of EMVA 1288. No resampling, no rounding.
        var rig = SimulatedRig.SideBySide(new(160, 120), 520, 90);
        var scene = Scene.SlantedPlane(1000, 0, 0, Texture.Speckle(10, 5, 0.15, 0.75));
        var sensor = new Sensor(bits: 12, fullWellElectrons: 10_000, darkNoiseElectrons: 10);
        var conditions = new ShootingConditions { LeftExposure = 0.6, RightExposure = 0.6, BlurSigmaPx = 0.8, Sensor = sensor };
        var clean = scene.Shoot(rig, 1, conditions with { Sensor = new(bits: 12, fullWellElectrons: 1e9, darkNoiseElectrons: 0) }).Pair.Left;
        var trueDisparity = 520 * 90 / 1000f;
        var maps = scene.ShootRepeats(rig, [1, 2, 3, 4, 5, 6], conditions)
            .Select(capture => Refine(new(capture.Pair.Left, capture.Pair.Right), (_, _) => trueDisparity)).ToArray();

        var (found, allowed, stated) = (0.0, 0.0, 0.0);
        for (var v = 20; v < 100; v += 3)
        {
            for (var u = 70; u < 140; u += 3)
            {
                found += maps.Average(map => Math.Pow(map.Disparity[u, v] - trueDisparity, 2));
                stated += maps.Average(map => Math.Pow(map.Sigma![u, v], 2));
                allowed += VarianceAllowed(clean, sensor, u, v);
            }
        }

        Assert.InRange(Math.Sqrt(found / allowed), 0.9, 1.25);
        Assert.InRange(Math.Sqrt(stated / found), 0.85, 1.25);
    }

    [Fact]
    public void Errors_farther_apart_than_the_correlation_length_have_little_in_common()
    {
        var plane = SlantedPlane.Of(Texture.Concrete(5), captures: 2);
        var maps = plane.Pairs.Select(pair => Refine(pair, plane.Pulled)).ToArray();
        var length = maps[0].CorrelationLengthPx;
        Assert.Equal(13, length);

        // The difference of two captures of one scene is noise alone.
        double Correlation(int apart)
        {
            var (together, alone) = (0.0, 0.0);
            for (var v = 20; v < maps[0].Size.Height - 20; v++)
            {
                for (var u = 20; u < maps[0].Size.Width - 20 - apart; u++)
                {
                    var a = maps[0].Disparity[u, v] - maps[1].Disparity[u, v];
                    var b = maps[0].Disparity[u + apart, v] - maps[1].Disparity[u + apart, v];
                    if (!float.IsNaN(a + b) && Math.Abs(a) < 1 && Math.Abs(b) < 1)
                    {
                        (together, alone) = (together + a * b, alone + a * a);
                    }
                }
            }

            return together / alone;
        }

        Assert.True(Correlation(2) > 0.5, "neighbours share their windows");
        Assert.InRange(Correlation(length), -0.15, 0.15);
        Assert.InRange(Correlation(2 * length), -0.15, 0.15);
    }

    [Fact]
    public void Exposure_and_black_level_of_the_two_cameras_may_differ()
    {
        var scene = Scene.SlantedPlane(1000, 15, 0, Texture.Speckle(8, 3, 0.15, 0.75));
        var rig = SimulatedRig.SideBySide(new(160, 120), 520, 90);
        var truth = scene.Truth(SimulatedRig.Unturned(rig)).Disparity;
        var pair = scene.Shoot(rig, 1, new() { LeftExposure = 0.8, RightExposure = 0.5, BlurSigmaPx = 0.8, Sensor = null }).Pair;
        var raised = new Picture(pair.Right.Size, [.. pair.Right.Grey.ToArray().Select(level => (ushort)(level + 20))], 8);
        var map = Refine(new(pair.Left, raised), (u, v) => truth[u, v] + 0.2f);
        for (var v = 20; v < 100; v++)
        {
            for (var u = 75; u < 140; u++)
            {
                Assert.InRange(map.Disparity[u, v] - truth[u, v], -0.06, 0.06);
            }
        }
    }

    [Fact]
    public void A_plain_surface_is_refused_even_where_a_match_was_given()
    {
        // Left half speckled, right half plain but for noise: there the pictures do not confirm anything.
        var scene = Scene.SlantedPlane(1000, texture: Texture.From(point => point.X < 0 ? Texture.Speckle(8, 3).Albedo(point) : 0.5));
        var rig = SimulatedRig.SideBySide(new(200, 100), 520, 90);
        var pair = scene.Shoot(rig, 1, SlantedPlane.Conditions).Pair;
        var map = Refine(new(pair.Left, pair.Right), (_, _) => 520 * 90 / 1000f);
        Assert.InRange(Share(60, 85), 0.99, 1);
        Assert.InRange(Share(115, 180), 0, 0.1);

        double Share(int from, int to) => Enumerable.Range(20, 60).SelectMany(v => Enumerable.Range(from, to - from).Select(u => map.Labels[u, v] == DisparityLabel.Measured ? 1.0 : 0)).Average();
    }

    [Fact]
    public void Steps_keep_their_edges()
    {
        // Two planes 3 px of disparity apart meet at a column, with three columns that the right picture does not show: nothing mixes across the edge.
        var random = new Random(3);
        var size = new PictureSize(160, 60);
        var (left, right) = (new ushort[size.Area], new ushort[size.Area]);
        for (var v = 0; v < size.Height; v++)
        {
            var noise = Smooth([.. Enumerable.Range(0, 200).Select(_ => random.NextDouble())]);
            for (var u = 0; u < size.Width; u++)
            {
                left[v * size.Width + u] = (ushort)(40 + 170 * noise[u + 20]);
                right[v * size.Width + u] = (ushort)(40 + 170 * noise[u + 20 + (u < 74 ? 4 : 7)]);
            }
        }

        var map = Refine(new(new(size, left, 8), new(size, right, 8)), (u, _) => u < 78 ? 4.2f : u < 81 ? float.NaN : 6.8f);
        for (var v = 10; v < 50; v++)
        {
            for (var u = 30; u < 130; u++)
            {
                Assert.True(u is >= 78 and < 81 || Math.Abs(map.Disparity[u, v] - (u < 80 ? 4 : 7)) < 0.05, $"{map.Disparity[u, v]} at {u}, {v}");
            }
        }
    }

    [Fact]
    public void The_noise_that_a_look_up_between_pixels_leaves_is_that_of_the_cardinal_spline()
    {
        // ∫η² from the spline through one bright pixel, 64 places a pixel.
        var levels = new ushort[41];
        levels[20] = 10_000;
        var spline = CubicSpline.Through(levels, new(41, 1));
        var energy = Enumerable.Range(0, 40 * 64).Average(i => Math.Pow(spline.At(i / 64f, 0) / 10_000, 2)) * 40;
        Assert.Equal(LeastSquaresRefinement.NoiseLeft, energy, 1e-4);
    }

    [Theory]
    [InlineData(0)]
    [InlineData(4)]
    [InlineData(11)]
    public void A_window_that_is_none_is_refused(int window) => Assert.Contains($"{window} px", Assert.Throws<UserErrorException>(() => Filter.LeastSquares(window)).Message);

    private static double Rms(IEnumerable<double> errors) => Math.Sqrt(errors.Average(error => error * error));

    private static double[] Smooth(double[] noise) => [.. noise.Select((_, i) => (noise[Math.Max(i - 1, 0)] + noise[i] + noise[Math.Min(i + 1, noise.Length - 1)]) / 3)];

    private static DisparityMap Refine(RectifiedPair pair, Func<int, int, float> start)
    {
        var map = new WorkingMap(pair, new(0, 100));
        for (var i = 0; i < map.DisparityArray.Length; i++)
        {
            map.DisparityArray[i] = start(i % pair.Size.Width, i / pair.Size.Width);
            map.LabelArray[i] = float.IsNaN(map.DisparityArray[i]) ? DisparityLabel.NoMatch : DisparityLabel.Measured;
        }

        Filter.LeastSquares().Apply(map, default);
        return new(
            pair, Recipe.For(map.Range), new(map.Size, map.DisparityArray), new(map.Size, map.ConfidenceArray), new(map.Size, map.LabelArray), default, Provenance.None, new(map.Size, map.SigmaArray!));
    }

    private static double VarianceAllowed(Picture clean, Sensor sensor, int u, int v)
    {
        var (squares, sum) = (0.0, 0.0);
        for (var y = -6; y <= 6; y++)
        {
            for (var x = -6; x <= 6; x++)
            {
                var slope = (8.0 * (clean[u + x + 1, v + y] - clean[u + x - 1, v + y]) - (clean[u + x + 2, v + y] - clean[u + x - 2, v + y])) / 12;
                var weight = (7 - Math.Abs(x)) * (7 - Math.Abs(y));
                var electrons = (clean[u + x, v + y] - sensor.BlackLevel) / sensor.SystemGain;
                var noise = sensor.SystemGain * sensor.SystemGain * (sensor.DarkNoiseElectrons * sensor.DarkNoiseElectrons + electrons) + 1.0 / 12;
                (squares, sum) = (squares + weight * weight * slope * slope * 2 * noise, sum + weight * slope * slope);
            }
        }

        return squares / (sum * sum);
    }
}
