using MathNet.Numerics.LinearAlgebra;

namespace Pairwright.Geometry;

/// <summary>A scene point told from one match, with what its position owes to pixel noise and to the rig.</summary>
/// <remarks>Immutable. Positions are in the left camera's frame, in millimetres; covariances in mm².</remarks>
public sealed class TriangulatedPoint
{
    // Small against any disparity worth measuring, large against rounding.
    private const double DifferenceStepPx = 1e-3;

    private readonly Func<Rig, double[], Vector3D> triangulate;
    private readonly double[] coordinates;

    private TriangulatedPoint(Rig rig, double[] coordinates, IdealMatch match, Func<Rig, double[], Vector3D> triangulate)
    {
        (Rig, this.coordinates, Match, this.triangulate) = (rig, coordinates, match, triangulate);
        Position = triangulate(rig, coordinates);
        PositionInRight = rig.RightFromLeft.Transform(Position);
        var (onLeft, onRight) = Triangulation.ClosestPoints(rig.Left.Matrix, rig.Right.Matrix, rig.RightFromLeft, match);
        RayGapMm = (onLeft - onRight).Norm;
    }

    /// <summary>The rig.</summary>
    public Rig Rig { get; }

    /// <summary>The match, in ideal pixels.</summary>
    public IdealMatch Match { get; }

    /// <summary>The point in the left camera's frame, in millimetres. It may lie behind a camera.</summary>
    public Vector3D Position { get; }

    /// <summary>The point in the right camera's frame, in millimetres.</summary>
    public Vector3D PositionInRight { get; }

    /// <summary>Whether the point lies in front of the left camera (cheirality; Hartley 1998).</summary>
    public bool InFrontOfLeft => Position.Z > 0;

    /// <summary>Whether the point lies in front of the right camera.</summary>
    public bool InFrontOfRight => PositionInRight.Z > 0;

    /// <summary>Whether the point lies in front of both cameras; a match for which it does not cannot be one.</summary>
    public bool InFrontOfBoth => InFrontOfLeft && InFrontOfRight;

    /// <summary>The length of the shortest link between the two rays, in millimetres; zero for an exact match.</summary>
    public double RayGapMm { get; }

    /// <summary>The angle at the point between the directions to the two cameras, in degrees; the smaller, the less certain the depth.</summary>
    public double ParallaxDegrees
    {
        get
        {
            var (toLeft, toRight) = (Position, Rig.RightFromLeft.Rotation.Transpose * PositionInRight);
            return Math.Atan2(toLeft.Cross(toRight).Norm, toLeft.Dot(toRight)) * 180 / Math.PI;
        }
    }

    /// <summary>The distances, in pixels, between the point's ideal projections and the match; NaN where it lies behind the camera.</summary>
    public (double Left, double Right) ReprojectionPx =>
        (Distance(Rig.Left.ProjectIdeal(Position), Match.Left), Distance(Rig.Right.ProjectIdeal(PositionInRight), Match.Right));

    /// <summary>The random part: the covariance of the position that pixel noise makes, 3 × 3, in mm².</summary>
    /// <remarks>
    /// The law of propagation (JCGM 100:2008, 5.1) by central differences, for independent noise of one size in all four coordinates; raw
    /// ones where the point was told from raw pixels, ideal ones otherwise.
    /// </remarks>
    /// <param name="sigmaPx">The standard deviation of each coordinate, in pixels.</param>
    public Matrix<double> RandomCovariance(double sigmaPx)
    {
        ArgumentOutOfRangeException.ThrowIfNegative(sigmaPx);
        var sum = Matrix<double>.Build.Dense(3, 3);
        for (var i = 0; i < coordinates.Length; i++)
        {
            var slope = (Moved(i, DifferenceStepPx) - Moved(i, -DifferenceStepPx)) / (2 * DifferenceStepPx);
            AddSquare(sum, sigmaPx * slope);
        }

        return sum;
    }

    /// <summary>
    /// The common part: the covariance of the position that the rig's own covariance makes, 3 × 3, in mm²; nothing where the rig has none.
    /// It averages out over no number of points.
    /// </summary>
    /// <remarks>
    /// The law of propagation (JCGM 100:2008, 5.2) by central differences along the principal axes of the rig's covariance. The uncertainty
    /// of the lenses takes part only where the point was told from raw pixels.
    /// </remarks>
    public Matrix<double>? CommonCovariance()
    {
        if (Rig.Covariance is null)
        {
            return null;
        }

        var sum = Matrix<double>.Build.Dense(3, 3);
        foreach (var change in Rig.PrincipalChanges())
        {
            var difference = triangulate(Rig.Changed(change), coordinates)
                - triangulate(Rig.Changed([.. change.Select(value => -value)]), coordinates);
            AddSquare(sum, 0.5 * difference);
        }

        return sum;
    }

    /// <summary>The position, and whether it lies behind a camera.</summary>
    public override string ToString() => $"{Position} mm{(InFrontOfBoth ? "" : ", behind a camera")}";

    internal static TriangulatedPoint From(Rig rig, IdealMatch match, Func<Rig, IdealMatch, Vector3D> method)
    {
        ArgumentNullException.ThrowIfNull(rig);
        return new(
            rig,
            [match.Left.U, match.Left.V, match.Right.U, match.Right.V],
            match,
            (changed, at) => method(changed, new(new(at[0], at[1]), new(at[2], at[3]))));
    }

    internal static TriangulatedPoint From(Rig rig, RawMatch match, Func<Rig, IdealMatch, Vector3D> method)
    {
        ArgumentNullException.ThrowIfNull(rig);
        return new(
            rig,
            [match.Left.U, match.Left.V, match.Right.U, match.Right.V],
            rig.Undistort(match),
            (changed, at) => method(changed, changed.Undistort(new RawMatch(new(at[0], at[1]), new(at[2], at[3])))));
    }

    private static void AddSquare(Matrix<double> sum, Vector3D v)
    {
        var vector = Vector<double>.Build.Dense([v.X, v.Y, v.Z]);
        vector.OuterProduct(vector).Add(sum, sum);
    }

    private static double Distance(IdealPixel a, IdealPixel b) => Math.Sqrt((a.U - b.U) * (a.U - b.U) + (a.V - b.V) * (a.V - b.V));

    private Vector3D Moved(int coordinate, double step)
    {
        var moved = (double[])coordinates.Clone();
        moved[coordinate] += step;
        return triangulate(Rig, moved);
    }
}
