using MathNet.Numerics.Distributions;
using MathNet.Numerics.LinearAlgebra;
using Pairwright.Geometry;
using Xunit;

namespace Pairwright.Tests.Geometry;

public sealed class TriangulationTests
{
    /// <summary>Reference: OpenCV's triangulatePoints and the points themselves, on 1,000 random rigs.</summary>
    [Fact]
    public void The_linear_method_agrees_with_OpenCV_on_exact_matches_to_1e_6()
    {
        foreach (var (rig, points) in RandomRigs.WithPoints(seed: 61))
        {
            var matches = Array.ConvertAll(points, point => Matches.Of(rig, point));
            var expected = ReferenceOpenCv.Triangulate(rig, matches);
            for (var i = 0; i < points.Length; i++)
            {
                var found = Triangulation.Linear(rig, matches[i].Left, matches[i].Right);
                Assert.InRange((found.Position - expected[i]).Norm / points[i].Norm, 0, 1e-6);
                Assert.InRange((found.Position - points[i]).Norm / points[i].Norm, 0, 1e-9);
            }
        }
    }

    [Fact]
    public void The_midpoint_of_exact_matches_is_the_point_and_the_rays_meet()
    {
        foreach (var (rig, points) in RandomRigs.WithPoints(seed: 62))
        {
            foreach (var point in points)
            {
                var match = Matches.Of(rig, point);
                var found = Triangulation.Midpoint(rig, match.Left, match.Right);
                Assert.InRange((found.Position - point).Norm / point.Norm, 0, 1e-9);
                Assert.InRange(found.RayGapMm / point.Norm, 0, 1e-9);
                Assert.True(found.InFrontOfBoth);
            }
        }
    }

    [Fact]
    public void Raw_pixels_give_the_same_point_as_the_ideal_ones_they_undistort_to()
    {
        foreach (var (rig, points) in RandomRigs.WithPoints(seed: 63, count: 200))
        {
            foreach (var point in points)
            {
                var raw = Matches.RawOf(rig, point);
                Assert.InRange((Triangulation.Linear(rig, raw.Left, raw.Right).Position - point).Norm / point.Norm, 0, 1e-8);
                Assert.InRange((Triangulation.Midpoint(rig, raw.Left, raw.Right).Position - point).Norm / point.Norm, 0, 1e-8);
            }
        }
    }

    /// <summary>Reference: the same rays through the definition, the two feet of their common perpendicular.</summary>
    [Fact]
    public void The_midpoint_of_rays_that_miss_lies_half_way_between_them()
    {
        var random = new Random(64);
        foreach (var (rig, points) in RandomRigs.WithPoints(seed: 64, count: 200, pointsPerRig: 5))
        {
            foreach (var point in points)
            {
                var match = Matches.Of(rig, point).Noisy(random, 1);
                var found = Triangulation.Midpoint(rig, match.Left, match.Right);
                var (toLeft, toRight) = (
                    rig.Ray(View.Left, match.Left).DistanceTo(found.Position), rig.Ray(View.Right, match.Right).DistanceTo(found.Position));
                Assert.Equal(found.RayGapMm / 2, toLeft, 1e-6 * point.Norm);
                Assert.Equal(found.RayGapMm / 2, toRight, 1e-6 * point.Norm);
            }
        }
    }

    [Fact]
    public void A_match_at_negative_disparity_of_a_parallel_rig_lies_behind_both_cameras()
    {
        var rig = Parallel();
        var found = Triangulation.Linear(rig, new IdealPixel(300, 200), new IdealPixel(320, 200));
        Assert.False(found.InFrontOfLeft);
        Assert.False(found.InFrontOfRight);
        Assert.False(found.InFrontOfBoth);
        Assert.True(double.IsNaN(found.ReprojectionPx.Left));
    }

    [Fact]
    public void Reprojection_of_an_exact_match_is_zero_and_of_a_bad_row_half_of_it_each()
    {
        var rig = Parallel();
        var exact = Triangulation.Linear(rig, new IdealPixel(340, 200), new IdealPixel(320, 200)).ReprojectionPx;
        Assert.Equal((0.0, 0.0), (Math.Round(exact.Left, 9), Math.Round(exact.Right, 9)));
        var (left, right) = Triangulation.Linear(rig, new IdealPixel(340, 199), new IdealPixel(320, 201)).ReprojectionPx;
        Assert.Equal(1, left, 3);
        Assert.Equal(1, right, 3);
    }

    /// <summary>By hand: two cameras 60 mm apart see a point 600 mm ahead of the middle under 2·atan(30/600).</summary>
    [Fact]
    public void Parallax_is_the_angle_between_the_rays()
    {
        var rig = Parallel();
        var match = Matches.Of(rig, new(30, 0, 600));
        var expected = 2 * Math.Atan(30.0 / 600) * 180 / Math.PI;
        Assert.Equal(expected, Triangulation.Linear(rig, match.Left, match.Right).ParallaxDegrees, 9);
    }

