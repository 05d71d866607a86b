using System.Globalization;
using MathNet.Numerics.LinearAlgebra;

namespace Pairwright.Geometry;

/// <summary>A three by three matrix as a value; the entry Mrc stands in row r and column c.</summary>
/// <remarks>For products in inner loops. Decompositions go through <see cref="ToMatrix"/> and MathNet.Numerics.</remarks>
public readonly record struct Matrix3x3(
    double M11, double M12, double M13,
    double M21, double M22, double M23,
    double M31, double M32, double M33)
{
    /// <summary>The identity.</summary>
    public static Matrix3x3 Identity { get; } = new(1, 0, 0, 0, 1, 0, 0, 0, 1);

    /// <summary>The transpose.</summary>
    public Matrix3x3 Transpose => new(M11, M21, M31, M12, M22, M32, M13, M23, M33);

    /// <summary>The determinant.</summary>
    public double Determinant => Row1.Dot(Row2.Cross(Row3));

    /// <summary>The first row.</summary>
    public Vector3D Row1 => new(M11, M12, M13);

    /// <summary>The second row.</summary>
    public Vector3D Row2 => new(M21, M22, M23);

    /// <summary>The third row.</summary>
    public Vector3D Row3 => new(M31, M32, M33);

    /// <summary>The root of the sum of the squared entries.</summary>
    public double FrobeniusNorm => Math.Sqrt(Row1.Dot(Row1) + Row2.Dot(Row2) + Row3.Dot(Row3));

    /// <summary>The inverse.</summary>
    /// <exception cref="InvalidOperationException">The matrix is singular.</exception>
    public Matrix3x3 Inverse
    {
        get
        {
            var determinant = Determinant;
            if (determinant == 0 || !double.IsFinite(determinant))
            {
                throw new InvalidOperationException("A singular matrix has no inverse.");
            }

            var first = Row2.Cross(Row3) / determinant;
            var second = Row3.Cross(Row1) / determinant;
            var third = Row1.Cross(Row2) / determinant;
            return FromRows(first, second, third).Transpose;
        }
    }

    /// <summary>A matrix from its rows.</summary>
    public static Matrix3x3 FromRows(Vector3D first, Vector3D second, Vector3D third) =>
        new(first.X, first.Y, first.Z, second.X, second.Y, second.Z, third.X, third.Y, third.Z);

    /// <summary>[v]×, the matrix whose product with w is v × w.</summary>
    public static Matrix3x3 Skew(Vector3D v) => new(0, -v.Z, v.Y, v.Z, 0, -v.X, -v.Y, v.X, 0);

    /// <summary>A matrix from a MathNet matrix of shape 3 × 3.</summary>
    public static Matrix3x3 From(Matrix<double> m)
    {
        ArgumentNullException.ThrowIfNull(m);
        return new(m[0, 0], m[0, 1], m[0, 2], m[1, 0], m[1, 1], m[1, 2], m[2, 0], m[2, 1], m[2, 2]);
    }

    /// <summary>A new MathNet matrix of shape 3 × 3.</summary>
    public Matrix<double> ToMatrix() =>
        Matrix<double>.Build.DenseOfRowMajor(3, 3, [M11, M12, M13, M21, M22, M23, M31, M32, M33]);

    /// <summary>The product with a vector.</summary>
    public static Vector3D operator *(Matrix3x3 m, Vector3D v) => new(m.Row1.Dot(v), m.Row2.Dot(v), m.Row3.Dot(v));

    /// <summary>The matrix product.</summary>
    public static Matrix3x3 operator *(Matrix3x3 a, Matrix3x3 b)
    {
        var columns = b.Transpose;
        return new(
            a.Row1.Dot(columns.Row1), a.Row1.Dot(columns.Row2), a.Row1.Dot(columns.Row3),
            a.Row2.Dot(columns.Row1), a.Row2.Dot(columns.Row2), a.Row2.Dot(columns.Row3),
            a.Row3.Dot(columns.Row1), a.Row3.Dot(columns.Row2), a.Row3.Dot(columns.Row3));
    }

    /// <summary>The multiple.</summary>
    public static Matrix3x3 operator *(double factor, Matrix3x3 m) => FromRows(factor * m.Row1, factor * m.Row2, factor * m.Row3);

    // Stated because the text that a record writes by itself asks for Transpose, whose text asks for its own, without end.
    /// <summary>The rows, to six digits.</summary>
    public override string ToString() => string.Create(
        CultureInfo.InvariantCulture, $"[{M11:G6}, {M12:G6}, {M13:G6}; {M21:G6}, {M22:G6}, {M23:G6}; {M31:G6}, {M32:G6}, {M33:G6}]");
}
