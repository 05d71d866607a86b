using System.Collections.Immutable;
using OpenCvSharp;
using Pairwright.Geometry;
using Pairwright.Imaging;

namespace Pairwright.Calibration;

/// <summary>Finds a checkerboard's inner corners in a picture, numbered so that both cameras agree.</summary>
/// <remarks>
/// OpenCV finds the board and refines each corner to where the gradients around it are orthogonal to their offsets (Förstner and Gülch 1987).
/// The window of the refinement follows the spacing of the corners in the picture: a third of the smallest spacing, so that a board seen at a slant does not bring its next corners in.
/// </remarks>
internal static class CornerFinder
{
    private const int LargestReach = 11;

    /// <summary>The corners in the order of <see cref="Board.Corners"/>; empty where the whole board is not seen.</summary>
    public static ImmutableArray<RawPixel> Find(Picture picture, Board board)
    {
        OpenCvLibrary.Require();
        using var grey = EightBits(picture);
        var pattern = new Size(board.InnerCornersAcross, board.InnerCornersDown);
        if (!Cv2.FindChessboardCorners(grey, pattern, out Point2f[] found, ChessboardFlags.AdaptiveThresh | ChessboardFlags.NormalizeImage))
        {
            return [];
        }

        var reach = Math.Clamp((int)(SmallestSpacing(found, board) / 3), 2, LargestReach);
        var refined = Cv2.CornerSubPix(grey, found, new(reach, reach), new(-1, -1), new(CriteriaTypes.Eps | CriteriaTypes.MaxIter, 100, 1e-4));
        ImmutableArray<RawPixel> corners = [.. refined.Select(point => new RawPixel(point.X, point.Y))];
        return board.ColoursTellHalfTurn && !StartsDark(picture, corners, board) ? [.. corners.Reverse()] : corners;
    }

    private static Mat EightBits(Picture picture)
    {
        var shift = picture.SignificantBits - 8;
        return Mat.FromPixelData(
            picture.Size.Height, picture.Size.Width, MatType.CV_8UC1, Array.ConvertAll(picture.Grey.ToArray(), level => (byte)(level >> shift))).Clone();
    }

    private static double SmallestSpacing(Point2f[] corners, Board board) =>
        board.Sides.Min(side => (double)Point2f.Distance(corners[side.First], corners[side.Second]));

    // Whether the square before corner 0 is dark. All squares between the corners vote, so that no shadow decides alone.
    private static bool StartsDark(Picture picture, ImmutableArray<RawPixel> corners, Board board)
    {
        var difference = 0.0;
        for (var row = 0; row < board.InnerCornersDown - 1; row++)
        {
            for (var column = 0; column < board.InnerCornersAcross - 1; column++)
            {
                var first = row * board.InnerCornersAcross + column;
                var (a, b) = (corners[first], corners[first + board.InnerCornersAcross + 1]);
                var u = Math.Clamp((int)Math.Round((a.U + b.U) / 2), 0, picture.Size.Width - 1);
                var v = Math.Clamp((int)Math.Round((a.V + b.V) / 2), 0, picture.Size.Height - 1);
                difference += (row + column) % 2 == 0 ? picture[u, v] : -picture[u, v];
            }
        }

        return difference < 0;
    }
}
