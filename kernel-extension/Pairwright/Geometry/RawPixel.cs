namespace Pairwright.Geometry;

/// <summary>A position in a picture as the lens formed it, distortion included.</summary>
/// <remarks>(0, 0) is the centre of the top-left pixel. Not interchangeable with <see cref="IdealPixel"/>: a <see cref="Camera"/> converts.</remarks>
/// <param name="U">To the right, in pixels.</param>
/// <param name="V">Down, in pixels.</param>
public readonly record struct RawPixel(double U, double V)
{
    /// <summary>The position, in pixels.</summary>
    public override string ToString() => FormattableString.Invariant($"({U:0.###}, {V:0.###}) px");
}
