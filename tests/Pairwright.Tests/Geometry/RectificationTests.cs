using Pairwright.Geometry;
using Xunit;

namespace Pairwright.Tests.Geometry;

public sealed class RectificationTests
{
    [Fact]
    public void Rows_of_exact_matches_are_equal_to_1e_9_px_and_disparity_is_that_of_the_depth()
    {
        var worst = 0.0;
        foreach (var (rig, points) in RandomRigs.WithPoints(seed: 71, count: 30))
        {
            foreach (var fit in Enum.GetValues<RectificationFit>())
            {
                Check(rig, points, Rectification.Of(rig, fit));
            }
        }

        foreach (var (rig, points) in RandomRigs.WithPoints(seed: 72, count: 1000))
        {
            // All thousand through one size, which is quick to make.
            Check(rig, points, Rectification.Of(rig, RectificationFit.Everything, new(640, 480)));
        }

        Assert.InRange(worst, 0, 1e-9);

        void Check(Rig rig, Vector3D[] points, Rectification rectification)
        {
            foreach (var point in points)
            {
                var match = Matches.Of(rig, point);
                worst = Math.Max(worst, Math.Abs(rectification.RowError(match)));
                var depth = (rectification.Geometry.LeftFromRectified.Transpose * point).Z;
                var disparity = rectification.Disparity(match);
                Assert.InRange(Math.Abs(rectification.Geometry.Disparity(depth) - disparity), 0, 1e-8);
                Assert.InRange(Math.Abs(rectification.Geometry.DepthMm(disparity) / depth - 1), 0, 1e-8);
                var again = rectification.Geometry.PointInLeftCamera(rectification.Rectify(View.Left, match.Left), disparity);
                Assert.InRange((again - point).Norm / point.Norm, 0, 1e-8);
            }
        }
    }

    [Fact]
    public void A_rectified_pixel_goes_back_to_the_pixel_it_came_from()
    {
        foreach (var (rig, points) in RandomRigs.WithPoints(seed: 73, count: 40))
        {
            var rectification = Rectification.Of(rig);
            foreach (var raw in points.Select(point => Matches.RawOf(rig, point)))
            {
                var (left, right) = (
                    rectification.RawFromRectified(View.Left, rectification.Rectify(View.Left, raw.Left)),
                    rectification.RawFromRectified(View.Right, rectification.Rectify(View.Right, raw.Right)));
                Assert.InRange(Math.Abs(left.U - raw.Left.U) + Math.Abs(left.V - raw.Left.V), 0, 1e-8);
                Assert.InRange(Math.Abs(right.U - raw.Right.U) + Math.Abs(right.V - raw.Right.V), 0, 1e-8);
            }
        }
    }

    [Fact]
    public void A_parallel_rig_of_equal_cameras_stays_as_it_is_and_disparity_falls_to_zero_at_infinity()
    {
        var rig = Plain(new(-60, 0, 0));
        var rectification = Rectification.Of(rig);
        var geometry = rectification.Geometry;
        Assert.Equal(800, geometry.FocalPixels, 9);
        Assert.Equal(60, geometry.BaselineMm, 12);
        Assert.Equal(0, geometry.OffsetPixels, 12);
        Assert.Equal(0, rectification.TurnDegrees, 12);
        Assert.InRange(geometry.Size.Width, 632, 640);
        Assert.InRange(geometry.Size.Height, 474, 480);
        foreach (var depth in new[] { 100.0, 1000, 1e6 })
        {
            var disparity = rectification.Disparity(Matches.Of(rig, new(10, 5, depth)));
            Assert.True(disparity > 0);
            Assert.Equal(800 * 60 / depth, disparity, 8);
        }
    }

    [Fact]
    public void Disparity_is_positive_also_where_the_right_camera_stands_at_the_left_and_the_picture_is_turned_by_half()
    {
        var rig = Plain(new(60, 0, 0));
        var rectification = Rectification.Of(rig);
        Assert.Equal(180, Math.Abs(rectification.TurnDegrees), 9);
        var match = Matches.Of(rig, new(10, 5, 1000));
        Assert.Equal(48, rectification.Disparity(match), 8);
        Assert.InRange(Math.Abs(rectification.RowError(match)), 0, 1e-9);
        Assert.True(rectification.UsableShare(View.Left) > 0.95);
    }

