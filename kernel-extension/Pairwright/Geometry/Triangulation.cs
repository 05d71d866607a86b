using MathNet.Numerics.LinearAlgebra;

namespace Pairwright.Geometry;

/// <summary>Scene points from matched pixels of a rig's two views.</summary>
/// <remarks>
/// Two rays never quite meet. The linear method takes the least-squares solution of the projection equations (direct linear transform;
/// Hartley and Sturm 1997, "Linear-Eigen"); the midpoint method takes the middle of the shortest link between the rays. For exact matches
/// both give the point itself.
/// </remarks>
public static class Triangulation
{
    /// <summary>The linear method, from ideal pixels.</summary>
    public static TriangulatedPoint Linear(Rig rig, IdealPixel left, IdealPixel right) =>
        TriangulatedPoint.From(rig, new IdealMatch(left, right), LinearPosition);

    /// <summary>The linear method, from raw pixels.</summary>
    /// <exception cref="UserErrorException">A pixel lies outside its lens model's valid field.</exception>
    public static TriangulatedPoint Linear(Rig rig, RawPixel left, RawPixel right) =>
        TriangulatedPoint.From(rig, new RawMatch(left, right), LinearPosition);

    /// <summary>The midpoint method, from ideal pixels.</summary>
    public static TriangulatedPoint Midpoint(Rig rig, IdealPixel left, IdealPixel right) =>
        TriangulatedPoint.From(rig, new IdealMatch(left, right), MidpointPosition);

    /// <summary>The midpoint method, from raw pixels.</summary>
    /// <exception cref="UserErrorException">A pixel lies outside its lens model's valid field.</exception>
    public static TriangulatedPoint Midpoint(Rig rig, RawPixel left, RawPixel right) =>
        TriangulatedPoint.From(rig, new RawMatch(left, right), MidpointPosition);

    // Rows in pixels, so that both cameras weigh by their resolution; lengths in baselines, so that the columns are of one size.
    internal static Vector3D LinearPosition(Rig rig, IdealMatch match)
    {
        var baseline = rig.BaselineMm;
        var (rotation, translation) = (rig.RightFromLeft.Rotation, rig.RightFromLeft.Translation / baseline);
        var (left, right) = (rig.Left.Matrix, rig.Right.Matrix);
        var (xl, yl) = left.Normalise(match.Left);
        var (xr, yr) = right.Normalise(match.Right);
        var rowU = right.FocalU * (xr * rotation.Row3 - rotation.Row1);
        var rowV = right.FocalV * (yr * rotation.Row3 - rotation.Row2);
        var system = Matrix<double>.Build.DenseOfRowMajor(4, 4,
        [
            -left.FocalU, 0, left.FocalU * xl, 0,
            0, -left.FocalV, left.FocalV * yl, 0,
            rowU.X, rowU.Y, rowU.Z, right.FocalU * (xr * translation.Z - translation.X),
            rowV.X, rowV.Y, rowV.Z, right.FocalV * (yr * translation.Z - translation.Y),
        ]);
        var solution = system.Svd().VT.Row(3);
        return baseline / solution[3] * new Vector3D(solution[0], solution[1], solution[2]);
    }

    internal static Vector3D MidpointPosition(Rig rig, IdealMatch match)
    {
        var (onLeft, onRight) = ClosestPoints(rig.Left.Matrix, rig.Right.Matrix, rig.RightFromLeft, match);
        return 0.5 * (onLeft + onRight);
    }

    internal static bool IsInFrontOfBoth(CameraMatrix left, CameraMatrix right, Pose rightFromLeft, IdealMatch match)
    {
        var (depthLeft, depthRight) = Depths(left, right, rightFromLeft, match);
        return depthLeft > 0 && depthRight > 0;
    }

    // The ends of the shortest link between the two rays, in the left frame.
    internal static (Vector3D OnLeft, Vector3D OnRight) ClosestPoints(CameraMatrix left, CameraMatrix right, Pose rightFromLeft, IdealMatch match)
    {
        var (depthLeft, depthRight) = Depths(left, right, rightFromLeft, match);
        return (depthLeft * left.Direction(match.Left), rightFromLeft.Inverse.Transform(depthRight * right.Direction(match.Right)));
    }

    // The depths Z, each in its own camera's frame, of the ends of the shortest link; not finite for parallel rays.
    private static (double Left, double Right) Depths(CameraMatrix left, CameraMatrix right, Pose rightFromLeft, IdealMatch match)
    {
        var p = left.Direction(match.Left);
        var q = rightFromLeft.Rotation.Transpose * right.Direction(match.Right);
        var centre = -(rightFromLeft.Rotation.Transpose * rightFromLeft.Translation);
        var normal = p.Cross(q);
        var square = normal.Dot(normal);
        return (centre.Cross(q).Dot(normal) / square, centre.Cross(p).Dot(normal) / square);
    }
}
