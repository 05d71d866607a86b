using System.Collections.Immutable;

namespace Pairwright.Geometry;

/// <summary>The essential matrix E = [t]× · R of two calibrated views, with ‖t‖ = 1: y_rightᵀ · E · y_left = 0 for directions y = K⁻¹·x.</summary>
/// <remarks>Immutable. Two singular values are one, the third zero. See Longuet-Higgins (1981) and Huang and Faugeras (1989).</remarks>
public sealed class EssentialMatrix
{
    private EssentialMatrix(Matrix3x3 matrix, ImmutableArray<double> givenSingularValues) =>
        (Matrix, GivenSingularValues) = (matrix, givenSingularValues);

    /// <summary>The matrix; its singular values are 1, 1 and 0.</summary>
    public Matrix3x3 Matrix { get; }

    /// <summary>The singular values, falling, before two were made equal, over the mean of the first two: 1, 1, 0 for a true essential matrix.</summary>
    public ImmutableArray<double> GivenSingularValues { get; }

    /// <summary>The essential matrix nearest, in the Frobenius norm, to a given matrix of any scale, with singular values 1, 1 and 0.</summary>
    /// <param name="matrix">Nine finite numbers, of rank two or three.</param>
    /// <exception cref="UserErrorException">An entry is not finite, or the rank is below two.</exception>
    public static EssentialMatrix From(Matrix3x3 matrix)
    {
        if (!double.IsFinite(matrix.FrobeniusNorm))
        {
            throw new UserErrorException("An essential matrix has nine finite entries; correct the matrix.");
        }

        var svd = matrix.ToMatrix().Svd();
        if (svd.S[1] <= 1e-12 * svd.S[0])
        {
            throw new UserErrorException("An essential matrix has rank two, but the given one has a lower rank; correct the matrix.");
        }

        var mean = (svd.S[0] + svd.S[1]) / 2;
        var nearest = svd.U.Column(0).OuterProduct(svd.VT.Row(0)) + svd.U.Column(1).OuterProduct(svd.VT.Row(1));
        return new(Matrix3x3.From(nearest), [svd.S[0] / mean, svd.S[1] / mean, svd.S[2] / mean]);
    }

    /// <summary>
    /// The four poses that share the essential matrix up to sign, each with a translation of length one: two rotations, each with both signs
    /// of the translation. In one of them only do scene points lie in front of both cameras.
    /// </summary>
    /// <remarks>Hartley and Zisserman (2003, result 9.19).</remarks>
    public ImmutableArray<Pose> Poses()
    {
        var svd = Matrix.ToMatrix().Svd();
        var (u, vt) = (Matrix3x3.From(svd.U), Matrix3x3.From(svd.VT));
        u = u.Determinant < 0 ? -1 * u : u;
        vt = vt.Determinant < 0 ? -1 * vt : vt;
        var quarterTurn = new Matrix3x3(0, -1, 0, 1, 0, 0, 0, 0, 1);
        var (first, second) = (u * quarterTurn * vt, u * quarterTurn.Transpose * vt);
        var translation = u.Transpose.Row3;
        return [new(first, translation), new(first, -translation), new(second, translation), new(second, -translation)];
    }

    /// <summary>The one pose of four that puts most matches in front of both cameras (cheirality).</summary>
    /// <param name="left">The left camera's linear part.</param>
    /// <param name="right">The right camera's linear part.</param>
    /// <param name="matches">At least one match, in ideal pixels.</param>
    /// <exception cref="UserErrorException">No match is given, or two poses put equally many in front, so that the matches decide nothing.</exception>
    public RecoveredPose PoseInFrontOf(CameraMatrix left, CameraMatrix right, IReadOnlyList<IdealMatch> matches)
    {
        ArgumentNullException.ThrowIfNull(matches);
        var counts = Poses()
            .Select(pose => (Pose: pose, Count: matches.Count(match => Triangulation.IsInFrontOfBoth(left, right, pose, match))))
            .OrderByDescending(candidate => candidate.Count)
            .ToArray();
        if (counts[0].Count == counts[1].Count)
        {
            throw new UserErrorException(
                $"The {matches.Count} matches do not tell on which side of the cameras the scene lies ({counts[0].Count} in front for two poses); give more matches of nearer points.");
        }

        return new(counts[0].Pose, counts[0].Count, matches.Count);
    }

    /// <summary>The matrix.</summary>
    public override string ToString() => $"E = {Matrix}";

    internal static EssentialMatrix Of(Rig rig) =>
        new(Matrix3x3.Skew(rig.RightFromLeft.Translation.Normalized) * rig.RightFromLeft.Rotation, [1, 1, 0]);
}
