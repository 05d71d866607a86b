using Pairwright.Geometry;
using Xunit;

namespace Pairwright.Tests.Geometry;

public sealed class CameraTests
{
    /// <summary>Reference: OpenCV's projectPoints, on 1,000 random rigs.</summary>
    [Fact]
    public void Projection_agrees_with_OpenCV_to_1e_8_px()
    {
        var worst = 0.0;
        foreach (var (rig, points) in RandomRigs.WithPoints(seed: 11))
        {
            var inRight = Array.ConvertAll(points, rig.RightFromLeft.Transform);
            foreach (var (camera, seen) in new[] { (rig.Left, points), (rig.Right, inRight) })
            {
                var expected = ReferenceOpenCv.Project(camera, seen);
                for (var i = 0; i < seen.Length; i++)
                {
                    worst = Math.Max(worst, Distance(expected[i], camera.Project(seen[i])));
                }
            }
        }

        Assert.InRange(worst, 0, 1e-8);
    }

    /// <summary>Reference: OpenCV's undistortPoints, iterated to its end, on 1,000 random rigs.</summary>
    [Fact]
    public void Undistortion_agrees_with_OpenCV_to_1e_8_px()
    {
        var worst = 0.0;
        foreach (var (rig, points) in RandomRigs.WithPoints(seed: 12))
        {
            var raw = Array.ConvertAll(points, rig.Left.Project);
            var expected = ReferenceOpenCv.Undistort(rig.Left, raw);
            for (var i = 0; i < raw.Length; i++)
            {
                var ideal = rig.Left.Undistort(raw[i]);
                worst = Math.Max(worst, Math.Abs(ideal.U - expected[i].U) + Math.Abs(ideal.V - expected[i].V));
            }
        }

        Assert.InRange(worst, 0, 1e-8);
    }

    [Fact]
    public void Undistorting_undoes_the_lens_to_1e_10_px_on_the_whole_picture()
    {
        var random = new Random(13);
        var (worst, checkedPixels) = (0.0, 0);
        for (var i = 0; i < 200; i++)
        {
            var camera = RandomRigs.AnyCamera(random);
            for (var j = 0; j < 200; j++)
            {
                var raw = new RawPixel(RandomRigs.Between(random, 0, camera.Size.Width), RandomRigs.Between(random, 0, camera.Size.Height));
                if (camera.TryUndistort(raw) is { } ideal)
                {
                    worst = Math.Max(worst, Distance(raw, camera.Distort(ideal)));
                    checkedPixels++;
                }
            }
        }

        Assert.InRange(worst, 0, 1e-10);
        Assert.True(checkedPixels > 38_000, $"only {checkedPixels} of 40000 pixels lie in the valid field");
    }

    [Fact]
    public void A_pixel_that_the_lens_cannot_form_is_refused_by_name()
    {
        var camera = new Camera(new(500, 500, 320, 240), new(640, 480), new(k1: -0.9));
        var error = Assert.Throws<UserErrorException>(() => camera.Undistort(new(639, 479)));
        Assert.Contains("(639, 479)", error.Message);
        Assert.Null(camera.TryUndistort(new(639, 479)));
        Assert.NotNull(camera.TryUndistort(new(400, 300)));
    }

    [Fact]
    public void A_pixel_that_is_not_a_number_is_refused()
    {
        var camera = new Camera(new(500, 500, 320, 240), new(640, 480), new(k1: -0.1));
        Assert.Throws<UserErrorException>(() => camera.Undistort(new(double.NaN, 10)));
        Assert.Null(camera.TryUndistort(new(10, double.PositiveInfinity)));
    }

    [Fact]
    public void A_point_behind_the_camera_has_no_picture()
    {
        var camera = new Camera(new(500, 500, 320, 240), new(640, 480));
        Assert.True(double.IsNaN(camera.Project(new(0, 0, -1)).U));
        Assert.True(double.IsNaN(camera.ProjectIdeal(new(0, 0, 0)).U));
    }

    [Theory]
    [InlineData(0, 500, 320, 240)]
    [InlineData(500, -1, 320, 240)]
    [InlineData(double.NaN, 500, 320, 240)]
    [InlineData(500, 500, double.PositiveInfinity, 240)]
    public void A_singular_or_unreal_camera_matrix_is_refused(double focalU, double focalV, double centreU, double centreV) =>
        Assert.Throws<UserErrorException>(() => new Camera(new(focalU, focalV, centreU, centreV), new(640, 480)));

    [Fact]
    public void An_empty_picture_or_a_lens_term_that_is_not_a_number_is_refused()
    {
        Assert.Throws<UserErrorException>(() => new Camera(new(500, 500, 320, 240), new(0, 480)));
        Assert.Throws<UserErrorException>(() => new Camera(new(500, 500, 320, 240), new(640, 480), new(k2: double.NaN)));
    }

    /// <summary>An undistorted camera of 90° by construction: half its width lies one focal length off the axis.</summary>
    [Fact]
    public void The_field_of_view_of_a_square_right_angled_camera_is_90_degrees()
    {
        var field = new Camera(new(320, 320, 319.5, 239.5), new(640, 480)).FieldOfView;
        Assert.Equal(90, field.AcrossDegrees, 9);
        Assert.Equal(2 * Math.Atan(0.75) * 180 / Math.PI, field.DownDegrees, 9);
        Assert.Equal(2 * Math.Atan(1.25) * 180 / Math.PI, field.DiagonalDegrees, 9);
    }

    [Fact]
    public void Barrel_distortion_widens_the_field_of_view()
    {
        var straight = new Camera(new(500, 500, 319.5, 239.5), new(640, 480));
        var barrel = new Camera(straight.Matrix, straight.Size, new(k1: -0.2));
        Assert.True(barrel.FieldOfView.DiagonalDegrees > straight.FieldOfView.DiagonalDegrees + 1);
    }

    [Fact]
    public void Cameras_are_equal_when_their_parts_are()
    {
        var (a, b) = (RandomRigs.AnyCamera(new(5)), RandomRigs.AnyCamera(new(5)));
        Assert.Equal(a, b);
        Assert.Equal(a.GetHashCode(), b.GetHashCode());
        Assert.NotEqual(a, RandomRigs.AnyCamera(new(6)));
    }

    private static double Distance(RawPixel a, RawPixel b) => Math.Sqrt((a.U - b.U) * (a.U - b.U) + (a.V - b.V) * (a.V - b.V));
}
