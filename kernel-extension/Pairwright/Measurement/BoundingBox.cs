using Pairwright.Geometry;

namespace Pairwright.Measurement;

/// <summary>The upright box around points, in the left camera's own frame, in millimetres.</summary>
/// <param name="Least">The corner of the least coordinates.</param>
/// <param name="Most">The corner of the greatest coordinates.</param>
public readonly record struct BoundingBox(Vector3D Least, Vector3D Most)
{
    /// <summary>The lengths of its sides.</summary>
    public Vector3D Size => Most - Least;
}
