using System.Collections.Immutable;
using Pairwright.Geometry;

namespace Pairwright.Calibration;

/// <summary>What a rig makes of one view's corners.</summary>
internal static class BoardGeometry
{
    /// <summary>Root mean square distance of the right corners from the epipolar lines of the left ones, in ideal pixels of the right view.</summary>
    public static double EpipolarRmsPx(Rig rig, ImmutableArray<RawPixel> left, ImmutableArray<RawPixel> right)
    {
        var f = rig.FundamentalMatrix;
        return Math.Sqrt(left.Zip(right, (l, r) => f.EpipolarDistance(rig.Left.Undistort(l), rig.Right.Undistort(r))).Average(distance => distance * distance));
    }

    /// <summary>The triangulated distances between neighbouring corners, in millimetres, in the order of <see cref="Board.Sides"/>.</summary>
    public static double[] SidesMm(Rig rig, Board board, ImmutableArray<RawPixel> left, ImmutableArray<RawPixel> right)
    {
        var points = left.Zip(right, (l, r) => Triangulation.Linear(rig, l, r).Position).ToArray();
        return [.. board.Sides.Select(side => (points[side.Second] - points[side.First]).Norm)];
    }
}
