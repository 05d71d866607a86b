using System.Collections.Immutable;

namespace Pairwright.Geometry;

/// <summary>What both cameras of a rig see of the plane at one depth of the left camera.</summary>
/// <param name="DepthMm">The depth Z in the left camera's frame, in millimetres.</param>
/// <param name="Outline">The border of the shared area, in order, in the left camera's frame, in millimetres; empty where the views do not overlap.</param>
/// <param name="AreaMm2">The shared area, in mm².</param>
/// <param name="ShareOfLeft">The shared area over the area that the left camera sees, 0 to 1.</param>
public sealed record SharedView(double DepthMm, ImmutableArray<Vector3D> Outline, double AreaMm2, double ShareOfLeft)
{
    /// <summary>Whether the views do not overlap at this depth.</summary>
    public bool IsEmpty => Outline.IsEmpty;

    /// <summary>The extent along the left camera's rows, in millimetres.</summary>
    public double WidthMm => IsEmpty ? 0 : Outline.Max(point => point.X) - Outline.Min(point => point.X);

    /// <summary>The extent along the left camera's columns, in millimetres.</summary>
    public double HeightMm => IsEmpty ? 0 : Outline.Max(point => point.Y) - Outline.Min(point => point.Y);
}
