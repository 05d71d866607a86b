using Pairwright.Geometry;

namespace Pairwright.Simulation;

/// <summary>A rectangle without thickness in the plane z = 0, centred on the origin, seen from both sides; its normal is (0, 0, −1).</summary>
public sealed class Plate : Shape
{
    /// <summary>Makes a plate.</summary>
    /// <param name="lengthMm">Its extent along x, in millimetres.</param>
    /// <param name="widthMm">Its extent along y, in millimetres.</param>
    public Plate(double lengthMm, double widthMm)
    {
        ArgumentOutOfRangeException.ThrowIfNegativeOrZero(lengthMm);
        ArgumentOutOfRangeException.ThrowIfNegativeOrZero(widthMm);
        (LengthMm, WidthMm) = (lengthMm, widthMm);
        BoundRadiusMm = Math.Sqrt(lengthMm * lengthMm + widthMm * widthMm) / 2;
    }

    /// <summary>Its extent along x, in millimetres.</summary>
    public double LengthMm { get; }

    /// <summary>Its extent along y, in millimetres.</summary>
    public double WidthMm { get; }

    /// <inheritdoc/>
    public override Vector3D BoundCentre => default;

    /// <inheritdoc/>
    public override double BoundRadiusMm { get; }

    /// <inheritdoc/>
    public override double Distance(Vector3D origin, Vector3D direction, double beyond)
    {
        var t = -origin.Z / direction.Z;
        return t > beyond
            && Math.Abs(origin.X + t * direction.X) <= LengthMm / 2
            && Math.Abs(origin.Y + t * direction.Y) <= WidthMm / 2
            ? t
            : double.PositiveInfinity;
    }

    /// <inheritdoc/>
    public override Vector3D Normal(Vector3D point) => new(0, 0, -1);
}
