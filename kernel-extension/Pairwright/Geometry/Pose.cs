namespace Pairwright.Geometry;

/// <summary>A rigid change of frame: X_to = R·X_from + t. Names say it in that order, as in <c>RightFromLeft</c>.</summary>
/// <param name="Rotation">The rotation R.</param>
/// <param name="Translation">The translation t, in millimetres.</param>
public readonly record struct Pose(Matrix3x3 Rotation, Vector3D Translation)
{
    /// <summary>No change.</summary>
    public static Pose Identity { get; } = new(Matrix3x3.Identity, default);

    /// <summary>The opposite change of frame.</summary>
    public Pose Inverse => new(Rotation.Transpose, -(Rotation.Transpose * Translation));

    /// <summary>A pose from a rotation vector (axis times angle in radians) and a translation in millimetres.</summary>
    public static Pose FromVectors(Vector3D rotationVector, Vector3D translation) => new(Geometry.Rotation.FromVector(rotationVector), translation);

    /// <summary>The point in the frame that this pose leads to, in millimetres.</summary>
    public Vector3D Transform(Vector3D point) => Rotation * point + Translation;

    /// <summary>First this change of frame, then another.</summary>
    public Pose Then(Pose next) => new(next.Rotation * Rotation, next.Transform(Translation));

    // Stated because the text that a record writes by itself asks for Inverse, whose text asks for its own, without end.
    /// <summary>The rotation and the translation, to six digits.</summary>
    public override string ToString() => $"R = {Rotation}, t = {Translation} mm";
}
