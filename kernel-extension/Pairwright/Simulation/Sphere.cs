using Pairwright.Geometry;

namespace Pairwright.Simulation;

/// <summary>A sphere around the origin of its frame.</summary>
public sealed class Sphere : Shape
{
    /// <summary>Makes a sphere of a radius in millimetres.</summary>
    public Sphere(double radiusMm)
    {
        ArgumentOutOfRangeException.ThrowIfNegativeOrZero(radiusMm);
        BoundRadiusMm = radiusMm;
    }

    /// <inheritdoc/>
    public override Vector3D BoundCentre => default;

    /// <inheritdoc/>
    public override double BoundRadiusMm { get; }

    /// <inheritdoc/>
    public override double Distance(Vector3D origin, Vector3D direction, double beyond)
    {
        // Measured from the point of the ray nearest the centre, which keeps the digits when the sphere is far away.
        var square = direction.Dot(direction);
        var nearest = -origin.Dot(direction) / square;
        var offset = origin + nearest * direction;
        var rest = BoundRadiusMm * BoundRadiusMm - offset.Dot(offset);
        if (rest < 0)
        {
            return double.PositiveInfinity;
        }

        var half = Math.Sqrt(rest / square);
        return nearest - half > beyond ? nearest - half : nearest + half > beyond ? nearest + half : double.PositiveInfinity;
    }

    /// <inheritdoc/>
    public override Vector3D Normal(Vector3D point) => point.Normalized;
}