    [Fact]
    public void Cameras_one_above_the_other_are_rectified_with_the_picture_turned_by_a_quarter()
    {
        var rig = Plain(new(0, -60, 0));
        var rectification = Rectification.Of(rig);
        Assert.Equal(90, rectification.TurnDegrees, 9);
        Assert.True(rectification.Geometry.Size.Height > rectification.Geometry.Size.Width);
        var match = Matches.Of(rig, new(10, 5, 1000));
        Assert.Equal(48, rectification.Disparity(match), 8);
        Assert.InRange(Math.Abs(rectification.RowError(match)), 0, 1e-9);
    }

    [Theory]
    [InlineData(0, 0, -60)]
    [InlineData(0, 0, 60)]
    [InlineData(-10, 5, -60)]
    public void A_rig_that_looks_along_its_baseline_is_refused(double x, double y, double z)
    {
        var error = Assert.Throws<UserErrorException>(() => Rectification.Of(Plain(new(x, y, z))));
        Assert.Contains("epipole", error.Message);
    }

    [Fact]
    public void Cameras_that_share_no_row_are_refused()
    {
        var camera = new Camera(new(800, 800, 320, 240), new(640, 480));
        var rig = new Rig(camera, camera, Pose.FromVectors(new(1.2, 0, 0), new(-60, 0, 0)));
        Assert.Throws<UserErrorException>(() => Rectification.Of(rig));
    }

    [Fact]
    public void A_size_of_one_pixel_is_refused() =>
        Assert.Throws<UserErrorException>(() => Rectification.Of(Plain(new(-60, 0, 0)), size: new(1, 480)));

    [Fact]
    public void The_left_axis_turns_no_more_than_the_baseline_asks()
    {
        foreach (var (rig, _) in RandomRigs.WithPoints(seed: 74, count: 100, pointsPerRig: 1))
        {
            var axes = Rectification.Of(rig, RectificationFit.Everything).Geometry.LeftFromRectified;
            Assert.True(Rotation.IsRotation(axes));

            // Of all axes at right angles to the baseline the one nearest to (0, 0, 1) has a cosine of sin(angle to the baseline).
            var along = rig.RightCentreInLeft.Normalized;
            Assert.Equal(Math.Sqrt(1 - along.Z * along.Z), axes.Transpose.Row3.Z, 12);
        }
    }

    [Fact]
    public void Cropped_leaves_no_empty_pixel_in_either_picture()
    {
        foreach (var (rig, _) in RandomRigs.WithPoints(seed: 75, count: 4, pointsPerRig: 1))
        {
            foreach (var size in new PictureSize?[] { null, new(400, 300) })
            {
                var rectification = Rectification.Of(rig, RectificationFit.Cropped, size);
                Assert.Equal(size ?? rectification.Geometry.Size, rectification.Geometry.Size);
                foreach (var view in Enum.GetValues<View>())
                {
                    var map = rectification.SamplingMapOf(view);
                    Assert.Equal(0, OutOf(map.Columns, rig[view].Size.Width - 1));
                    Assert.Equal(0, OutOf(map.Rows, rig[view].Size.Height - 1));
                }
            }
        }
    }

    [Fact]
    public void Everything_keeps_every_raw_pixel_of_both_pictures()
    {
        var whole = 0;
        foreach (var (rig, _) in RandomRigs.WithPoints(seed: 76, count: 10, pointsPerRig: 1))
        {
            // Lenses whose model ends inside the picture cannot keep what lies beyond.
            if (rig.Left.TryUndistort(new(0, 0)) is null || rig.Right.TryUndistort(new(0, 0)) is null)
            {
                continue;
            }

            whole++;
            foreach (var rectification in new[] { Rectification.Of(rig, RectificationFit.Everything), Rectification.Of(rig, RectificationFit.Everything, new(500, 500)) })
            {
                Assert.InRange(rectification.UsableShare(View.Left), 0.99, 1);
                Assert.InRange(rectification.UsableShare(View.Right), 0.99, 1);
            }
        }

        Assert.True(whole >= 5, $"{whole}");
    }

