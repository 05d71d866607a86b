using Pairwright.Geometry;

namespace Pairwright.Simulation;

/// <summary>A box along the axes of its frame, centred on the origin.</summary>
public sealed class Box : Shape
{
    private readonly double halfX;
    private readonly double halfY;
    private readonly double halfZ;

    /// <summary>Makes a box from its extents along x, y and z, in millimetres.</summary>
    public Box(double lengthMm, double widthMm, double heightMm)
    {
        ArgumentOutOfRangeException.ThrowIfNegativeOrZero(lengthMm);
        ArgumentOutOfRangeException.ThrowIfNegativeOrZero(widthMm);
        ArgumentOutOfRangeException.ThrowIfNegativeOrZero(heightMm);
        (halfX, halfY, halfZ) = (lengthMm / 2, widthMm / 2, heightMm / 2);
    }

    /// <inheritdoc/>
    public override Vector3D BoundCentre => default;

    /// <inheritdoc/>
    public override double BoundRadiusMm => new Vector3D(halfX, halfY, halfZ).Norm;

    /// <inheritdoc/>
    public override double Distance(Vector3D origin, Vector3D direction, double beyond)
    {
        var (enter, leave) = Slabs.Clip(origin.X, direction.X, -halfX, halfX, double.NegativeInfinity, double.PositiveInfinity);
        (enter, leave) = Slabs.Clip(origin.Y, direction.Y, -halfY, halfY, enter, leave);
        (enter, leave) = Slabs.Clip(origin.Z, direction.Z, -halfZ, halfZ, enter, leave);
        return enter > leave ? double.PositiveInfinity : enter > beyond ? enter : leave > beyond ? leave : double.PositiveInfinity;
    }

    /// <inheritdoc/>
    public override Vector3D Normal(Vector3D point)
    {
        // The face that the point is nearest to.
        var (x, y, z) = (Math.Abs(point.X) - halfX, Math.Abs(point.Y) - halfY, Math.Abs(point.Z) - halfZ);
        return x >= y && x >= z ? new(Math.Sign(point.X), 0, 0) : y >= z ? new(0, Math.Sign(point.Y), 0) : new(0, 0, Math.Sign(point.Z));
    }
}
