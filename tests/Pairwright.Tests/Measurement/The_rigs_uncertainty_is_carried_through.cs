using Pairwright.Geometry;
using Pairwright.Imaging;
using Pairwright.Measurement;
using Xunit;

namespace Pairwright.Tests.Measurement;

public class The_rigs_uncertainty_is_carried_through
{
    private static readonly Vector3D Across = new Vector3D(1, 0.1, 0.15).Normalized;
    private static readonly Vector3D Along = new Vector3D(0, 1, 0).Cross(Across).Normalized.Cross(Across);

    [Fact]
    public void Points_seen_by_a_rig_come_back_to_where_they_were()
    {
        var rig = TestRig.Of();
        var truth = TestRig.Grid(new(20, -10, 1100), Across, Along, 300, 200).ToArray();
        var (lefts, rights) = TestRig.Seen(rig, truth);
        var points = MeasuredPoints.FromCorners(rig, lefts, rights, 0.1);
        Assert.All(points.Positions.Zip(truth), pair => Assert.True((pair.First - pair.Second).Norm < 1e-8));
        Assert.All(points.PositionsUnder(rig).Zip(truth), pair => Assert.True((pair.First - pair.Second).Norm < 1e-8));
    }

    [Fact]
    public void Rigs_drawn_from_the_covariance_spread_every_measurement_by_its_common_part()
    {
        // Exact pixels, measured with rigs drawn from the covariance: the spread is the common part. 200 draws: 3.5 σ of a standard deviation is 17.5 %.
        var rig = TestRig.Of();
        var low = TestRig.Grid(new(-60, 20, 1150), Across, Along, 200, 150);
        var high = TestRig.Grid(new(120, -30, 1050), Across, Along, 160, 260).Select(p => p - 1e-4 * Math.Pow(p.X - 120, 2) * new Vector3D(0, 0, 1));
        var (pixelsLow, pixelsHigh) = (TestRig.Seen(rig, low), TestRig.Seen(rig, high));

        MeasuredValue[] Measure(Rig with)
        {
            var below = MeasuredPoints.FromCorners(with, pixelsLow.Left, pixelsLow.Right, 0);
            var above = MeasuredPoints.FromCorners(with, pixelsHigh.Left, pixelsHigh.Right, 0);
            var (plane, surface) = (below.FitPlane(), above.FitQuadratic(Across));
            return
            [
                above.FitPlane().StepHeightOver(plane), plane.CentroidDepth, plane.DistanceFromCamera, plane.Tilt, below[0].DistanceTo(below[^1]),
                surface.SagittaAcross(), surface.SagittaAlong(), surface.FourthCorner(), surface.Width,
            ];
        }

        var predicted = Measure(rig);
        var draw = new MonteCarloDraw(9);
        var drawn = Enumerable.Range(0, 200).Select(_ => Measure(draw.Rig(rig))).ToArray();
        for (var i = 0; i < predicted.Length; i++)
        {
            var spread = Math.Sqrt(drawn.Average(values => Math.Pow(values[i].Value - predicted[i].Value, 2)));
            Assert.Equal(1, spread / predicted[i].CommonSigma, 0.175);
        }
    }

    [Fact]
    public void A_step_is_known_better_than_either_depth_because_the_rigs_part_cancels()
    {
        var depth = FlatDepth(TestRig.Of(), 1100);
        var (a, b) = (depth[200, 200], depth[320, 260]);
        var difference = a - b;
        Assert.True(a.CommonSigma > 1, "the rig's part of a depth is large here");
        Assert.True(difference.CommonSigma < 0.35 * a.CommonSigma, $"{difference.CommonSigma} against {a.CommonSigma}");
        Assert.Equal(0, (depth[200, 200] - depth[200, 200]).CommonSigma);
    }

    [Fact]
    public void Depth_at_a_pixel_follows_from_disparity_and_its_sigma()
    {
        // u(Z) = Z²·u(d)/(f·b): the derivative of Z = f·b/(d + offset).
        var depth = FlatDepth(TestRig.Of(), 1100, sigma: 0.2f);
        var geometry = depth.Geometry;
        var measured = depth[300, 200];
        Assert.Equal(1100, measured.Value, 2);
        Assert.Equal(1100.0 * 1100 * 0.2 / (geometry.FocalPixels * geometry.BaselineMm), measured.RandomSigma, 4);
        Assert.Equal(measured.RandomSigma, depth.Sigma![300, 200], 4);

        // The measured point is the same one, in the left camera's own frame.
        var point = depth.PointAt(300, 200);
        Assert.Equal(1100, (geometry.LeftFromRectified.Transpose * point.Position).Z, 2);
        Assert.Equal(measured.RandomSigma * point.Position.Norm / 1100, point.Along(point.Position).RandomSigma, 4);
    }

