using Pairwright.Geometry;

namespace Pairwright.Simulation;

/// <summary>The surface of a thing, in a frame of its own, in millimetres. Derive from this class to make another.</summary>
/// <remarks>Immutable; called from several threads.</remarks>
public abstract class Shape
{
    /// <summary>The centre of a ball that holds the whole shape.</summary>
    public abstract Vector3D BoundCentre { get; }

    /// <summary>The radius of that ball, in millimetres.</summary>
    public abstract double BoundRadiusMm { get; }

    /// <summary>How far along a ray the surface is first met, in lengths of the direction; positive infinity where it is not.</summary>
    /// <param name="origin">Where the ray begins.</param>
    /// <param name="direction">Its direction, of any length above zero.</param>
    /// <param name="beyond">Only crossings farther than this count.</param>
    public abstract double Distance(Vector3D origin, Vector3D direction, double beyond);

    /// <summary>The outward normal, of length one, at a point of the surface.</summary>
    public abstract Vector3D Normal(Vector3D point);
}
