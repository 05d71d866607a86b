using OpenCvSharp;
using Pairwright.Geometry;
using Pairwright.Imaging;
using Xunit;

namespace Pairwright.Tests.Imaging;

public class Pairs_are_rectified
{
    private static readonly PictureSize Size = new(120, 90);

    // A plane far away, textured by a smooth function of direction, seen through distorting lenses: the rectified pictures have to hold
    // the function of the rectified direction, worked out without any picture.
    [Theory]
    [InlineData(View.Left)]
    [InlineData(View.Right)]
    public void A_smooth_scene_at_infinity_looks_as_the_rectified_camera_would_see_it(View view)
    {
        var left = new Camera(new(150, 151, 60, 44), Size, new(-0.12, 0.03, 0.001, -0.0005));
        var right = new Camera(new(149, 150, 58, 46), Size, new(-0.1, 0.02, -0.0008, 0.0004));
        var rig = new Rig(left, right, Pose.FromVectors(new(0.01, -0.02, 0.015), new(-80, 1, 2)));
        Picture Shot(View shotView)
        {
            var levels = new ushort[Size.Area];
            for (var i = 0; i < levels.Length; i++)
            {
                var ray = rig[shotView].Ray(rig[shotView].Undistort(new(i % Size.Width, i / Size.Width)));
                levels[i] = (ushort)Math.Round(Scene(shotView == View.Left ? ray : rig.RightFromLeft.Rotation.Transpose * ray));
            }

            return new(Size, levels, 12);
        }

        var rectified = new StereoPair(Shot(View.Left), Shot(View.Right), rig).Rectify();

        var picture = view == View.Left ? rectified.Left : rectified.Right;
        var geometry = rectified.Geometry!;
        double squares = 0;
        var count = 0;
        for (var v = 3; v < picture.Size.Height - 3; v++)
        {
            for (var u = 3; u < picture.Size.Width - 3; u++)
            {
                if (picture.Usable is { } usable && !usable[u, v])
                {
                    continue;
                }

                var centre = view == View.Left ? geometry.CentreU : geometry.CentreU + geometry.OffsetPixels;
                var direction = geometry.LeftFromRectified * new Vector3D((u - centre) / geometry.FocalPixels, (v - geometry.CentreV) / geometry.FocalPixels, 1);
                squares += Math.Pow(picture[u, v] - Scene(direction.Normalized), 2);
                count++;
            }
        }

        Assert.InRange(count, 5000, Size.Area);
        Assert.InRange(Math.Sqrt(squares / count), 0, 3); // of 4095: less than a fifth of a grey level of an 8-bit picture
        Assert.Equal(12, picture.SignificantBits);
    }

    // Source: OpenCV's corner finder on the raw and on the rectified picture of a real board; the rig's lenses are the published ones.
    [SkippableFact]
    public void Corners_of_a_real_board_are_found_in_the_rectified_pictures_where_geometry_says()
    {
        using var folder = new TestFolder();
        var pose = folder.Write(
            "pose.yml", "%YAML:1.0\nR: !!opencv-matrix\n   rows: 3\n   cols: 1\n   dt: d\n   data: [ 0.01, 0.02, -0.01 ]\nT: !!opencv-matrix\n   rows: 3\n   cols: 1\n   dt: d\n   data: [ -83., 1., 1. ]\n");
        var rig = RigFile.ReadMatrices(OpenData.Find("published/intrinsics.yml"), new(640, 480), posePath: pose);
        double squares = 0;
        var count = 0;
        var pair = StereoPair.Read(OpenData.Find("boards/left01.jpg"), OpenData.Find("boards/right01.jpg"), rig);
        var rectified = pair.Rectify(RectificationFit.Everything);
        foreach (var view in Enum.GetValues<View>())
        {
            using var raw = Eight(pair[view]);
            Assert.True(Cv2.FindChessboardCorners(raw, new(9, 6), out var found));
            var expected = Refined(raw, found)
                .Select(corner => rectified.Rectification!.Rectify(view, new RawPixel(corner.X, corner.Y))).ToArray();
            using var straight = Eight(view == View.Left ? rectified.Left : rectified.Right);
            var seen = Refined(straight, [.. expected.Select(corner => new Point2f((float)corner.U, (float)corner.V))]);
            squares += expected.Zip(seen, (e, s) => Math.Pow(e.U - s.X, 2) + Math.Pow(e.V - s.Y, 2)).Sum();
            count += expected.Length;
        }

        // The finder's window sees other pixels after the turn.
        Assert.InRange(Math.Sqrt(squares / count), 0, 0.08);
    }