    [Fact]
    public void A_dense_map_measured_with_another_rig_is_the_one_triangulated_from_its_raw_pixels()
    {
        var rig = TestRig.Of();
        var points = FlatDepth(rig, 1100).Within(new PixelRegion(250, 180, 12, 9));
        Assert.All(points.Positions.Zip(points.PositionsUnder(rig)), pair => Assert.True((pair.First - pair.Second).Norm < 1e-6));

        // Against the library's own midpoint triangulation: the rays of a rectified pair meet, so both are one.
        var rectification = Rectification.Of(rig);
        var left = rectification.RawFromRectified(View.Left, new(250, 180));
        var disparity = rectification.Geometry.Disparity(1100);
        var right = rectification.RawFromRectified(View.Right, new(250 - disparity, 180));
        Assert.True((Triangulation.Midpoint(rig, left, right).Position - points.Positions[0]).Norm < 1e-3);
    }

    [Fact]
    public void A_rig_without_covariance_leaves_the_common_part_unknown_and_the_verdict_undecided()
    {
        var full = TestRig.Of();
        var rig = new Rig(full.Left, full.Right, full.RightFromLeft);
        var measured = FlatDepth(rig, 1100).Within(new PixelRegion(200, 150, 100, 80)).FitPlane().CentroidDepth;
        Assert.True(double.IsNaN(measured.CommonSigma));
        Assert.Equal(VerdictOutcome.Undecided, Requirement.AtLeast("depth", 1.Metres()).Judge(measured).Outcome);
        Assert.Equal(VerdictOutcome.Met, Requirement.AtLeast("depth", 1.Metres()).Judge(measured.WithCommonSigma(2)).Outcome);
    }

    [Fact]
    public void Things_measured_with_different_rigs_are_not_put_into_one_frame()
    {
        var a = FlatDepth(TestRig.Of(), 1100).Within(new PixelRegion(200, 150, 60, 50)).FitPlane();
        var b = FlatDepth(TestRig.Of(focal: 705), 1100).Within(new PixelRegion(200, 150, 60, 50)).FitPlane();
        Assert.Contains("different rigs", Assert.Throws<UserErrorException>(() => a.StepHeightOver(b)).Message);
    }

    [Fact]
    public void Corner_noise_spreads_a_distance_by_its_random_part()
    {
        var rig = TestRig.Of(covariance: TestRig.Exact);
        Vector3D[] truth = [new(-50, 20, 1000), new(60, -10, 1040)];
        var (lefts, rights) = TestRig.Seen(rig, truth);
        var predicted = MeasuredPoints.FromCorners(rig, lefts, rights, 0.15);
        var sigma = predicted[0].DistanceTo(predicted[1]).RandomSigma;
        var trials = MonteCarlo.Propagate(
            draw =>
            {
                RawPixel Noisy(RawPixel pixel) => new(pixel.U + draw.Normal(0, 0.15), pixel.V + draw.Normal(0, 0.15));
                var points = MeasuredPoints.FromCorners(rig, Array.ConvertAll(lefts, Noisy), Array.ConvertAll(rights, Noisy), 0.15);
                return (points.Positions[0] - points.Positions[1]).Norm;
            },
            5000);
        Assert.Equal(1, trials.StandardUncertainty / sigma, 5 / Math.Sqrt(2 * 5000.0));
    }

    // A surface at one depth along the rectified axis.
    private static DepthMap FlatDepth(Rig rig, double z, float sigma = 0.1f)
    {
        var rectification = Rectification.Of(rig);
        var geometry = rectification.Geometry;
        return new(
            ScalarMap.From(geometry.Size, (_, _) => (float)geometry.Disparity(z)),
            geometry,
            rectification,
            ScalarMap.From(geometry.Size, (_, _) => sigma));
    }
}
