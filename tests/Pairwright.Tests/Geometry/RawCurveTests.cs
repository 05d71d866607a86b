using Pairwright.Geometry;
using Xunit;

namespace Pairwright.Tests.Geometry;

public sealed class RawCurveTests
{
    [Fact]
    public void The_curve_of_a_pixel_passes_through_its_match_at_the_inverse_depth_of_the_point()
    {
        foreach (var (rig, points) in RandomRigs.WithPoints(seed: 81, count: 200, pointsPerRig: 3))
        {
            foreach (var point in points)
            {
                var raw = Matches.RawOf(rig, point);
                var curve = rig.RawCurveOf(raw.Left, nearestMm: 0.8 * point.Z, farthestMm: 1.3 * point.Z, stepPx: 0.5);
                Assert.Equal(View.Right, curve.View);
                var nearest = curve.Points.MinBy(p => Distance(p.Raw, raw.Right));
                Assert.InRange(Distance(nearest.Raw, raw.Right), 0, 0.26);
                Check(rig, raw.Left, View.Left, curve);

                // And the other way round.
                var inRight = rig.RightFromLeft.Transform(point);
                var back = rig.RawCurveOf(raw.Right, 0.8 * inRight.Z, 1.3 * inRight.Z, 0.5, of: View.Right);
                Assert.InRange(back.Points.Min(p => Distance(p.Raw, raw.Left)), 0, 0.26);
                Check(rig, raw.Right, View.Right, back);
            }
        }
    }

    [Fact]
    public void The_curve_runs_from_far_to_near_in_even_steps_on_the_picture()
    {
        foreach (var (rig, points) in RandomRigs.WithPoints(seed: 82, count: 200, pointsPerRig: 1))
        {
            var curve = rig.RawCurveOf(rig.Left.Project(points[0]), stepPx: 2);
            Assert.False(curve.IsEmpty);
            for (var i = 0; i < curve.Points.Length; i++)
            {
                Assert.True(rig.Right.Size.Contains(curve.Points[i].Raw.U, curve.Points[i].Raw.V));
                if (i > 0)
                {
                    Assert.True(curve.Points[i].InverseDepthPerMm > curve.Points[i - 1].InverseDepthPerMm);
                    Assert.InRange(Distance(curve.Points[i].Raw, curve.Points[i - 1].Raw), 0, 2.2);
                    if (i < curve.Points.Length - 1)
                    {
                        Assert.InRange(Distance(curve.Points[i].Raw, curve.Points[i - 1].Raw), 1.8, 2.2);
                    }
                }
            }

            Assert.InRange(curve.LengthPx / (2.0 * curve.Points.Length), 0.5, 1.05);
        }
    }

    [Fact]
    public void The_ends_of_the_curve_are_the_depths_asked_for()
    {
        var rig = Parallel(new(k1: -0.1));
        var curve = rig.RawCurveOf(new RawPixel(400, 200), nearestMm: 500, farthestMm: 2000, stepPx: 1);
        Assert.Equal(2000, curve.Points[0].DepthMm, 6);
        Assert.Equal(500, curve.Points[^1].DepthMm, 6);
        var toInfinity = rig.RawCurveOf(new RawPixel(400, 200), nearestMm: 500);
        Assert.Equal(0, toInfinity.Points[0].InverseDepthPerMm, 12);
    }

    /// <summary>By hand: in a parallel rig without distortion the curve is the row, from u at infinity down by f·b/Z.</summary>
    [Fact]
    public void In_a_parallel_rig_without_distortion_the_curve_is_the_row()
    {
        var curve = Parallel(Distortion.None).RawCurveOf(new RawPixel(400, 200), nearestMm: 500);
        Assert.All(curve.Points, point => Assert.Equal(200, point.Raw.V, 9));
        Assert.Equal(400, curve.Points[0].Raw.U, 9);
        Assert.Equal(400 - 800.0 * 60 / 500, curve.Points[^1].Raw.U, 9);
    }

