using Pairwright.Geometry;

namespace Pairwright.Simulation;

/// <summary>Where a ray meets a scene.</summary>
/// <param name="Object">What it meets.</param>
/// <param name="ObjectIndex">Its place in <see cref="Scene.Objects"/>.</param>
/// <param name="Distance">How far along the ray, in lengths of the direction.</param>
/// <param name="Point">The surface point in the scene's frame, in millimetres.</param>
/// <param name="PointOnObject">The same point in the object's own frame, in millimetres.</param>
/// <param name="Normal">The surface's normal in the scene's frame, of length one, towards where the ray came from.</param>
public readonly record struct SurfaceHit(
    SceneObject Object, int ObjectIndex, double Distance, Vector3D Point, Vector3D PointOnObject, Vector3D Normal)
{
    /// <summary>The texture's albedo there, 0 to 1.</summary>
    public double Albedo => Object.Texture.Albedo(PointOnObject);
}
