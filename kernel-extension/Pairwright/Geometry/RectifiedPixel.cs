namespace Pairwright.Geometry;

/// <summary>A position in a rectified picture, where matching points share a row.</summary>
/// <remarks>(0, 0) is the centre of the top-left pixel.</remarks>
/// <param name="U">To the right, in pixels.</param>
/// <param name="V">Down, in pixels.</param>
public readonly record struct RectifiedPixel(double U, double V)
{
    /// <summary>The position, in pixels.</summary>
    public override string ToString() => FormattableString.Invariant($"({U:0.###}, {V:0.###}) px");
}
