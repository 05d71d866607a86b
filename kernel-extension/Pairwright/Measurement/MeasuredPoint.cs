using Pairwright.Geometry;

namespace Pairwright.Measurement;

/// <summary>One measured point in the left camera's own frame, with its random covariance and what the rig's uncertainty does to it.</summary>
public sealed class MeasuredPoint
{
    internal MeasuredPoint(RigVariants<Vector3D> variants, Matrix3x3 covariance) => (Variants, RandomCovariance) = (variants, covariance);

    /// <summary>The position in the left camera's own frame, in millimetres.</summary>
    public Vector3D Position => Variants.Nominal;

    /// <summary>The covariance of the position's random part, in mm²; NaN where the matching states no σ.</summary>
    public Matrix3x3 RandomCovariance { get; }

    /// <summary>The coordinate to the right.</summary>
    public MeasuredValue X => Along(new(1, 0, 0));

    /// <summary>The coordinate down.</summary>
    public MeasuredValue Y => Along(new(0, 1, 0));

    /// <summary>The coordinate along the left camera's optical axis.</summary>
    public MeasuredValue Z => Along(new(0, 0, 1));

    internal RigVariants<Vector3D> Variants { get; }

    /// <summary>The coordinate along a direction of the left camera's frame, from the camera's centre.</summary>
    /// <param name="direction">A direction; its length does not matter.</param>
    public MeasuredValue Along(Vector3D direction)
    {
        var unit = direction.Normalized;
        return Variants.ToMeasured(position => unit.Dot(position), RandomSigma(unit), "mm");
    }

    /// <summary>The distance to another point of the same rig; what both share cancels.</summary>
    /// <exception cref="UserErrorException">The points were measured with different rigs.</exception>
    public MeasuredValue DistanceTo(MeasuredPoint other)
    {
        ArgumentNullException.ThrowIfNull(other);
        var difference = Variants.With(other.Variants, (a, b) => b - a);
        var unit = difference.Nominal.Normalized;
        return difference.ToMeasured(vector => vector.Norm, Math.Sqrt(Variance(unit, RandomCovariance) + Variance(unit, other.RandomCovariance)), "mm");
    }

    /// <summary>The position with its standard uncertainties.</summary>
    public override string ToString() => $"X {X}, Y {Y}, Z {Z}; left camera's frame";

    internal double RandomSigma(Vector3D unit) => Math.Sqrt(Variance(unit, RandomCovariance));

    private static double Variance(Vector3D unit, Matrix3x3 covariance) => Math.Max(0, unit.Dot(covariance * unit));
}
