using Pairwright.Calibration;
using Pairwright.Geometry;
using Pairwright.Imaging;
using Pairwright.Simulation;
using Xunit;

namespace Pairwright.Tests.Calibration;

public class Bad_boards_are_explained
{
    private static readonly Rig Rig = TarnHollow.Rig;
    private static readonly Board Board = BoardData.DemoBoard;
    private static readonly BoardCorners[] Views = BoardData.Noisy(BoardData.Views(Rig, Board, 10, 7), 0.1, new(8));

    [Fact]
    public void Three_views_are_too_few() =>
        Refused(() => Calibrate(Views[..3]), "at least 4 views", "3 of 3", "capture more");

    [Fact]
    public void A_view_with_too_few_corners_is_named() =>
        Refused(() => Calibrate([.. Views[..5], new("bent", [.. Views[5].Left.Take(53)], Views[5].Right)]), "View bent", "53 left", "54");

    [Fact]
    public void Pictures_without_a_board_are_named_with_what_to_do()
    {
        var size = Rig.Left.Size;
        var blank = new Picture(size, new ushort[size.Width * size.Height], 8);
        var pairs = Enumerable.Range(0, 5).Select(i => new StereoPair(blank, blank, name: $"blank-{i}")).ToArray();
        Refused(() => RigCalibration.FromBoards(pairs, Board), "0 of 5", "blank-0", "show the whole board");
    }

    [Fact]
    public void A_board_numbered_from_the_other_end_in_one_camera_is_mended_and_named()
    {
        var turned = Views.Select((view, i) => i == 4 ? new BoardCorners(view.Name, view.Left, [.. view.Right.Reverse()]) : view).ToArray();
        var (mended, straight) = (Calibrate(turned), Calibrate(Views));
        Assert.Equal(straight.StereoRmsPx, mended.StereoRmsPx, 1e-9);
        Assert.Contains("renumbered by half a turn", Assert.Single(mended.Views, view => view.Mended is not null).Mended);
    }

    [Fact]
    public void A_smeared_view_is_called_outlying_and_no_other()
    {
        var smeared = Views.Select((view, i) => i == 6 ? BoardData.Noisy([view], 1.0, new(9))[0] : view).ToArray();
        var calibration = Calibrate(smeared);
        Assert.Equal(Views[6].Name, Assert.Single(calibration.Views, view => view.Outlying).Name);
        Assert.Contains(calibration.Advice, advice => advice.Contains($"View {Views[6].Name} stands out", StringComparison.Ordinal));
    }

    [Fact]
    public void Captures_of_different_sizes_are_refused()
    {
        var small = new Picture(new(64, 48), new ushort[64 * 48], 8);
        var large = new Picture(new(65, 48), new ushort[65 * 48], 8);
        Refused(
            () => RigCalibration.FromBoards([new StereoPair(small, small, name: "first"), new StereoPair(large, large, name: "second")], Board),
            "'second'", "65 × 48", "64 × 48");
    }

    [Fact]
    public void Boards_that_all_face_the_camera_do_not_tell_the_focal_length()
    {
        var pose = new Pose(Matrix3x3.Identity, new(-160, -100, 1000));
        var corners = Enumerable.Range(0, 6).Select(i =>
        {
            var moved = pose with { Translation = pose.Translation + new Vector3D(10 * i, 5 * i, 0) };
            return new BoardCorners(
                $"{i}",
                [.. Board.Corners.Select(corner => Rig.Left.Project(moved.Transform(corner)))],
                [.. Board.Corners.Select(corner => Rig.Right.Project(Rig.RightFromLeft.Transform(moved.Transform(corner))))]);
        }).ToArray();

        // Either it says that the views do not determine the cameras, or it gives deviations so large that nobody trusts them: never a confident rig.
        double sigma;
        try
        {
            sigma = Calibrate(BoardData.Noisy(corners, 0.1, new(3))).Rig.StandardUncertainty(0);
        }
        catch (UserErrorException fault)
        {
            Assert.Contains("tilted", fault.Message, StringComparison.Ordinal);
            sigma = double.PositiveInfinity;
        }

        Assert.True(sigma > 5);
    }

    [Fact]
    public void Advice_asks_for_tilt_distance_and_the_parts_of_the_picture_that_were_not_reached()
    {
        var calibration = Calibrate(Views[..5]);
        Assert.Contains(calibration.Advice, advice => advice.StartsWith("Capture more views: 5", StringComparison.Ordinal));
        Assert.Contains(calibration.Advice, advice => advice.StartsWith("Capture the board so that it reaches", StringComparison.Ordinal));
    }

    private static RigCalibration Calibrate(BoardCorners[] views) => RigCalibration.FromCorners(views, Board, Rig.Left.Size, Rig.Right.Size);

    private static void Refused(Action action, params string[] words)
    {
        var fault = Assert.Throws<UserErrorException>(action);
        Assert.All(words, word => Assert.Contains(word, fault.Message, StringComparison.Ordinal));
        Assert.DoesNotContain('\n', fault.Message);
    }
}