    /// <summary>
    /// Reference: the law of a parallel rig, σ_Z = Z²/(f·b)·σ_d with σ_d = √2·σ (common practice; JCGM 100:2008, 5.1.2 applied to Z = f·b/d).
    /// </summary>
    [Fact]
    public void The_random_part_of_depth_in_a_parallel_rig_grows_with_the_square_of_depth()
    {
        var rig = Parallel();
        foreach (var depth in new[] { 300.0, 1000, 5000 })
        {
            var match = Matches.Of(rig, new(30, 0, depth));
            foreach (var point in new[] { Triangulation.Linear(rig, match.Left, match.Right), Triangulation.Midpoint(rig, match.Left, match.Right) })
            {
                var expected = depth * depth / (800 * 60) * Math.Sqrt(2) * 0.1;
                Assert.InRange(Math.Sqrt(point.RandomCovariance(0.1)[2, 2]) / expected, 0.999, 1.001);
            }
        }
    }

    /// <summary>
    /// Reference: Monte Carlo (JCGM 101). With N = 2,000 draws (N−1)·s²/σ² is chi-squared; each of the variances must lie within its
    /// 99.9 % interval, over 6 variances (a false alarm in 0.6 % of seeds; the seed is fixed), and correlations within 0.09 (four of their deviations).
    /// </summary>
    [Theory]
    [InlineData(true)]
    [InlineData(false)]
    public void The_random_covariance_agrees_with_Monte_Carlo(bool linear)
    {
        const int draws = 2000;
        const double sigma = 0.05;
        var random = new Random(65);
        var (low, high) = (ChiSquared.InvCDF(draws - 1, 0.0005) / (draws - 1), ChiSquared.InvCDF(draws - 1, 0.9995) / (draws - 1));
        foreach (var (rig, points) in RandomRigs.WithPoints(seed: 65, count: 2, pointsPerRig: 1))
        {
            // Near enough for the law of propagation: at far depths the distribution leans.
            var point = 8 * rig.BaselineMm / points[0].Z * points[0];
            var raw = Matches.RawOf(rig, point);
            Assert.True(double.IsFinite(raw.Right.U));
            var expected = Of(raw).RandomCovariance(sigma);
            var drawn = Matrix<double>.Build.Dense(draws, 3);
            for (var i = 0; i < draws; i++)
            {
                var position = Of(raw.Noisy(random, sigma)).Position;
                drawn.SetRow(i, [position.X, position.Y, position.Z]);
            }

            var centred = drawn - Matrix<double>.Build.Dense(draws, 3, (_, j) => drawn.Column(j).Average());
            var observed = centred.TransposeThisAndMultiply(centred) / (draws - 1);
            for (var i = 0; i < 3; i++)
            {
                Assert.InRange(observed[i, i] / expected[i, i], low, high);
                for (var j = 0; j < i; j++)
                {
                    var scale = Math.Sqrt(expected[i, i] * expected[j, j]);
                    Assert.InRange((observed[i, j] - expected[i, j]) / scale, -0.09, 0.09);
                }
            }

            TriangulatedPoint Of(RawMatch match) => linear
                ? Triangulation.Linear(rig, match.Left, match.Right)
                : Triangulation.Midpoint(rig, match.Left, match.Right);
        }
    }

    /// <summary>Reference: Monte Carlo (JCGM 101) over the rig's parameters; 99.9 % chi-squared intervals of the variances as above.</summary>
    [Fact]
    public void The_common_covariance_agrees_with_Monte_Carlo_over_the_rig()
    {
        const int draws = 2000;
        var random = new Random(66);
        var root = Matrix<double>.Build.Dense(RigParameters.Count, RigParameters.Count);
        double[] sigma = [.. CameraSigmas(), .. CameraSigmas(), 1e-4, 2e-4, 1e-4, 0.02, 0.02, 0.05];
        for (var i = 0; i < RigParameters.Count; i++)
        {
            for (var j = 0; j <= i; j++)
            {
                root[i, j] = sigma[i] * (i == j ? 1 : 0.2 * RandomRigs.Gauss(random));
            }
        }

        var plain = RandomRigs.WithPoints(seed: 67, count: 1, pointsPerRig: 1).Single();
        var rig = new Rig(plain.Rig.Left, plain.Rig.Right, plain.Rig.RightFromLeft, root * root.Transpose());
        var raw = Matches.RawOf(rig, 10 * rig.BaselineMm / plain.Points[0].Z * plain.Points[0]);
        var expected = Triangulation.Linear(rig, raw.Left, raw.Right).CommonCovariance()!;
        var positions = Matrix<double>.Build.Dense(draws, 3);
        for (var i = 0; i < draws; i++)
        {
            var change = root * Vector<double>.Build.Dense(RigParameters.Count, _ => RandomRigs.Gauss(random));
            var position = Triangulation.Linear(rig.Changed(change.ToArray()), raw.Left, raw.Right).Position;
            positions.SetRow(i, [position.X, position.Y, position.Z]);
        }

        var (low, high) = (ChiSquared.InvCDF(draws - 1, 0.0005) / (draws - 1), ChiSquared.InvCDF(draws - 1, 0.9995) / (draws - 1));
        for (var axis = 0; axis < 3; axis++)
        {
            var column = positions.Column(axis);
            var mean = column.Average();
            var variance = column.Sum(value => (value - mean) * (value - mean)) / (draws - 1);
            Assert.InRange(variance / expected[axis, axis], low, high);
        }
    }

