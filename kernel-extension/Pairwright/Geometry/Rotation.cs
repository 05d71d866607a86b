namespace Pairwright.Geometry;

/// <summary>Rotation matrices to and from rotation vectors (axis times angle in radians; Rodrigues 1840).</summary>
public static class Rotation
{
    // Below this angle the closed forms lose digits to cancellation and the series below are exact to rounding.
    private const double SmallAngle = 1e-4;

    /// <summary>The rotation about the direction of <paramref name="vector"/> by its length in radians.</summary>
    public static Matrix3x3 FromVector(Vector3D vector)
    {
        var angle = vector.Norm;
        var square = angle * angle;
        var a = angle < SmallAngle ? 1 - square / 6 : Math.Sin(angle) / angle;
        var halfSine = Math.Sin(angle / 2);
        var b = angle < SmallAngle ? 0.5 - square / 24 : 2 * halfSine * halfSine / square;
        var k = Matrix3x3.Skew(vector);
        var kk = k * k;
        return Matrix3x3.FromRows(
            new Vector3D(1, 0, 0) + a * k.Row1 + b * kk.Row1,
            new Vector3D(0, 1, 0) + a * k.Row2 + b * kk.Row2,
            new Vector3D(0, 0, 1) + a * k.Row3 + b * kk.Row3);
    }

    /// <summary>The rotation vector of a rotation matrix, of length at most π.</summary>
    /// <exception cref="ArgumentException">The matrix is not a rotation.</exception>
    public static Vector3D ToVector(Matrix3x3 rotation)
    {
        if (!IsRotation(rotation))
        {
            throw new ArgumentException("The matrix is not a rotation: its transpose is not its inverse, or its determinant is not one.", nameof(rotation));
        }

        var axisTimesSine = 0.5 * new Vector3D(rotation.M32 - rotation.M23, rotation.M13 - rotation.M31, rotation.M21 - rotation.M12);
        var sine = axisTimesSine.Norm;
        var cosine = (rotation.M11 + rotation.M22 + rotation.M33 - 1) / 2;
        var angle = Math.Atan2(sine, cosine);
        if (angle < SmallAngle)
        {
            return (1 + angle * angle / 6) * axisTimesSine;
        }

        if (cosine > -0.9)
        {
            return angle / sine * axisTimesSine;
        }

        // Near half a turn the sine carries no digits: the axis is the largest column of R + Rᵀ + (1 − trace)·I, signed by the sine part.
        var trace = 2 * cosine + 1;
        var symmetric = Matrix3x3.FromRows(
            rotation.Row1 + rotation.Transpose.Row1 + new Vector3D(1 - trace, 0, 0),
            rotation.Row2 + rotation.Transpose.Row2 + new Vector3D(0, 1 - trace, 0),
            rotation.Row3 + rotation.Transpose.Row3 + new Vector3D(0, 0, 1 - trace));
        var axis = new[] { symmetric.Row1, symmetric.Row2, symmetric.Row3 }.MaxBy(row => row.Norm).Normalized;
        return axis.Dot(axisTimesSine) < 0 ? -angle * axis : angle * axis;
    }

    /// <summary>The rotation nearest, in the Frobenius norm, to a matrix that is nearly one, for instance read from a file with few digits.</summary>
    /// <remarks>The orthogonal polar factor U·Vᵀ of the singular value decomposition (Schönemann 1966).</remarks>
    /// <exception cref="ArgumentException">The matrix is not a rotation by <see cref="IsRotation"/>.</exception>
    public static Matrix3x3 Nearest(Matrix3x3 matrix)
    {
        if (!IsRotation(matrix))
        {
            throw new ArgumentException("The matrix is not a rotation: its transpose is not its inverse, or its determinant is not one.", nameof(matrix));
        }

        var svd = matrix.ToMatrix().Svd();
        return Matrix3x3.From(svd.U * svd.VT);
    }

    /// <summary>Whether a matrix is a rotation to one part in a million: orthogonal, with determinant one.</summary>
    public static bool IsRotation(Matrix3x3 matrix) => Deviation(matrix) < 1e-6 && matrix.Determinant > 0;

    internal static double Deviation(Matrix3x3 matrix)
    {
        var product = matrix * matrix.Transpose;
        return Matrix3x3.FromRows(
            product.Row1 - new Vector3D(1, 0, 0), product.Row2 - new Vector3D(0, 1, 0), product.Row3 - new Vector3D(0, 0, 1)).FrobeniusNorm;
    }
}
