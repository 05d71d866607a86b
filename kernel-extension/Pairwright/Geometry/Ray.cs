namespace Pairwright.Geometry;

/// <summary>A half line in space, from a camera's centre through what a pixel sees. In the left camera's frame, in millimetres.</summary>
/// <param name="Origin">The camera's centre, in millimetres.</param>
/// <param name="Direction">The direction, of length one.</param>
public readonly record struct Ray(Vector3D Origin, Vector3D Direction)
{
    /// <summary>The point at a distance from the origin, in millimetres.</summary>
    public Vector3D PointAt(double distanceMm) => Origin + distanceMm * Direction;

    /// <summary>The distance of a point from the line of the ray, in millimetres.</summary>
    public double DistanceTo(Vector3D point) => Direction.Cross(point - Origin).Norm;
}
