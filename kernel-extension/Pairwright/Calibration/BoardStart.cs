using System.Collections.Immutable;
using OpenCvSharp;
using Pairwright.Geometry;
using Pairwright.Imaging;

namespace Pairwright.Calibration;

/// <summary>A first pose of a board before a calibrated camera, from OpenCV.</summary>
internal static class BoardStart
{
    /// <summary>The board's pose in the camera's frame.</summary>
    /// <exception cref="UserErrorException">The corners are not those of a board before the camera.</exception>
    public static Pose Of(Camera camera, ImmutableArray<RawPixel> corners, Board board, string name)
    {
        OpenCvLibrary.Require();
        var (k, d) = (camera.Matrix, camera.Distortion);
        var (turn, shift) = (new double[3], new double[3]);
        Cv2.SolvePnP(
            board.Corners.Select(corner => new Point3f((float)corner.X, (float)corner.Y, 0)),
            corners.Select(pixel => new Point2f((float)pixel.U, (float)pixel.V)),
            new[,] { { k.FocalU, 0, k.CentreU }, { 0, k.FocalV, k.CentreV }, { 0, 0, 1 } },
            [d.K1, d.K2, d.P1, d.P2, d.K3, d.K4, d.K5, d.K6],
            ref turn,
            ref shift);
        var pose = Pose.FromVectors(new(turn[0], turn[1], turn[2]), new(shift[0], shift[1], shift[2]));
        return board.Corners.All(corner => pose.Transform(corner).Z > 0)
            ? pose
            : throw new UserErrorException($"The corners of view {name} are not those of a {board} before the left camera; check the board's counts and the rig.");
    }
}
