using System.Collections.Immutable;
using OpenCvSharp;
using Pairwright.Geometry;
using Pairwright.Imaging;

namespace Pairwright.Calibration;

/// <summary>Start values of one camera from OpenCV, after Zhang (2000): the twelve parameters and the board's pose in each view.</summary>
internal static class SingleCameraStart
{
    public static (double[] Camera, Pose[] CameraFromBoard) Of(
        IReadOnlyList<ImmutableArray<RawPixel>> views, Board board, PictureSize size, CalibrationModel model)
    {
        OpenCvLibrary.Require();
        var corners = board.Corners.Select(corner => new Point3f((float)corner.X, (float)corner.Y, 0)).ToArray();
        var matrix = new double[3, 3];
        var terms = new double[8];
        try
        {
            Cv2.CalibrateCamera(
                views.Select(_ => corners),
                views.Select(view => view.Select(pixel => new Point2f((float)pixel.U, (float)pixel.V))),
                new(size.Width, size.Height),
                matrix,
                terms,
                out var turns,
                out var shifts,
                Flags(model));
            double[] camera = [matrix[0, 0], matrix[1, 1], matrix[0, 2], matrix[1, 2], terms[0], terms[1], terms[2], terms[3], terms[4], terms[5], terms[6], terms[7]];
            if (model.SquarePixels)
            {
                camera[0] = camera[1] = (camera[0] + camera[1]) / 2;
            }

            return (camera, [.. turns.Zip(shifts, (turn, shift) => Pose.FromVectors(new(turn[0], turn[1], turn[2]), new(shift[0], shift[1], shift[2])))]);
        }
        catch (OpenCVException fault)
        {
            throw new UserErrorException(
                $"No camera explains the corners of these {views.Count} views; check that the board's counts fit the pictures and capture it tilted in several directions.", fault);
        }
    }

    private static CalibrationFlags Flags(CalibrationModel model)
    {
        var flags = CalibrationFlags.RationalModel;
        (LensTerms Term, CalibrationFlags Fix)[] held =
        [
            (LensTerms.K1, CalibrationFlags.FixK1), (LensTerms.K2, CalibrationFlags.FixK2), (LensTerms.K3, CalibrationFlags.FixK3),
            (LensTerms.K4, CalibrationFlags.FixK4), (LensTerms.K5, CalibrationFlags.FixK5), (LensTerms.K6, CalibrationFlags.FixK6),
            (LensTerms.Tangential, CalibrationFlags.ZeroTangentDist),
        ];
        return held.Where(entry => !model.Terms.HasFlag(entry.Term)).Aggregate(flags, (all, entry) => all | entry.Fix);
    }
}
