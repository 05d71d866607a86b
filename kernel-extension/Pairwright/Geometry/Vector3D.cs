using System.Globalization;

namespace Pairwright.Geometry;

/// <summary>A point or a direction in space. Points are in millimetres, in the frame that the holder names.</summary>
/// <param name="X">To the right as a camera sees it.</param>
/// <param name="Y">Down as a camera sees it.</param>
/// <param name="Z">Forward, along the optical axis.</param>
public readonly record struct Vector3D(double X, double Y, double Z)
{
    /// <summary>The length.</summary>
    public double Norm => Math.Sqrt(Dot(this));

    /// <summary>The same direction with length one.</summary>
    public Vector3D Normalized => this / Norm;

    /// <summary>The scalar product.</summary>
    public double Dot(Vector3D other) => X * other.X + Y * other.Y + Z * other.Z;

    /// <summary>The vector product.</summary>
    public Vector3D Cross(Vector3D other) => new(Y * other.Z - Z * other.Y, Z * other.X - X * other.Z, X * other.Y - Y * other.X);

    /// <summary>The sum.</summary>
    public static Vector3D operator +(Vector3D left, Vector3D right) => new(left.X + right.X, left.Y + right.Y, left.Z + right.Z);

    /// <summary>The difference.</summary>
    public static Vector3D operator -(Vector3D left, Vector3D right) => new(left.X - right.X, left.Y - right.Y, left.Z - right.Z);

    /// <summary>The opposite.</summary>
    public static Vector3D operator -(Vector3D vector) => new(-vector.X, -vector.Y, -vector.Z);

    /// <summary>The multiple.</summary>
    public static Vector3D operator *(double factor, Vector3D vector) => new(factor * vector.X, factor * vector.Y, factor * vector.Z);

    /// <summary>The fraction.</summary>
    public static Vector3D operator /(Vector3D vector, double divisor) => new(vector.X / divisor, vector.Y / divisor, vector.Z / divisor);

    // Stated because the text that a record writes by itself asks for Normalized, whose text asks for its own Normalized, without end.
    /// <summary>The three numbers, to six digits.</summary>
    public override string ToString() => string.Create(CultureInfo.InvariantCulture, $"({X:G6}, {Y:G6}, {Z:G6})");
}
