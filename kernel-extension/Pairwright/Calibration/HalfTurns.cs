using Pairwright.Geometry;

namespace Pairwright.Calibration;

/// <summary>Settles whether both cameras number a board's corners from the same end.</summary>
/// <remarks>
/// A checkerboard looks the same when it is turned by 180° but for its colours, which may not tell. The pose between the cameras does: it is the
/// same in all views, and a view numbered from the other end in one picture disagrees by half a turn.
/// </remarks>
internal static class HalfTurns
{
    public static (BoardView[] Views, Pose[] RightPoses, Pose RightFromLeft) Resolve(BoardView[] views, Pose[] leftPoses, Pose[] rightPoses, Board board)
    {
        var given = leftPoses.Zip(rightPoses, (left, right) => left.Inverse.Then(right)).ToArray();

        // The view that the others agree with most stands for all.
        var usual = given.MinBy(pose => given.Sum(other => Math.Min(Angle(pose, other), 0.5)));
        var (mended, poses) = ((BoardView[])views.Clone(), (Pose[])rightPoses.Clone());
        var fromEnd = new Pose(new(-1, 0, 0, 0, -1, 0, 0, 0, 1), board.Corners[^1]);
        for (var i = 0; i < views.Length; i++)
        {
            var turned = fromEnd.Then(rightPoses[i]);
            if (Angle(leftPoses[i].Inverse.Then(turned), usual) < Angle(given[i], usual))
            {
                poses[i] = turned;
                mended[i] = views[i] with
                {
                    Right = [.. views[i].Right.Reverse()],
                    Mended = $"The corners of the right picture of view {views[i].Name} were numbered from the other end of the board; they were renumbered by half a turn.",
                };
            }
        }

        return (mended, poses, usual);
    }

    private static double Angle(Pose a, Pose b) => Rotation.ToVector(a.Rotation * b.Rotation.Transpose).Norm;
}