    [Fact]
    public void A_pair_that_is_parallel_and_without_distortion_passes_unchanged()
    {
        var camera = new Camera(new(100, 100, 59.5, 44.5), Size);
        var pair = new StereoPair(
            Patterns.Picture(120, 90, 10, seed: 1, colour: true), Patterns.Picture(120, 90, 10, seed: 2), new(camera, camera, new(Matrix3x3.Identity, new(-50, 0, 0))));

        var rectified = pair.Rectify(new Rectification(pair.Rig!, new RectifiedGeometry(100, 50, 0, 59.5, 44.5, Size)));

        Assert.Equal(pair.Left.Grey.ToArray(), rectified.Left.Grey.ToArray());
        Assert.Equal(pair.Left.Colour.ToArray(), rectified.Left.Colour.ToArray());
        Assert.Equal(pair.Right.Grey.ToArray(), rectified.Right.Grey.ToArray());
        Assert.Null(rectified.Left.Usable);
    }

    [Fact]
    public void Keeping_everything_marks_what_no_camera_saw()
    {
        var camera = new Camera(new(100, 100, 59.5, 44.5), Size, new(-0.1));
        var rig = new Rig(camera, camera, Pose.FromVectors(new(0, 0.05, 0), new(-50, 0, 0)));
        var rectified = new StereoPair(Patterns.Picture(120, 90), Patterns.Picture(120, 90), rig).Rectify(RectificationFit.Everything);

        Assert.InRange(rectified.Left.Usable!.Share, 0.4, 0.999);
        for (var v = 0; v < rectified.Size.Height; v++)
        {
            for (var u = 0; u < rectified.Size.Width; u++)
            {
                var raw = rectified.Rectification!.RawFromRectified(View.Left, new(u, v));
                var inside = raw.U is > -0.499 and < 119.499 && raw.V is > -0.499 and < 89.499;
                var outside = !(raw.U is > -0.501 and < 119.501 && raw.V is > -0.501 and < 89.501);
                Assert.True(inside ? rectified.Left.Usable[u, v] : !outside || !rectified.Left.Usable[u, v]);
            }
        }
    }

    [Fact]
    public void Cameras_of_different_sizes_and_bits_give_pictures_of_one_size_and_depth()
    {
        var left = new Camera(new(100, 100, 59.5, 44.5), Size);
        var right = new Camera(new(130, 130, 79.5, 59.5), new(160, 120));
        var pair = new StereoPair(Patterns.Picture(120, 90, 8), Patterns.Picture(160, 120, 12), new(left, right, new(Matrix3x3.Identity, new(-50, 0, 0))));

        var rectified = pair.Rectify();

        Assert.Equal(rectified.Left.Size, rectified.Right.Size);
        Assert.Equal((12, 12), (rectified.Left.SignificantBits, rectified.Right.SignificantBits));
        Assert.Equal(255 * 16, rectified.Left.SaturationLevel);
        Assert.Contains(pair.Warnings, warning => warning.Contains("120 × 90") && warning.Contains("160 × 120"));
    }

    [Fact]
    public void A_pair_without_a_rig_says_what_to_do()
    {
        var pair = new StereoPair(Patterns.Picture(8, 8), Patterns.Picture(8, 8), name: "07");

        var fault = Assert.Throws<UserErrorException>(() => pair.Rectify());

        Assert.Contains("07", fault.Message);
        Assert.Same(pair.Left, pair.AsRectified().Left);
    }

    [Fact]
    public void A_rig_of_other_picture_sizes_is_refused()
    {
        var camera = new Camera(new(100, 100, 59.5, 44.5), Size);
        var rig = new Rig(camera, camera, new(Matrix3x3.Identity, new(-50, 0, 0)));

        var fault = Assert.Throws<UserErrorException>(() => new StereoPair(Patterns.Picture(120, 90), Patterns.Picture(90, 120), rig));

        Assert.Contains("90 × 120", fault.Message);
        Assert.Contains("right", fault.Message);
    }

    [Fact]
    public void Geometry_for_another_size_is_refused()
    {
        var fault = Assert.Throws<UserErrorException>(() =>
            new RectifiedPair(Patterns.Picture(10, 10), Patterns.Picture(10, 10), new RectifiedGeometry(100, 50, 0, 5, 5, new(20, 20))));

        Assert.Contains("20 × 20", fault.Message);
    }

    private static Mat Eight(Picture picture)
    {
        var mat = new Mat(picture.Size.Height, picture.Size.Width, MatType.CV_8UC1);
        PictureCodec.EightBits(picture.Grey, picture.SignificantBits).CopyTo(mat.AsSpan<byte>());
        return mat;
    }

    private static Point2f[] Refined(Mat picture, Point2f[] corners) =>
        Cv2.CornerSubPix(picture, corners, new(5, 5), new(-1, -1), new(CriteriaTypes.Eps | CriteriaTypes.MaxIter, 50, 0.001));

    // Smooth over directions, with periods of some 20 pixels.
    private static double Scene(Vector3D direction) =>
        2048 + 800 * Math.Sin(40 * direction.X / direction.Z) * Math.Cos(35 * direction.Y / direction.Z);
}