    [Fact]
    public void Without_a_nearest_depth_the_curve_goes_on_to_the_border_of_the_picture()
    {
        var curve = Parallel(Distortion.None).RawCurveOf(new RawPixel(400, 200));
        Assert.InRange(curve.Points[^1].Raw.U, -0.5, 1);
    }

    [Fact]
    public void A_forward_rig_has_curves_that_run_out_from_the_epipole()
    {
        var camera = new Camera(new(800, 800, 320, 240), new(640, 480), new(k1: -0.05));
        var rig = new Rig(camera, camera, new(Matrix3x3.Identity, new(0, 0, -100)));
        var curve = rig.RawCurveOf(camera.Distort(new(400, 240)));
        Assert.Equal(240, curve.Points[0].Raw.V, 6);
        Assert.True(curve.Points[^1].Raw.U > curve.Points[0].Raw.U);
        Check(rig, camera.Distort(new(400, 240)), View.Left, curve);
    }

    [Fact]
    public void A_line_bends_as_the_lens_does_and_every_point_lies_on_it()
    {
        var rig = Parallel(new(k1: -0.2));
        var line = new EpipolarLine(0.1, 1, -430, View.Right);
        var curve = rig.RawCurveOf(line, stepPx: 3);
        Assert.True(curve.LengthPx > 600);
        foreach (var point in curve.Points)
        {
            Assert.Equal(0, line.SignedDistance(rig.Right.Undistort(point.Raw)), 8);
            Assert.True(double.IsNaN(point.InverseDepthPerMm));
            Assert.True(rig.Right.Size.Contains(point.Raw.U, point.Raw.V));
        }

        // Bent: the middle is off the chord of the ends.
        var (a, b, middle) = (curve.Points[0].Raw, curve.Points[^1].Raw, curve.Points[curve.Points.Length / 2].Raw);
        var chord = Distance(a, b);
        Assert.True(Math.Abs((b.U - a.U) * (middle.V - a.V) - (b.V - a.V) * (middle.U - a.U)) / chord > 1);
    }

    [Fact]
    public void A_line_that_misses_the_picture_has_an_empty_curve()
    {
        var curve = Parallel(Distortion.None).RawCurveOf(new EpipolarLine(0, 1, 100, View.Left));
        Assert.True(curve.IsEmpty);
        Assert.Equal(0, curve.LengthPx);
    }

    [Fact]
    public void Depths_out_of_order_and_steps_of_nothing_are_refused()
    {
        var rig = Parallel(Distortion.None);
        Assert.Throws<UserErrorException>(() => rig.RawCurveOf(new RawPixel(400, 200), 500, 400));
        Assert.Throws<UserErrorException>(() => rig.RawCurveOf(new RawPixel(400, 200), -1));
        Assert.Throws<UserErrorException>(() => rig.RawCurveOf(new RawPixel(400, 200), double.NaN));
        Assert.Throws<UserErrorException>(() => rig.RawCurveOf(new RawPixel(400, 200), 500, 1000, stepPx: 0));
    }

    // Every point of the curve is the picture of the ray's point at the depth it states.
    private static void Check(Rig rig, RawPixel pixel, View of, RawCurve curve)
    {
        var direction = rig[of].Matrix.Direction(rig[of].Undistort(pixel));
        var pose = of == View.Left ? rig.RightFromLeft : rig.RightFromLeft.Inverse;
        foreach (var point in curve.Points.Where(point => point.InverseDepthPerMm > 0))
        {
            var expected = rig[curve.View].Project(pose.Transform(point.DepthMm * direction));
            Assert.InRange(Distance(expected, point.Raw), 0, 1e-6);
        }
    }

    private static Rig Parallel(Distortion lens)
    {
        var camera = new Camera(new(800, 800, 320, 240), new(640, 480), lens);
        return new(camera, camera, new(Matrix3x3.Identity, new(-60, 0, 0)));
    }

    private static double Distance(RawPixel a, RawPixel b) => Math.Sqrt((a.U - b.U) * (a.U - b.U) + (a.V - b.V) * (a.V - b.V));
}