    [Fact]
    public void Without_a_covariance_of_the_rig_there_is_no_common_part() =>
        Assert.Null(Triangulation.Linear(Parallel(), new IdealPixel(340, 200), new IdealPixel(320, 200)).CommonCovariance());

    [Fact]
    public void A_raw_pixel_outside_the_lens_model_is_refused()
    {
        var camera = new Camera(new(500, 500, 320, 240), new(640, 480), new(k1: -0.9));
        var rig = new Rig(camera, camera, new(Matrix3x3.Identity, new(-60, 0, 0)));
        Assert.Throws<UserErrorException>(() => Triangulation.Linear(rig, new RawPixel(0, 0), new RawPixel(0, 0)));
    }

    [Fact]
    public void A_swapped_pair_is_told_from_the_rig_by_cheirality()
    {
        foreach (var (rig, points) in RandomRigs.WithPoints(seed: 68, count: 300))
        {
            RawMatch[] matches = [.. points.Select(point => Matches.RawOf(rig, point))];
            Assert.Equal(PairOrder.AsNamed, rig.OrderOf(matches).Order);
        }

        // Swapping needs pictures of one size, and a parallel rig is the hard case: the rows still fit, only cheirality tells.
        var parallel = Parallel();
        var random = new Random(68);
        RawMatch[] seen =
        [
            .. Enumerable.Range(0, 50).Select(_ => Matches.RawOf(
                parallel, new(RandomRigs.Between(random, -200, 200), RandomRigs.Between(random, -200, 200), RandomRigs.Between(random, 600, 3000)))),
        ];
        RawMatch[] swapped = [.. seen.Select(match => new RawMatch(match.Right, match.Left))];
        Assert.Equal(PairOrder.AsNamed, parallel.OrderOf(seen).Order);
        Assert.Equal(PairOrder.Swapped, parallel.OrderOf(swapped).Order);
        Assert.Contains("exchange", parallel.OrderOf(swapped).Explanation);
    }

    [Fact]
    public void A_swapped_pair_of_a_verged_rig_is_told_too()
    {
        var camera = new Camera(new(800, 800, 320, 240), new(640, 480), new(k1: -0.1));
        var rig = new Rig(camera, camera, Pose.FromVectors(new(0.01, 0.2, -0.02), new(-200, 5, 20)));
        var random = new Random(69);
        RawMatch[] swapped =
        [
            .. Enumerable.Range(0, 50)
                .Select(_ => Matches.RawOf(
                    rig, new(RandomRigs.Between(random, 0, 200), RandomRigs.Between(random, -100, 100), RandomRigs.Between(random, 800, 1200))))
                .Select(match => new RawMatch(match.Right, match.Left)),
        ];
        Assert.NotEqual(PairOrder.AsNamed, rig.OrderOf(swapped).Order);
    }

    [Fact]
    public void Matches_of_nothing_decide_no_order()
    {
        var random = new Random(70);
        RawMatch[] junk =
        [
            .. Enumerable.Range(0, 100).Select(_ => new RawMatch(
                new(640 * random.NextDouble(), 480 * random.NextDouble()), new(640 * random.NextDouble(), 480 * random.NextDouble()))),
        ];
        Assert.Equal(PairOrder.Undecided, Parallel().OrderOf(junk).Order);
        Assert.Throws<UserErrorException>(() => Parallel().OrderOf([]));
    }

    private static IEnumerable<double> CameraSigmas() => [0.5, 0.5, 0.4, 0.4, 1e-3, 1e-3, 1e-4, 1e-4, 1e-3, 0, 0, 0];

    private static Rig Parallel()
    {
        var camera = new Camera(new(800, 800, 320, 240), new(640, 480));
        return new(camera, camera, new(Matrix3x3.Identity, new(-60, 0, 0)));
    }
}
