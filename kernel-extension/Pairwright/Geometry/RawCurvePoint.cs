namespace Pairwright.Geometry;

/// <summary>One point of a <see cref="RawCurve"/>.</summary>
/// <param name="Raw">Where the lens forms it.</param>
/// <param name="Ideal">The same point on the straight line.</param>
/// <param name="InverseDepthPerMm">
/// One over the depth Z, in 1/mm, in the frame of the camera whose pixel the curve belongs to; zero at infinity; NaN where the curve
/// belongs to no pixel.
/// </param>
public readonly record struct RawCurvePoint(RawPixel Raw, IdealPixel Ideal, double InverseDepthPerMm)
{
    /// <summary>The depth Z, in millimetres, in the frame of the camera whose pixel the curve belongs to; infinite at infinity; NaN where unknown.</summary>
    public double DepthMm => 1 / InverseDepthPerMm;
}