    [Theory]
    [InlineData(0)]
    [InlineData(0.35)]
    [InlineData(0.6)]
    [InlineData(1.2)]
    public void Very_wide_lenses_are_rectified_into_pictures_of_bearable_size(double vergence)
    {
        // 130° across; turned towards each other, a part of each picture lies too far from the rectified axis to be kept, and in
        // the end each sees the other.
        var camera = new Camera(new(150, 150, 319.5, 239.5), new(640, 480));
        var rig = new Rig(camera, camera, Pose.FromVectors(new(0, vergence, 0), new(-100 * Math.Cos(vergence / 2), 0, 100 * Math.Sin(vergence / 2))));
        if (vergence > 1)
        {
            Assert.Throws<UserErrorException>(() => Rectification.Of(rig));
            return;
        }

        foreach (var fit in Enum.GetValues<RectificationFit>())
        {
            var rectification = Rectification.Of(rig, fit);
            Assert.InRange(rectification.Geometry.Size.Width, 200, 1281);
            Assert.InRange(rectification.Geometry.Size.Height, 100, 1281);
            Assert.InRange(Math.Abs(rectification.RowError(Matches.Of(rig, new(20, 30, 500)))), 0, 1e-9);
        }
    }

    [Fact]
    public void Usable_share_says_what_cropping_lost()
    {
        var camera = new Camera(new(800, 800, 319.5, 239.5), new(640, 480));

        // 2° of pitch between the cameras moves the rows by f·tan 2° = 28 px of 480.
        var rig = new Rig(camera, camera, Pose.FromVectors(new(2 * Math.PI / 180, 0, 0), new(-60, 0, 0)));
        Assert.InRange(Rectification.Of(rig).UsableShare(View.Left), 0.91, 0.95);
        Assert.InRange(Rectification.Of(rig, RectificationFit.Everything).UsableShare(View.Left), 0.999, 1);
    }

    [Fact]
    public void Verged_cameras_keep_columns_of_their_own_and_disparity_may_be_negative()
    {
        var camera = new Camera(new(800, 800, 319.5, 239.5), new(640, 480));

        // Both look at a point 1 m ahead of the middle of the baseline.
        var rig = new Rig(camera, camera, Pose.FromVectors(new(0, 2 * Math.Atan(0.2), 0), Toed()));
        var rectification = Rectification.Of(rig);
        Assert.True(rectification.UsableShare(View.Left) > 0.7, $"{rectification.UsableShare(View.Left)}");
        Assert.True(rectification.Geometry.Disparity(1e7) < 0);

        Vector3D Toed()
        {
            var half = Math.Atan(0.2);
            return new(-400 * Math.Cos(half), 0, 400 * Math.Sin(half));
        }
    }

    [Fact]
    public void The_sampling_map_is_the_exact_projection_in_single_precision()
    {
        var rig = RandomRigs.WithPoints(seed: 77, count: 1).Single().Rig;
        var rectification = Rectification.Of(rig, RectificationFit.Everything, new(160, 120));
        foreach (var view in Enum.GetValues<View>())
        {
            var map = rectification.SamplingMapOf(view);
            var seen = 0;
            for (var v = 0; v < 120; v++)
            {
                for (var u = 0; u < 160; u++)
                {
                    var exact = rectification.RawFromRectified(view, new(u, v));
                    var column = map.Columns.Span[v * 160 + u];
                    Assert.Equal(rig[view].Size.Contains(exact.U, exact.V), !float.IsNaN(column));
                    if (!float.IsNaN(column))
                    {
                        Assert.InRange(Math.Abs(column - exact.U), 0, 1.0 / 4096);
                        seen++;
                    }
                }
            }

            Assert.True(seen > 100, $"{view}: {seen}");
        }
    }

    [Fact]
    public void A_geometry_of_another_rig_is_refused()
    {
        var geometry = Rectification.Of(Plain(new(-60, 0, 0))).Geometry;
        Assert.Throws<UserErrorException>(() => new Rectification(Plain(new(-61, 0, 0)), geometry));
        Assert.Throws<UserErrorException>(() => new Rectification(Plain(new(-60, 1, 0)), geometry));
    }

    private static int OutOf(ReadOnlyMemory<float> positions, float last)
    {
        var outside = 0;
        foreach (var position in positions.Span)
        {
            outside += position >= 0 && position <= last ? 0 : 1;
        }

        return outside;
    }

    private static Rig Plain(Vector3D translation)
    {
        var camera = new Camera(new(800, 800, 320, 240), new(640, 480));
        return new(camera, camera, new(Matrix3x3.Identity, translation));
    }
}
